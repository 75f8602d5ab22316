//! `[findings.low_snow]`: what a low-snow year is.

use super::super::section::Section;
use crate::findings::LOW_SNOW_BELOW_QUANTILE;

/// A low-snow year, as typed.
#[derive(Debug, Clone, Copy)]
pub struct LowSnowTyped {
    /// Its SWE lies below this quantile of the reference's single years.
    pub below_quantile: f64,
}

pub(super) fn read(mut section: Section<'_>) -> LowSnowTyped {
    let below_quantile = section.number_or(
        "below_quantile",
        LOW_SNOW_BELOW_QUANTILE,
        0.01..=0.5,
        "0.2 takes the lowest fifth of the reference's years",
    );
    section.finish();
    LowSnowTyped { below_quantile }
}
