//! The briefing: one self-contained page. It lays out; the words and numbers come from elsewhere.

mod answer;
mod assumed;
mod elevation;
mod generator_sheet;
mod levels;
mod normal;
mod observed;
mod parameters;
mod perennial;
mod places;
mod record;
mod replayed_years;
mod rule_panel;
mod snow;
mod sources;
mod together;
mod volumes;
mod warm_years;
mod yardsticks;
mod years;

use super::answer::Answer;
use super::generator_sheet::snow_mismatch;
use super::numbers::counted;
use super::page::{figure, page};
use super::study::Study;
use super::{cautions, terms};
use crate::basin::Basin;
use crate::figures::{Part, Svg};
use crate::findings::LEAST_REALIZATIONS_FOR_A_RANGE;
use maud::{Markup, html};

/// The page; `of_sites` are the figures of observed snow. Nothing is fetched and no script runs: its own policy forbids
/// both.
pub fn briefing_html(
    study: &Study<'_>,
    answer: &Answer,
    figures: &[(Part, Svg)],
    of_sites: &[Svg],
) -> Vec<u8> {
    let figures = Figures(figures);
    let findings = study.findings;
    let content = html! {
        p.over {
            (counted(findings.realizations, "realization")) " of " (counted(findings.years, "water year")) " under "
            (counted(findings.levels_c.len(), "warming level")) ", " (bands_in_words(study.basin))
        }
        h1 { (study.title) }
        @if let Some(fitted) = study.fitted { p.notice { (fitted.words()) (warm_years::in_short(study)) } }
        @else { p.notice {
            "This model is not fitted to observed snow. Its parameters are "
            @if study.defaults.iter().any(|default| default.key.starts_with("snow.")) { "at least in part the defaults" } @else { "those stated in the scenario" }
            ", and they decide headlines: "
            @if findings.comparisons.is_empty() { "hold the record's own years below against snow you know before you rely on any number here." } @else {
                "read how far it is from " a href=(format!("#{}", observed::ADDRESS)) { "what was observed" } " before you rely on any number here."
            }
        } }
        @if let Some(mismatch) = findings.generator.as_ref().and_then(|sheet| snow_mismatch(sheet, study.reader)) {
            p.notice { (mismatch) " All that follows is of weather that was made: "
                a href=(format!("#{}", generator_sheet::ADDRESS)) { "see how near it comes to the record" } "." }
        }
        @if let Some(words) = few_realizations(findings.realizations) { p.notice { (words) } }
        @if !study.unlikely.is_empty() {
            p.notice { (counted(study.unlikely.len(), "thing")) " about the input " (if study.unlikely.len() == 1 { "is" } else { "are" })
                " " a href=(format!("#{}", assumed::SECOND_LOOK)) { "worth a second look" } "." }
        }
        (answer::section(study, answer))
        (figures.of(Part::Answer))
        (snow::section(study, answer))
        (snow::timing(study, &figures))
        (elevation::section(study, &figures))
        (places::elevations(answer))
        (perennial::paragraph(study))
        (places::years(answer, &figures))
        (volumes::section(study, &figures))
        (yardsticks::section(study, answer))
        (together::section(study, answer, &figures))
        (years::section(study, answer, &figures))
        (parameters::section(study, answer))
        (rule_panel::section(study, &figures))
        (warm_years::section(study))
        (record::section(study, &figures))
        (replayed_years::section(study))
        (generator_sheet::section(study, &figures))
        (normal::section(study))
        (observed::section(study, of_sites))
        (assumed::section(study))
        (list_section("Cautions", &cautions::cautions(study.reader, study.warming, &study.snow.options)))
        h2 { "Terms" }
        dl { @for (term, meaning) in terms::terms(study.reader) { dt { (term) } dd { (meaning) } } }
        (sources::section())
        (repeat_section(study))
    };
    page(&format!("{} – briefing", study.title), &content)
}

/// How many things the top of the page says are worth a second look.
pub fn second_looks(study: &Study<'_>) -> usize {
    let sheet = study.findings.generator.as_ref();
    let mismatch = sheet.and_then(|sheet| snow_mismatch(sheet, study.reader));
    let few = few_realizations(study.findings.realizations);
    study.unlikely.len() + usize::from(mismatch.is_some()) + usize::from(few.is_some())
}

/// What a page of few realizations opens with; nothing where there are enough.
fn few_realizations(realizations: usize) -> Option<String> {
    if realizations >= LEAST_REALIZATIONS_FOR_A_RANGE {
        return None;
    }
    let (only, told) = match realizations {
        1 => (
            "a single realization".to_owned(),
            "It shows no chance at all: shares and ranges below are empty or of years within it.",
        ),
        _ => (
            format!("only {}", counted(realizations, "realization")),
            "Shares, ranges and errors over so few say little about what others of the same kind would give.",
        ),
    };
    Some(format!(
        "This study ran {only}. {told} For anything but a first look, run some hundreds (count, under [realizations])."
    ))
}

/// The figures of the page, by the part that they belong to.
struct Figures<'a>(&'a [(Part, Svg)]);

impl Figures<'_> {
    /// The figures of a part, in their order.
    fn of(&self, part: Part) -> Markup {
        html! { @for (_, svg) in self.0.iter().filter(|(of, _)| *of == part) { (figure(svg)) } }
    }
}

fn list_section(title: &str, sentences: &[String]) -> Markup {
    html! { h2 { (title) } ul { @for sentence in sentences { li { (sentence) } } } }
}

fn repeat_section(study: &Study<'_>) -> Markup {
    html! {
        h2 { "How to repeat it" }
        p { code { (study.origin.command) } " with seed " (study.origin.seed) " and thawline " (env!("CARGO_PKG_VERSION")) ". Input files and their SHA-256:" }
        ul { @for input in &study.origin.inputs { li { (input.role) ": " code { (input.path) } " " code { (input.sha256) } } } }
        footer { "Written by thawline " (env!("CARGO_PKG_VERSION")) ". A planning aid: not for flood forecasting or the operation of dams." }
    }
}

/// `10 elevation bands`; where several share a range, `14 bands in 10 ranges of elevation`.
fn bands_in_words(basin: &Basin) -> String {
    match (basin.bands.len(), basin.ranges()) {
        (bands, ranges) if ranges < bands => {
            format!("{} in {} of elevation", counted(bands, "band"), counted(ranges, "range"))
        }
        (bands, _) => counted(bands, "elevation band"),
    }
}
