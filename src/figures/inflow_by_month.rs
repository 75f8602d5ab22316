//! In which months the year's water comes, level by level.

mod words;

use super::axes::AmountTicks;
use super::labels::grouped;
use super::level_lines::{EndName, TO_NAME_PX, line, marked, names_at_ends, widest};
use super::page::Paragraphs;
use super::scales;
use super::sheet::{Drawn, HPos, Px, Sheet, Stroke, VPos};
use super::shown::Shown;
use super::theme::{BAND, EDGE, LABEL, MARGIN_PX, NAME, NOTE, WIDTH_PX};
use super::{Figure, Part, Setting, Svg};
use crate::calendar::MONTHS;
use crate::findings::{Findings, Judged, MeasureFindings, Operations, judged};
use crate::units::UnitSystem;
use words::Words;

/// The figure.
pub(super) const FIGURE: Figure = Figure {
    slug: "inflow-by-month",
    table: "inflow",
    question: "In which months does the water come, as the basin warms?",
    part: Part::Inflow,
    draw,
};

const PLOT_PX: f64 = 270.0;
const STEPS: usize = 6;
/// Months in a year, each a column.
const COLUMNS: usize = 12;

/// A month's share of the year.
struct Month<'a> {
    name: &'static str,
    found: &'a MeasureFindings,
}

fn draw(findings: &Findings, setting: &Setting<'_>) -> Option<Svg> {
    let operations = findings.operations.as_ref()?;
    let months = months(operations)?;
    let shown = Shown::of(findings);
    let words = Words::of(findings, operations, &months, &shown, setting.units)?;
    let text = paint(findings, &months, &shown, setting, &words).ok()?;
    let alt = format!("{}. {}", words.title, words.kind_of_drawing);
    Some(Svg { text, alt, caption: words.caption, title: words.title })
}

/// All months, from the water year's first; nothing where one was not measured.
fn months(operations: &Operations) -> Option<Vec<Month<'_>>> {
    let of_month = |found| {
        let found: &MeasureFindings = found;
        let name = found.measure.name.strip_prefix("inflow_in_")?.strip_suffix("_share")?;
        let name = MONTHS.into_iter().find(|month| month.to_lowercase() == name)?;
        Some(Month { name, found })
    };
    let months: Vec<Month<'_>> = operations.inflow.iter().filter_map(of_month).collect();
    (months.len() == COLUMNS).then_some(months)
}

/// The median share of a month at a level, percent; nothing where a year had no water.
fn median_pct(month: &Month<'_>, at: usize) -> Option<f64> {
    Some(100.0 * month.found.levels.get(at)?.periods.q50.value()?)
}

/// `+0.4`: from which warming on a month's shift outweighs the spread; `no` where it does not up to the highest level, `?` where these
/// realizations cannot tell.
fn outweighs(found: &MeasureFindings, units: UnitSystem) -> String {
    match judged(found.outweighs, found.outweighs_range) {
        Judged::Outweighs { level_c, .. } => {
            let warming = units.warming().of(level_c);
            let sign = if warming < 0.0 { "\u{2212}" } else { "+" };
            format!("{sign}{}", grouped(warming.abs(), 1))
        }
        Judged::DoesNot { .. } => "no".to_owned(),
        Judged::CannotTell { .. } => "?".to_owned(),
        Judged::Unknown => "–".to_owned(),
    }
}

