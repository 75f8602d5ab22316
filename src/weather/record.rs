//! The station's record: read, made daily, filled and screened.

use super::columns::{Columns, Gauge, TemperatureColumns};
use super::days::read_days;
use super::declared::Declared;
use super::gaps;
use super::gauge::{GaugeCount, daily_amounts};
use super::humidity::{HumidityCount, filled, sift_humidity};
use super::series::Series;
use super::sift::{sift, sift_amounts};
use super::suspicious::Suspicion;
use super::years::{Limits, Screening, SkippedYear, Why};
use crate::calendar::{MonthDay, WaterYearStart, date_of};
use crate::fault::{Fault, Place};
use crate::units::UnitSystem;
use chrono::NaiveDate;
use serde::Serialize;

/// What was counted while the record was read.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Counts {
    /// First and last day of the file.
    pub first: NaiveDate,
    /// Last day.
    pub last: NaiveDate,
    /// Days from the first to the last.
    pub days: usize,
    /// Dates in between without a line.
    pub absent_days: usize,
    /// Cells beyond what any station has measured; they are taken as missing.
    pub impossible_cells: usize,
    /// Temperatures too far from the median of their time of year; taken as missing where that was asked for.
    pub far_temperature_cells: usize,
    /// Temperatures that did not change for too long; taken as missing where that was asked for.
    pub stuck_temperature_cells: usize,
    /// Days without a full pair of temperatures.
    pub temperature_missing_days: usize,
    /// Days on which the minimum stood above the maximum; both are taken as missing.
    pub crossed_temperature_days: usize,
    /// Days of the years in use whose temperatures are interpolated.
    pub interpolated_days: usize,
    /// Days without precipitation.
    pub precipitation_missing_days: usize,
    /// Days of the years in use that run with no precipitation because it is missing.
    pub dry_for_want_of_data_days: usize,
    /// What the accumulating gauge did, if it is one.
    pub gauge: Option<GaugeCount>,
    /// What became of the humidity, if there is one.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub humidity: Option<HumidityCount>,
}

/// A station's record: usable water years, those left out, and what was counted on the way.
#[derive(Debug, Clone)]
pub struct Record {
    /// The usable water years as measured, before any gauge catch; a year after a gap starts bare.
    pub series: Series,
    /// Water years left out.
    pub skipped: Vec<SkippedYear>,
    /// Counts.
    pub counts: Counts,
    /// Values that are hardly weather.
    pub suspicions: Vec<Suspicion>,
    /// Whether the record has daily minima and maxima.
    pub has_daily_range: bool,
    /// The columns as they were declared.
    pub(super) declared: Declared,
}

