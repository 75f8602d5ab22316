//! The record's own uncertainty of odds: how often low-snow years, and low years in a row, had the record been another of the same
//! kind. No number of realizations makes it smaller.

use super::low_runs::{RUN_YEARS, RUNS_AT_OR_BELOW_QUANTILE, least_limit};
use super::quantile::{quantile, sorted};
use super::record_range::{Range, is_telling};
use crate::ensemble::BasinSeasons;
use crate::season::Kind;
use ndarray::{ArrayView2, Axis};
use serde::Serialize;

const METHOD: &str = "q05 and q95: 5 and 95 % quantiles over generators made anew from resampled record years, each with limits \
                      of its own, moved until their median is the study's own number; the few realizations of each add some Monte Carlo error";

/// What the runs of one record, the study's own or a resampled one, answer of the headline's single years.
#[derive(Debug, Clone, PartialEq)]
pub struct RefitOdds {
    record_years: usize,
    realizations: usize,
    /// The chance of a low-snow year, one entry a level.
    low: Vec<f64>,
    /// One entry a length of run, the share of realizations that hold one at every level.
    runs: Vec<(usize, Vec<f64>)>,
}

/// Odds over all resampled records.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct RecordOdds {
    /// How the ranges are made.
    pub method: &'static str,
    /// Resampled records whose reference has snow to be low in.
    pub records: usize,
    /// Resampled records in all; a range is over those that have snow.
    pub records_run: usize,
    /// Years of each, as many as the record has in use.
    pub record_years: usize,
    /// Realizations of each.
    pub realizations: usize,
    /// One entry a level.
    pub levels: Vec<RecordOddsLevel>,
}

/// At one level.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct RecordOddsLevel {
    /// The level, degC.
    pub level_c: f64,
    /// Chance of a year below the resampled record's own low-snow limit.
    pub low_chance: Range,
    /// Over that record's chance at the reference; none where that is nothing in one of them.
    pub chance_ratio: Option<Range>,
    /// Chances that a realization holds so many low years in a row.
    pub runs: Vec<RecordRuns>,
}

/// Low years in a row.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct RecordRuns {
    /// So many or more.
    pub years: usize,
    /// The chance that a realization holds such a run.
    pub chance: Range,
}

impl RefitOdds {
    /// Of the runs that one record gave; nothing where its reference has no snow to be low in.
    pub fn of(
        seasons: &BasinSeasons,
        record_years: usize,
        reference: usize,
        below_quantile: f64,
    ) -> Option<Self> {
        seasons.measures.first().filter(|measure| measure.kind == Kind::AmountMm)?;
        let headline = seasons.years.index_axis(Axis(1), 0);
        let of_reference = sorted(headline.index_axis(Axis(0), reference).iter().copied());
        let limit = |share| Some(quantile(&of_reference, share)).filter(|mm| *mm > 0.0 && mm.is_finite());
        let (below_mm, run_mm) = (limit(below_quantile)?, limit(RUNS_AT_OR_BELOW_QUANTILE));
        let (_, realizations, years) = headline.dim();
        let each = |of: &dyn Fn(&ArrayView2<'_, f64>) -> f64| -> Vec<f64> {
            headline.axis_iter(Axis(0)).map(|level| of(&level)).collect()
        };
        let low = |level: &ArrayView2<'_, f64>| {
            level.iter().filter(|mm| **mm < below_mm).count() as f64 / level.len() as f64
        };
        let runs = |run: usize, run_mm: f64| {
            each(&|level| {
                let holds =
                    |row: &ArrayView2<'_, f64>, at: usize| least_limit(&row.row(at).to_vec(), run) <= run_mm;
                (0..realizations).filter(|at| holds(level, *at)).count() as f64 / realizations as f64
            })
        };
        let lengths = RUN_YEARS.into_iter().filter(|run| *run <= years);
        Some(Self {
            record_years,
            realizations,
            low: each(&low),
            runs: lengths.filter_map(|run| Some((run, runs(run, run_mm?)))).collect(),
        })
    }
}

impl RecordOdds {
    /// The ranges over all resampled records, moved until their median is the study's own number: winters that are drawn again and again
    /// put a record's quantile, and all that is counted against it, off to one side, which says nothing of the record. Nothing where
    /// fewer than two have snow, or the study itself has no odds.
    pub fn of(
        refits: &[Option<RefitOdds>],
        own: &RefitOdds,
        levels_c: &[f64],
        reference: usize,
    ) -> Option<Self> {
        let with_snow: Vec<&RefitOdds> = refits.iter().flatten().collect();
        let first = *with_snow.first().filter(|_| with_snow.len() > 1)?;
        let over = |number: &dyn Fn(&RefitOdds) -> Option<f64>| {
            Moved::of(with_snow.iter().map(|of| number(of)), number(own)?)
        };
        let at_level = |(level, level_c): (usize, &f64)| {
            let ratio = |of: &RefitOdds| (of.low[reference] > 0.0).then(|| of.low[level] / of.low[reference]);
            let runs = own.runs.iter().filter_map(|(years, _)| {
                let chance =
                    |of: &RefitOdds| of.runs.iter().find(|(of, _)| of == years).map(|(_, of)| of[level]);
                Some(RecordRuns { years: *years, chance: over(&chance)?.added_within_one() })
            });
            Some(RecordOddsLevel {
                level_c: *level_c,
                low_chance: over(&|of| Some(of.low[level]))?.added_within_one(),
                chance_ratio: over(&ratio).and_then(Moved::times),
                runs: runs.collect(),
            })
        };
        Some(Self {
            method: METHOD,
            records: with_snow.len(),
            records_run: refits.len(),
            record_years: first.record_years,
            realizations: first.realizations,
            levels: levels_c.iter().enumerate().map(at_level).collect::<Option<_>>()?,
        })
    }

