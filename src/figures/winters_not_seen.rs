//! Peak and survey SWE of winters that the fit has not seen: modelled against observed, a point a winter.

mod square;
mod words;

use super::axes::AmountTicks;
use super::fits::{DrawnFit, FitPart, FitSiteFigure};
use super::page::Paragraphs;
use super::scales;
use super::sheet::{Drawn, HPos, Sheet, VPos};
use super::theme::{MARGIN_PX, NAME, WIDTH_PX};
use super::{Setting, Svg};
use crate::fit::{Comparison, Split, winters_of};
use square::Square;
use words::Words;

/// The figure.
pub(super) const FIGURE: FitSiteFigure = FitSiteFigure {
    slug: "winters-not-seen",
    question: "How near does a fit come in winters that it has not seen?",
    part: FitPart::Skill,
    draw,
};

const STEPS: usize = 4;
/// Space between two squares, px.
const GAP_PX: f64 = 34.0;
/// Height of what stands above a square, px.
const ABOVE_PX: f64 = 66.0;
/// Height of the amounts and their name below a square, px.
const BELOW_PX: f64 = 46.0;
/// A square is at most so wide, px.
const MOST_PX: f64 = 380.0;

/// A winter that the fit has not seen.
#[derive(Debug, Clone, Copy)]
struct Winter {
    water_year: i32,
    observed_mm: f64,
    modelled_mm: f64,
    /// Whether it is among every other year from the first.
    is_odd: bool,
}

impl Winter {
    fn error_mm(&self) -> f64 {
        self.modelled_mm - self.observed_mm
    }
}

/// Winters by one amount.
struct Group {
    /// `Peak SWE`.
    name: String,
    /// `24 winters, in the mean 3.1 % below the observed`.
    finding: String,
    winters: Vec<Winter>,
}

fn draw(fit: &DrawnFit<'_>, site: usize, slug: &str, setting: &Setting<'_>) -> Option<Svg> {
    let comparison = fit.not_seen.get(site)?;
    let groups = groups(fit, comparison, setting);
    if groups.is_empty() {
        return None;
    }
    let words = Words::of(comparison, &groups, setting);
    let text = paint(&groups, slug, setting, &words).ok()?;
    Some(Svg { text, alt: words.alt, caption: words.caption, title: words.title })
}

/// Peak and the first survey date, as far as there are any.
fn groups(fit: &DrawnFit<'_>, comparison: &Comparison, setting: &Setting<'_>) -> Vec<Group> {
    let is_odd = winters_of(Split::Odd, &fit.result.winters);
    let odd = |water_year: i32| {
        let mut winters = fit.result.winters.iter().zip(&is_odd);
        winters.any(|(winter, is_odd)| *is_odd && winter.water_year == water_year)
    };
    let winter = |water_year: i32, observed_mm: f64, modelled_mm: f64| Winter {
        water_year,
        observed_mm,
        modelled_mm,
        is_odd: odd(water_year),
    };
    let years = || comparison.by_year.iter();
    let peaks = years()
        .filter_map(|year| Some(winter(year.water_year, year.observed_peak_mm?, year.modelled_peak_mm?)));
    let surveys = years().filter_map(|year| {
        let survey = year.surveys.first().copied().flatten()?;
        Some(winter(year.water_year, survey.observed_mm, survey.modelled_mm))
    });
    let survey = comparison.surveys.first();
    let day = survey.map_or(String::new(), |survey| survey.survey.words());
    [
        ("Peak SWE".to_owned(), peaks.collect::<Vec<_>>(), comparison.peak),
        (format!("{day} SWE"), surveys.collect(), survey.and_then(|survey| survey.bias)),
    ]
    .into_iter()
    .filter_map(|(name, winters, bias)| {
        let finding = words::finding(&bias?, setting.units);
        (!winters.is_empty()).then_some(Group { name, finding, winters })
    })
    .collect()
}

fn paint(groups: &[Group], slug: &str, setting: &Setting<'_>, words: &Words) -> Drawn<String> {
    let heading = Paragraphs::heading(setting.study_title, &words.title, &words.sample);
    let key = Paragraphs::key(&words.key);
    let depth = setting.units.depth();
    let winters = groups.iter().flat_map(|group| &group.winters);
    let highest = winters.map(|winter| winter.observed_mm.max(winter.modelled_mm)).fold(0.0, f64::max);
    let ticks = AmountTicks::up_to(depth.of(highest), STEPS);
    let left = MARGIN_PX + scales::width(&ticks) + 12.0;
    let room = WIDTH_PX - MARGIN_PX - left - GAP_PX * (groups.len() - 1) as f64;
    let side = (room / groups.len() as f64).min(MOST_PX);
    let top = MARGIN_PX + heading.height() + ABOVE_PX;
    let below = top + side + BELOW_PX + 12.0;
    let sheet = Sheet::new(below + key.height() + MARGIN_PX)?;

    heading.write(&sheet, MARGIN_PX)?;
    for (at, group) in groups.iter().enumerate() {
        let square = Square {
            left: left + at as f64 * (side + GAP_PX),
            top,
            side,
            is_first: at == 0,
            ticks: &ticks,
            depth,
        };
        sheet.group("winters", || square.draw(&sheet, group))?;
    }
    let axis = format!("Modelled, {}", depth.word);
    sheet.write(&axis, (MARGIN_PX, top - 12.0), NAME, HPos::Left, VPos::Bottom)?;
    key.write(&sheet, below)?;
    Ok(sheet.document(slug, &words.title, &words.description))
}
