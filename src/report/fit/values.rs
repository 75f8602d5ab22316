//! Parameters as tables of the page: what was fitted on all years, and on each half of them.

use super::super::numbers::{DASH, counted, fixed};
use super::{FitReport, range_in_words};
use crate::fit::{Bounded, ParameterSet, Profile, Split};
use maud::{Markup, html};

/// Both tables. One of all splits would be wider than a page.
pub(super) fn tables(report: &FitReport<'_>) -> Markup {
    let rows: Vec<(&Profile, &Bounded)> = report
        .result
        .profiles
        .iter()
        .filter_map(|profile| {
            let bounded = report.searched.iter().find(|bounded| bounded.parameter.key == profile.key)?;
            Some((profile, bounded))
        })
        .collect();
    html! { (on_all_years(report, &rows)) (on_halves(report, &rows)) }
}

fn on_all_years(report: &FitReport<'_>, rows: &[(&Profile, &Bounded)]) -> Markup {
    html! { div.scroll { table.narrow {
        caption { "Fitted on all years" }
        thead { tr {
            th.text scope="col" { "Parameter" } th.text scope="col" { "bounds" } th scope="col" { "scenario" } th scope="col" { "fitted" } th.text scope="col" { "range" }
            th scope="col" { "profile falls by" }
        } }
        tbody { @for (profile, bounded) in rows { tr {
            td.text { (bounded.parameter.title) @if !profile.is_identified { ", not identified" } br; code { (profile.key) } }
            td.text { (fixed(bounded.bounds[0], 2)) " to " (fixed(bounded.bounds[1], 2)) " " (bounded.parameter.unit.replace("degC", "°C")) }
            td { (value(bounded.parameter.get(report.stated))) }
            td { (value(bounded.parameter.get(&report.result.fitted[0].parameters))) }
            td.text { (range(report, profile.key)) }
            td { (fixed(profile.fall, 3)) }
        } } }
    } } }
}

fn on_halves(report: &FitReport<'_>, rows: &[(&Profile, &Bounded)]) -> Markup {
    let halves = || report.result.fitted.iter().filter(|fitted| fitted.split != Split::All);
    html! { div.scroll { table.narrow {
        caption { "Fitted on halves of the winters: how far they agree says how well a value is known" }
        thead { tr {
            th.text scope="col" { "Parameter" }
            @for fitted in halves() { th scope="col" { (head(fitted.split)) } }
        } }
        tbody { @for (_, bounded) in rows { tr {
            td.text { (bounded.parameter.title) }
            @for fitted in halves() { td { (value(bounded.parameter.get(&fitted.parameters))) } }
        } } }
    } } }
}

fn range(report: &FitReport<'_>, key: &str) -> String {
    let found = report.result.uncertainty.ranges.iter().find(|range| range.key == key);
    // The column is headed so.
    found.map_or(DASH.to_owned(), |found| range_in_words(found, 3).trim_start_matches("range ").to_owned())
}

/// Where ranges and sets come from.
pub(super) fn of_ranges(report: &FitReport<'_>) -> String {
    let uncertainty = &report.result.uncertainty;
    format!(
        "Ranges come from fits to winters drawn anew, {} times, and aim at 90 %. They fall short of it: of 200 records of 20 winters that this same \
         model invented, with noise, they held the truth in 83 to 91 of 100, by parameter, so they are not called intervals; snow that no model made \
         may be held less often. An end at a bound may reach farther. {} that lie apart within them stand in parameter-sets.csv, for a study to run beside its own; \
         on all winters the objective of the farthest is {} below the best's.",
        uncertainty.resamples,
        counted(uncertainty.sets.len(), "set"),
        fixed(farthest(&uncertainty.sets), 3)
    )
}

/// The largest distance of a set's objective from that of the first, the best.
fn farthest(sets: &[ParameterSet]) -> f64 {
    let best = sets.first().map_or(0.0, |best| best.objective);
    sets.iter().map(|set| best - set.objective).fold(0.0, f64::max)
}

fn value(value: Option<f64>) -> String {
    value.map_or(DASH.to_owned(), |value| fixed(value, 3))
}

fn head(split: Split) -> &'static str {
    match split {
        Split::All => "all",
        Split::Odd => "odd",
        Split::Even => "even",
        Split::Coldest => "coldest",
        Split::Warmest => "warmest",
        Split::Driest => "driest",
        Split::Wettest => "wettest",
    }
}
