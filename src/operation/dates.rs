//! A water year's dates, told once for all levels and rules.

use super::plan::OperationSettings;
use crate::calendar::{MonthDay, day_of_water_year, days_between};
use chrono::{Datelike, NaiveDate};

/// Of every day of a water year its month and its place in a common year, and where the asked days lie, counted from 0.
#[derive(Debug, Clone, PartialEq, Eq)]
pub(super) struct Dates {
    /// 0 for January.
    pub month: Vec<usize>,
    /// 0 for 1 January; 29 February is its 28th.
    pub common: Vec<usize>,
    /// First and last day of each volume window.
    pub windows: Vec<[usize; 2]>,
    /// The days before which shares are taken.
    pub shares_before: Vec<usize>,
    /// The days on which storage is taken.
    pub storage: Vec<usize>,
}

impl Dates {
    /// Those of the water year of so many days that begins on `first`.
    pub fn of(settings: &OperationSettings, first: NaiveDate, days: usize) -> Self {
        let at = |day: &MonthDay| day_of_water_year(first, *day) - 1;
        Self {
            month: first.iter_days().take(days).map(|date| date.month0() as usize).collect(),
            common: first.iter_days().take(days).map(common_date).collect(),
            windows: settings.volume_windows.iter().map(|[from, to]| [at(from), at(to)]).collect(),
            shares_before: settings.shares_before.iter().map(at).collect(),
            storage: settings.all_storage_dates().iter().map(at).collect(),
        }
    }
}

fn common_date(date: NaiveDate) -> usize {
    let new_year = NaiveDate::from_ymd_opt(date.year(), 1, 1).unwrap_or(NaiveDate::MIN);
    let is_after_leap_day = date.leap_year() && (date.month(), date.day()) >= (2, 29);
    days_between(new_year, date) - usize::from(is_after_leap_day)
}

#[cfg(test)]
mod tests {
    use super::*;

    /// By hand.
    #[test]
    fn common_dates_leave_the_leap_day_out() {
        let date = |year, month, day| common_date(NaiveDate::from_ymd_opt(year, month, day).unwrap());
        assert_eq!([date(2001, 1, 1), date(2001, 12, 31)], [0, 364]);
        assert_eq!(
            [date(2000, 2, 28), date(2000, 2, 29), date(2000, 3, 1), date(2001, 3, 1)],
            [58, 58, 59, 59]
        );
        assert_eq!(date(2000, 12, 31), 364);
    }

    /// MT-03 of the published values, counted from 1: 1 April is day 183, and 184 of a leap water year.
    #[test]
    fn asked_days_move_with_leap_days() {
        let april = |year: i32, days| {
            let first = NaiveDate::from_ymd_opt(year, 10, 1).unwrap();
            Dates::of(&OperationSettings::of_tests(), first, days).shares_before[0] + 1
        };
        assert_eq!([april(2008, 365), april(2011, 366)], [183, 184]);
    }
}
