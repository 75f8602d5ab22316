//! What is met while a scenario is read: faults, what is unlikely, defaults in force, files it names.

use super::{
    BasinTyped, Draft, FitTyped, HypsometryTyped, ObservedTyped, RealizationsTyped, RecordSource,
    ReportTyped, WarmingTyped, WeatherTyped,
};
use crate::defaults::DefaultInForce;
use crate::fault::{Fault, Unlikely};
use crate::season::SeasonSettings;
use crate::snow::SnowParams;
use std::cell::RefCell;

/// Collects what is met while a scenario is read.
#[derive(Debug, Default)]
pub(super) struct Notes {
    pub faults: RefCell<Vec<Fault>>,
    pub unlikely: RefCell<Vec<Unlikely>>,
    pub defaults: RefCell<Vec<DefaultInForce>>,
    pub named_files: RefCell<Vec<(String, String)>>,
}

type Parts = (
    Option<HypsometryTyped>,
    Option<BasinTyped>,
    Option<RecordSource>,
    Option<WeatherTyped>,
    Option<SeasonSettings>,
    Option<SnowParams>,
    Option<WarmingTyped>,
    Option<RealizationsTyped>,
    Option<ReportTyped>,
    Vec<Option<ObservedTyped>>,
    Option<FitTyped>,
);

impl Notes {
    pub fn into_draft(self, title: Option<String>, seed: u64, parts: Parts) -> Draft {
        let (
            hypsometry,
            basin,
            record_source,
            weather,
            season,
            snow,
            warming,
            realizations,
            report,
            observed,
            fit,
        ) = parts;
        Draft {
            title,
            seed,
            hypsometry,
            basin,
            record_source,
            weather,
            season,
            snow,
            fitted_file: None,
            parameter_sets: None,
            warming,
            realizations,
            report,
            observed,
            fit,
            projections_file: None,
            findings: None,
            observed_inflow: None,
            inflow: None,
            reservoir: None,
            faults: self.faults.into_inner(),
            unlikely: self.unlikely.into_inner(),
            defaults: self.defaults.into_inner(),
            named_files: self.named_files.into_inner(),
        }
    }
}
