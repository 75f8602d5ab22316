//! Operations: what becomes of the water at every level, and whether warming outweighs precipitation in it.
//!
//! Every measure of inflow and storage is asked what every measure of snow is asked ([`MeasureFindings`]); beside that stand what
//! other rules would change ([`RuleChange`]), how years sort into the user's classes ([`YearClasses`]), and how well the snow foretells
//! the inflow ([`Outlook`]).

mod outlook;
mod rule_changes;
mod year_classes;

pub use outlook::{Outlook, OutlookLevel};
pub use rule_changes::{ChangedLevel, ChangedMeasure, RuleChange};
pub use year_classes::{YearClasses, YearClassesLevel};

use super::measure::{Asked, MeasureFindings};
use super::resample::Resamples;
use super::yardstick::Levels;
use crate::ensemble::OperatedSeasons;
use crate::fit::InflowSkill;
use crate::season::{Measure, NONE, NOT_REACHED};
use ndarray::{ArrayView2, ArrayView3, Axis};
use rayon::prelude::*;
use serde::Serialize;

/// What the findings need to know beside the runs.
#[derive(Debug, Clone, Copy)]
pub struct OperationsQuestions<'a> {
    /// Warming levels, ascending, degC.
    pub levels_c: &'a [f64],
    /// Which of them is the reference.
    pub reference: usize,
    /// Area of the basin, km2.
    pub area_km2: f64,
    /// Seed of the study, for the Monte Carlo error.
    pub seed: u64,
    /// Whether inflow was observed.
    pub inflow_is_observed: bool,
    /// Volumes of the first window at which one class of years ends and the next begins, ascending, hm3.
    pub year_class_limits_hm3: &'a [f64],
    /// Which of the windows the survey date's snow may foretell: one that does not begin before it.
    pub foretold_window: Option<usize>,
    /// What inflow is called: what was not observed is not called so.
    pub word: &'a str,
    /// The name of the reservoir, if there is one.
    pub reservoir: Option<&'a str>,
    /// What it can hold, and may.
    pub pool: Option<&'a PoolShown>,
    /// The headline's name, and its single years, `[level][realization][year]`.
    pub headline: (&'a Measure, ArrayView3<'a, f64>),
}

/// What a reservoir can hold, and how much of that it may.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct PoolShown {
    /// The most that it holds, hm3.
    pub capacity_hm3: f64,
    /// What lies below its outlets, hm3.
    pub dead_hm3: f64,
    /// The flood-space rule: what storage is not to exceed on each day of a water year of 365 days, from its first, hm3; empty where
    /// no space is kept.
    #[serde(skip_serializing_if = "Vec::is_empty")]
    pub not_above_hm3: Vec<f64>,
}

/// What becomes of the water.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Operations {
    /// Whether inflow was observed; where not, it is called water input, routed.
    pub inflow_is_observed: bool,
    /// What it is called.
    pub word: String,
    /// The name of the reservoir.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub reservoir: Option<String>,
    /// What it can hold, and may.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub pool: Option<PoolShown>,
    /// Of every year's inflow, the first window's volume first.
    pub inflow: Vec<MeasureFindings>,
    /// Of every year's storage.
    #[serde(skip_serializing_if = "Vec::is_empty")]
    pub storage: Vec<MeasureFindings>,
    /// Of whole realizations: reliability, resilience, vulnerability.
    #[serde(skip_serializing_if = "Vec::is_empty")]
    pub performance: Vec<MeasureFindings>,
    /// The rules as stated, and others.
    #[serde(skip_serializing_if = "Vec::is_empty")]
    pub rule_changes: Vec<RuleChange>,
    /// The user's classes of years.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub year_classes: Option<YearClasses>,
    /// What the snow foretells.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub outlook: Option<Outlook>,
    /// How near modelled inflow of the record's own years comes to observed inflow; none where none was observed.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub inflow_skill: Option<InflowSkill>,
}

impl Operations {
    /// Answers every question; `held` are the reference's runs with temperatures held.
    pub fn of(
        operated: &OperatedSeasons,
        held: Option<&OperatedSeasons>,
        questions: &OperationsQuestions<'_>,
    ) -> Self {
        let realizations = operated.periods.dim().2;
        let resamples = Resamples::new(questions.seed, realizations);
        let levels = Levels { levels_c: questions.levels_c, reference: questions.reference };
        let yearly = |at: usize| {
            let years = operated.years.index_axis(Axis(1), at);
            let of_level = |level: usize| years.index_axis_move(Axis(0), level);
            let asked = Asked {
                measure: &operated.yearly[at],
                periods: operated.periods.index_axis(Axis(1), at),
                undefined: (0..levels.levels_c.len()).map(|level| undefined(&of_level(level))).collect(),
                held: held.map(|held| held.periods.index_axis(Axis(0), 0).index_axis_move(Axis(0), at)),
                years: Some((years, questions.area_km2)),
            };
            asked.find(levels, &resamples).findings
        };
        let whole = |at: usize| {
            let asked = Asked {
                measure: &operated.over_years[at],
                periods: operated.wholes.index_axis(Axis(1), at),
                undefined: vec![[0, 0]; levels.levels_c.len()],
                held: held.map(|held| held.wholes.index_axis(Axis(0), 0).index_axis_move(Axis(0), at)),
                years: None,
            };
            asked.find(levels, &resamples).findings
        };
        let mut inflow: Vec<MeasureFindings> =
            (0..operated.yearly.len()).into_par_iter().map(yearly).collect();
        let is_of_inflow = |found: &MeasureFindings| found.measure.name.starts_with("inflow_");
        let of_storage = inflow.iter().position(|found| !is_of_inflow(found)).unwrap_or(inflow.len());
        let storage = inflow.split_off(of_storage);
        let window =
            operated.yearly.iter().position(|measure| measure.is_volume && measure.name.contains("_to_"));
        let volumes = window.map(|at| operated.years.index_axis(Axis(1), at));
        Self {
            inflow_is_observed: questions.inflow_is_observed,
            word: questions.word.to_owned(),
            reservoir: questions.reservoir.map(str::to_owned),
            pool: questions.pool.cloned(),
            storage,
            performance: (0..operated.over_years.len()).into_par_iter().map(whole).collect(),
            rule_changes: rule_changes::rule_changes(operated, levels, &resamples),
            year_classes: window.zip(volumes).and_then(|(at, volumes)| {
                let limits = questions.year_class_limits_hm3;
                YearClasses::of(&operated.yearly[at], &volumes, limits, levels, &resamples)
            }),
            outlook: questions.foretold_window.and_then(|at| {
                let volumes = operated.years.index_axis(Axis(1), at);
                let measures = [questions.headline.0, &operated.yearly[at]];
                Outlook::of(measures, [questions.headline.1, volumes], levels, &resamples)
            }),
            inflow,
            inflow_skill: None,
        }
    }

    /// A measure of any of its lists, by name.
    pub fn measure(&self, name: &str) -> Option<&MeasureFindings> {
        let mut all = self.inflow.iter().chain(&self.storage).chain(&self.performance);
        all.find(|found| found.measure.name == name)
    }
}

/// Years with nothing to measure, and years in which what was waited for did not come.
fn undefined(years: &ArrayView2<'_, f64>) -> [usize; 2] {
    [NONE, NOT_REACHED].map(|what| years.iter().filter(|value| **value == what).count())
}
