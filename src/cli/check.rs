//! `thawline check`: reads everything a study would use and says what it found.

use super::arguments::Shared;
use super::assemble::assemble;
use super::failure::Failure;
use super::generator_sheet::{generator_sheet, realizations_of_the_sheet};
use super::output;
use super::pool::in_pool;
use super::progress::{Progress, mind_interrupts};
use super::ready::Ready;
use super::runs::halted;
use crate::baseline::Seasons;
use crate::ensemble::Watch;
use crate::findings::GeneratorSheet;
use crate::report::numbers::counted;
use crate::report::{Checked, InflowFile};
use std::path::Path;

/// Runs the command; with the generator sheet, if it is asked for.
pub(super) fn run(path: &Path, with_sheet: bool, shared: &Shared) -> Result<(), Failure> {
    let ready = assemble(path, shared)?;
    let seasons = Seasons::of(&ready.weather, ready.scenario.season.survey_dates[0]);
    let sheet = if with_sheet { Some(sheet(&ready, shared)?) } else { None };
    let checked = describe(&ready, &seasons, sheet.as_ref());
    if shared.json {
        return output::print_json(&checked.document());
    }
    if shared.quiet {
        return Ok(());
    }
    output::print(checked.words().as_bytes())
}

/// Makes the weather of realizations and holds the record against it.
fn sheet(ready: &Ready, shared: &Shared) -> Result<GeneratorSheet, Failure> {
    let progress = Progress::new(shared);
    mind_interrupts();
    let realizations = realizations_of_the_sheet(ready);
    progress.stage(&format!(
        "making the weather of {} of {} and holding the record against it",
        counted(realizations as usize, "realization"),
        counted(ready.drawn_from.years.len(), "year")
    ));
    progress.begins(realizations);
    let sheet = in_pool(shared, || generator_sheet(ready, &progress))?;
    progress.ends();
    sheet.map_err(halted)
}

fn describe<'a>(
    ready: &'a Ready,
    seasons: &'a Seasons,
    generator: Option<&'a GeneratorSheet>,
) -> Checked<'a> {
    let scenario = &ready.scenario;
    Checked {
        title: &scenario.title,
        seed: scenario.seed,
        reader: ready.reader(),
        basin: &ready.basin,
        station_elevation_m: scenario.weather.station_elevation_m,
        beyond_stations: ready.basin.beyond(&ready.stations_m()),
        record: &ready.record,
        gauge_multiplier: scenario.weather.gauge_multiplier,
        station_precipitation_mm: ready.mean_precipitation_mm(),
        station_snow_fraction: ready.station_snow_fraction(),
        seasons,
        climates: &ready.climates,
        baseline: ready.baseline.as_ref(),
        baseline_years: &ready.baseline_years,
        detrended: ready.detrended.as_ref(),
        sites: ready.sites(),
        inflow: inflow_file(ready),
        fitted: ready.fitted_from(),
        parameter_sets: ready.sets_from(),
        season: &scenario.season,
        snow: &scenario.snow,
        levels_c: &scenario.warming.levels_c,
        reference: scenario.warming.reference,
        warming: &scenario.warming.warming,
        defaults: &ready.defaults,
        unlikely: &ready.unlikely,
        generator,
    }
}

/// What the file of observed inflow holds.
fn inflow_file(ready: &Ready) -> Option<InflowFile<'_>> {
    let (typed, observed) =
        (ready.scenario.inflow.as_ref()?.observed.as_ref()?, ready.observed_inflow.as_ref()?);
    let [first, last] = observed.first_and_last()?;
    Some(InflowFile {
        file: &typed.file,
        unit: typed.columns.flow.unit,
        days: observed.hm3_a_day.len(),
        first,
        last,
        days_in_use: observed.days_in(&ready.weather),
        days_below_0: observed.negative,
        is_fitted_to: typed.fits,
    })
}
