//! How a measure is distributed over realizations, or over single years.

use super::quantile::{quantile, sorted};
use crate::season::{Kind, NONE, NOT_GONE, Outcome};
use serde::Serialize;

/// Dots that stand for a distribution in a figure, each for an equal share of it.
pub const DOTS: usize = 20;

/// A distribution, as quantiles of type 8.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Distribution {
    /// How many values.
    pub count: usize,
    /// Of these, with nothing to measure.
    pub none: usize,
    /// Of these, snow that never went.
    pub not_gone: usize,
    /// 5 % quantile.
    pub q05: Outcome,
    /// 25 % quantile.
    pub q25: Outcome,
    /// Median.
    pub q50: Outcome,
    /// 75 % quantile.
    pub q75: Outcome,
    /// 95 % quantile.
    pub q95: Outcome,
    /// Quantiles in the middle of twenty equal shares: 2.5 %, 7.5 %, up to 97.5 %; where they are drawn, else empty.
    #[serde(skip_serializing_if = "Vec::is_empty")]
    pub dots: Vec<Outcome>,
}

impl Distribution {
    /// The distribution of the values.
    pub fn of(_: Kind, values: impl IntoIterator<Item = f64>) -> Self {
        Self::of_sorted(&sorted(values))
    }

    /// The same with its dots.
    pub fn with_dots(_: Kind, values: impl IntoIterator<Item = f64>) -> Self {
        let values = sorted(values);
        let dot = |dot: usize| Outcome::from(quantile(&values, (dot as f64 + 0.5) / DOTS as f64));
        Self { dots: (0..DOTS).map(dot).collect(), ..Self::of_sorted(&values) }
    }

    fn of_sorted(values: &[f64]) -> Self {
        let q = |p| Outcome::from(quantile(values, p));
        let count = |what: f64| values.iter().filter(|value| **value == what).count();
        Self {
            count: values.len(),
            none: count(NONE),
            not_gone: count(NOT_GONE),
            q05: q(0.05),
            q25: q(0.25),
            q50: q(0.50),
            q75: q(0.75),
            q95: q(0.95),
            dots: Vec::new(),
        }
    }
}
