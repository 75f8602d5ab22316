//! How much snow water is left at each level, against what precipitation's chance does at the reference.

mod columns;
mod words;

use super::axes::AmountTicks;
use super::headline;
use super::marks::{DotSize, Form, Marking, dots, point_interval};
use super::page::Paragraphs;
use super::scales;
use super::sheet::{Drawn, HPos, Plot, Sheet, Stroke, VPos};
use super::theme::{BAND, EDGE, INK, MARGIN_PX, NAME, NOTE, WIDTH_PX, level_ink};
use super::{Figure, Part, Setting, Svg};
use crate::findings::{DOTS, Distribution, Findings, LevelFindings, MeasureFindings, Spread};
use crate::units::{Unit, UnitSystem};
use columns::{BESIDE_POINT_PX, Columns};
use words::Words;

/// The figure.
pub(super) const FIGURE: Figure = Figure {
    slug: "swe-by-level",
    table: "basin-amounts",
    question: "How much snow water is left as the basin warms, and does precipitation's chance hide the loss?",
    part: Part::Answer,
    draw,
};

const PLOT_PX: f64 = 300.0;
const STEPS: usize = 6;
/// Space right of the columns, in which the band is named, px.
const BAND_LABEL_PX: f64 = 146.0;

fn draw(findings: &Findings, setting: &Setting<'_>) -> Option<Svg> {
    let measure = findings.basin.first()?;
    measure.levels.get(findings.reference)?;
    let title = headline::of_amount(findings, measure, setting.units);
    let words = Words::of(findings, measure, setting.units);
    let text = paint(findings, measure, setting, &title, &words).ok()?;
    Some(Svg { text, alt: format!("{title}. {}", words.kind_of_drawing), caption: words.caption, title })
}

fn paint(
    findings: &Findings,
    measure: &MeasureFindings,
    setting: &Setting<'_>,
    title: &str,
    words: &Words,
) -> Drawn<String> {
    let heading = Paragraphs::heading(setting.study_title, title, &words.ensemble);
    let key = Paragraphs::key(&words.key);
    let depth = setting.units.depth();
    let ticks = AmountTicks::up_to(depth.of(highest(measure)), STEPS);
    let left = MARGIN_PX + scales::width(&ticks) + 14.0;
    let right = WIDTH_PX - MARGIN_PX - BAND_LABEL_PX;
    let columns = Columns::new(&findings.levels_c, left, right);
    let labels = columns.labels(findings, measure, setting.units);
    let top = MARGIN_PX + heading.height() + 46.0;
    let bottom = top + PLOT_PX;
    let below = bottom + 12.0 + labels.height() + 22.0;
    let sheet = Sheet::new(below + key.height() + MARGIN_PX)?;
    let plot = sheet.plot((left, top), (right, bottom), 0.0..right - left, 0.0..ticks.top())?;
    let scale = Scale { plot, depth };

    heading.write(&sheet, MARGIN_PX)?;
    if let Some(spread) = &measure.precipitation_spread {
        sheet.group("reference-band", || band(&sheet, &scale, spread, setting.units, [left, right]))?;
    }
    sheet.group("axis", || {
        scales::upwards(&sheet, &scale.plot, &ticks, [left, right])?;
        scales::amounts_upwards(&sheet, &scale.plot, &ticks, left)?;
        sheet.write(&words.axis, (MARGIN_PX, top - 18.0), NAME, HPos::Left, VPos::Bottom)
    })?;
    let heights = dot_heights(measure, &scale);
    let room = columns.room();
    let size = DotSize::for_all(&heights, room);
    let reach = match size.widest(&heights, room) {
        0.0 => 0.0,
        width => (BESIDE_POINT_PX + width) / 2.0,
    };
    for (at, (level, heights)) in measure.levels.iter().zip(&heights).enumerate() {
        let marking = Marking {
            ink: level_ink(at, findings.reference, measure.levels.len()),
            form: Form::Round,
            is_hollow: at == findings.reference,
        };
        let point = columns.centre(at) - reach;
        sheet.group("level", || {
            dots(&sheet, heights, size, [point + BESIDE_POINT_PX, room], marking)?;
            intervals(&sheet, &scale, &level.periods, point, marking)
        })?;
    }
    sheet.group("levels", || labels.write(&sheet, &columns, bottom + 12.0))?;
    key.write(&sheet, below)?;
    Ok(sheet.document(FIGURE.slug, title, &words.description))
}

/// Where amounts stand: the plot counts in the reader's unit, so that its ticks are round there.
struct Scale {
    plot: Plot,
    depth: Unit,
}

impl Scale {
    /// Height of an amount of water on the sheet, px.
    fn at(&self, amount_mm: f64) -> f64 {
        self.plot.at(0.0, self.depth.of(amount_mm)).1
    }
}

/// The highest amount that is drawn, mm.
fn highest(measure: &MeasureFindings) -> f64 {
    let drawn = measure.levels.iter().flat_map(|level| {
        let dots = level.periods.dots.iter().filter(|_| level.periods.count >= DOTS);
        dots.chain([&level.periods.q95])
    });
    drawn.filter_map(|outcome| outcome.value()).fold(0.0, f64::max)
}

/// The reference's spread across the whole width, named at its right.
fn band(sheet: &Sheet, scale: &Scale, spread: &Spread, units: UnitSystem, [left, right]: [f64; 2]) -> Drawn {
    let [low, middle, high] = [spread.q05, spread.q50, spread.q95].map(|amount_mm| scale.at(amount_mm));
    sheet.block((left, high), (right, low), BAND)?;
    for edge in [low, high] {
        sheet.line(&[(left, edge), (right, edge)], Stroke::solid(EDGE, 1.0))?;
    }
    let median = Stroke { ink: INK, width_px: 1.2, dash_px: Some([6, 4]) };
    sheet.line(&[(left, middle), (right, middle)], median)?;
    let bracket = [(right + 4.0, high), (right + 9.0, high), (right + 9.0, low), (right + 4.0, low)];
    sheet.line(&bracket, Stroke::solid(EDGE, 1.0))?;
    let lines = words::of_band(spread, units);
    let floor = scale.at(0.0);
    let leading = NOTE.leading();
    let height = leading * lines.len() as f64;
    let start = ((high + low) / 2.0 - height / 2.0).min(floor - height);
    for (at, (line, lettering)) in lines.iter().enumerate() {
        let place = (right + 17.0, start + leading * (at as f64 + 0.5));
        sheet.write(line, place, *lettering, HPos::Left, VPos::Center)?;
    }
    Ok(())
}

/// Heights of the dots of every level; none where there are fewer realizations than dots.
fn dot_heights(measure: &MeasureFindings, scale: &Scale) -> Vec<Vec<f64>> {
    let heights = |level: &LevelFindings| {
        let dots = level.periods.dots.iter().filter(|_| level.periods.count >= DOTS);
        dots.filter_map(|dot| dot.value()).map(|amount_mm| scale.at(amount_mm)).collect()
    };
    measure.levels.iter().map(heights).collect()
}

/// Point and intervals at the left of a column.
fn intervals(sheet: &Sheet, scale: &Scale, periods: &Distribution, x: f64, marking: Marking) -> Drawn {
    let quantiles = [periods.q05, periods.q25, periods.q50, periods.q75, periods.q95];
    let places = quantiles.map(|quantile| quantile.value().map(|amount_mm| (x, scale.at(amount_mm))));
    point_interval(sheet, places, marking)
}
