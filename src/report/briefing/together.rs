//! Warming and precipitation together: the surface, what a degree and a percent do, named changes, and what is to hold.

use super::super::answer::{Answer, is_scarce, per_degree, percent};
use super::super::numbers::{DASH, counted, days_moved, precision, signed};
use super::super::study::Study;
use super::Figures;
use crate::figures::Part;
use crate::findings::{Estimate, ResponseSurface};
use crate::season::MELT_OUT_DAY;
use maud::{Markup, html};

/// More rows of projections than this stand in their table alone.
const MOST_ROWS: usize = 20;

/// The section; nothing where no surface was run or there is hardly any snow.
pub(super) fn section(study: &Study<'_>, answer: &Answer, figures: &Figures<'_>) -> Markup {
    let findings = study.findings;
    let has_snow = findings.basin.first().is_some_and(|headline| !is_scarce(headline));
    html! {
        @if let Some(surface) = findings.surface.as_ref().filter(|_| has_snow) {
            p {
                "Runs of " (counted(surface.realizations, "realization")) ", the study's first, at " (surface.nodes.len()) " nodes: each changes all \
                 precipitation by one percentage, on top of no other change, and warms every day as the study's levels do. Wet days stay as \
                 frequent as in the record."
            }
            (figures.of(Part::Together))
            @if !answer.slopes.is_empty() {
                h4 { "What one degree does, and one percent" }
                @for sentence in &answer.slopes { p { (sentence) } }
                (slopes(study, surface))
            }
            @if !surface.named.is_empty() {
                h4 { "Changes with a name" }
                @for sentence in &answer.cases { p { (sentence) } }
                (named(study, surface))
            }
        }
    }
}

/// The criteria of the scenario; nothing without one.
pub(super) fn what_is_to_hold(answer: &Answer) -> Markup {
    html! { @if !answer.tipping.is_empty() {
        ul { @for sentence in &answer.tipping { li { (sentence) } } }
        p {
            "Criteria of the scenario, asked of the single years of all realizations at each level, linear between levels. \
             A level has no date: it says how much warming is too much, not when or whether it comes."
        }
    } }
}

fn slopes(study: &Study<'_>, surface: &ResponseSurface) -> Markup {
    let reader = study.reader;
    let signed_percent = |found: Estimate| {
        let sign = if found.value < 0.0 { "\u{2212}" } else { "+" };
        format!("{sign}{}", percent(found))
    };
    let or_dash = |found: Option<Estimate>| found.map_or_else(|| DASH.to_owned(), signed_percent);
    let degree = reader.units.warming().word;
    html! { div.scroll { table {
        caption {
            "What one degree about each level does to the median there, and one percent of precipitation about none, ± Monte \
             Carlo error. Interaction: what the level and +10 % precipitation do together less what each does alone, percent \
             of the reference. Every band's in the table of elasticities."
        }
        thead { tr {
            th scope="col" { "Warming" }
            th scope="col" { "Per " (degree) }
            th scope="col" { "Per % of" br; "precipitation" }
            th scope="col" { "Interaction" }
        } }
        tbody { @for at in &surface.slopes { tr {
            th scope="row" { (reader.level(at.level_c)) }
            td { (or_dash(at.basin.per_degree_pct.map(|found| per_degree(found, reader)))) }
            td { (or_dash(at.basin.per_percent_pct)) }
            td { (or_dash(at.interaction_pct)) }
        } } }
    } } }
}

fn named(study: &Study<'_>, surface: &ResponseSurface) -> Markup {
    let reader = study.reader;
    let melt_out = surface.measures.iter().position(|measure| measure.name == MELT_OUT_DAY);
    let shown = surface.named.iter().take(MOST_ROWS);
    html! { div.scroll { table {
        caption {
            "Medians less the reference's, ± Monte Carlo error, by runs of their own. The names are the scenario's; nothing here says \
             how likely any of them is."
            @if surface.named.len() > MOST_ROWS { " The first " (MOST_ROWS) " of " (surface.named.len()) "; all stand in the table of named changes." }
        }
        thead { tr {
            th scope="col" { "Name" }
            th scope="col" { "Warming" }
            th scope="col" { "Precipitation" }
            th scope="col" { (surface.measures.first().map_or("", |measure| measure.title.as_str())) }
            th scope="col" { "Melt-out" }
        } }
        tbody { @for of in shown { tr {
            th scope="row" { (of.name) }
            td { (reader.level(of.node.change.warming_c)) }
            td { (signed(of.node.change.precipitation_change_pct, 0)) " %" }
            td { @match of.node.measures.first().and_then(|found| found.change) {
                Some(change) => {
                    (reader.change(change.value))
                    @if let Some(pct) = of.node.measures[0].change_pct {
                        " (" (signed(pct.value, 0)) @if let Some(error) = pct.monte_carlo_error { " ± " (precision(error)) } " %)"
                    }
                }
                None => { (DASH) }
            } }
            td { (melt_out.and_then(|at| of.node.measures[at].change).map_or_else(|| DASH.to_owned(), |change| days_moved(change.value))) }
        } } }
    } } }
}
