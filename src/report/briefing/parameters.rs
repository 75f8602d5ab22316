//! What other parameters would have answered, beside precipitation and warming.

use super::super::answer::{Answer, is_scarce};
use super::super::numbers::{DASH, fixed, signed};
use super::super::reader::Reader;
use super::super::study::Study;
use crate::findings::{LevelBySet, MeasureBySet, Mover};
use maud::{Markup, html};

/// The section; nothing where no sets of parameters were run.
pub(super) fn section(study: &Study<'_>, answer: &Answer) -> Markup {
    let findings = study.findings;
    let headline = findings.basin.first().filter(|headline| !is_scarce(headline));
    let found = findings.parameter_spread.as_ref().zip(headline).and_then(|(spread, headline)| {
        spread.measures.iter().find(|found| found.measure == headline.measure)
    });
    html! { @if let Some(found) = found {
        @for sentence in &answer.parameters { p { (sentence) } }
        (table(found, study.reader))
        @if let Some(sets) = study.parameter_sets { p { (sets.words()) } }
    } }
}

fn table(found: &MeasureBySet, reader: Reader) -> Markup {
    let depth = reader.units.depth().word;
    html! { div.scroll { table {
        caption {
            "What moves the " (found.measure.title) ", " (depth) ": the study's own shift; the half of the reference's 5–95 % range over realizations that it \
             points to; and how far the sets' medians at the reference reach that way from the study's own over the same realizations, the farthest set included. The sets are chosen to \
             lie apart, so that their range is no range of chances."
        }
        thead { tr {
            th scope="col" { "Level" } th scope="col" { "Warming" } th scope="col" { "Precipitation" } th scope="col" { "Parameters" }
            th scope="col" { "Warming over" br; "parameters" } th scope="col" { "Change, by set, %" } th.text scope="col" { "The largest" }
        } }
        tbody { @for level in &found.levels { (row(level, reader)) } }
    } } }
}

fn row(level: &LevelBySet, reader: Reader) -> Markup {
    let weighed = |of: fn(&crate::findings::Weighed) -> f64| {
        level.weighed.as_ref().map_or(DASH.to_owned(), |found| reader.amount_bare(of(found)))
    };
    let ratio = level.weighed.and_then(|found| found.warming_over_parameters);
    let percent = level.percent_change.map_or(DASH.to_owned(), |percent| {
        let [low, high] = [percent.lowest, percent.highest].map(|percent| signed(percent, 0));
        if low == high { low } else { format!("{low} to {high}") }
    });
    let largest = level.weighed.map_or(DASH, |found| match found.largest {
        Mover::Warming => "warming",
        Mover::Precipitation => "precipitation",
        Mover::Parameters => "parameters",
    });
    html! { tr {
        th scope="row" { (reader.level(level.level_c)) }
        td { (weighed(|found| found.warming)) } td { (weighed(|found| found.precipitation)) } td { (weighed(|found| found.parameters)) }
        td { (ratio.map_or(DASH.to_owned(), |ratio| fixed(ratio, 2))) } td { (percent) } td.text { (largest) }
    } }
}
