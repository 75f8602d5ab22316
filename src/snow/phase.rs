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

/// A curve of third degree through half snow (Kienzle 2008, Hydrol. Process. 22:5067; its polynomial from memory): with
/// `x = (T - T50)/(1.4*R)` the share of rain is `0.5 + 3.19x - 6.76x|x| + 5x^3`, between 0 and 1.
///
/// `half_snow_at_c` is T50 and `per_c` is `1/(1.4*R)`, R the width of the range in which rain and snow mix. At half of R on
/// either side the curve is at its ends.
///
/// ```
/// use thawline::snow::s_curve_snow_fraction;
/// assert_eq!(s_curve_snow_fraction(2.0, 2.0, 1.0 / (1.4 * 12.0)), 0.5);
/// ```
#[inline(always)]
pub fn s_curve_snow_fraction(mean_c: f64, half_snow_at_c: f64, per_c: f64) -> f64 {
    let x = (mean_c - half_snow_at_c) * per_c;
    smaller(larger(0.5 - x * (3.19 - x.abs() * 6.76 + x * x * 5.0), 0.0), 1.0)
}
