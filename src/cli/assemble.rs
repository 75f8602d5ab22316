//! From a scenario's path to everything a command needs, or all faults of the scenario and its data in one go.

use super::arguments::Shared;
use super::clashes::clashes;
use super::failure::Failure;
use super::input::{InputFile, ScenarioFile, missing_file, read_data, read_scenario};
use super::ready::{Ready, mean_yearly_mm, recipe_of};
use crate::baseline::{BASELINE_YEARS_KEY, Baseline, BaselineChoice, BaselineYears, LEAST_YEARS, detrend};
use crate::basin::{Basin, GroundStated};
use crate::defaults::DefaultInForce;
use crate::fault::{Fault, Unlikely};
use crate::findings::NamedChange;
use crate::inflow::ObservedInflow;
use crate::observed::Observations;
use crate::operation::{Operation, OperationSettings};
use crate::scenario::{
    Document, Draft, FITTED_KEY, Fitted, OBSERVED_INFLOW_KEY, ObservedTyped, PARAMETER_SETS_KEY,
    PROJECTIONS_KEY, ParameterSets, Scenario, read_fitted, read_parameter_sets, read_projections,
};
use crate::snow::{StationPhase, correct_catch};
use crate::table::Encoding;
use crate::units::cubic_hectometres;
use crate::weather::{Record, Series};
use std::path::Path;

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
    let parameter_sets = take(read_parameter_sets_of(&draft, &document, &folder), &mut faults).flatten();
    let projections = take(read_projections_of(&draft, &folder), &mut faults).flatten();
    let bands = take(read_bands_of(&draft, &folder), &mut faults).flatten();
    let record = take(read_record_of(&draft, &folder), &mut faults).flatten();
    let observed = read_observed_of(&draft, &folder, &mut faults);
    let inflow = take(read_observed_inflow_of(&draft, &folder), &mut faults).flatten();
    for (key, name) in &draft.named_files {
        let is_read = match key.as_str() {
            key if key.starts_with("basin.") => draft.hypsometry.is_some(),
            FITTED_KEY => true,
            PARAMETER_SETS_KEY => draft.parameter_sets.is_some(),
            PROJECTIONS_KEY => true,
            OBSERVED_INFLOW_KEY => draft.observed_inflow.is_some(),
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
            let yearly_hm3 = cubic_hectometres(yearly_mm, basin.area_km2());
            unlikely.extend(scenario.season.unlikely(yearly_hm3));
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
            let (parameter_sets, sets_file) = parameter_sets.unzip();
            files.extend(sets_file);
            unlikely.extend(parameter_sets.iter().filter_map(ParameterSets::unlikely));
            let panel = scenario.findings.rule_panel;
            unlikely.extend(panel.and_then(|panel| panel.unlikely(scenario.warming.levels_c.len())));
            let mut named_changes = scenario.findings.cases.clone();
            let (projections, projections_file) = projections.unzip();
            files.extend(projections_file);
            named_changes.extend(projections.unwrap_or_default());
            let (observed_inflow, inflow_file) = inflow.unzip();
            files.extend(inflow_file);
            let unused = observed_inflow.as_ref().and_then(|observed| observed.unused(&weather));
            let is_observed = observed_inflow.is_some() && unused.is_none();
            unlikely.extend(observed_inflow.iter().flat_map(|observed| observed.unlikely(yearly_hm3)));
            unlikely.extend(unused);
            unlikely.extend(classes_without_window(&scenario));
            let operation = operation_of(&scenario, basin.area_km2(), is_observed);
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
                parameter_sets,
                named_changes,
                operation,
                observed_inflow,
                inflow_skill: None,
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

/// Classes of years by a window's inflow where there is no window.
fn classes_without_window(scenario: &Scenario) -> Option<Unlikely> {
    let limits = scenario.inflow.as_ref().map(|inflow| inflow.year_class_limits_hm3.len())?;
    (limits > 0 && scenario.season.volume_windows.is_empty()).then(|| {
        Unlikely::new(
            "inflow",
            "limits of classes of years are stated, and season.volume_windows has no window whose inflow they are of: there are no classes",
        )
    })
}

/// What becomes of the water, where the scenario asks it.
fn operation_of(scenario: &Scenario, area_km2: f64, is_observed: bool) -> Option<Operation> {
    let inflow = scenario.inflow.as_ref()?;
    let reservoir = scenario.reservoir.as_ref();
    let settings = OperationSettings {
        water_year_starts: scenario.season.water_year_starts,
        volume_windows: scenario.season.volume_windows.clone(),
        shares_before: scenario.season.outflow_before.clone(),
        storage_dates: reservoir.map_or_else(Vec::new, |typed| typed.storage_dates.clone()),
        is_observed,
    };
    Some(Operation {
        settings,
        area_km2,
        routing: inflow.routing,
        reservoir: reservoir.map(|typed| typed.reservoir.clone()),
        changes: reservoir.map_or_else(Vec::new, |typed| typed.changes.clone()),
    })
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
    let fitted = read_fitted(&file.name, &file.text)?;
    Ok(draft.take_fitted(&name, fitted, document).map(|fitted| (fitted, file)))
}

/// Reads the file of sets of parameters that a study runs beside its own.
fn read_parameter_sets_of(
    draft: &Draft,
    document: &Document<'_>,
    folder: &Path,
) -> Result<Option<(ParameterSets, InputFile)>, Vec<Fault>> {
    let Some(typed) = &draft.parameter_sets else {
        return Ok(None);
    };
    let file =
        read_data(folder, &typed.file, PARAMETER_SETS_KEY, Encoding::Utf8).map_err(|fault| vec![fault])?;
    let sets = read_parameter_sets(&file.name, &file.text)?;
    Ok(draft.parameter_sets(&sets, document)?.map(|sets| (sets, file)))
}

/// Reads the file of projections.
fn read_projections_of(
    draft: &Draft,
    folder: &Path,
) -> Result<Option<(Vec<NamedChange>, InputFile)>, Vec<Fault>> {
    let Some(name) = &draft.projections_file else {
        return Ok(None);
    };
    let file = read_data(folder, name, PROJECTIONS_KEY, Encoding::Utf8).map_err(|fault| vec![fault])?;
    let projections = read_projections(&file.name, &file.text)?;
    Ok(Some((projections, file)))
}

/// Reads the file of observed inflow.
fn read_observed_inflow_of(
    draft: &Draft,
    folder: &Path,
) -> Result<Option<(ObservedInflow, InputFile)>, Vec<Fault>> {
    let Some(typed) = &draft.observed_inflow else {
        return Ok(None);
    };
    let file = read_data(folder, &typed.file, OBSERVED_INFLOW_KEY, typed.columns.format.encoding)
        .map_err(|fault| vec![fault])?;
    let observed = crate::inflow::read(&file.name, &file.text, &typed.columns)?;
    Ok(Some((observed, file)))
}

fn file_key(site: &ObservedTyped) -> String {
    format!("{}.file", site.key)
}

fn take<T>(result: Result<T, Vec<Fault>>, faults: &mut Vec<Fault>) -> Option<T> {
    result.map_err(|more| faults.extend(more)).ok()
}
