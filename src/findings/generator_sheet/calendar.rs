//! The dates of the sheet: the 365 that every year has, and the months and seasons that they belong to.

use super::line::Period;
use crate::calendar::{COMMON_DATES, MonthDay, WaterYearStart, day_of_water_year, days_of_common_dates};
use crate::weather::{Series, YearSpan};
use chrono::Datelike;

/// No water year that ends in it holds a leap day.
const YEAR_OF_365_DAYS: i32 = 2002;

/// A part of the water year, as dates counted from 0.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Part {
    pub period: Period,
    pub dates: Vec<usize>,
}

/// The parts of a water year.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Calendar {
    /// From the month with which the water year starts.
    pub months: Vec<Part>,
    /// The cool and the warm season; the whole year where the survey date is its first day.
    pub seasons: Vec<Part>,
    /// All of it.
    pub year: Part,
}

impl Calendar {
    pub fn new(starts: WaterYearStart, survey: MonthDay) -> Self {
        let first = starts.first_day(YEAR_OF_365_DAYS);
        let year = Part { period: Period::WaterYear, dates: (0..COMMON_DATES).collect() };
        let mut months: Vec<Part> = Vec::with_capacity(12);
        for (date, day) in first.iter_days().take(COMMON_DATES).enumerate() {
            let period = Period::Month(day.month0() as u8);
            match months.iter_mut().find(|part| part.period == period) {
                Some(part) => part.dates.push(date),
                None => months.push(Part { period, dates: vec![date] }),
            }
        }
        let cool_dates = day_of_water_year(first, survey) - 1;
        let part = |period, dates: std::ops::Range<usize>| Part { period, dates: dates.collect() };
        let seasons = if cool_dates == 0 {
            vec![year.clone()]
        } else {
            vec![part(Period::CoolSeason, 0..cool_dates), part(Period::WarmSeason, cool_dates..COMMON_DATES)]
        };
        Self { months, seasons, year }
    }

    /// The cool season, where there is one, and the whole year.
    pub fn cool_and_year(&self) -> impl Iterator<Item = &Part> {
        self.seasons.iter().filter(|part| part.period == Period::CoolSeason).chain([&self.year])
    }
}

/// Daily weather on the dates that every year has: 29 February is left out.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Days {
    /// Of each year, whether it follows on the one before it.
    pub follows: Vec<bool>,
    /// `[year][date]`, mm.
    pub precipitation_mm: Vec<f64>,
    /// `[year][date]`, degC.
    pub tmin_c: Vec<f64>,
    /// `[year][date]`, degC.
    pub tmax_c: Vec<f64>,
    /// `[year][date]`, degC.
    pub mean_c: Vec<f64>,
}

impl Days {
    pub fn of(weather: &Series) -> Self {
        let days = weather.years.len() * COMMON_DATES;
        let mut kept = Self {
            follows: weather.years.iter().map(|year| year.follows).collect(),
            precipitation_mm: Vec::with_capacity(days),
            tmin_c: Vec::with_capacity(days),
            tmax_c: Vec::with_capacity(days),
            mean_c: Vec::with_capacity(days),
        };
        for year in &weather.years {
            let view = weather.view(year);
            for day in common_days(year) {
                let (mean_c, half_range_c) = (view.mean_c[day], view.half_range_c[day]);
                kept.precipitation_mm.push(view.precipitation_mm[day]);
                kept.tmin_c.push(mean_c - half_range_c);
                kept.tmax_c.push(mean_c + half_range_c);
                kept.mean_c.push(mean_c);
            }
        }
        kept
    }

    /// Numbers of the same part of each year, a list a year.
    pub fn by_year<'d>(
        &self,
        numbers: &'d [f64],
        part: &Part,
    ) -> impl Iterator<Item = Vec<f64>> + use<'d, '_> {
        let dates = part.dates.clone();
        numbers.chunks_exact(COMMON_DATES).map(move |year| dates.iter().map(|date| year[*date]).collect())
    }

    /// Sum of precipitation over a part of each year, mm.
    pub fn totals_mm(&self, part: &Part) -> Vec<f64> {
        self.by_year(&self.precipitation_mm, part).map(|days| days.iter().sum()).collect()
    }
}

/// Places of the year's days but 29 February. A year of 365 days has none of it, whatever its name.
fn common_days(year: &YearSpan) -> Vec<usize> {
    if year.days == COMMON_DATES {
        (0..COMMON_DATES).collect()
    } else {
        days_of_common_dates(year.first).map(|day| day - 1).collect()
    }
}
