//! Rain or snow: the share of a day's precipitation that falls as snow (method, section 5).

use super::{larger, smaller};

/// Linear between two temperatures: `clamp((R - T)/(R - S), 0, 1)`, snow only below S, rain only above R.
///
/// `rain_only_above_c` is R and `per_c` is `1/(R - S)`; `mean_c` is the band's daily mean temperature.
///
/// ```
/// use thawline::snow::linear_snow_fraction;
/// assert_eq!(linear_snow_fraction(1.5, 3.0, 1.0 / 4.0), 0.375);
/// ```
#[inline(always)]
pub fn linear_snow_fraction(mean_c: f64, rain_only_above_c: f64, per_c: f64) -> f64 {
    smaller(larger((rain_only_above_c - mean_c) * per_c, 0.0), 1.0)
}

/// All snow at or below a threshold, all rain above it.
#[inline(always)]
pub fn step_snow_fraction(mean_c: f64, threshold_c: f64) -> f64 {
    if mean_c <= threshold_c { 1.0 } else { 0.0 }
}

/// A smooth curve: `(1 - tanh(b*(T - c)))/2`, half snow at c (after Dai 2008).
///
/// `middle_c` is c and `per_c` is b. It never quite reaches 0 or 1.
///
/// ```
/// use thawline::snow::tanh_snow_fraction;
/// assert_eq!(tanh_snow_fraction(1.2, 1.2, 0.7), 0.5);
/// ```
#[inline(always)]
pub fn tanh_snow_fraction(mean_c: f64, middle_c: f64, per_c: f64) -> f64 {
    (1.0 - libm::tanh(per_c * (mean_c - middle_c))) / 2.0
}
