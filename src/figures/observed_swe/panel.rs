//! One water year: observed and modelled SWE through its days.

use super::super::axes::AmountTicks;
use super::super::labels::score;
use super::super::sheet::{Drawn, HPos, Plot, Sheet, Stroke, VPos};
use super::super::swe_pair;
use super::super::theme::{BAND, EDGE, LABEL, NAME, NOTE};
use super::grid::Place;
use crate::calendar::{MONTHS, date_of};
use crate::fit::ComparedYear;
use crate::observed::Kind;
use crate::units::Unit;
use chrono::Datelike;

/// Every third month is named but the water year's first.
const MONTHS_APART: usize = 3;

/// A year and where it is drawn.
pub(super) struct Panel<'a> {
    pub place: Place,
    pub kind: Kind,
    pub year: &'a ComparedYear,
    pub ticks: &'a AmountTicks,
    /// The unit of the amounts.
    pub depth: Unit,
}

impl Panel<'_> {
    pub fn draw(&self, sheet: &Sheet) -> Drawn {
        let Place { left, top, right, bottom, .. } = self.place;
        let days = self.year.days.len() as f64;
        let plot = sheet.plot((left, top), (right, bottom), 1.0..days + 1.0, 0.0..self.ticks.top())?;
        self.title(sheet)?;
        self.axes(sheet, &plot)?;
        swe_pair::draw(sheet, &plot, &self.year.days, Some(self.kind), self.depth)
    }

    /// The year and how well it is reproduced.
    fn title(&self, sheet: &Sheet) -> Drawn {
        let Place { left, top, right, .. } = self.place;
        let baseline = top - 6.0;
        let year = self.year.water_year.to_string();
        sheet.write(&year, (left, baseline), NAME, HPos::Left, VPos::Bottom)?;
        match self.year.nash_sutcliffe {
            Some(efficiency) if self.kind == Kind::Pillow => {
                let words = format!("NSE {}", score(efficiency));
                sheet.write(&words, (right, baseline), NOTE, HPos::Right, VPos::Bottom)
            }
            _ => Ok(()),
        }
    }

    fn axes(&self, sheet: &Sheet, plot: &Plot) -> Drawn {
        let Place { left, top, right, bottom, is_first_in_row, is_last_in_column } = self.place;
        for (amount, label) in &self.ticks.ticks {
            let y = plot.at(1.0, *amount).1;
            if *amount > 0.0 {
                sheet.line(&[(left, y), (right, y)], Stroke::solid(BAND, 1.0))?;
            }
            if is_first_in_row {
                sheet.write(label, (left - 6.0, y), LABEL, HPos::Right, VPos::Center)?;
            }
        }
        let date = |day: usize| date_of(self.year.first, day);
        let firsts = (1..=self.year.days.len()).filter(|day| date(*day).day() == 1);
        for day in firsts.skip(MONTHS_APART).step_by(MONTHS_APART) {
            let x = plot.at(day as f64, 0.0).0;
            sheet.line(&[(x, top), (x, bottom)], Stroke::solid(BAND, 1.0))?;
            if is_last_in_column {
                sheet.line(&[(x, bottom), (x, bottom + 4.0)], Stroke::solid(EDGE, 1.0))?;
                let month = MONTHS[date(day).month0() as usize];
                let name = month.get(..3).unwrap_or(month);
                sheet.write(name, (x, bottom + 7.0), LABEL, HPos::Center, VPos::Top)?;
            }
        }
        sheet.line(&[(left, bottom), (right, bottom)], Stroke::solid(EDGE, 1.0))
    }
}
