//! The headline's shift under other published rules, a row a rule, the study's own first.

mod words;

pub use words::rule_in_words;

use super::labels::level;
use super::marks::{Form, Marking, marker};
use super::page::Paragraphs;
use super::sheet::{Drawn, HPos, Plot, Sheet, Stroke, VPos};
use super::shown::Shown;
use super::theme::{BAND, EDGE, LABEL, MARGIN_PX, NAME, NOTE, WIDTH_PX, level_ink};
use super::value_ticks::ValueTicks;
use super::{Figure, Part, Setting, Svg};
use crate::findings::{Findings, LevelOfRule, MeasureByRule, RulePanel};
use crate::units::Unit;
use words::Words;

/// The figure.
pub(super) const FIGURE: Figure = Figure {
    slug: "rule-panel",
    question: "Would other published rules of the snow give another answer?",
    part: Part::Rules,
    draw,
};

/// Height of a level's line within a row, and what a row has around them, px.
const LINE_PX: f64 = 15.0;
const AROUND_PX: f64 = 14.0;
const STEPS: usize = 6;
/// Height of the levels' names above the rows, and of the axis below them, px.
const NAMES_PX: f64 = 34.0;
const AXIS_PX: f64 = 46.0;
/// Between a level's mark and its name, and from one name to the next mark, px.
const TO_NAME_PX: f64 = 11.0;
const BETWEEN_PX: f64 = 30.0;

/// A level that is drawn: its place among the panel's levels.
struct Told {
    at: usize,
    name: String,
    marking: Marking,
}

fn draw(findings: &Findings, setting: &Setting<'_>) -> Option<Svg> {
    let panel = findings.rule_panel.as_ref()?;
    let measure = panel.measures.first()?;
    let shown = Shown::of(findings);
    let levels: Vec<Told> = shown
        .others
        .iter()
        .enumerate()
        .filter_map(|(place, at)| {
            let level_c = *findings.levels_c.get(*at)?;
            Some(Told {
                at: measure.levels.iter().position(|of| of.level_c == level_c)?,
                name: level(setting.units, level_c),
                marking: Marking {
                    ink: level_ink(*at, findings.reference, findings.levels_c.len()),
                    form: Form::of_level(place),
                    is_hollow: false,
                },
            })
        })
        .collect();
    let words =
        Words::of(panel, measure, &shown.in_words(findings, setting.units), findings.years, setting.units)?;
    let text = paint(panel, measure, &levels, setting, &words).ok()?;
    Some(Svg { text, alt: words.alt, caption: words.caption, title: words.title })
}

/// Where a change stands across, in the reader's unit.
struct Scale {
    plot: Plot,
    depth: Unit,
}

impl Scale {
    fn at(&self, change_mm: f64) -> f64 {
        self.plot.at(self.depth.of(change_mm), 0.0).0
    }
}

fn paint(
    panel: &RulePanel,
    measure: &MeasureByRule,
    levels: &[Told],
    setting: &Setting<'_>,
    words: &Words,
) -> Drawn<String> {
    let heading = Paragraphs::heading(setting.study_title, &words.title, &words.sample);
    let key = Paragraphs::key(&words.key);
    let depth = setting.units.depth();
    let ends =
        measure.rules.iter().flat_map(|rule| levels.iter().filter_map(|of| rule.levels.get(of.at)?.shift));
    let span = ends
        .flat_map(|shift| [shift.q05, shift.q95])
        .fold([0.0_f64, 0.0], |[low, high], mm| [low.min(depth.of(mm)), high.max(depth.of(mm))]);
    let ticks = ValueTicks::around(span[0], span[1], STEPS);
    let [first, last] = ticks.ends();
    let names = words.rules.iter().flatten().map(|line| NAME.width(line)).fold(0.0, f64::max);
    let (left, right) = (MARGIN_PX + names + 16.0, WIDTH_PX - MARGIN_PX - 12.0);
    let row_px = AROUND_PX + LINE_PX * (levels.len() as f64).max(2.0);
    let top = MARGIN_PX + heading.height() + NAMES_PX;
    let bottom = top + row_px * panel.rules.len() as f64;
    let below = bottom + AXIS_PX + 10.0;
    let sheet = Sheet::new(below + key.height() + MARGIN_PX)?;
    let plot = sheet.plot((left, top), (right, bottom), first..last, 0.0..1.0)?;
    let scale = Scale { plot, depth };

    heading.write(&sheet, MARGIN_PX)?;
    sheet.group("levels", || {
        let mut x = left;
        for of in levels {
            marker(&sheet, (x + 5.0, top - 18.0), of.marking)?;
            sheet.write(&of.name, (x + 5.0 + TO_NAME_PX, top - 18.0), LABEL, HPos::Left, VPos::Center)?;
            x += 5.0 + TO_NAME_PX + LABEL.width(&of.name) + BETWEEN_PX;
        }
        Ok(())
    })?;
    sheet.block((MARGIN_PX - 6.0, top), (right, top + row_px), BAND)?;
    let zero = scale.at(0.0);
    sheet.line(&[(zero, top), (zero, bottom)], Stroke::solid(EDGE, 1.0))?;
    for (at, (rule, name)) in measure.rules.iter().zip(&words.rules).enumerate() {
        let above = top + row_px * at as f64;
        let is_tuned = panel.rules.get(at).is_some_and(|rule| rule.tuned.is_tuned);
        sheet.group("rule", || {
            let middle = above + row_px / 2.0 - NOTE.leading() * (name.len() as f64 - 1.0) / 2.0;
            for (line, text) in name.iter().enumerate() {
                let lettering = if line == 0 { NAME } else { NOTE };
                let place = (MARGIN_PX, middle + NOTE.leading() * line as f64);
                sheet.write(text, place, lettering, HPos::Left, VPos::Center)?;
            }
            for (line, of) in levels.iter().enumerate() {
                let y = above + row_px / 2.0 + LINE_PX * (line as f64 - (levels.len() as f64 - 1.0) / 2.0);
                if let Some(found) = rule.levels.get(of.at) {
                    mark(&sheet, found, &scale, y, Marking { is_hollow: !is_tuned, ..of.marking })?;
                }
            }
            Ok(())
        })?;
        sheet.line(&[(MARGIN_PX, above + row_px), (right, above + row_px)], Stroke::solid(BAND, 1.0))?;
    }
    sheet.group("axis", || {
        sheet.line(&[(left, bottom), (right, bottom)], Stroke::solid(EDGE, 1.0))?;
        for (value, label) in &ticks.ticks {
            let x = scale.plot.at(*value, 0.0).0;
            sheet.line(&[(x, bottom), (x, bottom + 5.0)], Stroke::solid(EDGE, 1.0))?;
            sheet.write(label, (x, bottom + 9.0), LABEL, HPos::Center, VPos::Top)?;
        }
        sheet.write(&words.axis, (MARGIN_PX, bottom + 30.0), NAME, HPos::Left, VPos::Top)
    })?;
    key.write(&sheet, below)?;
    Ok(sheet.document(FIGURE.slug, &words.title, &words.description))
}

/// The median shift and the 5-95 % range of the paired changes.
fn mark(sheet: &Sheet, found: &LevelOfRule, scale: &Scale, y: f64, marking: Marking) -> Drawn {
    let Some(shift) = found.shift else { return Ok(()) };
    let [low, middle, high] = [shift.q05, shift.median.value, shift.q95].map(|mm| scale.at(mm));
    sheet.line(&[(low, y), (high, y)], Stroke::solid(marking.ink, 1.5))?;
    marker(sheet, (middle, y), marking)
}
