//! How precipitation added up in the record's years, from the water year's first day to the survey.

mod words;

use super::apart::moved_apart;
use super::axes::{AmountTicks, Calendar};
use super::melt_timing::calendar_axis;
use super::page::Paragraphs;
use super::scales;
use super::sheet::{Drawn, HPos, Plot, Sheet, Stroke, VPos};
use super::theme::{
    BAND, DRY, EDGE, INK, LABEL, Lettering, MARGIN_PX, NAME, NOTE, ONE_OF_MANY, WET, WIDTH_PX,
};
use super::{Figure, Part, Setting, Svg};
use crate::findings::{Findings, RecordPrecipitation, YearPrecipitation};
use crate::units::Unit;
use words::Words;

/// The figure.
pub(super) const FIGURE: Figure = Figure {
    slug: "record-precipitation",
    table: "record-years",
    question: "How far apart were the driest and the wettest winter of the record?",
    part: Part::Record,
    draw,
};

const PLOT_PX: f64 = 300.0;
const STEPS: usize = 6;
/// Height of the calendar below the plot, px.
const AXIS_PX: f64 = 40.0;
/// Least space between two names, px.
const BETWEEN_NAMES_PX: f64 = 4.0;
/// A year among all.
const YEAR: Stroke = Stroke::solid(ONE_OF_MANY, 0.9);
const MEDIAN: Stroke = Stroke { ink: INK, width_px: 1.8, dash_px: Some([6, 4]) };
const STRONG_PX: f64 = 2.4;
/// A curve with its name at its right end.
struct Named<'a> {
    sums_mm: &'a [f64],
    stroke: Stroke,
    lines: [(String, Lettering); 2],
}

fn draw(findings: &Findings, setting: &Setting<'_>) -> Option<Svg> {
    let precipitation = &findings.record.as_ref()?.precipitation;
    precipitation.years.first()?;
    let words = Words::of(precipitation, setting);
    let text = paint(precipitation, setting, &words).ok()?;
    Some(Svg { text, alt: words.alt, caption: words.caption, title: words.title })
}

fn paint(precipitation: &RecordPrecipitation, setting: &Setting<'_>, words: &Words) -> Drawn<String> {
    let heading = Paragraphs::heading(setting.study_title, &words.title, &words.sample);
    let key = Paragraphs::key(&words.key);
    let depth = setting.units.depth();
    let highest_mm = precipitation.years.iter().map(YearPrecipitation::total_mm).fold(0.0, f64::max);
    let ticks = AmountTicks::up_to(depth.of(highest_mm), STEPS);
    let named = named(precipitation, words);
    let label_width = named.iter().flat_map(|curve| &curve.lines);
    let label_width = label_width.map(|(text, lettering)| lettering.width(text)).fold(0.0, f64::max);
    let left = MARGIN_PX + scales::width(&ticks) + 14.0;
    let right = WIDTH_PX - MARGIN_PX - label_width - 12.0;
    let top = MARGIN_PX + heading.height() + 46.0;
    let bottom = top + PLOT_PX;
    let below = bottom + AXIS_PX + 24.0;
    let sheet = Sheet::new(below + key.height() + MARGIN_PX)?;
    let last = precipitation.days.last().map_or(2.0, |day| *day as f64);
    let calendar = Calendar::exactly(1.0..last, setting.water_year_starts);
    let plot = sheet.plot((left, top), (right, bottom), calendar.days.clone(), 0.0..ticks.top())?;

    heading.write(&sheet, MARGIN_PX)?;
    sheet.group("axis", || amounts(&sheet, &plot, &ticks, &words.axis, [left, right]))?;
    let curve = |sums_mm: &[f64], stroke: Stroke| {
        let places = precipitation.days.iter().zip(sums_mm);
        let places: Vec<_> = places.map(|(day, mm)| plot.at(*day as f64, depth.of(*mm))).collect();
        sheet.line(&places, stroke)
    };
    sheet.group("years", || {
        precipitation.years.iter().try_for_each(|year| curve(&year.cumulative_mm, YEAR))
    })?;
    sheet.group("named", || named.iter().try_for_each(|named| curve(named.sums_mm, named.stroke)))?;
    sheet.group("names", || names(&sheet, &named, &plot, depth, [right, top, bottom]))?;
    sheet.group("axis", || calendar_axis(&sheet, &calendar, &plot, [left, right], bottom))?;
    sheet.write(&words.calendar, (left, bottom + AXIS_PX), NOTE, HPos::Left, VPos::Top)?;
    key.write(&sheet, below)?;
    Ok(sheet.document(FIGURE.slug, &words.title, &words.description))
}

/// The median, and the driest and the wettest year where they differ.
fn named<'a>(precipitation: &'a RecordPrecipitation, words: &Words) -> Vec<Named<'a>> {
    let mut named = Vec::new();
    if let Some([driest, wettest]) = precipitation.extremes() {
        for (year, ink, lines) in [(wettest, WET, words.wettest.clone()), (driest, DRY, words.driest.clone())]
        {
            named.push(Named { sums_mm: &year.cumulative_mm, stroke: Stroke::solid(ink, STRONG_PX), lines });
        }
    }
    named.push(Named { sums_mm: &precipitation.median_mm, stroke: MEDIAN, lines: words.median.clone() });
    named
}

/// Names at the right ends, moved apart where they would touch, and kept beside the plot.
fn names(
    sheet: &Sheet,
    named: &[Named<'_>],
    plot: &Plot,
    depth: Unit,
    [right, top, bottom]: [f64; 3],
) -> Drawn {
    let mut ends: Vec<(f64, &Named<'_>)> = named
        .iter()
        .filter_map(|curve| curve.sums_mm.last().map(|mm| (plot.at(1.0, depth.of(*mm)).1, curve)))
        .collect();
    ends.sort_by(|a, b| a.0.total_cmp(&b.0));
    let wanted: Vec<[f64; 2]> = ends.iter().map(|(end, _)| [*end, 2.0 * NOTE.leading()]).collect();
    let middles = moved_apart(&wanted, BETWEEN_NAMES_PX, [top - 10.0, bottom + 6.0]);
    for ((_, curve), middle) in ends.iter().zip(middles) {
        for (line, (text, lettering)) in curve.lines.iter().enumerate() {
            let y = middle + NOTE.leading() * (line as f64 - 0.5);
            sheet.write(text, (right + 10.0, y), *lettering, HPos::Left, VPos::Center)?;
        }
    }
    Ok(())
}

fn amounts(sheet: &Sheet, plot: &Plot, ticks: &AmountTicks, name: &str, [left, right]: [f64; 2]) -> Drawn {
    for (amount, label) in &ticks.ticks {
        let y = plot.at(1.0, *amount).1;
        if *amount > 0.0 {
            sheet.line(&[(left, y), (right, y)], Stroke::solid(BAND, 1.0))?;
        }
        sheet.line(&[(left - 5.0, y), (left, y)], Stroke::solid(EDGE, 1.0))?;
        sheet.write(label, (left - 9.0, y), LABEL, HPos::Right, VPos::Center)?;
    }
    let [floor, ceiling] = [0.0, ticks.top()].map(|amount| plot.at(1.0, amount).1);
    sheet.line(&[(left, floor), (left, ceiling)], Stroke::solid(EDGE, 1.0))?;
    sheet.write(name, (MARGIN_PX, ceiling - 18.0), NAME, HPos::Left, VPos::Bottom)
}
