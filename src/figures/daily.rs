//! One place day by day: the snow that lay, observed and modelled, and below it what each day brought; a water year
//! below another, each kind on one scale.

mod layout;
mod panel;
mod words;

use super::axes::AmountTicks;
use super::page::Paragraphs;
use super::scales;
use super::sheet::{Drawn, HPos, Sheet, VPos};
use super::swe_pair;
use super::theme::{MARGIN_PX, NAME};
use super::{DaysFigure, Setting, Svg};
use crate::fit::{PlaceDays, PlaceYear};
use layout::Layout;
use panel::{Panel, STRIPS, Scale};
use words::Words;

/// The figure.
pub(super) const FIGURE: DaysFigure =
    DaysFigure { slug: "daily", question: "What did each day bring, and how much snow lay?", draw };

const SWE_STEPS: usize = 4;
const DAY_STEPS: usize = 5;
/// Height of the line that names axis and lines, px.
const NAMES_PX: f64 = 26.0;

fn draw(days: &PlaceDays, apart: Option<&str>, setting: &Setting<'_>) -> Option<Svg> {
    if days.years.is_empty() {
        return None;
    }
    let words = Words::of(days, apart, setting);
    let text = paint(days, setting, &words).ok()?;
    Some(Svg { text, alt: words.alt, caption: words.caption, title: words.title })
}

fn paint(days: &PlaceDays, setting: &Setting<'_>, words: &Words) -> Drawn<String> {
    let heading = Paragraphs::heading(setting.study_title, &words.title, &words.sample);
    let key = Paragraphs::key(&words.key);
    let depth = setting.units.depth();
    let swe_ticks = AmountTicks::up_to(depth.of(highest_swe(&days.years)), SWE_STEPS);
    let day_ticks = STRIPS
        .each_ref()
        .map(|strip| AmountTicks::up_to(depth.of(highest_of_a_day(&days.years, strip.scale)), DAY_STEPS));
    let names = MARGIN_PX + heading.height() + 20.0;
    let widest = day_ticks.iter().map(scales::width).fold(scales::width(&swe_ticks), f64::max);
    let left = MARGIN_PX + widest + 9.0;
    let layout = Layout::new(days.years.len(), left, names + NAMES_PX);
    let below = layout.bottom() + 14.0;
    let sheet = Sheet::new(below + key.height() + MARGIN_PX)?;

    heading.write(&sheet, MARGIN_PX)?;
    let axis = format!("SWE as the day begins, {}; bars: {0} a day", depth.word);
    sheet.write(&axis, (MARGIN_PX, names + 14.0), NAME, HPos::Left, VPos::Bottom)?;
    let kind = days.observed.as_ref().map(|observed| observed.kind);
    sheet.group("marks", || swe_pair::name(&sheet, kind, names + 14.0))?;
    for (at, year) in days.years.iter().enumerate() {
        let panel = Panel {
            place: layout.place(at),
            kind,
            year,
            swe_ticks: &swe_ticks,
            day_ticks: &day_ticks,
            depth,
        };
        let note = words::year_note(year, setting.units);
        sheet.group("year", || panel.draw(&sheet, &note))?;
    }
    key.write(&sheet, below)?;
    Ok(sheet.document(FIGURE.slug, &words.title, &words.description))
}

/// The highest SWE that is drawn, mm.
fn highest_swe(years: &[PlaceYear]) -> f64 {
    let days = years.iter().flat_map(|year| &year.swe);
    days.map(|day| day.observed_mm.unwrap_or(0.0).max(day.modelled_mm)).fold(0.0, f64::max)
}

/// The most that a day brings in the bars of a scale, mm.
fn highest_of_a_day(years: &[PlaceYear], scale: Scale) -> f64 {
    let strips = STRIPS.iter().filter(|strip| strip.scale == scale);
    strips.flat_map(|strip| years.iter().flat_map(strip.of)).copied().fold(0.0, f64::max)
}
