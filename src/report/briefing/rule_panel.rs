//! Whether the answer is the model's choice: the headline under other rules.

mod answers;
mod grids;

use super::super::answer::{is_scarce, telling_level};
use super::super::numbers::{counted, fixed, signed, trimmed};
use super::super::reader::Reader;
use super::super::study::Study;
use super::Figures;
use crate::figures::{Part, rule_in_words, sentence};
use crate::findings::{MeasureByRule, OfRule, PanelRule, RulePanel, is_at_bound};
use crate::season::{Kind, MELT_OUT_DAY};
use maud::{Markup, html};

/// The section; nothing where no panel was asked for, or there is hardly any snow.
pub(super) fn section(study: &Study<'_>, figures: &Figures<'_>) -> Markup {
    let findings = study.findings;
    let has_snow = findings.basin.first().is_some_and(|headline| !is_scarce(headline));
    let panel = findings.rule_panel.as_ref().filter(|_| has_snow);
    let told_c = telling_level(findings).map(|at| findings.levels_c[at]);
    html! { @if let Some(panel) = panel {
        p { (what_was_run(panel, study.reader)) }
        @if panel.alternatives_tuned == 0 {
            p { "No other rule could be tuned to the study's own snow, so that the page says nothing of other rules." }
        } @else {
            @for measure in told(panel) { @for said in answers::answers(panel, measure, told_c, study.reader) { p { (said) } } }
        }
        (figures.of(Part::Rules))
        (grids::tuning(panel, study.reader))
        @if panel.alternatives_tuned > 0 { @for measure in told(panel) { (grids::shifts(panel, measure, study.reader)) } }
    } }
}

/// What the page tells of: melt-out only where the rules were tuned to one.
fn told(panel: &RulePanel) -> impl Iterator<Item = &MeasureByRule> {
    panel.measures.iter().filter(|of| !panel.is_tuned_to_peak_alone || of.measure.name != MELT_OUT_DAY)
}

fn what_was_run(panel: &RulePanel, reader: Reader) -> String {
    let all = panel.alternatives;
    let runs = match (panel.realizations, panel.realizations_of_study) {
        (some, of_study) if some < of_study => {
            format!("the study's first {} of {}", fixed(some as f64, 0), counted(of_study, "realization"))
        }
        (1, _) => "the study's 1 realization".to_owned(),
        (all, _) => format!("all {} of the study", counted(all, "realization")),
    };
    let [least, greatest] = panel.factor_bounds.map(|bound| trimmed(&fixed(bound, 2)).to_owned());
    let peak = format!(
        "mean peak SWE over {} of the record within {} %",
        counted(panel.years_of_record, "year"),
        fixed(panel.peak_tolerance_pct, 0)
    );
    let (factors, goal) = if panel.is_tuned_to_peak_alone {
        ("a factor on the snow's catch was", format!("brings its {peak} of the study's own"))
    } else {
        let days = counted(panel.melt_out_tolerance_days as usize, "day");
        (
            "factors on the snow's catch and on the melt factors were",
            format!("bring its {peak}, and its median melt-out within {days}, of the study's own"),
        )
    };
    let alone = if panel.is_tuned_to_peak_alone {
        " The study's own snow has no median melt-out, so that nothing ties down the melt factors: they are left as they are, rules are tuned to the \
         peak alone, and nothing is said of melt-out."
    } else {
        ""
    };
    format!(
        "{} beside the study's own, by {runs}, the same under each. For each rule {factors} looked for, between × {least} and × {greatest}, that \
         {goal}: found for {} of {all}.{alone}{}",
        sentence(&counted(all, "other rule")),
        panel.alternatives_tuned,
        left_out(panel, reader)
    )
}

/// Which rules were not tuned, and why not where that can be told.
fn left_out(panel: &RulePanel, reader: Reader) -> String {
    let left: Vec<&PanelRule> = panel.rules.iter().filter(|rule| !rule.tuned.is_tuned).collect();
    if left.is_empty() {
        return String::new();
    }
    let at_bound = left.iter().any(|rule| is_at_bound(rule.tuned.catch_factor));
    let why = if at_bound {
        " Where the snow's catch stands at its bound, too little of what falls at the gauge is snow for its catch to bring the peak there."
    } else {
        ""
    };
    let names: Vec<String> = left.iter().map(|rule| rule_in_words(rule.rule, reader.units)).collect();
    let left = names.join(", ");
    format!(" Not found, and told of in tables/rule-panel.csv alone: {left}.{why}")
}

/// `+1.2 to +1.5`, `+3.8 to above +4.0`: the Monte Carlo range of the warming from which a shift outweighs its spread; nothing where that is one.
fn ends_in_words(found: &OfRule, reader: Reader) -> Option<String> {
    let highest_c = found.levels.last()?.level_c;
    let end = |at_c: Option<f64>| match at_c {
        Some(at_c) => reader.between_levels_bare(at_c),
        None => format!("above {}", reader.between_levels_bare(highest_c)),
    };
    let range = found.outweighs_range?;
    let [low, high] = [range.q05_c, range.q95_c].map(end);
    (low != high).then(|| format!("{low} to {high}"))
}

/// `−159 to −123 mm`, `−12.5 to −11.0 days`: two changes of a measure, or one where they are told alike.
fn range_of_changes(kind: Kind, low: f64, high: f64, reader: Reader) -> String {
    let both = match kind {
        Kind::AmountMm => reader.change_and_change(low, high),
        _ => format!("{} and {} days", signed(low, 1), signed(high, 1)),
    };
    match both.split_once(" and ") {
        Some((first, last)) if last.split(' ').next() != Some(first) => format!("{first} to {last}"),
        Some((_, last)) => last.to_owned(),
        None => both,
    }
}

#[cfg(test)]
mod tests;
