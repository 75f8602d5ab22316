//! What warming and any change of precipitation make together of the headline measure.

mod field;
mod rows;
mod words;

use super::apart::moved_apart;
use super::labels::signed_percent;
use super::marks::{Form, Marking, marker};
use super::page::Paragraphs;
use super::sheet::{Drawn, HPos, Plot, Px, Sheet, Stroke, VPos};
use super::theme::{EDGE, INK, LABEL, MARGIN_PX, NAME, ONE_OF_MANY, QUIET, WIDTH_PX, change_ground};
use super::value_ticks::ValueTicks;
use super::{Figure, Part, Setting, Svg};
use crate::findings::{ChangeOrigin, Findings, ResponseSurface};
use field::Field;
use rows::Rows;
use words::Words;

/// The figure.
pub(super) const FIGURE: Figure = Figure {
    slug: "response-surface",
    table: "response-surface",
    question: "How much snow water would be left under any warming together with any change of precipitation?",
    part: Part::Together,
    draw,
};

const PLOT_PX: f64 = 360.0;
/// Width of the columns that the field is painted in, px.
const COLUMN_PX: f64 = 4.0;
/// How far a block reaches under the next, so that no paper shines through where a page scales the drawing, px.
const OVERLAP_PX: f64 = 1.0;
/// Changes of the headline at which the ground changes, percent.
pub(super) const LIMITS_PCT: [f64; 8] = [-75.0, -50.0, -25.0, -10.0, 10.0, 25.0, 50.0, 100.0];
/// How many limits a value that is no change reaches.
const NO_CHANGE: usize = 4;
const LINE: Stroke = Stroke::solid(EDGE, 1.0);
const TICK_PX: f64 = 5.0;
const TO_LABEL_PX: f64 = 9.0;
/// Least space between two labels above the plot, px.
const BETWEEN_PX: f64 = 8.0;
/// Height of a row of labels above the plot, px.
const ROW_ABOVE_PX: f64 = 16.0;

fn draw(findings: &Findings, setting: &Setting<'_>) -> Option<Svg> {
    let surface = findings.surface.as_ref()?;
    let change = |node: &crate::findings::SurfaceNode| Some(node.measures.first()?.change_pct?.value);
    let values: Vec<f64> = surface.nodes.iter().map(change).collect::<Option<_>>()?;
    let words = Words::of(findings, surface, setting.units)?;
    let rows = Rows::of(surface, setting);
    let text = paint(findings, surface, &values, setting, &words, &rows).ok()?;
    let alt = format!("{}. {}", words.title, words.kind_of_drawing);
    Some(Svg { text, alt, caption: words.caption, title: words.title })
}

