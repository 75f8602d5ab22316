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

/// What a day could melt if snow were without end, mm: `D*E+ + 0.0125 * rain * max(T, 0)`.
#[inline(always)]
pub fn potential_melt(degree_day_factor: f64, melt_degrees_c: f64, rain_mm: f64, mean_c: f64) -> f64 {
    degree_day_factor * melt_degrees_c + RAIN_MELT_PER_MM_C * rain_mm * super::larger(mean_c, 0.0)
}
