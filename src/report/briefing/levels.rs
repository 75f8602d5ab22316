//! Tables level by level: the basin's measures, and the headline by elevation.

use super::super::answer::period_name;
use super::super::numbers::{DASH, fixed, signed};
use super::super::reader::Reader;
use super::super::study::Study;
use crate::findings::{LevelFindings, MeasureFindings};
use crate::season::{Kind, LEAST_REFERENCE_MM, Outcome};
use maud::{Markup, html};

/// The section.
pub(super) fn section(study: &Study<'_>) -> Markup {
    let (findings, reader) = (study.findings, study.reader);
    let levels = findings.levels_c.iter().enumerate();
    let names: Vec<String> = levels
        .map(
            |(at, level_c)| {
                if at == findings.reference { "reference".to_owned() } else { reader.level(*level_c) }
            },
        )
        .collect();
    html! {
        h2 { "Level by level" }
        div.scroll {
            table {
                caption { "Basin mean, median over " (findings.realizations) " realizations of " (findings.years)
                    "-year values; below it the median paired change from the reference, and how many times its half spread that is." }
                thead { tr {
                    th scope="col" { "Measure" }
                    @for name in &names { th scope="col" { (name) } }
                } }
                tbody { @for measure in &findings.basin { tr {
                    th scope="row" { (measure.measure.title) }
                    @for at in &measure.levels { td { (level_cell(reader, measure, at)) } }
                } } }
            }
        }
        @if let Some(headline) = findings.basin.first() {
            h3 { "By elevation: " (period_name(findings, headline)) }
            div.scroll {
                table {
                    caption {
                        "Median over realizations; in brackets the change from the reference, where its median is "
                        (reader.limit(LEAST_REFERENCE_MM)) " or more."
                    }
                    thead { tr {
                        th scope="col" { "Band, " (reader.units.elevation().word) }
                        th scope="col" { "Area, " (reader.units.area().word) }
                        @for name in &names { th scope="col" { (name) } }
                    } }
                    tbody { @for band in findings.bands.iter().rev() { @if let Some(measure) = band.measures.first() { tr {
                        th scope="row" { (reader.elevation_bare(band.band.lower_m)) " – " (reader.elevation_bare(band.band.upper_m)) }
                        td { (reader.area_bare(band.band.area_km2)) }
                        @for at in &measure.levels { td {
                            (reader.outcome(at.periods.q50, Kind::AmountMm))
                            @if let Some(percent) = at.percent_change { " (" (signed(percent, 0)) " %)" }
                        } }
                    } } } }
                }
            }
        }
        p { "All of it, with ranges and Monte Carlo errors, stands in " code { "tables/" } " and " code { "summary.json" } "." }
    }
}

fn level_cell(reader: Reader, measure: &MeasureFindings, at: &LevelFindings) -> Markup {
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
            (reader.change_of(kind, shift.median.value))
            @if let Some(percent) = at.percent_change { ", " (signed(percent, 0)) " %" }
            br;
            @match at.signal_to_spread { Some(ratio) => { (fixed(ratio.value, 2)) " ×" } None => { (DASH) } }
        }
        @if !undefined.is_empty() { br; (undefined.join(", ")) }
    }
}
