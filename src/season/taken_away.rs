//! The snow that is taken away as a water year ends; asked where every year begins on bare ground.

use super::{Asked, Kind, Measure, Peaks, SeasonSettings};
use crate::snow::YearBlock;

pub(super) fn list(_: &SeasonSettings) -> Vec<Measure> {
    vec![Measure::new(Kind::AmountMm, "snow_taken_away_mm", "snow taken away at the year's end")]
}

/// SWE as the year ends, the last row of the block: all of it is taken away, so that the year's precipitation is its water
/// input, what the air took, and this.
pub(super) fn take(block: &mut YearBlock, _: &Peaks, _: &Asked, into: &mut [f64]) {
    into.copy_from_slice(block.row(&block.swe_mm, block.days));
}
