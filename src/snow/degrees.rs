//! Degrees above and below the melt base temperature, as the mean of a day (method, section 6).

use super::{larger, smaller};

/// A half range below this is a day without a range: the diurnal rule then gives the mean rule.
const NO_RANGE_C: f64 = 1e-12;

/// What a sine day adds to the degrees of its mean, per degree of half range, over `(1 - u)^1.5`, as a polynomial in
/// `u`, the distance of the mean from the base in half ranges; lowest power first.
///
/// It stands for `(sqrt(1 - u^2) - u*acos(u)) / pi / (1 - u)^1.5` on 0..=1 and agrees with it to 8e-16 of the half
/// range; a test holds it to the closed form.
const DIURNAL: [f64; 15] = [
    0.318_309_886_183_789_97,
    -0.022_535_170_723_989_355,
    0.005_985_979_662_043_538,
    -0.002_464_708_602_294_470_7,
    0.001_269_154_157_100_380_9,
    -0.000_748_023_422_588_849_2,
    0.000_481_909_445_753_664_05,
    -0.000_328_848_923_697_331_86,
    0.000_229_510_740_831_703_83,
    -0.000_155_380_924_070_993_25,
    9.474_064_629_276_642e-5,
    -4.759_119_143_315_928e-5,
    1.775_623_435_961_43e-5,
    -4.259_650_286_158_452e-6,
    4.850_872_244_559_667e-7,
];

/// Degrees above and below the base from the day's mean alone: `(max(T - base, 0), max(base - T, 0))`, degC.
#[inline(always)]
pub fn mean_degrees(mean_c: f64, base_c: f64) -> (f64, f64) {
    let above = mean_c - base_c;
    (larger(above, 0.0), larger(-above, 0.0))
}

/// Degrees above and below the base of a sine between the day's minimum and maximum, degC (the single-sine
/// degree-day of Baskerville & Emin 1969).
///
/// With d the mean above the base and A half the daily range, `E+ = s + max(d, 0)`, `E- = s + max(-d, 0)` and
/// `s = A * (1 - u)^1.5 * poly(u)`, `u = min(|d|/A, 1)`: the same as the closed form with acos, without a branch, to
/// 1e-12 degC for half ranges up to 100 degC. A day without a range gives the mean rule.
///
/// ```
/// use thawline::snow::diurnal_degrees;
/// let (above, below) = diurnal_degrees(2.0, 5.0, 0.0);
/// assert!((above - 2.720659).abs() < 1e-5);
/// assert!((above - below - 2.0).abs() < 1e-12);
/// ```
#[inline(always)]
pub fn diurnal_degrees(mean_c: f64, half_range_c: f64, base_c: f64) -> (f64, f64) {
    let above = mean_c - base_c;
    let half_range = larger(half_range_c, NO_RANGE_C);
    let u = smaller(above.abs() / half_range, 1.0);
    let rest = 1.0 - u;
    let shared = half_range * rest * rest.sqrt() * estrin(u);
    (shared + larger(above, 0.0), shared + larger(-above, 0.0))
}

/// The polynomial in pairs, pairs of pairs and so on (Estrin's scheme): short chains of dependent operations.
#[inline(always)]
fn estrin(u: f64) -> f64 {
    let c = &DIURNAL;
    let (u2, u4, u8) = (u * u, u * u * (u * u), u * u * (u * u) * (u * u * (u * u)));
    let low =
        ((c[0] + c[1] * u) + (c[2] + c[3] * u) * u2) + ((c[4] + c[5] * u) + (c[6] + c[7] * u) * u2) * u4;
    let high = ((c[8] + c[9] * u) + (c[10] + c[11] * u) * u2) + ((c[12] + c[13] * u) + c[14] * u2) * u4;
    low + high * u8
}
