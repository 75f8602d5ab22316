//! The verdict by other yardsticks, and what would make up for the warming.

use super::super::answer::{Answer, is_scarce, period_name};
use super::super::numbers::{DASH, counted, fixed, trimmed};
use super::super::reader::Reader;
use super::super::study::Study;
use super::answer::ratio;
use crate::findings::{Crossing, Estimate, Findings, MeasureFindings, Spread, Yardstick};
use maud::{Markup, html};

/// The section; nothing where nothing was measured.
pub(super) fn section(study: &Study<'_>, answer: &Answer) -> Markup {
    let findings = study.findings;
    html! { @if let Some(headline) = findings.basin.first().filter(|headline| !is_scarce(headline)) {
        @for sentence in &answer.yardstick { p { (sentence) } }
        (table(findings, headline, study.reader))
    } }
}

/// How much more precipitation would; nothing where that was not asked.
pub(super) fn make_up(study: &Study<'_>, answer: &Answer) -> Markup {
    let findings = study.findings;
    let headline =
        findings.basin.first().filter(|headline| !is_scarce(headline) && !answer.break_even.is_empty());
    html! { @if let Some(headline) = headline {
        ul { @for sentence in &answer.break_even { li { (sentence) } } }
        @if let Some(found) = &findings.break_even { p {
            "Break-even precipitation, found by runs: the same " (counted(found.realizations, "realization")) " without an assumed change of mean \
             precipitation, every wet day changed by the same percentage, until the median " (period_name(findings, headline)) " stands \
             where the reference's does (" (study.reader.amount(found.reference_median)) ")."
        } }
    } }
}

/// One yardstick as a row of the table.
struct Row<'a> {
    name: String,
    spread: Option<Spread>,
    ratios: Vec<Option<Estimate>>,
    outweighs: Crossing,
    standard_deviation: Option<&'a Crossing>,
}

fn table(findings: &Findings, headline: &MeasureFindings, reader: Reader) -> Markup {
    let others: Vec<f64> = findings
        .levels_c
        .iter()
        .enumerate()
        .filter(|(at, _)| *at != findings.reference)
        .map(|(_, level_c)| *level_c)
        .collect();
    let ratios = |found: &[(f64, Option<Estimate>)]| {
        let at = |level_c: &f64| found.iter().find(|(of, _)| of == level_c).and_then(|(_, ratio)| *ratio);
        others.iter().map(at).collect::<Vec<_>>()
    };
    let mut rows: Vec<Row<'_>> = headline
        .yardsticks
        .iter()
        .map(|of| Row {
            name: name(of),
            spread: of.spread,
            ratios: ratios(&of.levels.iter().map(|at| (at.level_c, at.signal_to_spread)).collect::<Vec<_>>()),
            outweighs: of.outweighs,
            standard_deviation: Some(&of.outweighs_standard_deviation),
        })
        .collect();
    rows.extend(headline.temperature_held.iter().map(|held| Row {
        name: format!("{}-year values, temperatures held", findings.years),
        spread: held.spread,
        ratios: ratios(&held.levels.iter().map(|at| (at.level_c, at.signal_to_spread)).collect::<Vec<_>>()),
        outweighs: held.outweighs,
        standard_deviation: None,
    }));
    html! {
        div.scroll { table {
            caption {
                "The study's shift of the " (headline.measure.title) " over half of other spreads of the reference, ± Monte Carlo error; above 1 it \
                 outweighs. The last column takes one standard deviation in place of half the 5–95 % range."
            }
            thead { tr {
                th scope="col" { "Spread of" }
                th scope="col" { "5–95 %, " (reader.units.depth().word) }
                @for level_c in &others { th scope="col" { (reader.level(*level_c)) } }
                th scope="col" { "Outweighs" br; "from" }
                th scope="col" { "One standard" br; "deviation, from" }
            } }
            tbody { @for row in &rows { tr {
                th scope="row" { (row.name) }
                td { @match row.spread {
                    Some(spread) => { (reader.amount_bare(spread.q05)) "–" (reader.amount_bare(spread.q95)) }
                    None => { (DASH) }
                } }
                @for found in &row.ratios { td { (found.map_or_else(|| DASH.to_owned(), ratio)) } }
                td { (crossing(row.outweighs, reader)) }
                td { (row.standard_deviation.map_or_else(|| DASH.to_owned(), |of| crossing(*of, reader))) }
            } } }
        } }
    }
}

/// `+1.4 °C`, `+1.2 to +3.0 °C`, `not by +4 °C`: the crossing in a cell.
fn crossing(crossing: Crossing, reader: Reader) -> String {
    match crossing {
        Crossing::At { level_c, until_c: None } => reader.between_levels(level_c),
        Crossing::At { level_c, until_c: Some(until_c) } => {
            format!("{} to {}", reader.between_levels_bare(level_c), reader.between_levels(until_c))
        }
        Crossing::NotReached { up_to_c } => format!("not by {}", reader.level(up_to_c)),
        Crossing::Unknown => DASH.to_owned(),
    }
}

/// `30-year values, ± 8 % assumed`, `single years, no change assumed`.
fn name(of: &Yardstick) -> String {
    let years = if of.years == 1 { "single years".to_owned() } else { format!("{}-year values", of.years) };
    if of.mean_change_sd_pct > 0.0 {
        format!("{years}, ± {} % assumed", trimmed(&fixed(of.mean_change_sd_pct, 1)))
    } else {
        format!("{years}, no change assumed")
    }
}
