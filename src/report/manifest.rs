//! `run.json`: how results came about, and how they are repeated.

use super::SCHEMA_VERSION;
use super::json::lines;
use super::study::{FittedFrom, Input, Origin, SetsFrom, Study};
use crate::baseline::{BaselineYears, Detrended};
use crate::calendar::MonthDay;
use crate::defaults::DefaultInForce;
use crate::fault::Unlikely;
use crate::findings::Findings;
use crate::inflow::Routing;
use crate::operation::{Change, Operation};
use crate::perturb::Warming;
use crate::reservoir::Reservoir;
use crate::season::SeasonSettings;
use crate::snow::{GaugeMultiplier, SnowParams};
use crate::units::UnitSystem;
use crate::weather::{Counts, SkippedYear};
use serde::Serialize;

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
    inflow: Option<RoutingInForce<'a>>,
    #[serde(skip_serializing_if = "Option::is_none")]
    reservoir: Option<ReservoirInForce<'a>>,
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
struct RoutingInForce<'a> {
    #[serde(flatten)]
    routing: Routing,
    is_fitted: bool,
    #[serde(skip_serializing_if = "Option::is_none")]
    stated: Option<Routing>,
    year_class_limits_hm3: &'a [f64],
}

/// A reservoir, and what else is tried of its rules.
#[derive(Serialize)]
struct ReservoirInForce<'a> {
    #[serde(flatten)]
    reservoir: &'a Reservoir,
    storage_dates: &'a [MonthDay],
    changes: &'a [Change],
}

impl<'a> ReservoirInForce<'a> {
    fn of(operation: &'a Operation) -> Option<Self> {
        let reservoir = operation.reservoir.as_ref()?;
        Some(Self {
            reservoir,
            storage_dates: &operation.settings.storage_dates,
            changes: &operation.changes,
        })
    }
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
            inflow: study.operation.map(|operation| routing_in_force(operation, findings)),
            reservoir: study.operation.and_then(ReservoirInForce::of),
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

fn routing_in_force<'a>(operation: &Operation, findings: &'a Findings) -> RoutingInForce<'a> {
    let skill = findings.operations.as_ref().and_then(|found| found.inflow_skill.as_ref());
    let stated = skill.and_then(|skill| skill.fit.as_ref()).map(|fit| fit.stated);
    let classes = findings.operations.as_ref().and_then(|found| found.year_classes.as_ref());
    RoutingInForce {
        routing: operation.routing,
        is_fitted: stated.is_some(),
        stated,
        year_class_limits_hm3: classes.map_or(&[], |classes| &classes.limits_hm3),
    }
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
