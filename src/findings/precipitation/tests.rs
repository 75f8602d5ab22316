//! Sums that can be told without adding.

use super::*;

fn day(month: u32, day: u32) -> MonthDay {
    MonthDay::new(month, day).unwrap()
}

/// Water years 2003, and 2004 with 29 February; `amount` of precipitation by year and day, from 0.
fn weather(amount: fn(i32, usize) -> f64) -> Series {
    let starts = WaterYearStart(day(10, 1));
    let mut series = Series::default();
    for water_year in [2003, 2004] {
        let (first, days) = (starts.first_day(water_year), starts.days_in(water_year));
        let start = series.precipitation_mm.len();
        series.years.push(YearSpan { water_year, first, start, days, follows: false });
        series.precipitation_mm.extend((0..days).map(|day| amount(water_year, day)));
        series.mean_c.resize(start + days, 0.0);
        series.half_range_c.resize(start + days, 0.0);
        series.month.resize(start + days, 0);
        series.day_of_year.resize(start + days, 1);
    }
    series
}

fn found(amount: fn(i32, usize) -> f64, survey: MonthDay) -> RecordPrecipitation {
    RecordPrecipitation::of(&weather(amount), WaterYearStart(day(10, 1)), survey)
}

/// A millimetre a day adds up to the days there are: 182 from 1 October to 31 March, 183 with 29 February. The same place
/// stands for the same date: both years have 150 as 28 February begins, day 151; as 5 March begins, 155 and 156.
#[test]
fn sums_stand_at_dates_and_end_before_the_survey() {
    let found = found(|_, _| 1.0, day(4, 1));
    assert_eq!(found.until, Some(day(4, 1)));
    assert_eq!(found.days[..3], [1, 6, 11]);
    assert_eq!(found.days[36..], [181, 183]);
    let totals: Vec<f64> = found.years.iter().map(YearPrecipitation::total_mm).collect();
    assert_eq!(totals, [182.0, 183.0]);
    let at = |day: usize| found.days.iter().position(|known| *known == day).unwrap();
    let sums = |day: usize| [0, 1].map(|year| found.years[year].cumulative_mm[at(day)]);
    assert_eq!([sums(1), sums(151), sums(156)], [[0.0, 0.0], [150.0, 150.0], [155.0, 156.0]]);
    assert_eq!(found.median_mm.last(), Some(&182.5));
}

/// Where no season comes before the survey date, a year's last sum is the year's total.
#[test]
fn without_a_cool_season_the_whole_year_counts() {
    let amount = |year: i32, day: usize| ((day * 7 + year as usize) % 13) as f64 / 4.0;
    let found = found(amount, day(10, 1));
    assert_eq!((found.until, found.days.last()), (None, Some(&366)));
    for (year, days) in found.years.iter().zip([365, 366]) {
        let total: f64 = (0..days).map(|day| amount(year.water_year, day)).sum();
        assert_eq!(year.total_mm(), total, "quarters of a millimetre add up without rounding");
    }
}

#[test]
fn the_driest_and_the_wettest_year_are_named_where_they_differ() {
    let extremes = |amount: fn(i32, usize) -> f64| {
        found(amount, day(4, 1)).extremes().map(|years| years.map(|year| year.water_year))
    };
    assert_eq!(extremes(|year, _| f64::from(2010 - year)), Some([2004, 2003]));
    assert_eq!(extremes(|_, day| if day < 150 { 1.0 } else { 0.0 }), None);
}
