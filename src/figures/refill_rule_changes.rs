//! What other rules would change of reliability and spill, level by level.

mod words;

use super::labels::percent_size;
use super::level_lines::{marked, row};
use super::marks::point_interval;
use super::page::Paragraphs;
use super::rule_change_words::{ALL_BROUGHT_BACK, RELIABILITY, change_in_words, changed, measure};
use super::sheet::{Drawn, HPos, Plot, Px, Sheet, Stroke, VPos};
use super::shown::Shown;
use super::theme::{EDGE, LABEL, MARGIN_PX, NAME, NOTE, WIDTH_PX};
use super::value_ticks::ValueTicks;
use super::{Figure, Part, Setting, Svg};
use crate::findings::{Findings, Operations};
use crate::season::Outcome;
use crate::units::UnitSystem;
use words::Words;

/// The figure.
pub(super) const FIGURE: Figure = Figure {
    slug: "refill-rule-changes",
    table: "rule-changes",
    question: "Does another date of refill, or another rule, buy back what warming takes?",
    part: Part::RuleChanges,
    draw,
};

/// Height of a level within a rule's row, and free space around a row, px.
const LEVEL_PX: f64 = 13.0;
const ROW_PAD_PX: f64 = 9.0;
/// Between panels, px.
const GAP_PX: f64 = 26.0;
/// Width of the column of what is brought back, px.
const BACK_PX: f64 = 104.0;
const STEPS: usize = 4;
const SPILL: &str = "spill_hm3";

/// One of the two panels: what it shows, in the reader's unit.
struct Panel {
    name: &'static str,
    axis: String,
    scale: f64,
    ticks: ValueTicks,
}

fn draw(findings: &Findings, setting: &Setting<'_>) -> Option<Svg> {
    let operations = findings.operations.as_ref()?;
    // The rules as stated are the first; alone they have nothing to be held against.
    if operations.rule_changes.len() < 2 {
        return None;
    }
    let shown = Shown::of(findings);
    let panels = [
        panel(operations, &shown, RELIABILITY, setting.units)?,
        panel(operations, &shown, SPILL, setting.units)?,
    ];
    let words = Words::of(findings, operations, &shown, setting.units)?;
    let text = paint(findings, operations, &panels, &shown, setting, &words).ok()?;
    let alt = format!("{}. {}", words.title, words.kind_of_drawing);
    Some(Svg { text, alt, caption: words.caption, title: words.title })
}

/// A panel; nothing where the measure has no number anywhere.
fn panel(operations: &Operations, shown: &Shown, name: &'static str, units: UnitSystem) -> Option<Panel> {
    let is_share = name == RELIABILITY;
    let scale = if is_share { 100.0 } else { units.volume().of(1.0) };
    let levels = shown.all();
    let ends = operations.rule_changes.iter().filter_map(|of| measure(of, name)).flat_map(|found| {
        levels.iter().filter_map(|at| found.levels.get(*at)).flat_map(|found| {
            [found.periods.q05, found.periods.q50, found.periods.q95].into_iter().filter_map(Outcome::value)
        })
    });
    let [low, high] = ends.fold([f64::INFINITY, f64::NEG_INFINITY], |[low, high], value| {
        [low.min(scale * value), high.max(scale * value)]
    });
    if !low.is_finite() {
        return None;
    }
    // Nothing is more reliable than always, and nothing spills less than nothing.
    let [low, high] =
        if is_share { [low.clamp(0.0, 99.0), 100.0] } else { [0.0, if high > 0.0 { high } else { 1.0 }] };
    let axis = if is_share {
        "Reliability by volume (%)".to_owned()
    } else {
        format!("Spill a year ({})", short_volume(units))
    };
    Some(Panel { name, axis, scale, ticks: ValueTicks::around(low, high, STEPS) })
}

/// The volume's unit where there is little room.
fn short_volume(units: UnitSystem) -> &'static str {
    match units {
        UnitSystem::Metric => units.volume().word,
        UnitSystem::Us => "1000 ac-ft",
    }
}

