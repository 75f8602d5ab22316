//! `[weather]`: the station's file and how to read it.

use super::elevation::Height;
use super::format::{read_date, read_format};
use super::section::{Section, described};
use crate::fault::Fault;
use crate::snow::GaugeMultiplier;
use crate::units::{DepthUnit, ShareUnit, TemperatureUnit};
use crate::weather::{
    Columns, Gauge, HumidityColumn, Limits, PrecipitationColumn, Reading, TemperatureColumn,
    TemperatureColumns,
};

/// The station's file and how to read it.
#[derive(Debug, Clone)]
pub struct RecordSource {
    /// The file, relative to the scenario.
    pub file: String,
    /// Columns, units, marks.
    pub columns: Columns,
    /// Limits of the screening.
    pub limits: Limits,
}

impl RecordSource {
    /// Whether the file has daily minima and maxima.
    pub fn has_daily_range(&self) -> bool {
        matches!(self.columns.temperature, TemperatureColumns::Extremes { .. })
    }
}

/// The station as typed.
#[derive(Debug, Clone)]
pub struct WeatherTyped {
    /// Its file.
    pub source: RecordSource,
    /// Elevation of the station, m.
    pub station_elevation_m: f64,
    /// Gauge catch.
    pub gauge_multiplier: GaugeMultiplier,
    /// The year to which a trend of temperature is taken out of the years that realizations are drawn from.
    pub detrend_to: Option<i32>,
    /// First and last baseline year, where they are stated.
    pub baseline_years: Option<[i32; 2]>,
}

/// A fall of an accumulating gauge beyond this is a reset, mm.
const RESET_TOLERANCE_MM: f64 = 50.0;

/// The station's file stands alone too: it can be looked into although another key has a fault.
pub(super) fn read(mut section: Section<'_>) -> (Option<RecordSource>, Option<WeatherTyped>) {
    let file =
        section.required_text("file", "the path of the station's CSV file", "add file = \"weather.csv\"");
    section.names_file("weather.file", file.as_deref());
    let station_elevation_m =
        section.required_height(&Height::above_the_sea("station_elevation_m", "station_elevation_ft"));
    let date = read_date(section.section("date"));
    let temperature = read_temperatures(&mut section);
    let precipitation = read_precipitation(section.required_section("precipitation"));
    let humidity = read_humidity(&mut section);
    let gauge_multiplier = read_multiplier(&mut section);
    let format = read_format(&mut section);
    let limits = read_limits(&mut section);
    let detrend_to = section.whole_in("detrend_to", 1700..=2200, 2005).map(|year| year as i32);
    let baseline_years = read_baseline_years(&mut section);
    section.finish();
    let source = match (file, date, temperature, precipitation, humidity, format) {
        (Some(file), Some(date), Some(temperature), Some(precipitation), Ok(humidity), Some(format)) => {
            let columns = Columns { date, temperature, precipitation, humidity, format };
            Some(RecordSource { file, columns, limits })
        }
        _ => None,
    };
    let typed = match (source.clone(), station_elevation_m, gauge_multiplier) {
        (Some(source), Some(station_elevation_m), Some(gauge_multiplier)) => {
            Some(WeatherTyped { source, station_elevation_m, gauge_multiplier, detrend_to, baseline_years })
        }
        _ => None,
    };
    (source, typed)
}

fn read_limits(section: &mut Section<'_>) -> Limits {
    let default = Limits::default();
    Limits {
        temperature_gap_days: section.whole_or(
            "temperature_gap_days",
            default.temperature_gap_days as u64,
            0..=30,
        ) as usize,
        missing_days_allowed: section.whole_or(
            "missing_days_allowed",
            default.missing_days_allowed as u64,
            0..=366,
        ) as usize,
        season_mean_departure_c: section.number_or(
            "season_mean_departure_c",
            default.season_mean_departure_c,
            0.0..=100.0,
            "degC by which a season's mean may differ from the record's median; 6 is the default",
        ),
        stuck_temperature_days: section
            .whole_in("stuck_temperature_days", 3..=366, 10)
            .map(|days| days as usize),
        leave_out_water_years: section.years("leave_out_water_years").unwrap_or_default(),
        temperature_departure_c: section.number_in(
            "temperature_departure_c",
            5.0..=200.0,
            "degC from the median of the time of year beyond which a temperature is taken as missing; 25 is common",
        ),
    }
}

/// Two water years, the first not after the last. Which years they are without it only the record can tell.
fn read_baseline_years(section: &mut Section<'_>) -> Option<[i32; 2]> {
    let value = section.value("baseline_years")?;
    let years = if value.is_array() { section.years("baseline_years")? } else { Vec::new() };
    match years.as_slice() {
        [first, last] if first <= last => Some([*first, *last]),
        other => {
            let found = if value.is_array() { format!("{other:?}") } else { described(value) };
            section.fault(Fault::key(
                section.path_of("baseline_years"),
                found,
                "two water years, the first and the last of the period",
                "baseline_years = [1991, 2020], for example",
            ));
            None
        }
    }
}

