//! Partition of variance by averaging period: how much of what differs is the warming, and how much is chance.
//!
//! Two levels at a time, since the share of the level depends on the levels chosen. In single years the weather rules; means
//! over more years have less of it, and from some averaging period on the warming may hold the largest share: held against
//! chance as a whole and against how differently chance takes the warming. A realization that holds one period cannot tell its
//! own chance from the period's, so that smaller parts would be another yardstick at long means than at short ones.

use super::ranged::Ranged;
use super::resample::Resamples;
use ndarray::ArrayView2;
use serde::Serialize;

/// Averaging periods of which the variance is parted, years.
pub const AVERAGED_YEARS: [usize; 4] = [1, 5, 10, 30];
/// Level, realization, level x realization, year, level x year.
const PARTS: usize = 5;
/// A smaller variance is rounding.
const LEAST_VARIANCE: f64 = 1e-12;

/// The variance of one level and the reference, parted.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Partition {
    /// The level, degC.
    pub level_c: f64,
    /// One entry an averaging period that the realizations hold, ascending.
    pub periods: Vec<PartitionedPeriod>,
    /// From which averaging period on the warming holds the largest share of three: its own, chance's and the interaction's.
    pub warming_holds_most: HoldsMost,
}

/// The shares of means over so many years; they add up to 1.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct PartitionedPeriod {
    /// Years that are averaged.
    pub years: usize,
    /// Periods in each realization, one after another.
    pub periods_per_realization: usize,
    /// Years at a realization's end that make no whole period.
    pub years_left_over: usize,
    /// Of the warming from the reference to the level.
    pub level: Ranged,
    /// Of the realization: what all its periods have in common, and, where it holds a single period, the chance of its years.
    pub realization: Ranged,
    /// Of how differently realizations take the warming.
    pub level_by_realization: Ranged,
    /// Of the period within its realization; none where it holds a single one, of which it cannot be told apart.
    pub year: Option<Ranged>,
    /// Of how differently periods take the warming; none where a realization holds a single one.
    pub level_by_year: Option<Ranged>,
    /// Of chance as a whole: realization and year together.
    pub chance: Ranged,
    /// Of how differently chance takes the warming: level by realization and level by year together.
    pub interaction: Ranged,
    /// The warming's share less the larger of `chance` and `interaction`, the same two however many periods a realization holds.
    pub level_less_largest_other: Ranged,
}

/// From which averaging period on the warming holds the largest share, against chance as a whole and the interaction.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
#[serde(rename_all = "snake_case", tag = "warming_holds_most")]
pub enum HoldsMost {
    /// From single years on.
    Always,
    /// From means over so many years on.
    From {
        /// The shortest averaging period from which on all have the range of the difference above 0.
        years: usize,
        /// Whether a shorter one cannot be told.
        is_blurred: bool,
    },
    /// Not in shorter means, perhaps in those over so many years and more: there the ranges straddle.
    PerhapsFrom {
        /// The shortest averaging period that cannot be told.
        years: usize,
    },
    /// In no averaging period that the realizations hold.
    Never,
    /// The ranges straddle.
    CannotTell,
}

/// One realization: of each period the mean of both levels and half their difference, told as mean and squares about it.
struct Sums {
    /// Mean over periods, of the means and of the half differences.
    means: [f64; 2],
    /// Sum of squares about it.
    squares: [f64; 2],
}

impl Partition {
    /// Parts the variance of single years `[realization][year]` of the reference and a level.
    ///
    /// Of each period M = (level + reference)/2 and D = (level - reference)/2; the variance of a value whose level is either
    /// with equal chance is Var(M) + Mean(D)^2 + Var(D). M and D are each parted in two random parts, realization and period
    /// within it: for M (MS_realization - MS_period)/B with B periods a realization, which is (MS_realization - MS_year)/(2B)
    /// of the values themselves. Mean(D)^2 is the level's, less its own sampling variance. A part below 0 counts as 0.
    ///
    /// Nothing for fewer than two realizations, values that are no numbers, or where nothing varies.
    pub fn of(
        level_c: f64,
        reference: &ArrayView2<'_, f64>,
        level: &ArrayView2<'_, f64>,
        resamples: &Resamples,
    ) -> Option<Self> {
        let held = AVERAGED_YEARS.into_iter().filter(|years| *years <= reference.ncols());
        let periods: Option<Vec<PartitionedPeriod>> =
            held.map(|years| PartitionedPeriod::of(years, reference, level, resamples)).collect();
        let periods = periods.filter(|periods| !periods.is_empty())?;
        let side = |period: &PartitionedPeriod| (period.years, period.level_less_largest_other.side_of(0.0));
        let sides: Vec<(usize, Option<bool>)> = periods.iter().map(side).collect();
        Some(Self { level_c, warming_holds_most: holds_most(&sides), periods })
    }
}

