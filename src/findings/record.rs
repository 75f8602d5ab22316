//! The record's own years: which are used, what each held at the reference, what is normal, how wet they were.

use super::normal::{NormalQuestions, PercentOfMedian, percent_of_median};
use super::precipitation::RecordPrecipitation;
use super::replayed_years::ReplayedYears;
use crate::baseline::BaselineYears;
use crate::basin::Band;
use crate::ensemble::RecordYear;
use crate::season::{Measure, SeasonSettings};
use crate::weather::{Series, SkippedYear};
use serde::Serialize;

/// What the record's own years say. The years that were left out stand among the record's counts.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct RecordFindings {
    /// What a year's `headline_mm` is.
    pub headline: Measure,
    /// The years in use.
    pub years: Vec<OwnYear>,
    /// The years left out.
    #[serde(skip)]
    pub left_out: Vec<SkippedYear>,
    /// The years whose median is the normal.
    pub baseline_years: BaselineYears,
    /// Against the normal, one entry a survey date, the headline's first.
    pub percent_of_median: Vec<PercentOfMedian>,
    /// Cumulative precipitation.
    pub precipitation: RecordPrecipitation,
    /// Some of the years at every level. Found by runs of their own: whoever runs them adds them.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub replayed_years: Option<ReplayedYears>,
}

/// A year in use.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct OwnYear {
    /// The water year.
    pub water_year: i32,
    /// The headline SWE of the basin at the reference, mm.
    pub headline_mm: f64,
    /// Whether it is a baseline year.
    pub is_baseline: bool,
}

/// The record and what was made of it.
#[derive(Clone, Copy)]
pub struct RecordQuestions<'a> {
    /// Its years in use, at least one, run at every level.
    pub years: &'a [RecordYear],
    /// Its years left out.
    pub left_out: &'a [SkippedYear],
    /// Its weather, precipitation corrected for catch.
    pub weather: &'a Series,
    /// Baseline years, of which at least one is in use.
    pub baseline: &'a BaselineYears,
    /// What was measured, the headline SWE first.
    pub measures: &'a [Measure],
    /// Dates.
    pub season: &'a SeasonSettings,
    /// The bands, from the lowest.
    pub bands: &'a [Band],
    /// Warming levels, degC.
    pub levels_c: &'a [f64],
    /// Which of them is the reference.
    pub reference: usize,
}

impl RecordFindings {
    /// Puts every question to the record; nothing where nothing was measured.
    pub fn of(questions: &RecordQuestions<'_>) -> Option<Self> {
        let RecordQuestions { years, left_out, weather, baseline, season, bands, levels_c, .. } = *questions;
        let surveys = &season.survey_dates;
        let own = |year: &RecordYear| OwnYear {
            water_year: year.water_year,
            headline_mm: year.values[0],
            is_baseline: baseline.holds(year.water_year),
        };
        Some(Self {
            headline: questions.measures.first()?.clone(),
            years: years.iter().map(own).collect(),
            left_out: left_out.to_vec(),
            baseline_years: baseline.clone(),
            percent_of_median: percent_of_median(&NormalQuestions {
                years,
                baseline,
                bands,
                levels_c,
                reference: questions.reference,
                surveys,
            }),
            precipitation: RecordPrecipitation::of(weather, season.water_year_starts, *surveys.first()?),
            replayed_years: None,
        })
    }
}
