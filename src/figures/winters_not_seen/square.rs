//! One amount: its winters in a square whose diagonal is where model and snow agree.

use super::super::axes::AmountTicks;
use super::super::marks::{Form, Marking, marker};
use super::super::scales;
use super::super::sheet::{Drawn, HPos, Plot, Sheet, Stroke, VPos};
use super::super::theme::{BAND, EDGE, NAME, NOT_SEEN, NOTE};
use super::{Group, Winter};
use crate::units::Unit;

/// Where a square stands, and its scale.
pub(super) struct Square<'a> {
    pub left: f64,
    pub top: f64,
    pub side: f64,
    /// Whether amounts are written at its left.
    pub is_first: bool,
    pub ticks: &'a AmountTicks,
    /// The unit of the amounts.
    pub depth: Unit,
}

impl Square<'_> {
    pub fn draw(&self, sheet: &Sheet, group: &Group) -> Drawn {
        let Self { left, top, side, .. } = *self;
        let range = || 0.0..self.ticks.top();
        let plot = sheet.plot((left, top), (left + side, top + side), range(), range())?;
        let (name, middle) = (top - 48.0, left + side / 2.0);
        sheet.write(&group.name, (middle, name), NAME, HPos::Center, VPos::Bottom)?;
        sheet.write(&group.finding, (middle, name + NOTE.leading()), NOTE, HPos::Center, VPos::Bottom)?;
        self.axes(sheet, &plot)?;
        group.winters.iter().try_for_each(|winter| {
            let form = if winter.is_odd { Form::Round } else { Form::Diamond };
            marker(sheet, self.place(&plot, winter), Marking { ink: NOT_SEEN, form, is_hollow: false })
        })?;
        self.farthest(sheet, &plot, group)
    }

    fn place(&self, plot: &Plot, winter: &Winter) -> (f64, f64) {
        plot.at(self.depth.of(winter.observed_mm), self.depth.of(winter.modelled_mm))
    }

    fn axes(&self, sheet: &Sheet, plot: &Plot) -> Drawn {
        let Self { left, top, side, ticks, .. } = *self;
        for (amount, _) in &ticks.ticks {
            let (x, y) = plot.at(*amount, *amount);
            sheet.line(&[(left, y), (left + side, y)], Stroke::solid(BAND, 1.0))?;
            sheet.line(&[(x, top), (x, top + side)], Stroke::solid(BAND, 1.0))?;
        }
        let diagonal = [plot.at(0.0, 0.0), plot.at(ticks.top(), ticks.top())];
        sheet.line(&diagonal, Stroke { ink: EDGE, width_px: 1.2, dash_px: Some([6, 4]) })?;
        scales::upwards(sheet, plot, ticks, [left, left + side])?;
        if self.is_first {
            scales::amounts_upwards(sheet, plot, ticks, left)?;
        }
        scales::rightwards(sheet, plot, ticks, top + side)?;
        let axis = format!("Observed, {}", self.depth.word);
        sheet.write(&axis, (left + side / 2.0, top + side + 39.0), NAME, HPos::Center, VPos::Bottom)
    }

    /// Names the winter that is farthest off, on the side away from the diagonal, where there is room.
    fn farthest(&self, sheet: &Sheet, plot: &Plot, group: &Group) -> Drawn {
        let farthest = group.winters.iter().max_by(|a, b| a.error_mm().abs().total_cmp(&b.error_mm().abs()));
        farthest.map_or(Ok(()), |winter| {
            let (x, y) = self.place(plot, winter);
            let needs = NOTE.width("0000") + 12.0;
            let has_room = [x - needs >= self.left, x + needs <= self.left + self.side];
            let is_right = if winter.error_mm() < 0.0 { has_room[1] } else { !has_room[0] };
            let (x, side) = if is_right { (x + 9.0, HPos::Left) } else { (x - 9.0, HPos::Right) };
            let y = y.clamp(self.top + 8.0, self.top + self.side - 8.0);
            sheet.write(&winter.water_year.to_string(), (x, y), NOTE, side, VPos::Center)
        })
    }
}
