//! `thawline check`: reads everything a study would use and says what it found.

use super::arguments::Shared;
use super::assemble::{Ready, assemble};
use super::failure::Failure;
use super::output;
use crate::report::SCHEMA_VERSION;
use crate::report::numbers::{fixed, signed};
use crate::scenario::DefaultInForce;
use crate::season::SeasonSettings;
use crate::snow::SnowParams;
use crate::weather::{Counts, Means, SkippedYear};
use serde::Serialize;
use std::fmt::Write;
use std::path::Path;

#[derive(Serialize)]
struct Checked<'a> {
    schema_version: u32,
    program: &'static str,
    status: &'static str,
    title: &'a str,
    seed: u64,
    record: &'a Counts,
    water_years_in_use: Vec<i32>,
    water_years_left_out: &'a [SkippedYear],
    station_means_as_caught: Means,
    station_precipitation_mm_per_year: f64,
    basin_precipitation_mm_per_year: f64,
    basin_area_km2: f64,
    bands: usize,
    season: &'a SeasonSettings,
    snow: &'a SnowParams,
    levels_c: &'a [f64],
    defaults_in_force: &'a [DefaultInForce],
    unlikely: Vec<String>,
}

/// Runs the command.
pub(super) fn run(path: &Path, shared: &Shared) -> Result<(), Failure> {
    let ready = assemble(path, shared)?;
    if shared.json {
        return output::print_json(&document(&ready));
    }
    if shared.quiet {
        return Ok(());
    }
    output::print(words(&ready).as_bytes())
}

fn document(ready: &Ready) -> Checked<'_> {
    let scenario = &ready.scenario;
    let station_mm = ready.mean_precipitation_mm();
    Checked {
        schema_version: SCHEMA_VERSION,
        program: "thawline",
        status: "checked",
        title: &scenario.title,
        seed: scenario.seed,
        record: &ready.record.counts,
        water_years_in_use: ready.record.series.years.iter().map(|year| year.water_year).collect(),
        water_years_left_out: &ready.record.skipped,
        station_means_as_caught: ready.record.means(),
        station_precipitation_mm_per_year: station_mm,
        basin_precipitation_mm_per_year: station_mm * ready.precipitation_ratio(),
        basin_area_km2: ready.basin.area_km2(),
        bands: ready.basin.bands.len(),
        season: &scenario.season,
        snow: &scenario.snow,
        levels_c: &scenario.warming.levels_c,
        defaults_in_force: &ready.defaults,
        unlikely: ready.unlikely.iter().map(|notice| format!("{}: {}", notice.about, notice.why)).collect(),
    }
}

fn words(ready: &Ready) -> String {
    let (mut text, reader) = (String::new(), ready.reader());
    let mut line = |name: &str, what: String| {
        let _ = writeln!(text, "{name:<26}{what}");
    };
    let counts = &ready.record.counts;
    line("title", ready.scenario.title.clone());
    line("record", format!("{} to {}, {} days", counts.first, counts.last, counts.days));
    let years = &ready.record.series.years;
    let span = years
        .first()
        .zip(years.last())
        .map_or(String::new(), |(first, last)| format!(", from {} to {}", first.water_year, last.water_year));
    line("water years in use", format!("{}{span}", years.len()));
    for year in &ready.record.skipped {
        let why: Vec<String> = year.why.iter().map(|why| why.words(reader.units)).collect();
        line("  left out", format!("{}: {}", year.water_year, why.join("; ")));
    }
    line("dates without a line", counts.absent_days.to_string());
    line(
        "temperature missing",
        format!(
            "{} days; {} interpolated in the years in use",
            counts.temperature_missing_days, counts.interpolated_days
        ),
    );
    line("impossible values", format!("{} cells, taken as missing", counts.impossible_cells));
    line("  minimum above maximum", format!("{} days, taken as missing", counts.crossed_temperature_days));
    line(
        "precipitation missing",
        format!(
            "{} days; {} run dry in the years in use",
            counts.precipitation_missing_days, counts.dry_for_want_of_data_days
        ),
    );
    if let Some(gauge) = counts.gauge {
        line(
            "accumulating gauge",
            format!(
                "set back {} times; {} small falls, {} in all, taken for noise; {} between missing readings, not run",
                gauge.resets,
                gauge.small_falls,
                reader.amount(gauge.small_falls_mm),
                reader.amount(gauge.between_readings_mm)
            ),
        );
    }
    let means = ready.record.means();
    let unit = reader.units.temperature();
    let degrees = |value: f64| signed(unit.of(value), 1);
    line(
        "station temperature",
        format!(
            "{} {} over the year, {} in January, {} in July",
            degrees(means.year_c),
            unit.suffix,
            degrees(means.month_c[0]),
            degrees(means.month_c[6])
        ),
    );
    let (station_mm, ratio) = (ready.mean_precipitation_mm(), ready.precipitation_ratio());
    line("station precipitation", format!("{} a year, catch corrected", reader.amount(station_mm)));
    line(
        "basin precipitation",
        format!(
            "{} a year, {} times the station's: hold it against a value you know",
            reader.amount(station_mm * ratio),
            fixed(ratio, 2)
        ),
    );
    let bands = &ready.basin.bands;
    let range = bands.first().zip(bands.last()).map_or(String::new(), |(low, high)| {
        format!(", {} to {}", reader.elevation_bare(low.lower_m), reader.elevation(high.upper_m))
    });
    let area = reader.area_bare(ready.basin.area_km2());
    line("bands", format!("{}{range}, {area} {}", bands.len(), reader.units.area().suffix));
    let levels: Vec<String> =
        ready.scenario.warming.levels_c.iter().map(|level_c| reader.level(*level_c)).collect();
    line("levels", levels.join(", "));
    line("snow model", "not fitted to observed snow".to_owned());
    for default in &ready.defaults {
        line("default in force", format!("{} = {}", default.key, default.value));
    }
    text + &crate::scenario::unlikely_lines(&ready.unlikely)
}
