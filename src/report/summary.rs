//! `summary.json`: every number that the briefing says or a figure draws.

use super::SCHEMA_VERSION;
use super::answer::Answer;
use super::json::lines;
use super::methods::{METHODS, Methods};
use super::study::Study;
use crate::baseline::{Baseline, Detrended};
use crate::basin::BeyondStations;
use crate::findings::Findings;
use crate::season::{Outcome, SeasonSettings};
use crate::units::UnitSystem;
use crate::weather::{Counts, SkippedYear};
use serde::Serialize;

#[derive(Serialize)]
struct Summary<'a> {
    schema_version: u32,
    program: &'static str,
    title: &'a str,
    units: UnitsSaid,
    answer: &'a Answer,
    quantiles: &'static str,
    methods: Methods,
    season: &'a SeasonSettings,
    basin: BasinSummary,
    record: RecordSummary<'a>,
    findings: &'a Findings,
}

/// In which units the document's numbers stand, and in which its words and the rest of the report.
#[derive(Serialize)]
struct UnitsSaid {
    numbers: UnitSystem,
    words_figures_and_tables: UnitSystem,
}

#[derive(Serialize)]
struct BasinSummary {
    area_km2: f64,
    bands: usize,
    lowest_m: f64,
    highest_m: f64,
    #[serde(skip_serializing_if = "Option::is_none")]
    mean_elevation_of_warming_m: Option<f64>,
    precipitation_over_station: f64,
    mean_precipitation_mm: f64,
    area_beyond_stations: Option<BeyondStations>,
    reference_swe_beyond_stations: Option<BeyondStations>,
}

#[derive(Serialize)]
struct RecordSummary<'a> {
    #[serde(flatten)]
    counts: &'a Counts,
    years_used: usize,
    years_left_out: &'a [SkippedYear],
    mean_station_precipitation_mm: f64,
    headline_mean: Option<f64>,
    headline_coefficient_of_variation: Option<f64>,
    headline_by_year: Vec<HeadlineYear>,
    baseline: Option<&'a Baseline>,
    detrended: Option<&'a Detrended>,
}

#[derive(Serialize)]
struct HeadlineYear {
    water_year: i32,
    value: Outcome,
}

/// `summary.json`.
///
/// # Errors
/// A number that JSON cannot hold: a fault of ours.
pub fn summary_json(study: &Study<'_>, answer: &Answer) -> serde_json::Result<Vec<u8>> {
    let basin = study.basin;
    let ratio = basin.precipitation_ratio(study.station_elevation_m);
    let headline = |year: &crate::ensemble::RecordYear| HeadlineYear {
        water_year: year.water_year,
        value: study
            .record
            .measures
            .first()
            .zip(year.values.first())
            .map_or(Outcome::None, |(measure, value)| measure.kind.outcome(*value)),
    };
    let mean_and_variation = study.record.headline_mean_and_variation();
    lines(&Summary {
        schema_version: SCHEMA_VERSION,
        program: "thawline",
        title: study.title,
        units: UnitsSaid { numbers: UnitSystem::Metric, words_figures_and_tables: study.reader.units },
        answer,
        quantiles: "Hyndman & Fan (1996) type 8; amounts in mm, SWE area in mm days, shares from 0 to 1, counts of \
                    days, dates as day of the water year counted from 1",
        methods: METHODS,
        season: study.season,
        basin: BasinSummary {
            area_km2: basin.area_km2(),
            bands: basin.bands.len(),
            lowest_m: basin.bands.first().map_or(0.0, |band| band.lower_m),
            highest_m: basin.bands.last().map_or(0.0, |band| band.upper_m),
            mean_elevation_of_warming_m: study.mean_elevation_of_warming_m(),
            precipitation_over_station: ratio,
            mean_precipitation_mm: ratio * study.record.mean_precipitation_mm,
            area_beyond_stations: study.beyond_stations,
            reference_swe_beyond_stations: study.swe_beyond_stations,
        },
        record: RecordSummary {
            counts: study.record.counts,
            years_used: study.record.years.len(),
            years_left_out: study.record.skipped,
            mean_station_precipitation_mm: study.record.mean_precipitation_mm,
            headline_mean: mean_and_variation.map(|[mean, _]| mean),
            headline_coefficient_of_variation: mean_and_variation.map(|[_, variation]| variation),
            headline_by_year: study.record.years.iter().map(headline).collect(),
            baseline: study.record.baseline,
            detrended: study.record.detrended,
        },
        findings: study.findings,
    })
}
