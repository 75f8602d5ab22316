//! Scores of a fit as a row of numbers, for page and table alike.

use crate::fit::{Bias, Judged};

/// Heads of the columns of a table, the units at their ends.
pub(super) const COLUMNS: [&str; 12] = [
    "nash_sutcliffe",
    "kling_gupta_2009",
    "skill_above_day_of_year_mean",
    "peak_bias_pct",
    "peak_bias_standard_error_pct",
    "survey_bias_pct",
    "survey_bias_standard_error_pct",
    "melt_out_error_days",
    "melt_out_size_of_error_days",
    "survey_error_by_winter_temperature_pct_per_c",
    "survey_error_by_winter_temperature_standard_error_pct_per_c",
    "years",
];

/// The numbers under [`COLUMNS`].
pub(super) fn numbers(judged: &Judged) -> [Option<f64>; 12] {
    let bias = |bias: Option<Bias>| bias.and_then(|bias| bias.bias_pct);
    let slope = judged.survey_error_by_winter_pct_per_c();
    [
        judged.nash_sutcliffe,
        judged.kling_gupta.map(|kling_gupta| kling_gupta.efficiency),
        judged.skill_above_mean,
        bias(judged.peak),
        judged.peak_standard_error_pct,
        bias(judged.survey),
        judged.survey_standard_error_pct,
        judged.melt_out.map(|error| error.mean_days),
        judged.melt_out.map(|error| error.mean_size_days),
        slope.map(|[slope, _]| slope),
        slope.map(|[_, error]| error),
        Some(judged.years as f64),
    ]
}
