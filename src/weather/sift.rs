//! What cannot be weather is taken as missing; what hardly can is said. Limits without a source are common practice.

use super::columns::{Columns, Gauge};
use super::days::RawDays;
use super::suspicious::{Finder, Suspicion, said};
use super::time_of_year::medians_by_time_of_year;
use super::years::Limits;
use crate::calendar::date_of;
use chrono::Datelike;
use std::ops::RangeInclusive;

/// No station has measured beyond these (records: -89.2 and 56.7 degC, World Meteorological Organization), degC.
const POSSIBLE_C: RangeInclusive<f64> = -90.0..=60.0;
/// Nor more in a day (record: 1825 mm, World Meteorological Organization), mm.
const MOST_IN_A_DAY_MM: f64 = 2000.0;
/// Nor more in a year (record: 26 470 mm in twelve months), mm.
const MOST_IN_A_GAUGE_MM: f64 = 30_000.0;
/// An empty gauge may sway so far below 0, mm.
const LEAST_SWAY_MM: f64 = 10.0;
/// Readings that fall away and are back within so many days were not set back.
const DROP_OUT_DAYS: usize = 3;
/// A gauge that falls to less than this from more than five times as much was emptied, mm.
const NEARLY_EMPTY_MM: f64 = 2.0;
/// Hardly a mountain station has been colder or hotter, degC.
const USUAL_C: RangeInclusive<f64> = -55.0..=45.0;
/// Hardly a mountain station has caught more in a day, mm.
const MUCH_IN_A_DAY_MM: f64 = 500.0;
/// Hardly a day has a wider range, degC.
const WIDE_RANGE_C: f64 = 40.0;
/// A value farther from the median of its time of year is most likely a failing sensor's, degC.
const FAR_FROM_MEDIAN_C: f64 = 25.0;
/// So many equal temperatures on end are most likely a stuck sensor's, days.
const STUCK_DAYS: usize = 10;

/// What became of the cells.
pub(super) struct Sifted {
    /// Cells beyond what any station has measured.
    pub impossible_cells: usize,
    /// Days with a minimum above the maximum.
    pub crossed_days: usize,
    /// Cells farther from the median of their time of year than the limits allow.
    pub far_cells: usize,
    /// Cells in runs of equal temperatures that the limits do not allow.
    pub stuck_cells: usize,
    pub suspicions: Vec<Suspicion>,
}

/// Takes as missing: values beyond any station's record; both temperatures of a day whose minimum lies above its maximum;
/// where the limits ask for it, temperatures far from the median of their time of year and those that stay the same for too
/// long. The rest stays and is said.
pub(super) fn sift(days: &mut RawDays, columns: &Columns, limits: &Limits) -> Sifted {
    let mut finder = Finder { first_day: days.first, line: days.line.clone(), found: Vec::new() };
    let keys: &[&str] = match columns.temperature.named().len() {
        1 => &["weather.tmean"],
        _ => &["weather.tmin", "weather.tmax"],
    };
    let mut impossible_cells = 0;
    for (key, column) in keys.iter().zip([&mut days.tmin_c, &mut days.tmax_c]) {
        let what = "values beyond -90 to 60 degC, which no station has measured";
        impossible_cells += finder.drop(key, what, column, "degC", |_, value| !POSSIBLE_C.contains(&value));
    }
    let (most_mm, what) = match columns.precipitation.gauge {
        Gauge::Daily => (MOST_IN_A_DAY_MM, "amounts above 2000 mm in a day, which no station has measured"),
        Gauge::Accumulating { .. } => {
            (MOST_IN_A_GAUGE_MM, "readings above 30 000 mm, which no gauge has gathered")
        }
    };
    impossible_cells +=
        finder.drop("weather.precipitation", what, &mut days.gauge_mm, "mm", |_, value| value > most_mm);
    if let Gauge::Accumulating { .. } = columns.precipitation.gauge {
        let what = "readings below 0, which no gauge has";
        let lowest = |_, value: f64| value < -LEAST_SWAY_MM;
        impossible_cells += finder.drop("weather.precipitation", what, &mut days.gauge_mm, "mm", lowest);
    }
    let crossed_days = if keys.len() == 2 { uncross(&mut finder, days) } else { 0 };
    let (mut far_cells, mut stuck_cells) = (0, 0);
    for (key, column) in keys.iter().zip([&mut days.tmin_c, &mut days.tmax_c]) {
        stuck_cells += stuck(&mut finder, key, column, limits.stuck_temperature_days);
        far_cells += far_from_median(&mut finder, key, column, limits.temperature_departure_c);
        unusual(&mut finder, key, column);
    }
    if let [_, tmax] = keys {
        let range = |day: usize| days.tmax_c[day].zip(days.tmin_c[day]).map(|(high, low)| high - low);
        finder.note(tmax, format!("daily ranges above {WIDE_RANGE_C} degC"), "", |day| {
            range(day).filter(|range| *range > WIDE_RANGE_C).map(|range| said(range, "degC"))
        });
    } else {
        days.tmax_c.clone_from(&days.tmin_c);
    }
    no_leap_days(&mut finder, days);
    Sifted { impossible_cells, crossed_days, far_cells, stuck_cells, suspicions: finder.found }
}

