//! Winters made by hand: every other day of a cold half-year 4 mm fall, and the pillow gains as much.

use super::*;
use crate::observed::{Counts, State};
use chrono::{Datelike, Days, NaiveDate};

const YEARS: i32 = 8;
const COLD_DAYS: usize = 180;

fn first(water_year: i32) -> NaiveDate {
    NaiveDate::from_ymd_opt(water_year - 1, 10, 1).expect("a date")
}

fn weather() -> Series {
    let mut series = Series::default();
    for water_year in 2001..2001 + YEARS {
        let (first, start) = (first(water_year), series.mean_c.len());
        series.years.push(YearSpan { water_year, first, start, days: 365, follows: false });
        for (day, date) in first.iter_days().take(365).enumerate() {
            let is_cold = day < COLD_DAYS;
            series.mean_c.push(if is_cold { -8.0 } else { 9.0 });
            // Ranges of a year differ by tenths of a degree.
            series.half_range_c.push(5.0 + 0.05 * f64::from(water_year % 3));
            series.precipitation_mm.push(if is_cold && day % 2 == 0 { 4.0 } else { 0.0 });
            series.month.push(date.month0() as u8);
            series.day_of_year.push(date.ordinal() as u16);
        }
    }
    series
}

/// What a pillow of gain 1 reads as a day begins, mm.
fn pillow_mm(day: usize) -> f64 {
    let fell_mm = 4.0 * day.min(COLD_DAYS).div_ceil(2) as f64;
    (fell_mm - 10.0 * day.saturating_sub(COLD_DAYS) as f64).max(0.0)
}

/// The rules that a pillow falls under in 2004: `reading` is what it reads there, the other years read [`pillow_mm`].
fn rules(weather: &Series, reading: impl Fn(usize) -> f64) -> Vec<(i32, Rule)> {
    let states = weather.years.iter().flat_map(|span| (0..span.days).map(move |day| (span, day)));
    let states: Vec<State> = states
        .map(|(span, day)| State {
            date: span.first + Days::new(day as u64),
            swe_mm: if span.water_year == 2004 { reading(day) } else { pillow_mm(day) },
        })
        .collect();
    let counts = Counts {
        readings: states.len(),
        first: states[0].date,
        last: states[states.len() - 1].date,
        lines_without_reading: 0,
        impossible_readings: 0,
    };
    let observations = Observations { kind: Kind::Pillow, counts, suspicions: Vec::new(), states };
    let site = Site { name: "pillow", elevation_m: 2500.0, observations: &observations };
    let found = left_out(&[site], weather, 2500.0);
    let remaining = without(&site, &found, weather).expect("seven winters");
    let is_left = |water_year: i32| remaining.states.iter().any(|state| state.date == first(water_year));
    for water_year in 2001..2001 + YEARS {
        assert_eq!(is_left(water_year), found.iter().all(|out| out.water_year != water_year), "{water_year}");
    }
    found.iter().map(|out| (out.water_year, out.rule)).collect()
}

#[test]
fn good_winters_stay() {
    assert_eq!(rules(&weather(), pillow_mm), []);
}

/// A pillow that gains 1.35 times what others gain is in bounds, one of 1.45 is not, nor one of 1/1.45; twenty such days of
/// 4 mm are too few to tell.
#[test]
fn a_gauge_and_a_pillow_of_different_winters() {
    let gain = |factor: f64| rules(&weather(), |day| factor * pillow_mm(day));
    assert_eq!(gain(1.35), []);
    assert_eq!(gain(1.45), [(2004, Rule::GaugeAgainstPillow)]);
    assert_eq!(gain(1.0 / 1.45), [(2004, Rule::GaugeAgainstPillow)]);
    let mut warm = weather();
    let of_2004 = warm.years[3];
    for day in of_2004.start + 24..of_2004.start + COLD_DAYS {
        warm.mean_c[day] = -1.0;
    }
    assert_eq!(rules(&warm, |day| 1.45 * pillow_mm(day)), []);
}

/// From day 60 on 4 mm fall every other day: over 12 days the same reading means 24 mm, over 14 days 28 mm. What the pillow
/// missed comes at once, so that the year's gain is the gauge's.
#[test]
fn a_pillow_that_reads_the_same_while_it_snows() {
    let stuck = |until: usize| {
        rules(&weather(), move |day| pillow_mm(if (60..until).contains(&day) { 60 } else { day }))
    };
    assert_eq!(stuck(73), []);
    assert_eq!(stuck(75), [(2004, Rule::PillowStuck)]);
}

