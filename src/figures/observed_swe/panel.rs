//! One water year: observed and modelled SWE through its days.

use super::super::axes::AmountTicks;
use super::super::sheet::{Drawn, HPos, Plot, Px, Sheet, Stroke, VPos};
use super::super::theme::{BAND, EDGE, INK, LABEL, MODELLED, NAME, NOTE};
use super::super::thin::{TOLERANCE_PX, thinned};
use super::grid::Place;
use super::words::score;
use crate::calendar::{MONTHS, date_of};
use crate::fit::ComparedYear;
use crate::observed::Kind;
use crate::units::Unit;
use chrono::Datelike;

/// Width of the modelled line, px.
pub(super) const MODELLED_PX: f64 = 1.6;
/// Width of the observed line, px; it shows on both sides of the modelled one where they meet.
pub(super) const OBSERVED_PX: f64 = 2.6;
/// Radius of a survey's dot, px.
pub(super) const DOT_PX: f64 = 2.8;
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
        self.observed(sheet, &plot)?;
        let modelled = (1..)
            .zip(&self.year.days)
            .map(|(day, pair)| plot.at(f64::from(day), self.depth.of(pair.modelled_mm)));
        sheet.line(
            &thinned(&modelled.collect::<Vec<Px>>(), TOLERANCE_PX),
            Stroke::solid(MODELLED, MODELLED_PX),
        )
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

    /// A dot a survey; a line through the days of a pillow, broken where there is no reading.
    fn observed(&self, sheet: &Sheet, plot: &Plot) -> Drawn {
        let days = (1..).zip(&self.year.days);
        let places: Vec<Option<Px>> = days
            .map(|(day, pair)| pair.observed_mm.map(|swe_mm| plot.at(f64::from(day), self.depth.of(swe_mm))))
            .collect();
        if self.kind == Kind::Course {
            return places.into_iter().flatten().try_for_each(|place| sheet.dot(place, DOT_PX, INK));
        }
        for run in places.split(Option::is_none) {
            match run.iter().copied().flatten().collect::<Vec<Px>>().as_slice() {
                [] => {}
                [alone] => sheet.dot(*alone, OBSERVED_PX / 2.0, INK)?,
                line => sheet.line(&thinned(line, TOLERANCE_PX), Stroke::solid(INK, OBSERVED_PX))?,
            }
        }
        Ok(())
    }
}
