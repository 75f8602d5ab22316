//! Where: the headline measure by elevation band.

use super::super::answer::period_name;
use super::super::numbers::{fixed, signed};
use super::super::study::Study;
use super::{Figures, levels};
use crate::basin::told_apart;
use crate::figures::Part;
use crate::season::{Kind, LEAST_REFERENCE_MM};
use maud::{Markup, html};

/// The section; nothing where nothing was measured.
pub(super) fn section(study: &Study<'_>, figures: &Figures<'_>) -> Markup {
    let (findings, reader) = (study.findings, study.reader);
    let apart = told_apart(findings.bands.iter().map(|of_band| &of_band.band));
    html! { @if let Some(headline) = findings.basin.first() {
        (figures.of(Part::Elevation))
        @if let (Some(area), Some(snow)) = (study.beyond_stations, study.swe_beyond_stations) { p {
            "Above the station lie " (fixed(100.0 * area.share_above, 0)) " % of the area and " (fixed(100.0 * snow.share_above, 0))
            " % of the reference's " (headline.measure.title) "; below it, " (fixed(100.0 * area.share_below, 0)) " and "
            (fixed(100.0 * snow.share_below, 0)) " %. There the numbers hang on the gradients alone."
        } }
        div.scroll { table {
            caption {
                "By elevation: " (period_name(findings, headline)) ", median over realizations; in brackets the change from the reference, \
                 where its median is " (reader.limit(LEAST_REFERENCE_MM)) " or more."
            }
            thead { tr {
                th scope="col" { "Band, " (reader.units.elevation().word) }
                th scope="col" { "Area, " (reader.units.area().word) }
                @for name in levels::names(findings, reader) { th scope="col" { (name) } }
            } }
            tbody { @for (band, apart) in findings.bands.iter().zip(&apart).rev() { @if let Some(measure) = band.measures.first() { tr {
                th scope="row" { (reader.elevation_bare(band.band.lower_m)) " – " (reader.elevation_bare(band.band.upper_m))
                    @if let Some(ground) = apart { br; (ground) } }
                td { (reader.area_bare(band.band.area_km2)) }
                @for at in &measure.levels { td {
                    (reader.outcome(at.periods.q50, Kind::AmountMm))
                    @if let Some(percent) = at.percent_change { " (" (signed(percent, 0)) " %)" }
                } }
            } } } }
        } }
    } }
}
