//! Years worked by hand.

use super::*;
use chrono::Days;

const FIRST: (i32, u32, u32) = (2000, 10, 1);

fn first() -> NaiveDate {
    NaiveDate::from_ymd_opt(FIRST.0, FIRST.1, FIRST.2).unwrap()
}

/// A year of 365 days: SWE grows by `gain` a day from day 62 (1 December) to day 182, falls by 10 mm a day from there, and
/// is 0 before and after. With a gain of 2 the peak is 240 mm on day 181 + 1, and S < 1 mm 24 days later.
fn triangle(gain: f64) -> Vec<f64> {
    let swe_mm = |day: i32| match day {
        62..=182 => gain * f64::from(day - 62),
        183.. => (gain * 120.0 - 10.0 * f64::from(day - 182)).max(0.0),
        _ => 0.0,
    };
    (1..=365).map(swe_mm).collect()
}

fn compared(observed: &[Option<f64>], modelled: &[f64], kind: Kind) -> ComparedYear {
    let days = observed.iter().zip(modelled);
    let days = days
        .map(|(observed_mm, modelled_mm)| DayPair { observed_mm: *observed_mm, modelled_mm: *modelled_mm });
    let april = MonthDay::new(4, 1).unwrap();
    ComparedYear::of(2001, first(), days.collect(), kind, &[april])
}

fn whole(series: &[f64]) -> Vec<Option<f64>> {
    series.iter().copied().map(Some).collect()
}

/// By hand: 1 April is day 183, the first of the fall; from 240 mm it is gone after 24 days, from 180 mm after 18.
#[test]
fn a_pillow_year() {
    let year = compared(&whole(&triangle(2.0)), &triangle(1.5), Kind::Pillow);
    assert!(year.is_whole);
    assert_eq!((year.observed_peak_mm, year.modelled_peak_mm), (Some(240.0), Some(180.0)));
    assert_eq!(year.observed_peak_day, Outcome::Value(182.0));
    assert_eq!(year.observed_melt_out_day, Outcome::Value(206.0));
    assert_eq!(year.modelled_melt_out_day, Outcome::Value(200.0));
    let survey = year.surveys[0].unwrap();
    assert_eq!((survey.observed_mm, survey.modelled_mm), (230.0, 170.0));
    assert_eq!(survey.date, NaiveDate::from_ymd_opt(2001, 4, 1).unwrap());
}

/// Fifteen days without a reading between 1 December and melt-out are let pass, sixteen are not; before and after that
/// time any number is.
#[test]
fn years_with_holes() {
    let is_whole = |from: usize, days: usize| {
        let mut observed = whole(&triangle(2.0));
        observed[from - 1..from - 1 + days].fill(None);
        compared(&observed, &triangle(2.0), Kind::Pillow).is_whole
    };
    assert!(is_whole(100, 15) && !is_whole(100, 16));
    assert!(is_whole(1, 61 + 15) && !is_whole(1, 61 + 16));
    assert!(is_whole(207, 159));
    let mut early: Vec<Option<f64>> = vec![None; 365];
    early[..80].fill(Some(0.0));
    early[20..60].fill(Some(15.0));
    let early = compared(&early, &triangle(2.0), Kind::Pillow);
    assert!(!early.is_whole && early.modelled_peak_mm.is_none(), "a pillow that fails after an early thaw");
    let mut broken = whole(&triangle(2.0));
    broken[180..].fill(None);
    let broken = compared(&broken, &triangle(2.0), Kind::Pillow);
    assert_eq!((broken.observed_peak_mm, broken.modelled_peak_mm), (None, None), "broken before it melts");
    assert_eq!(broken.modelled_melt_out_day, Outcome::None);
}

/// Melt-out is none where the day before it has no reading, and 'not gone' where snow stays.
#[test]
fn melt_out_is_sharp_or_none() {
    let mut hole = whole(&triangle(2.0));
    hole[204] = None;
    let year = compared(&hole, &triangle(2.0), Kind::Pillow);
    assert!(year.is_whole);
    assert_eq!(year.observed_melt_out_day, Outcome::None);
    let stays: Vec<f64> = (1..=365).map(|day| 100.0 + f64::from(day)).collect();
    let year = compared(&whole(&stays), &triangle(2.0), Kind::Pillow);
    assert_eq!(year.observed_melt_out_day, Outcome::NotGone);
    let thin: Vec<f64> = triangle(2.0).iter().map(|swe_mm| swe_mm / 24.1).collect();
    let year = compared(&whole(&thin), &triangle(2.0), Kind::Pillow);
    assert_eq!((year.observed_peak_day, year.observed_melt_out_day), (Outcome::None, Outcome::None));
    assert!(year.observed_peak_mm.is_some(), "a peak below 10 mm has its height, but no day");
}

/// A course is held against the model on its own day, within five days of the survey date; the nearest counts, the
/// earlier of two.
#[test]
fn a_course_year() {
    let surveyed = |ages: &[u64]| {
        let mut observed = vec![None; 365];
        for age in ages {
            observed[*age as usize] = Some(200.0 + *age as f64);
        }
        compared(&observed, &triangle(2.0), Kind::Course)
    };
    let date = |age: u64| first() + Days::new(age);
    let survey = |ages: &[u64]| surveyed(ages).surveys[0].map(|survey| (survey.date, survey.modelled_mm));
    // Day 183 has age 182; on age 180 (day 181) the model has 2 * 119 = 238 mm.
    assert_eq!(survey(&[90, 180]), Some((date(180), 238.0)));
    assert_eq!(survey(&[180, 184]), Some((date(180), 238.0)), "equally near");
    assert_eq!(survey(&[177]), Some((date(177), 232.0)));
    assert_eq!(survey(&[176]), None);
    assert_eq!(survey(&[188]), None);
    let year = surveyed(&[90, 180]);
    assert_eq!((year.observed_peak_mm, year.observed_melt_out_day), (None, Outcome::None));
    assert!(!year.is_whole);
    let pillow = compared(
        &surveyed(&[180]).days.iter().map(|d| d.observed_mm).collect::<Vec<_>>(),
        &triangle(2.0),
        Kind::Pillow,
    );
    assert_eq!(pillow.surveys[0], None, "a pillow has its reading on the day or none");
}
