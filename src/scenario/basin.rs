//! `[basin]`: where the basin lies and how weather changes with its elevation.

use super::hypsometry::{HypsometryTyped, read_hypsometry};
use super::section::Section;
use crate::basin::{GradientForm, PrecipitationGradient, TemperatureGradient};
use crate::fault::Fault;

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

/// Near-surface gradients outside this range are unusual (Minder, Mote & Lundquist 2010), degC per km.
const USUAL_C_PER_KM: std::ops::RangeInclusive<f64> = -8.0..=-2.0;

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
    let both = gradient(&mut section, "temperature_gradient_c_per_km");
    let tmin = gradient(&mut section, "tmin_temperature_gradient_c_per_km").or(both);
    let tmax = gradient(&mut section, "tmax_temperature_gradient_c_per_km").or(both);
    if tmin.is_none() && tmax.is_none() && !section.has("temperature_gradient_c_per_km") {
        section.required_number(
            "temperature_gradient_c_per_km",
            -12.0..=0.0,
            "it is negative, since it is colder higher up, and -6.5 is the standard atmosphere's",
        );
    }
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
        temperature: TemperatureGradient { tmin_c_per_km: tmin?, tmax_c_per_km: tmax? },
        precipitation: PrecipitationGradient::new(pct_per_100m?, top_m, form?),
    })
}

/// One negative number, or twelve of any sign (inversions make a month positive).
fn gradient(section: &mut Section<'_>, key: &'static str) -> Option<[f64; 12]> {
    let months = section.one_or_monthly(key)?;
    let is_one = months.iter().all(|value| *value == months[0]);
    if is_one && months[0] > 0.0 {
        section.fault(Fault::key(
            section.path_of(key),
            months[0],
            "a negative number, since it is colder higher up",
            format!("did you mean {}?", -months[0]),
        ));
        return None;
    }
    if months.iter().any(|value| !(-12.0..=12.0).contains(value)) {
        section.fault(Fault::key(
            section.path_of(key),
            format!("{months:?}"),
            "gradients from -12 to 12 degC per km",
            "it is degC per km, not per 100 m",
        ));
        return None;
    }
    if months.iter().any(|value| !USUAL_C_PER_KM.contains(value)) {
        section.unlikely(
            key,
            "outside -8 to -2 degC per km, the usual range near the ground (Minder, Mote & Lundquist 2010)",
        );
    }
    Some(months)
}
