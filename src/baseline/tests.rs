//! Seasons, the baseline and detrending of records made for it.

use super::*;
use crate::weather::YearSpan;
use chrono::{Datelike, NaiveDate};

/// Whole water years from 1 October, each day given by its water year and date.
fn record(years: impl Iterator<Item = i32>, weather: impl Fn(i32, NaiveDate) -> (f64, f64)) -> Series {
    let mut series = Series::default();
    for water_year in years {
        let first = NaiveDate::from_ymd_opt(water_year - 1, 10, 1).unwrap();
        let dates: Vec<NaiveDate> = first
            .iter_days()
            .take_while(|date| *date < NaiveDate::from_ymd_opt(water_year, 10, 1).unwrap())
            .collect();
        let start = series.mean_c.len();
        series.years.push(YearSpan { water_year, first, start, days: dates.len(), follows: false });
        for date in dates {
            let (mean_c, precipitation_mm) = weather(water_year, date);
            series.mean_c.push(mean_c);
            series.half_range_c.push(4.0);
            series.precipitation_mm.push(precipitation_mm);
            series.month.push(date.month0() as u8);
            series.day_of_year.push(date.ordinal() as u16);
        }
    }
    series
}

fn april() -> MonthDay {
    MonthDay::new(4, 1).unwrap()
}

fn is_cool(date: NaiveDate) -> bool {
    !(4..10).contains(&date.month())
}

/// 0.05 degC a year warmer in the cool season, 0.02 a year cooler in the warm one, from 1 and 10 degC in 2000.
fn trending(water_year: i32, date: NaiveDate) -> (f64, f64) {
    let years = f64::from(water_year - 2000);
    (if is_cool(date) { 1.0 + 0.05 * years } else { 10.0 - 0.02 * years }, 2.0)
}

/// 1 mm on every day counts days: 182 from 1 October to 31 March, 183 in a leap year, and 183 after it.
#[test]
fn the_survey_date_belongs_to_the_warm_season() {
    let series = record([2011, 2012].into_iter(), |_, date| (if is_cool(date) { -3.0 } else { 8.0 }, 1.0));
    let seasons = Seasons::of(&series, april());
    assert_eq!(seasons.cool.precipitation_mm, [(2011, 182.0), (2012, 183.0)]);
    assert_eq!(seasons.warm.precipitation_mm, [(2011, 183.0), (2012, 183.0)]);
    assert_eq!(seasons.cool.mean_c, [(2011, -3.0), (2012, -3.0)]);
    assert_eq!(seasons.warm.mean_c, [(2011, 8.0), (2012, 8.0)]);
}

#[test]
fn a_season_without_days_has_no_values() {
    let series = record(2001..=2010, trending);
    let october = MonthDay::new(10, 1).unwrap();
    let seasons = Seasons::of(&series, october);
    assert_eq!(seasons.cool, SeasonYears::default());
    assert_eq!(seasons.warm.mean_c.len(), 10);
    let baseline = Baseline::of(&series, october).unwrap();
    assert_eq!(baseline.cool_temperature, None);
    let detrended = detrend(&mut series.clone(), october, 2005).unwrap();
    assert!(detrended.cool.is_none() && detrended.warm.is_some());
}

/// 2003 is absent: the mean of the other nine years from 2001 to 2010 is (20055 - 2003)/9. Precipitation is the same but
/// for the 29 February of 2004 and 2008, so those two tie above the seven others: the first has 2 below it before and 5
/// after, the second 5 before and 2 after, and all pairs balance.
#[test]
fn the_baseline_of_a_record_with_a_gap() {
    let series = record((2001..=2010).filter(|year| *year != 2003), trending);
    let baseline = Baseline::of(&series, april()).unwrap();
    assert_eq!((baseline.first_water_year, baseline.last_water_year), (2001, 2010));
    assert_eq!((baseline.usable_years, baseline.mid_year), (9, 18052.0 / 9.0));
    let cool = baseline.cool_temperature.unwrap();
    assert_eq!((cool.n, cool.mann_kendall.score), (9, 36.0));
    assert!((cool.theil_sen.slope_per_year - 0.05).abs() < 1e-12, "exact but for rounding");
    assert_eq!(cool.pettitt.last_year_before, 2005);
    let warm = baseline.warm_temperature.unwrap();
    assert!((warm.theil_sen.slope_per_year + 0.02).abs() < 1e-12, "exact but for rounding");
    let precipitation = baseline.cool_precipitation.unwrap();
    assert_eq!(precipitation.mann_kendall.score, 0.0);
    assert_eq!(precipitation.mann_kendall.plain, ScoreTest { z: 0.0, p: 1.0 });
}

