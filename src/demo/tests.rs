//! The kept files are what the program writes, and they read as the records they pretend to be.

use super::place::{Hole, Place};
use super::weather::draw;
use super::{alder_fork, bands, files, frostbell_creek, station, tamsin_river};
use crate::basin::{BandColumns, read_bands};
use crate::calendar::{MonthDay, WaterYearStart};
use crate::table::{DateColumn, Format};
use crate::units::{DepthUnit, TemperatureUnit};
use crate::weather::{
    Columns, Gauge, Limits, PrecipitationColumn, Reading, Record, TemperatureColumn, TemperatureColumns, read,
};

#[test]
fn kept_files_are_what_the_program_writes() {
    let root = std::path::Path::new(env!("CARGO_MANIFEST_DIR"));
    for (path, content) in files().unwrap() {
        let kept = std::fs::read(root.join(path)).unwrap_or_default();
        assert!(
            kept == content.as_bytes(),
            "{path} differs from what the demo writes; run `thawline start` and look at what changed"
        );
    }
}

#[test]
fn each_record_has_forty_years_of_which_one_is_left_out() {
    let places = [(&alder_fork::PLACE, 1998), (&frostbell_creek::PLACE, 2011), (&tamsin_river::PLACE, 2007)];
    for (place, left_out) in places {
        let record = read_station(place);
        let skipped: Vec<i32> = record.skipped.iter().map(|year| year.water_year).collect();
        assert_eq!((record.series.years.len(), skipped), (39, vec![left_out]));
        let last = record.series.years.last().map(|year| year.water_year);
        assert_eq!((record.series.years[0].water_year, last), (1985, Some(2024)));
        assert_eq!(record.counts.crossed_temperature_days, 0);
        assert!(record.series.half_range_c.iter().all(|half_range| *half_range > 0.0));
        assert!(record.counts.interpolated_days > 0 && record.counts.dry_for_want_of_data_days > 0);
    }
}

/// Broad bounds of a mountain station: enough to catch a slip in the generator, no more.
#[test]
fn weather_looks_like_a_mountain_station() {
    let places = [
        (&alder_fork::PLACE, 500.0..900.0, 0.25..0.4),
        (&frostbell_creek::PLACE, 500.0..900.0, 0.25..0.4),
        (&tamsin_river::PLACE, 1300.0..2000.0, 0.35..0.45),
    ];
    for (place, usual_yearly_mm, usual_wet_share) in places {
        let series = read_station(place).series;
        let yearly_mm = series.precipitation_mm.iter().sum::<f64>() / series.years.len() as f64;
        assert!(usual_yearly_mm.contains(&yearly_mm), "{yearly_mm} mm a year");
        let wet_days = series.precipitation_mm.iter().filter(|amount| **amount > 0.0).count();
        let wet_share = wet_days as f64 / series.precipitation_mm.len() as f64;
        assert!(usual_wet_share.contains(&wet_share), "{wet_share} of the days are wet");
        let range_c = |is_wet: bool| {
            let days = series.half_range_c.iter().zip(&series.precipitation_mm);
            let ranges: Vec<f64> = days
                .filter(|(_, amount)| (**amount > 0.0) == is_wet)
                .map(|(half_range, _)| 2.0 * half_range)
                .collect();
            ranges.iter().sum::<f64>() / ranges.len() as f64
        };
        assert!(range_c(true) < range_c(false), "clouds narrow the daily range");
    }
}

/// January and July stand half a year apart; the demo's cold months are those of its hemispheres.
#[test]
fn seasons_are_those_of_the_hemisphere() {
    let places = [(&alder_fork::PLACE, 0), (&frostbell_creek::PLACE, 0), (&tamsin_river::PLACE, 6)];
    for (place, coldest) in places {
        let month_c = read_station(place).means().month_c;
        let found = (0..12).min_by(|a, b| month_c[*a].total_cmp(&month_c[*b]));
        assert_eq!(found, Some(coldest), "{}: {month_c:?}", place.basin);
    }
}

