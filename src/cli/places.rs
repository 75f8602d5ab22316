//! What is found of places and of kinds of years: the weather once more, and winters at every level.

use super::ready::Ready;
use crate::baseline;
use crate::calendar::MonthDay;
use crate::ensemble::{
    BandClimate, Plan, RecordYear, Seasons, WinterMonths, band_climates, cool_season_mean_c,
};
use crate::findings::{Findings, Places, PlacesQuestions, RecordCoincidence, RecordValues};
use crate::perturb::MonthlyChange;
use crate::season::{Measure, precipitation_before};
use crate::snow::OpenLedger;

/// Of a study's runs; `changes` are what its plan's levels do.
pub(super) fn places(
    ready: &Ready,
    plan: &Plan<'_>,
    changes: &[MonthlyChange],
    study: &Seasons,
    findings: &Findings,
) -> Result<Option<Places>, OpenLedger> {
    let survey = headline_survey(ready);
    let winter = WinterMonths::of(ready.basin.is_southern());
    // One level at a time: the climates are told of lanes that hold one.
    let winters = changes.iter().map(|change| {
        let climates = band_climates(&ready.lanes(std::slice::from_ref(change)), &ready.drawn_from, winter)?;
        Ok(climates.iter().map(|climate: &BandClimate| climate.winter_mean_c).collect())
    });
    let winter_mean_c = winters.collect::<Result<Vec<Vec<f64>>, OpenLedger>>()?;
    let cool_mean_c = cool_season_mean_c(plan, changes, survey);
    let questions = PlacesQuestions {
        study,
        bands: &ready.basin.bands,
        seed: ready.scenario.seed,
        precipitation: &precipitation_before(survey),
        cool_mean_c: cool_mean_c.as_ref(),
        winter_mean_c: &winter_mean_c,
        low_snow_below_quantile: ready.scenario.findings.low_snow.below_quantile,
        snow_line_swe_mm: ready.scenario.findings.snow_line.swe_mm,
    };
    Ok(Places::of(&questions, findings))
}

/// Dry and warm years of the record itself at the reference, its temperatures as observed; nothing where there is no cool season.
pub(super) fn of_record(
    ready: &Ready,
    years: &[RecordYear],
    measures: &[Measure],
) -> Option<RecordCoincidence> {
    let survey = headline_survey(ready);
    let name = precipitation_before(survey);
    let precipitation = measures.iter().position(|measure| measure.name == name)?;
    let mean_c = baseline::Seasons::of(&ready.weather, survey).cool.mean_c;
    let of_year = |year: &RecordYear| {
        let (_, mean_c) = mean_c.iter().find(|(water_year, _)| *water_year == year.water_year)?;
        Some((year.water_year, [*year.values.first()?, *year.values.get(precipitation)?, *mean_c]))
    };
    let values: Vec<RecordValues> = years.iter().filter_map(of_year).collect();
    let asked = &ready.scenario.findings;
    RecordCoincidence::of(&values, asked.low_snow.below_quantile, asked.periods_compared.last_years)
}

/// Adds it to what was found of places.
pub(super) fn with_record(
    findings: Findings,
    ready: &Ready,
    years: &[RecordYear],
    measures: &[Measure],
) -> Findings {
    let record_coincidence = of_record(ready, years, measures);
    let places = findings.places.map(|places| Places { record_coincidence, ..places });
    Findings { places, ..findings }
}

fn headline_survey(ready: &Ready) -> MonthDay {
    ready.scenario.season.survey_dates[0]
}
