//! Which bands carry snow from one water year into the next, and what that means for the numbers.

use super::super::numbers::fixed;
use super::super::study::Study;
use maud::{Markup, html};

/// A paragraph that names them; nothing where all snow goes, or where every year begins bare.
pub(super) fn paragraph(study: &Study<'_>) -> Markup {
    let bands = study.findings.perennial_bands();
    let starts_bare = study.snow.options.start_bare_each_year;
    html! { @if !bands.is_empty() { p {
        "Snow that lasts through the water year's end at the reference: "
        @for (at, of_band) in bands.iter().enumerate() {
            @let band = &study.findings.bands[of_band.band].band;
            @if at > 0 { ", " }
            "band " (of_band.band + 1) " (" (study.reader.elevation_bare(band.lower_m)) "–" (study.reader.elevation(band.upper_m)) ") in "
            (fixed(100.0 * of_band.years_not_gone as f64 / of_band.years as f64, 1)) " % of the years"
        }
        "."
        @if starts_bare {
            " Every water year begins bare all the same, so none of it counts in the next; how much of it there is stands below \
             and in the tables as snow taken away at the year's end."
         } @else {
            " It is carried into the next year and counts in that year's SWE and outflow; the model makes no ice of it. With "
            code { "start_bare_each_year = true" } " in " code { "[snow]" } " every year begins without."
        }
    } } }
}
