//! Days of the water year, and a year's outflow and melt as dates.

use super::case::Case;
use chrono::{Datelike, NaiveDate};
use thawline::calendar::{MonthDay, WaterYearStart, date_of, day_of_water_year};
use thawline::season::{Measures, SeasonSettings, is_seasonal, longest_cover_days};
use thawline::snow::YearBlock;

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

/// A year in which the stated amounts melt and leave the pack on the first days, and nothing on the others.
pub fn melt_dates(case: &Case) {
    const DAYS: usize = 365;
    let amounts: Vec<f64> = case.input("amounts_mm");
    let mut flux_mm = amounts.clone();
    flux_mm.resize(DAYS, 0.0);
    let mut left_mm: f64 = amounts.iter().sum();
    let mut swe_mm = vec![left_mm];
    for flux in &flux_mm {
        left_mm -= flux;
        swe_mm.push(left_mm);
    }
    let block = YearBlock { net_melt_mm: flux_mm.clone(), outflow_mm: flux_mm, ..still_year(swe_mm) };
    let names = ["outflow_centroid_day", "melt_d10_day", "melt_d50_day", "melt_d90_day"];
    for (name, value) in names.into_iter().zip(measured(block, Vec::new(), names)) {
        case.check(name, &[value]);
    }
}

/// A year whose SWE runs straight between stated days, and is 0 after the last: 1 April, the peak, and how far apart.
pub fn survey_and_peak(case: &Case) {
    let days: Vec<usize> = case.input("days");
    let stated_mm: Vec<f64> = case.input("swe_mm");
    let mut swe_mm = vec![stated_mm[0]];
    for (days, swe) in days.windows(2).zip(stated_mm.windows(2)) {
        let count = days[1] - days[0];
        swe_mm.extend((1..=count).map(|day| swe[0] + (swe[1] - swe[0]) * day as f64 / count as f64));
    }
    swe_mm.resize(366, 0.0);
    let april = MonthDay::new(4, 1).expect("a day");
    let names = ["swe_04_01_mm", "peak_swe_mm", "peak_day"];
    let values = measured(still_year(swe_mm), vec![april], names);
    for (name, value) in names.into_iter().zip(values) {
        case.check(name, &[value]);
    }
    case.check("short_of_peak_pct", &[100.0 * (1.0 - values[0] / values[1])]);
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

/// A common year of one column with the stated SWE as each day begins and as the year ends, and no fluxes.
fn still_year(swe_mm: Vec<f64>) -> YearBlock {
    let days = swe_mm.len() - 1;
    YearBlock {
        first: NaiveDate::from_ymd_opt(2006, 10, 1).expect("a date"),
        days,
        width: 1,
        mixes_at: 1,
        swe_mm,
        net_melt_mm: vec![0.0; days],
        outflow_mm: vec![0.0; days],
        bare_ground_rain_mm: vec![0.0; days],
        rain_mm: vec![0.0; days],
        snow_mm: vec![0.0; days],
        detail: None,
    }
}

/// Measures of a year of one column, by their names.
fn measured<const N: usize>(mut block: YearBlock, survey_dates: Vec<MonthDay>, names: [&str; N]) -> [f64; N] {
    let settings = SeasonSettings { water_year_starts: start(), survey_dates, volume_windows: Vec::new() };
    let measures = Measures::new(settings);
    let mut values = vec![0.0; measures.list().len()];
    measures.take(&mut block, &mut values);
    names.map(|name| {
        let at = measures.list().iter().position(|listed| listed.name == name);
        values[at.expect("a measure of that name")]
    })
}
