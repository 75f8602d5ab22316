//! Everything a report is made of, gathered by the command that ran the study.

use super::numbers::counted;
use super::reader::Reader;
use crate::baseline::{Baseline, Detrended};
use crate::basin::{Basin, BeyondStations};
use crate::defaults::DefaultInForce;
use crate::ensemble::RecordYear;
use crate::fault::Unlikely;
use crate::findings::Findings;
use crate::fit::{SkillInShort, Value};
use crate::operation::Operation;
use crate::perturb::{GeneratorChoice, Warming};
use crate::season::{Measure, SeasonSettings};
use crate::snow::{GaugeMultiplier, SnowParams};
use crate::weather::{Counts, SkippedYear};
use serde::Serialize;

/// A finished study.
pub struct Study<'a> {
    /// Its title.
    pub title: &'a str,
    /// Who reads it.
    pub reader: Reader,
    /// The basin.
    pub basin: &'a Basin,
    /// Elevation of the station, m.
    pub station_elevation_m: f64,
    /// Area of the basin beyond its stations.
    pub beyond_stations: Option<BeyondStations>,
    /// Snow of the headline measure, at the reference, beyond its stations.
    pub swe_beyond_stations: Option<BeyondStations>,
    /// Gauge catch.
    pub gauge_multiplier: GaugeMultiplier,
    /// Dates and windows.
    pub season: &'a SeasonSettings,
    /// Snow parameters.
    pub snow: &'a SnowParams,
    /// What is in force from a file of fitted parameters.
    pub fitted: Option<FittedFrom<'a>>,
    /// Sets of parameters that were run beside the study's own.
    pub parameter_sets: Option<SetsFrom<'a>>,
    /// What becomes of the water, where it is asked; its routing the one in force.
    pub operation: Option<&'a Operation>,
    /// Warming's shape and precipitation.
    pub warming: &'a Warming,
    /// Assumed standard deviation of the change of mean precipitation, percent.
    pub mean_change_sd_pct: Option<f64>,
    /// What makes the realizations.
    pub generator: GeneratorChoice,
    /// A day is wet whose precipitation lies above this, mm.
    pub wet_day_mm: f64,
    /// The record.
    pub record: Record<'a>,
    /// What was found.
    pub findings: &'a Findings,
    /// Defaults in force.
    pub defaults: &'a [DefaultInForce],
    /// What is unlikely.
    pub unlikely: &'a [Unlikely],
    /// How the study is repeated, and from what.
    pub origin: Origin,
}

/// The record as the report needs it.
pub struct Record<'a> {
    /// Counts.
    pub counts: &'a Counts,
    /// Years left out.
    pub skipped: &'a [SkippedYear],
    /// The years in use, measured at the reference.
    pub years: Vec<RecordYear>,
    /// What was measured.
    pub measures: &'a [Measure],
    /// Mean yearly precipitation at the station after the catch correction, mm.
    pub mean_precipitation_mm: f64,
    /// Trends and steps.
    pub baseline: Option<&'a Baseline>,
    /// The trend that was taken out of the years that realizations are drawn from.
    pub detrended: Option<&'a Detrended>,
}

impl Study<'_> {
    /// The basin's mean elevation, at which a level is what it is called, where it changes with elevation, m.
    pub fn mean_elevation_of_warming_m(&self) -> Option<f64> {
        (self.warming.level_change_pct_per_1000m != 0.0).then(|| self.basin.mean_elevation_m())
    }
}

impl Record<'_> {
    /// Mean and coefficient of variation (sample standard deviation over mean) of the headline measure over the record's
    /// years, where it is an amount above 0 in at least two years.
    pub fn headline_mean_and_variation(&self) -> Option<[f64; 2]> {
        let values: Vec<f64> =
            self.years.iter().map(|year| year.values[0]).filter(|v| v.is_finite()).collect();
        let n = values.len() as f64;
        let mean = values.iter().sum::<f64>() / n;
        let squares = values.iter().map(|value| (value - mean) * (value - mean)).sum::<f64>();
        (n >= 2.0 && mean > 0.0).then(|| [mean, (squares / (n - 1.0)).sqrt() / mean])
    }
}

/// What is in force from a file of fitted parameters.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct FittedFrom<'a> {
    /// The file, as the scenario names it.
    pub file: &'a str,
    /// Keys and values taken from it.
    pub taken: &'a [Value],
    /// Keys of it that the scenario states itself, or that its rules and options do not have.
    pub left: &'a [&'static str],
    /// How the fit did, a site each; of files that say so.
    pub skill: &'a [SkillInShort],
}

impl FittedFrom<'_> {
    /// What was taken, in words.
    pub fn words(&self) -> String {
        let keys: Vec<&str> = self.taken.iter().map(|value| value.key).collect();
        let taken = if keys.is_empty() {
            format!("Nothing is taken from the fitted parameters of {}", self.file)
        } else {
            format!("Fitted to observed snow, from {}: {}", self.file, keys.join(", "))
        };
        if self.left.is_empty() {
            return taken + ".";
        }
        format!(
            "{taken}. Left, since the scenario states them itself or its rules do not have them: {}.",
            self.left.join(", ")
        )
    }
}

/// Sets of parameters that a study runs beside its own.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct SetsFrom<'a> {
    /// The file, as the scenario names it.
    pub file: &'a str,
    /// Sets in it.
    pub in_file: usize,
    /// Realizations of each that is run, the first of the study.
    pub realizations: u32,
    /// What each that is run changes.
    pub sets: &'a [Vec<Value>],
}

impl SetsFrom<'_> {
    /// Keys of which all sets have the same value, as where a fit stopped at a bound; none of a single set.
    fn never_differ(&self) -> Vec<&'static str> {
        let Some((first, others)) = self.sets.split_first().filter(|(_, others)| !others.is_empty()) else {
            return Vec::new();
        };
        let is_same = |value: &&Value| others.iter().all(|set| set.contains(value));
        first.iter().filter(is_same).map(|value| value.key).collect()
    }

    /// What is run, in words.
    pub fn words(&self) -> String {
        let keys: Vec<&str> = self.sets.iter().take(1).flatten().map(|value| value.key).collect();
        let all = if self.sets.len() == self.in_file {
            "all of".to_owned()
        } else {
            format!("the first of {} in", self.in_file)
        };
        let mut words = format!(
            "{} of parameters, {all} {}, with {} of each: {}.",
            counted(self.sets.len(), "set"),
            self.file,
            counted(self.realizations as usize, "realization"),
            keys.join(", ")
        );
        let same = self.never_differ();
        if !same.is_empty() {
            words += &format!(
                " All sets have one value of {}: what another would do is not in this spread.",
                same.join(", ")
            );
        }
        words
    }
}

/// Where a study comes from.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Origin {
    /// The command that repeats it.
    pub command: String,
    /// Seed in force.
    pub seed: u64,
    /// Files and digests: scenario, bands, weather.
    pub inputs: Vec<Input>,
}

/// A file that was read.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Input {
    /// What it is.
    pub role: &'static str,
    /// Its path as typed; of a data file, relative to the scenario.
    pub path: String,
    /// SHA-256 of its bytes.
    pub sha256: String,
}
