//! Quantiles, variance and signal to noise of small tables.

use super::case::Case;
use thawline::findings::{TwoWay, quantile, signal_to_noise, sorted};

/// Quantiles of a sample, handed over in falling order.
pub fn quantiles(case: &Case) {
    let sample: Vec<f64> = case.input("sample");
    let in_order = sorted(sample.into_iter().rev());
    let levels: Vec<f64> = case.input("levels");
    let found: Vec<f64> = levels.into_iter().map(|level| quantile(&in_order, level)).collect();
    case.check("quantiles", &found);
}

/// Two-way analysis of variance of a table, one row a level.
pub fn two_way(case: &Case) {
    let table: Vec<Vec<f64>> = case.input("table");
    let rows: Vec<&[f64]> = table.iter().map(Vec::as_slice).collect();
    let parts = TwoWay::of(&rows);
    let parts = parts.unwrap();
    let shares = parts.shares().unwrap();
    case.check("sums_of_squares", &[parts.level, parts.realization, parts.residual]);
    case.check("f_ratio", &[parts.f_ratio]);
    case.check("shares", &[shares.level, shares.realization, shares.residual]);
}

/// Signal to noise between the first and the last row of a table.
pub fn noise(case: &Case) {
    let table: Vec<Vec<f64>> = case.input("table");
    let found = signal_to_noise(&table[0], &table[table.len() - 1]);
    case.check("against_reference", &[found.against_reference.unwrap()]);
    case.check("paired", &[found.paired.unwrap()]);
}
