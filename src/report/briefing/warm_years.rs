//! What the fit says of itself: skill in winters seen and not seen, and its error in warm ones beside the warming's effect.

use super::super::numbers::{DASH, fixed, signed};
use super::super::study::Study;
use crate::findings::{BiasVerdict, WarmYearBias};
use crate::fit::SkillInShort;
use maud::{Markup, html};

/// Where the section stands.
pub(super) const ADDRESS: &str = "fitted";

/// A sentence under the title where the error is comparable with the effect, or may be; else nothing.
pub(super) fn in_short(study: &Study<'_>) -> Markup {
    let has =
        |verdict: BiasVerdict| study.findings.warm_year_biases.iter().any(|found| found.verdict == verdict);
    let words = if has(BiasVerdict::Comparable) {
        Some("the model's own error is comparable with the effect of warming")
    } else if has(BiasVerdict::CannotTell) {
        Some(
            "the model's own error may be comparable with the effect of warming: what was observed cannot tell",
        )
    } else {
        None
    };
    html! { @if let Some(words) = words {
        " In winters warmer than it was fitted on " (words) " (" a href=(format!("#{ADDRESS}")) { "see how far" } ")."
    } }
}

/// The section; nothing where no fit says how it did, or nothing of it is in force.
pub(super) fn section(study: &Study<'_>) -> Markup {
    let fitted = study.fitted.filter(|fitted| !fitted.taken.is_empty() && !fitted.skill.is_empty());
    html! { @if let Some(fitted) = fitted {
        @if !fitted.left.is_empty() { p {
            "This study takes only a part of what was fitted, so that it runs another model than the one whose skill stands here: its own error in warm \
             winters is not known."
        } }
        @for found in &study.findings.warm_year_biases { p { (beside_the_effect(found, study)) } }
        (table(fitted.skill))
        p {
            "NSE is the Nash-Sutcliffe efficiency of daily SWE at the sites that it was fitted to, as its file has it. Not seen: each winter modelled by \
             the fit on every other one that it is not among. Colder to warmer: fitted on the coldest half of the winters, judged on the warmest; a model \
             must pass that before it is asked about a warmer climate, and passing does not prove it right (Klemeš 1986)."
        }
    } }
}

fn beside_the_effect(found: &WarmYearBias, study: &Study<'_>) -> String {
    let error =
        found.standard_error_pct.map_or(", too few winters for a standard error".to_owned(), |error| {
            format!(", standard error {} %", fixed(error, 1))
        });
    let title = study.findings.basin.first().map_or("measure", |headline| headline.measure.title.as_str());
    let effect = found.effect_pct.map_or(" No level of this study is as warm.".to_owned(), |effect| {
        format!(
            " As much warming changes the basin's {title} by {} %, on a straight line between levels.",
            signed(effect, 1)
        )
    });
    let share = found
        .share
        .map_or(String::new(), |share| format!(" The error is {} of the effect in size.", fixed(share, 2)));
    let verdict = match found.verdict {
        BiasVerdict::Comparable => "The two are comparable, and the effect is no surer than that.",
        BiasVerdict::CannotTell => {
            "Whether it is less than half of the effect cannot be told: two standard errors more would be half of it, or one of these numbers is not there."
        }
        BiasVerdict::Smaller => "That is less than half, also if it were two standard errors more.",
    };
    format!(
        "{}: fitted on the coldest half of the winters, the site's SWE on the survey date is off by {} % (modelled less observed{error}) in the warmest half, \
         whose winters are {} warmer.{effect}{share} {verdict}",
        found.site,
        signed(found.bias_pct, 1),
        study.reader.difference(found.halves_apart_c)
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
