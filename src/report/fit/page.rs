//! `fit.html`: what was fitted, and whether it may be trusted in winters that it has not seen; words first.

use super::super::cautions::PLANNING_AID;
use super::super::numbers::counted;
use super::super::page;
use super::figures::Drawn;
use super::left_out;
use super::{FitReport, PARAMETERS_FILE, effort, errors, of_other_years, values};
use crate::figures::{FitPart, SITE_FIGURES};
use maud::html;

/// The page.
pub(super) fn page(report: &FitReport<'_>, drawn: &Drawn) -> Vec<u8> {
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
        @for (slug, svg) in drawn.of(FitPart::Skill) { (page::figure(svg, slug, Some("fit-winters"))) }
        (errors::tables(report))
        p {
            "Errors are modelled less observed. NSE is the Nash-Sutcliffe efficiency over all readings, KGE the Kling-Gupta efficiency of 2009 \
             over the readings on which snow was observed or modelled; skill is what is gained above the mean of the other years on the same \
             day of the year: 0 is no better than that mean, and much of a high NSE is the season itself. What stands after ± is a standard error, winters taken as independent. The slope is that of the \
             error of survey SWE on the winter's temperature, in percent of mean survey SWE, with its standard error: where it differs from \
             0 by more than twice that, the model answers to a warmer winter otherwise than the snow did."
        }
        h2 { "Winters left out" }
        (left_out::section(report.left_out))
        h2 { "Observed and modelled snow, year by year" }
        p {
            "Here the model has the parameters fitted on all years, these years among them: it looks better than it is in years that it has \
             not seen."
        }
        @for (slug, svg) in &drawn.of_sites { (page::figure(svg, slug, Some(SITE_FIGURES[0].table))) }
        p {
            "Every year stands in " code { "tables/observed-by-year.csv" } ", every day in " code { "tables/observed-daily.csv" }
            ", each winter as fits make it that have seen it and that have not in " code { "tables/fit-winters.csv" } "."
        }
        h2 { "Parameters" }
        @for (slug, svg) in drawn.of(FitPart::Parameters) { (page::figure(svg, slug, None)) }
        (values::tables(report))
        p { (values::of_ranges(report)) }
        p {
            "Searched for by dynamically dimensioned search (Tolson & Shoemaker 2007) from " (counted(report.starts, "start")) " of "
            (counted(report.evaluations, "set")) " a split, the first at the scenario's own values, and refined by a climb along the parabola through the points around the best. A profile holds one parameter at nine values \
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
            dt { "Odd and even" } dd { "Every other winter with observed snow, in their order, from the first and from the second." }
            dt { "Objective" } dd { (objective(report)) }
        }
        h2 { "How to repeat it" }
        (page::repeat(&report.origin))
    };
    page::page(&format!("{} – fit", report.title), &content, &[])
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
