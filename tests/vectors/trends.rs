//! Trend, slope and step of yearly series; the interval of a count.

use super::case::Case;
use thawline::baseline::{YearlyTests, wilson};

/// The three tests of a yearly series.
pub fn trend(case: &Case) {
    let years: Vec<i32> = case.input("years");
    let values: Vec<f64> = case.input("values");
    assert_eq!(years.len(), values.len(), "{}", case.id);
    let n = years.len();
    let yearly: Vec<(i32, f64)> = years.into_iter().zip(values).collect();
    let found = YearlyTests::of(&yearly).expect("enough years, and not all the same");
    assert_eq!(found.n, n, "{}", case.id);
    let trend = &found.mann_kendall;
    case.check("score", &[trend.score]);
    case.check("tau_b", &[trend.tau_b]);
    case.check("variance", &[trend.variance]);
    case.check("z", &[trend.plain.z]);
    case.check("p", &[trend.plain.p]);
    case.check("lag1", &[trend.lag1.expect("years that follow on each other")]);
    let corrected = trend.corrected.expect("a positive variance");
    case.check("corrected_variance", &[trend.variance * trend.variance_ratio]);
    case.check("corrected_z", &[corrected.z]);
    case.check("corrected_p", &[corrected.p]);
    case.check("slope_per_year", &[found.theil_sen.slope_per_year]);
    case.check("interval_per_year", &found.theil_sen.interval_95_per_year);
    case.check("value_in_year_0", &[found.theil_sen.at(0.0)]);
    let step = &found.pettitt;
    case.check("k", &[step.k]);
    case.check("last_year_before", &[f64::from(step.last_year_before)]);
    case.check("means", &[step.mean_before, step.mean_after]);
    case.check("pettitt_p", &[step.p]);
}

/// Wilson's interval of several counts.
pub fn proportion(case: &Case) {
    let counts: Vec<usize> = case.input("counts");
    let of: Vec<usize> = case.input("of");
    let intervals =
        counts.into_iter().zip(of).flat_map(|(count, n)| wilson(count, n).expect("at least one case"));
    case.check("intervals", &intervals.collect::<Vec<_>>());
}
