//! What a low-snow year is.

/// A low-snow year is one whose survey-date SWE lies below this quantile of the reference's single years: one in five, common
/// practice.
pub const LOW_SNOW_BELOW_QUANTILE: f64 = 0.2;
