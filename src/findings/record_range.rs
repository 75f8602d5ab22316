//! The record's own uncertainty: what the answers would be had the record been another of the same kind.
//!
//! The record's years are resampled, the generator is made anew from them, and the same answers are taken. Their range is
//! a matter of having only this record, and no number of realizations makes it smaller; Monte Carlo error is kept apart.

use super::chance::{below_reference, reaches_median_share};
use super::crossing::{Crossing, CrossingRange, crossing, range_of};
use super::exceedance::{EXCEEDANCE_PCT, exceeded_mm};
use super::quantile::{quantile, sorted};
use super::shift::percent_change;
use super::spread::Spread;
use super::yardstick::Levels;
use crate::ensemble::BasinSeasons;
use crate::season::Measure;
use crate::units::cubic_hectometres;
use ndarray::Axis;
use serde::Serialize;

/// Records that are resampled for the record's own uncertainty.
pub const RESAMPLED_RECORDS: u32 = 20;
/// Realizations that are run from each of them at most.
pub const REALIZATIONS_OF_A_RECORD: u32 = 50;
/// With fewer, a range over records would mostly be Monte Carlo error.
const LEAST_REALIZATIONS: usize = 20;
/// A record with fewer years cannot tell what other records would be like.
const LEAST_RECORD_YEARS: usize = 10;

/// A range from 5 to 95 %: over resampled records, or over realizations where it is said so.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Range {
    /// 5 % quantile.
    pub q05: f64,
    /// 95 % quantile.
    pub q95: f64,
}

impl Range {
    pub(super) fn map(self, unit: impl Fn(f64) -> f64) -> Self {
        Self { q05: unit(self.q05), q95: unit(self.q95) }
    }
}

/// The record's own uncertainty of what is found of one measure.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct RecordRange {
    /// Resampled records.
    pub records: usize,
    /// Years of each, as many as the record has in use.
    pub record_years: usize,
    /// Realizations of each: few, so that the ranges hold some Monte Carlo error of their own.
    pub realizations: usize,
    /// One entry a level, in the order of the levels; nothing but volumes at the reference.
    pub levels: Vec<RecordRangeLevel>,
    /// Of the warming from which on the shift outweighs the precipitation spread.
    pub outweighs: Option<CrossingRange>,
}

/// The same at one level; a range is missing where a resampled record gives no number.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct RecordRangeLevel {
    /// The level, degC.
    pub level_c: f64,
    /// Of the median shift.
    pub shift: Option<Range>,
    /// Of the percent change.
    pub percent_change: Option<Range>,
    /// Of the signal to spread.
    pub signal_to_spread: Option<Range>,
    /// Of the chance that the period value of an independent warmed realization lies below a reference one.
    pub period_below_reference: Option<Range>,
    /// Of the chance that a warmed realization reaches the reference's median.
    pub reaches_reference_median: Option<Range>,
    /// Of the volumes that 90, 70, 50, 30 and 10 % of years bring at least, as depths over the basin, mm.
    #[serde(skip_serializing_if = "Vec::is_empty")]
    pub exceeded_mm: Vec<Range>,
    /// The same as volumes, hm3.
    #[serde(skip_serializing_if = "Vec::is_empty")]
    pub exceeded_hm3: Vec<Range>,
}

/// What one resampled record answers, `[measure]`.
#[derive(Debug, Clone, PartialEq)]
pub struct Refit {
    record_years: usize,
    realizations: usize,
    measures: Vec<RefitMeasure>,
}

#[derive(Debug, Clone, PartialEq)]
struct RefitMeasure {
    levels: Vec<RefitLevel>,
    outweighs: Crossing,
}

#[derive(Debug, Clone, Copy, Default, PartialEq)]
struct RefitLevel {
    shift: Option<f64>,
    percent_change: Option<f64>,
    signal_to_spread: Option<f64>,
    period_below_reference: Option<f64>,
    reaches_reference_median: Option<f64>,
    exceeded_mm: Option<[f64; EXCEEDANCE_PCT.len()]>,
}

impl Refit {
    /// The answers of the runs that one resampled record gave.
    pub fn of(seasons: &BasinSeasons, record_years: usize, levels_c: &[f64], reference: usize) -> Self {
        let levels = Levels { levels_c, reference };
        let of = |(at, measure): (usize, &Measure)| RefitMeasure::of(seasons, at, measure, levels);
        Self {
            record_years,
            realizations: seasons.periods.len_of(Axis(2)),
            measures: seasons.measures.iter().enumerate().map(of).collect(),
        }
    }
}

