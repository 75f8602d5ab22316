//! The answer: the verdict, the questions that a reader asks next, and a line a level.

use super::super::answer::{Answer, chance_in_table, is_scarce, towards_shift};
use super::super::numbers::{DASH, days_moved, fixed, precision, signed};
use super::super::reader::Reader;
use super::super::study::Study;
use crate::findings::{Estimate, Findings, MeasureFindings};
use maud::{Markup, html};

/// The section.
pub(super) fn section(study: &Study<'_>, answer: &Answer) -> Markup {
    html! {
        h2 { "Answer" }
        p.verdict { (answer.verdict) }
        dl { @for asked in &answer.at_a_glance {
            dt { (asked.question) }
            dd { @for sentence in &asked.answer { p { (sentence) } } }
        } }
        @if let Some(headline) = study.findings.basin.first().filter(|headline| !is_scarce(headline)) { (by_level(study.findings, headline, study.reader)) }
    }
}

/// A row a level: how much, against what, how much earlier, and whether chance could hide it.
fn by_level(findings: &Findings, headline: &MeasureFindings, reader: Reader) -> Markup {
    let moved = |name: &str, at: usize| {
        let measure = findings.basin.iter().find(|measure| measure.measure.name == name)?;
        Some(days_moved(measure.levels[at].shift?.median.value))
    };
    let or_dash = |text: Option<String>| text.unwrap_or_else(|| DASH.to_owned());
    let years = findings.years;
    html! {
        div.scroll { table {
            caption {
                "Median changes from the reference. The last two columns: chance that a value of another realization lies \
                 beyond the reference one in the direction of the change, as if the future drew its own weather, and \
                 share of realizations that come back to the reference's median all the same; > and < are 95 % bounds."
            }
            thead { tr {
                th scope="col" { "Warming" }
                th scope="col" { (headline.measure.title) }
                th scope="col" { "Times the" br; "half spread" }
                th scope="col" { "Half of the" br; "net melt" }
                th scope="col" { "Melt-out" }
                th scope="col" { "Beyond an independent" br; "reference " (years) "-year value" }
                th scope="col" { "Back at the" br; "reference's median" }
            } }
            tbody { @for (at, found) in headline.levels.iter().enumerate() { @if let Some(shift) = found.shift { tr {
                th scope="row" { (reader.level(found.level_c)) }
                td {
                    (reader.change(shift.median.value))
                    @if let Some(percent) = found.percent_change { " (" (signed(percent, 0)) " %)" }
                }
                td { (or_dash(found.signal_to_spread.map(ratio))) }
                td { (or_dash(moved("melt_d50_day", at))) }
                td { (or_dash(moved("melt_out_day", at))) }
                @let chances = towards_shift(found);
                td { (or_dash(chances.map(|[beyond, _, _]| chance_in_table(beyond)))) }
                td { (or_dash(chances.map(|[_, _, back]| chance_in_table(back)))) }
            } } } }
        } }
    }
}

/// `1.48 ± 0.09`.
pub(super) fn ratio(ratio: Estimate) -> String {
    let error = ratio.monte_carlo_error.map_or(String::new(), |error| format!(" ± {}", precision(error)));
    format!("{}{error}", fixed(ratio.value, 2))
}
