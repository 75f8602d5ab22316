//! One parameter: the objective over its bounds, what was fitted, and what the scenario states.

use super::super::sheet::{Drawn, HPos, Plot, Px, Sheet, Stroke, VPos};
use super::super::theme::{BAND, EDGE, INK, LABEL, MODELLED, NAME, NOTE};
use super::super::value_ticks::ValueTicks;
use super::Row;
use crate::fit::FLAT_PROFILE;

/// Height of the strip with the values of the halves below a panel, px.
pub(super) const HALVES_PX: f64 = 12.0;
const DOT_PX: f64 = 2.0;
const VALUE_STEPS: usize = 4;

/// A panel and where it stands.
pub(super) struct Panel<'a> {
    pub left_top: Px,
    /// Width and height, px.
    pub size: [f64; 2],
    /// Whether depths are written at its left.
    pub is_first: bool,
    pub ticks: &'a ValueTicks,
}

impl Panel<'_> {
    pub fn draw(&self, sheet: &Sheet, row: &Row<'_>) -> Drawn {
        let ((left, top), [width, height]) = (self.left_top, self.size);
        let ([from, to], [deepest, _]) = (row.bounds, self.ticks.ends());
        let plot = sheet.plot((left, top), (left + width, top + height), from..to, deepest..0.0)?;
        sheet.write(row.title, (left, top - 24.0), NAME, HPos::Left, VPos::Bottom)?;
        sheet.write(&super::words::told(row), (left, top - 7.0), NOTE, HPos::Left, VPos::Bottom)?;
        self.axes(sheet, &plot, row)?;
        self.values(sheet, &plot, row)?;
        self.profile(sheet, &plot, row)
    }

    fn axes(&self, sheet: &Sheet, plot: &Plot, row: &Row<'_>) -> Drawn {
        let ((left, top), [width, height]) = (self.left_top, self.size);
        let (right, bottom) = (left + width, top + height + HALVES_PX);
        let low = row.bounds[0];
        for (depth, label) in &self.ticks.ticks {
            let y = plot.at(low, *depth).1;
            sheet.line(&[(left, y), (right, y)], Stroke::solid(BAND, 1.0))?;
            if self.is_first {
                sheet.write(label, (left - 8.0, y), LABEL, HPos::Right, VPos::Center)?;
            }
        }
        let flat = plot.at(low, -FLAT_PROFILE).1;
        if flat < top + height {
            let dotted = Stroke { ink: EDGE, width_px: 1.0, dash_px: Some([2, 3]) };
            sheet.line(&[(left, flat), (right, flat)], dotted)?;
        }
        sheet.line(&[(left, bottom), (right, bottom)], Stroke::solid(EDGE, 1.0))?;
        for (value, label) in &ValueTicks::within(row.bounds[0], row.bounds[1], VALUE_STEPS).ticks {
            let x = plot.at(*value, 0.0).0;
            sheet.line(&[(x, bottom), (x, bottom + 4.0)], Stroke::solid(EDGE, 1.0))?;
            sheet.write(label, (x, bottom + 7.0), LABEL, HPos::Center, VPos::Top)?;
        }
        sheet.write(&row.unit, (left + width / 2.0, bottom + 36.0), NOTE, HPos::Center, VPos::Bottom)
    }

    /// What was fitted, on all years and on halves, and what the scenario states.
    fn values(&self, sheet: &Sheet, plot: &Plot, row: &Row<'_>) -> Drawn {
        let (top, bottom) = (self.left_top.1, self.left_top.1 + self.size[1]);
        let across = |value: f64| plot.at(value, 0.0).0;
        if let Some(x) = row.fitted.map(across) {
            sheet.line(&[(x, top), (x, bottom)], Stroke::solid(MODELLED, 2.4))?;
        }
        let within = |value: &f64| (row.bounds[0]..=row.bounds[1]).contains(value);
        if let Some(x) = row.stated.filter(within).map(across) {
            let dashed = Stroke { ink: INK, width_px: 1.4, dash_px: Some([5, 4]) };
            sheet.line(&[(x, top), (x, bottom)], dashed)?;
        }
        row.halves.iter().try_for_each(|value| {
            let x = across(*value);
            sheet.line(&[(x, bottom + 2.0), (x, bottom + HALVES_PX)], Stroke::solid(MODELLED, 1.4))
        })
    }

    /// The line through the held values, as far as the panel reaches.
    fn profile(&self, sheet: &Sheet, plot: &Plot, row: &Row<'_>) -> Drawn {
        let deepest = self.ticks.ends()[0];
        let is_in = |(_, depth): &(f64, f64)| *depth >= deepest;
        for pair in row.line().windows(2) {
            let [from, to] = [pair[0], pair[1]];
            let crossing = || {
                let share = (deepest - from.1) / (to.1 - from.1);
                (from.0 + share * (to.0 - from.0), deepest)
            };
            let ends = match (is_in(&from), is_in(&to)) {
                (true, true) => [from, to],
                (true, false) => [from, crossing()],
                (false, true) => [crossing(), to],
                (false, false) => continue,
            };
            sheet.line(&ends.map(|(value, depth)| plot.at(value, depth)), Stroke::solid(INK, 1.6))?;
        }
        let inside = row.points().into_iter().filter(is_in);
        inside.map(|(value, depth)| plot.at(value, depth)).try_for_each(|place| sheet.dot(place, DOT_PX, INK))
    }
}
