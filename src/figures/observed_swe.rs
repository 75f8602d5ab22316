//! Observed snow against the model at one site: a small panel a water year, all on one scale.

mod grid;
mod panel;
mod words;

use super::axes::AmountTicks;
use super::page::Paragraphs;
use super::scales;
use super::sheet::{Drawn, HPos, Sheet, VPos};
use super::swe_pair;
use super::theme::{MARGIN_PX, NAME};
use super::{Setting, SiteFigure, Svg};
use crate::fit::{ComparedYear, Comparison};
use crate::observed::Kind;
use grid::Grid;
use panel::Panel;
use words::Words;

/// The figure.
pub(super) const FIGURE: SiteFigure = SiteFigure {
    slug: "observed-swe",
    table: "observed-daily",
    question: "How near does the model come to the snow that was observed?",
    draw,
};

/// More panels than this are not drawn.
const MOST_YEARS: usize = 40;
const STEPS: usize = 4;
/// Height of the line that names axis and marks, px.
const NAMES_PX: f64 = 30.0;

fn draw(comparison: &Comparison, slug: &str, setting: &Setting<'_>) -> Option<Svg> {
    let years = &comparison.by_year;
    let drawn = &years[years.len().saturating_sub(MOST_YEARS)..];
    if drawn.is_empty() {
        return None;
    }
    let words = Words::of(comparison, drawn.len(), setting);
    let text = paint(comparison.kind, drawn, slug, setting, &words).ok()?;
    Some(Svg { text, alt: words.alt, caption: words.caption, title: words.title })
}

fn paint(
    kind: Kind,
    years: &[ComparedYear],
    slug: &str,
    setting: &Setting<'_>,
    words: &Words,
) -> Drawn<String> {
    let heading = Paragraphs::heading(setting.study_title, &words.title, &words.sample);
    let key = Paragraphs::key(&words.key);
    let depth = setting.units.depth();
    let ticks = AmountTicks::up_to(depth.of(highest(years)), STEPS);
    let names = MARGIN_PX + heading.height() + 20.0;
    let grid = Grid::new(years.len(), MARGIN_PX + scales::width(&ticks) + 9.0, names + NAMES_PX);
    let below = grid.bottom() + 16.0;
    let sheet = Sheet::new(below + key.height() + MARGIN_PX)?;

    heading.write(&sheet, MARGIN_PX)?;
    let axis = format!("SWE as the day begins, {}", depth.word);
    sheet.write(&axis, (MARGIN_PX, names + 14.0), NAME, HPos::Left, VPos::Bottom)?;
    sheet.group("marks", || swe_pair::name(&sheet, Some(kind), names + 14.0))?;
    for (at, year) in years.iter().enumerate() {
        let panel = Panel { place: grid.place(at), kind, year, ticks: &ticks, depth };
        sheet.group("year", || panel.draw(&sheet))?;
    }
    key.write(&sheet, below)?;
    Ok(sheet.document(slug, &words.title, &words.description))
}

/// The highest SWE that is drawn, mm.
fn highest(years: &[ComparedYear]) -> f64 {
    let days = years.iter().flat_map(|year| &year.days);
    days.map(|day| day.observed_mm.unwrap_or(0.0).max(day.modelled_mm)).fold(0.0, f64::max)
}
