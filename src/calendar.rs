//! Days of the water year: when one starts, what it is called, and which day of it a date is.
//!
//! A water year is named for the calendar year in which it ends (USGS usage): with a start on 1 October,
//! 2009 is 1 October 2008 to 30 September 2009. Days are counted from 1, leap days included, so
//! 1 April is day 183, and 184 in a leap water year.

use chrono::{Datelike, Days, NaiveDate};
use serde::Serialize;
use std::fmt;

/// English month names, January first.
pub const MONTHS: [&str; 12] = [
    "January",
    "February",
    "March",
    "April",
    "May",
    "June",
    "July",
    "August",
    "September",
    "October",
    "November",
    "December",
];

/// Dates that every year has.
pub const COMMON_DATES: usize = 365;

/// A day that exists in every year; 29 February does not qualify.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub struct MonthDay {
    month: u32,
    day: u32,
}

impl MonthDay {
    /// The day `day` of month `month` (1 to 12), or none where a common year has no such day.
    pub fn new(month: u32, day: u32) -> Option<Self> {
        NaiveDate::from_ymd_opt(2001, month, day).map(|_| Self { month, day })
    }

    /// Reads `MM-DD`.
    pub fn parse(text: &str) -> Option<Self> {
        let (month, day) = text.split_once('-')?;
        if month.len() != 2 || day.len() != 2 {
            return None;
        }
        Self::new(month.parse().ok()?, day.parse().ok()?)
    }

    /// The day of the month, from 1.
    pub fn day(self) -> u32 {
        self.day
    }

    /// The month, 1 to 12.
    pub fn month(self) -> u32 {
        self.month
    }

    /// Its day of the year in a year of 365 days, 1 to 365.
    pub fn day_of_common_year(self) -> u32 {
        self.in_year(2001).ordinal()
    }

    /// The day in a given calendar year. Years beyond the calendar's range fall back to its ends.
    pub fn in_year(self, year: i32) -> NaiveDate {
        NaiveDate::from_ymd_opt(year, self.month, self.day).unwrap_or(if year < 0 {
            NaiveDate::MIN
        } else {
            NaiveDate::MAX
        })
    }

    /// `1 April`.
    pub fn words(self) -> String {
        format!("{} {}", self.day, MONTHS[self.month as usize - 1])
    }
}

impl fmt::Display for MonthDay {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(f, "{:02}-{:02}", self.month, self.day)
    }
}

impl Serialize for MonthDay {
    fn serialize<S: serde::Serializer>(&self, serializer: S) -> Result<S::Ok, S::Error> {
        serializer.collect_str(self)
    }
}

/// The day on which water years start.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
#[serde(transparent)]
pub struct WaterYearStart(pub MonthDay);

impl WaterYearStart {
    /// The water year that holds a date, named for the calendar year in which it ends.
    pub fn water_year_of(self, date: NaiveDate) -> i32 {
        let calendar_year = date.year();
        let began = if date >= self.0.in_year(calendar_year) { calendar_year } else { calendar_year - 1 };
        began + self.years_to_its_end()
    }

    /// First day of a water year.
    pub fn first_day(self, water_year: i32) -> NaiveDate {
        self.0.in_year(water_year - self.years_to_its_end())
    }

    /// Number of days in a water year, 365 or 366.
    pub fn days_in(self, water_year: i32) -> usize {
        days_between(self.first_day(water_year), self.first_day(water_year + 1))
    }

    fn years_to_its_end(self) -> i32 {
        i32::from(self.0 != MonthDay { month: 1, day: 1 })
    }
}

/// Day of the water year, counted from 1, on which `day` falls in the year whose first day is `first`.
///
/// ```
/// use thawline::calendar::{day_of_water_year, MonthDay};
/// let first = |year| chrono::NaiveDate::from_ymd_opt(year, 10, 1).unwrap();
/// let april = MonthDay::new(4, 1).unwrap();
/// assert_eq!(day_of_water_year(first(2008), april), 183);
/// assert_eq!(day_of_water_year(first(2011), april), 184);
/// ```
pub fn day_of_water_year(first: NaiveDate, day: MonthDay) -> usize {
    let same = day.in_year(first.year());
    let date = if same >= first { same } else { day.in_year(first.year() + 1) };
    days_between(first, date) + 1
}

/// Days of the water year, counted from 1, of the 365 dates that every year has, in the year whose first day is `first`:
/// 29 February is left out, so that the same place stands for the same date in every year.
pub fn days_of_common_dates(first: NaiveDate) -> impl Iterator<Item = usize> {
    let dates = first.iter_days().zip(1..);
    dates.filter(|(date, _)| (date.month(), date.day()) != (2, 29)).map(|(_, day)| day).take(COMMON_DATES)
}

/// The date of day `day` (from 1) of the water year that starts on `first`.
pub fn date_of(first: NaiveDate, day: usize) -> NaiveDate {
    first.checked_add_days(Days::new(day as u64 - 1)).unwrap_or(NaiveDate::MAX)
}

/// Whole days from `from` to `to`; 0 where `to` is earlier.
pub fn days_between(from: NaiveDate, to: NaiveDate) -> usize {
    usize::try_from((to - from).num_days()).unwrap_or(0)
}
