//! The driest and the wettest year of a realization beside the mean of its years: they can move while the mean stands still.

use super::quantile::{quantile, sorted};
use super::resample::{Estimate, Ranked, Resamples};
use ndarray::ArrayView2;
use serde::Serialize;

/// What the years of a realization come to, by the measure itself: the one with least of it, all of them, the one with most.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct DriestAndWettest {
    /// The year with least.
    pub driest: OverRealizations,
    /// The mean of all years.
    pub mean: OverRealizations,
    /// The year with most.
    pub wettest: OverRealizations,
}

/// One number a realization, over all of them.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct OverRealizations {
    /// Median, with its Monte Carlo error.
    pub median: Estimate,
    /// 5 % quantile.
    pub q05: f64,
    /// 95 % quantile.
    pub q95: f64,
}

impl DriestAndWettest {
    /// Of years `[realization][year]`; years with none are left out, and nothing is told where no realization has a year.
    pub(super) fn of(years: &ArrayView2<'_, f64>, resamples: &Resamples) -> Option<Self> {
        let numbers = years.rows().into_iter().map(|years| {
            let mut numbers: Vec<f64> = years.iter().copied().filter(|value| value.is_finite()).collect();
            let mean = numbers.iter().sum::<f64>() / numbers.len() as f64;
            numbers.sort_unstable_by(f64::total_cmp);
            Some([*numbers.first()?, mean, *numbers.last()?])
        });
        let numbers: Vec<Option<[f64; 3]>> = numbers.collect();
        let over = |at: usize| {
            let numbered = numbers.iter().zip(0..);
            OverRealizations::of(
                numbered.filter_map(|(three, realization)| Some((three.as_ref()?[at], realization))),
                resamples,
            )
        };
        Some(Self { driest: over(0)?, mean: over(1)?, wettest: over(2)? })
    }
}

impl OverRealizations {
    fn of(numbers: impl Iterator<Item = (f64, usize)> + Clone, resamples: &Resamples) -> Option<Self> {
        let in_order = sorted(numbers.clone().map(|(number, _)| number));
        if in_order.is_empty() {
            return None;
        }
        let ranked = Ranked::new(numbers);
        let medians = resamples.each(|weights| ranked.quantiles(weights, [0.5]).map(|[median]| median));
        let [q05, q50, q95] = [0.05, 0.5, 0.95].map(|share| quantile(&in_order, share));
        Some(Self { median: Estimate::new(q50, medians), q05, q95 })
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::season::NONE;
    use ndarray::array;

    /// By hand: of three realizations the driest years are 1, 3 and 2, the means 2, 4 and 6, the wettest 3, 5 and 10; a year
    /// with none is left out, and so is a realization that has nothing else. Medians of three by Hyndman & Fan's type 8 are
    /// the middle ones; its 5 and 95 % quantiles the ends.
    #[test]
    fn years_of_a_realization_are_ranked_by_themselves() {
        let years = array![[3.0, 1.0, 2.0], [NONE, 5.0, 3.0], [2.0, 10.0, 6.0], [NONE, NONE, NONE]];
        let found = DriestAndWettest::of(&years.view(), &Resamples::new(1, 4)).unwrap();
        let three = |over: OverRealizations| [over.q05, over.median.value, over.q95];
        assert_eq!(three(found.driest), [1.0, 2.0, 3.0]);
        assert_eq!(three(found.mean), [2.0, 4.0, 6.0]);
        assert_eq!(three(found.wettest), [3.0, 5.0, 10.0]);
        assert!(DriestAndWettest::of(&array![[NONE], [NONE]].view(), &Resamples::new(1, 2)).is_none());
    }
}
