//! Low years in a row: they drain what storage carries from one year to the next.

use super::ranged::{Ranged, bound_of_certain};
use super::resample::{Ranked, Resamples};
use ndarray::ArrayView2;
use serde::Serialize;

/// A low year of a run lies at or below this quantile of the reference's single years.
pub const RUNS_AT_OR_BELOW_QUANTILE: f64 = 0.3;
/// Lengths of runs that are asked for, years.
pub(super) const RUN_YEARS: [usize; 3] = [2, 3, 5];
/// A run comes first where this share of the realizations holds one.
const FIRST_AT_SHARE: f64 = 0.5;

/// Chances of low years in a row.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct LowRuns {
    /// Quantile of the reference's single years at or below which a year is low.
    pub at_or_below_quantile: f64,
    /// The SWE there, mm; in every resample it is the resample's own.
    pub at_or_below_mm: Ranged,
    /// One entry a length that a realization can hold.
    pub lengths: Vec<RunLength>,
}

/// Runs of at least so many low years.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct RunLength {
    /// Low years in a row, at least.
    pub years: usize,
    /// One entry a level.
    pub levels: Vec<RunChance>,
    /// The lowest level at which half of the realizations hold such a run, degC; none where they do at no level.
    pub first_at_level_c: Option<f64>,
}

/// Chance that a realization holds such a run.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct RunChance {
    /// The level, degC.
    pub level_c: f64,
    /// Realizations that hold one.
    pub realizations: usize,
    /// Their share.
    pub chance: Ranged,
    /// Where none does, the one-sided 95 % bound on the chance from above, `1 - 0.05^(1/n)` of n realizations; where all are, from
    /// below, `0.05^(1/n)`.
    pub bound: Option<f64>,
}

impl LowRuns {
    /// The runs of single years `[realization][year]`, a table a level; nothing where the reference's quantile is bare ground.
    ///
    /// A realization holds k years in a row at or below a limit where the limit reaches the least, over all k years in a row,
    /// of the largest of them: that number is taken once, and every resample holds it against its own limit.
    pub(super) fn of(
        years: &[ArrayView2<'_, f64>],
        levels_c: &[f64],
        reference: &Ranked,
        resamples: &Resamples,
    ) -> Option<Self> {
        let (realizations, length) = years.first()?.dim();
        let limit =
            |weights: &[u32]| reference.quantiles(weights, [RUNS_AT_OR_BELOW_QUANTILE]).map(|[mm]| mm);
        let at_or_below = limit(&vec![1; realizations]).filter(|mm| mm.is_finite() && *mm > 0.0)?;
        let limits = resamples.each(limit);
        let of_length = |run: usize| {
            let of_level = |(level_c, years): (&f64, &ArrayView2<'_, f64>)| {
                let least: Vec<f64> =
                    years.rows().into_iter().map(|row| least_limit(&row.to_vec(), run)).collect();
                let held = least.iter().filter(|least| **least <= at_or_below).count();
                let chance = held as f64 / realizations as f64;
                let share = |weights: &[u32], limit: f64| {
                    let held = least.iter().zip(weights).filter(|(least, _)| **least <= limit);
                    held.map(|(_, weight)| *weight as usize).sum::<usize>() as f64 / realizations as f64
                };
                let mut limits = limits.iter();
                let mut resampled = Vec::with_capacity(limits.len());
                for weights in resamples.each(<[u32]>::to_vec) {
                    let limit = limits.next().copied().flatten();
                    resampled.push(limit.map(|limit| share(&weights, limit)));
                }
                RunChance {
                    level_c: *level_c,
                    realizations: held,
                    chance: Ranged::new(chance, resampled),
                    bound: bound_of_certain(chance, realizations),
                }
            };
            let levels: Vec<RunChance> = levels_c.iter().zip(years).map(of_level).collect();
            let first = levels.iter().find(|level| level.chance.value >= FIRST_AT_SHARE);
            RunLength { years: run, first_at_level_c: first.map(|level| level.level_c), levels }
        };
        Some(Self {
            at_or_below_quantile: RUNS_AT_OR_BELOW_QUANTILE,
            at_or_below_mm: Ranged::new(at_or_below, limits.iter().copied()),
            lengths: RUN_YEARS.into_iter().filter(|run| *run <= length).map(of_length).collect(),
        })
    }
}

/// The least limit at or below which so many years in a row lie.
pub(super) fn least_limit(years: &[f64], run: usize) -> f64 {
    let largest = |window: &[f64]| window.iter().copied().fold(f64::NEG_INFINITY, f64::max);
    years.windows(run).map(largest).fold(f64::INFINITY, f64::min)
}

#[cfg(test)]
mod tests {
    use super::*;
    use ndarray::array;

    /// By hand: 20 years of 1 to 20 mm, type 8: the 30 % quantile stands at rank 6.4333. Two years in a row at or below
    /// stand in the first realization (5, 6) and not in the second; 14 mm less put all of both below.
    #[test]
    fn runs_by_hand() {
        let reference = array![
            [5.0, 6.0, 20.0, 1.0, 19.0, 2.0, 18.0, 3.0, 17.0, 16.0],
            [4.0, 15.0, 14.0, 13.0, 12.0, 11.0, 10.0, 9.0, 8.0, 7.0]
        ];
        let warmer = &reference - 14.0;
        let years = [reference.view(), warmer.view()];
        let ranked = Ranked::new(reference.indexed_iter().map(|((realization, _), mm)| (*mm, realization)));
        let found = LowRuns::of(&years, &[0.0, 2.0], &ranked, &Resamples::new(1, 2)).unwrap();
        assert!((found.at_or_below_mm.value - 6.4333).abs() < 1e-4);
        let held: Vec<Vec<usize>> = found
            .lengths
            .iter()
            .map(|run| run.levels.iter().map(|level| level.realizations).collect())
            .collect();
        assert_eq!(held, [[1, 2], [0, 2], [0, 2]]);
        let first: Vec<Option<f64>> = found.lengths.iter().map(|run| run.first_at_level_c).collect();
        assert_eq!(first, [Some(0.0), Some(2.0), Some(2.0)]);
        assert!((found.lengths[1].levels[0].bound.unwrap() - (1.0 - 0.05_f64.sqrt())).abs() < 1e-12);
    }

    /// Years drawn independently are low with the chance 0.3, two given years in a row with 0.09. Of 4000 pairs the standard
    /// error is 0.0045, so 0.014 is three of them.
    #[test]
    fn independent_years_follow_the_product_rule() {
        use rand::RngExt;
        let mut random = crate::perturb::stream(11, 0);
        let years = ndarray::Array2::from_shape_simple_fn((4000, 2), || 1.0 + random.random::<f64>());
        let ranked = Ranked::new(years.indexed_iter().map(|((realization, _), mm)| (*mm, realization)));
        let few = Resamples::new(1, 4000).few();
        let found = LowRuns::of(&[years.view()], &[0.0], &ranked, &few).unwrap();
        assert!((found.lengths[0].levels[0].chance.value - 0.09).abs() < 0.014, "{found:?}");
        assert_eq!(found.lengths.len(), 1, "no realization of two years holds three");
    }
}
