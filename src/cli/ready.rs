//! What a command works with, and what it makes of it: sites, lanes, measures, where it all came from.

use super::arguments::Shared;
use super::failure::Failure;
use super::input::InputFile;
use crate::baseline::{Baseline, BaselineYears, Detrended, detrend};
use crate::basin::Basin;
use crate::defaults::DefaultInForce;
use crate::ensemble::{BandClimate, WinterMonths, band_climates, snow_that_piles_up};
use crate::fault::Unlikely;
use crate::findings::NamedChange;
use crate::fit::{Comparison, InflowSkill, Model, Parameters, Site, compare};
use crate::inflow::ObservedInflow;
use crate::observed::Observations;
use crate::operation::Operation;
use crate::perturb::{MonthlyChange, Recipe};
use crate::report::{FittedFrom, Input, Origin, Reader, SetsFrom};
use crate::scenario::{Fitted, ParameterSets, Scenario};
use crate::season::Measures;
use crate::snow::{Catch, LaneSpec, Lanes, OpenLedger, StationPhase, correct_catch};
use crate::weather::{Record, Series};
use std::path::Path;

/// What a command works with.
#[derive(Clone)]
pub(super) struct Ready {
    pub scenario: Scenario,
    pub basin: Basin,
    /// The record, its precipitation as the gauge caught it.
    pub record: Record,
    /// The usable years as observed, precipitation corrected for catch.
    pub weather: Series,
    /// The years that realizations are drawn from: the same, detrended where that is asked for.
    pub drawn_from: Series,
    /// The trend that was taken out of them.
    pub detrended: Option<Detrended>,
    /// Trends and steps of the record.
    pub baseline: Option<Baseline>,
    /// The years whose median is the normal.
    pub baseline_years: BaselineYears,
    /// The record band by band, without any warming.
    pub climates: Vec<BandClimate>,
    pub unlikely: Vec<Unlikely>,
    pub defaults: Vec<DefaultInForce>,
    /// What was observed at each site of the scenario.
    pub observed: Vec<Observations>,
    /// What is in force from a file of fitted parameters.
    pub fitted: Option<Fitted>,
    /// Sets of parameters that a study runs beside its own.
    pub parameter_sets: Option<ParameterSets>,
    /// What becomes of the water, where it is asked.
    pub operation: Option<Operation>,
    /// Observed inflow.
    pub observed_inflow: Option<ObservedInflow>,
    /// How near modelled inflow comes to it, once that has been asked.
    pub inflow_skill: Option<InflowSkill>,
    /// Changes of climate that have a name: the scenario's cases, and its file's projections behind them.
    pub named_changes: Vec<NamedChange>,
    /// The scenario, the bands, the weather, the sites, the files of fitted parameters, of sets of them, of projections and of
    /// observed inflow, as read.
    pub files: Vec<InputFile>,
    /// The last part of the scenario's name without the ending.
    pub stem: Option<String>,
}

/// Mean precipitation of a year of the station's series, mm.
pub(super) fn mean_yearly_mm(weather: &Series) -> f64 {
    weather.precipitation_mm.iter().sum::<f64>() / weather.years.len() as f64
}

impl Ready {
    /// Runs the record, and says what piles up in it.
    pub(super) fn look_at_the_bands(&mut self) -> Result<(), Failure> {
        let winter = WinterMonths::of(self.basin.is_southern());
        self.climates = band_climates(&self.lanes(&[MonthlyChange::NONE]), &self.weather, winter)
            .map_err(|open| Failure::Ours(open.to_string()))?;
        if !self.scenario.snow.options.start_bare_each_year {
            let years = self.weather.years.len();
            self.unlikely.extend(snow_that_piles_up(&self.climates, &self.basin.shares(), years));
        }
        Ok(())
    }

    /// What was read and the command that repeats it, without the flags that change no result.
    pub fn origin(&self, command: &str, path: &Path, shared: &Shared) -> Origin {
        let seed = shared.seed.map_or(String::new(), |seed| format!(" --seed {seed}"));
        let of_sites = std::iter::repeat_n("observed_swe", self.observed.len());
        let fitted = self.fitted.iter().map(|_| "fitted");
        let sets = self.parameter_sets.iter().map(|_| "parameter_sets");
        let projections = self.scenario.findings.projections_file.iter().map(|_| "projections");
        let roles = ["scenario", "bands", "weather"].into_iter().chain(of_sites).chain(fitted);
        let inflow = self.observed_inflow.iter().map(|_| "observed_inflow");
        let roles = roles.chain(sets).chain(projections).chain(inflow);
        let inputs = roles.zip(&self.files).map(|(role, file)| Input {
            role,
            path: file.name.clone(),
            sha256: file.sha256.clone(),
        });
        Origin {
            command: format!("thawline {command} {}{seed}", quoted(&path.display().to_string())),
            seed: self.scenario.seed,
            inputs: inputs.collect(),
        }
    }

    /// Who reads what the command says.
    pub fn reader(&self) -> Reader {
        Reader { units: self.scenario.report.units, starts: self.scenario.season.water_year_starts }
    }