impl RefitMeasure {
    fn of(seasons: &BasinSeasons, at: usize, measure: &Measure, levels: Levels<'_>) -> Self {
        let periods = seasons.periods.index_axis(Axis(1), at);
        let years = seasons.years.index_axis(Axis(1), at);
        let reference: Vec<f64> = periods.row(levels.reference).to_vec();
        let spread = Spread::of(&reference);
        let median = quantile(&sorted(reference.iter().copied()), 0.5);
        let of_level = |level: usize| {
            let exceeded_mm = measure
                .is_volume
                .then(|| exceeded_mm(years.index_axis(Axis(0), level).iter().copied()))
                .flatten();
            if level == levels.reference {
                return RefitLevel { exceeded_mm, ..RefitLevel::default() };
            }
            let warmed: Vec<f64> = periods.row(level).to_vec();
            let changes = reference.iter().zip(&warmed).map(|(before, after)| after - before);
            let changes = sorted(changes.filter(|change| change.is_finite()));
            let shift = (!changes.is_empty()).then(|| quantile(&changes, 0.5));
            RefitLevel {
                shift,
                percent_change: shift.and_then(|shift| percent_change(measure.kind, shift, median)),
                signal_to_spread: shift.zip(spread).and_then(|(shift, spread)| spread.times(shift)),
                period_below_reference: below_reference(&reference, &warmed),
                reaches_reference_median: reaches_median_share(&reference, &warmed),
                exceeded_mm,
            }
        };
        let found: Vec<RefitLevel> = (0..levels.levels_c.len()).map(of_level).collect();
        let warmer: Vec<(f64, Option<f64>)> = (levels.reference + 1..levels.levels_c.len())
            .map(|level| (levels.levels_c[level], found[level].signal_to_spread))
            .collect();
        Self { outweighs: crossing(levels.levels_c[levels.reference], &warmer), levels: found }
    }
}

impl RecordRange {
    /// Whether there are years and realizations enough for the ranges to tell of the record.
    pub fn is_telling(&self) -> bool {
        is_telling(self.record_years, self.realizations)
    }

    /// The ranges of one measure over all resampled records; nothing where there are fewer than two.
    pub(super) fn of(refits: &[Refit], measure: usize, levels_c: &[f64], area_km2: f64) -> Option<Self> {
        let of_each: Vec<&RefitMeasure> = refits.iter().map(|refit| &refit.measures[measure]).collect();
        if of_each.len() < 2 {
            return None;
        }
        let levels = levels_c.iter().enumerate().map(|(level, level_c)| {
            let range = |number: &dyn Fn(&RefitLevel) -> Option<f64>| {
                range(of_each.iter().map(|refit| number(&refit.levels[level])))
            };
            let exceeded = |at: usize| range(&|level| level.exceeded_mm.map(|amounts| amounts[at]));
            let exceeded_mm: Vec<Range> = (0..EXCEEDANCE_PCT.len()).map_while(exceeded).collect();
            RecordRangeLevel {
                level_c: *level_c,
                shift: range(&|level| level.shift),
                percent_change: range(&|level| level.percent_change),
                signal_to_spread: range(&|level| level.signal_to_spread),
                period_below_reference: range(&|level| level.period_below_reference),
                reaches_reference_median: range(&|level| level.reaches_reference_median),
                exceeded_hm3: exceeded_mm
                    .iter()
                    .map(|range| range.map(|mm| cubic_hectometres(mm, area_km2)))
                    .collect(),
                exceeded_mm,
            }
        });
        Some(Self {
            records: refits.len(),
            record_years: refits[0].record_years,
            realizations: refits[0].realizations,
            levels: levels.collect(),
            outweighs: range_of(of_each.iter().map(|refit| refit.outweighs)),
        })
    }
}

/// Whether so many years of a record and realizations of each are enough.
pub(super) fn is_telling(record_years: usize, realizations: usize) -> bool {
    record_years >= LEAST_RECORD_YEARS && realizations >= LEAST_REALIZATIONS
}

/// From 5 to 95 % over numbers; nothing where one is missing.
pub(super) fn range(numbers: impl Iterator<Item = Option<f64>>) -> Option<Range> {
    let numbers = sorted(numbers.collect::<Option<Vec<f64>>>()?);
    let [q05, q95] = [0.05, 0.95].map(|share| quantile(&numbers, share));
    Some(Range { q05, q95 })
}
