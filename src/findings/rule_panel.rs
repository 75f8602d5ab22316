//! The headline under other rules: how much of the answer is the model's choice.
//!
//! Every rule is first tuned to the study's own snow of the record, so that none differs by a worse fit; one that cannot be is named and
//! stands in no range.

mod over_rules;
mod rule;
mod tuning;

pub use over_rules::{LevelOverRules, OutweighsOverRules, RangeOverRules, Weight};
pub use rule::{Rule, retuned};
pub use tuning::{FACTOR_BOUNDS, Fit, MELT_OUT_TOLERANCE_DAYS, PEAK_TOLERANCE_PCT, Tuned, is_at_bound, tune};

use super::crossing::{Crossing, CrossingRange, Judged, judged};
use super::measure::{Asked, MeasureFindings};
use super::resample::{Estimate, Resamples};
use super::shift::Shift;
use super::spread::Spread;
use super::yardstick::Levels;
use crate::season::Measure;
use ndarray::{Array3, Axis};
use serde::Serialize;

/// Some realizations under every level by one rule.
#[derive(Debug, Clone, PartialEq)]
pub struct RuleRuns {
    /// The rule, and what was tuned.
    pub rule: PanelRule,
    /// Period values of the basin, `[level][measure][realization]`, the same realizations in all.
    pub periods: Array3<f64>,
}

/// A rule of the panel.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct PanelRule {
    /// What it changes.
    #[serde(flatten)]
    pub rule: Rule,
    /// How it was tuned.
    #[serde(flatten)]
    pub tuned: Tuned,
    /// Gauge multiplier of snow in force.
    pub gauge_multiplier_snow: f64,
    /// Lowest and highest degree-day factor in force, mm per degC and day.
    pub degree_day_factors: [f64; 2],
    /// Factor of radiation in force, mm per degC and day, where there is one.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub radiation_factor: Option<f64>,
}

/// The headline and melt-out, rule by rule.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct RulePanel {
    /// Realizations of each rule, the first of the study.
    pub realizations: usize,
    /// Realizations of the study.
    pub realizations_of_study: usize,
    /// Years of the record that rules were tuned on.
    pub years_of_record: usize,
    /// What they were tuned to: the study's own.
    pub target: Fit,
    /// Whether the target has no melt-out to tune to, so that the peak alone ties a rule down.
    pub is_tuned_to_peak_alone: bool,
    /// How near counts as tuned, percent of the peak.
    pub peak_tolerance_pct: f64,
    /// How near counts as tuned, days of melt-out.
    pub melt_out_tolerance_days: f64,
    /// Least and greatest factor that either search may come to.
    pub factor_bounds: [f64; 2],
    /// How a ratio's 90 % interval is made.
    pub interval: &'static str,
    /// Rules beside the study's own.
    pub alternatives: usize,
    /// Those of them that were tuned.
    pub alternatives_tuned: usize,
    /// The rules, the study's own first.
    pub rules: Vec<PanelRule>,
    /// One entry a measure, the headline's first.
    pub measures: Vec<MeasureByRule>,
}

/// A measure of the basin, rule by rule.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct MeasureByRule {
    /// The measure.
    pub measure: Measure,
    /// In the order of the rules.
    pub rules: Vec<OfRule>,
    /// From which warming on the shift outweighs the spread, over the rules that were tuned, the study's own among them.
    pub outweighs: OutweighsOverRules,
    /// One entry a level but the reference: the same rules.
    pub levels: Vec<LevelOverRules>,
}

/// What a rule answers.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct OfRule {
    /// Spread over the realizations at the reference.
    pub precipitation_spread: Option<Spread>,
    /// From which warming on the shift outweighs it.
    pub outweighs: Crossing,
    /// Monte Carlo range of that warming.
    pub outweighs_range: Option<CrossingRange>,
    /// One entry a level but the reference.
    pub levels: Vec<LevelOfRule>,
}

/// What a rule answers at a level.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct LevelOfRule {
    /// The level, degC.
    pub level_c: f64,
    /// Paired change from the reference.
    pub shift: Option<Shift>,
    /// The median change as a percentage of the rule's own reference median.
    pub percent_change: Option<f64>,
    /// Shift over the half of the rule's own spread that it points to.
    pub signal_to_spread: Option<Estimate>,
    /// What the ratio says, as far as its interval tells.
    pub weight: Weight,
}

impl RulePanel {
    /// Puts the questions to the runs of a study with so many realizations, the study's own first; none without it, without another, or
    /// without a level to shift to.
    pub fn of(
        measures: &[Measure],
        runs: &[RuleRuns],
        (realizations_of_study, years_of_record): (usize, usize),
        (levels_c, reference): (&[f64], usize),
        seed: u64,
    ) -> Option<Self> {
        let own = runs.first().filter(|_| runs.len() > 1 && levels_c.len() > 1)?;
        let realizations = own.periods.len_of(Axis(2));
        let resamples = Resamples::new(seed, realizations);
        let levels = Levels { levels_c, reference };
        let is_tuned: Vec<bool> = runs.iter().map(|runs| runs.rule.tuned.is_tuned).collect();
        let of_measure = |(at, measure): (usize, &Measure)| {
            let of_rule = |runs: &RuleRuns| {
                let asked = Asked {
                    measure,
                    periods: runs.periods.index_axis(Axis(1), at),
                    // Single years are not kept of rules.
                    undefined: vec![[0, 0]; levels_c.len()],
                    held: None,
                    years: None,
                };
                OfRule::of(&asked.find(levels, &resamples).findings, reference)
            };
            let rules: Vec<OfRule> = runs.iter().map(of_rule).collect();
            let levels = (0..levels_c.len() - 1).filter_map(|at| LevelOverRules::of(&rules, &is_tuned, at));
            MeasureByRule {
                measure: measure.clone(),
                outweighs: OutweighsOverRules::of(&rules, &is_tuned),
                levels: levels.collect(),
                rules,
            }
        };
        let target = own.rule.tuned.fit;
        Some(Self {
            realizations,
            realizations_of_study,
            years_of_record,
            target,
            is_tuned_to_peak_alone: target.median_melt_out_day.value().is_none(),
            peak_tolerance_pct: PEAK_TOLERANCE_PCT,
            melt_out_tolerance_days: MELT_OUT_TOLERANCE_DAYS,
            factor_bounds: FACTOR_BOUNDS,
            interval: "5 and 95 % quantiles of the ratio over 400 resamples of whole realizations",
            alternatives: runs.len() - 1,
            alternatives_tuned: is_tuned[1..].iter().filter(|is_tuned| **is_tuned).count(),
            rules: runs.iter().map(|runs| runs.rule).collect(),
            measures: measures.iter().enumerate().map(of_measure).collect(),
        })
    }
}

impl OfRule {
    /// What these realizations and others of the same kind say together.
    pub fn judged(&self) -> Judged {
        judged(self.outweighs, self.outweighs_range)
    }

    fn of(found: &MeasureFindings, reference: usize) -> Self {
        let others = found.levels.iter().enumerate().filter(|(at, _)| *at != reference);
        Self {
            precipitation_spread: found.precipitation_spread,
            outweighs: found.outweighs,
            outweighs_range: found.outweighs_range,
            levels: others
                .map(|(_, level)| LevelOfRule {
                    level_c: level.level_c,
                    shift: level.shift,
                    percent_change: level.percent_change,
                    signal_to_spread: level.signal_to_spread,
                    weight: Weight::of(level.signal_to_spread, level.signal_to_spread_range),
                })
                .collect(),
        }
    }
}
