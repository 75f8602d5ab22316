//! Perturbation: warming levels as monthly offsets and factors, and generators of weather that could have been.

mod global;
mod level;
mod mean_change;
mod stream;
mod temperature_held;
mod year_blocks;

pub use global::GlobalWarming;
pub use level::{MonthlyChange, PrecipitationChange, StatedChange, Warming};
pub use mean_change::mean_change_factor;
pub use stream::{resampling_stream, stream};
pub use temperature_held::TemperatureHeld;
pub use year_blocks::YearBlocks;

use crate::weather::{Series, YearSpan};

/// Makes realizations: whole water years of station weather, one stream of random numbers each.
pub trait Generator: Sync {
    /// Fills `into` with realization number `realization`, the same for every warming level. Its values depend on the
    /// seed and that number alone. Years of one name have the same weather throughout a realization, so that one that is
    /// drawn twice need not be run twice.
    fn fill(&self, realization: u32, into: &mut Series);

    /// The record, and the years of it that realization number `realization` is, where it takes them as they are: then
    /// nothing need be filled, and years of one name have the same weather in every realization.
    fn drawn(&self, _realization: u32) -> Option<(&Series, Vec<YearSpan>)> {
        None
    }
}
