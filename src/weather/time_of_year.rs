//! What is usual at a time of the year: the median of all values measured within a week of a calendar day.

use chrono::{Datelike, NaiveDate};

/// Days before and after a calendar day whose values count as of the same time of the year.
const REACH_DAYS: usize = 7;
/// Calendar days of a leap year.
const LONGEST_YEAR: usize = 366;
/// Medians of fewer values, some five years' worth, say little.
const FEWEST_VALUES: usize = 5 * (2 * REACH_DAYS + 1);

/// The median for each calendar day (index 0 for 1 January), of values from a week before it to a week after it in every
/// year; NaN where there are too few. None where that holds for the whole year.
pub(super) fn medians_by_time_of_year(first: NaiveDate, column: &[Option<f64>]) -> Option<Vec<f64>> {
    let mut by_day: Vec<Vec<f64>> = vec![Vec::new(); LONGEST_YEAR];
    for (date, value) in first.iter_days().zip(column) {
        by_day[date.ordinal0() as usize].extend(value);
    }
    let median_about = |day: usize| {
        let near = (0..=2 * REACH_DAYS).map(|step| (day + LONGEST_YEAR + step - REACH_DAYS) % LONGEST_YEAR);
        let mut values: Vec<f64> = near.flat_map(|near| by_day[near].iter().copied()).collect();
        if values.len() < FEWEST_VALUES {
            return f64::NAN;
        }
        let middle = values.len() / 2;
        *values.select_nth_unstable_by(middle, f64::total_cmp).1
    };
    let medians: Vec<f64> = (0..LONGEST_YEAR).map(median_about).collect();
    medians.iter().any(|median| median.is_finite()).then_some(medians)
}