/// The gauge is read to 0.01 in, so that a difference of two readings is within that, 0.254 mm, of what fell, and the
/// first reading after it was emptied within half of it. The days without amount are those without a reading, the day
/// after each run of them, and the record's first.
#[test]
fn the_accumulating_gauge_gives_back_the_daily_amounts() {
    let place = &tamsin_river::PLACE;
    let record = read_station(place);
    let days = draw(place);
    assert_eq!(record.counts.gauge.map(|gauge| (gauge.resets, gauge.small_falls)), Some((39, 0)));
    let is_lost = |at: usize| place.is_lost(days[at].date, &[Hole::Precipitation, Hole::All]);
    let has_amount = |at: usize| at > 0 && !is_lost(at) && !is_lost(at - 1);
    let without = (0..days.len()).filter(|at| !has_amount(*at)).count();
    assert_eq!(without, record.counts.precipitation_missing_days);
    let mut compared = 0;
    for year in &record.series.years {
        let first = days.iter().position(|day| day.date == year.first).unwrap();
        for day in (0..year.days).filter(|day| has_amount(first + day)) {
            let (read_mm, fell_mm) =
                (record.series.precipitation_mm[year.start + day], days[first + day].precipitation_mm);
            let allowed_mm = if day == 0 { 0.127 } else { 0.254 };
            assert!(
                (read_mm - fell_mm).abs() < allowed_mm + 1e-9,
                "{}: {read_mm} mm read, {fell_mm} mm fell",
                days[first + day].date
            );
            compared += 1;
        }
    }
    assert!(compared > 39 * 365 - 20);
}

/// 2500 to 7500 feet, and 184 square miles of 2.589988 km2, the international mile's square: by hand.
#[test]
fn southern_bands_are_in_feet_and_square_miles() {
    let read = read_bands("bands.csv", &bands::table(&tamsin_river::PLACE), &BandColumns::default()).unwrap();
    let area_km2: f64 = read.iter().map(|band| band.area_km2).sum();
    assert!((area_km2 - 476.557_8).abs() < 1e-3, "{area_km2} km2");
    let (lowest, highest) = (read[0].lower_m, read[9].upper_m);
    assert!((lowest - 762.0).abs() < 1e-9 && (highest - 2286.0).abs() < 1e-9, "{lowest} to {highest} m");
}

/// Reads a place's station as its scenario does.
fn read_station(place: &Place) -> Record {
    let (columns, starts, survey) = if place.latitude_deg < 0.0 {
        (us_columns(), (4, 1), (10, 1))
    } else {
        (metric_columns(), (10, 1), (4, 1))
    };
    let day = |(month, day)| MonthDay::new(month, day).unwrap();
    let text = station::table(place);
    read("weather.csv", &text, &columns, WaterYearStart(day(starts)), day(survey), &Limits::default())
        .unwrap()
}

fn metric_columns() -> Columns {
    let celsius =
        |column: &str| TemperatureColumn { column: column.to_owned(), unit: TemperatureUnit::Celsius };
    Columns {
        date: DateColumn { columns: vec!["date".to_owned()], format: "%Y-%m-%d".to_owned() },
        temperature: TemperatureColumns::Extremes { tmin: celsius("tmin_c"), tmax: celsius("tmax_c") },
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

fn us_columns() -> Columns {
    let fahrenheit =
        |column: &str| TemperatureColumn { column: column.to_owned(), unit: TemperatureUnit::Fahrenheit };
    Columns {
        date: DateColumn { columns: vec!["Day".to_owned()], format: "%m/%d/%Y".to_owned() },
        temperature: TemperatureColumns::Extremes {
            tmin: fahrenheit("Lowest of the day (degF)"),
            tmax: fahrenheit("Highest of the day (degF)"),
        },
        precipitation: PrecipitationColumn {
            column: "In the gauge at midnight (in)".to_owned(),
            unit: DepthUnit::Inch,
            gauge: Gauge::Accumulating { reading: Reading::EndOfDay, reset_tolerance_mm: 50.0 },
            trace: Vec::new(),
        },
        humidity: None,
        format: Format { comment: Some(b'!'), missing: vec!["M".to_owned()], ..Format::default() },
    }
}
