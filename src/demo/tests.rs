//! The kept files are what the program writes, and they read as the records they pretend to be.

use super::{alder_fork, files, frostbell_creek, station};
use crate::calendar::{MonthDay, WaterYearStart};
use crate::table::{DateColumn, Format};
use crate::units::{DepthUnit, TemperatureUnit};
use crate::weather::{
    Columns, Gauge, Limits, PrecipitationColumn, Record, TemperatureColumn, TemperatureColumns, read,
};

#[test]
fn kept_files_are_what_the_program_writes() {
    let root = std::path::Path::new(env!("CARGO_MANIFEST_DIR"));
    for (path, content) in files() {
        let kept = std::fs::read(root.join(path)).unwrap_or_default();
        assert!(
            kept == content.as_bytes(),
            "{path} differs from what the demo writes; run `thawline start` and look at what changed"
        );
    }
}

#[test]
fn each_record_has_forty_years_of_which_one_is_left_out() {
    for (place, left_out) in [(&alder_fork::PLACE, 1998), (&frostbell_creek::PLACE, 2011)] {
        let record = read_station(&station::table(place));
        let skipped: Vec<i32> = record.skipped.iter().map(|year| year.water_year).collect();
        assert_eq!((record.series.years.len(), skipped), (39, vec![left_out]));
        assert_eq!(record.counts.crossed_temperature_days, 0);
        assert!(record.series.half_range_c.iter().all(|half_range| *half_range > 0.0));
        assert!(record.counts.interpolated_days > 0 && record.counts.dry_for_want_of_data_days > 0);
    }
}

/// Broad bounds of a mountain station: enough to catch a slip in the generator, no more.
#[test]
fn weather_looks_like_a_mountain_station() {
    for place in [&alder_fork::PLACE, &frostbell_creek::PLACE] {
        let series = read_station(&station::table(place)).series;
        let yearly_mm = series.precipitation_mm.iter().sum::<f64>() / series.years.len() as f64;
        assert!((500.0..900.0).contains(&yearly_mm), "{yearly_mm} mm a year");
        let wet_days = series.precipitation_mm.iter().filter(|amount| **amount > 0.0).count();
        let wet_share = wet_days as f64 / series.precipitation_mm.len() as f64;
        assert!((0.25..0.4).contains(&wet_share), "{wet_share} of the days are wet");
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

fn read_station(text: &str) -> Record {
    let celsius =
        |column: &str| TemperatureColumn { column: column.to_owned(), unit: TemperatureUnit::Celsius };
    let columns = Columns {
        date: DateColumn { columns: vec!["date".to_owned()], format: "%Y-%m-%d".to_owned() },
        temperature: TemperatureColumns::Extremes { tmin: celsius("tmin_c"), tmax: celsius("tmax_c") },
        precipitation: PrecipitationColumn {
            column: "precip_mm".to_owned(),
            unit: DepthUnit::Millimetre,
            gauge: Gauge::Daily,
            trace: Vec::new(),
        },
        format: Format::default(),
    };
    let day = |month, day| MonthDay::new(month, day).unwrap();
    read("weather.csv", text, &columns, WaterYearStart(day(10, 1)), day(4, 1), Limits::default()).unwrap()
}
