//! Chances against an independent reference: would a wetter future hide the warming?
//!
//! Paired shares are near 100 % by construction, so they cannot say whether chance could offset the warming. These
//! compare different realizations.

use super::odds::Odds;
use super::quantile::{quantile, sorted};
use super::resample::{Estimate, Ranked, Resamples};
use serde::Serialize;

/// A chance with its Monte Carlo error.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Chance {
    /// 0 to 1, with one standard deviation over resampled realizations.
    #[serde(flatten)]
    pub estimate: Estimate,
    /// Where no realization counts for it (or all do), the one-sided 95 % bound `1 - 0.05^(1/n)` on the chance (or on
    /// its opposite); the standard deviation is 0 there and means nothing.
    pub bound: Option<f64>,
}

impl Chance {
    pub(super) fn new(estimate: Estimate, realizations: usize) -> Self {
        let is_certain = estimate.value <= 0.0 || estimate.value >= 1.0;
        let bound = is_certain.then(|| 1.0 - libm::pow(0.05, 1.0 / realizations as f64));
        Self { estimate, bound }
    }
}

impl Chance {
    /// The chance of the opposite.
    pub fn opposite(self) -> Self {
        let value = 1.0 - self.estimate.value;
        Self { estimate: Estimate { value, ..self.estimate }, ..self }
    }
}

/// The chances of a level.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Chances {
    /// That the period value of an independent warmed realization lies below a reference one; of a date: comes earlier.
    pub period_below_reference: Option<Chance>,
    /// That a single warmed year lies below a single reference year of another realization.
    pub year_below_reference: Option<Chance>,
    /// Share of the warmed realizations that reach the reference's median: could a wetter future hide it?
    pub reaches_reference_median: Option<Chance>,
}

impl Chances {
    /// Period values are one a realization; years are `(value, realization)`.
    pub(super) fn of(
        reference: &[f64],
        warmed: &[f64],
        reference_years: &Ranked,
        warmed_years: &Ranked,
        resamples: &Resamples,
    ) -> Self {
        let realizations = reference.len();
        let below = |odds: &Odds| Some(Chance::new(odds.chance()?, realizations));
        let ranked = |values: &[f64]| Ranked::new(values.iter().copied().zip(0..));
        Self {
            period_below_reference: below(&Odds::new(&ranked(reference), &ranked(warmed), realizations)),
            year_below_reference: below(&Odds::new(reference_years, warmed_years, realizations)),
            reaches_reference_median: reaches_median(reference, warmed, resamples),
        }
    }
}

/// The chance that an independent warmed value lies below a reference one, without its error.
pub(super) fn below_reference(reference: &[f64], warmed: &[f64]) -> Option<f64> {
    let ranked = |values: &[f64]| Ranked::new(values.iter().copied().zip(0..));
    let odds = Odds::new(&ranked(reference), &ranked(warmed), reference.len());
    odds.chance().map(|chance| chance.value)
}

/// The share of warmed values that reach the reference's median, without its error.
pub(super) fn reaches_median_share(reference: &[f64], warmed: &[f64]) -> Option<f64> {
    let median = quantile(&sorted(reference.iter().copied()), 0.5);
    let reached = warmed.iter().filter(|value| **value >= median).count();
    median.is_finite().then(|| reached as f64 / warmed.len() as f64)
}

fn reaches_median(reference: &[f64], warmed: &[f64], resamples: &Resamples) -> Option<Chance> {
    let median = quantile(&sorted(reference.iter().copied()), 0.5);
    if !median.is_finite() {
        return None;
    }
    let share = |weights: &[u32], median: f64| {
        let reached = warmed.iter().zip(weights).filter(|(value, _)| **value >= median);
        f64::from(reached.map(|(_, weight)| *weight).sum::<u32>()) / warmed.len() as f64
    };
    let ranked = Ranked::new(reference.iter().copied().zip(0..));
    let value = share(&vec![1; warmed.len()], median);
    let resampled = resamples.each(|weights| {
        let [median] = ranked.quantiles(weights, [0.5])?;
        Some(share(weights, median))
    });
    Some(Chance::new(Estimate::new(value, resampled), reference.len()))
}
