//! `fit.html`: what was fitted, and whether it may be trusted in winters that it has not seen; words first.

use super::super::cautions::PLANNING_AID;
use super::super::numbers::{DASH, counted, fixed, signed};
use super::super::page;
use super::judged::numbers;
use super::{FitReport, PARAMETERS_FILE, effort, judgements, of_other_years};
use crate::fit::{Judged, Split};
use maud::{Markup, html};

/// The page.
pub(super) fn page(report: &FitReport<'_>) -> Vec<u8> {
    let result = report.result;
    let content = html! {
        p.over { (effort(report)) }
        h1 { (report.title) ": fitted to observed snow" }
        @for sentence in of_other_years(report) { p { (sentence) } }
        p {
            "A model that keeps its skill in winters unlike those it was fitted on has passed a test that it must pass before it is asked \
             about a warmer climate (Klemeš 1986); passing it does not prove it right."
        }
        p {
            "To use what was fitted on all years, add " code { "fitted = \"" (PARAMETERS_FILE) "\"" } " to the scenario's table "
            code { "[snow]" } ", by a path from the scenario's folder, and take out of the scenario the keys that it states itself."
        }
        h2 { "Skill in winters seen and not seen" }
        (scores(report))
        p {
            "Errors are modelled less observed. NSE is the Nash-Sutcliffe efficiency over all readings, KGE the Kling-Gupta efficiency of 2009 \
             over the readings on which snow was observed or modelled; skill is what is gained above the mean of the other years on the same \
             day of the year: 0 is no better than that mean, and much of a high NSE is the season itself. The last column is the slope of the \
             error of survey SWE on the winter's temperature, in percent of mean survey SWE, with its standard error: where it differs from \
             0 by more than twice that, the model answers to a warmer winter otherwise than the snow did."
        }
        h2 { "Parameters" }
        (parameters(report))
        p {
            "Searched for by dynamically dimensioned search (Tolson & Shoemaker 2007) from " (counted(report.starts, "start")) " of "
            (counted(report.evaluations, "set")) " a split, the first at the scenario's own values, and refined by a compass search. A profile holds one parameter at nine values \
             over its bounds and refines the others there; it falls by its highest less its lowest objective. "
            @if result.not_identified.is_empty() { "All parameters are identified: each profile falls by more than 0.01." } @else {
                "Where it falls by 0.01 or less the snow does not identify the parameter. The flattest goes back to the scenario's value, then \
                 the rest are asked again; what was left was searched for again on every split."
            }
        }
        h2 { "Cautions" }
        ul {
            li { (PLANNING_AID) }
            li { "What is fitted belongs to the climate that it was fitted to, and to the places where the snow was observed." }
        }
        h2 { "Terms" }
        dl {
            dt { "Winter" } dd { "November to March, south of the equator May to September, at the station. Halves differ by one winter at most." }
            dt { "Driest and wettest" } dd { "By precipitation before the first survey date, as the gauge caught it." }
            dt { "Every other year" } dd { "Of the winters with observed snow, in their order." }
            dt { "Objective" } dd { (objective(report)) }
        }
        h2 { "How to repeat it" }
        p { code { (report.origin.command) } " with seed " (report.origin.seed) " and thawline " (env!("CARGO_PKG_VERSION")) ". Input files and their SHA-256:" }
        ul { @for input in &report.origin.inputs { li { (input.role) ": " code { (input.path) } " " code { (input.sha256) } } } }
    };
    page::page(&format!("{} – fit", report.title), &content)
}

fn objective(report: &FitReport<'_>) -> &'static str {
    match report.objective {
        crate::fit::Objective::Season => {
            "KGE less the relative errors of mean peak and mean survey SWE, less the mean size of the error of melt-out over 60 days; the \
             mean over all sites."
        }
        crate::fit::Objective::NashSutcliffe => "NSE; the mean over all sites.",
    }
}

fn scores(report: &FitReport<'_>) -> Markup {
    let heads = [
        "Fitted on",
        "judged on",
        "site",
        "NSE",
        "KGE",
        "skill",
        "peak, %",
        "survey, %",
        "melt-out, days",
        "slope, % per °C",
    ];
    html! { div.scroll { table {
        thead { tr { @for head in heads { th { (head) } } } }
        tbody {
            @for fitted in &report.result.fitted {
                @for (judged_on, sites) in judgements(fitted) { @for judged in sites { (row(fitted.split.words(), judged_on, judged)) } }
            }
            @for (judged_on, sites) in &report.result.unfitted { @for judged in sites { (row("nothing", *judged_on, judged)) } }
        }
    } } }
}

fn row(fitted_on: &str, judged_on: Split, judged: &Judged) -> Markup {
    let [nse, kge, skill, peak, survey, late, size, slope, error, _] = numbers(judged);
    let shown = |value: Option<f64>| value.map_or(DASH.to_owned(), |value| fixed(value, 2));
    let percent = |value: Option<f64>| value.map_or(DASH.to_owned(), |value| signed(value, 1));
    let melt_out = late
        .zip(size)
        .map_or(DASH.to_owned(), |(late, size)| format!("{} (size {})", signed(late, 1), fixed(size, 1)));
    let slope = slope
        .zip(error)
        .map_or(DASH.to_owned(), |(slope, error)| format!("{} ± {}", signed(slope, 1), fixed(error, 1)));
    html! { tr {
        td { (fitted_on) } td { (judged_on.words()) } td { (judged.site) }
        td { (shown(nse)) } td { (shown(kge)) } td { (shown(skill)) } td { (percent(peak)) } td { (percent(survey)) }
        td { (melt_out) } td { (slope) }
    } }
}

fn parameters(report: &FitReport<'_>) -> Markup {
    let shown = |value: Option<f64>| value.map_or(DASH.to_owned(), |value| fixed(value, 3));
    html! { div.scroll { table {
        thead { tr {
            th { "Key" } th { "unit" } th { "bounds" } th { "scenario" }
            @for fitted in &report.result.fitted { th { (fitted.split.words()) } }
            th { "profile falls by" } th { "identified" }
        } }
        tbody { @for profile in &report.result.profiles {
            @if let Some(bounded) = report.searched.iter().find(|bounded| bounded.parameter.key == profile.key) { tr {
                td { code { (profile.key) } } td { (bounded.parameter.unit) }
                td { (fixed(bounded.bounds[0], 2)) " to " (fixed(bounded.bounds[1], 2)) }
                td { (shown(bounded.parameter.get(report.stated))) }
                @for fitted in &report.result.fitted { td { (shown(bounded.parameter.get(&fitted.parameters))) } }
                td { (fixed(profile.fall, 3)) } td { (if profile.is_identified { "yes" } else { "no" }) }
            } }
        } }
    } } }
}