/// Reads a station's file and makes whole water years of it.
///
/// `survey` ends the cool season, for the screening of season means. `file` names the file in faults.
///
/// # Errors
/// Every fault of the file (see the columns), and a record in which no water year can be used.
pub fn read(
    file: &str,
    text: &str,
    columns: &Columns,
    start: WaterYearStart,
    survey: MonthDay,
    limits: &Limits,
) -> Result<Record, Vec<Fault>> {
    let mut days = read_days(file, text, columns)?;
    let declared = Declared::of(&days, columns);
    let sifted = sift(&mut days, columns, limits);
    let (mut amounts, gauge) = match columns.precipitation.gauge {
        Gauge::Daily => (days.gauge_mm.clone(), None),
        Gauge::Accumulating { reading, reset_tolerance_mm } => {
            let is_first_day = |day: usize| {
                let date = date_of(days.first, day + 1);
                start.first_day(start.water_year_of(date)) == date
            };
            let (amounts, count) = daily_amounts(&days.gauge_mm, reading, reset_tolerance_mm, is_first_day);
            (amounts, Some(count))
        }
    };
    let mut suspicions = sifted.suspicions;
    let (impossible_amounts, of_amounts) = sift_amounts(&days, &mut amounts, columns);
    suspicions.extend(of_amounts);
    let humidity = sift_humidity(&days, columns);
    suspicions.extend(humidity.iter().flat_map(|humidity| humidity.suspicions.iter().cloned()));
    let no_temperature: Vec<bool> =
        days.tmin_c.iter().zip(&days.tmax_c).map(|(tmin, tmax)| tmin.is_none() || tmax.is_none()).collect();
    let is_missing: Vec<bool> =
        no_temperature.iter().zip(&amounts).map(|(missing, amount)| *missing || amount.is_none()).collect();
    let (tmin_c, tmax_c, open_gaps) = gaps::fill(&days.tmin_c, &days.tmax_c, limits.temperature_gap_days);
    let mean_c: Vec<f64> = tmin_c.iter().zip(&tmax_c).map(|(tmin, tmax)| (tmin + tmax) / 2.0).collect();

    let screening = Screening {
        first: days.first,
        mean_c: &mean_c,
        is_missing: &is_missing,
        open_gaps: &open_gaps,
        start,
        survey,
        limits,
    };
    let (usable, skipped) = screening.sort_years();
    if usable.is_empty() {
        let is_swapped = 2 * sifted.crossed_days > days.line.len();
        let mend = if is_swapped { SWAPPED.to_owned() } else { mend_of_unusable(&skipped, &declared) };
        return Err(vec![nothing_usable(file, &skipped, mend)]);
    }

    let mut series = Series::default();
    let mut counts = Counts {
        first: days.first,
        last: date_of(days.first, mean_c.len()),
        days: mean_c.len(),
        absent_days: days.line.iter().filter(|line| **line == 0).count(),
        impossible_cells: sifted.impossible_cells
            + impossible_amounts
            + humidity.as_ref().map_or(0, |humidity| humidity.impossible_cells),
        far_temperature_cells: sifted.far_cells,
        stuck_temperature_cells: sifted.stuck_cells,
        temperature_missing_days: no_temperature.iter().filter(|missing| **missing).count(),
        crossed_temperature_days: sifted.crossed_days,
        interpolated_days: 0,
        precipitation_missing_days: amounts.iter().filter(|amount| amount.is_none()).count(),
        dry_for_want_of_data_days: 0,
        gauge,
        humidity: None,
    };
    let mut last_year = None;
    for year in &usable {
        let range = year.first_index..year.first_index + year.days;
        counts.interpolated_days += no_temperature[range.clone()].iter().filter(|missing| **missing).count();
        counts.dry_for_want_of_data_days +=
            amounts[range.clone()].iter().filter(|amount| amount.is_none()).count();
        let weather = range.map(|day| (tmin_c[day], tmax_c[day], amounts[day].unwrap_or(0.0)));
        let follows = last_year == Some(year.water_year - 1);
        series.push_days(year.water_year, start.first_day(year.water_year), follows, weather);
        last_year = Some(year.water_year);
    }
    if let Some(humidity) = humidity {
        let in_use = usable.iter().flat_map(|year| &humidity.pct[year.first_index..][..year.days]);
        let measured: Vec<Option<f64>> = in_use.copied().collect();
        let mut count = HumidityCount {
            missing_days: humidity.pct.iter().filter(|pct| pct.is_none()).count(),
            lowered_to_100_days: humidity.lowered_to_100_days,
            ..HumidityCount::default()
        };
        series.relative_humidity_pct = filled(&measured, &series, &mut count)
            .map_err(|days| vec![too_little_humidity(file, days, count.wet_days)])?;
        counts.humidity = Some(count);
    }
    let has_daily_range = matches!(columns.temperature, TemperatureColumns::Extremes { .. });
    Ok(Record { series, skipped, counts, suspicions, has_daily_range, declared })
}

fn too_little_humidity(file: &str, measured_wet_days: usize, wet_days: usize) -> Fault {
    Fault {
        place: Place::File(file.to_owned()),
        found: format!("humidity on {measured_wet_days} of the {wet_days} days with precipitation that are in use"),
        expected: "humidity on at least half of them: too little humidity to tell rain from snow by".to_owned(),
        mend: "check its column, its unit and the marks for 'not measured', or take relative_humidity or dew_point out of \
               [weather]"
            .to_owned(),
    }
}

fn nothing_usable(file: &str, skipped: &[SkippedYear], mend: String) -> Fault {
    let mut found = String::from("no water year that can be used");
    for year in skipped.iter().take(5) {
        let why: Vec<String> = year.why.iter().map(|why| why.words(UnitSystem::Metric)).collect();
        found += &format!("; {}: {}", year.water_year, why.join(", "));
    }
    if skipped.len() > 5 {
        found += &format!("; and {} more", skipped.len() - 5);
    }
    Fault {
        place: Place::File(file.to_owned()),
        found,
        expected: "at least one whole water year of temperature and precipitation".to_owned(),
        mend,
    }
}

/// What to do where every day's minimum lies above its maximum.
const SWAPPED: &str =
    "the minimum lies above the maximum on most days: exchange the columns of tmin and tmax in [weather]";

/// What to do about a record in which no year can be used: about a likely slip of a unit, about its length, or in general.
fn mend_of_unusable(skipped: &[SkippedYear], declared: &Declared) -> String {
    let slips = declared.unlikely();
    let is_short =
        skipped.iter().flat_map(|year| &year.why).all(|why| matches!(why, Why::BeyondRecord { .. }));
    if let [_, ..] = slips.as_slice() {
        let slips: Vec<String> =
            slips.iter().map(|slip| format!("check {}: {}", slip.about, slip.why)).collect();
        slips.join("; ")
    } else if is_short {
        "bring a longer record, or set water_year_starts in [season] to the month and day it can start on"
            .to_owned()
    } else {
        "check units, missing marks and 'water_year_starts'; the limits temperature_gap_days and \
         missing_days_allowed stand in [weather]"
            .to_owned()
    }
}
