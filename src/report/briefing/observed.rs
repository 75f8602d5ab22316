//! Observed snow: how well the model, as it stands, reproduces what was measured in the basin.

use super::super::numbers::{DASH, counted, fixed, signed};
use super::super::reader::Reader;
use super::super::study::Study;
use crate::figures::{SITE_FIGURES, Svg};
use crate::fit::{Bias, Comparison, DateError};
use maud::{Markup, html};

/// The section's address on the page.
pub(super) const ADDRESS: &str = "observed-snow";

/// The section; nothing without a site.
pub(super) fn section(study: &Study<'_>, figures: &[(String, Svg)]) -> Markup {
    let comparisons = &study.findings.comparisons;
    html! { @if !comparisons.is_empty() {
        p {
            @if let Some(fitted) = study.fitted {
                "Parameters of this model come from " code { (fitted.file) } ", which holds what was fitted to observed snow: scores over years that \
                 the fit has seen flatter it, and its own page says how it did in years that it had not. "
            } @else {
                "This model was not fitted to these observations: nothing was adjusted to bring it nearer to them. "
            }
            "It is run at each site's own \
             elevation, on the record as observed and without warming, and its SWE as the day begins is held against every reading in the \
             water years in use. Errors are modelled less observed: above 0 the model has more snow than was observed, or keeps it longer."
        }
        (scores(comparisons, study.reader))
        @for (slug, svg) in figures { (super::figure(svg, slug, Some(SITE_FIGURES[0].table))) }
        p {
            "NSE is the Nash-Sutcliffe efficiency over all readings, days without snow included: 1 is perfect, 0 no better than the observed \
             mean. KGE is the Kling-Gupta efficiency of 2009 over the readings on which observed or modelled SWE is above 0: 1 is perfect, \
             −0.41 what the observed mean would score. Much of a high value is the season itself, which any model has. Every year stands in "
            code { "tables/observed-by-year.csv" } ", every day in " code { "tables/observed-daily.csv" } "."
        }
    } }
}

/// A row a site.
fn scores(comparisons: &[Comparison], reader: Reader) -> Markup {
    let surveys = comparisons.first().map_or(&[][..], |comparison| &comparison.surveys);
    html! { div.scroll { table {
        caption {
            "Observed to modelled means over the same years. Peak and melt-out are of snow pillows, in years with at most 15 readings missing \
             from the 62nd day of the water year (1 December where it starts on 1 October) to melt-out; a survey counts where it was made \
             within five days of the date, and is held against the model on its own day."
        }
        thead { tr {
            th scope="col" { "Site" }
            th scope="col" { "Readings" }
            th scope="col" { "NSE" }
            th scope="col" { "KGE" }
            th scope="col" { "Peak SWE" }
            @for survey in surveys { th scope="col" { (survey.survey.words()) " SWE" } }
            th scope="col" { "Melt-out" }
        } }
        tbody { @for comparison in comparisons { tr {
            th scope="row" { (comparison.site) br; (comparison.kind.words()) ", " (reader.elevation(comparison.elevation_m)) }
            td { (fixed(comparison.readings_compared as f64, 0)) br; "of " (counted(comparison.by_year.len(), "year")) }
            td { (score(comparison.nash_sutcliffe)) }
            td { (score(comparison.kling_gupta.map(|kge| kge.efficiency))) }
            td { (bias(comparison.peak, reader)) }
            @for survey in &comparison.surveys { td { (bias(survey.bias, reader)) } }
            td { (melt_out(comparison.melt_out)) }
        } } }
    } } }
}

fn score(score: Option<f64>) -> String {
    score.map_or(DASH.to_owned(), |score| fixed(score, 2))
}

fn bias(bias: Option<Bias>, reader: Reader) -> Markup {
    html! { @match bias {
        None => { (DASH) }
        Some(bias) => {
            (reader.amount(bias.observed_mm)) " → " (reader.amount(bias.modelled_mm)) br;
            @if let Some(percent) = bias.bias_pct { (signed(percent, 0)) " %, " }
            (counted(bias.years, "year"))
        }
    } }
}

fn melt_out(error: Option<DateError>) -> Markup {
    html! { @match error {
        None => { (DASH) }
        Some(error) => {
            (signed(error.mean_days, 0)) " days" br;
            "mean size " (fixed(error.mean_size_days, 0)) ", " (counted(error.years, "year"))
        }
    } }
}
