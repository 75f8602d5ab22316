//! What the reservoir would do under other rules.

use super::super::super::answer::telling_level;
use super::super::super::numbers::{DASH, counted, fixed};
use super::super::super::reader::Reader;
use super::super::super::study::Study;
use super::super::{Figures, levels};
use crate::figures::{LEAST_BROUGHT_BACK, Part, brought_back, change_in_words};
use crate::findings::{Operations, RuleChange};
use maud::{Markup, html};

pub(super) fn section(study: &Study<'_>, found: &Operations, figures: &Figures<'_>) -> Markup {
    let (findings, reader) = (study.findings, study.reader);
    html! { @if found.rule_changes.len() > 1 {
        (super::caution())
        p {
            "The same reservoir and the same realizations under " (counted(found.rule_changes.len() - 1, "change")) " of its rules, one at a time. Refill moved: where the \
             flood-space rule rises, it rises so many days sooner or later; flood space and demand: times a factor. What less space \
             for floods would mean in a flood is not looked at: that takes a study of floods."
        }
        @if let Some(at) = telling_level(findings) { p { (told(found, at, reader.level(findings.levels_c[at]))) } }
        (figures.of(Part::RuleChanges))
        @let measures = found.rule_changes.first().map_or(0, |of| of.measures.len());
        @for measure in 0..measures { (table(study, found, measure, reader)) }
    } }
}

/// What comes back at a level.
fn told(found: &Operations, at: usize, place: String) -> String {
    let Some((change, back)) = brought_back(found, at) else {
        return format!(
            "At {place}, warming takes next to nothing of the reliability by volume, so that there is nothing to bring back."
        );
    };
    let rule = change_in_words(change);
    let percent = |share: f64| format!("{} %", fixed(100.0 * share, 0));
    let range = match (back.q05, back.q95) {
        (Some(low), Some(high)) => {
            format!(" (5–95 % over resampled realizations: {} to {})", percent(low), percent(high))
        }
        _ => String::new(),
    };
    if back.value < LEAST_BROUGHT_BACK {
        return format!(
            "At {place}, none of the changes brings back any of the reliability by volume that warming takes."
        );
    }
    format!(
        "At {place}, {rule} brings back {}{range} of the reliability by volume that warming takes; the same change at the reference \
         would raise it, too.",
        percent(back.value)
    )
}

/// A row a set of rules, a column a level: the median, the change from the rules as stated, what it brings back.
fn table(study: &Study<'_>, found: &Operations, measure: usize, reader: Reader) -> Markup {
    let findings = study.findings;
    let Some(of_measure) = found.rule_changes.first().and_then(|of| of.measures.get(measure)) else {
        return html! {};
    };
    let (title, kind) = (&of_measure.measure.title, of_measure.measure.kind);
    let cell = |of: &RuleChange, level: usize| {
        let Some(at) = of.measures.get(measure).and_then(|found| found.levels.get(level)) else {
            return html! { (DASH) };
        };
        html! {
            (reader.outcome(at.periods.q50, kind))
            @if let Some(shift) = at.shift { br; (reader.change_of(kind, shift.median.value, None)) }
            @if let Some(back) = at.brought_back { br; (fixed(100.0 * back.value, 0)) " % back" }
        }
    };
    html! {
        div.scroll { table {
            caption {
                (crate::figures::sentence(title)) ": median over realizations under each set of rules; below it the median paired change from the \
                 rules as stated at the same level, and how much that is of what warming takes from the reference to this level, where it takes \
                 something."
            }
            thead { tr {
                th scope="col" { "Rules" }
                @for name in levels::names(findings, reader) { th scope="col" { (name) } }
            } }
            tbody { @for of in &found.rule_changes { tr {
                th scope="row" { (change_in_words(of.change)) }
                @for level in 0..findings.levels_c.len() { td { (cell(of, level)) } }
            } } }
        } }
    }
}
