//! The spread of parameters beside those of precipitation and warming: how far the answer hangs on which of the sets that
//! observed snow allows is run.
//!
//! The sets are chosen to lie apart and are no sample, so their range goes from the lowest to the highest, where that of
//! precipitation is 5 to 95 %.

use super::measure::MeasureFindings;
use super::quantile::{quantile, sorted};
use super::shift::percent_change;
use super::spread::{Spread, over_half};
use super::three_way::{AveragedShares, ThreeWay, ThreeWayShares, averaged_shares};
use super::yardstick::Levels;
use crate::season::Measure;
use ndarray::{Array3, ArrayView2, Axis};
use serde::Serialize;

/// Some realizations under every level, from each set of parameters.
#[derive(Debug, Clone, PartialEq)]
pub struct SetRuns {
    /// What was measured.
    pub measures: Vec<Measure>,
    /// A set each: period values of the basin, `[level][measure][realization]`, the same realizations in all.
    pub periods: Vec<Array3<f64>>,
    /// A set each: single years of the first of the measures, `[level][realization][year]`.
    pub headline_years: Vec<Array3<f64>>,
    /// Period values of the study's own parameters.
    pub own: Array3<f64>,
}

/// Spreads of parameters, precipitation and warming side by side.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct ParameterSpread {
    /// Sets of parameters.
    pub sets: usize,
    /// Realizations of each.
    pub realizations: usize,
    /// One entry a measure, the headline's first.
    pub measures: Vec<MeasureBySet>,
}

/// The sets' answers about one measure of the basin.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct MeasureBySet {
    /// The measure.
    pub measure: Measure,
    /// The study's own median at the reference, over the realizations that the sets have.
    pub own_reference: f64,
    /// Each set's median over them.
    pub reference: OverSets,
    /// One entry a level but the reference.
    pub levels: Vec<LevelBySet>,
}

/// A number of each set.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct OverSets {
    /// The lowest.
    pub lowest: f64,
    /// The highest.
    pub highest: f64,
}

/// The sets' answers at one level, and what they weigh.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct LevelBySet {
    /// The level, degC.
    pub level_c: f64,
    /// Each set's median paired change from its own reference.
    pub shift: OverSets,
    /// The same as a percentage of the set's own reference median; of amounts.
    pub percent_change: Option<OverSets>,
    /// The three spreads, in the measure's unit, and which of them is the largest.
    pub weighed: Option<Weighed>,
    /// Shares of the period values' sums of squares over reference and level, all realizations and sets.
    pub variance_shares: Option<ThreeWayShares>,
    /// The same of means over so many years; of the headline alone.
    #[serde(skip_serializing_if = "Vec::is_empty")]
    pub averaged_shares: Vec<AveragedShares>,
}

/// What moves a measure: warming, precipitation's chance, the choice of parameters.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Weighed {
    /// The study's own median paired change, without its sign.
    pub warming: f64,
    /// The half of the study's 5-95 % precipitation spread that the change points to.
    pub precipitation: f64,
    /// From the study's own reference median, over the realizations of the sets, to the end of the sets' that the change points
    /// to; 0 where no set lies on that side.
    pub parameters: f64,
    /// Warming over parameters; none where the sets do not differ.
    pub warming_over_parameters: Option<f64>,
    /// The largest of the three.
    pub largest: Mover,
}

/// What moves a measure the most.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
#[serde(rename_all = "snake_case")]
pub enum Mover {
    /// The warming.
    Warming,
    /// Precipitation's chance, and its assumed change.
    Precipitation,
    /// The choice of parameters.
    Parameters,
}

impl ParameterSpread {
    /// Holds the sets' runs against what the study's own say of the basin; none where no measure of theirs has a number in every set.
    pub fn of(runs: &SetRuns, study: &[MeasureFindings], levels_c: &[f64], reference: usize) -> Option<Self> {
        let levels = Levels { levels_c, reference };
        let measures: Vec<MeasureBySet> = study
            .iter()
            .filter_map(|own| {
                let at = runs.measures.iter().position(|measure| *measure == own.measure)?;
                let of_sets: Vec<_> =
                    runs.periods.iter().map(|periods| periods.index_axis(Axis(1), at)).collect();
                let years: &[Array3<f64>] = if at == 0 { &runs.headline_years } else { &[] };
                MeasureBySet::of(own, &runs.own.index_axis(Axis(1), at), (&of_sets, years), levels)
            })
            .collect();
        let realizations = runs.periods.first()?.len_of(Axis(2));
        (!measures.is_empty()).then_some(Self { sets: runs.periods.len(), realizations, measures })
    }
}

