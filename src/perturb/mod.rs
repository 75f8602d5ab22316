//! Perturbation: warming levels as monthly offsets and factors, and generators of weather that could have been.

mod fitted;
mod global;
mod intensity;
mod kept;
mod level;
mod markov_gamma;
mod mean_change;
mod recipe;
mod stream;
mod temperature_held;
mod year_blocks;

pub use fitted::{AmountLaw, ChainOrder, Fitted, FittedMonth};
pub use global::GlobalWarming;
pub use intensity::{Intensity, WetDayChange};
pub use kept::Kept;
pub use level::{MonthlyChange, PrecipitationChange, StatedChange, Warming};
pub use markov_gamma::MarkovGamma;
pub use mean_change::{MeanChange, mean_change_factor};
pub use recipe::{GeneratorChoice, Recipe};
pub use stream::{resampling_stream, search_stream, stream, winters_stream};
pub use temperature_held::TemperatureHeld;
pub use year_blocks::YearBlocks;

use crate::weather::{Series, YearSpan};

/// Makes realizations: whole water years of station weather, one stream of random numbers each.
pub trait Generator: Sync {
    /// Fills `into` with `years` years of realization number `realization`, the same for every level that runs it. Its
    /// values depend on the seed and that number alone: more years begin as fewer do, but where a mean over all of them is
    /// held. Years of one name have the same weather throughout a realization, so that one that is drawn twice need not be
    /// run twice.
    fn fill(&self, realization: u32, years: usize, into: &mut Series);

    /// The record, and the years of it that realization number `realization` is, where it takes them as they are: then
    /// nothing need be filled, and years of one name have the same weather in every realization.
    fn drawn(&self, _realization: u32, _years: usize) -> Option<(&Series, Vec<YearSpan>)> {
        None
    }

    /// What it took from its record month by month, where it fits anything.
    fn fitted(&self) -> Option<Fitted> {
        None
    }

    /// Whether a year's name stands for the same weather in this realization of every generator of the same kind that
    /// was made from years of one record.
    fn keeps_names(&self) -> bool {
        false
    }
}
