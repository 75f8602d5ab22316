//! When snow melts at each level: half of the melt, and melt-out, on one calendar.

mod panel;
mod words;

use super::axes::{Calendar, Month};
use super::headline;
use super::marks::Form;
use super::page::Paragraphs;
use super::sheet::{Drawn, HPos, Plot, Sheet, Stroke, VPos};
use super::theme::{EDGE, LABEL, MARGIN_PX, NOTE, WIDTH_PX};
use super::{Figure, Part, Setting, Svg};
use crate::findings::{Findings, MeasureFindings};
use panel::{Area, Panel};
use words::Words;

/// The figure.
pub(super) const FIGURE: Figure = Figure {
    slug: "melt-timing",
    table: "basin-dates",
    question: "How much earlier does the snow melt as the basin warms?",
    part: Part::Answer,
    draw,
};

/// Least span of the calendar, days.
const LEAST_DAYS: f64 = 40.0;
/// Height of a calendar below its panel, px.
const AXIS_PX: f64 = 40.0;

fn draw(findings: &Findings, setting: &Setting<'_>) -> Option<Svg> {
    let find = |name| findings.basin.iter().find(|found| found.measure.name == name);
    let (half, out) = (find("melt_d50_day"), find("melt_out_day"));
    let title = headline::of_dates(findings, half, out, setting)?;
    let shown: Vec<(&MeasureFindings, Form)> =
        [half.zip(Some(Form::Round)), out.zip(Some(Form::Diamond))].into_iter().flatten().collect();
    let measures: Vec<&MeasureFindings> = shown.iter().map(|(measure, _)| *measure).collect();
    let words = Words::of(findings, &measures, setting);
    let panels: Vec<Panel<'_>> =
        shown.into_iter().map(|(measure, form)| Panel::new(findings, measure, form, setting)).collect();
    let text = paint(findings, &panels, setting, &title, &words).ok()?;
    Some(Svg { text, alt: format!("{title}. {}", words.kind_of_drawing), caption: words.caption, title })
}

fn paint(
    findings: &Findings,
    panels: &[Panel<'_>],
    setting: &Setting<'_>,
    title: &str,
    words: &Words,
) -> Drawn<String> {
    let heading = Paragraphs::heading(setting.study_title, title, &words.ensemble);
    let key = Paragraphs::key(&words.key);
    let widest = |widths: Vec<f64>| widths.into_iter().fold(0.0, f64::max);
    let left = MARGIN_PX + widest(panels.iter().map(Panel::name_width).collect()) + 16.0;
    let right = WIDTH_PX - MARGIN_PX - widest(panels.iter().map(Panel::label_width).collect()) - 16.0;
    let calendar = Calendar::around(days_drawn(panels), LEAST_DAYS, setting.water_year_starts);
    let top = MARGIN_PX + heading.height() + 26.0;
    let heights: f64 = panels.iter().map(Panel::height).sum();
    let bottom = top + heights + AXIS_PX * panels.len() as f64;
    let below = bottom + 28.0;
    let sheet = Sheet::new(below + key.height() + MARGIN_PX)?;
    let plot = sheet.plot((left, top), (right, bottom), calendar.days.clone(), 0.0..1.0)?;

    heading.write(&sheet, MARGIN_PX)?;
    let mut panel_top = top;
    for panel in panels {
        let area = Area { plot: &plot, top: panel_top, left, right };
        sheet.group("measure", || panel.draw(&sheet, &area, findings))?;
        panel_top += panel.height();
        sheet.group("axis", || calendar_axis(&sheet, &calendar, &plot, [left, right], panel_top))?;
        panel_top += AXIS_PX;
    }
    let note = if is_roomy(&calendar, &plot) {
        "Date; ticks on the 1st, 11th and 21st"
    } else {
        "Date; ticks on the 1st"
    };
    sheet.write(note, (left, bottom), NOTE, HPos::Left, VPos::Top)?;
    key.write(&sheet, below)?;
    Ok(sheet.document(FIGURE.slug, title, &words.description))
}

/// First and last day that is drawn; 1 April of a northern year where there is none.
fn days_drawn(panels: &[Panel<'_>]) -> std::ops::Range<f64> {
    let days: Vec<f64> = panels.iter().flat_map(Panel::days).collect();
    let first = days.iter().copied().fold(f64::INFINITY, f64::min);
    let last = days.iter().copied().fold(f64::NEG_INFINITY, f64::max);
    if first <= last { first..last } else { 183.0..183.0 }
}

/// Month starts with long ticks, the months' names between them.
pub(super) fn calendar_axis(
    sheet: &Sheet,
    calendar: &Calendar,
    plot: &Plot,
    [left, right]: [f64; 2],
    y: f64,
) -> Drawn {
    let line = Stroke::solid(EDGE, 1.0);
    let x_of = |day: f64| plot.at(day, 0.0).0;
    sheet.line(&[(left, y), (right, y)], line)?;
    let months = calendar.months();
    let fits =
        |month: &Month, name: &str| LABEL.width(name) + 8.0 <= x_of(month.days.end) - x_of(month.days.start);
    let are_long = months.iter().any(|month| month.is_whole() && !fits(month, month.name));
    for month in &months {
        let from = x_of(month.days.start);
        if month.begins {
            sheet.line(&[(from, y), (from, y + 9.0)], line)?;
        }
        let name = if are_long { month.name.get(..3).unwrap_or(month.name) } else { month.name };
        if fits(month, name) {
            let middle = (from + x_of(month.days.end)) / 2.0;
            sheet.write(name, (middle, y + 10.0), LABEL, HPos::Center, VPos::Top)?;
        }
    }
    for day in calendar.thirds().into_iter().filter(|_| is_roomy(calendar, plot)) {
        sheet.line(&[(x_of(day), y), (x_of(day), y + 4.0)], line)?;
    }
    Ok(())
}

/// Whether there is room for ticks inside months.
fn is_roomy(calendar: &Calendar, plot: &Plot) -> bool {
    let [from, to] = [calendar.days.start, calendar.days.start + 10.0].map(|day| plot.at(day, 0.0).0);
    to - from >= 14.0
}
