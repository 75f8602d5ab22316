//! `[basin]`: where the basin lies and how weather changes with its elevation.

use super::hypsometry::{HypsometryTyped, read_hypsometry};
use super::section::Section;
use super::temperature_gradient::read_temperature_gradient;
use crate::basin::{GradientForm, PrecipitationGradient, TemperatureGradient};

/// The basin as typed: its hypsometry stands in a file of its own.
#[derive(Debug, Clone)]
pub struct BasinTyped {
    /// Latitude, degrees, positive north.
    pub latitude_deg: f64,
    /// The file of its bands, or of the curve to cut them from.
    pub hypsometry: HypsometryTyped,
    /// Temperature gradient.
    pub temperature: TemperatureGradient,
    /// Precipitation gradient.
    pub precipitation: PrecipitationGradient,
}

/// Precipitation gradients in general use, percent per 100 m; no single source.
const USUAL_PCT_PER_100M: std::ops::RangeInclusive<f64> = 0.0..=10.0;

/// The file of the bands stands alone too: it can be looked into although another key has a fault.
pub(super) fn read(mut section: Section<'_>) -> (Option<HypsometryTyped>, Option<BasinTyped>) {
    let hypsometry = read_hypsometry(&mut section);
    (hypsometry.clone(), read_around(section, hypsometry))
}

fn read_around(mut section: Section<'_>, hypsometry: Option<HypsometryTyped>) -> Option<BasinTyped> {
    let latitude_deg =
        section.required_number("latitude_deg", -90.0..=90.0, "degrees, negative in the southern hemisphere");
    let temperature = read_temperature_gradient(&mut section);
    let pct_per_100m = section.required_number(
        "precipitation_gradient_pct_per_100m",
        -20.0..=50.0,
        "in percent of the station's precipitation; 0 to 10 is usual, and there is no default",
    );
    if pct_per_100m.is_some_and(|pct| !USUAL_PCT_PER_100M.contains(&pct)) {
        section.unlikely(
            "precipitation_gradient_pct_per_100m",
            "outside 0 to 10 percent per 100 m, the range in general use (no single source)",
        );
    }
    let top_m = section.number_in(
        "precipitation_gradient_top_m",
        -500.0..=9000.0,
        "the elevation above which precipitation grows no further, m",
    );
    let form = section.choice_or("precipitation_gradient_form", &GradientForm::NAMES, "linear");
    section.finish();
    Some(BasinTyped {
        latitude_deg: latitude_deg?,
        hypsometry: hypsometry?,
        temperature: temperature?,
        precipitation: PrecipitationGradient::new(pct_per_100m?, top_m, form?),
    })
}
