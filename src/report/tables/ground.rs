//! Columns of a table of bands that say what lies under their snow; only those in which some band has anything.

use super::cells::optional;
use crate::basin::{Band, GroundStated};

/// The columns of a table.
#[derive(Clone, Copy)]
pub(in super::super) struct GroundColumns(GroundStated);

/// Whether a column is told, its name, and what stands in it.
type Told = (bool, &'static str, fn(&Band) -> Option<f64>);

impl GroundColumns {
    /// Of all bands that the table tells of.
    pub fn of<'b>(bands: impl IntoIterator<Item = &'b Band>) -> Self {
        Self(GroundStated::of(bands))
    }

    /// Their names.
    pub fn names(self) -> impl Iterator<Item = String> {
        self.columns().into_iter().flat_map(|(is_told, name, _)| is_told.then(|| name.to_owned()))
    }

    /// A band's cells; empty ones for the basin, which is no band.
    pub fn cells(self, band: Option<&Band>) -> impl Iterator<Item = String> {
        self.columns()
            .into_iter()
            .flat_map(move |(is_told, _, value)| is_told.then(|| optional(band.and_then(value))))
    }

    fn columns(self) -> [Told; 4] {
        let Self(stated) = self;
        [
            (stated.slope, "slope_deg", |band| Some(band.ground.slope_deg)),
            (stated.slope, "aspect_deg", |band| {
                Some(band.ground.aspect_deg).filter(|_| band.ground.slope_deg > 0.0)
            }),
            (stated.canopy, "canopy_fraction", |band| Some(band.ground.canopy_fraction)),
            (stated.variation, "accumulation_cv", |band| band.ground.accumulation_variation),
        ]
    }
}
