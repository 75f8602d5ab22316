//! Whether the answer is the model's choice: the headline under other published rules.

use super::super::answer::{is_scarce, telling_level};
use super::super::numbers::{DASH, counted, fixed, signed};
use super::super::reader::Reader;
use super::super::study::Study;
use super::Figures;
use crate::figures::{Part, rule_in_words, sentence};
use crate::findings::{LevelOverRules, MeasureByRule, PanelRule, RulePanel, Weight};
use crate::season::{Kind, Outcome};
use maud::{Markup, html};

/// The section; nothing where no panel was asked for, or there is hardly any snow.
pub(super) fn section(study: &Study<'_>, figures: &Figures<'_>) -> Markup {
    let findings = study.findings;
    let has_snow = findings.basin.first().is_some_and(|headline| !is_scarce(headline));
    let panel = findings.rule_panel.as_ref().filter(|_| has_snow);
    let told_c = telling_level(findings).map(|at| findings.levels_c[at]);
    html! { @if let Some(panel) = panel {
        h2 { "If the model's rules were others" }
        p { (what_was_run(panel, study.reader)) }
        @for measure in &panel.measures { @for said in answers(panel, measure, told_c, study.reader) { p { (said) } } }
        (figures.of(Part::Rules))
        (tuning(panel, study.reader))
        @for measure in &panel.measures { (table(panel, measure, study.reader)) }
    } }
}

fn what_was_run(panel: &RulePanel, reader: Reader) -> String {
    let tuned = panel.alternatives_tuned;
    let all = panel.alternatives;
    let left: Vec<String> = names(panel, reader, |rule| !rule.tuned.is_tuned);
    let left = if left.is_empty() {
        String::new()
    } else {
        format!(" Not tuned, and in no range: {}.", left.join("; "))
    };
    format!(
        "{} beside the study's own, {} of each, the same under all. Each was first tuned to the study's own snow, by the catch of snow and the \
         melt factors, until its mean peak SWE over {} of the record came within {} % and its median melt-out within {} of the study's own: \
         {tuned} of {all} did.{left}",
        sentence(&counted(all, "published rule")),
        counted(panel.realizations, "realization"),
        counted(panel.years_of_record, "year"),
        fixed(panel.peak_tolerance_pct, 0),
        counted(panel.melt_out_tolerance_days as usize, "day"),
    )
}

fn names(panel: &RulePanel, reader: Reader, is_told: impl Fn(&PanelRule) -> bool) -> Vec<String> {
    let told = panel.rules.iter().filter(|rule| is_told(rule));
    told.map(|rule| rule_in_words(rule.rule, reader.units)).collect()
}

/// Whether the verdict holds, and how wide the rules' range is beside that of the realizations.
fn answers(panel: &RulePanel, measure: &MeasureByRule, told_c: Option<f64>, reader: Reader) -> Vec<String> {
    if panel.alternatives_tuned == 0 {
        return vec![
            "No other rule could be tuned to the study's snow, so that nothing can be said of them."
                .to_owned(),
        ];
    }
    let mut said = vec![holds(panel, measure, reader)];
    let level = measure.levels.iter().enumerate().find(|(_, level)| Some(level.level_c) == told_c);
    said.extend(level.and_then(|(at, level)| beside_chance(measure, at, level, reader)));
    said
}

/// At which levels another rule says the opposite, or what is said cannot be told.
fn holds(panel: &RulePanel, measure: &MeasureByRule, reader: Reader) -> String {
    let title = &measure.measure.title;
    let listed = |of: &[usize]| -> String {
        if of.len() > 2 && of.len() == panel.rules.len() {
            return "every rule".to_owned();
        }
        let names: Vec<String> = of
            .iter()
            .filter_map(|at| panel.rules.get(*at))
            .map(|rule| rule_in_words(rule.rule, reader.units))
            .collect();
        names.join("; ")
    };
    let at = |is_told: fn(&&LevelOverRules) -> bool, of: fn(&LevelOverRules) -> &[usize]| -> Vec<String> {
        let told = measure.levels.iter().filter(is_told);
        told.map(|level| format!("at {} under {}", reader.level(level.level_c), listed(of(level)))).collect()
    };
    let against = at(|level| !level.against.is_empty(), |level| &level.against);
    let open = at(|level| !level.cannot_tell.is_empty(), |level| &level.cannot_tell);
    let alternatives = counted(panel.alternatives_tuned, "alternative");
    let first = match (against.is_empty(), open.is_empty()) {
        (true, true) => format!(
            "{title}: whether the shift outweighs the precipitation spread is answered alike under all {alternatives}, at every level."
        ),
        (true, false) => format!(
            "{title}: no alternative of {} says the opposite of the study's own rules at any level.",
            fixed(panel.alternatives_tuned as f64, 0)
        ),
        (false, _) => format!("{title}: the answer changes {}.", against.join(", and ")),
    };
    let open = if open.is_empty() {
        String::new()
    } else {
        format!(
            " Too near to call, its 90 % Monte Carlo interval on both sides of 1: {}.",
            open.join(", and ")
        )
    };
    sentence(&first) + &open
}