fn paint(
    findings: &Findings,
    operations: &Operations,
    panels: &[Panel; 2],
    shown: &Shown,
    setting: &Setting<'_>,
    words: &Words,
) -> Drawn<String> {
    let heading = Paragraphs::heading(setting.study_title, &words.title, &words.ensemble);
    let key = Paragraphs::key(&words.key);
    let levels = marked(findings, shown, setting.units);
    let rules: Vec<String> = operations.rule_changes.iter().map(|of| change_in_words(of.change)).collect();
    let row_px = LEVEL_PX * levels.len() as f64 + 2.0 * ROW_PAD_PX;
    let left = MARGIN_PX + rules.iter().map(|rule| NAME.width(rule)).fold(0.0, f64::max) + 20.0;
    let right = WIDTH_PX - MARGIN_PX - if words.back.is_some() { BACK_PX } else { 0.0 };
    let half = (right - left - GAP_PX) / 2.0;
    let names = MARGIN_PX + heading.height() + 26.0;
    let top = names + 52.0;
    let bottom = top + row_px * rules.len() as f64;
    let below = bottom + 40.0;
    let sheet = Sheet::new(below + key.height() + MARGIN_PX)?;
    let row_top = |rule: usize| top + row_px * rule as f64;

    heading.write(&sheet, MARGIN_PX)?;
    sheet.group("levels", || row(&sheet, &levels, (MARGIN_PX, names)))?;
    sheet.group("rules", || {
        for (at, rule) in rules.iter().enumerate() {
            let y = row_top(at) + row_px / 2.0;
            let across = [(MARGIN_PX, row_top(at)), (WIDTH_PX - MARGIN_PX, row_top(at))];
            sheet.line(&across, Stroke::solid(EDGE, 0.6))?;
            sheet.write(rule, (MARGIN_PX, y), NAME, HPos::Left, VPos::Center)?;
        }
        Ok(())
    })?;
    for (at, panel) in panels.iter().enumerate() {
        let from = left + at as f64 * (half + GAP_PX);
        let [low, high] = panel.ticks.ends();
        // Spill of exactly 0 and reliability of exactly 1 keep clear of the panel's edges.
        let plot = sheet.plot((from + 6.0, top), (from + half - 6.0, bottom), low..high, 0.0..1.0)?;
        sheet.group("axis", || axis(&sheet, panel, &plot, [from, from + half], [top, bottom]))?;
        for (rule, of) in operations.rule_changes.iter().enumerate() {
            for (place, level) in levels.iter().enumerate() {
                let Some(found) = changed(of, panel.name, level.at) else { continue };
                let y = row_top(rule) + ROW_PAD_PX + LEVEL_PX * (place as f64 + 0.5);
                let periods = &found.periods;
                let across =
                    |of: Outcome| -> Option<Px> { Some((plot.at(panel.scale * of.value()?, 0.0).0, y)) };
                let quantiles = [across(periods.q05), None, across(periods.q50), None, across(periods.q95)];
                sheet.group("level", || point_interval(&sheet, quantiles, level.marking))?;
            }
        }
    }
    if let Some((told, heading)) = &words.back {
        let x = WIDTH_PX - MARGIN_PX - 8.0;
        sheet.group("brought-back", || {
            sheet.write("Brought back", (x, top - 25.0), NAME, HPos::Right, VPos::Bottom)?;
            sheet.write(heading, (x, top - 8.0), NOTE, HPos::Right, VPos::Bottom)?;
            for (rule, of) in operations.rule_changes.iter().enumerate().skip(1) {
                let found = changed(of, RELIABILITY, *told).and_then(|found| found.brought_back);
                let y = row_top(rule) + row_px / 2.0;
                let said = match found.map(|found| found.value) {
                    Some(ALL_BROUGHT_BACK..) => "all".to_owned(),
                    Some(share) => format!("{} %", signed_size(100.0 * share)),
                    None => "–".to_owned(),
                };
                sheet.write(&said, (x, y), NAME, HPos::Right, VPos::Center)?;
            }
            Ok(())
        })?;
    }
    key.write(&sheet, below)?;
    Ok(sheet.document(FIGURE.slug, &words.title, &words.description))
}

/// `57`, `−12`: a percentage with a true minus and no plus.
pub(super) fn signed_size(pct: f64) -> String {
    let size = percent_size(pct);
    if pct < 0.0 && size != "0" { format!("\u{2212}{size}") } else { size }
}

/// Title, bottom line, ticks and their numbers, and a line through all rows at each tick.
fn axis(
    sheet: &Sheet,
    panel: &Panel,
    plot: &Plot,
    [left, right]: [f64; 2],
    [top, bottom]: [f64; 2],
) -> Drawn {
    let line = Stroke::solid(EDGE, 1.0);
    sheet.write(&panel.axis, (left, top - 8.0), NAME, HPos::Left, VPos::Bottom)?;
    sheet.line(&[(left, bottom), (right, bottom)], line)?;
    for (value, label) in &panel.ticks.ticks {
        let x = plot.at(*value, 0.0).0;
        sheet.line(&[(x, top), (x, bottom)], Stroke { ink: EDGE, width_px: 0.6, dash_px: Some([1, 4]) })?;
        sheet.line(&[(x, bottom), (x, bottom + 5.0)], line)?;
        sheet.write(label, (x, bottom + 9.0), LABEL, HPos::Center, VPos::Top)?;
    }
    Ok(())
}
