//! The briefing: one self-contained page. It lays out; the words and numbers come from elsewhere.

mod answer;
mod assumed;
mod elevation;
mod explorer;
mod generator_sheet;
mod inflow_skill;
mod levels;
mod normal;
mod observed;
mod operations;
mod parameters;
mod parts;
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
mod words;
mod yardsticks;
mod years;

use super::answer::Answer;
use super::generator_sheet::snow_mismatch;
use super::numbers::counted;
use super::page::{figure, page, repeat};
use super::study::Study;
use super::{cautions, terms};
use crate::basin::Basin;
use crate::figures::{Figure, Part, Svg};
use crate::findings::LEAST_REALIZATIONS_FOR_A_RANGE;
use maud::{Markup, html};
use parts::{GLOSSARY, Group, part};
use words::Words;

/// So many cautions, those that matter most, stand right under the answer.
const CAUTIONS_FIRST: usize = 3;

/// Folds the parts.
const PARTS: &str = include_str!("briefing/parts.js");
/// Moves the explorer.
const EXPLORER: &str = include_str!("briefing/explorer.js");

/// The page; `of_sites` are the figures of observed snow. Nothing is fetched and no script but its own two runs: its own policy
/// forbids both. Without them all of it stands open.
pub fn briefing_html(
    study: &Study<'_>,
    answer: &Answer,
    figures: &[(Figure, Svg)],
    of_sites: &[(String, Svg)],
) -> Vec<u8> {
    let figures = Figures(figures);
    let findings = study.findings;
    let cautions = cautions::cautions(study.reader, study.warming, &study.snow.options);
    let terms = terms::terms(study.reader);
    let mut words = Words::new(&terms);
    let explorer = explorer::section(study);
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
        @let answered = answer::section(study, answer);
        (answered)
        (words.first_used_in(&answered))
        div.first role="note" aria-label="Before a number is used" { ul { @for caution in cautions.iter().take(CAUTIONS_FIRST) { li { (caution) } } } }
        (figures.of(Part::Answer))
        @for (slide, _) in figures.0.iter().filter(|(of, _)| of.part == Part::Slide) {
            @let file = format!("figures/{}.svg", slide.slug);
            p { "The answer for a slide, 16 to 9: " a href=(file) { (file) } "." }
        }
        (explorer)
        (words.first_used_in(&explorer))
        (parts::detail(&groups(study, answer, (&figures, of_sites), (&cautions, &terms)), &mut words))
    };
    let scripts: &[&str] = if explorer.0.is_empty() { &[PARTS] } else { &[EXPLORER, PARTS] };
    page(&format!("{} – briefing", study.title), &content, scripts)
}

/// Everything behind the answer, in the order of a reader's questions.
fn groups(
    study: &Study<'_>,
    answer: &Answer,
    (figures, of_sites): (&Figures<'_>, &[(String, Svg)]),
    (cautions, terms): (&[String], &[(&'static str, String)]),
) -> [Group; 7] {
    [
        Group::new(
            "The snow",
            [
                part("snow", "Snow, level by level", snow::section(study, answer)),
                part("dates", "When it lies, and when it goes", snow::timing(study, figures)),
                part("elevation", "Where it is lost", elevations(study, answer, figures)),
                part("volumes", "Water from the snow, and when", volumes::section(study, figures)),
            ],
        ),
        Group::new(
            "Warming against precipitation",
            [
                part("yardsticks", "By other yardsticks", yardsticks::section(study, answer)),
                part("make-up", "What would make up for it", yardsticks::make_up(study, answer)),
                part(
                    "together",
                    "Warming and precipitation together",
                    together::section(study, answer, figures),
                ),
                part("what-is-to-hold", "What is to hold", together::what_is_to_hold(answer)),
            ],
        ),
        Group::new(
            "Odds and single years",
            [
                part("years", "Single years, and means of several", years::section(study, answer, figures)),
                part("dry-and-warm", "Dry years and warm ones", places::years(answer, figures)),
                part("replayed-years", "Remembered years, replayed", replayed_years::section(study)),
                part("percent-of-median", "Percent of median", normal::section(study)),
            ],
        ),
        operations::group(study, figures),
        Group::new(
            "The model and its fit",
            [
                part(observed::ADDRESS, "Observed snow", observed::section(study, of_sites)),
                part(warm_years::ADDRESS, "How the fit did", warm_years::section(study)),
                part(inflow_skill::ADDRESS, "Modelled against observed inflow", inflow_skill::skill(study)),
                part("parameters", "If other parameters were right", parameters::section(study, answer)),
                part("rules", "If the model's rules were others", rule_panel::section(study, figures)),
            ],
        ),
        Group::new(
            "The basin, its record and its realizations",
            [
                part("record", "The record", record::section(study, figures)),
                part(
                    generator_sheet::ADDRESS,
                    "Does the weather that was made look like the record?",
                    generator_sheet::section(study, figures),
                ),
                part("assumed", "What was assumed", assumed::section(study)),
            ],
        ),
        Group::new(
            "To look up",
            [
                part("cautions", "Cautions", html! { ul { @for caution in cautions { li { (caution) } } } }),
                part(
                    GLOSSARY,
                    "Terms",
                    html! { dl { @for (term, meaning) in terms { dt { (term) } dd { (meaning) } } } },
                ),
                part("sources", "Sources of the methods", sources::section()),
                part("repeat", "How to repeat it", repeat(&study.origin)),
            ],
        ),
    ]
}

/// Where the snow goes, band by band, and lines that move with it.
fn elevations(study: &Study<'_>, answer: &Answer, figures: &Figures<'_>) -> Markup {
    html! { (elevation::section(study, figures)) (places::elevations(answer)) (perennial::paragraph(study)) }
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
struct Figures<'a>(&'a [(Figure, Svg)]);

impl Figures<'_> {
    /// The figures of a part, in their order.
    fn of(&self, part: Part) -> Markup {
        html! { @for (of, svg) in self.0.iter().filter(|(of, _)| of.part == part) { (figure(svg, of.slug, Some(of.table))) } }
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
