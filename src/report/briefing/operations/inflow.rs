//! When and how much water comes.

use super::super::super::answer::telling_level;
use super::super::super::study::Study;
use super::super::Figures;
use super::super::volumes::by_chance;
use crate::figures::Part;
use crate::findings::{MeasureFindings, Operations};
use maud::{Markup, html};

pub(super) fn section(study: &Study<'_>, found: &Operations, figures: &Figures<'_>) -> Markup {
    let (findings, reader) = (study.findings, study.reader);
    let window = found.inflow.iter().find(|of| of.measure.is_volume);
    let told: Vec<&MeasureFindings> =
        window.into_iter().chain(super::named(found, &["inflow_centroid_day"])).collect();
    let year = super::named(found, &["inflow_year_hm3"]).into_iter();
    let is_told = |of: &&MeasureFindings| window.is_none_or(|window| window.measure.name != of.measure.name);
    let told: Vec<&MeasureFindings> = told.into_iter().chain(year.filter(is_told)).collect();
    let word = crate::figures::sentence(&found.word);
    html! {
        (super::caution())
        p {
            "Water input, which is what leaves the snow and rain on bare ground, is summed over the basin. The share of it that runs off, as stated \
             for each month, passes linear stores, a quick one and, where one is stated, a slow one beside it; from a linear store flows \
             what it holds over its recession time, so that without rain or melt the flow falls to 1/e in that time (Maillet 1905; Nash 1957)."
        }
        @if !found.inflow_is_observed { p {
            "No inflow was observed, so that this is called water input, routed: nothing shows how near it comes to what a river brings."
        } }
        p {
            "Assumed: the share that runs off is the same at every level, although warming commonly lowers it, so that less water may come than is \
             told here (McCabe et al. 2017); a day is the shortest time told of."
        }
        @if let Some(at) = telling_level(findings) { ul {
            @for of in told { @if let Some(said) = super::sentence(findings, of, at, reader) { li { (said) } } }
        } }
        (figures.of(Part::Inflow))
        @if let Some(window) = window {
            p {
                "By chance of exceedance, from the dry side: 90 % means that 9 of 10 years bring at least so much, 10 % that 1 of 10 does."
            }
            (by_chance(findings, window, reader))
        }
        @let (by_month, others): (Vec<&MeasureFindings>, Vec<&MeasureFindings>) =
            found.inflow.iter().partition(|of| of.measure.name.starts_with("inflow_in_"));
        (super::table(study, &word, &others))
        details { summary { "Month by month" } (super::table(study, &word, &by_month)) }
        p {
            "The largest of a day, and of days in succession, are of this routing alone, and no flood peaks."
        }
    }
}