impl MeasureBySet {
    /// `of_own` and `of_sets` are period values `[level][realization]`, a set each; `years` single years, where they are kept.
    fn of(
        own: &MeasureFindings,
        of_own: &ArrayView2<'_, f64>,
        (of_sets, years): (&[ArrayView2<'_, f64>], &[Array3<f64>]),
        levels: Levels<'_>,
    ) -> Option<Self> {
        let median =
            |set: &ArrayView2<'_, f64>| quantile(&sorted(set.row(levels.reference).iter().copied()), 0.5);
        let own_reference = Some(median(of_own)).filter(|median| median.is_finite())?;
        let medians: Vec<f64> = of_sets.iter().map(median).collect();
        let reference = OverSets::of(medians.iter().copied())?;
        let level = |(at, level_c): (usize, &f64)| {
            let shifts = of_sets.iter().map(|set| median_change(set, levels.reference, at));
            let shifts: Vec<f64> = shifts.collect::<Option<_>>()?;
            let kind = own.measure.kind;
            let percents =
                shifts.iter().zip(&medians).map(|(shift, median)| percent_change(kind, *shift, *median));
            let percents: Option<Vec<f64>> = percents.collect();
            let shift = own.levels[at].shift.map(|shift| shift.median.value);
            Some(LevelBySet {
                level_c: *level_c,
                shift: OverSets::of(shifts.iter().copied())?,
                percent_change: percents.and_then(|percents| OverSets::of(percents.into_iter())),
                weighed: shift
                    .zip(own.precipitation_spread)
                    .map(|(shift, spread)| Weighed::of(shift, spread, own_reference, reference)),
                variance_shares: variance_shares(of_sets, levels.reference, at),
                averaged_shares: averaged_shares(years, [levels.reference, at]),
            })
        };
        let others = levels.levels_c.iter().enumerate().filter(|(at, _)| *at != levels.reference);
        Some(Self {
            measure: own.measure.clone(),
            own_reference,
            reference,
            levels: others.filter_map(level).collect(),
        })
    }
}

impl OverSets {
    /// None where a set has no number, or there is no set.
    pub(super) fn of(values: impl Iterator<Item = f64>) -> Option<Self> {
        let values = sorted(values);
        let (lowest, highest) = (*values.first()?, *values.last()?);
        (lowest.is_finite() && highest.is_finite()).then_some(Self { lowest, highest })
    }
}

impl Weighed {
    fn of(shift: f64, spread: Spread, own_reference: f64, reference: OverSets) -> Self {
        let OverSets { lowest, highest } = reference;
        let [warming, precipitation] = [shift.abs(), spread.half_towards(shift)];
        let reach = if shift < 0.0 { own_reference - lowest } else { highest - own_reference };
        let parameters = reach.max(0.0);
        let largest = if warming >= precipitation && warming >= parameters {
            Mover::Warming
        } else if precipitation >= parameters {
            Mover::Precipitation
        } else {
            Mover::Parameters
        };
        let warming_over_parameters = over_half(shift, parameters);
        Self { warming, precipitation, parameters, warming_over_parameters, largest }
    }
}

/// Median paired change of a set, over the realizations that have one; none where none has.
fn median_change(set: &ArrayView2<'_, f64>, reference: usize, level: usize) -> Option<f64> {
    let pairs = set.row(reference).into_iter().zip(set.row(level));
    let changes = sorted(pairs.map(|(before, after)| after - before).filter(|change| change.is_finite()));
    (!changes.is_empty()).then(|| quantile(&changes, 0.5))
}

fn variance_shares(
    of_sets: &[ArrayView2<'_, f64>],
    reference: usize,
    level: usize,
) -> Option<ThreeWayShares> {
    let realizations = of_sets.first()?.ncols();
    let levels = [reference, level];
    let table = Array3::from_shape_fn((2, realizations, of_sets.len()), |(at, realization, set)| {
        of_sets[set][[levels[at], realization]]
    });
    ThreeWay::of(&table.view())?.shares()
}

#[cfg(test)]
mod tests;
