//! The generator sheet: whether the weather that was made looks like the record that it was made from.
//!
//! Each statistic is taken of the record and of every realization alike, and the record is held against the realizations'
//! own range: what lies outside it is more than sampling brings. Realizations have as many years as the record has in use, no
//! change of mean precipitation is assumed in them, and snow is modelled at the reference level.

mod calendar;
mod judge;
mod line;
mod moments;
mod sample;
mod spells;

#[cfg(test)]
mod tests;

pub use judge::{RealizationRange, Verdict};
pub use line::{Period, Quantity, Statistic, Subject};
pub use sample::{SheetQuestions, SheetSample};

use crate::calendar::MonthDay;
use crate::perturb::Fitted;
use judge::outside_by_chance;
use serde::Serialize;

/// Realizations that are made for the sheet at most.
pub const REALIZATIONS_OF_THE_SHEET: u32 = 300;

/// The sheet.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct GeneratorSheet {
    /// Realizations that were made for it.
    pub realizations: usize,
    /// Water years of each, as many as the record has in use.
    pub years: usize,
    /// A day with more is wet, mm.
    pub wet_day_mm: f64,
    /// The survey whose SWE is held against the record's; it ends the cool season.
    pub survey: MonthDay,
    /// Lines that have a verdict.
    pub lines_judged: usize,
    /// Of these, outside the realizations' range.
    pub lines_outside: usize,
    /// As many would lie outside by chance were the record one more realization.
    pub outside_by_chance: f64,
    /// The largest day of all: reported, not judged.
    pub largest_day_mm: LargestDay,
    /// What the generator took from its record, where it fits anything. Whoever has the generator adds it.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub fitted: Option<Fitted>,
    /// The statistics.
    pub statistics: Vec<SheetStatistic>,
}

/// The largest day, mm; none without a day.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct LargestDay {
    /// Of the record.
    pub record: Option<f64>,
    /// Of all realizations.
    pub realizations: Option<f64>,
}

/// A statistic of record and realizations.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct SheetStatistic {
    /// What it is about.
    pub subject: Subject,
    /// Which.
    pub statistic: Statistic,
    /// What its numbers count.
    pub quantity: Quantity,
    /// One entry a part of the year.
    pub lines: Vec<SheetLine>,
}

/// One line: the record's number and the realizations' range.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct SheetLine {
    /// The part of the year.
    pub period: Period,
    /// Of the record.
    pub record: Option<f64>,
    /// Realizations that have a number; those without are left out of the range.
    pub realizations: usize,
    /// Their range; none of fewer than 13.
    pub range: Option<RealizationRange>,
    /// Whether the record lies within it; none where either is not there.
    pub verdict: Option<Verdict>,
}

impl SheetLine {
    /// Whether the record lies outside the realizations' range.
    pub fn is_outside(&self) -> bool {
        self.verdict.is_some_and(|verdict| verdict != Verdict::Within)
    }
}

impl GeneratorSheet {
    /// Holds the record against realizations, all asked the same questions.
    pub fn of(questions: &SheetQuestions, record: &SheetSample, realizations: &[SheetSample]) -> Self {
        let statistics: Vec<SheetStatistic> = (0..record.taken.len())
            .map(|at| {
                let taken = &record.taken[at];
                let line = |(part, (period, of_record)): (usize, &(Period, Option<f64>))| {
                    let numbers: Vec<f64> =
                        realizations.iter().filter_map(|sample| sample.taken[at].values[part].1).collect();
                    let range = RealizationRange::of(&numbers);
                    SheetLine {
                        period: *period,
                        record: *of_record,
                        realizations: numbers.len(),
                        range,
                        verdict: range.zip(*of_record).map(|(range, number)| range.judge(number)),
                    }
                };
                SheetStatistic {
                    subject: taken.statistic.subject(),
                    statistic: taken.statistic,
                    quantity: taken.statistic.quantity(),
                    lines: taken.values.iter().enumerate().map(line).collect(),
                }
            })
            .collect();
        let lines = || statistics.iter().flat_map(|statistic| &statistic.lines);
        let judged = || lines().filter(|line| line.verdict.is_some());
        Self {
            realizations: realizations.len(),
            years: record.years,
            wet_day_mm: questions.wet_day_mm,
            survey: questions.survey,
            lines_judged: judged().count(),
            lines_outside: judged().filter(|line| line.is_outside()).count(),
            outside_by_chance: judged().map(|line| outside_by_chance(line.realizations)).sum(),
            largest_day_mm: LargestDay {
                record: record.largest_day_mm,
                realizations: realizations.iter().filter_map(|sample| sample.largest_day_mm).reduce(f64::max),
            },
            fitted: None,
            statistics,
        }
    }

    /// The statistics of a subject.
    pub fn about(&self, subject: Subject) -> impl Iterator<Item = &SheetStatistic> {
        self.statistics.iter().filter(move |statistic| statistic.subject == subject)
    }
}
