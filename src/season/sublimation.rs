//! What the air takes of the snow in a year; asked where the snow model lets it.

use super::{Asked, Kind, Measure, Peaks, SeasonSettings, rows};
use crate::snow::YearBlock;

pub(super) fn list(_: &SeasonSettings) -> Vec<Measure> {
    vec![Measure::new(Kind::AmountMm, "sublimation_mm", "sublimation of the year")]
}

pub(super) fn take(block: &mut YearBlock, _: &Peaks, _: &Asked, into: &mut [f64]) {
    into.fill(0.0);
    rows::add(&block.sublimation_mm[..block.days * block.width], into);
}
