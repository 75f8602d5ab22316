//! The record's own uncertainty of odds: how often low-snow years, and low years in a row, had the record been another of the same
//! kind. No number of realizations makes it smaller.

use super::low_runs::{RUN_YEARS, RUNS_AT_OR_BELOW_QUANTILE, least_limit};
use super::quantile::{quantile, sorted};
use super::record_range::{Range, is_telling, range};
use crate::ensemble::BasinSeasons;
use crate::season::Kind;
use ndarray::{ArrayView2, Axis};
use serde::Serialize;

const METHOD: &str = "q05 and q95: 5 and 95 % quantiles over generators made anew from resampled record years, each with limits \
                      of its own; the few realizations of each add some Monte Carlo error";

/// What one resampled record answers of the headline's single years.
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
    /// Chance of a year below the resampled record's own low-snow limit; years at the limit count half.
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
    /// Of the runs that one resampled record gave; nothing where its reference has no snow to be low in.
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
        let (below_mm, run_mm) = (limit(below_quantile)?, limit(RUNS_AT_OR_BELOW_QUANTILE)?);
        let (_, realizations, years) = headline.dim();
        let each = |of: &dyn Fn(&ArrayView2<'_, f64>) -> f64| -> Vec<f64> {
            headline.axis_iter(Axis(0)).map(|level| of(&level)).collect()
        };
        // Resampled winters stand at the limit many at a time: ties count half.
        let low = |level: &ArrayView2<'_, f64>| {
            let count =
                |is: fn(f64, f64) -> bool| level.iter().filter(|mm| is(**mm, below_mm)).count() as f64;
            (count(|mm, limit| mm < limit) + count(|mm, limit| mm == limit) / 2.0) / level.len() as f64
        };
        let runs = |run: usize| {
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
            runs: lengths.map(|run| (run, runs(run))).collect(),
        })
    }
}

impl RecordOdds {
    /// The ranges over all resampled records; nothing where fewer than two have snow.
    pub fn of(refits: &[Option<RefitOdds>], levels_c: &[f64], reference: usize) -> Option<Self> {
        let with_snow: Vec<&RefitOdds> = refits.iter().flatten().collect();
        let first = *with_snow.first().filter(|_| with_snow.len() > 1)?;
        let over = |number: &dyn Fn(&RefitOdds) -> Option<f64>| range(with_snow.iter().map(|of| number(of)));
        let at_level = |(level, level_c): (usize, &f64)| {
            let ratio = |of: &RefitOdds| (of.low[reference] > 0.0).then(|| of.low[level] / of.low[reference]);
            let runs = first.runs.iter().enumerate().map(|(at, (years, _))| {
                Some(RecordRuns { years: *years, chance: over(&|of| Some(of.runs[at].1[level]))? })
            });
            Some(RecordOddsLevel {
                level_c: *level_c,
                low_chance: over(&|of| Some(of.low[level]))?,
                chance_ratio: over(&ratio),
                runs: runs.collect::<Option<_>>()?,
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

#[cfg(test)]
mod tests {
    use super::*;
    use crate::season::{Measure, Place};
    use ndarray::{Array3, Array4};

    /// One realization of the headline alone, a row a level.
    fn seasons_of(levels: &[&[f64]]) -> BasinSeasons {
        let headline = Measure {
            name: "swe_04_01_mm".to_owned(),
            title: "1 April SWE".to_owned(),
            kind: Kind::AmountMm,
            place: Place::BandsAndBasin,
            is_volume: false,
            has_extremes_told: false,
        };
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
    /// in a row, and three, at both levels. The other record falls by nothing.
    #[test]
    fn odds_of_two_records_by_hand() {
        let rising: Vec<f64> = (1..=10).map(|at| 10.0 * f64::from(at)).collect();
        let less: Vec<f64> = rising.iter().map(|mm| mm - 20.0).collect();
        let of = |second: &[f64]| RefitOdds::of(&seasons_of(&[&rising, second]), 10, 0, 0.2);
        let found = RecordOdds::of(&[of(&less), of(&rising), None], &[0.0, 2.0], 0).unwrap();
        assert_eq!((found.records, found.records_run, found.is_telling()), (2, 3, false));
        assert_eq!(found.levels[0].low_chance, Range { q05: 0.2, q95: 0.2 });
        let [low, ratio] = [found.levels[1].low_chance, found.levels[1].chance_ratio.unwrap()];
        // Two values: type 8 gives the lower one at 5 % and the higher one at 95 %.
        assert_eq!((low, ratio), (Range { q05: 0.2, q95: 0.4 }, Range { q05: 1.0, q95: 2.0 }));
        let runs: Vec<_> = found.levels[1].runs.iter().map(|of| (of.years, of.chance)).collect();
        let always = Range { q05: 1.0, q95: 1.0 };
        assert_eq!(runs, [(2, always), (3, always), (5, Range { q05: 0.0, q95: 1.0 })]);
        assert!(RecordOdds::of(&[of(&less), None], &[0.0, 2.0], 0).is_none());
        let bare = vec![0.0; 10];
        assert!(RefitOdds::of(&seasons_of(&[&bare, &bare]), 10, 0, 0.2).is_none());
    }
}
