//! The record year by year: which years are used, what each held, which were left out and why.

mod rows;
mod words;

use super::axes::AmountTicks;
use super::page::Paragraphs;
use super::scales;
use super::sheet::{Drawn, HPos, Plot, Sheet, Stroke, VPos};
use super::theme::{BAND, EDGE, INK, LABEL, MARGIN_PX, MODELLED, NAME, NOTE, PAPER, WIDTH_PX};
use super::{Figure, Part, Setting, Svg};
use crate::findings::{Findings, OwnYear, RecordFindings};
use crate::units::Unit;
use rows::{ROW_PX, Row};
use std::ops::RangeInclusive;
use words::Words;

/// The figure.
pub(super) const FIGURE: Figure = Figure {
    slug: "record-years",
    table: "record-years",
    question: "Which years does the study stand on, and which were left out?",
    part: Part::Record,
    draw,
};

const PLOT_PX: f64 = 210.0;
const STEPS: usize = 5;
/// Space between the plot and what stands at its right, px.
const BESIDE_PX: f64 = 12.0;
/// Space above the plot for its axis' name and the bracket, px.
const ABOVE_PX: f64 = 68.0;
/// Space below the plot for the years, px.
const YEARS_PX: f64 = 34.0;
/// Years on the axis are named every so many.
const YEAR_STEPS: [i32; 6] = [1, 2, 5, 10, 20, 50];

fn draw(findings: &Findings, setting: &Setting<'_>) -> Option<Svg> {
    let record = findings.record.as_ref()?;
    let span = span(record)?;
    let words = Words::of(record, !findings.comparisons.is_empty(), setting.units);
    let rows = rows::of(findings, record);
    let text = paint(record, &span, &rows, setting, &words).ok()?;
    Some(Svg { text, alt: words.alt, caption: words.caption, title: words.title })
}

/// From the first to the last water year that the record touches.
fn span(record: &RecordFindings) -> Option<RangeInclusive<i32>> {
    let years = || {
        let left_out = record.left_out.iter().map(|year| year.water_year);
        record.years.iter().map(|year| year.water_year).chain(left_out)
    };
    Some(years().min()?..=years().max()?)
}

/// Where years and amounts stand.
struct Scale {
    plot: Plot,
    depth: Unit,
    left: f64,
    right: f64,
    /// Width of a year, px.
    year_px: f64,
    first: i32,
}

impl Scale {
    fn x(&self, water_year: i32) -> f64 {
        self.left + self.year_px * (f64::from(water_year - self.first) + 0.5)
    }

    fn y(&self, amount_mm: f64) -> f64 {
        self.plot.at(0.0, self.depth.of(amount_mm)).1
    }
}

fn paint(
    record: &RecordFindings,
    span: &RangeInclusive<i32>,
    rows: &[Row],
    setting: &Setting<'_>,
    words: &Words,
) -> Drawn<String> {
    let heading = Paragraphs::heading(setting.study_title, &words.title, &words.sample);
    let key = Paragraphs::key(&words.key);
    let depth = setting.units.depth();
    let normal_mm = record.percent_of_median.first().map(|on| on.basin.median_mm);
    let highest_mm =
        record.years.iter().map(|year| year.headline_mm).fold(normal_mm.unwrap_or(0.0), f64::max);
    let ticks = AmountTicks::up_to(depth.of(highest_mm), STEPS);
    let names = rows.iter().map(|row| NOTE.width(&row.name));
    let beside = names.chain(words.normal.iter().map(|line| NAME.width(line))).fold(0.0, f64::max);
    let left = MARGIN_PX + scales::width(&ticks) + 14.0;
    let right = WIDTH_PX - MARGIN_PX - beside - BESIDE_PX;
    let top = MARGIN_PX + heading.height() + ABOVE_PX;
    let bottom = top + PLOT_PX;
    let rows_top = bottom + YEARS_PX;
    let rows_bottom = rows_top + ROW_PX * rows.len() as f64;
    let below = rows_bottom + 18.0;
    let sheet = Sheet::new(below + key.height() + MARGIN_PX)?;
    let plot = sheet.plot((left, top), (right, bottom), 0.0..1.0, 0.0..ticks.top())?;
    let years = f64::from(span.end() - span.start() + 1);
    let scale = Scale { plot, depth, left, right, year_px: (right - left) / years, first: *span.start() };

    heading.write(&sheet, MARGIN_PX)?;
    sheet.group("left-out", || {
        let half = scale.year_px / 2.0;
        // A run of years is one block, without seams.
        record.left_out.chunk_by(|a, b| a.water_year + 1 == b.water_year).try_for_each(|run| {
            let [from, to] =
                [run.first(), run.last()].map(|year| year.map_or(0.0, |year| scale.x(year.water_year)));
            sheet.block((from - half, top), (to + half, rows_bottom), BAND)
        })
    })?;
    sheet.group("axis", || {
        scales::upwards(&sheet, &scale.plot, &ticks, [left, right])?;
        scales::amounts_upwards(&sheet, &scale.plot, &ticks, left)?;
        sheet.write(&words.axis, (MARGIN_PX, top - ABOVE_PX + 22.0), NAME, HPos::Left, VPos::Bottom)
    })?;
    sheet.group("axis", || years_axis(&sheet, &scale, span, bottom))?;
    sheet.group("baseline-years", || baseline(&sheet, &scale, record, span, words, top))?;
    if let Some(normal_mm) = normal_mm {
        sheet.group("normal", || normal(&sheet, &scale, record, span, normal_mm, words))?;
    }
    sheet.group("years", || record.years.iter().try_for_each(|year| lollipop(&sheet, &scale, year)))?;
    for (at, row) in rows.iter().enumerate() {
        let y = rows_top + ROW_PX * (at as f64 + 0.5);
        sheet
            .group("row", || row.draw(&sheet, y, |year| scale.x(year), [scale.year_px, right + BESIDE_PX]))?;
    }
    key.write(&sheet, below)?;
    Ok(sheet.document(FIGURE.slug, &words.title, &words.description))
}

