//! The weather that a study would make, held against the record that it is made from.

use super::ready::Ready;
use crate::ensemble::{Halt, SurveySwe, Watch};
use crate::findings::{GeneratorSheet, REALIZATIONS_OF_THE_SHEET, SheetQuestions};
use crate::weather::Series;

/// Realizations that are made for the sheet: no more than the study has.
pub(super) fn realizations_of_the_sheet(ready: &Ready) -> u32 {
    ready.scenario.realizations.count.min(REALIZATIONS_OF_THE_SHEET)
}

/// Makes as many years a realization as the record has in use, without an assumed change of mean precipitation, and runs
/// them and the record through the reference.
///
/// # Errors
/// Those of a run.
pub(super) fn generator_sheet(ready: &Ready, watch: &dyn Watch) -> Result<GeneratorSheet, Halt> {
    let scenario = &ready.scenario;
    let record = &ready.drawn_from;
    let (warming, season) = (&scenario.warming, &scenario.season);
    let survey = season.survey_dates[0];
    let lanes = ready.lanes(&[warming.warming.at(warming.levels_c[warming.reference])]);
    let snow = SurveySwe { lanes: &lanes, bands: ready.basin.bands.len(), survey };
    let questions = SheetQuestions::new(scenario.realizations.wet_day_mm, season.water_year_starts, survey);
    let sample = |weather: &Series, survey_swe_mm: &[f64]| questions.sample(weather, survey_swe_mm);
    let of_record = sample(record, &snow.of_record(record)?);
    let made = ready.recipe().of(record);
    let realizations =
        snow.each_realization(&*made, realizations_of_the_sheet(ready), record.years.len(), watch, sample)?;
    Ok(GeneratorSheet { fitted: made.fitted(), ..GeneratorSheet::of(&questions, &of_record, &realizations) })
}