    /// What is in force from a file of fitted parameters.
    pub fn fitted_from(&self) -> Option<FittedFrom<'_>> {
        let Fitted { file, taken, left, skill } = self.fitted.as_ref()?;
        Some(FittedFrom { file, taken, left, skill })
    }

    /// What is run beside the study's own parameters.
    pub fn sets_from(&self) -> Option<SetsFrom<'_>> {
        let ParameterSets { file, in_file, values, realizations, .. } = self.parameter_sets.as_ref()?;
        Some(SetsFrom { file, in_file: *in_file, realizations: *realizations, sets: values })
    }

    /// The same with other parameters: its snow, its basin, and its weather, corrected for catch and detrended anew. What was
    /// found of the record, and said of the scenario, stays that of the scenario's own.
    pub fn with(&self, parameters: &Parameters) -> Self {
        let mut ready = self.clone();
        let Parameters { snow, gauge, temperature, precipitation } = parameters.clone();
        ready.scenario.snow = snow;
        ready.scenario.weather.gauge_multiplier = gauge;
        ready.basin = Basin { temperature, precipitation, ..ready.basin };
        ready.weather = self.record.series.clone();
        let phase = StationPhase::of(&snow, self.scenario.weather.station_elevation_m);
        correct_catch(&mut ready.weather, gauge, phase);
        ready.drawn_from = ready.weather.clone();
        if let Some(year) = self.scenario.weather.detrend_to {
            // The record was long enough for it before its snow was caught otherwise.
            detrend(&mut ready.drawn_from, self.scenario.season.survey_dates[0], year);
        }
        ready
    }

    /// The sites with observed snow.
    pub fn sites(&self) -> Vec<Site<'_>> {
        let sites = self.scenario.observed.iter().zip(&self.observed).map(|(site, observations)| Site {
            name: &site.name,
            elevation_m: site.elevation_m,
            observations,
        });
        sites.collect()
    }

    /// The model against observed snow, a site each.
    pub fn comparisons(&self) -> Result<Vec<Comparison>, OpenLedger> {
        let scenario = &self.scenario;
        let model = Model {
            basin: &self.basin,
            station_m: scenario.weather.station_elevation_m,
            snow: &scenario.snow,
            weather: &self.weather,
            season: &scenario.season,
        };
        compare(&self.sites(), &model)
    }

    /// Mean yearly precipitation at the station, corrected for catch, mm.
    pub fn mean_precipitation_mm(&self) -> f64 {
        mean_yearly_mm(&self.weather)
    }

    /// Share of the station's precipitation, corrected for catch, that falls as snow at its own temperature.
    pub fn station_snow_fraction(&self) -> f64 {
        let phase = StationPhase::of(&self.scenario.snow, self.scenario.weather.station_elevation_m);
        let (mut snow_mm, mut all_mm) = (0.0, 0.0);
        for (day, amount_mm) in self.weather.precipitation_mm.iter().enumerate() {
            snow_mm += amount_mm * phase.snow_fraction(&self.weather, day);
            all_mm += amount_mm;
        }
        if all_mm > 0.0 { snow_mm / all_mm } else { 0.0 }
    }

    /// How what fell is told from what the gauge caught.
    pub fn catch(&self) -> Catch {
        let phase = StationPhase::of(&self.scenario.snow, self.scenario.weather.station_elevation_m);
        Catch { phase, multiplier: self.scenario.weather.gauge_multiplier }
    }

    /// How the study's weather is made.
    pub fn recipe(&self) -> Recipe {
        recipe_of(&self.scenario)
    }

    /// Elevations of all stations, m.
    pub fn stations_m(&self) -> Vec<f64> {
        vec![self.scenario.weather.station_elevation_m]
    }

    /// What each level changes, month by month.
    pub fn changes(&self) -> Vec<MonthlyChange> {
        let typed = &self.scenario.warming;
        typed.levels_c.iter().map(|level_c| typed.warming.at(*level_c)).collect()
    }

    /// What a study measures of every year.
    pub fn measures(&self) -> Measures {
        let options = self.scenario.snow.options;
        let mut measures = Measures::new(self.scenario.season.clone(), self.basin.area_km2());
        if options.sublimation.is_some() {
            measures = measures.with_sublimation();
        }
        if options.start_bare_each_year {
            measures = measures.with_snow_taken_away();
        }
        measures
    }

    /// Lanes of every band under each change, and a basin mean for each.
    pub fn lanes(&self, changes: &[MonthlyChange]) -> Lanes {
        let (shares, warming) = (self.basin.shares(), &self.scenario.warming.warming);
        let groups: Vec<Vec<LaneSpec<'_>>> = changes
            .iter()
            .map(|change| {
                let bands = self.basin.bands.iter().zip(&shares);
                bands
                    .map(|(band, share)| LaneSpec {
                        basin: &self.basin,
                        station_m: self.scenario.weather.station_elevation_m,
                        elevation_m: band.elevation_m,
                        ground: band.ground,
                        change,
                        warming_factor: warming.factor_at(band.elevation_m, &self.basin),
                        snow: &self.scenario.snow,
                        share: *share,
                    })
                    .collect()
            })
            .collect();
        Lanes::new(&groups)
    }
}

pub(super) fn recipe_of(scenario: &Scenario) -> Recipe {
    Recipe {
        choice: scenario.realizations.generator,
        seed: scenario.seed,
        wet_day_mm: scenario.realizations.wet_day_mm,
        water_year_starts: scenario.season.water_year_starts,
        cool_season_ends: scenario.season.survey_dates[0],
    }
}

/// A word as a shell takes it.
pub(super) fn quoted(word: &str) -> String {
    let is_plain = |c: char| c.is_ascii_alphanumeric() || "-_./+,:@%".contains(c);
    if !word.is_empty() && word.chars().all(is_plain) {
        word.to_owned()
    } else {
        format!("'{}'", word.replace('\'', "'\\''"))
    }
}