/// A stem from 0 with a head: filled for baseline years, hollow for others. A year without snow has its head on the axis.
fn lollipop(sheet: &Sheet, scale: &Scale, year: &OwnYear) -> Drawn {
    let (x, y) = (scale.x(year.water_year), scale.y(year.headline_mm));
    let radius = (0.42 * scale.year_px).clamp(1.6, 4.5);
    sheet
        .line(&[(x, scale.y(0.0)), (x, y)], Stroke::solid(MODELLED, (0.3 * scale.year_px).clamp(1.0, 2.4)))?;
    sheet.dot((x, y), radius, MODELLED)?;
    if year.is_baseline { Ok(()) } else { sheet.dot((x, y), (radius - 1.3).max(0.7), PAPER) }
}

/// Names as many round years as there is room for.
fn years_axis(sheet: &Sheet, scale: &Scale, span: &RangeInclusive<i32>, bottom: f64) -> Drawn {
    let room = LABEL.width("0000") + 14.0;
    let fits = |step: &i32| f64::from(*step) * scale.year_px >= room;
    let step = YEAR_STEPS.into_iter().find(fits).unwrap_or(100);
    for year in span.clone().filter(|year| year.rem_euclid(step) == 0) {
        let x = scale.x(year);
        sheet.line(&[(x, bottom), (x, bottom + 5.0)], Stroke::solid(EDGE, 1.0))?;
        sheet.write(&year.to_string(), (x, bottom + 8.0), LABEL, HPos::Center, VPos::Top)?;
    }
    Ok(())
}

/// Left and right edge of the baseline years, as far as the record reaches, px.
fn baseline_edges(scale: &Scale, record: &RecordFindings, span: &RangeInclusive<i32>) -> [f64; 2] {
    let baseline = &record.baseline_years;
    let [first, last] = [baseline.first.max(*span.start()), baseline.last.min(*span.end())];
    [scale.x(first) - scale.year_px / 2.0, scale.x(last) + scale.year_px / 2.0]
}

/// A bracket over the baseline years with their name.
fn baseline(
    sheet: &Sheet,
    scale: &Scale,
    record: &RecordFindings,
    span: &RangeInclusive<i32>,
    words: &Words,
    top: f64,
) -> Drawn {
    let [from, to] = baseline_edges(scale, record, span);
    let (y, inset) = (top - 13.0, (0.15 * scale.year_px).min(2.0));
    let [from, to] = [from + inset, to - inset];
    sheet.line(&[(from, y + 6.0), (from, y), (to, y), (to, y + 6.0)], Stroke::solid(INK, 1.2))?;
    let half = NOTE.width(&words.baseline) / 2.0;
    let middle = ((from + to) / 2.0).clamp(MARGIN_PX + half, WIDTH_PX - MARGIN_PX - half);
    sheet.write(&words.baseline, (middle, y - 5.0), NOTE, HPos::Center, VPos::Bottom)
}

/// The normal across the baseline years, named at the right.
fn normal(
    sheet: &Sheet,
    scale: &Scale,
    record: &RecordFindings,
    span: &RangeInclusive<i32>,
    normal_mm: f64,
    words: &Words,
) -> Drawn {
    let [from, to] = baseline_edges(scale, record, span);
    let y = scale.y(normal_mm);
    sheet.line(&[(from, y), (to, y)], Stroke { ink: INK, width_px: 1.4, dash_px: Some([6, 4]) })?;
    let [name, amount] = &words.normal;
    let leading = NOTE.leading();
    let middle = y.min(scale.y(0.0) - leading);
    let x = scale.right + BESIDE_PX;
    sheet.write(name, (x, middle - leading / 2.0), NAME, HPos::Left, VPos::Center)?;
    sheet.write(amount, (x, middle + leading / 2.0), LABEL, HPos::Left, VPos::Center)
}
