//! Tables level by level: some measures of the basin, a row each.

use super::super::numbers::{DASH, counted, fixed, signed};
use super::super::reader::Reader;
use super::super::study::Study;
use crate::findings::{Findings, LevelFindings, MeasureFindings};
use crate::season::Outcome;
use maud::{Markup, html};

/// `reference`, `+1 °C`, ...: the columns of a table by level.
pub(super) fn names(findings: &Findings, reader: Reader) -> Vec<String> {
    let levels = findings.levels_c.iter().enumerate();
    levels
        .map(
            |(at, level_c)| {
                if at == findings.reference { "reference".to_owned() } else { reader.level(*level_c) }
            },
        )
        .collect()
}

/// A row for each of the basin's measures that are asked for.
pub(super) fn table(study: &Study<'_>, is_asked: impl Fn(&MeasureFindings) -> bool) -> Markup {
    let (findings, reader) = (study.findings, study.reader);
    html! {
        div.scroll { table {
            caption {
                "Basin mean, median over the " (findings.years) "-year values of " (counted(findings.realizations, "realization"))
                "; below it the median paired change from the reference ± its Monte Carlo error, in the same unit (points are \
                 percentage points), its percentage, and how many times the half spread it is."
            }
            thead { tr {
                th scope="col" { "Measure" }
                @for name in names(findings, reader) { th scope="col" { (name) } }
            } }
            tbody { @for measure in findings.basin.iter().filter(|measure| is_asked(measure)) { tr {
                th scope="row" { (measure.measure.title) }
                @for at in &measure.levels { td { (cell(reader, measure, at)) } }
            } } }
        } }
    }
}

fn cell(reader: Reader, measure: &MeasureFindings, at: &LevelFindings) -> Markup {
    let kind = measure.measure.kind;
    let undefined = [
        (at.periods.none, Outcome::None),
        (at.periods.not_gone, Outcome::NotGone),
        (at.periods.not_reached, Outcome::NotReached),
    ];
    let undefined: Vec<String> = undefined
        .into_iter()
        .filter(|(count, _)| *count > 0)
        .map(|(count, outcome)| format!("{count} {}", reader.outcome(outcome, kind)))
        .collect();
    html! {
        (reader.outcome(at.periods.q50, kind))
        @if let Some(shift) = at.shift {
            br;
            (reader.change_of(kind, shift.median.value, shift.median.monte_carlo_error))
            br;
            @if let Some(percent) = at.percent_change { (signed(percent, 0)) " %, " }
            @match at.signal_to_spread { Some(ratio) => { (fixed(ratio.value, 2)) " ×" } None => { (DASH) } }
        }
        @if !undefined.is_empty() { br; (undefined.join(", ")) }
    }
}
