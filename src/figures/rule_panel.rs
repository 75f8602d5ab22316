//! The headline's shift under other rules, a row a rule, the study's own first.

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
use crate::findings::{Findings, LevelOfRule, MeasureByRule, OfRule, RulePanel};
use crate::units::Unit;
use words::{Subject, Words};

/// The figure.
pub(super) const FIGURE: Figure = Figure {
    slug: "rule-panel",
    table: "rule-panel",
    question: "Would other rules of the snow give another answer?",
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
    let reference_c = *findings.levels_c.get(findings.reference)?;
    let warming_c =
        |of: &Told| measure.levels.get(of.at).map_or(0.0, |level| (level.level_c - reference_c).abs());
    let farthest = levels.iter().max_by(|a, b| warming_c(a).total_cmp(&warming_c(b)))?.at;
    let rows = Rows::of(panel, measure, &levels);
    let has_ranges = rows.shifts().all(|(_, found)| found.shift.is_some_and(|shift| shift.has_range()));
    let (years, units) = (findings.years, setting.units);
    let subject = Subject { panel, measure, farthest, has_ranges, years, units };
    let words = Words::of(subject, &shown.in_words(findings, units))?;
    let text = paint(&rows, setting, &words).ok()?;
    Some(Svg { text, alt: words.alt, caption: words.caption, title: words.title })
}

/// What is drawn of each rule that was tuned, and of the others their names.
struct Rows<'a> {
    rules: Vec<Option<&'a OfRule>>,
    levels: &'a [Told],
}

impl<'a> Rows<'a> {
    fn of(panel: &RulePanel, measure: &'a MeasureByRule, levels: &'a [Told]) -> Self {
        let rules = panel.rules.iter().zip(&measure.rules);
        Self { rules: rules.map(|(rule, found)| rule.tuned.is_tuned.then_some(found)).collect(), levels }
    }

    /// Every mark's rule and level.
    fn shifts(&self) -> impl Iterator<Item = (&'a OfRule, &'a LevelOfRule)> {
        let of_rule =
            |rule: &'a OfRule| self.levels.iter().filter_map(move |of| Some((rule, rule.levels.get(of.at)?)));
        self.rules.iter().flatten().flat_map(move |rule| of_rule(rule))
    }

    /// The change to the end of the rule's own half spread that one of its marks points to, mm, a fall first.
    fn half_spread(&self, rule: &OfRule) -> [Option<f64>; 2] {
        let medians =
            || self.levels.iter().filter_map(|of| Some(rule.levels.get(of.at)?.shift?.median.value));
        let spread = rule.precipitation_spread;
        let fall = spread.filter(|_| medians().any(|mm| mm < 0.0)).map(|spread| spread.q05 - spread.q50);
        let rise = spread.filter(|_| medians().any(|mm| mm > 0.0)).map(|spread| spread.q95 - spread.q50);
        [fall, rise]
    }

    /// Every change that has to find room, mm.
    fn ends(&self) -> impl Iterator<Item = f64> {
        let of_marks = self.shifts().filter_map(|(_, found)| found.shift).flat_map(|shift| {
            if shift.has_range() { [shift.q05, shift.q95] } else { [shift.median.value; 2] }
        });
        let of_bands = self.rules.iter().flatten().flat_map(|rule| self.half_spread(rule)).flatten();
        of_marks.chain(of_bands)
    }
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

fn paint(rows: &Rows<'_>, setting: &Setting<'_>, words: &Words) -> Drawn<String> {
    let levels = rows.levels;
    let heading = Paragraphs::heading(setting.study_title, &words.title, &words.sample);
    let key = Paragraphs::key(&words.key);
    let depth = setting.units.depth();
    let span =
        rows.ends().fold([0.0_f64, 0.0], |[low, high], mm| [low.min(depth.of(mm)), high.max(depth.of(mm))]);
    let ticks = ValueTicks::around(span[0], span[1], STEPS);
    let [first, last] = ticks.ends();
    let width = |(line, text): (usize, &String)| if line == 0 { NAME.width(text) } else { NOTE.width(text) };
    let names = words.rules.iter().flat_map(|name| name.iter().enumerate()).map(width).fold(0.0, f64::max);
    let (left, right) = (MARGIN_PX + names + 16.0, WIDTH_PX - MARGIN_PX - 12.0);
    let most = words.rules.iter().map(Vec::len).chain([levels.len()]).fold(2, usize::max);
    let row_px = AROUND_PX + LINE_PX * most as f64;
    let top = MARGIN_PX + heading.height() + NAMES_PX;
    let bottom = top + row_px * rows.rules.len() as f64;
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
    let zero = scale.at(0.0);
    for (at, (rule, name)) in rows.rules.iter().zip(&words.rules).enumerate() {
        let above = top + row_px * at as f64;
        sheet.group("rule", || {
            let middle = above + row_px / 2.0 - NOTE.leading() * (name.len() as f64 - 1.0) / 2.0;
            for (line, text) in name.iter().enumerate() {
                let lettering = if line == 0 { NAME } else { NOTE };
                let place = (MARGIN_PX, middle + NOTE.leading() * line as f64);
                sheet.write(text, place, lettering, HPos::Left, VPos::Center)?;
            }
            let Some(rule) = rule else { return Ok(()) };
            for end in rows.half_spread(rule).into_iter().flatten() {
                band(&sheet, [zero, scale.at(end)], [above + 3.0, above + row_px - 3.0])?;
            }
            for (line, of) in levels.iter().enumerate() {
                let y = above + row_px / 2.0 + LINE_PX * (line as f64 - (levels.len() as f64 - 1.0) / 2.0);
                if let Some(found) = rule.levels.get(of.at) {
                    mark(&sheet, found, &scale, y, of.marking)?;
                }
            }
            Ok(())
        })?;
        // The study's own stands apart from what takes its place.
        let ink = if at == 0 { EDGE } else { BAND };
        sheet.line(&[(MARGIN_PX, above + row_px), (right, above + row_px)], Stroke::solid(ink, 1.0))?;
    }
    sheet.line(&[(zero, top), (zero, bottom)], Stroke::solid(EDGE, 1.0))?;
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

/// Half of a spread, from no change to its end, which is drawn out: what lies beyond it outweighs.
fn band(sheet: &Sheet, [zero, end]: [f64; 2], [above, below]: [f64; 2]) -> Drawn {
    sheet.block((zero.min(end), above), (zero.max(end), below), BAND)?;
    sheet.line(&[(end, above), (end, below)], Stroke::solid(EDGE, 1.5))
}

/// The median shift, and the 5-95 % range of the paired changes where they are enough for one.
fn mark(sheet: &Sheet, found: &LevelOfRule, scale: &Scale, y: f64, marking: Marking) -> Drawn {
    let Some(shift) = found.shift else { return Ok(()) };
    let [low, middle, high] = [shift.q05, shift.median.value, shift.q95].map(|mm| scale.at(mm));
    if shift.has_range() {
        sheet.line(&[(low, y), (high, y)], Stroke::solid(marking.ink, 1.5))?;
    }
    marker(sheet, (middle, y), marking)
}
