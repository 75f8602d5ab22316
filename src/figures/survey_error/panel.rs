//! One fit: its errors by temperature of the winter.

use super::super::marks::{Form, Marking, marker};
use super::super::sheet::{Drawn, HPos, Plot, Px, Sheet, Stroke, VPos};
use super::super::theme::{BAND, EDGE, INK, LABEL, MODELLED, NAME, NOT_SEEN, NOTE};
use super::super::value_ticks::ValueTicks;
use super::line::Line;
use super::{Group, Point};
use crate::units::Unit;

/// Points of the band's edges.
const STEPS: usize = 24;

/// Scale of both panels.
pub(super) struct Scale<'a> {
    pub errors: &'a ValueTicks,
    pub temperatures: &'a ValueTicks,
    /// Lowest and highest temperature that is shown.
    pub range: [f64; 2],
    pub depth: Unit,
    pub temperature: Unit,
}

/// A panel and where it stands.
pub(super) struct Panel<'a> {
    pub left_top: Px,
    /// Width and height, px.
    pub size: [f64; 2],
    /// Whether errors are written at its left.
    pub is_first: bool,
    pub scale: &'a Scale<'a>,
}

impl Panel<'_> {
    pub fn draw(&self, sheet: &Sheet, group: &Group) -> Drawn {
        let ((left, top), [width, height]) = (self.left_top, self.size);
        let ([from, to], [low, high]) = (self.scale.range, self.scale.errors.ends());
        let plot = sheet.plot((left, top), (left + width, top + height), from..to, low..high)?;
        let (name, middle) = (top - 52.0, left + width / 2.0);
        sheet.write(group.name, (middle, name), NAME, HPos::Center, VPos::Bottom)?;
        sheet.write(&group.finding, (middle, name + NOTE.leading()), NOTE, HPos::Center, VPos::Bottom)?;
        if let Some(line) = &group.line {
            self.band(sheet, &plot, line)?;
        }
        self.axes(sheet, &plot)?;
        if let Some(line) = &group.line {
            let ends = line.range_c.map(|mean_c| self.place(&plot, mean_c, line.at(mean_c)));
            sheet.line(&ends, Stroke::solid(INK, 1.6))?;
        } else {
            self.mean(sheet, &plot, group, true)?;
            self.mean(sheet, &plot, group, false)?;
        }
        group.points.iter().try_for_each(|point| {
            let place = self.place(&plot, point.mean_c, point.error_mm);
            marker(sheet, place, marking(point.is_seen))
        })
    }

    fn place(&self, plot: &Plot, mean_c: f64, error_mm: f64) -> Px {
        plot.at(self.scale.temperature.of(mean_c), self.scale.depth.of(error_mm))
    }

    /// The line, a standard error up and down.
    fn band(&self, sheet: &Sheet, plot: &Plot, line: &Line) -> Drawn {
        let [from, to] = line.range_c;
        let edge = |side: f64| {
            (0..=STEPS).map(move |step| {
                let mean_c = from + (to - from) * step as f64 / STEPS as f64;
                self.place(plot, mean_c, line.at(mean_c) + side * line.standard_error(mean_c))
            })
        };
        let (upper, lower): (Vec<Px>, Vec<Px>) = (edge(1.0).collect(), edge(-1.0).collect());
        let corners: Vec<Px> = upper.iter().copied().chain(lower.iter().rev().copied()).collect();
        sheet.shape(&corners, BAND)?;
        [upper, lower].iter().try_for_each(|edge| sheet.line(edge, Stroke::solid(EDGE, 0.8)))
    }

    /// The mean error of winters seen or not seen, over their temperatures.
    fn mean(&self, sheet: &Sheet, plot: &Plot, group: &Group, is_seen: bool) -> Drawn {
        let points: Vec<&Point> = group.points.iter().filter(|point| point.is_seen == is_seen).collect();
        let Some(mean_mm) = super::words::mean_mm(&group.points, is_seen) else { return Ok(()) };
        let range_c = super::span(points.iter().map(|point| point.mean_c));
        let ends = range_c.map(|mean_c| self.place(plot, mean_c, mean_mm));
        let ends = [(ends[0].0 - 5.0, ends[0].1), (ends[1].0 + 5.0, ends[1].1)];
        sheet.line(&ends, Stroke::solid(marking(is_seen).ink, 2.2))
    }

    fn axes(&self, sheet: &Sheet, plot: &Plot) -> Drawn {
        let ((left, top), [width, height], scale) = (self.left_top, self.size, self.scale);
        let (right, bottom) = (left + width, top + height);
        for (error, label) in &scale.errors.ticks {
            let y = plot.at(scale.range[0], *error).1;
            let (ink, end) = if *error == 0.0 { (EDGE, 1.2) } else { (BAND, 1.0) };
            sheet.line(&[(left, y), (right, y)], Stroke::solid(ink, end))?;
            if self.is_first {
                sheet.write(label, (left - 8.0, y), LABEL, HPos::Right, VPos::Center)?;
            }
        }
        sheet.line(&[(left, bottom), (right, bottom)], Stroke::solid(EDGE, 1.0))?;
        for (temperature, label) in &scale.temperatures.ticks {
            let x = plot.at(*temperature, 0.0).0;
            sheet.line(&[(x, bottom), (x, bottom + 5.0)], Stroke::solid(EDGE, 1.0))?;
            sheet.write(label, (x, bottom + 9.0), LABEL, HPos::Center, VPos::Top)?;
        }
        let axis = format!("Mean temperature of the winter, {}", scale.temperature.word);
        sheet.write(&axis, (left + width / 2.0, bottom + 39.0), NAME, HPos::Center, VPos::Bottom)
    }
}

/// Winters seen are round and hollow, those not seen filled and on their corner.
fn marking(is_seen: bool) -> Marking {
    if is_seen {
        Marking { ink: MODELLED, form: Form::Round, is_hollow: true }
    } else {
        Marking { ink: NOT_SEEN, form: Form::Diamond, is_hollow: false }
    }
}
