//! Whole water years of daily weather, ready for the engine: the record's usable years, or one realization's.

use chrono::{Datelike, NaiveDate};

/// One water year within a [`Series`].
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct YearSpan {
    /// Name of the water year in the record it was taken from.
    pub water_year: i32,
    /// Its first day, which sets the calendar of the rest.
    pub first: NaiveDate,
    /// Index of its first day in the series.
    pub start: usize,
    /// Its length, 365 or 366.
    pub days: usize,
    /// Whether snow is carried over from the year before it in the series; else it starts bare.
    pub follows: bool,
}

/// Whole water years of daily station weather, in columns.
#[derive(Debug, Clone, Default, PartialEq)]
pub struct Series {
    /// The years, in the order in which they are run.
    pub years: Vec<YearSpan>,
    /// (Tmin + Tmax)/2, degC.
    pub mean_c: Vec<f64>,
    /// (Tmax - Tmin)/2, degC; 0 where the record has the mean alone.
    pub half_range_c: Vec<f64>,
    /// Precipitation at the station, mm.
    pub precipitation_mm: Vec<f64>,
    /// Relative humidity at the station, percent; no days where the record has none.
    pub relative_humidity_pct: Vec<f64>,
    /// Month of each day, 0 for January.
    pub month: Vec<u8>,
    /// Calendar day of the year of each day, 1 to 366.
    pub day_of_year: Vec<u16>,
}

/// One water year of a series, borrowed.
#[derive(Debug, Clone, Copy)]
pub struct YearView<'a> {
    /// First day.
    pub first: NaiveDate,
    /// Daily mean temperature, degC.
    pub mean_c: &'a [f64],
    /// Half the daily temperature range, degC.
    pub half_range_c: &'a [f64],
    /// Precipitation, mm.
    pub precipitation_mm: &'a [f64],
    /// Relative humidity, percent; empty where the record has none.
    pub relative_humidity_pct: &'a [f64],
    /// Month of each day, 0 for January.
    pub month: &'a [u8],
    /// Calendar day of the year, 1 to 366.
    pub day_of_year: &'a [u16],
}

impl Series {
    /// A year of the series.
    pub fn view(&self, year: &YearSpan) -> YearView<'_> {
        let days = year.start..year.start + year.days;
        YearView {
            first: year.first,
            mean_c: &self.mean_c[days.clone()],
            half_range_c: &self.half_range_c[days.clone()],
            precipitation_mm: &self.precipitation_mm[days.clone()],
            relative_humidity_pct: self.relative_humidity_pct.get(days.clone()).unwrap_or_default(),
            month: &self.month[days.clone()],
            day_of_year: &self.day_of_year[days],
        }
    }

    /// Empties the series and keeps its memory.
    pub fn clear(&mut self) {
        self.years.clear();
        self.mean_c.clear();
        self.half_range_c.clear();
        self.precipitation_mm.clear();
        self.relative_humidity_pct.clear();
        self.month.clear();
        self.day_of_year.clear();
    }

    /// Adds a year of `from` at the end; it follows on the one before it, if `follows` says so.
    pub fn push_year(&mut self, from: &Self, year: &YearSpan, follows: bool) {
        let days = year.start..year.start + year.days;
        self.years.push(YearSpan { start: self.mean_c.len(), follows, ..*year });
        self.mean_c.extend_from_slice(&from.mean_c[days.clone()]);
        self.half_range_c.extend_from_slice(&from.half_range_c[days.clone()]);
        self.precipitation_mm.extend_from_slice(&from.precipitation_mm[days.clone()]);
        let humidity = from.relative_humidity_pct.get(days.clone());
        self.relative_humidity_pct.extend_from_slice(humidity.unwrap_or_default());
        self.month.extend_from_slice(&from.month[days.clone()]);
        self.day_of_year.extend_from_slice(&from.day_of_year[days]);
    }

    /// Adds a year from daily minima, maxima and precipitation.
    pub(super) fn push_days(
        &mut self,
        water_year: i32,
        first: NaiveDate,
        follows: bool,
        weather: impl ExactSizeIterator<Item = (f64, f64, f64)>,
    ) {
        let span = YearSpan { water_year, first, start: self.mean_c.len(), days: weather.len(), follows };
        self.years.push(span);
        for ((tmin, tmax, precipitation), date) in weather.zip(first.iter_days()) {
            self.mean_c.push((tmin + tmax) / 2.0);
            self.half_range_c.push((tmax - tmin) / 2.0);
            self.precipitation_mm.push(precipitation);
            self.month.push(date.month0() as u8);
            self.day_of_year.push(date.ordinal() as u16);
        }
    }
}
