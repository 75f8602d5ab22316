//! The invented station's file, as an agency would hand it out: remarks, a header, a line a day, and holes.

use super::place::{Gap, Hole, Place};
use super::weather::{Day, draw};
use chrono::NaiveDate;
use std::fmt::Write;

/// First day of the record.
const FIRST: (i32, u32, u32) = (1984, 10, 1);
/// The day after its last: forty water years.
const END: (i32, u32, u32) = (2024, 10, 1);

/// The daily weather of a place's station as a text table. A cell that was not measured is empty.
pub fn table(place: &Place) -> String {
    let mut text = format!(
        "# {station} station, {elevation} m, in the basin of {basin}: INVENTED for a demo by a random weather generator\n\
         # no such station exists and nothing here was measured; do not use these numbers for anything real\n\
         # daily minimum and maximum in degC, daily precipitation as caught by the gauge in mm, empty: not measured\n\
         date,tmin_c,tmax_c,precip_mm\n",
        station = place.station,
        elevation = place.station_m,
        basin = place.basin,
    );
    for day in draw(&place.climate, date(FIRST), date(END)) {
        write_day(&mut text, &day, place.gaps);
    }
    text
}

fn write_day(text: &mut String, day: &Day, gaps: &[Gap]) {
    let is_lost = |holes: &[Hole]| {
        gaps.iter().any(|gap| {
            let age = (day.date - date(gap.from)).num_days();
            holes.contains(&gap.hole) && (0..gap.days).contains(&age)
        })
    };
    let tmin = cell(day.tmin_c, is_lost(&[Hole::Minimum, Hole::Temperatures, Hole::All]));
    let tmax = cell(day.tmax_c, is_lost(&[Hole::Maximum, Hole::Temperatures, Hole::All]));
    let precipitation = cell(day.precipitation_mm, is_lost(&[Hole::Precipitation, Hole::All]));
    let _ = writeln!(text, "{},{tmin},{tmax},{precipitation}", day.date);
}

/// One decimal, never `-0.0`.
fn cell(value: f64, is_lost: bool) -> String {
    if is_lost { String::new() } else { format!("{:.1}", (value * 10.0).round() / 10.0 + 0.0) }
}

/// The dates of the demo all exist; one that does not would show as the calendar's first day.
fn date((year, month, day): (i32, u32, u32)) -> NaiveDate {
    NaiveDate::from_ymd_opt(year, month, day).unwrap_or(NaiveDate::MIN)
}
