//! Days of the water year, and a year's outflow and melt as dates.

use super::case::Case;
use chrono::NaiveDate;
use thawline::calendar::{MonthDay, WaterYearStart, date_of, day_of_water_year};
use thawline::season::{Measures, SeasonSettings};
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
    let mut block = YearBlock {
        first: NaiveDate::from_ymd_opt(2006, 10, 1).expect("a date"),
        days: DAYS,
        width: 1,
        mixes_at: 1,
        swe_mm,
        net_melt_mm: flux_mm.clone(),
        outflow_mm: flux_mm,
        bare_ground_rain_mm: vec![0.0; DAYS],
        detail: None,
    };
    let settings =
        SeasonSettings { water_year_starts: start(), survey_dates: Vec::new(), volume_windows: Vec::new() };
    let measures = Measures::new(settings);
    let mut values = vec![0.0; measures.list().len()];
    measures.take(&mut block, &mut values);
    for measure in ["outflow_centroid_day", "melt_d10_day", "melt_d50_day", "melt_d90_day"] {
        let at = measures.list().iter().position(|listed| listed.name == measure);
        case.check(measure, &[values[at.expect("a measure of that name")]]);
    }
}