fn paint(
    findings: &Findings,
    surface: &ResponseSurface,
    values: &[f64],
    setting: &Setting<'_>,
    words: &Words,
    rows: &Rows,
) -> Drawn<String> {
    let heading = Paragraphs::heading(setting.study_title, &words.title, &words.ensemble);
    let key = Paragraphs::key(&words.key);
    let unit = setting.units.warming();
    let (warmings, changes) = (&surface.warmings_c, &surface.precipitation_changes_pct);
    let field = Field { warmings, changes, values };
    let [coldest, warmest] = [warmings[0], warmings[warmings.len() - 1]];
    let [driest, wettest] = [changes[0], changes[changes.len() - 1]];
    let across = ValueTicks::within(unit.of(coldest), unit.of(warmest), 9);
    let upwards = ValueTicks::within(driest, wettest, 9);
    let signed =
        |(value, label): &(f64, String)| if *value > 0.0 { format!("+{label}") } else { label.clone() };
    let labels = upwards.ticks.iter().map(|tick| LABEL.width(&signed(tick))).fold(0.0, f64::max);
    let limits = LIMITS_PCT.map(signed_percent);
    let to_the_right = limits.iter().map(|label| LABEL.width(label)).fold(0.0, f64::max);
    let left = MARGIN_PX + labels + TO_LABEL_PX + 4.0;
    let right = WIDTH_PX - MARGIN_PX - to_the_right - TO_LABEL_PX;
    let top = MARGIN_PX + heading.height() + 70.0;
    let bottom = top + PLOT_PX;
    let below_axis = bottom + TO_LABEL_PX + LABEL.leading() * 2.0 + 16.0;
    let below = below_axis + rows.height();
    let sheet = Sheet::new(below + key.height() + MARGIN_PX)?;
    let plot = sheet.plot((left, top), (right, bottom), coldest..warmest, driest..wettest)?;

    heading.write(&sheet, MARGIN_PX)?;
    sheet.group("surface", || ground(&sheet, &plot, &field, [left, right]))?;
    sheet.group("limits", || {
        for limit in LIMITS_PCT {
            let stroke = Stroke::solid(QUIET, 0.8);
            contour(&sheet, &plot, &field, (limit, [left, right]), stroke)?;
        }
        limit_labels(&sheet, &plot, &field, [right, top])
    })?;
    sheet.group("axis", || {
        sheet.line(&[(left, top), (left, bottom), (right, bottom)], LINE)?;
        for tick in &across.ticks {
            let x = plot.at(unit_back(tick.0, setting), driest).0;
            sheet.line(&[(x, bottom), (x, bottom + TICK_PX)], LINE)?;
            sheet.write(&signed(tick), (x, bottom + TO_LABEL_PX), LABEL, HPos::Center, VPos::Top)?;
        }
        for tick in &upwards.ticks {
            let y = plot.at(coldest, tick.0).1;
            sheet.line(&[(left - TICK_PX, y), (left, y)], LINE)?;
            sheet.write(&signed(tick), (left - TO_LABEL_PX, y), LABEL, HPos::Right, VPos::Center)?;
        }
        sheet.write(&words.upwards, (MARGIN_PX, top - 42.0), NAME, HPos::Left, VPos::Bottom)?;
        let under = bottom + TO_LABEL_PX + LABEL.leading() + 4.0;
        sheet.write(&words.across, (right, under), NAME, HPos::Right, VPos::Top)
    })?;
    let inside = |(x, y): Px| (left..=right).contains(&x) && (top..=bottom).contains(&y);
    sheet.group("realizations", || {
        let reference_c = findings.levels_c[findings.reference];
        let places = surface.realized.iter().map(|of| plot.at(reference_c + of.warmer_c, of.wetter_pct));
        let mut places = places.filter(|place| inside(*place));
        places.try_for_each(|place| sheet.dot(place, 1.6, ONE_OF_MANY))
    })?;
    sheet.group("criteria", || {
        for (line, stroke) in surface.failure_lines.iter().zip(rows::failure_strokes()) {
            let field = Field { warmings, changes, values: &line.margins };
            contour(&sheet, &plot, &field, (0.0, [left, right]), stroke)?;
        }
        Ok(())
    })?;
    sheet.group("break-even", || break_even(&sheet, &plot, surface, wettest))?;
    sheet.group("named", || {
        for (named, mark) in surface.named.iter().zip(rows::marks(surface)) {
            let change = named.node.change;
            let place = plot.at(change.warming_c, change.precipitation_change_pct);
            if inside(place) {
                mark.draw(&sheet, place)?;
            }
        }
        let reference = plot.at(findings.levels_c[findings.reference], 0.0);
        marker(&sheet, reference, Marking { ink: INK, form: Form::Round, is_hollow: true })
    })?;
    rows.write(&sheet, below_axis)?;
    key.write(&sheet, below)?;
    Ok(sheet.document(FIGURE.slug, &words.title, &words.description))
}

/// A tick's warming in degC.
fn unit_back(tick: f64, setting: &Setting<'_>) -> f64 {
    tick / setting.units.warming().of(1.0)
}

/// Paints the field column by column.
fn ground(sheet: &Sheet, plot: &Plot, field: &Field<'_>, [left, right]: [f64; 2]) -> Drawn {
    let top = plot.at(field.warmings[0], field.changes[field.changes.len() - 1]).1;
    let mut x = left;
    while x < right {
        let end = (x + COLUMN_PX).min(right);
        let column = field.column(warming_at(field, f64::midpoint(x, end), [left, right]));
        for part in field.parts(&column, &LIMITS_PCT) {
            let [below, above] = [part.from, part.to].map(|pct| plot.at(field.warmings[0], pct).1);
            let class = part.class as i32 - NO_CHANGE as i32;
            let over = ((end + OVERLAP_PX).min(right), (above - OVERLAP_PX).max(top));
            sheet.block((x, over.1), (over.0, below), change_ground(class))?;
        }
        x = end;
    }
    Ok(())
}

fn warming_at(field: &Field<'_>, x: f64, [left, right]: [f64; 2]) -> f64 {
    let [first, last] = [field.warmings[0], field.warmings[field.warmings.len() - 1]];
    first + (last - first) * (x - left) / (right - left)
}

