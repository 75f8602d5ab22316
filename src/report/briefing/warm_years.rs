//! What the fit says of itself: skill in winters seen and not seen, and its error in warm ones beside the warming's effect.

use super::super::numbers::{DASH, fixed, signed};
use super::super::reader::Reader;
use super::super::study::Study;
use crate::findings::WarmYearBias;
use crate::fit::SkillInShort;
use maud::{Markup, html};

/// Where the section stands.
const ADDRESS: &str = "fitted";

/// A sentence under the title where the error is comparable with the effect; else nothing.
pub(super) fn in_short(study: &Study<'_>) -> Markup {
    let is_comparable = study.findings.warm_year_biases.iter().any(|found| found.is_comparable);
    html! { @if is_comparable {
        " In winters warmer than it was fitted on the model's own error is comparable with the effect of warming: "
        a href=(format!("#{ADDRESS}")) { "see by how much" } "."
    } }
}

/// The section; nothing where no fit says how it did.
pub(super) fn section(study: &Study<'_>) -> Markup {
    let skill = study.fitted.map_or(&[][..], |fitted| fitted.skill);
    html! { @if !skill.is_empty() {
        h2 id=(ADDRESS) { "How the fit did" }
        @for found in &study.findings.warm_year_biases { p { (beside_the_effect(found, study.reader)) } }
        (table(skill))
        p {
            "NSE is the Nash-Sutcliffe efficiency of daily SWE at the sites that it was fitted to, as its file has it. Not seen: each winter modelled by \
             the fit on every other one that it is not among. Colder to warmer: fitted on the coldest half of the winters, judged on the warmest; a model \
             must pass that before it is asked about a warmer climate, and passing does not prove it right (Klemeš 1986)."
        }
    } }
}

fn beside_the_effect(found: &WarmYearBias, reader: Reader) -> String {
    let error = found
        .standard_error_pct
        .map_or(String::new(), |error| format!(", standard error {} %", fixed(error, 1)));
    let share = found
        .share
        .map_or(String::new(), |share| format!(": the error is {} of the effect in size", fixed(share, 2)));
    let verdict = if found.is_comparable {
        "The two are comparable, and the effect is no surer than that."
    } else {
        "That is less than half."
    };
    format!(
        "{}: fitted on the coldest half of the winters, SWE on the survey date is off by {} % (modelled less observed{error}) in the warmest half, whose winters \
         are {} warmer. Warming by {} changes it by {} %{share}. {verdict}",
        found.site,
        signed(found.bias_pct, 1),
        reader.difference(found.halves_apart_c),
        reader.level(found.level_c),
        signed(found.effect_pct, 1)
    )
}

fn table(skill: &[SkillInShort]) -> Markup {
    let score = |value: Option<f64>| value.map_or(DASH.to_owned(), |value| fixed(value, 2));
    html! { div.scroll { table {
        thead { tr {
            th.text scope="col" { "Site" } th scope="col" { "Winters" } th scope="col" { "NSE, seen" } th scope="col" { "NSE, not seen" }
            th scope="col" { "NSE, colder" br; "to warmer" } th scope="col" { "Survey SWE there, %" }
        } }
        tbody { @for site in skill { tr {
            th.text scope="row" { (site.site) }
            td { (site.winters) }
            td { (score(site.nash_sutcliffe)) }
            td { (score(site.nash_sutcliffe_not_seen)) }
            td { (score(site.nash_sutcliffe_colder_to_warmer)) }
            td { (site.survey_bias_colder_to_warmer_pct.map_or(DASH.to_owned(), |bias| signed(bias, 1)))
                @if let Some(error) = site.survey_bias_standard_error_pct { " ± " (fixed(error, 1)) } }
        } } }
    } } }
}
