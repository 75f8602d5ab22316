//! Volume in the first window by the chance that a year brings at least as much, at each level.

mod columns;
mod words;

use super::apart::moved_apart;
use super::axes::AmountTicks;
use super::marks::{Form, Marking, marker};
use super::page::Paragraphs;
use super::scales;
use super::sheet::{Drawn, HPos, Px, Sheet, Stroke, VPos};
use super::shown::{Shown, name};
use super::theme::{LABEL, MARGIN_PX, NAME, WIDTH_PX, level_ink};
use super::{Figure, Part, Setting, Svg};
use crate::findings::{Exceeded, Findings, MeasureFindings};
use columns::Columns;
use words::Words;

/// The figure.
pub(super) const FIGURE: Figure = Figure {
    slug: "window-volume",
    table: "volumes",
    question: "How much water does the snow yield in the window, in dry years and in wet ones, as the basin warms?",
    part: Part::Volumes,
    draw,
};

const PLOT_PX: f64 = 270.0;
const STEPS: usize = 6;
/// Between a line's end and its name, px.
const TO_NAME_PX: f64 = 14.0;
/// Height of a row below the columns, px.
const ROW_PX: f64 = 20.0;
/// Width of the mark before a row's name, px.
const MARK_PX: f64 = 18.0;

/// A level that is drawn.
struct Line<'a> {
    name: String,
    exceeded: &'a [Exceeded],
    marking: Marking,
}

fn draw(findings: &Findings, setting: &Setting<'_>) -> Option<Svg> {
    let measure = findings.basin.iter().find(|found| found.measure.is_volume)?;
    let shown = Shown::of(findings);
    let lines = lines(findings, measure, &shown, setting)?;
    let words = Words::of(findings, measure, &shown, setting.units)?;
    let text = paint(&lines, setting, &words).ok()?;
    let alt = format!("{}. {}", words.title, words.kind_of_drawing);
    Some(Svg { text, alt, caption: words.caption, title: words.title })
}

/// The reference and the levels beside it; nothing where one has no volumes.
fn lines<'a>(
    findings: &Findings,
    measure: &'a MeasureFindings,
    shown: &Shown,
    setting: &Setting<'_>,
) -> Option<Vec<Line<'a>>> {
    let levels = shown.all().into_iter().map(|at| {
        let place = shown.others.iter().position(|other| *other == at);
        let exceeded = measure.levels.get(at)?.exceeded.as_slice();
        (!exceeded.is_empty()).then(|| Line {
            name: name(findings, at, setting.units),
            exceeded,
            marking: Marking {
                ink: level_ink(at, findings.reference, findings.levels_c.len()),
                form: place.map_or(Form::Round, Form::of_level),
                is_hollow: place.is_none(),
            },
        })
    });
    levels.collect()
}

fn paint(lines: &[Line<'_>], setting: &Setting<'_>, words: &Words) -> Drawn<String> {
    let heading = Paragraphs::heading(setting.study_title, &words.title, &words.ensemble);
    let key = Paragraphs::key(&words.key);
    let unit = setting.units.volume();
    let volumes = lines.iter().flat_map(|line| line.exceeded.iter().map(|found| found.volume_hm3.value));
    let ticks = AmountTicks::up_to(unit.of(volumes.fold(0.0, f64::max)), STEPS);
    let names = lines.iter().map(|line| NAME.width(&line.name)).fold(0.0, f64::max);
    let left = MARGIN_PX + (scales::width(&ticks)).max(MARK_PX + names) + 14.0;
    let right = WIDTH_PX - MARGIN_PX - names - TO_NAME_PX;
    let columns = Columns::new(lines, [left, right]);
    let top = MARGIN_PX + heading.height() + 46.0;
    let bottom = top + PLOT_PX;
    let table = bottom + columns.heading_height();
    let below = table + ROW_PX * lines.len() as f64 + 18.0;
    let sheet = Sheet::new(below + key.height() + MARGIN_PX)?;
    let plot = sheet.plot((left, top), (right, bottom), 0.0..right - left, 0.0..ticks.top())?;

    heading.write(&sheet, MARGIN_PX)?;
    sheet.group("axis", || {
        scales::upwards(&sheet, &plot, &ticks, [left, right])?;
        scales::amounts_upwards(&sheet, &plot, &ticks, left)?;
        sheet.write(&words.axis, (MARGIN_PX, top - 18.0), NAME, HPos::Left, VPos::Bottom)?;
        columns.write(&sheet, bottom)
    })?;
    let mut ends: Vec<(f64, f64, &Line<'_>)> = Vec::new();
    for (at, line) in lines.iter().enumerate() {
        let place = |(column, found): (usize, &Exceeded)| {
            (columns.place(column, at), plot.at(0.0, unit.of(found.volume_hm3.value)).1)
        };
        let places: Vec<Px> = line.exceeded.iter().enumerate().map(place).collect();
        sheet.group("level", || mark(&sheet, &places, line.marking))?;
        ends.extend(places.last().map(|(x, y)| (*y, *x, line)));
    }
    sheet.group("levels", || names_at_ends(&sheet, ends, [top, bottom], right + TO_NAME_PX))?;
    sheet.group("volumes", || {
        for (at, line) in lines.iter().enumerate() {
            let y = table + ROW_PX * (at as f64 + 0.5);
            marker(&sheet, (MARGIN_PX + 6.0, y), line.marking)?;
            sheet.write(&line.name, (MARGIN_PX + MARK_PX, y), NAME, HPos::Left, VPos::Center)?;
            for (column, found) in line.exceeded.iter().enumerate() {
                let volume = super::labels::volume(setting.units, found.volume_hm3.value);
                sheet.write(&volume, (columns.middle(column), y), LABEL, HPos::Center, VPos::Center)?;
            }
        }
        Ok(())
    })?;
    key.write(&sheet, below)?;
    Ok(sheet.document(FIGURE.slug, &words.title, &words.description))
}

/// A level's volumes, joined.
fn mark(sheet: &Sheet, places: &[Px], marking: Marking) -> Drawn {
    let dash_px = marking.is_hollow.then_some([6, 4]);
    sheet.line(places, Stroke { ink: marking.ink, width_px: 1.4, dash_px })?;
    places.iter().try_for_each(|place| marker(sheet, *place, marking))
}

/// Each level's name beside the end of its line, moved apart and joined to it.
fn names_at_ends(sheet: &Sheet, mut ends: Vec<(f64, f64, &Line<'_>)>, within: [f64; 2], left: f64) -> Drawn {
    ends.sort_by(|a, b| a.0.total_cmp(&b.0));
    let wanted: Vec<[f64; 2]> = ends.iter().map(|(y, ..)| [*y, NAME.size_px]).collect();
    for ((end, x, line), y) in ends.iter().zip(moved_apart(&wanted, 4.0, within)) {
        sheet.line(&[(x + 8.0, *end), (left - 4.0, y)], Stroke::solid(line.marking.ink, 1.0))?;
        sheet.write(&line.name, (left, y), NAME, HPos::Left, VPos::Center)?;
    }
    Ok(())
}