impl PartitionedPeriod {
    fn of(
        years: usize,
        reference: &ArrayView2<'_, f64>,
        level: &ArrayView2<'_, f64>,
        resamples: &Resamples,
    ) -> Option<Self> {
        let (realizations, all_years) = reference.dim();
        let blocks = all_years / years;
        let sums: Vec<Sums> = reference
            .rows()
            .into_iter()
            .zip(level.rows())
            .map(|(before, after)| {
                let mean = |piece: ndarray::ArrayView1<'_, f64>| piece.iter().sum::<f64>() / years as f64;
                let pairs = before.exact_chunks(years).into_iter().zip(after.exact_chunks(years));
                Sums::of(&pairs.map(|(before, after)| [mean(before), mean(after)]).collect::<Vec<_>>())
            })
            .collect();
        let found = shares(&sums, blocks, &vec![1; realizations])?;
        let resampled = resamples.each(|weights| shares(&sums, blocks, weights));
        let of = |number: fn(&[f64; PARTS]) -> f64| {
            Ranged::new(number(&found), resampled.iter().map(|shares| shares.as_ref().map(number)))
        };
        let is_apart = blocks > 1;
        Some(Self {
            years,
            periods_per_realization: blocks,
            years_left_over: all_years % years,
            level: of(|shares| shares[0]),
            realization: of(|shares| shares[1]),
            level_by_realization: of(|shares| shares[2]),
            year: is_apart.then(|| of(|shares| shares[3])),
            level_by_year: is_apart.then(|| of(|shares| shares[4])),
            chance: of(chance),
            interaction: of(interaction),
            level_less_largest_other: of(|shares| shares[0] - chance(shares).max(interaction(shares))),
        })
    }
}

/// Realization and year within it.
fn chance(shares: &[f64; PARTS]) -> f64 {
    shares[1] + shares[3]
}

/// Both by level.
fn interaction(shares: &[f64; PARTS]) -> f64 {
    shares[2] + shares[4]
}

impl Sums {
    fn of(pairs: &[[f64; 2]]) -> Self {
        let both = |[before, after]: &[f64; 2]| [(before + after) / 2.0, (after - before) / 2.0];
        let count = pairs.len() as f64;
        let mean = |at: usize| pairs.iter().map(|pair| both(pair)[at]).sum::<f64>() / count;
        let means = [mean(0), mean(1)];
        let squares = |at: usize| {
            let apart = |pair: &[f64; 2]| both(pair)[at] - means[at];
            pairs.iter().map(|pair| apart(pair) * apart(pair)).sum::<f64>()
        };
        Self { means, squares: [squares(0), squares(1)] }
    }
}

/// The five shares of realizations that stand so often; nothing where there are fewer than two, or nothing varies.
fn shares(of: &[Sums], blocks: usize, weights: &[u32]) -> Option<[f64; PARTS]> {
    let count: f64 = weights.iter().map(|weight| f64::from(*weight)).sum();
    if count < 2.0 {
        return None;
    }
    let weighed = |number: &dyn Fn(&Sums) -> f64| -> f64 {
        of.iter().zip(weights).map(|(sums, weight)| f64::from(*weight) * number(sums)).sum()
    };
    let b = blocks as f64;
    let parted = |at: usize| {
        let mean = weighed(&|sums| sums.means[at]) / count;
        let between = weighed(&|sums| (sums.means[at] - mean) * (sums.means[at] - mean)) / (count - 1.0);
        let within = if blocks > 1 { weighed(&|sums| sums.squares[at]) / (count * (b - 1.0)) } else { 0.0 };
        // `between` is a variance of means over `blocks` periods: the mean square is `blocks` times as much.
        (mean, between, (between - within / b).max(0.0), within)
    };
    let (_, _, realization, year) = parted(0);
    let (half_change, of_half_changes, level_by_realization, level_by_year) = parted(1);
    let level = (half_change * half_change - of_half_changes / count).max(0.0);
    let parts = [level, realization, level_by_realization, year, level_by_year];
    let total: f64 = parts.iter().sum();
    (total.is_finite() && total > LEAST_VARIANCE).then(|| parts.map(|part| part / total))
}

/// From the averaging periods, ascending, and on which side of 0 the warming's share less the largest other lies in each.
fn holds_most(periods: &[(usize, Option<bool>)]) -> HoldsMost {
    let is = |side: Option<bool>| move |(_, of): &&(usize, Option<bool>)| *of == side;
    let largest = periods.iter().rev().take_while(is(Some(true))).count();
    let shorter = &periods[..periods.len() - largest];
    if let Some((years, _)) = periods.get(shorter.len()) {
        let is_blurred = shorter.iter().any(|(_, side)| side.is_none());
        return if shorter.is_empty() {
            HoldsMost::Always
        } else {
            HoldsMost::From { years: *years, is_blurred }
        };
    }
    let open = periods.iter().rev().take_while(is(None)).count();
    let (clear, open) = periods.split_at(periods.len() - open);
    match open.first() {
        _ if clear.iter().any(|(_, side)| *side != Some(false)) => HoldsMost::CannotTell,
        None => HoldsMost::Never,
        Some((years, _)) if !clear.is_empty() => HoldsMost::PerhapsFrom { years: *years },
        Some(_) => HoldsMost::CannotTell,
    }
}

#[cfg(test)]
mod tests;
