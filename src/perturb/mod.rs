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

use crate::weather::Series;

/// Makes realizations: whole water years of station weather, one stream of random numbers each.
pub trait Generator: Sync {
    /// Fills `into` with realization number `realization`, the same for every warming level. Its values depend on the
    /// seed and that number alone. Years of one name have the same weather throughout a realization, so that one that is
    /// drawn twice need not be run twice.
    fn fill(&self, realization: u32, into: &mut Series);

    /// Whether years of one name have the same weather in every realization, so that what has been run need not be run
    /// again.
    fn repeats_years(&self) -> bool {
        false
    }
}
