//! `summary.json`: every number that the briefing says or a figure draws; `run.json`: how it came about.

use super::SCHEMA_VERSION;
use super::answer::Answer;
use super::json::lines;
use super::methods::{METHODS, Methods};
use super::study::{FittedFrom, Input, Origin, SetsFrom, Study};
use crate::baseline::{Baseline, BaselineYears, Detrended};
use crate::basin::BeyondStations;
use crate::defaults::DefaultInForce;
use crate::fault::Unlikely;
use crate::findings::Findings;
use crate::inflow::Routing;
use crate::perturb::Warming;
use crate::season::{Outcome, SeasonSettings};
use crate::snow::{GaugeMultiplier, SnowParams};
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

#[derive(Serialize)]
struct Manifest<'a> {
    schema_version: u32,
    program: &'static str,
    version: &'static str,
    command: &'a str,
    seed: u64,
    inputs: &'a [Input],
    parameters: Parameters<'a>,
    defaults_in_force: &'a [DefaultInForce],
    unlikely: Vec<Notice<'a>>,
    left_out: LeftOut<'a>,
    files: Vec<&'a str>,
}

#[derive(Serialize)]
struct Parameters<'a> {
    title: &'a str,
    latitude_deg: f64,
    tmin_temperature_gradient_c_per_km: [f64; 12],
    tmax_temperature_gradient_c_per_km: [f64; 12],
    precipitation_gradient: crate::basin::PrecipitationGradient,
    station_elevation_m: f64,
    gauge_multiplier: GaugeMultiplier,
    season: &'a SeasonSettings,
    snow: &'a SnowParams,
    is_fitted: bool,
    fitted: Option<FittedFrom<'a>>,
    #[serde(skip_serializing_if = "Option::is_none")]
    parameter_sets: Option<SetsFrom<'a>>,
    #[serde(skip_serializing_if = "Option::is_none")]
    inflow: Option<RoutingInForce>,
    levels_c: &'a [f64],
    reference_c: f64,
    warming: &'a Warming,
    detrended: Option<&'a Detrended>,
    baseline_years: Option<&'a BaselineYears>,
    realizations: Realizations,
    report_units: UnitSystem,
}

/// How water input becomes inflow.
#[derive(Serialize)]
struct RoutingInForce {
    #[serde(flatten)]
    routing: Routing,
    is_fitted: bool,
    #[serde(skip_serializing_if = "Option::is_none")]
    stated: Option<Routing>,
}

#[derive(Serialize)]
struct Realizations {
    generator: &'static str,
    count: usize,
    years: usize,
    mean_run_years: Option<f64>,
    wet_day_mm: f64,
    mean_change_sd_pct: Option<f64>,
}

#[derive(Serialize)]
struct Notice<'a> {
    about: &'a str,
    why: &'a str,
}

#[derive(Serialize)]
struct LeftOut<'a> {
    counts: &'a Counts,
    water_years: &'a [SkippedYear],
}

/// `run.json`; `files` are all files of the results, this one included.
///
/// # Errors
/// A number that JSON cannot hold: a fault of ours.
pub fn manifest_json(study: &Study<'_>, files: &[&str]) -> serde_json::Result<Vec<u8>> {
    let findings = study.findings;
    let notice = |notice: &'_ Unlikely| (notice.about.clone(), notice.why.clone());
    let unlikely: Vec<(String, String)> = study.unlikely.iter().map(notice).collect();
    lines(&Manifest {
        schema_version: SCHEMA_VERSION,
        program: "thawline",
        version: env!("CARGO_PKG_VERSION"),
        command: &study.origin.command,
        seed: study.origin.seed,
        inputs: &study.origin.inputs,
        parameters: Parameters {
            title: study.title,
            latitude_deg: study.basin.latitude_deg,
            tmin_temperature_gradient_c_per_km: study.basin.temperature.tmin_c_per_km,
            tmax_temperature_gradient_c_per_km: study.basin.temperature.tmax_c_per_km,
            precipitation_gradient: study.basin.precipitation,
            station_elevation_m: study.station_elevation_m,
            gauge_multiplier: study.gauge_multiplier,
            season: study.season,
            snow: study.snow,
            is_fitted: study.fitted.is_some_and(|fitted| !fitted.taken.is_empty()),
            fitted: study.fitted,
            parameter_sets: study.parameter_sets,
            inflow: study.routing.map(|routing| routing_in_force(routing, findings)),
            levels_c: &findings.levels_c,
            reference_c: findings.levels_c[findings.reference],
            warming: study.warming,
            detrended: study.record.detrended,
            baseline_years: findings.record.as_ref().map(|record| &record.baseline_years),
            realizations: Realizations {
                generator: study.generator.name(),
                count: findings.realizations,
                years: findings.years,
                mean_run_years: study.generator.mean_run_years(),
                wet_day_mm: study.wet_day_mm,
                mean_change_sd_pct: study.mean_change_sd_pct,
            },
            report_units: study.reader.units,
        },
        defaults_in_force: study.defaults,
        unlikely: unlikely.iter().map(|(about, why)| Notice { about, why }).collect(),
        left_out: LeftOut { counts: study.record.counts, water_years: study.record.skipped },
        files: files.to_vec(),
    })
}

fn routing_in_force(routing: Routing, findings: &Findings) -> RoutingInForce {
    let skill = findings.operations.as_ref().and_then(|found| found.inflow_skill.as_ref());
    let stated = skill.and_then(|skill| skill.fit.as_ref()).map(|fit| fit.stated);
    RoutingInForce { routing, is_fitted: stated.is_some(), stated }
}

#[derive(Serialize)]
struct DailyManifest<'a> {
    schema_version: u32,
    program: &'static str,
    version: &'static str,
    command: &'a str,
    inputs: &'a [Input],
    files: &'a [&'a str],
}

/// `run.json` of a daily table.
///
/// # Errors
/// A text that JSON cannot hold: a fault of ours.
pub fn daily_manifest_json(origin: &Origin, files: &[&str]) -> serde_json::Result<Vec<u8>> {
    lines(&DailyManifest {
        schema_version: SCHEMA_VERSION,
        program: "thawline",
        version: env!("CARGO_PKG_VERSION"),
        command: &origin.command,
        inputs: &origin.inputs,
        files,
    })
}
