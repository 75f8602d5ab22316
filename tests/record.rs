//! The record: which water years are used, what becomes of gaps, and the catch of the gauge. Expected values are worked by
//! hand from the method's first two sections.

use crate::cli::basin::weather;
use thawline::calendar::{MonthDay, WaterYearStart};
use thawline::snow::{DegreeRule, GaugeMultiplier, SnowParams, StationPhase, correct_catch};
use thawline::table::{DateColumn, Format};
use thawline::units::{DepthUnit, TemperatureUnit};
use thawline::weather::{
    Columns, Gauge, Limits, PrecipitationColumn, Reading, Record, TemperatureColumn, TemperatureColumns, Why,
};

fn columns() -> Columns {
    let temperature =
        |column: &str| TemperatureColumn { column: column.to_owned(), unit: TemperatureUnit::Celsius };
    Columns {
        date: DateColumn { columns: vec!["date".to_owned()], format: "%Y-%m-%d".to_owned() },
        temperature: TemperatureColumns::Extremes {
            tmin: temperature("tmin_c"),
            tmax: temperature("tmax_c"),
        },
        precipitation: PrecipitationColumn {
            column: "precip_mm".to_owned(),
            unit: DepthUnit::Millimetre,
            gauge: Gauge::Daily,
            trace: Vec::new(),
        },
        humidity: None,
        format: Format::default(),
    }
}

fn read_with(text: &str, columns: &Columns) -> Record {
    let day = |month, day| MonthDay::new(month, day).unwrap();
    let start = WaterYearStart(day(10, 1));
    thawline::weather::read("weather.csv", text, columns, start, day(4, 1), &Limits::default()).unwrap()
}

fn read(text: &str) -> Record {
    read_with(text, &columns())
}

/// From which date, for how many days, and what becomes of each line.
type Change<'a> = (&'a str, i64, fn(&str) -> Option<String>);

