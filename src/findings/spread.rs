//! Signal to spread: is the shift larger than what precipitation's chance does on its own?

use super::quantile::{quantile, sorted};
use super::resample::{Estimate, Ranked, Resamples, standard_deviation};
use serde::Serialize;

/// A smaller spread is rounding, mm or days.
const LEAST_SPREAD: f64 = 1e-9;

/// The spread of a measure at the reference.
///
/// Over realizations it is the precipitation spread 'with its own temperatures': resampled years bring their
/// temperatures with them. Over single years it is the weather spread.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Spread {
    /// 5 % quantile.
    pub q05: f64,
    /// Median.
    pub q50: f64,
    /// 95 % quantile.
    pub q95: f64,
    /// Standard deviation.
    pub standard_deviation: f64,
}

impl Spread {
    /// The spread of the values; nothing where a quantile has no number.
    pub fn of(values: &[f64]) -> Option<Self> {
        let in_order = sorted(values.iter().copied());
        let [q05, q50, q95] = [0.05, 0.5, 0.95].map(|p| quantile(&in_order, p));
        let numbers: Vec<f64> = in_order.into_iter().filter(|value| value.is_finite()).collect();
        let standard_deviation = standard_deviation(&numbers)?;
        (q05.is_finite() && q95.is_finite()).then_some(Self { q05, q50, q95, standard_deviation })
    }

    /// The 5 %, 50 % and 95 % quantiles of every resample.
    pub(super) fn resampled(ranked: &Ranked, resamples: &Resamples) -> Vec<Option<[f64; 3]>> {
        resamples.each(|weights| ranked.quantiles(weights, [0.05, 0.5, 0.95]))
    }

    /// The size of a shift over the half of the spread that it points to; nothing where there is no spread.
    pub(super) fn times(&self, shift: f64) -> Option<f64> {
        over_half(shift, self.half_towards(shift))
    }

    /// A mean shift, without its sign, over one standard deviation; nothing where there is none.
    pub(super) fn deviations(&self, mean_shift: f64) -> Option<f64> {
        (self.standard_deviation > LEAST_SPREAD).then(|| mean_shift.abs() / self.standard_deviation)
    }

    /// From the median to the end of the spread that a shift points to: `q50 - q5` for a fall, `q95 - q50` for a rise.
    pub fn half_towards(&self, shift: f64) -> f64 {
        half_towards([self.q05, self.q50, self.q95], shift)
    }
}

/// The size of the shift over the half of the reference's 5-95 % spread that it points to, with its Monte Carlo error.
/// Above 1 the warmed median leaves the reference's 5-95 % range: warming outweighs.
///
/// `shifts` and `spreads` are the same of every resample, and the ratio of every resample is returned beside. Nothing
/// where the reference does not spread.
pub fn signal_to_spread(
    shift: f64,
    spread: &Spread,
    shifts: &[Option<f64>],
    spreads: &[Option<[f64; 3]>],
) -> Option<(Estimate, Vec<Option<f64>>)> {
    let value = spread.times(shift)?;
    let resampled: Vec<Option<f64>> = shifts
        .iter()
        .zip(spreads)
        .map(|(shift, quantiles)| {
            let (shift, quantiles) = ((*shift)?, (*quantiles)?);
            over_half(shift, half_towards(quantiles, shift))
        })
        .collect();
    Some((Estimate::new(value, resampled.iter().copied()), resampled))
}

/// The size of a shift over half a spread; none where that is none.
pub(super) fn over_half(shift: f64, half: f64) -> Option<f64> {
    (half > LEAST_SPREAD && half.is_finite()).then(|| shift.abs() / half)
}

fn half_towards([q05, q50, q95]: [f64; 3], shift: f64) -> f64 {
    if shift < 0.0 { q50 - q05 } else { q95 - q50 }
}

/// Signal to noise as studies of emergence state it: the mean change over one standard deviation.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct SignalToNoise {
    /// Over the reference's standard deviation between realizations.
    pub against_reference: Option<f64>,
    /// Over the standard deviation of the paired changes: why common realizations make small warming visible.
    pub paired: Option<f64>,
}

/// The mean paired change, without its sign, over one standard deviation; nothing where there is no deviation or fewer
/// than two pairs.
pub fn signal_to_noise(reference: &[f64], warmed: &[f64]) -> SignalToNoise {
    let pairs: Vec<(f64, f64)> = reference
        .iter()
        .copied()
        .zip(warmed.iter().copied())
        .filter(|(before, after)| before.is_finite() && after.is_finite())
        .collect();
    let changes: Vec<f64> = pairs.iter().map(|(before, after)| after - before).collect();
    let before: Vec<f64> = pairs.iter().map(|(before, _)| *before).collect();
    let mean = (changes.iter().sum::<f64>() / changes.len() as f64).abs();
    let over = |values: &[f64]| {
        standard_deviation(values).filter(|deviation| *deviation > LEAST_SPREAD).map(|d| mean / d)
    };
    SignalToNoise { against_reference: over(&before), paired: over(&changes) }
}
