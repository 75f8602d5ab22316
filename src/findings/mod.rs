//! Findings: the questions that a study answers, one a file, and the numbers that answer them (method, section 10).
//!
//! Everything that a figure draws or a sentence says about an ensemble, and about the record's own years, stands in [`Findings`] and nowhere else.

mod answer;
mod at_risk;
mod band_change;
mod break_even;
mod by_year;
mod cells;
mod chance;
mod coincidence;
mod counts;
#[cfg(test)]
mod coverage;
mod crossing;
mod crossover;
mod detection;
mod distribution;
mod driest_and_wettest;
mod elasticity;
mod elevations;
mod exceedance;
mod generator_sheet;
mod low_runs;
mod low_snow;
mod measure;
mod normal;
mod odds;
mod offset;
mod operations;
mod parameter_spread;
mod partition;
mod perennial;
mod places;
mod precipitation;
mod quantile;
mod ranged;
mod record;
mod record_coincidence;
mod record_odds;
mod record_range;
mod reference_years;
mod replayed_years;
mod resample;
mod rule_panel;
mod shift;
mod snow_drought;
mod snow_line;
mod spread;
mod surface;
mod surface_nodes;
mod tails;
mod temperature_held;
mod three_way;
mod through_year;
mod tipping;
mod variance;
mod warm_year_bias;
mod worst_years;
mod yardstick;
mod year_types;

pub use answer::{BandFindings, Findings, OtherChange, Questions, Runs, answer};
pub use at_risk::{AtRisk, AtRiskLevel};
pub use band_change::{BandChange, BandChangeLevel, Sign};
pub use break_even::{
    BREAK_EVEN_BRACKET_PCT, BreakEven, BreakEvenLevel, Reached, Root, Stays, break_even_pct,
};
pub use by_year::{ByYear, ByYearQuestions, MeasureByYear};
pub use cells::Cells;
pub use chance::{Chance, Chances};
pub use coincidence::{Coincidence, CoincidenceLevel, Depends, LowSnowGivenDry, OwnMedians};
pub use crossing::{Crossing, CrossingRange, Judged, crossing, judged};
pub use crossover::{BandCorrelation, Crossover, CrossoverRange, Dominates};
pub use detection::{Detection, DetectionLevel, DetectionPeriod, WarmingRate};
pub use distribution::{DOTS, Distribution};
pub use driest_and_wettest::{DriestAndWettest, OverRealizations};
pub use elasticity::{HALF_STEP_C, HALF_STEP_PCT, INTERACTION_PCT, Slope, Slopes, compound_share_pct};
pub use elevations::{Line, LineRange};
pub use exceedance::{EXCEEDANCE_PCT, Exceeded};
pub use generator_sheet::{
    GeneratorSheet, LargestDay, Period, Quantity, REALIZATIONS_OF_THE_SHEET, RealizationRange, SheetLine,
    SheetQuestions, SheetSample, SheetStatistic, Statistic, Subject, Verdict,
};
pub use low_runs::{LowRuns, RUNS_AT_OR_BELOW_QUANTILE, RunChance, RunLength};
pub use low_snow::{
    LOW_SNOW_BELOW_QUANTILE, LowSnow, LowSnowLevel, RecordLowSnow, RecordLowSnowLevel, WithoutWarming,
};
pub use measure::{LevelFindings, MeasureFindings};
pub use normal::{
    CLASS_LIMITS_PCT, LevelPercents, MedianSwe, NormalQuestions, PercentOfMedian, UNSTABLE_BELOW_SHARE,
    percent_of_median,
};
pub use offset::Offset;
pub use operations::{
    ChangedLevel, ChangedMeasure, Operations, OperationsQuestions, Outlook, OutlookLevel, PoolShown,
    RuleChange, YearClasses, YearClassesLevel,
};
pub use parameter_spread::{LevelBySet, MeasureBySet, Mover, OverSets, ParameterSpread, SetRuns, Weighed};
pub use partition::{AVERAGED_YEARS, HoldsMost, Partition, PartitionedPeriod};
pub use perennial::PerennialBand;
pub use places::{Places, PlacesQuestions};
pub use precipitation::{RecordPrecipitation, YearPrecipitation};
pub use quantile::{quantile, sorted};
pub use ranged::Ranged;
pub use record::{OwnYear, RecordFindings, RecordQuestions};
pub use record_coincidence::{Counted, PeriodCoincidence, PeriodsCompared, RecordCoincidence, RecordValues};
pub use record_odds::{RecordOdds, RecordOddsLevel, RecordRuns, RefitOdds};
pub use record_range::{
    REALIZATIONS_OF_A_RECORD, RESAMPLED_RECORDS, Range, RecordRange, RecordRangeLevel, Refit,
};
pub use replayed_years::{ReplayedLevel, ReplayedYear, ReplayedYears};
pub use resample::{Estimate, Resamples};
pub use rule_panel::{
    FACTOR_BOUNDS, Fit, LevelOfRule, LevelOverRules, MELT_OUT_TOLERANCE_DAYS, MeasureByRule, OfRule,
    OutweighsOverRules, PEAK_TOLERANCE_PCT, PanelRule, RangeOverRules, Rule, RulePanel, RuleRuns, Tuned,
    Weight, is_at_bound, retuned, tune,
};
pub use shift::{LEAST_REALIZATIONS_FOR_A_RANGE, Shift, percent_change};
pub use snow_drought::{SnowDroughtLevel, SnowDroughts};
pub use snow_line::{SnowLine, SnowLineLevel};
pub use spread::{SignalToNoise, Spread, signal_to_noise, signal_to_spread};
pub use surface::{
    Change, ChangeOrigin, CurvePoint, NamedChange, NamedNode, NodeMeasure, Realized, ResponseSurface,
    SurfaceNode, SurfaceQuestions,
};
pub use surface_nodes::Nodes;
pub use tails::{TailChanges, Tails};
pub use temperature_held::{HeldLevel, TemperatureHeldSpread};
pub use three_way::{AveragedShares, ThreeWay, ThreeWayShares};
pub use through_year::{LevelThroughYear, SweThroughYear};
pub use tipping::{Asks, Criterion, CriterionLevel, FailureLine, TippingLevel};
pub use variance::{TwoWay, VarianceShares};
pub use warm_year_bias::{BiasVerdict, WarmYearBias, warm_year_biases};
pub use worst_years::{ReturnOfYear, WorstYear};
pub use yardstick::{TIMES_ASSUMED, Yardstick, YardstickLevel};
pub use year_types::{TYPE_LIMITS, TYPES, YearTypes};
