//! Findings: the questions that a study answers, one a file, and the numbers that answer them (method, section 10).
//!
//! Everything that a figure draws or a sentence says about an ensemble, and about the record's own years, stands in [`Findings`] and nowhere else.

mod answer;
mod chance;
mod crossing;
mod distribution;
mod normal;
mod odds;
mod precipitation;
mod quantile;
mod record;
mod resample;
mod shift;
mod spread;
mod variance;

pub use answer::{BandFindings, Findings, LevelFindings, MeasureFindings, Questions, answer};
pub use chance::{Chance, Chances};
pub use crossing::{Crossing, CrossingRange, crossing};
pub use distribution::{DOTS, Distribution};
pub use normal::{
    CLASS_LIMITS_PCT, LevelPercents, MedianSwe, NormalQuestions, PercentOfMedian, UNSTABLE_BELOW_SHARE,
    percent_of_median,
};
pub use precipitation::{RecordPrecipitation, YearPrecipitation};
pub use quantile::{quantile, sorted};
pub use record::{OwnYear, RecordFindings, RecordQuestions};
pub use resample::{Estimate, Resamples};
pub use shift::{LEAST_REFERENCE_MM, Shift, percent_change};
pub use spread::{SignalToNoise, Spread, signal_to_noise, signal_to_spread};
pub use variance::{TwoWay, VarianceShares};