/// Twice six days of one reading, with days without a reading between them, are no twelve of one; nor are six of one and six of
/// another with a gap between.
#[test]
fn a_gap_ends_what_reads_the_same() {
    let weather = weather();
    let of_2004 = weather.years[3];
    let year = |observed: Vec<Option<f64>>| SiteYear {
        span: &weather.years[3],
        weather: weather.view(&of_2004),
        observed,
        is_daily: true,
        warmer_c: 0.0,
    };
    let reads = |gap: std::ops::Range<usize>| {
        let mut days: Vec<Option<f64>> = (0..40).map(|_| Some(200.0)).collect();
        days[gap].fill(None);
        days
    };
    // 4 mm fall every other day: 14 days bring 28 mm.
    assert!(year(reads(0..0)).stuck().is_some());
    assert!(year(reads(13..30)).stuck().is_none(), "12 days, a gap, 9 days");
    assert!(year(reads(13..14)).stuck().is_some(), "25 days after the gap");
}

/// Of days with -8 degC at the gauge, those 700 m below have -3.45, cold enough, and those 1000 m below -1.5, at which snow may melt.
#[test]
fn what_is_cold_at_the_gauge_may_thaw_at_the_pillow() {
    let weather = weather();
    let year = |warmer_c: f64| SiteYear {
        span: &weather.years[0],
        weather: weather.view(&weather.years[0]),
        observed: (0..365).map(|day| Some(pillow_mm(day))).collect(),
        is_daily: true,
        warmer_c,
    };
    assert!(year(4.55).ratio().is_some());
    assert!(year(6.5).ratio().is_none());
}

/// 45 mm in a day of which 4 mm fell, and 8 mm more two days before and after, are a jump; 35 mm are not.
#[test]
fn a_pillow_that_jumps() {
    let jump = |mm: f64| {
        rules(&weather(), move |day| pillow_mm(day) + if (101..COLD_DAYS).contains(&day) { mm } else { 0.0 })
    };
    assert_eq!(jump(31.0), []);
    assert_eq!(jump(41.0), [(2004, Rule::PillowJumps)]);
}

/// A range of 16 degC in one month, where others have 10, is no such place's; after the ninth month nobody asks.
#[test]
fn a_failing_sensor_shows_in_its_range() {
    let with_month = |month: u8, half_range_c: f64| {
        let mut weather = weather();
        let of_2004 = weather.years[3];
        for day in of_2004.start..of_2004.start + of_2004.days {
            if weather.month[day] == month {
                weather.half_range_c[day] = half_range_c;
            }
        }
        rules(&weather, pillow_mm)
    };
    assert_eq!(with_month(0, 8.0), [(2004, Rule::TemperatureRange)]);
    assert_eq!(with_month(0, 2.0), [(2004, Rule::TemperatureRange)]);
    assert_eq!(with_month(0, 7.0), []);
    assert_eq!(with_month(7, 8.0), [], "August");
}

/// A day 30 degC below others has a minimum and a maximum that are far off; two such days are a failing sensor's. Where the days of
/// every winter differ by as much, they are that place's.
#[test]
fn temperatures_that_the_place_does_not_have() {
    let with_cold_days = |weather: &Series, days: usize| {
        let mut weather = weather.clone();
        let of_2004 = weather.years[3];
        for day in (of_2004.start + 40..).take(days) {
            weather.mean_c[day] -= 30.0;
        }
        rules(&weather, pillow_mm)
    };
    assert_eq!(with_cold_days(&weather(), 1), []);
    assert_eq!(with_cold_days(&weather(), 2), [(2004, Rule::TemperatureFar)]);
    let mut means = weather();
    means.half_range_c.fill(0.0);
    assert_eq!(with_cold_days(&means, 2), [], "two means are gross errors of two days");
    assert_eq!(with_cold_days(&means, 3), [(2004, Rule::TemperatureFar)]);
    let mut continental = weather();
    for (day, mean_c) in continental.mean_c.iter_mut().enumerate() {
        *mean_c -= f64::from((day % 5) as u8) * 8.0;
    }
    assert_eq!(with_cold_days(&continental, 2), []);
}
