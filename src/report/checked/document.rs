//! The check as one JSON document; all of its numbers are metric.

use super::super::SCHEMA_VERSION;
use super::Checked;
use super::inflow::InflowFile;
use super::observed::SiteDocument;
use crate::baseline::{Baseline, BaselineYears, Detrended, wilson};
use crate::basin::{Band, BeyondStations, PrecipitationGradient};
use crate::defaults::DefaultInForce;
use crate::ensemble::BandClimate;
use crate::findings::GeneratorSheet;
use crate::perturb::Warming;
use crate::report::{FittedFrom, SetsFrom};
use crate::season::SeasonSettings;
use crate::snow::{GaugeMultiplier, SnowParams};
use crate::weather::{Counts, Means, SkippedYear, Suspicion};
use serde::Serialize;

#[derive(Serialize)]
struct Document<'a> {
    schema_version: u32,
    program: &'static str,
    status: &'static str,
    title: &'a str,
    seed: u64,
    record: &'a Counts,
    suspicious: &'a [Suspicion],
    water_years_in_use: Vec<i32>,
    water_years_left_out: &'a [SkippedYear],
    station_means_as_caught: Means,
    cool_season: Season,
    warm_season: Season,
    gauge_multiplier: GaugeMultiplier,
    station_precipitation_mm_per_year: f64,
    basin_precipitation_mm_per_year: f64,
    tmin_temperature_gradient_c_per_km: [f64; 12],
    tmax_temperature_gradient_c_per_km: [f64; 12],
    precipitation_gradient: PrecipitationGradient,
    station_snow_fraction: f64,
    basin_snow_fraction: Option<f64>,
    basin_area_km2: f64,
    area_beyond_stations: Option<BeyondStations>,
    bands: Vec<BandDocument<'a>>,
    baseline: Option<&'a Baseline>,
    baseline_years: &'a BaselineYears,
    detrended: Option<&'a Detrended>,
    observed_swe: Vec<SiteDocument<'a>>,
    #[serde(skip_serializing_if = "Option::is_none")]
    observed_inflow: Option<&'a InflowFile<'a>>,
    season: &'a SeasonSettings,
    snow: &'a SnowParams,
    fitted: Option<FittedFrom<'a>>,
    #[serde(skip_serializing_if = "Option::is_none")]
    parameter_sets: Option<SetsFrom<'a>>,
    is_fitted: bool,
    levels_c: &'a [f64],
    reference_c: f64,
    warming: &'a Warming,
    defaults_in_force: &'a [DefaultInForce],
    unlikely: Vec<String>,
    #[serde(skip_serializing_if = "Option::is_none")]
    generator: Option<&'a GeneratorSheet>,
}

#[derive(Serialize)]
struct Season {
    mean_c: Option<f64>,
    precipitation_mm: Option<f64>,
}

#[derive(Serialize)]
struct BandDocument<'a> {
    #[serde(flatten)]
    band: &'a Band,
    area_share: f64,
    #[serde(flatten)]
    climate: &'a BandClimate,
    snow_fraction: Option<f64>,
    seasonal_years_share_wilson_95: Option<[f64; 2]>,
}

impl Checked<'_> {
    /// The document.
    pub fn document(&self) -> impl Serialize + '_ {
        let mean = |values: &[(i32, f64)]| {
            (!values.is_empty())
                .then(|| values.iter().map(|(_, value)| value).sum::<f64>() / values.len() as f64)
        };
        let season = |years: &crate::baseline::SeasonYears| Season {
            mean_c: mean(&years.mean_c),
            precipitation_mm: mean(&years.precipitation_mm),
        };
        let years = self.record.series.years.len();
        let bands = self.basin.bands.iter().zip(self.basin.shares()).zip(self.climates);
        Document {
            schema_version: SCHEMA_VERSION,
            program: "thawline",
            status: "checked",
            title: self.title,
            seed: self.seed,
            record: &self.record.counts,
            suspicious: &self.record.suspicions,
            water_years_in_use: self.record.series.years.iter().map(|year| year.water_year).collect(),
            water_years_left_out: &self.record.skipped,
            station_means_as_caught: self.record.means(),
            cool_season: season(&self.seasons.cool),
            warm_season: season(&self.seasons.warm),
            gauge_multiplier: self.gauge_multiplier,
            station_precipitation_mm_per_year: self.station_precipitation_mm,
            basin_precipitation_mm_per_year: self.station_precipitation_mm * self.precipitation_ratio(),
            tmin_temperature_gradient_c_per_km: self.basin.temperature.tmin_c_per_km,
            tmax_temperature_gradient_c_per_km: self.basin.temperature.tmax_c_per_km,
            precipitation_gradient: self.basin.precipitation,
            station_snow_fraction: self.station_snow_fraction,
            basin_snow_fraction: self.basin_snow_fraction(),
            basin_area_km2: self.basin.area_km2(),
            area_beyond_stations: self.beyond_stations,
            bands: bands
                .map(|((band, area_share), climate)| BandDocument {
                    band,
                    area_share,
                    climate,
                    snow_fraction: climate.snow_fraction(),
                    seasonal_years_share_wilson_95: wilson(climate.seasonal_years, years),
                })
                .collect(),
            baseline: self.baseline,
            baseline_years: self.baseline_years,
            detrended: self.detrended,
            observed_swe: self.sites.iter().map(SiteDocument::of).collect(),
            observed_inflow: self.inflow.as_ref(),
            season: self.season,
            snow: self.snow,
            fitted: self.fitted,
            parameter_sets: self.parameter_sets,
            is_fitted: false,
            levels_c: self.levels_c,
            reference_c: self.levels_c[self.reference],
            warming: self.warming,
            defaults_in_force: self.defaults,
            unlikely: self
                .unlikely
                .iter()
                .map(|notice| format!("{}: {}", notice.about, notice.why))
                .collect(),
            generator: self.generator,
        }
    }
}