/// Daily amounts that cannot be are taken as missing, those that hardly can are said; so is a gauge whose resets are not what
/// they seem. Gives the number of amounts taken as missing, too.
pub(super) fn sift_amounts(
    days: &RawDays,
    amounts: &mut [Option<f64>],
    columns: &Columns,
) -> (usize, Vec<Suspicion>) {
    const KEY: &str = "weather.precipitation";
    let mut finder = Finder { first_day: days.first, line: days.line.clone(), found: Vec::new() };
    let what = "amounts above 2000 mm in a day, which no station has measured";
    let impossible = finder.drop(KEY, what, amounts, "mm", |_, value| value > MOST_IN_A_DAY_MM);
    if let Gauge::Accumulating { reset_tolerance_mm, .. } = columns.precipitation.gauge {
        resets(&mut finder, &days.gauge_mm, reset_tolerance_mm);
    }
    finder.note(KEY, format!("amounts above {MUCH_IN_A_DAY_MM} mm in a day"), "", |day| {
        amounts[day].filter(|amount| *amount > MUCH_IN_A_DAY_MM).map(|amount| said(amount, "mm"))
    });
    if amounts.iter().flatten().all(|amount| *amount == 0.0) && amounts.iter().any(Option::is_some) {
        let mend = "Is it the right column?";
        finder.note(KEY, "days with an amount, all of them 0", mend, |day| {
            amounts[day].map(|amount| said(amount, "mm"))
        });
    }
    (impossible, finder.found)
}

/// Falls of an accumulating gauge that were taken for a reset and hardly are one, and those that hardly are noise.
fn resets(finder: &mut Finder, gauge_mm: &[Option<f64>], reset_tolerance_mm: f64) {
    let fall = |day: usize| {
        let before = gauge_mm[..day].last().copied().flatten()?;
        let now = gauge_mm[day]?;
        (now < before).then_some((before, now))
    };
    let said_fall = |(before, now): (f64, f64)| format!("from {} to {}", said(before, "mm"), said(now, "mm"));
    let mend = "Drop-outs? Then their days hold water that never fell: mark those readings as missing";
    finder.note(
        "weather.precipitation",
        "falls of the gauge that are made up within 3 days, taken for resets",
        mend,
        |day| {
            let (before, now) = fall(day).filter(|(before, now)| before - now > reset_tolerance_mm)?;
            let next = gauge_mm[day + 1..].iter().take(DROP_OUT_DAYS).flatten();
            (next.into_iter().any(|later| *later >= before)).then(|| said_fall((before, now)))
        },
    );
    let mend = format!(
        "Was it emptied? They are less than reset_tolerance_mm = {reset_tolerance_mm}, so taken for noise; state a smaller one"
    );
    finder.note("weather.precipitation", "falls of the gauge to nearly nothing", mend, |day| {
        let (before, now) = fall(day).filter(|(before, now)| before - now <= reset_tolerance_mm)?;
        (now < NEARLY_EMPTY_MM && before > 5.0 * NEARLY_EMPTY_MM).then(|| said_fall((before, now)))
    });
}

/// A minimum above the maximum cannot be: takes both as missing and counts the days.
fn uncross(finder: &mut Finder, days: &mut RawDays) -> usize {
    let RawDays { tmin_c, tmax_c, .. } = days;
    let crossed: Vec<Option<(f64, f64)>> = tmin_c
        .iter()
        .zip(tmax_c.iter())
        .map(|(low, high)| low.zip(*high).filter(|(low, high)| low > high))
        .collect();
    let known = finder.found.len();
    finder.note("weather.tmin", "days with a minimum above the maximum, both", "", |day| {
        crossed[day].map(|(low, high)| format!("{} above {}", said(low, "degC"), said(high, "degC")))
    });
    for (day, crossed) in crossed.iter().enumerate() {
        if crossed.is_some() {
            (tmin_c[day], tmax_c[day]) = (None, None);
        }
    }
    finder.found.get_mut(known).map_or(0, |new| {
        new.is_taken_as_missing = true;
        new.count
    })
}

