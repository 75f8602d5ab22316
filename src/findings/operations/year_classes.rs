//! The user's classes of years: how many fall into each, and where the limits would have to be drawn anew.
//!
//! With limits that stay, warming sorts years into other classes; limits that keep each class as frequent as it was mean other water
//! under the same name (Null & Viers 2013 compare the two).

use super::super::ranged::{Ranged, bound_of_certain};
use super::super::resample::{Ranked, Resamples};
use super::super::yardstick::Levels;
use crate::season::Measure;
use ndarray::{ArrayView1, ArrayView2, ArrayView3, Axis};
use serde::Serialize;

/// Classes of years by a volume.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct YearClasses {
    /// The volume.
    pub measure: Measure,
    /// Where one class ends and the next begins, ascending, hm3: a class holds what is below its upper limit and not below its lower.
    pub limits_hm3: Vec<f64>,
    /// One entry a level.
    pub levels: Vec<YearClassesLevel>,
}

/// The classes of one level's years.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct YearClassesLevel {
    /// The level, degC.
    pub level_c: f64,
    /// Share of years in each class, from the driest, by the stated limits.
    pub shares: Vec<Ranged>,
    /// Where no year falls into a class, or all do, the one-sided 95 % bound on the share.
    pub bounds: Vec<Option<f64>>,
    /// The limits that would keep each class as frequent as at the reference, hm3; none where the reference has no year below one, or
    /// all.
    pub kept_limits_hm3: Vec<Option<Ranged>>,
}

impl YearClasses {
    /// Sorts single years, `[level][realization][year]`; nothing without limits.
    pub(super) fn of(
        measure: &Measure,
        volumes: &ArrayView3<'_, f64>,
        limits_hm3: &[f64],
        levels: Levels<'_>,
        resamples: &Resamples,
    ) -> Option<Self> {
        if limits_hm3.is_empty() {
            return None;
        }
        let realizations = volumes.dim().1;
        let once = vec![1; realizations];
        let of_reference = Counts::of(&volumes.index_axis(Axis(0), levels.reference), limits_hm3);
        let of_level = |(level, level_c): (usize, &f64)| {
            let years = volumes.index_axis(Axis(0), level);
            let counts = Counts::of(&years, limits_hm3);
            let own = counts.shares(&once);
            let resampled = resamples.each(|weights| counts.shares(weights));
            let ranged = |class: usize| Ranged::new(own[class], resampled.iter().map(|all| Some(all[class])));
            let ranked = Ranked::new(years.indexed_iter().map(|((realization, _), hm3)| (*hm3, realization)));
            let kept = |limit: usize| {
                let of = |weights: &[u32]| {
                    let years = of_reference.weighted(weights);
                    let [below, all] = [&years[..=limit], &years].map(|of| of.iter().sum::<f64>());
                    let is_inside = below > 0.0 && below < all;
                    is_inside.then(|| ranked.quantiles(weights, [below / all]).map(|[hm3]| hm3)).flatten()
                };
                Some(Ranged::new(of(&once)?, resamples.each(of)))
            };
            YearClassesLevel {
                level_c: *level_c,
                shares: (0..own.len()).map(ranged).collect(),
                bounds: own.iter().map(|share| bound_of_certain(*share, realizations)).collect(),
                kept_limits_hm3: (0..limits_hm3.len()).map(kept).collect(),
            }
        };
        Some(Self {
            measure: measure.clone(),
            limits_hm3: limits_hm3.to_vec(),
            levels: levels.levels_c.iter().enumerate().map(of_level).collect(),
        })
    }
}

/// Years in each class, `[realization][class]`, of which the shares of every resample are made.
struct Counts(Vec<Vec<f64>>);

impl Counts {
    fn of(years: &ArrayView2<'_, f64>, limits_hm3: &[f64]) -> Self {
        let of_realization = |years: ArrayView1<'_, f64>| {
            let mut counts = vec![0.0; limits_hm3.len() + 1];
            for hm3 in years {
                counts[limits_hm3.partition_point(|limit| limit <= hm3)] += 1.0;
            }
            counts
        };
        Self(years.rows().into_iter().map(of_realization).collect())
    }

    /// Years in each class, in a resample: whole numbers, so that their sums are exact.
    fn weighted(&self, weights: &[u32]) -> Vec<f64> {
        let classes = self.0.first().map_or(0, Vec::len);
        let mut sums = vec![0.0; classes];
        for (counts, weight) in self.0.iter().zip(weights) {
            sums.iter_mut().zip(counts).for_each(|(sum, count)| *sum += f64::from(*weight) * count);
        }
        sums
    }

    /// Share of years in each class, in a resample.
    fn shares(&self, weights: &[u32]) -> Vec<f64> {
        let sums = self.weighted(weights);
        let all: f64 = sums.iter().sum();
        sums.iter().map(|sum| sum / all).collect()
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::season::Kind;
    use ndarray::Array3;

    /// By hand: years of 1 to 100 hm3, ten realizations of ten. Limits of 21 and 81 leave 20, 60 and 20 of 100 in the three classes; of
    /// half the volumes (0.5 to 50) 41 are below 21, none from 81 on. The limits that keep the shares are half as high: the 20 %
    /// and 80 % quantiles of type 8, 20.4/2 and 80.6/2.
    #[test]
    fn years_sort_by_fixed_limits_and_limits_move_with_them() {
        let volumes = Array3::from_shape_fn((2, 10, 10), |(level, realization, year)| {
            (realization * 10 + year + 1) as f64 / (level + 1) as f64
        });
        let measure = Measure::new(Kind::VolumeHm3, "v_hm3", "v");
        let levels = Levels { levels_c: &[0.0, 1.0], reference: 0 };
        let found = YearClasses::of(&measure, &volumes.view(), &[21.0, 81.0], levels, &Resamples::new(1, 10))
            .unwrap();
        let shares = |level: usize| found.levels[level].shares.iter().map(|s| s.value).collect::<Vec<_>>();
        assert_eq!(shares(0), [0.2, 0.6, 0.2]);
        assert_eq!(shares(1), [0.41, 0.59, 0.0]);
        assert!(found.levels[1].bounds[2].is_some() && found.levels[1].bounds[0].is_none());
        let kept = |at: usize| found.levels[1].kept_limits_hm3[at].unwrap().value;
        // Limits above all years keep nothing: 0.21 + 0.6 + ... need not add up to 1 exactly.
        let above = YearClasses::of(
            &measure,
            &volumes.view(),
            &[21.0, 33.0, 81.0, 900.0],
            levels,
            &Resamples::new(1, 10),
        );
        assert_eq!(above.unwrap().levels[1].kept_limits_hm3[3], None);
        assert!((kept(0) - 10.2).abs() < 1e-9 && (kept(1) - 40.3).abs() < 1e-9, "{} {}", kept(0), kept(1));
    }
}
