//! One measure's dates: a row a level, the reference's range behind them.

use super::super::Setting;
use super::super::labels::{day_of_month, days, level, sentence, times};
use super::super::marks::{Form, Marking, arrow, marker, point_interval};
use super::super::sheet::{Drawn, HPos, Plot, Sheet, Stroke, VPos};
use super::super::theme::{BAND, EDGE, INK, LABEL, Lettering, MARGIN_PX, NAME, NOTE, WIDTH_PX, level_ink};
use crate::calendar::WaterYearStart;
use crate::findings::{Findings, LevelFindings, MeasureFindings};
use crate::season::Outcome;
use crate::units::UnitSystem;
use plotters::style::RGBColor;

const HEADING_PX: f64 = 30.0;
const ROW_PX: f64 = 27.0;
const BELOW_PX: f64 = 8.0;

/// Where a panel is drawn.
pub(super) struct Area<'a> {
    pub plot: &'a Plot,
    pub top: f64,
    pub left: f64,
    pub right: f64,
}

/// One measure, its rows' names, and their labels.
pub(super) struct Panel<'a> {
    measure: &'a MeasureFindings,
    form: Form,
    names: Vec<String>,
    rows: Vec<Vec<(String, Lettering)>>,
}

impl<'a> Panel<'a> {
    pub fn new(findings: &Findings, measure: &'a MeasureFindings, form: Form, setting: &Setting<'_>) -> Self {
        let levels =
            || measure.levels.iter().enumerate().map(|(at, found)| (found, at == findings.reference));
        let names = levels().map(|(found, is_reference)| name(found, is_reference, setting.units)).collect();
        let rows = levels()
            .map(|(found, is_reference)| lines(found, is_reference, setting.water_year_starts))
            .collect();
        Self { measure, form, names, rows }
    }

    /// Days of every quantile that is drawn.
    pub fn days(&self) -> impl Iterator<Item = f64> + '_ {
        self.measure.levels.iter().flat_map(|level| quantiles(level).into_iter().filter_map(Outcome::value))
    }

    /// Width of the widest level's name, px.
    pub fn name_width(&self) -> f64 {
        self.names.iter().map(|name| NAME.width(name)).fold(0.0, f64::max)
    }

    /// Width of the widest label at the right, px.
    pub fn label_width(&self) -> f64 {
        let lines = self.rows.iter().flatten();
        lines.map(|(text, lettering)| lettering.width(text)).fold(0.0, f64::max)
    }

    /// Height with its heading, px.
    pub fn height(&self) -> f64 {
        HEADING_PX + self.rows.iter().map(|lines| row_height(lines)).sum::<f64>() + BELOW_PX
    }

    pub fn draw(&self, sheet: &Sheet, area: &Area<'_>, findings: &Findings) -> Drawn {
        let rows_top = area.top + HEADING_PX;
        let bottom = area.top + self.height();
        let glyph = Marking { ink: INK, form: self.form, is_hollow: false };
        marker(sheet, (MARGIN_PX + 7.0, area.top + 15.5), glyph)?;
        let title = sentence(&self.measure.measure.title);
        let title_at = (MARGIN_PX + 20.0, area.top + 20.0);
        sheet.write(&title, title_at, NAME, HPos::Left, VPos::Bottom)?;
        let room_from = MARGIN_PX + 20.0 + NAME.width(&title) + 24.0;
        self.band(sheet, area, [rows_top - 4.0, bottom], room_from)?;
        let mut top = rows_top;
        let rows = self.measure.levels.iter().zip(&self.names).zip(&self.rows);
        for (at, ((found, name), lines)) in rows.enumerate() {
            let is_reference = at == findings.reference;
            let marking = Marking {
                ink: level_ink(at, findings.reference, self.measure.levels.len()),
                form: self.form,
                is_hollow: is_reference,
            };
            let y = top + ROW_PX / 2.0;
            sheet.write(name, (MARGIN_PX, y), NAME, HPos::Left, VPos::Center)?;
            sheet.group("level", || row(sheet, area, found, y, marking))?;
            for (at, (text, lettering)) in lines.iter().enumerate() {
                let place = (area.right + 16.0, y + NOTE.leading() * at as f64);
                sheet.write(text, place, *lettering, HPos::Left, VPos::Center)?;
            }
            top += row_height(lines);
        }
        Ok(())
    }

    /// The reference's 5-95 % range, as far as it has dates.
    fn band(&self, sheet: &Sheet, area: &Area<'_>, [top, bottom]: [f64; 2], room_from: f64) -> Drawn {
        let Some(spread) = &self.measure.precipitation_spread else {
            return Ok(());
        };
        let [from, middle, to] = [spread.q05, spread.q50, spread.q95].map(|day| area.plot.at(day, 0.0).0);
        sheet.block((from, top), (to, bottom), BAND)?;
        for edge in [from, to] {
            sheet.line(&[(edge, top), (edge, bottom)], Stroke::solid(EDGE, 1.0))?;
        }
        let median = Stroke { ink: INK, width_px: 1.2, dash_px: Some([6, 4]) };
        sheet.line(&[(middle, top), (middle, bottom)], median)?;
        let name = "9 in 10 realizations at the reference";
        let half = NOTE.width(name) / 2.0;
        let x =
            ((from + to) / 2.0).clamp(room_from + half, (WIDTH_PX - MARGIN_PX - half).max(room_from + half));
        sheet.write(name, (x, top - 6.0), NOTE, HPos::Center, VPos::Bottom)
    }
}

