//! What the reservoir would do under other rules.

use super::super::super::answer::telling_level;
use super::super::super::numbers::{DASH, counted, fixed};
use super::super::super::reader::Reader;
use super::super::super::study::Study;
use super::super::{Figures, levels};
use super::value;
use crate::figures::{
    ALL_BROUGHT_BACK, LEAST_BROUGHT_BACK, Part, RELIABILITY, brought_back, change_in_words,
    cost_in_days_above,
};
use crate::findings::{Operations, RuleChange};
use crate::season::Kind;
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
        @if let Some(at) = telling_level(findings) { p { (told(found, [findings.reference, at], &reader.level(findings.levels_c[at]), reader)) } }
        (figures.of(Part::RuleChanges))
        @let measures = found.rule_changes.first().map_or(0, |of| of.measures.len());
        @for measure in 0..measures { (table(study, found, measure, reader)) }
    } }
}

/// What comes back at a level, and what the same change would do at the reference.
fn told(found: &Operations, [reference, at]: [usize; 2], place: &str, reader: Reader) -> String {
    let supplied = found.measure(RELIABILITY).and_then(|of| of.levels.get(reference)?.periods.q50.value());
    if supplied.is_none() {
        return "Nothing is demanded of the reservoir, so that nothing can fall short, and nothing come back.".to_owned();
    }
    let Some((change, back)) = brought_back(found, [reference, at]) else {
        return format!(
            "At {place}, warming takes next to nothing of the reliability by volume, so that there is nothing to bring back."
        );
    };
    if back.value < LEAST_BROUGHT_BACK {
        return format!(
            "At {place}, none of the changes brings back any of the reliability by volume that warming takes."
        );
    }
    let percent = |share: f64| format!("{} %", fixed(100.0 * share, 0));
    let told = if back.value >= ALL_BROUGHT_BACK { "all".to_owned() } else { percent(back.value) };
    let range = match (back.q05, back.q95) {
        (Some(low), Some(high)) => {
            format!(" (5–95 % over resampled realizations: {} to {})", percent(low), percent(high))
        }
        _ => String::new(),
    };
    let of_change = found.rule_changes.iter().find(|of| of.change == change);
    let measure = of_change.and_then(|of| of.measures.iter().find(|of| of.measure.name == RELIABILITY));
    let shift = measure.and_then(|of| of.levels.get(reference)?.shift);
    let at_reference = shift.map_or(String::new(), |shift| {
        let change = reader.change_of(Kind::Share, shift.median.value, None);
        format!("; at the reference the same change of rules makes {change}")
    });
    format!(
        "At {place}, {} brings back {}{range} of the reliability by volume that warming takes{at_reference}.{}",
        change_in_words(change),
        told,
        cost_in_days_above(found, change, at).unwrap_or_default()
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
            (value(reader, kind, at.periods.q50))
            @if let Some(shift) = at.shift { br; (reader.change_of(kind, shift.median.value, None)) }
            @match at.brought_back {
                Some(back) if back.value >= ALL_BROUGHT_BACK => { br; "all back" }
                Some(back) if back.value >= LEAST_BROUGHT_BACK => { br; (fixed(100.0 * back.value, 0)) " % back" }
                _ => {}
            }
        }
    };
    html! {
        div.scroll { table {
            caption {
                (crate::figures::sentence(title)) ": median over realizations under each set of rules; below it the median paired change from the \
                 rules as stated at the same level, and how much that is of what warming takes from the reference to this level, where it takes \
                 something and the change brings some of it back. Where demand is scaled, shortage and reliability are of that demand."
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
