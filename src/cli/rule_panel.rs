//! The headline again under other rules, each tuned on the record's own years first.

use super::parameter_sets::run_set;
use super::progress::Progress;
use super::ready::Ready;
use crate::ensemble::{BasinSeasons, Halt, Plan, RecordRun, Silent, Watch};
use crate::findings::{Fit, PanelRule, Rule, RulePanel, RuleRuns, Tuned, quantile, retuned, sorted, tune};
use crate::fit::Parameters;
use crate::perturb::Generator;
use crate::report::numbers::counted;
use crate::season::{Kind, MELT_OUT_DAY, Measure};
use crate::snow::CaughtAnew;
use ndarray::{Array3, Axis, Slice};
use rayon::prelude::*;

/// The measure of a year's highest SWE.
const PEAK: &str = "peak_swe_mm";

#[cfg(test)]
mod tests;

/// The panel where the scenario asks for it and there is a level to shift to: the first realizations of the study under every level by
/// each rule, beside those of `own`, the study's runs.
///
/// # Errors
/// Those of a run.
pub(super) fn rule_panel(
    ready: &Ready,
    plan: &Plan<'_>,
    own: &BasinSeasons,
    progress: &Progress,
) -> Result<Option<RulePanel>, Halt> {
    let warming = &ready.scenario.warming;
    let asked = ready.scenario.findings.rule_panel.filter(|_| warming.levels_c.len() > 1);
    let Some(typed) = asked else { return Ok(None) };
    let of_study = plan.realizations as usize;
    let realizations = typed.realizations_of(plan.realizations);
    let all = plan.measures.list();
    let kept: Vec<usize> = (0..all.len()).filter(|at| *at == 0 || all[*at].name == MELT_OUT_DAY).collect();
    let measures: Vec<Measure> = kept.iter().map(|at| all[*at].clone()).collect();
    let plan = Plan { realizations, ..*plan };
    let parameters = ready.scenario.parameters();
    let alternatives = Rule::alternatives(&parameters);
    progress.stage(&format!(
        "tuning {} to the study's own snow, then running {} by each",
        counted(alternatives.len(), "other rule"),
        counted(realizations as usize, "realization")
    ));
    let target = fit(ready)?;
    let tuned = |(rule, of): &(Rule, Parameters)| {
        let run = |factors: [f64; 2]| {
            if progress.wants_stop() { Err(Halt::Stopped) } else { fit(&ready.with(&retuned(of, factors))) }
        };
        let tuned = tune(&target, run)?;
        Ok((*rule, tuned, retuned(of, [tuned.catch_factor, tuned.melt_factor])))
    };
    let tuned: Vec<(Rule, Tuned, Parameters)> =
        alternatives.par_iter().map(tuned).collect::<Result<_, Halt>>()?;
    let same = Slice::from(..realizations as usize);
    let untouched = Tuned { catch_factor: 1.0, melt_factor: 1.0, fit: target, is_tuned: true };
    let mut runs = vec![RuleRuns {
        rule: in_force(Rule::StudysOwn, untouched, &parameters),
        periods: own.periods.select(Axis(1), &kept).slice_axis(Axis(2), same).to_owned(),
    }];
    // Made once for all rules, so that rows differ by the rule and not by what a fit makes of other amounts.
    let drawn = ready.recipe().of(&ready.drawn_from);
    for (rule, tuned, parameters) in &tuned {
        let periods = periods(&ready.with(parameters), (ready, &*drawn), &plan, &kept, progress)?;
        runs.push(RuleRuns { rule: in_force(*rule, *tuned, parameters), periods });
    }
    let levels = (warming.levels_c.as_slice(), warming.reference);
    let counts = (of_study, ready.weather.years.len());
    Ok(RulePanel::of(&measures, &runs, counts, levels, ready.scenario.seed))
}

fn in_force(rule: Rule, tuned: Tuned, parameters: &Parameters) -> PanelRule {
    let snow = &parameters.snow;
    PanelRule {
        rule,
        tuned,
        gauge_multiplier_snow: parameters.gauge.snow,
        degree_day_factors: [snow.degree_day_factor_lowest, snow.degree_day_factor_highest],
        radiation_factor: snow.options.radiation.map(|radiation| radiation.factor_mm_per_c_day),
    }
}

/// Period values of the basin by a rule, `[level][measure][realization]`. They do not count on the bar, which has ended.
///
/// Years of the record are taken as the rule corrects them. Weather that is drawn day by day is the study's own, `drawn`, each of its days
/// caught anew.
fn periods(
    of_rule: &Ready,
    (own, drawn): (&Ready, &dyn Generator),
    plan: &Plan<'_>,
    kept: &[usize],
    progress: &Progress,
) -> Result<Array3<f64>, Halt> {
    if progress.wants_stop() {
        return Err(Halt::Stopped);
    }
    let takes_years = drawn.drawn(0, 1).is_some();
    let of_years = takes_years.then(|| of_rule.recipe().of(&of_rule.drawn_from));
    let caught_anew = CaughtAnew { generator: drawn, before: own.catch(), after: of_rule.catch() };
    let made: &dyn Generator = match &of_years {
        Some(of_years) => &**of_years,
        None => &caught_anew,
    };
    let seasons = run_set(of_rule, made, plan, &Silent)?;
    Ok(seasons.periods.select(Axis(1), kept))
}

/// Mean peak and median melt-out of the record's own years at the reference.
fn fit(ready: &Ready) -> Result<Fit, Halt> {
    let warming = &ready.scenario.warming;
    let change = &ready.changes()[warming.reference..=warming.reference];
    let measures = ready.measures();
    let run = RecordRun {
        lanes: &ready.lanes(change),
        levels: 1,
        reference: 0,
        bands: ready.basin.bands.len(),
        measures: &measures,
    };
    let years = run.years(&ready.weather)?;
    let values = |name: &str| -> Vec<f64> {
        let at = measures.list().iter().position(|measure| measure.name == name);
        years.iter().filter_map(|year| Some(year.values[at?])).collect()
    };
    let peaks = values(PEAK);
    let median = quantile(&sorted(values(MELT_OUT_DAY)), 0.5);
    Ok(Fit {
        mean_peak_swe_mm: peaks.iter().sum::<f64>() / peaks.len() as f64,
        median_melt_out_day: Kind::DayOfWaterYear.outcome(median),
    })
}