fn beside_chance(
    measure: &MeasureByRule,
    at: usize,
    level: &LevelOverRules,
    reader: Reader,
) -> Option<String> {
    let kind = measure.measure.kind;
    let own = measure.rules.first()?.levels.get(at)?.shift?;
    let range = level.shift?;
    let between = |low: f64, high: f64| match kind {
        Kind::AmountMm => reader.change_and_change(low, high),
        _ => format!("{} and {} days", signed(low, 1), signed(high, 1)),
    };
    let ratio = level.signal_to_spread.map_or(String::new(), |ratio| {
        format!(
            ", which is {} to {} times the half precipitation spread of the rule",
            fixed(ratio.lowest, 2),
            fixed(ratio.highest, 2)
        )
    });
    Some(format!(
        "At {}, {} changes by between {} whichever rule is right{ratio}. Beside that, under the study's own rules 90 % of the realizations change \
         by between {}, each against itself.",
        reader.level(level.level_c),
        measure.measure.title,
        between(range.lowest, range.highest),
        between(own.q05, own.q95)
    ))
}

/// How far from the target each ended.
fn tuning(panel: &RulePanel, reader: Reader) -> Markup {
    let day = |day: Outcome| reader.outcome(day, Kind::DayOfWaterYear);
    html! { div.scroll { table {
        caption { "How each rule was tuned: what the snow's catch and the melt factors were multiplied by, and what the record's own years then come to." }
        thead { tr {
            th.text scope="col" { "Rule" } th scope="col" { "Catch" } th scope="col" { "Melt factors" }
            th scope="col" { "Mean peak SWE, " (reader.units.depth().word) } th scope="col" { "Median melt-out" } th.text scope="col" { "Tuned" }
        } }
        tbody { @for rule in &panel.rules { tr {
            th.text scope="row" { (rule_in_words(rule.rule, reader.units)) }
            td { "× " (fixed(rule.tuned.catch_factor, 2)) } td { "× " (fixed(rule.tuned.melt_factor, 2)) }
            td { (reader.amount_bare(rule.tuned.fit.mean_peak_swe_mm)) } td { (day(rule.tuned.fit.median_melt_out_day)) }
            td.text { (if rule.tuned.is_tuned { "yes" } else { "no" }) }
        } } }
    } } }
}

/// A measure's shifts and ratios, rule by rule.
fn table(panel: &RulePanel, measure: &MeasureByRule, reader: Reader) -> Markup {
    let kind = measure.measure.kind;
    html! { div.scroll { table {
        caption {
            "Median change of " (measure.measure.title) " ± its Monte Carlo error, and times the half precipitation spread it points to, by rule and level"
            @if kind == Kind::AmountMm { ", " (reader.units.depth().word) } ". As in " code { "tables/rule-panel.csv" } "."
        }
        thead { tr { th.text scope="col" { "Rule" } @for level in &measure.levels { th scope="col" { (reader.level(level.level_c)) } } } }
        tbody { @for (rule, found) in panel.rules.iter().zip(&measure.rules) { tr {
            th.text scope="row" { (rule_in_words(rule.rule, reader.units)) }
            @for level in &found.levels { td {
                (level.shift.map_or(DASH.to_owned(), |shift| reader.change_of(kind, shift.median.value, shift.median.monte_carlo_error)))
                @if let Some(ratio) = level.signal_to_spread {
                    "; " (fixed(ratio.value, 2)) " ×" @if level.weight == Weight::CannotTell { " (?)" }
                }
            } }
        } } }
    } } }
}