/// Temperatures far from the median of their time of year: taken as missing beyond a stated limit, else said.
fn far_from_median(
    finder: &mut Finder,
    key: &'static str,
    column: &mut [Option<f64>],
    limit_c: Option<f64>,
) -> usize {
    let Some(medians) = medians_by_time_of_year(finder.first_day, column) else { return 0 };
    let first = finder.first_day;
    let departure = |day: usize, value: f64| {
        let time_of_year = date_of(first, day + 1).ordinal0() as usize;
        (value - medians[time_of_year]).abs()
    };
    let what =
        |limit_c: f64| format!("values more than {limit_c} degC from the median of their time of year");
    if let Some(limit_c) = limit_c {
        let is_far = |day: usize, value: f64| departure(day, value) > limit_c;
        let dropped = finder.drop(key, what(limit_c), column, "degC", is_far);
        return Suspicion::as_asked(finder, dropped);
    }
    let mend = format!(
        "A failing sensor? temperature_departure_c = {FAR_FROM_MEDIAN_C} in [weather] takes them as missing"
    );
    finder.note(key, what(FAR_FROM_MEDIAN_C), mend, |day| {
        column[day]
            .filter(|value| departure(day, *value) > FAR_FROM_MEDIAN_C)
            .map(|value| said(value, "degC"))
    });
    0
}

/// Extremes.
fn unusual(finder: &mut Finder, key: &'static str, column: &[Option<f64>]) {
    let (low, high) = (USUAL_C.start(), USUAL_C.end());
    finder.note(key, format!("values beyond {low} to {high} degC"), "", |day| {
        column[day].filter(|value| !USUAL_C.contains(value)).map(|value| said(value, "degC"))
    });
}

/// A column that never changes, or runs of equal temperatures: taken as missing from a stated length on, else said.
fn stuck(
    finder: &mut Finder,
    key: &'static str,
    column: &mut [Option<f64>],
    limit_days: Option<usize>,
) -> usize {
    let what = |days: usize| format!("values in runs of {days} or more days on which it did not change");
    if let Some(days) = limit_days {
        let stuck = in_long_runs(column, days);
        let dropped = finder.drop(key, what(days), column, "degC", |day, _| stuck[day]);
        return Suspicion::as_asked(finder, dropped);
    }
    let mut measured = column.iter().flatten();
    let first = measured.next();
    let note = |finder: &mut Finder, what: String, mend: String, is: &dyn Fn(usize) -> bool| {
        finder.note(key, what, mend, |day| column[day].filter(|_| is(day)).map(|value| said(value, "degC")));
    };
    if first.is_some() && column.len() > STUCK_DAYS && measured.all(|value| Some(value) == first) {
        note(
            finder,
            "values, all of them the same".to_owned(),
            "Is it the right column?".to_owned(),
            &|_| true,
        );
        return 0;
    }
    let stuck = in_long_runs(column, STUCK_DAYS);
    let mend =
        format!("A stuck sensor? stuck_temperature_days = {STUCK_DAYS} in [weather] takes them as missing");
    note(finder, what(STUCK_DAYS), mend, &|day| stuck[day]);
    0
}

/// Whether each day lies in a run of so many equal values or more.
fn in_long_runs(column: &[Option<f64>], days: usize) -> Vec<bool> {
    let mut stuck = Vec::with_capacity(column.len());
    for run in column.chunk_by(|a, b| a.is_some() && a == b) {
        stuck.resize(stuck.len() + run.len(), run.len() >= days && run[0].is_some());
    }
    stuck
}

/// A record of years of 365 days lacks every 29 February; said, since each costs a missing day.
fn no_leap_days(finder: &mut Finder, days: &RawDays) {
    let leap_days: Vec<bool> = days
        .first
        .iter_days()
        .take(days.line.len())
        .map(|date| date.month() == 2 && date.day() == 29)
        .collect();
    let has_line = leap_days.iter().zip(&days.line).any(|(is_leap_day, line)| *is_leap_day && *line > 0);
    if !has_line {
        let mend =
            "Years of 365 days? Temperatures are interpolated there, and precipitation counts as missing";
        finder.note("weather.date", "times 29 February, which has no line in any leap year", mend, |day| {
            leap_days[day].then(String::new)
        });
    }
}