/// Point and intervals of a level; an interval that ends where snow never goes, or where there is nothing to time, ends
/// in an arrow at the edge.
fn row(sheet: &Sheet, area: &Area<'_>, found: &LevelFindings, y: f64, marking: Marking) -> Drawn {
    let place = |outcome: Outcome| match outcome {
        Outcome::Value(day) => Some((area.plot.at(day, 0.0).0, y)),
        Outcome::None => Some((area.left, y)),
        Outcome::NotGone | Outcome::NotReached => Some((area.right, y)),
    };
    let all = quantiles(found);
    if all.iter().all(|outcome| outcome.value().is_none()) {
        return Ok(());
    }
    let mut places = all.map(place);
    if all[2].value().is_none() {
        places[2] = None;
    }
    point_interval(sheet, places, marking)?;
    edge_arrow(sheet, area, all[0], y, marking.ink)?;
    edge_arrow(sheet, area, all[4], y, marking.ink)
}

fn edge_arrow(sheet: &Sheet, area: &Area<'_>, end: Outcome, y: f64, ink: RGBColor) -> Drawn {
    match end {
        Outcome::Value(_) => Ok(()),
        Outcome::None => arrow(sheet, (area.left - 4.0, y), false, ink),
        Outcome::NotGone | Outcome::NotReached => arrow(sheet, (area.right + 4.0, y), true, ink),
    }
}

fn quantiles(found: &LevelFindings) -> [Outcome; 5] {
    let periods = &found.periods;
    [periods.q05, periods.q25, periods.q50, periods.q75, periods.q95]
}

fn name(found: &LevelFindings, is_reference: bool, units: UnitSystem) -> String {
    match (is_reference, found.level_c == 0.0) {
        (true, true) => "reference".to_owned(),
        (true, false) => format!("reference, {}", level(units, found.level_c)),
        (false, _) => level(units, found.level_c),
    }
}

fn row_height(lines: &[(String, Lettering)]) -> f64 {
    ROW_PX + NOTE.leading() * (lines.len().max(1) - 1) as f64
}

/// What is written at the right of a row.
fn lines(found: &LevelFindings, is_reference: bool, starts: WaterYearStart) -> Vec<(String, Lettering)> {
    let periods = &found.periods;
    let mut lines = Vec::new();
    match (periods.q50, found.shift) {
        (Outcome::None, _) => lines.push(("median: nothing to time".to_owned(), LABEL)),
        (Outcome::NotGone, _) => lines.push(("median: snow not gone".to_owned(), LABEL)),
        (Outcome::NotReached, _) => lines.push(("median: not reached".to_owned(), LABEL)),
        (Outcome::Value(day), _) if is_reference => {
            lines.push((format!("median {}", day_of_month(starts, day)), LABEL));
        }
        (Outcome::Value(_), Some(shift)) => {
            let ratio = found
                .signal_to_spread
                .map_or_else(String::new, |ratio| format!(", {} half spread", times(ratio.value)));
            lines.push((format!("{}{ratio}", days(shift.median.value)), LABEL));
        }
        (Outcome::Value(day), None) => {
            lines.push((format!("median {}, no pair", day_of_month(starts, day)), LABEL));
        }
    }
    for (what, count) in [("snow not gone", periods.not_gone), ("nothing to time", periods.none)] {
        if count > 0 {
            lines.push((format!("{what} in {count} of {} realizations", periods.count), NOTE));
        }
    }
    lines
}
