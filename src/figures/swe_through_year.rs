//! Basin SWE through the water year at each level, against the reference: the range of single years on every day.

mod grid;
mod key;
mod panel;
mod words;

use super::axes::{AmountTicks, Calendar};
use super::page::Paragraphs;
use super::scales;
use super::sheet::{Drawn, HPos, Sheet, VPos};
use super::shown::{Shown, name};
use super::theme::{INK, MARGIN_PX, NAME, level_ink};
use super::{Figure, Part, Setting, Svg};
use crate::findings::Findings;
use grid::{Grid, Place};
use key::Key;
use panel::{Course, Panel};
use words::Words;

/// The figure.
pub(super) const FIGURE: Figure = Figure {
    slug: "swe-through-year",
    table: "swe-through-year",
    question: "How does the snow build up and go through the year as the basin warms?",
    part: Part::Timing,
    draw,
};

const STEPS: usize = 5;

fn draw(findings: &Findings, setting: &Setting<'_>) -> Option<Svg> {
    findings.basin.first()?;
    let shown = Shown::of(findings);
    let words = Words::of(findings, &shown, setting)?;
    let text = paint(findings, &shown, setting, &words).ok()?;
    let alt = format!("{}. {}", words.title, words.kind_of_drawing);
    Some(Svg { text, alt, caption: words.caption, title: words.title })
}

fn paint(findings: &Findings, shown: &Shown, setting: &Setting<'_>, words: &Words) -> Drawn<String> {
    let heading = Paragraphs::heading(setting.study_title, &words.title, &words.ensemble);
    let note = Paragraphs::key(&words.key);
    let depth = setting.units.depth();
    let course = |at: usize| Course::of(&findings.swe_through_year.levels[at], depth);
    let reference = course(findings.reference);
    let ink = |at: usize| level_ink(at, findings.reference, findings.levels_c.len());
    let panel = |(place, name): (usize, &[String; 2])| Panel {
        name: name.clone(),
        level: shown.others.get(place).map(|at| course(*at)),
        ink: shown.others.get(place).map_or(INK, |at| ink(*at)),
    };
    let panels: Vec<Panel> = (0..).zip(&words.panels).map(panel).collect();
    let courses = panels.iter().filter_map(|panel| panel.level.as_ref()).chain([&reference]);
    let highest = courses.map(Course::highest).fold(0.0, f64::max);
    // The key stands where the first panel's curves are lowest, and the scale leaves it room.
    let grid = Grid::new(panels.len(), &AmountTicks::up_to(highest, STEPS));
    let first = panels.first().and_then(|panel| Some((panel, panel.level.as_ref()?)));
    let of_first = first.map(|(panel, _)| (panel.name[0].clone(), panel.ink));
    let key = Key::of(name(findings, findings.reference, setting.units), of_first, grid.size);
    let in_first: Vec<&Course> = first.map(|(_, level)| level).into_iter().chain([&reference]).collect();
    let (side, needed) = key.place(&in_first);
    let ticks = AmountTicks::up_to(highest.max(needed), STEPS);
    let grid = Grid::new(panels.len(), &ticks);

    let top = MARGIN_PX + heading.height() + 36.0;
    let below = top + grid.height();
    let sheet = Sheet::new(below + note.height() + MARGIN_PX)?;
    heading.write(&sheet, MARGIN_PX)?;
    sheet.write(&words.axis, (MARGIN_PX, top - 6.0), NAME, HPos::Left, VPos::Bottom)?;
    // The whole water year; it ends where the next begins.
    let calendar = Calendar::exactly(1.0..366.0, setting.water_year_starts);
    for (at, panel) in panels.iter().enumerate() {
        let place = grid.place(at, top);
        let Place { left, right, bottom, .. } = place;
        let (days, amounts) = (calendar.days.clone(), 0.0..ticks.top());
        let plot = sheet.plot((left, place.top), (right, bottom), days, amounts)?;
        sheet.group("level", || panel.draw(&sheet, &plot, (left, place.top), &reference))?;
        sheet.group("axis", || {
            scales::upwards(&sheet, &plot, &ticks, [left, right])?;
            if place.is_first_in_row {
                scales::amounts_upwards(&sheet, &plot, &ticks, left)?;
            }
            scales::months(&sheet, &plot, &calendar, bottom)
        })?;
        if at == 0 {
            sheet.group("key", || key.write(&sheet, side, [left, right], place.top))?;
        }
    }
    note.write(&sheet, below)?;
    Ok(sheet.document(FIGURE.slug, &words.title, &words.description))
}
