//! From a scenario's path to everything a command needs, or all faults of the scenario and its data in one go.

use super::arguments::Shared;
use super::clashes::clashes;
use super::failure::Failure;
use super::input::{InputFile, ScenarioFile, missing_file, read_data, read_scenario};
use crate::baseline::{
    BASELINE_YEARS_KEY, Baseline, BaselineChoice, BaselineYears, Detrended, LEAST_YEARS, detrend,
};
use crate::basin::{Basin, GroundStated};
use crate::defaults::DefaultInForce;
use crate::ensemble::{BandClimate, WinterMonths, band_climates, snow_that_piles_up};
use crate::fault::{Fault, Unlikely};
use crate::fit::{Comparison, Model, Site, compare};
use crate::observed::Observations;
use crate::perturb::{MonthlyChange, Recipe};
use crate::report::{FittedFrom, Input, Origin, Reader};
use crate::scenario::{Document, Draft, FITTED_KEY, Fitted, ObservedTyped, Scenario, read_fitted};
use crate::season::Measures;
use crate::snow::{LaneSpec, Lanes, OpenLedger, StationPhase, correct_catch};
use crate::table::Encoding;
use crate::units::cubic_hectometres;
use crate::weather::{Record, Series};
use std::path::Path;

/// What a command works with.
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
    /// The scenario, the bands, the weather, the sites, the file of fitted parameters, as read.
    pub files: Vec<InputFile>,
    /// The last part of the scenario's name without the ending.
    pub stem: Option<String>,
}

/// Reads the scenario and the files it names, and checks them all.
pub(super) fn assemble(path: &Path, shared: &Shared) -> Result<Ready, Failure> {
    let ScenarioFile { file, folder, stem } = read_scenario(path)?;
    let document = Document::parse(&file.text);
    let mut draft = crate::scenario::read(&document);
    if let Some(seed) = shared.seed {
        draft.seed = seed;
        draft.defaults.retain(|default| default.key != "seed");
    }
    let mut faults = std::mem::take(&mut draft.faults);
    let fitted = take(read_fitted_of(&mut draft, &document, &folder), &mut faults).flatten();
    let bands = take(read_bands_of(&draft, &folder), &mut faults).flatten();
    let record = take(read_record_of(&draft, &folder), &mut faults).flatten();
    let observed = read_observed_of(&draft, &folder, &mut faults);
    for (key, name) in &draft.named_files {
        let is_read = match key.as_str() {
            key if key.starts_with("basin.") => draft.hypsometry.is_some(),
            FITTED_KEY => true,
            "weather.file" => draft.record_source.is_some() && draft.season.is_some(),
            of_site => draft.observed.iter().flatten().any(|site| of_site == file_key(site)),
        };
        if !is_read {
            faults.extend(missing_file(&folder, name, key));
        }
    }
    match (draft.complete(), bands, record) {
        (Some(scenario), Some((bands, bands_file)), Some((record, weather_file))) if faults.is_empty() => {
            let basin = Basin {
                latitude_deg: scenario.basin.latitude_deg,
                bands,
                temperature: scenario.basin.temperature.clone(),
                precipitation: scenario.basin.precipitation,
            };
            let mut weather = record.series.clone();
            let clashes = clashes(&scenario, basin.bands.len(), &weather);
            if !clashes.is_empty() {
                return Err(refused(&clashes, &file, shared));
            }
            let phase = StationPhase::of(&scenario.snow, scenario.weather.station_elevation_m);
            correct_catch(&mut weather, scenario.weather.gauge_multiplier, phase);
            let survey = scenario.season.survey_dates[0];
            let mut drawn_from = weather.clone();
            let detrended = scenario.weather.detrend_to.and_then(|year| {
                let detrended = detrend(&mut drawn_from, survey, year);
                detrended.or_else(|| {
                    faults.push(too_short_to_detrend(&weather));
                    None
                })
            });
            let of_generator = recipe_of(&scenario).check(&drawn_from).map_err(|fault| vec![fault]);
            let of_generator = take(of_generator, &mut faults).flatten();
            let stated = scenario.weather.baseline_years;
            let baseline_years = BaselineYears::of(stated, &weather.years).map_err(|fault| vec![fault]);
            let Some(baseline_years) = take(baseline_years, &mut faults).filter(|_| faults.is_empty()) else {
                return Err(refused(&faults, &file, shared));
            };
            let baseline = Baseline::of(&weather, survey);
            let of_columns = scenario.basin.hypsometry.unlikely(&bands_file.name, &bands_file.text);
            let mut files = vec![file.clone(), bands_file, weather_file];
            let mut unlikely = draft.unlikely;
            unlikely.extend(record.unlikely(basin.is_southern()));
            let station_m = scenario.weather.station_elevation_m;
            unlikely.extend(of_columns);
            unlikely.extend(basin.unlikely(station_m));
            unlikely.extend(basin.unused_ground(GroundStated {
                slope: scenario.snow.options.radiation.is_some(),
                canopy: true,
                variation: scenario.snow.options.patchiness.is_some(),
            }));
            unlikely.extend(scenario.snow.options.radiation.and_then(|_| basin.level_under_the_sun()));
            unlikely.extend(scenario.warming.warming.unlikely_in(&basin));
            unlikely
                .extend(baseline.iter().flat_map(|baseline| baseline.unlikely(scenario.weather.detrend_to)));
            let yearly_mm = basin.precipitation_ratio(station_m) * mean_yearly_mm(&weather);
            unlikely.extend(scenario.season.unlikely(cubic_hectometres(yearly_mm, basin.area_km2())));
            let mut observations = Vec::with_capacity(observed.len());
            for (site, (observed, file)) in scenario.observed.iter().zip(observed) {
                unlikely.extend(observed.unlikely(&site.key, site.elevation_m, &basin, station_m));
                unlikely.extend(observed.unit_slip(&site.key, site.columns.swe.unit, &weather));
                unlikely.extend(observed.unused(&site.key, &weather));
                observations.push(observed);
                files.push(file);
            }
            unlikely.extend(baseline_years.unlikely());
            unlikely.extend(of_generator);
            let (fitted, fitted_file) = fitted.unzip();
            files.extend(fitted_file);
            let mut defaults = draft.defaults;
            note_baseline_years(&baseline_years, &mut defaults);
            let mut ready = Ready {
                scenario,
                basin,
                record,
                weather,
                drawn_from,
                detrended,
                baseline,
                baseline_years,
                climates: Vec::new(),
                unlikely,
                defaults,
                observed: observations,
                fitted,
                files,
                stem,
            };
            ready.look_at_the_bands()?;
            Ok(ready)
        }
        _ => Err(refused(&faults, &file, shared)),
    }
}

