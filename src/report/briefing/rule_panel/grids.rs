//! The tables of the section.

use super::super::super::numbers::{DASH, fixed, precision, signed};
use super::super::super::reader::Reader;
use super::ends_in_words;
use crate::figures::rule_in_words;
use crate::findings::{
    Judged, LevelOfRule, MeasureByRule, OfRule, PanelRule, Rule, RulePanel, Weight, is_at_bound,
};
use crate::season::{Kind, Outcome};
use maud::{Markup, html};

/// How far from the target each ended, and what is then in force.
pub(super) fn tuning(panel: &RulePanel, reader: Reader) -> Markup {
    let day = |day: Outcome| reader.outcome(day, Kind::DayOfWaterYear);
    let factor = |factor: f64| {
        let bound = if is_at_bound(factor) { ", a bound" } else { "" };
        format!("× {}{bound}", fixed(factor, 2))
    };
    html! { div.scroll { table {
        caption { "How each rule was tuned: what the snow's catch and the melt factors were multiplied by, what is then in force, and what the record's own years come to." }
        thead { tr {
            th.text scope="col" { "Rule" } th scope="col" { "Snow's catch" } th scope="col" { "Gauge multiplier of snow" }
            th scope="col" { "Melt factors" } th scope="col" { "In force, " (reader.units.degree_day_factor().word) }
            th scope="col" { "Mean peak SWE, " (reader.units.depth().word) } th scope="col" { "Median melt-out" } th.text scope="col" { "Tuned" }
        } }
        tbody { @for rule in &panel.rules { tr {
            th.text scope="row" { (rule_in_words(rule.rule, reader.units)) }
            td { (factor(rule.tuned.catch_factor)) } td { (fixed(rule.gauge_multiplier_snow, 2)) }
            td { (factor(rule.tuned.melt_factor)) } td { (melt_factors(rule, reader)) }
            td { (reader.amount_bare(rule.tuned.fit.mean_peak_swe_mm)) } td { (day(rule.tuned.fit.median_melt_out_day)) }
            td.text { (is_tuned(panel, rule)) }
        } } }
    } } }
}

fn is_tuned(panel: &RulePanel, rule: &PanelRule) -> &'static str {
    match (rule.rule, rule.tuned.is_tuned, panel.is_tuned_to_peak_alone) {
        (Rule::StudysOwn, ..) => "what others are tuned to",
        (_, true, false) => "yes",
        (_, true, true) => "to the peak alone",
        (_, false, _) => "no",
    }
}

/// `0.50 to 3.50`, `0.25, 2.50 of radiation`.
fn melt_factors(rule: &PanelRule, reader: Reader) -> String {
    let unit = reader.units.degree_day_factor();
    // Of inches a hundredth is too much.
    let decimals = if unit.of(1.0) < 0.5 { 3 } else { 2 };
    let told = |factor: f64| fixed(unit.of(factor), decimals);
    let [lowest, highest] = rule.degree_day_factors.map(told);
    let of_degrees = if lowest == highest { lowest } else { format!("{lowest} to {highest}") };
    rule.radiation_factor
        .map_or(of_degrees.clone(), |radiation| format!("{of_degrees}, {} of radiation", told(radiation)))
}

/// A measure's shifts and ratios, rule by rule, and from which warming on it outweighs.
pub(super) fn shifts(panel: &RulePanel, measure: &MeasureByRule, reader: Reader) -> Markup {
    let kind = measure.measure.kind;
    // Without a level above the reference there is nothing to outweigh from.
    let has_from = measure.rules.iter().any(|rule| rule.judged() != Judged::Unknown);
    let rows = panel.rules.iter().zip(&measure.rules).filter(|(rule, _)| rule.tuned.is_tuned);
    html! { div.scroll { table {
        caption {
            "Median change of " (measure.measure.title) " ± its Monte Carlo error, and times the half precipitation spread it points to, by rule and level"
            @if kind == Kind::AmountMm { ", " (reader.units.depth().word) }
            "; (?) marks what is too near to call."
            @if has_from { " Last: from which warming on it outweighs, with its Monte Carlo range." }
            " As in "
            code { "tables/rule-panel.csv" } "."
        }
        thead { tr {
            th.text scope="col" { "Rule" }
            @for level in &measure.levels { th scope="col" { (reader.level(level.level_c)) } }
            @if has_from { th scope="col" { "Outweighs from" } }
        } }
        tbody { @for (rule, found) in rows { tr {
            th.text scope="row" { (rule_in_words(rule.rule, reader.units)) }
            @for level in &found.levels { td { (cell(level, kind, reader)) } }
            @if has_from { td { (from_where(found, reader)) } }
        } } }
    } } }
}

fn cell(level: &LevelOfRule, kind: Kind, reader: Reader) -> String {
    let Some(shift) = level.shift else { return DASH.to_owned() };
    let (change, error) = (shift.median.value, shift.median.monte_carlo_error);
    let change = match kind {
        // Whole days beside errors of tenths would hide what the rule does.
        Kind::DayOfWaterYear | Kind::ArrivalDay => {
            let error = error.map_or(String::new(), |error| format!(" ± {}", precision(error)));
            format!("{}{error} d", signed(change, 1))
        }
        _ => reader.change_of(kind, change, error),
    };
    let ratio = level.signal_to_spread.map(|ratio| fixed(ratio.value, 2));
    match (ratio, level.weight) {
        (Some(ratio), Weight::CannotTell) => format!("{change}; {ratio} × (?)"),
        (Some(ratio), Weight::NoRatio) => format!("{change}; {ratio} ×, error unknown"),
        (Some(ratio), Weight::Outweighs | Weight::DoesNotOutweigh) => format!("{change}; {ratio} ×"),
        (None, _) => format!("{change}; no ratio"),
    }
}

/// `+1.3 °C (+1.2 to +1.5)`, `cannot tell (+3.8 to above +4.0)`, `not up to +4 °C`.
fn from_where(found: &OfRule, reader: Reader) -> String {
    let range = ends_in_words(found, reader).map_or(String::new(), |range| format!(" ({range})"));
    match found.judged() {
        Judged::Outweighs { level_c, until_c, .. } => {
            let until = until_c.map(|until_c| format!(", until {}", reader.between_levels_bare(until_c)));
            format!("{}{range}{}", reader.between_levels(level_c), until.unwrap_or_default())
        }
        Judged::DoesNot { up_to_c } => format!("not up to {}", reader.level(up_to_c)),
        Judged::CannotTell { .. } => format!("cannot tell{range}"),
        Judged::Unknown => DASH.to_owned(),
    }
}