#[test]
fn weather_that_never_changes_has_no_test() {
    // 0.1 a day over 182 or 183 days: the means differ in their last bits.
    let series = record(2001..=2012, |_, _| (0.1, 0.0));
    let baseline = Baseline::of(&series, april()).unwrap();
    assert_eq!((baseline.cool_temperature, baseline.cool_precipitation), (None, None));
    assert_eq!(Baseline::of(&Series::default(), april()), None);
}

/// Every year becomes 2005: cool 1 + 5*0.05, warm 10 - 5*0.02 degC, to 1e-12, which rounding stays below.
#[test]
fn detrending_leaves_the_year_it_aims_at() {
    let before = record((2001..=2012).filter(|year| *year != 2004), trending);
    let mut after = before.clone();
    let detrended = detrend(&mut after, april(), 2005).unwrap();
    assert_eq!(detrended.to_year, 2005);
    assert!((detrended.cool.unwrap().slope_per_year - 0.05).abs() < 1e-12);
    assert!((detrended.warm.unwrap().slope_per_year + 0.02).abs() < 1e-12);
    for year in &after.years {
        let days = year.first.iter_days().zip(after.view(year).mean_c);
        for (date, mean_c) in days {
            let wanted = if is_cool(date) { 1.25 } else { 9.9 };
            assert!((mean_c - wanted).abs() < 1e-12, "{date}: {mean_c}");
        }
    }
    let untouched = Series { mean_c: before.mean_c.clone(), ..after };
    assert_eq!(untouched, before);
}

#[test]
fn too_few_years_are_not_detrended() {
    let before = record(2001..=2007, trending);
    let mut after = before.clone();
    assert_eq!(detrend(&mut after, april(), 2005), None);
    assert_eq!(after, before);
}

fn water_years(years: std::ops::RangeInclusive<i32>) -> Vec<YearSpan> {
    let first = |year: i32| NaiveDate::from_ymd_opt(year - 1, 10, 1).unwrap();
    let span =
        |year: i32| YearSpan { water_year: year, first: first(year), start: 0, days: 365, follows: false };
    years.map(span).collect()
}

/// The rule is the method's: 1991-2020 where at least 20 of its years are in use, else all years in use.
#[test]
fn baseline_years_are_the_usual_ones_where_enough_are_in_use() {
    let of = |stated, years| BaselineYears::of(stated, &water_years(years)).unwrap();
    let period = |years: &BaselineYears| (years.first, years.last, years.in_use, years.choice);
    assert_eq!(period(&of(None, 1985..=2024)), (1991, 2020, 30, BaselineChoice::Usual));
    assert_eq!(period(&of(None, 2001..=2024)), (1991, 2020, 20, BaselineChoice::Usual));
    assert_eq!(period(&of(None, 2002..=2024)), (2002, 2024, 23, BaselineChoice::AllInUse));
    assert_eq!(period(&of(Some([1981, 2010]), 1985..=2024)), (1981, 2010, 26, BaselineChoice::Stated));
    let usual = of(None, 1985..=2024);
    assert_eq!([1990, 1991, 2020, 2021].map(|year| usual.holds(year)), [false, true, true, false]);
}

/// A short record is nobody's choice; a stated period of few years is.
#[test]
fn few_baseline_years_are_worth_a_second_look_where_they_are_stated() {
    let unlikely = |stated, years| BaselineYears::of(stated, &water_years(years)).unwrap().unlikely();
    assert!(unlikely(None, 2001..=2006).is_none() && unlikely(Some([1991, 2010]), 1985..=2024).is_none());
    assert!(unlikely(Some([1991, 2009]), 1985..=2024).unwrap().why.contains("1991 to 2009, 19 are in use"));
    assert!(BaselineYears::of(Some([1950, 1984]), &water_years(1985..=2024)).is_err());
}
