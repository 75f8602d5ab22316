//! Scores of modelled against observed values.

use super::case::Case;
use thawline::fit::{Pair, kling_gupta, nash_sutcliffe};

/// Both efficiencies of two series.
pub fn scores(case: &Case) {
    let (observed, modelled): (Vec<f64>, Vec<f64>) = (case.input("observed"), case.input("modelled"));
    let pairs = observed.into_iter().zip(modelled);
    let pairs: Vec<Pair> = pairs.map(|(observed, modelled)| Pair { observed, modelled }).collect();
    case.check("nash_sutcliffe", &[nash_sutcliffe(&pairs).unwrap()]);
    let found = kling_gupta(&pairs).unwrap();
    case.check("kling_gupta", &[found.efficiency]);
    case.check("parts", &[found.correlation, found.variability_ratio, found.mean_ratio]);
}
