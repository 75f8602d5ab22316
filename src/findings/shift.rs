//! The shift: what a level changes, realization by realization.

use super::quantile::{quantile, sorted};
use super::resample::{Estimate, Ranked, Resamples};
use crate::season::Kind;
use serde::Serialize;

/// A 5-95 % range of fewer realizations is their extremes.
pub const LEAST_REALIZATIONS_FOR_A_RANGE: usize = 20;

/// The paired change from the reference to a level over realizations.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Shift {
    /// Median of the paired changes, in the unit of the measure, with its Monte Carlo error.
    pub median: Estimate,
    /// Mean of the paired changes.
    pub mean: f64,
    /// Their 5 % quantile.
    pub q05: f64,
    /// Their 95 % quantile.
    pub q95: f64,
    /// Pairs in which both realizations have a value.
    pub pairs: usize,
    /// Pairs in which one has none: counted, not used.
    pub pairs_without_value: usize,
}

impl Shift {
    /// Whether there are pairs enough for the 5-95 % range to be one.
    pub fn has_range(&self) -> bool {
        self.pairs >= LEAST_REALIZATIONS_FOR_A_RANGE
    }

    /// The shift between period values of the same realizations, and its median in every resample; nothing where no
    /// pair has both values.
    pub fn of(reference: &[f64], warmed: &[f64], resamples: &Resamples) -> Option<(Self, Vec<Option<f64>>)> {
        let changes: Vec<(f64, usize)> = reference
            .iter()
            .zip(warmed)
            .enumerate()
            .filter(|(_, (before, after))| before.is_finite() && after.is_finite())
            .map(|(realization, (before, after))| (after - before, realization))
            .collect();
        if changes.is_empty() {
            return None;
        }
        let in_order = sorted(changes.iter().map(|(change, _)| *change));
        let pairs = changes.len();
        let ranked = Ranked::new(changes);
        let resampled = resamples.each(|weights| ranked.quantiles(weights, [0.5]).map(|[median]| median));
        let shift = Self {
            median: Estimate::new(quantile(&in_order, 0.5), resampled.iter().copied()),
            mean: in_order.iter().sum::<f64>() / pairs as f64,
            q05: quantile(&in_order, 0.05),
            q95: quantile(&in_order, 0.95),
            pairs,
            pairs_without_value: reference.len() - pairs,
        };
        Some((shift, resampled))
    }
}

/// `100 * median change / median reference`; nothing where the reference is below the least of its kind, or where no
/// percentage is taken of the kind.
pub fn percent_change(kind: Kind, median_change: f64, median_reference: f64) -> Option<f64> {
    let least = kind.least_reference()?;
    (median_reference >= least).then(|| 100.0 * median_change / median_reference)
}
