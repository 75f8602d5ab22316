//! How a measure is distributed over realizations, or over single years.

use super::quantile::{quantile, sorted};
use crate::season::{Kind, Outcome};
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
    /// Of these, what was waited for and had not come by the year's end.
    pub not_reached: usize,
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
    /// The distribution of a measure's values.
    pub fn of(kind: Kind, values: impl IntoIterator<Item = f64>) -> Self {
        Self::of_sorted(kind, &sorted(values))
    }

    /// The same with its dots.
    pub fn with_dots(kind: Kind, values: impl IntoIterator<Item = f64>) -> Self {
        let values = sorted(values);
        let dot = |dot: usize| kind.outcome(quantile(&values, (dot as f64 + 0.5) / DOTS as f64));
        Self { dots: (0..DOTS).map(dot).collect(), ..Self::of_sorted(kind, &values) }
    }

    fn of_sorted(kind: Kind, values: &[f64]) -> Self {
        let q = |p| kind.outcome(quantile(values, p));
        let count = |what: Outcome| values.iter().filter(|value| kind.outcome(**value) == what).count();
        Self {
            count: values.len(),
            none: count(Outcome::None),
            not_gone: count(Outcome::NotGone),
            not_reached: count(Outcome::NotReached),
            q05: q(0.05),
            q25: q(0.25),
            q50: q(0.50),
            q75: q(0.75),
            q95: q(0.95),
            dots: Vec::new(),
        }
    }
}