/// The line along which a field has a value; broken where it leaves the grid.
fn contour(
    sheet: &Sheet,
    plot: &Plot,
    field: &Field<'_>,
    (limit, [left, right]): (f64, [f64; 2]),
    stroke: Stroke,
) -> Drawn {
    let steps = ((right - left) / COLUMN_PX) as usize;
    let mut line: Vec<Px> = Vec::new();
    for step in 0..=steps {
        let warming = warming_at(field, left + (right - left) * step as f64 / steps as f64, [left, right]);
        match field.passes(&field.column(warming), limit) {
            Some(pct) => line.push(plot.at(warming, pct)),
            None if line.len() > 1 => {
                sheet.line(&line, stroke)?;
                line.clear();
            }
            None => line.clear(),
        }
    }
    if line.len() > 1 { sheet.line(&line, stroke) } else { Ok(()) }
}

/// Each limit's change beside the plot where its line leaves it on the right, or above it where it leaves at the top.
fn limit_labels(sheet: &Sheet, plot: &Plot, field: &Field<'_>, [right, top]: [f64; 2]) -> Drawn {
    let (first, last) = (field.warmings[0], field.warmings[field.warmings.len() - 1]);
    let wettest = field.changes[field.changes.len() - 1];
    let at_right = field.column(last);
    let mut beside: Vec<(f64, String)> = Vec::new();
    let mut above: Vec<(f64, String)> = Vec::new();
    for limit in LIMITS_PCT {
        if let Some(pct) = field.passes(&at_right, limit) {
            beside.push((plot.at(last, pct).1, signed_percent(limit)));
            continue;
        }
        let steps = 400;
        let warming = |step: i32| first + (last - first) * f64::from(step) / f64::from(steps);
        let highest = |step: i32| *field.column(warming(step)).last().unwrap_or(&f64::NAN);
        let crosses = |step: &i32| (highest(*step) >= limit) != (highest(step + 1) >= limit);
        if let Some(step) = (0..steps).find(crosses) {
            above.push((plot.at(warming(step), wettest).0, signed_percent(limit)));
        }
    }
    beside.sort_by(|a, b| a.0.total_cmp(&b.0));
    let wanted: Vec<[f64; 2]> = beside.iter().map(|(y, _)| [*y, LABEL.size_px]).collect();
    let bottom = plot.at(first, field.changes[0]).1;
    for ((_, label), y) in beside.iter().zip(moved_apart(&wanted, 3.0, [top, bottom])) {
        sheet.write(label, (right + TO_LABEL_PX, y), LABEL, HPos::Left, VPos::Center)?;
    }
    above.sort_by(|a, b| a.0.total_cmp(&b.0));
    // Two rows: a label too near to the one before it stands higher.
    let mut free_from = [f64::NEG_INFINITY; 2];
    for (x, label) in above {
        let half = LABEL.width(&label) / 2.0;
        let row = (0..2).find(|row| x - half >= free_from[*row]);
        if let Some(row) = row.filter(|_| x + half <= right + TO_LABEL_PX) {
            let y = top - 6.0 - ROW_ABOVE_PX * row as f64;
            sheet.write(&label, (x, y), LABEL, HPos::Center, VPos::Bottom)?;
            free_from[row] = x + half + BETWEEN_PX;
        }
    }
    Ok(())
}

/// The curve through the warmings whose break-even precipitation was found, up to the plot's upper edge.
fn break_even(sheet: &Sheet, plot: &Plot, surface: &ResponseSurface, wettest: f64) -> Drawn {
    let mut line: Vec<Px> = Vec::new();
    let mut before: Option<[f64; 2]> = None;
    let driest = surface.precipitation_changes_pct[0];
    for point in &surface.break_even {
        let Some(pct) = point.precipitation_change_pct else { continue };
        let here = [point.warming_c, pct];
        let edge = [driest, wettest].into_iter().find(|edge| match before {
            Some([_, before]) => (before < *edge) != (pct < *edge) && before != *edge && pct != *edge,
            None => false,
        });
        if let (Some(edge), Some([warming_c, before])) = (edge, before) {
            let share = (edge - before) / (pct - before);
            line.push(plot.at(warming_c + share * (point.warming_c - warming_c), edge));
        }
        if (driest..=wettest).contains(&pct) {
            line.push(plot.at(point.warming_c, pct));
        }
        before = Some(here);
    }
    if line.len() > 1 { sheet.line(&line, Stroke::solid(INK, 2.4)) } else { Ok(()) }
}

/// Whether it is a case of the scenario.
fn is_case(origin: ChangeOrigin) -> bool {
    origin == ChangeOrigin::Case
}
