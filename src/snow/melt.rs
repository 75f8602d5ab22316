//! How fast a degree melts snow, through the year, and what rain adds (method, section 6).

use super::params::SnowParams;

/// Melt by rain, mm per mm of rain and degC of the air: 1 cal/(g degC) over a latent heat of 80 cal/g.
pub const RAIN_MELT_PER_MM_C: f64 = 0.0125;

/// Degree-day factor on a calendar day of the year, mm per degC and day.
///
/// `(highest + lowest)/2 + (highest - lowest)/2 * cos(2 pi (day - highest_on)/365.25)`, with `highest_on` the stated
/// highest day's number in a year of 365 days. `day_of_year` runs from 1 to 366.
pub fn degree_day_factor(snow: &SnowParams, day_of_year: u16) -> f64 {
    let (highest, lowest) = (snow.degree_day_factor_highest, snow.degree_day_factor_lowest);
    let from_highest = f64::from(day_of_year) - f64::from(snow.highest_on.day_of_common_year());
    let angle = 2.0 * std::f64::consts::PI * from_highest / 365.25;
    (highest + lowest) / 2.0 + (highest - lowest) / 2.0 * libm::cos(angle)
}

/// Less melt for each fraction of canopy: 0.16 mm per degC and day for every tenth, on an open factor of 3.51 (Kuusisto 1980,
/// Nordic Hydrology 11:235; Finland, 12 stations).
const LESS_UNDER_CANOPY: f64 = 1.6 / 3.51;

/// Share of the open degree-day factor that is left under so much canopy, a fraction: `1 - 1.6/3.51*c`. Forest in the
/// source's mean, 68 % canopy, has 2.42 of 3.51. It scales melt and refreezing alike; neither interception nor wind is in it.
///
/// ```
/// use thawline::snow::canopy_share;
/// assert_eq!(canopy_share(0.0), 1.0);
/// assert!((3.51 * canopy_share(0.68) - 2.42).abs() < 0.005);
/// ```
pub fn canopy_share(canopy_fraction: f64) -> f64 {
    1.0 - LESS_UNDER_CANOPY * canopy_fraction
}

/// What a day could melt if snow were without end, mm: `M*E+ + 0.0125 * rain * max(T, 0)`, M the melt factor of the day: the
/// degree-day factor and what radiation adds to it (after Hock 1999), under the band's canopy.
#[inline(always)]
pub fn potential_melt(melt_factor: f64, melt_degrees_c: f64, rain_mm: f64, mean_c: f64) -> f64 {
    melt_factor * melt_degrees_c + RAIN_MELT_PER_MM_C * rain_mm * super::larger(mean_c, 0.0)
}
