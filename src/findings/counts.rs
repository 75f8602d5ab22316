//! Years counted by kind, realization by realization, and what shares of them come to with their Monte Carlo error.

use super::chance::Chance;
use super::resample::{Estimate, Resamples};

/// How many years of each realization are of each of `K` kinds.
pub(super) struct Counts<const K: usize>(pub Vec<[u32; K]>);

impl<const K: usize> Counts<K> {
    /// Years of each kind over all realizations.
    pub fn all(&self) -> [u64; K] {
        let mut sums = [0; K];
        for of_one in &self.0 {
            sums.iter_mut().zip(of_one).for_each(|(sum, years)| *sum += u64::from(*years));
        }
        sums
    }

    /// The same of a resample.
    fn weighted(&self, weights: &[u32]) -> [u64; K] {
        let mut sums = [0; K];
        for (of_one, weight) in self.0.iter().zip(weights) {
            sums.iter_mut()
                .zip(of_one)
                .for_each(|(sum, years)| *sum += u64::from(*years) * u64::from(*weight));
        }
        sums
    }

    /// A number made of the counts, with its error over resampled realizations; nothing where it has no value.
    pub fn estimate(&self, of: impl Fn([u64; K]) -> Option<f64>, resamples: &Resamples) -> Option<Estimate> {
        let resampled = resamples.each(|weights| of(self.weighted(weights)));
        Some(Estimate::new(of(self.all())?, resampled))
    }

    /// The same of a chance. Where none is seen, or all, its bound is that of the realizations which have it at all: those with
    /// years of its condition.
    pub fn chance(&self, of: impl Fn([u64; K]) -> Option<f64>, resamples: &Resamples) -> Option<Chance> {
        let has_it = |one: &&[u32; K]| of(one.map(u64::from)).is_some();
        let realizations = self.0.iter().filter(has_it).count();
        Some(Chance::new(self.estimate(of, resamples)?, realizations))
    }
}

/// A part over a whole; nothing of nothing.
pub(super) fn share(part: u64, whole: u64) -> Option<f64> {
    (whole > 0).then(|| part as f64 / whole as f64)
}