    /// Whether there are years and realizations enough for the ranges to tell of the record.
    pub fn is_telling(&self) -> bool {
        is_telling(self.record_years, self.realizations)
    }
}

/// A range with its median, and the number that the median is to be.
#[derive(Clone, Copy)]
struct Moved {
    range: Range,
    median: f64,
    own: f64,
}

impl Moved {
    /// None where a record has no number.
    fn of(numbers: impl Iterator<Item = Option<f64>>, own: f64) -> Option<Self> {
        let numbers = sorted(numbers.collect::<Option<Vec<f64>>>()?);
        let [q05, median, q95] = [0.05, 0.5, 0.95].map(|share| quantile(&numbers, share));
        Some(Self { range: Range { q05, q95 }, median, own })
    }

    /// By a sum, as chances are.
    fn added_within_one(self) -> Range {
        self.range.map(|end| (end - self.median + self.own).clamp(0.0, 1.0))
    }

    /// By a factor, as ratios are; none where the median is 0.
    fn times(self) -> Option<Range> {
        (self.median > 0.0).then(|| self.range.map(|end| end * self.own / self.median))
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::season::Measure;
    use ndarray::{Array3, Array4};

    /// One realization of the headline alone, a row a level.
    fn seasons_of(levels: &[&[f64]]) -> BasinSeasons {
        let headline = Measure::april_swe();
        BasinSeasons {
            measures: vec![headline],
            years: Array4::from_shape_fn((levels.len(), 1, 1, levels[0].len()), |(level, _, _, year)| {
                levels[level][year]
            }),
            periods: Array3::zeros((levels.len(), 1, 1)),
        }
    }

    /// By hand. One record's reference 10 to 100 mm by tens, type 8: its 20 % quantile stands at rank 10*0.2 + 1.4/3 = 2.4667, at
    /// 24.67 mm, and 30 % at rank 3.4667, 34.67 mm; 20 mm less puts 4 of 10 below the first. In order they hold two low years
    /// in a row, and three, at both levels. The other record falls by nothing. Of 0.2 and 0.4 the median is 0.3, which is moved to
    /// the study's own 0.3: 10 mm less puts 3 of 10 below; of the ratios 1 and 2 it is 1.5, the own one, too.
    #[test]
    fn odds_of_two_records_by_hand() {
        let rising: Vec<f64> = (1..=10).map(|at| 10.0 * f64::from(at)).collect();
        let less = |by: f64| -> Vec<f64> { rising.iter().map(|mm| mm - by).collect() };
        let of = |second: &[f64]| RefitOdds::of(&seasons_of(&[&rising, second]), 10, 0, 0.2);
        let found = |own: f64, refits: &[Option<RefitOdds>]| {
            RecordOdds::of(refits, &of(&less(own)).unwrap(), &[0.0, 2.0], 0)
        };
        let refits = [of(&less(20.0)), of(&rising), None];
        let two = found(10.0, &refits).unwrap();
        assert_eq!((two.records, two.records_run, two.is_telling()), (2, 3, false));
        let near = |range: Range, expected: [f64; 2]| {
            assert!(
                (range.q05 - expected[0]).abs() < 1e-12 && (range.q95 - expected[1]).abs() < 1e-12,
                "{range:?}"
            );
        };
        near(two.levels[0].low_chance, [0.2, 0.2]);
        near(two.levels[1].low_chance, [0.2, 0.4]);
        near(two.levels[1].chance_ratio.unwrap(), [1.0, 2.0]);
        let runs: Vec<_> = two.levels[1].runs.iter().map(|of| of.years).collect();
        assert_eq!(runs, [2, 3, 5]);
        near(two.levels[1].runs[0].chance, [1.0, 1.0]);
        // An own chance of 0.5 moves both ends by 0.2; of ratios by 2.5/1.5.
        let moved = found(30.0, &refits).unwrap();
        near(moved.levels[1].low_chance, [0.4, 0.6]);
        near(moved.levels[1].chance_ratio.unwrap(), [2.5 / 1.5, 5.0 / 1.5]);
        assert!(found(10.0, &[of(&less(20.0)), None]).is_none());
        let bare = vec![0.0; 10];
        assert!(RefitOdds::of(&seasons_of(&[&bare, &bare]), 10, 0, 0.2).is_none());
    }
}
