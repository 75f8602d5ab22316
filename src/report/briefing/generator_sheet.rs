//! The weather that was made: whether it looks like the record.

use super::super::generator_sheet::{Cells, sentences};
use super::super::reader::Reader;
use super::super::study::Study;
use super::Figures;
use crate::figures::{Part, sentence};
use crate::findings::{GeneratorSheet, SheetLine, SheetStatistic, Subject};
use maud::{Markup, html};

/// The section's address on the page.
pub(super) const ADDRESS: &str = "generator-sheet";

/// Subjects whose every line stands on the page: the snow, and the years that bring it.
const ALWAYS_TOLD: [Subject; 2] = [Subject::SurveySwe, Subject::Totals];

/// The section; nothing without a sheet.
pub(super) fn section(study: &Study<'_>, figures: &Figures<'_>) -> Markup {
    html! { @if let Some(sheet) = &study.findings.generator {
        @for said in sentences(sheet, study.reader) { p { (said) } }
        (figures.of(Part::Weather))
        (table("The snow, and the years that bring it.", sheet, study.reader, |subject, _| ALWAYS_TOLD.contains(&subject)))
        (table(
            "All other lines on which the record lies outside the realizations' range.",
            sheet,
            study.reader,
            |subject, line| line.is_outside() && !ALWAYS_TOLD.contains(&subject)
        ))
        details { summary { "Every line of the sheet" }
            (table("As in tables/generator-sheet.csv.", sheet, study.reader, |_, _| true))
        }
    } }
}

/// A row a line; nothing without one.
fn table(
    caption: &str,
    sheet: &GeneratorSheet,
    reader: Reader,
    is_told: impl Fn(Subject, &SheetLine) -> bool,
) -> Markup {
    let told = |statistic: &'_ SheetStatistic| -> Vec<Cells> {
        let lines = statistic.lines.iter().filter(|line| is_told(statistic.subject, line));
        lines.map(|line| Cells::of(statistic, line, reader)).collect()
    };
    let subjects: Vec<(Subject, Vec<Cells>)> = Subject::ALL
        .into_iter()
        .map(|subject| (subject, sheet.about(subject).flat_map(told).collect()))
        .filter(|(_, rows): &(Subject, Vec<Cells>)| !rows.is_empty())
        .collect();
    html! { @if !subjects.is_empty() { div.scroll { table {
        caption { (caption) }
        thead { tr {
            th scope="col" { "Statistic" }
            th scope="col" { "Record" }
            th scope="col" { "Realizations' median" }
            th scope="col" { "5\u{2013}95 %" }
            th.text scope="col" { "Record is" }
        } }
        @for (subject, rows) in &subjects { tbody {
            tr { th colspan="5" scope="rowgroup" { (sentence(&subject.words(sheet.survey))) } }
            @for cells in rows { tr {
                td { (cells.name) }
                td { (cells.record) }
                td { (cells.median) }
                td { (cells.range) }
                td.text { @if cells.verdict == "within" || cells.verdict.is_empty() { (cells.verdict) } @else { strong { (cells.verdict) } } }
            } }
        } }
    } } } }
}
