//! What remembered years would be at every level.

use super::super::answer::telling_level;
use super::super::numbers::{DASH, fixed};
use super::super::reader::Reader;
use super::super::study::Study;
use crate::findings::{ReplayedYear, ReplayedYears};
use crate::season::{Kind, Outcome};
use maud::{Markup, html};

/// The section; nothing where no year was replayed.
pub(super) fn section(study: &Study<'_>) -> Markup {
    let record = study.findings.record.as_ref();
    let found = record.and_then(|record| Some((record, record.replayed_years.as_ref()?)));
    let reader = study.reader;
    let told = telling_level(study.findings);
    html! { @if let Some((record, found)) = found {
        p {
            "The weather of " (which(found)) ", as it was but for the warming, in this model. No chance is in it: it tells what such a year \
             would leave, and not how often one comes."
        }
        @if let Some(at) = told { @for year in &found.years { p { (sentence(year, at, study.findings.reference, &record.headline.title, reader)) } } }
        (table(found, &record.headline.title, reader))
    } }
}

fn which(found: &ReplayedYears) -> &'static str {
    if found.are_named {
        "the years that the scenario names"
    } else {
        "the record's three years of least snow and its year of most, at the reference"
    }
}

/// `1977's weather: ...`
fn sentence(year: &ReplayedYear, at: usize, reference: usize, title: &str, reader: Reader) -> String {
    let [Some(before), Some(after)] = [reference, at].map(|level| year.levels.get(level)) else {
        return String::new();
    };
    let percent = |percent: Option<f64>| {
        percent.map_or(String::new(), |percent| format!(" ({} % of normal)", fixed(percent, 0)))
    };
    let day = |day: Outcome| match day {
        Outcome::Value(_) => format!("gone by {}", reader.outcome(day, Kind::DayOfWaterYear)),
        Outcome::NotGone => "not gone by the year's end".to_owned(),
        _ => "with too little snow for a melt-out".to_owned(),
    };
    format!(
        "{}'s weather at {}: {title} of {}{}, {}; at the reference {}{}, {}.",
        year.water_year,
        reader.level(after.level_c),
        reader.amount(after.headline_mm),
        percent(after.percent_of_normal),
        day(after.melt_out_day),
        reader.amount(before.headline_mm),
        percent(before.percent_of_normal),
        day(before.melt_out_day)
    )
}

fn table(found: &ReplayedYears, title: &str, reader: Reader) -> Markup {
    let depth = reader.units.depth().word;
    html! { div.scroll { table {
        caption {
            "Basin mean by year and level; the normal is the baseline years' median at the reference. As in " code { "tables/replayed-years.csv" } "."
        }
        thead { tr {
            th scope="col" { "Water year" } th scope="col" { "Level" } th scope="col" { (title) ", " (depth) }
            th scope="col" { "% of normal" } th scope="col" { "Peak SWE, " (depth) } th scope="col" { "Melt-out" }
        } }
        tbody { @for year in &found.years { @for level in &year.levels { tr {
            th scope="row" { (year.water_year) }
            td { (reader.level(level.level_c)) } td { (reader.amount_bare(level.headline_mm)) }
            td { (level.percent_of_normal.map_or(DASH.to_owned(), |percent| fixed(percent, 0))) }
            td { (reader.amount_bare(level.peak_swe_mm)) }
            td { (reader.outcome(level.melt_out_day, Kind::DayOfWaterYear)) }
        } } } }
    } } }
}