/// Six water years, in which the lines of some dates are changed.
fn record_with(changes: &[Change<'_>]) -> Record {
    let mut text = String::new();
    for line in weather(6).lines() {
        let date = chrono::NaiveDate::parse_from_str(&line[..10.min(line.len())], "%Y-%m-%d").ok();
        let change = changes.iter().find(|(from, days, _)| {
            let from = chrono::NaiveDate::parse_from_str(from, "%Y-%m-%d").unwrap();
            date.is_some_and(|date| (0..*days).contains(&(date - from).num_days()))
        });
        match change.map_or(Some(line.to_owned()), |(_, _, change)| change(line)) {
            Some(line) => text += &format!("{line}\n"),
            None => continue,
        }
    }
    read(&text)
}

fn without_temperature(line: &str) -> Option<String> {
    let cells: Vec<&str> = line.split(',').collect();
    Some(format!("{},NA,NA,{}", cells[0], cells[3]))
}

fn without_precipitation(line: &str) -> Option<String> {
    Some(format!("{},", line.rsplit_once(',').unwrap().0))
}

fn warmer_by_forty(line: &str) -> Option<String> {
    let cells: Vec<&str> = line.split(',').collect();
    let warmed = |at: usize| cells[at].parse::<f64>().unwrap() + 40.0;
    Some(format!("{},{},{},{}", cells[0], warmed(1), warmed(2), cells[3]))
}

fn used(record: &Record) -> Vec<i32> {
    record.series.years.iter().map(|year| year.water_year).collect()
}

/// Five days without temperatures are a straight line between their neighbours; six cost the year.
#[test]
fn temperature_gaps() {
    let five = record_with(&[("2002-01-10", 5, without_temperature)]);
    assert_eq!(used(&five), [2001, 2002, 2003, 2004, 2005, 2006]);
    assert_eq!((five.counts.temperature_missing_days, five.counts.interpolated_days), (5, 5));
    let year = five.series.years[1];
    let mean = |day: usize| five.series.mean_c[year.start + day];
    let (before, after) = (mean(100), mean(106));
    for step in 1..=5 {
        let expected = before + (after - before) * step as f64 / 6.0;
        assert!((mean(100 + step) - expected).abs() < 1e-9, "10 January is day 102 of the water year");
    }
    let six = record_with(&[("2002-01-10", 6, without_temperature)]);
    assert_eq!(used(&six), [2001, 2003, 2004, 2005, 2006]);
    assert!(!six.series.years[1].follows, "the year after a gap starts bare");
    assert!(matches!(six.skipped[0].why[..], [Why::TemperatureGap { days: 6, .. }]));
}

/// Fifteen missing days are allowed, sixteen not, whether they lack precipitation, or have no line at all; missing
/// precipitation runs as none.
#[test]
fn missing_days() {
    let fifteen = record_with(&[("2003-05-01", 15, without_precipitation)]);
    assert_eq!(used(&fifteen).len(), 6);
    assert_eq!(fifteen.counts.dry_for_want_of_data_days, 15);
    let year = fifteen.series.years[2];
    assert!((212..227).all(|day| fifteen.series.precipitation_mm[year.start + day] == 0.0));
    let sixteen = record_with(&[("2003-05-01", 16, without_precipitation)]);
    assert_eq!(used(&sixteen), [2001, 2002, 2004, 2005, 2006]);
    assert_eq!(sixteen.skipped[0].why, [Why::MissingDays { days: 16 }]);
    let absent = record_with(&[("2003-05-01", 3, |_| None), ("2003-06-01", 13, without_precipitation)]);
    assert_eq!(absent.counts.absent_days, 3);
    assert_eq!(used(&absent), used(&sixteen), "3 absent and 13 without precipitation are 16 missing days");
}

/// A season whose mean is more than 6 degC from the record's median is left out, though every day looks sound: 40 degC
/// more on 30 of the 182 cool days are 6.6 degC, on 25 they are 5.5.
#[test]
fn season_means() {
    let sound = record_with(&[("2004-01-01", 25, warmer_by_forty)]);
    assert_eq!(used(&sound).len(), 6);
    let broken = record_with(&[("2004-01-01", 30, warmer_by_forty)]);
    assert_eq!(used(&broken), [2001, 2002, 2003, 2005, 2006]);
    assert!(matches!(broken.skipped[0].why[..], [Why::SeasonMean { season: "cool", .. }]));
}

/// A year at the record's edge that lacks a day is left out and said to begin or end there.
#[test]
fn the_edges_of_the_record() {
    let cut = record_with(&[("2000-10-01", 1, |_| None)]);
    assert_eq!(used(&cut), [2002, 2003, 2004, 2005, 2006]);
    assert_eq!(cut.skipped[0].why, [Why::BeyondRecord { days: 1 }]);
}

/// `P * (f*k_snow + (1 - f)*k_rain)`: at 1 degC half of the linear rule's snow, so 10 mm with 1.2 and 1.0 are 11 mm; below
/// -1 degC all snow, 12 mm; above 3 degC all rain, 10 mm.
#[test]
fn gauge_catch() {
    let mut record = read(&weather(1));
    record.series.precipitation_mm.truncate(3);
    record.series.precipitation_mm.fill(10.0);
    record.series.mean_c[..3].copy_from_slice(&[1.0, -4.0, 8.0]);
    let snow = SnowParams::defaults(DegreeRule::Diurnal, false);
    let phase = StationPhase::of(&snow, 1500.0);
    correct_catch(&mut record.series, GaugeMultiplier { rain: 1.0, snow: 1.2 }, phase);
    for (found, expected) in record.series.precipitation_mm.iter().zip([11.0, 12.0, 10.0]) {
        assert!((found - expected).abs() < 1e-12, "{found} for {expected}");
    }
    // By hand, from 11, 12 and 10 mm: 11*(0.5*1.2 + 0.5*1.1), 12*1.2 and 10*1.1.
    correct_catch(&mut record.series, GaugeMultiplier { rain: 1.1, snow: 1.2 }, phase);
    for (found, expected) in record.series.precipitation_mm.iter().zip([12.65, 14.4, 11.0]) {
        assert!((found - expected).abs() < 1e-12, "{found} for {expected}");
    }
}

/// An accumulating gauge whose readings hold a mark that nobody declared, one absurd reading, and a month in which it was
/// emptied early. Worked by hand: 1 mm a day on a start-of-day gauge that is set back on 1 October.
#[test]
fn what_is_no_reading_of_a_gauge_makes_no_precipitation() {
    let gauge = |odd: fn(&str, f64) -> f64| {
        let first = chrono::NaiveDate::from_ymd_opt(2000, 10, 1).unwrap();
        let mut text = String::from("date,tmin_c,tmax_c,precip_mm\n");
        for date in first.iter_days().take(3 * 365 + 1) {
            let began = WaterYearStart(MonthDay::new(10, 1).unwrap());
            let day = (date - began.first_day(began.water_year_of(date))).num_days();
            let low = -((day % 7) as f64);
            text += &format!("{date},{low},{},{}\n", low + 9.0, odd(&date.to_string(), day as f64));
        }
        let mut columns = columns();
        columns.precipitation.gauge =
            Gauge::Accumulating { reading: Reading::StartOfDay, reset_tolerance_mm: 50.0 };
        read_with(&text, &columns)
    };
    // The day of a reset is missing, so each year but the last has 364 days of 1 mm; the last reading belongs to no day.
    let sum = |record: &Record| record.series.precipitation_mm.iter().sum::<f64>();
    let sound = gauge(|_, reading| reading);
    assert_eq!((sound.series.years.len(), sum(&sound)), (3, 364.0 * 3.0));
    let negative = gauge(|date, reading| if date == "2001-03-01" { -999.0 } else { reading });
    assert_eq!((sum(&negative), negative.counts.impossible_cells), (364.0 * 3.0 - 2.0, 1));
    let absurd = gauge(|date, reading| if date == "2001-03-01" { 29_000.0 } else { reading });
    assert!(sum(&absurd) < 364.0 * 3.0, "{}", sum(&absurd));
    let says = |record: &Record, what: &str| record.suspicions.iter().any(|it| it.what.contains(what));
    assert!(says(&absurd, "amounts above 2000 mm"));
    let dropped = gauge(|date, reading| if date == "2001-03-01" { 0.0 } else { reading });
    assert!(says(&dropped, "made up within 3 days") && !says(&sound, "made up within 3 days"));
    let emptied = gauge(|_, reading| reading % 30.0);
    assert!(says(&emptied, "to nearly nothing") && !says(&sound, "to nearly nothing"));
}
