//! Days of the water year, and how long snow lies in it.

use super::case::Case;
use super::still_year::still_year;
use chrono::{Datelike, NaiveDate};
use thawline::calendar::{MonthDay, WaterYearStart, date_of, day_of_water_year};
use thawline::season::{is_seasonal, longest_cover_days};

fn start() -> WaterYearStart {
    WaterYearStart(MonthDay::new(10, 1).expect("a day"))
}

/// Dates of water years that start on 1 October, as days counted from 1, and back again as dates.
pub fn water_year_days(case: &Case) {
    let water_year: i32 = case.input("water_year");
    let first = start().first_day(water_year);
    let dates: Vec<String> = case.input("month_days");
    let days: Vec<f64> = dates
        .iter()
        .map(|text| day_of_water_year(first, MonthDay::parse(text).expect("a day of every year")) as f64)
        .collect();
    for (text, day) in dates.iter().zip(&days) {
        let date = date_of(first, *day as usize);
        assert_eq!(date.format("%m-%d").to_string(), *text, "{}: and back again", case.id);
        assert_eq!(start().water_year_of(date), water_year, "{}: {date}", case.id);
    }
    let new_year = day_of_water_year(first, MonthDay::new(1, 1).expect("a day")) as f64;
    let mean = days.iter().sum::<f64>() / days.len() as f64;
    case.check("days", &days);
    case.check("days_in_year", &[start().days_in(water_year) as f64]);
    case.check("mean_calendar_day", &[mean - new_year + 1.0]);
    if let Some(day) = case.input_or_none::<usize>("leap_day_is") {
        let date = date_of(first, day);
        assert_eq!(date.format("%m-%d").to_string(), "02-29", "{}", case.id);
        case.check("leap_day_is", &[day as f64]);
    }
}

/// Which water year a date lies in, and from when to when a water year lasts.
pub fn water_years(case: &Case) {
    let starts = MonthDay::parse(&case.input::<String>("starts")).expect("a day of every year");
    let start = WaterYearStart(starts);
    let dates: Vec<String> = case.input("dates");
    let found = dates.iter().map(|date| f64::from(start.water_year_of(date.parse().expect("a date"))));
    case.check("water_years", &found.collect::<Vec<_>>());
    let water_year: i32 = case.input("first_and_last_day_of");
    let first = start.first_day(water_year);
    let parts = |date: NaiveDate| [f64::from(date.year()), f64::from(date.month()), f64::from(date.day())];
    case.check("first_day", &parts(first));
    case.check("last_day", &parts(date_of(first, start.days_in(water_year))));
}

/// A year made of runs of days, each with its SWE: its longest cover, and whether that is seasonal snow.
pub fn cover(case: &Case) {
    let runs: Vec<(usize, f64)> = case.input("days_and_swe_mm");
    let mut swe_mm: Vec<f64> = runs.into_iter().flat_map(|(days, swe)| vec![swe; days]).collect();
    swe_mm.resize(366, 0.0);
    let days = longest_cover_days(&still_year(swe_mm), 0);
    case.check("longest_cover_days", &[days as f64]);
    case.check("is_seasonal", &[f64::from(u8::from(is_seasonal(days)))]);
}
