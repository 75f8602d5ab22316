//! What the reservoir holds and supplies under its rules as stated.

use super::super::super::answer::telling_level;
use super::super::super::study::Study;
use super::super::Figures;
use crate::figures::{Part, RELIABILITY};
use crate::findings::{MeasureFindings, Operations};
use maud::{Markup, html};

/// What is told in sentences, the most telling first.
const TOLD: [&str; 4] = [RELIABILITY, "storage_year_end_hm3", "years_not_filled_share", "spill_hm3"];

pub(super) fn section(study: &Study<'_>, found: &Operations, figures: &Figures<'_>) -> Markup {
    let (findings, reader) = (study.findings, study.reader);
    let performance: Vec<&MeasureFindings> = found.performance.iter().collect();
    let is_of_a_date = |of: &&MeasureFindings| {
        of.measure.title.starts_with("storage on ") || of.measure.name == "storage_year_end_hm3"
    };
    let (on_dates, others): (Vec<&MeasureFindings>, Vec<&MeasureFindings>) =
        found.storage.iter().partition(is_of_a_date);
    html! { @if let Some(pool) = &found.pool {
        (super::caution())
        p {
            @if let Some(name) = &found.reservoir { (name) " holds " } @else { "The reservoir holds " }
            (reader.volume(pool.capacity_hm3)) " at most, of which " (reader.volume(pool.dead_hm3)) " lie below its outlets. "
            @if pool.not_above_hm3.is_empty() { "No space is kept for floods. " }
            @else { "Its flood-space rule says what storage is not to exceed on a day. " }
            "Day by day it takes in the " (found.word) "; then evaporation is taken, the minimum release paid, storage above the flood-space rule let go as far \
             as the outlets pass it, and demand served from that and from what else lies above the outlets. What does not fit spills. What is left as the water year ends is the carry-over for the next."
        }
        p {
            "Assumed: this order of priority; rules, demand and evaporation are the same at every level; the reservoir is run day by day without foresight, so \
             that no one releases more because much snow lies above, as operators would. Performance is that of the stated rules in this \
             model, and not of a dam."
        }
        @if let Some(at) = telling_level(findings) { ul {
            @for of in super::named(found, &TOLD) { @if let Some(said) = super::sentence(findings, of, at, reader) { li { (said) } } }
        } }
        (figures.of(Part::Reservoir))
        (super::table(study, "Performance over a whole realization (Hashimoto, Stedinger & Loucks 1982)", &performance))
        (super::table(study, "Lowest storage, releases, shortage and spill of a year", &others))
        details { summary { "Storage, date by date" } (super::table(study, "Storage as the day begins", &on_dates)) }
    } }
}
