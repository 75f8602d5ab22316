//! Partition of variance between level, realization and set of parameters: the two-way table with one way more.

use super::partition::AVERAGED_YEARS;
use ndarray::{Array3, ArrayView3, Axis};
use serde::Serialize;

/// Three-way analysis of variance without replication: levels by shared realizations by sets of parameters.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct ThreeWay {
    /// Sum of squares of the levels.
    pub level: f64,
    /// Sum of squares of the realizations.
    pub realization: f64,
    /// Sum of squares of the sets.
    pub set: f64,
    /// What is left: all that two or three of them do only together.
    pub remainder: f64,
}

/// Shares of the total sum of squares; they add up to 1.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct ThreeWayShares {
    /// Of the warming level.
    pub level: f64,
    /// Of the realization.
    pub realization: f64,
    /// Of the set of parameters.
    pub set: f64,
    /// Of what they do only together.
    pub remainder: f64,
}

/// Shares of means over so many years, one after another in each realization, every one of them a chance of its own.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct AveragedShares {
    /// Years that are averaged.
    pub years: usize,
    /// The shares; that of the realization is of all that chance does to such means.
    #[serde(flatten)]
    pub shares: ThreeWayShares,
}

/// The shares over two levels by averaging period, of single years `[level][realization][year]`, a set each: of every period
/// that a realization holds, years at its end that make no whole one left out. Empty where nothing varies, or sets are fewer than two.
pub(super) fn averaged_shares(sets: &[Array3<f64>], levels: [usize; 2]) -> Vec<AveragedShares> {
    let Some((_, realizations, length)) = sets.first().map(Array3::dim) else {
        return Vec::new();
    };
    let of_years = |years: usize| {
        let periods = length / years;
        let mean = |set: usize, level: usize, at: usize| {
            let (realization, first) = (at / periods, at % periods * years);
            let all = (first..first + years).map(|year| sets[set][[level, realization, year]]);
            all.sum::<f64>() / years as f64
        };
        let table = Array3::from_shape_fn((2, realizations * periods, sets.len()), |(level, at, set)| {
            mean(set, levels[level], at)
        });
        Some(AveragedShares { years, shares: ThreeWay::of(&table.view())?.shares()? })
    };
    AVERAGED_YEARS.into_iter().filter(|years| *years <= length).filter_map(of_years).collect()
}

impl ThreeWay {
    /// Takes the sums of squares of a table `[level][realization][set]`. Nothing for fewer than two of any, or values that are
    /// no numbers.
    pub fn of(table: &ArrayView3<'_, f64>) -> Option<Self> {
        let (levels, realizations, sets) = table.dim();
        if levels.min(realizations).min(sets) < 2 || table.iter().any(|value| !value.is_finite()) {
            return None;
        }
        let all = table.len() as f64;
        let mean = table.iter().sum::<f64>() / all;
        let means = |axis: usize| -> Vec<f64> {
            let part = |part: ndarray::ArrayView2<'_, f64>| part.iter().sum::<f64>() / part.len() as f64;
            table.axis_iter(Axis(axis)).map(part).collect()
        };
        let of = [means(0), means(1), means(2)];
        let squares = |means: &[f64]| {
            let times = all / means.len() as f64;
            times * means.iter().map(|part| (part - mean) * (part - mean)).sum::<f64>()
        };
        let mut remainder = 0.0;
        for ((level, realization, set), value) in table.indexed_iter() {
            let left = value - of[0][level] - of[1][realization] - of[2][set] + 2.0 * mean;
            remainder += left * left;
        }
        Some(Self { level: squares(&of[0]), realization: squares(&of[1]), set: squares(&of[2]), remainder })
    }

    /// Shares of the total; nothing where nothing varies.
    pub fn shares(&self) -> Option<ThreeWayShares> {
        let total = self.level + self.realization + self.set + self.remainder;
        (total > 0.0).then(|| ThreeWayShares {
            level: self.level / total,
            realization: self.realization / total,
            set: self.set / total,
            remainder: self.remainder / total,
        })
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::findings::TwoWay;
    use ndarray::array;

    /// By hand: levels 0 and 10, realizations -1, 0 and 1, sets 0 and 4 added up, and 1 more and less where a level and a set
    /// meet. Level 12*25, realization 4*2, set 12*4, remainder 12*1.
    #[test]
    fn what_adds_up_is_told_apart() {
        let (levels, realizations, sets) = ([0.0, 10.0], [-1.0, 0.0, 1.0], [0.0, 4.0]);
        let table = Array3::from_shape_fn((2, 3, 2), |(level, realization, set)| {
            let together = if level == set { 1.0 } else { -1.0 };
            levels[level] + realizations[realization] + sets[set] + together
        });
        let found = ThreeWay::of(&table.view()).expect("a whole table");
        for (sum, expected) in
            [(found.level, 300.0), (found.realization, 8.0), (found.set, 48.0), (found.remainder, 12.0)]
        {
            assert!((sum - expected).abs() < 1e-9, "{sum} and {expected}");
        }
        let shares = found.shares().expect("it varies");
        assert!((shares.level + shares.realization + shares.set + shares.remainder - 1.0).abs() < 1e-12);
    }

    /// Identity: sets that are all alike leave the two-way table, as often as there are sets. One set is none to tell apart.
    #[test]
    fn sets_that_are_alike_leave_the_two_way_table() {
        let rows = [[400.0, 300.0, 520.0], [350.0, 240.0, 470.0]];
        let table = Array3::from_shape_fn((2, 3, 4), |(level, realization, _)| rows[level][realization]);
        let (three, two) = (
            ThreeWay::of(&table.view()).expect("three ways"),
            TwoWay::of(&[&rows[0], &rows[1]]).expect("two"),
        );
        assert!((three.level - 4.0 * two.level).abs() < 1e-6 && three.set.abs() < 1e-6);
        assert!((three.remainder - 4.0 * two.residual).abs() < 1e-6);
        assert_eq!(ThreeWay::of(&array![[[1.0], [2.0]], [[3.0], [5.0]]].view()), None);
    }

    /// By hand: two realizations of five years at -2, -1, 0, 1 and 2 about 100; the level takes 1, the other set adds 3. Single years vary by
    /// a variance of 2, the level by 0.25, the set by 2.25; means over five years do not vary by chance.
    #[test]
    fn longer_means_leave_level_and_set() {
        let set = |more: f64| {
            Array3::from_shape_fn((2, 2, 5), |(level, _, year)| 98.0 + year as f64 - level as f64 + more)
        };
        let found = averaged_shares(&[set(0.0), set(3.0)], [0, 1]);
        assert_eq!(found.iter().map(|of| of.years).collect::<Vec<_>>(), [1, 5]);
        for (of, [level, chance, by_set]) in found.iter().zip([[0.25, 2.0, 2.25], [0.25, 0.0, 2.25]]) {
            let total = level + chance + by_set;
            let shares = [of.shares.level, of.shares.realization, of.shares.set, of.shares.remainder];
            for (share, expected) in shares.iter().zip([level / total, chance / total, by_set / total, 0.0]) {
                assert!((share - expected).abs() < 1e-9, "{} years: {shares:?}", of.years);
            }
        }
        assert!(averaged_shares(&[set(0.0)], [0, 1]).is_empty(), "one set is none to tell apart");
    }
}