fn read_temperatures(section: &mut Section<'_>) -> Option<TemperatureColumns> {
    let has = ["tmin", "tmax", "tmean"].map(|key| section.has(key));
    match has {
        [false, false, true] => {
            let mean = read_temperature(section.section("tmean"));
            Some(TemperatureColumns::MeanAlone(mean?))
        }
        [false, false, false] => {
            section.section("tmean");
            let (tmin, tmax) = (section.required_section("tmin"), section.required_section("tmax"));
            drop((tmin, tmax));
            None
        }
        [_, _, has_mean] => {
            if has_mean {
                section.fault(Fault::key(
                    section.path_of("tmean"),
                    "tmean beside tmin and tmax",
                    "tmin and tmax, or tmean alone",
                    "take tmean out; the daily mean is (tmin + tmax)/2",
                ));
                section.section("tmean");
            }
            let tmin = read_temperature(section.required_section("tmin"));
            let tmax = read_temperature(section.required_section("tmax"));
            Some(TemperatureColumns::Extremes { tmin: tmin?, tmax: tmax? })
        }
    }
}

fn read_temperature(mut section: Section<'_>) -> Option<TemperatureColumn> {
    let column = section.required_text("column", "the column's name in the header", "add column = \"...\"");
    let unit = section.required_choice("unit", &TemperatureUnit::NAMES);
    section.finish();
    Some(TemperatureColumn { column: column?, unit: unit? })
}

fn read_precipitation(mut section: Section<'_>) -> Option<PrecipitationColumn> {
    let column = section.required_text("column", "the column's name in the header", "add column = \"...\"");
    let unit = section.required_choice("unit", &DepthUnit::NAMES);
    let is_accumulating = if section.has("gauge") {
        section.choice("gauge", &[("daily", false), ("accumulating", true)])
    } else {
        section.text_or("gauge", "daily");
        Some(false)
    };
    let gauge = if is_accumulating == Some(true) {
        let reading = section.choice("reading", &Reading::NAMES);
        if reading.is_none() && !section.has("reading") {
            section.required_text(
                "reading",
                "\"start-of-day\" or \"end-of-day\"",
                "add reading = \"start-of-day\" or \"end-of-day\": it decides to which day the water belongs",
            );
        }
        let reset_tolerance_mm = section.number_or(
            "reset_tolerance_mm",
            RESET_TOLERANCE_MM,
            0.0..=2000.0,
            "a fall beyond it means that the gauge was set back",
        );
        reading.map(|reading| Gauge::Accumulating { reading, reset_tolerance_mm })
    } else {
        is_accumulating.map(|_| Gauge::Daily)
    };
    let trace = section.texts("trace").unwrap_or_default();
    section.finish();
    Some(PrecipitationColumn { column: column?, unit: unit?, gauge: gauge?, trace })
}

/// Something was typed that cannot be; its faults are noted.
struct Unsound;

/// Humidity, or none where no column is named for it.
fn read_humidity(section: &mut Section<'_>) -> Result<Option<HumidityColumn>, Unsound> {
    match ["relative_humidity", "dew_point"].map(|key| section.has(key)) {
        [false, false] => {
            section.knows("relative_humidity");
            section.knows("dew_point");
            Ok(None)
        }
        [true, true] => {
            section.fault(Fault::key(
                section.path_of("dew_point"),
                "dew_point beside relative_humidity",
                "one of the two",
                "take one of them out",
            ));
            section.knows("relative_humidity");
            section.knows("dew_point");
            Err(Unsound)
        }
        [true, false] => {
            section.knows("dew_point");
            let mut of_column = section.section("relative_humidity");
            let column =
                of_column.required_text("column", "the column's name in the header", "add column = \"...\"");
            let unit = of_column.choice_or("unit", &ShareUnit::NAMES, "pct");
            of_column.finish();
            let (column, unit) = column.zip(unit).ok_or(Unsound)?;
            Ok(Some(HumidityColumn::Relative { column, unit }))
        }
        [false, true] => {
            section.knows("relative_humidity");
            let dew_point = read_temperature(section.section("dew_point")).ok_or(Unsound)?;
            Ok(Some(HumidityColumn::DewPoint(dew_point)))
        }
    }
}

fn read_multiplier(section: &mut Section<'_>) -> Option<GaugeMultiplier> {
    let mend = "1.1 says that 10 % more fell than was caught";
    let mut multiplier = section.section("gauge_multiplier");
    let typed = GaugeMultiplier {
        rain: multiplier.number_or("rain", GaugeMultiplier::NONE.rain, f64::MIN..=f64::MAX, mend),
        snow: multiplier.number_or("snow", GaugeMultiplier::NONE.snow, f64::MIN..=f64::MAX, mend),
    };
    multiplier.finish();
    match typed.check() {
        Ok(unlikely) => {
            section.notes.unlikely.borrow_mut().extend(unlikely);
            Some(typed)
        }
        Err(faults) => {
            faults.into_iter().for_each(|fault| section.fault(fault));
            None
        }
    }
}