fn paint(
    findings: &Findings,
    months: &[Month<'_>],
    shown: &Shown,
    setting: &Setting<'_>,
    words: &Words,
) -> Drawn<String> {
    let heading = Paragraphs::heading(setting.study_title, &words.title, &words.ensemble);
    let key = Paragraphs::key(&words.key);
    let levels = marked(findings, shown, setting.units);
    let spreads: Vec<Option<[f64; 2]>> = months
        .iter()
        .map(|month| month.found.precipitation_spread.map(|spread| [100.0 * spread.q05, 100.0 * spread.q95]))
        .collect();
    let of_levels =
        months.iter().flat_map(|month| levels.iter().filter_map(|level| median_pct(month, level.at)));
    let highest = spreads.iter().flatten().map(|[_, high]| *high).chain(of_levels).fold(0.0, f64::max);
    let ticks = AmountTicks::up_to(highest, STEPS);
    let left = MARGIN_PX + scales::width(&ticks) + 14.0;
    let names = WIDTH_PX - MARGIN_PX - widest(&levels);
    let right = names - TO_NAME_PX + 4.0;
    let top = MARGIN_PX + heading.height() + 46.0;
    let bottom = top + PLOT_PX;
    let has_row = findings.reference + 1 < findings.levels_c.len();
    let row = bottom + 12.0 + LABEL.leading();
    let below = row + if has_row { 8.0 + 2.0 * LABEL.leading() } else { 0.0 } + 16.0;
    let sheet = Sheet::new(below + key.height() + MARGIN_PX)?;
    let plot = sheet.plot((left, top), (right, bottom), 0.0..COLUMNS as f64, 0.0..ticks.top())?;
    let place = |column: usize, pct: f64| plot.at(column as f64 + 0.5, pct);

    heading.write(&sheet, MARGIN_PX)?;
    sheet.group("spread", || {
        let ends = |end: usize| -> Vec<Px> {
            let of = spreads.iter().enumerate();
            of.filter_map(|(column, spread)| Some(place(column, (*spread)?[end]))).collect()
        };
        band(&sheet, &ends(0), &ends(1))
    })?;
    sheet.group("axis", || {
        scales::upwards(&sheet, &plot, &ticks, [left, right])?;
        scales::amounts_upwards(&sheet, &plot, &ticks, left)?;
        sheet.write(&words.axis, (MARGIN_PX, top - 18.0), NAME, HPos::Left, VPos::Bottom)?;
        for (column, month) in months.iter().enumerate() {
            let x = place(column, 0.0).0;
            let name = month.name.get(..3).unwrap_or(month.name);
            sheet.write(name, (x, bottom + scales::TO_LABEL_PX), LABEL, HPos::Center, VPos::Top)?;
        }
        Ok(())
    })?;
    let mut ends = Vec::new();
    for level in levels {
        let of = months.iter().enumerate();
        let places: Vec<Px> =
            of.filter_map(|(column, month)| Some(place(column, median_pct(month, level.at)?))).collect();
        sheet.group("level", || line(&sheet, &places, level.marking))?;
        ends.extend(places.last().map(|end| EndName {
            end: *end,
            name: level.name,
            marking: Some(level.marking),
        }));
    }
    sheet.group("levels", || names_at_ends(&sheet, ends, [top, bottom], names))?;
    if has_row {
        sheet.group("outweighs", || {
            sheet.write(&words.row, (MARGIN_PX, row + 8.0), NOTE, HPos::Left, VPos::Top)?;
            for (column, month) in months.iter().enumerate() {
                let at = (place(column, 0.0).0, row + 8.0 + LABEL.leading());
                let said = outweighs(month.found, setting.units);
                sheet.write(&said, at, LABEL, HPos::Center, VPos::Top)?;
            }
            Ok(())
        })?;
    }
    key.write(&sheet, below)?;
    Ok(sheet.document(FIGURE.slug, &words.title, &words.description))
}

/// The reference's spread with its edges.
pub(super) fn band(sheet: &Sheet, low: &[Px], high: &[Px]) -> Drawn {
    if low.len() < 2 {
        return Ok(());
    }
    let around: Vec<Px> = low.iter().chain(high.iter().rev()).copied().collect();
    sheet.shape(&around, BAND)?;
    let edge = Stroke { ink: EDGE, width_px: 1.1, dash_px: Some([2, 2]) };
    [low, high].into_iter().try_for_each(|line| sheet.line(line, edge))
}
