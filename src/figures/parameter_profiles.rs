//! How far a fit falls below its best as each parameter is held away from it: a small panel a parameter.

mod panel;
mod words;

use super::fits::{DrawnFit, FitFigure, FitPart};
use super::page::Paragraphs;
use super::sheet::{Drawn, HPos, Sheet, VPos};
use super::theme::{LABEL, MARGIN_PX, NAME, WIDTH_PX};
use super::value_ticks::ValueTicks;
use super::{Setting, Svg};
use crate::fit::{FLAT_PROFILE, Profile};
use panel::{HALVES_PX, Panel};
use words::Words;

/// The figure.
pub(super) const FIGURE: FitFigure = FitFigure {
    slug: "parameter-profiles",
    question: "How well does the snow tell each parameter?",
    part: FitPart::Parameters,
    draw,
};

const COLUMNS: usize = 3;
const HEIGHT_PX: f64 = 104.0;
const GAP_PX: f64 = 26.0;
/// Height of a panel's title, px.
const TITLE_PX: f64 = 40.0;
/// Height of the values and their unit below a panel, px.
const BELOW_PX: f64 = 56.0;
/// Height of the axis' name above the first titles, px.
const AXIS_PX: f64 = 26.0;
/// Panels reach so far below the best, in units of the objective, or as far as the deepest profile, if that is less.
const DEEPEST: f64 = 0.1;
/// but no less than this, so that it shows how near a profile comes to telling.
const LEAST_DEEP: f64 = 2.0 * FLAT_PROFILE;
const STEPS: usize = 4;

/// A parameter as it is drawn.
struct Row<'a> {
    profile: &'a Profile,
    title: &'static str,
    unit: String,
    bounds: [f64; 2],
    /// Fitted on all years; none where the snow does not tell it.
    fitted: Option<f64>,
    /// The objective of that fit.
    objective: f64,
    /// Fitted on each half.
    halves: Vec<f64>,
    stated: Option<f64>,
}

impl Row<'_> {
    /// Whether the value fitted on all years is the lowest or the highest that it may be, to a thousandth of the range.
    fn is_at_bound(&self) -> bool {
        let [low, high] = self.bounds;
        self.fitted.is_some_and(|value| (value - low).min(high - value) <= 1e-3 * (high - low))
    }

    /// Held values, and how far the objective falls there, at most 0.
    fn points(&self) -> Vec<(f64, f64)> {
        self.profile.points.iter().map(|(at, value)| (*at, self.depth(*value))).collect()
    }

    /// The same with the fitted value among them, at which the line has its peak.
    fn line(&self) -> Vec<(f64, f64)> {
        let mut line = self.points();
        line.extend(self.fitted.map(|value| (value, self.depth(self.objective))));
        line.sort_by(|(a, _), (b, _)| a.total_cmp(b));
        line
    }

    fn depth(&self, objective: f64) -> f64 {
        let lowest = self.profile.points.iter().map(|(_, value)| *value).fold(f64::INFINITY, f64::min);
        (objective - lowest - self.profile.fall).min(0.0)
    }
}

fn draw(fit: &DrawnFit<'_>, setting: &Setting<'_>) -> Option<Svg> {
    let rows: Vec<Row<'_>> = fit.result.profiles.iter().filter_map(|profile| row(fit, profile)).collect();
    if rows.is_empty() {
        return None;
    }
    let words = Words::of(fit, &rows);
    let text = paint(&rows, setting, &words).ok()?;
    Some(Svg { text, alt: words.alt, caption: words.caption, title: words.title })
}

fn row<'a>(fit: &DrawnFit<'_>, profile: &'a Profile) -> Option<Row<'a>> {
    let bounded = fit.searched.iter().find(|bounded| bounded.parameter.key == profile.key)?;
    let is_kept = fit.result.not_identified.contains(&profile.key);
    let value = |fitted: &crate::fit::Fitted| bounded.parameter.get(&fitted.parameters).filter(|_| !is_kept);
    let (all, halves) = fit.result.fitted.split_first()?;
    Some(Row {
        profile,
        title: bounded.parameter.title,
        unit: bounded.parameter.unit.replace("degC", "°C"),
        bounds: bounded.bounds,
        fitted: value(all),
        objective: all.objective,
        halves: halves.iter().filter_map(value).collect(),
        stated: bounded.parameter.get(fit.stated),
    })
}

fn paint(rows: &[Row<'_>], setting: &Setting<'_>, words: &Words) -> Drawn<String> {
    let heading = Paragraphs::heading(setting.study_title, &words.title, &words.sample);
    let key = Paragraphs::key(&words.key);
    let deepest = rows.iter().map(|row| row.profile.fall).fold(LEAST_DEEP, f64::max).min(DEEPEST);
    let ticks = ValueTicks::around(-deepest, 0.0, STEPS);
    let labels = ticks.ticks.iter().map(|(_, label)| LABEL.width(label)).fold(0.0, f64::max);
    let left = MARGIN_PX + labels + 12.0;
    let columns = rows.len().min(COLUMNS);
    let width = (WIDTH_PX - MARGIN_PX - left - GAP_PX * (COLUMNS - 1) as f64) / COLUMNS as f64;
    let first = MARGIN_PX + heading.height() + AXIS_PX;
    let height = TITLE_PX + HEIGHT_PX + HALVES_PX + BELOW_PX;
    let below = first + height * rows.len().div_ceil(columns) as f64 + 4.0;
    let sheet = Sheet::new(below + key.height() + MARGIN_PX)?;

    heading.write(&sheet, MARGIN_PX)?;
    sheet.write(words.axis, (MARGIN_PX, first - 6.0), NAME, HPos::Left, VPos::Bottom)?;
    for (at, row) in rows.iter().enumerate() {
        let (down, across) = (at / columns, at % columns);
        let panel = Panel {
            left_top: (left + across as f64 * (width + GAP_PX), first + height * down as f64 + TITLE_PX),
            size: [width, HEIGHT_PX],
            is_first: across == 0,
            ticks: &ticks,
        };
        sheet.group("parameter", || panel.draw(&sheet, row))?;
    }
    key.write(&sheet, below)?;
    Ok(sheet.document(FIGURE.slug, &words.title, &words.description))
}
