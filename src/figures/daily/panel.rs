//! One water year: SWE through its days, and three strips of bars below.

use super::super::axes::AmountTicks;
use super::super::sheet::{Drawn, HPos, Plot, Px, Sheet, Stroke, VPos};
use super::super::swe_pair;
use super::super::theme::{BAND, EDGE, LABEL, MELT, NAME, NOTE, RAIN, SNOWFALL};
use super::layout::{Place, TO_NAME_PX};
use crate::calendar::{MONTHS, date_of};
use crate::fit::PlaceYear;
use crate::observed::Kind;
use crate::units::Unit;
use chrono::Datelike;
use plotters::style::RGBColor;

/// A bar lower than this is not seen, px.
const LEAST_BAR_PX: f64 = 0.1;
const GRID: Stroke = Stroke::solid(BAND, 1.0);
const AXIS: Stroke = Stroke::solid(EDGE, 1.0);

/// Which strips share a scale: a storm brings far more than a warm day melts.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum Scale {
    Fallen,
    Melted,
}

/// A strip of bars.
pub(super) struct Strip {
    pub name: &'static str,
    pub scale: Scale,
    pub of: fn(&PlaceYear) -> &Vec<f64>,
    ink: RGBColor,
}

/// What a day brings, from the top.
pub(super) const STRIPS: [Strip; 3] = [
    Strip { name: "snow", scale: Scale::Fallen, of: |year| &year.snow_mm, ink: SNOWFALL },
    Strip { name: "rain", scale: Scale::Fallen, of: |year| &year.rain_mm, ink: RAIN },
    Strip { name: "melt", scale: Scale::Melted, of: |year| &year.melt_mm, ink: MELT },
];

/// A year and where it is drawn.
pub(super) struct Panel<'a> {
    pub place: Place,
    /// How its snow is observed, where it is.
    pub kind: Option<Kind>,
    pub year: &'a PlaceYear,
    pub swe_ticks: &'a AmountTicks,
    /// Ticks of each strip.
    pub day_ticks: &'a [AmountTicks; STRIPS.len()],
    /// The unit of the amounts.
    pub depth: Unit,
}

impl Panel<'_> {
    pub fn draw(&self, sheet: &Sheet, note: &str) -> Drawn {
        let Place { left, right, swe: [top, bottom], strips } = self.place;
        let baseline = top - 6.0;
        let year = self.year.water_year.to_string();
        sheet.write(&year, (left, baseline), NAME, HPos::Left, VPos::Bottom)?;
        sheet.write(note, (right, baseline), NOTE, HPos::Right, VPos::Bottom)?;

        let days = 1.0..self.year.swe.len() as f64 + 1.0;
        let plot = sheet.plot((left, top), (right, bottom), days.clone(), 0.0..self.swe_ticks.top())?;
        self.months(sheet, &plot)?;
        for (amount, label) in &self.swe_ticks.ticks {
            let y = plot.at(1.0, *amount).1;
            if *amount > 0.0 {
                sheet.line(&[(left, y), (right, y)], GRID)?;
            }
            sheet.write(label, (left - 6.0, y), LABEL, HPos::Right, VPos::Center)?;
        }
        sheet.line(&[(left, bottom), (right, bottom)], AXIS)?;
        swe_pair::draw(sheet, &plot, &self.year.swe, self.kind, self.depth)?;

        for ((strip, ticks), [top, bottom]) in STRIPS.iter().zip(self.day_ticks).zip(strips) {
            let plot = sheet.plot((left, top), (right, bottom), days.clone(), 0.0..ticks.top())?;
            sheet.line(&[(left, top), (right, top)], GRID)?;
            if let Some((_, label)) = ticks.ticks.last() {
                sheet.write(label, (left - 6.0, top), LABEL, HPos::Right, VPos::Center)?;
            }
            let name = (right + TO_NAME_PX, bottom);
            sheet.write(strip.name, name, LABEL, HPos::Left, VPos::Bottom)?;
            self.bars(sheet, &plot, strip)?;
            sheet.line(&[(left, bottom), (right, bottom)], AXIS)?;
        }
        Ok(())
    }

    /// Bars as wide as their day; those that touch are one shape.
    fn bars(&self, sheet: &Sheet, plot: &Plot, strip: &Strip) -> Drawn {
        let amounts_mm = (strip.of)(self.year);
        let bottom = plot.at(1.0, 0.0).1;
        let tops: Vec<Px> =
            (1..).zip(amounts_mm).map(|(day, mm)| plot.at(f64::from(day), self.depth.of(*mm))).collect();
        let end = plot.at(amounts_mm.len() as f64 + 1.0, 0.0).0;
        let ends = tops.iter().skip(1).map(|(x, _)| *x).chain([end]);
        let bars: Vec<[f64; 3]> = tops.iter().zip(ends).map(|((from, top), to)| [*from, to, *top]).collect();
        for run in bars.split(|[.., top]| bottom - top < LEAST_BAR_PX) {
            let (Some([from, ..]), Some([_, to, _])) = (run.first(), run.last()) else { continue };
            let edges = run.iter().flat_map(|[from, to, top]| [(*from, *top), (*to, *top)]);
            let corners: Vec<Px> =
                [(*from, bottom)].into_iter().chain(edges).chain([(*to, bottom)]).collect();
            sheet.shape(&corners, strip.ink)?;
        }
        Ok(())
    }

    /// A line where each month begins, through all parts, and the months' names below.
    fn months(&self, sheet: &Sheet, plot: &Plot) -> Drawn {
        let Place { swe: [top, _], .. } = self.place;
        let bottom = self.place.bottom();
        let days = self.year.swe.len();
        let across = |day: usize| plot.at(day as f64, 0.0).0;
        let date = |day: usize| date_of(self.year.first, day);
        let begins: Vec<usize> = (1..=days).filter(|day| date(*day).day() == 1).collect();
        for day in begins.iter().filter(|day| **day > 1) {
            sheet.line(&[(across(*day), top), (across(*day), bottom)], GRID)?;
        }
        let ends = begins.iter().skip(1).copied().chain([days + 1]);
        for (from, to) in begins.iter().zip(ends).filter(|(from, to)| to - **from >= 28) {
            let month = MONTHS[date(*from).month0() as usize];
            let name = month.get(..3).unwrap_or(month);
            let middle = (across(*from) + across(to)) / 2.0;
            sheet.write(name, (middle, bottom + 6.0), LABEL, HPos::Center, VPos::Top)?;
        }
        Ok(())
    }
}
