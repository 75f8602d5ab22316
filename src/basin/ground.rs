//! What lies under a band's snow: its slope, its trees, and how unevenly the snow lies.

use serde::Serialize;

/// The ground of a band. The default is level, open, and without a spread of its own.
#[derive(Debug, Clone, Copy, Default, PartialEq, Serialize)]
pub struct Ground {
    /// Slope, degrees from the horizontal, 0 to 90.
    pub slope_deg: f64,
    /// The way the slope faces, degrees clockwise from north, 0 to 360.
    pub aspect_deg: f64,
    /// Share of the area under trees, 0 to 1.
    pub canopy_fraction: f64,
    /// Coefficient of variation of the snow that lies within the band; none where the scenario's own holds.
    pub accumulation_variation: Option<f64>,
}