/// What is said of a scenario that is not taken. One without a single fault is none of the user's: something was not read and
/// nobody said so.
fn refused(faults: &[Fault], scenario: &InputFile, shared: &Shared) -> Failure {
    if faults.is_empty() {
        return Failure::Ours("part of the scenario was not read, and no fault was found in it".to_owned());
    }
    Failure::input(faults, &scenario.name, &scenario.text, shared.is_coloured())
}

fn read_bands_of(
    draft: &Draft,
    folder: &Path,
) -> Result<Option<(Vec<crate::basin::Band>, InputFile)>, Vec<Fault>> {
    let Some(typed) = &draft.hypsometry else {
        return Ok(None);
    };
    let file = read_data(folder, &typed.file, typed.key, typed.encoding()).map_err(|fault| vec![fault])?;
    let bands = typed.bands(&file.name, &file.text)?;
    Ok(Some((bands, file)))
}

fn read_record_of(draft: &Draft, folder: &Path) -> Result<Option<(Record, InputFile)>, Vec<Fault>> {
    let (Some(typed), Some(season)) = (&draft.record_source, &draft.season) else {
        return Ok(None);
    };
    let file = read_data(folder, &typed.file, "weather.file", typed.columns.format.encoding)
        .map_err(|fault| vec![fault])?;
    let start = season.water_year_starts;
    let record = crate::weather::read(
        &file.name,
        &file.text,
        &typed.columns,
        start,
        season.survey_dates[0],
        &typed.limits,
    )?;
    Ok(Some((record, file)))
}

/// Notes the baseline years among the other defaults of `[weather]`, unless they were typed.
fn note_baseline_years(years: &BaselineYears, defaults: &mut Vec<DefaultInForce>) {
    if years.choice == BaselineChoice::Stated {
        return;
    }
    let after = defaults.iter().rposition(|default| default.key.starts_with("weather."));
    let noted = DefaultInForce {
        key: BASELINE_YEARS_KEY.to_owned(),
        value: format!("[{}, {}]", years.first, years.last),
        with: None,
    };
    defaults.insert(after.map_or(defaults.len(), |at| at + 1), noted);
}

fn too_short_to_detrend(weather: &Series) -> Fault {
    Fault::key(
        "weather.detrend_to",
        format!("a trend asked of {} usable water years", weather.years.len()),
        format!("at least {LEAST_YEARS}"),
        "take it out: no trend can be told from so few years",
    )
}

/// Reads the file of every site whose table has no fault.
fn read_observed_of(draft: &Draft, folder: &Path, faults: &mut Vec<Fault>) -> Vec<(Observations, InputFile)> {
    let mut read = Vec::with_capacity(draft.observed.len());
    for site in draft.observed.iter().flatten() {
        let file = read_data(folder, &site.file, &file_key(site), site.columns.format.encoding);
        let observations = file.map_err(|fault| vec![fault]).and_then(|file| {
            let observations = crate::observed::read(&file.name, &file.text, &site.columns)?;
            Ok((observations, file))
        });
        read.extend(take(observations, faults));
    }
    read
}

/// Reads the file of fitted parameters, and takes from it what the scenario does not state itself.
fn read_fitted_of(
    draft: &mut Draft,
    document: &Document<'_>,
    folder: &Path,
) -> Result<Option<(Fitted, InputFile)>, Vec<Fault>> {
    let Some(name) = draft.fitted_file.clone() else {
        return Ok(None);
    };
    let file = read_data(folder, &name, FITTED_KEY, Encoding::Utf8).map_err(|fault| vec![fault])?;
    let values = read_fitted(&file.name, &file.text)?;
    Ok(draft.take_fitted(&name, &values, document).map(|fitted| (fitted, file)))
}

fn file_key(site: &ObservedTyped) -> String {
    format!("{}.file", site.key)
}

fn take<T>(result: Result<T, Vec<Fault>>, faults: &mut Vec<Fault>) -> Option<T> {
    result.map_err(|more| faults.extend(more)).ok()
}

/// Mean precipitation of a year of the station's series, mm.
fn mean_yearly_mm(weather: &Series) -> f64 {
    weather.precipitation_mm.iter().sum::<f64>() / weather.years.len() as f64
}

impl Ready {
    /// Runs the record, and says what piles up in it.
    fn look_at_the_bands(&mut self) -> Result<(), Failure> {
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
        let roles = ["scenario", "bands", "weather"].into_iter().chain(of_sites).chain(["fitted"]);
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
        let Fitted { file, taken, left } = self.fitted.as_ref()?;
        Some(FittedFrom { file, taken, left })
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

fn recipe_of(scenario: &Scenario) -> Recipe {
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
