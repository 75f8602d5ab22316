//! The runs of a study, one after another, and what they answer.

use super::failure::Failure;
use super::generator_sheet::{generator_sheet, realizations_of_the_sheet};
use super::level_groups::LevelGroups;
use super::own_years::own_years;
use super::parameter_sets::{realizations_of_sets, run_sets};
use super::places::places;
use super::progress::Progress;
use super::ready::Ready;
use super::rule_panel::rule_panel;
use super::surface::warmed;
use crate::calendar::{COMMON_DATES, WaterYearStart};
use crate::ensemble::{BasinSeasons, Halt, LevelGroup, Plan, Seasons, SweBins, Watch, run, run_records};
use crate::findings::{
    ByYear, ByYearQuestions, Findings, Operations, OperationsQuestions, OtherChange, ParameterSpread,
    PoolShown, Questions, REALIZATIONS_OF_A_RECORD, RESAMPLED_RECORDS, RecordOdds, Refit, RefitOdds, Runs,
    TIMES_ASSUMED, answer, warm_year_biases,
};
use crate::perturb::{Generator, MeanChange, TemperatureHeld};
use crate::reservoir::Reservoir;
use crate::season::Measures;
use crate::snow::{OpenLedger, Path};
use crate::weather::Series;
use ndarray::Axis;
use rayon::prelude::*;

/// Runs every realization under every level; the reference once more with temperatures held, and for every change of
/// mean precipitation that stands beside the assumed one; and some realizations from each of a number of resampled
/// records, and from each set of parameters that the scenario names, under every level; and the weather alone of realizations as long as the record, to hold it against that. The same
/// streams throughout, so that all differences are paired.
pub(super) fn find(ready: &Ready, measures: &Measures, progress: &Progress) -> Result<Findings, Failure> {
    let scenario = &ready.scenario;
    let (warming, realizations) = (&scenario.warming, &scenario.realizations);
    let groups = LevelGroups::of(ready);
    let lanes = groups.lanes(&groups.changes);
    let reference_lanes = ready.lanes(&groups.changes[warming.reference..=warming.reference]);
    let mean_change_sd_pct = realizations.mean_change_sd_pct.unwrap_or(0.0);
    let recipe = ready.recipe();
    let made = recipe.of(&ready.drawn_from);
    let weather = groups.weather(&*made);
    let generators = groups.changed(&weather);
    let reference_generator = generators[groups.of_reference];
    let of_groups: Vec<LevelGroup<'_>> =
        lanes.iter().zip(&generators).map(|(lanes, generator)| LevelGroup { lanes, generator }).collect();
    let plan = Plan {
        groups: &of_groups,
        reference: warming.reference,
        bands: ready.basin.bands.len(),
        measures,
        operation: ready.operation.as_ref(),
        realizations: realizations.count,
        years: realizations.years,
        path: Path::default(),
    };
    let times_assumed: &[f64] = if mean_change_sd_pct > 0.0 { &TIMES_ASSUMED } else { &[] };
    let of_a_record = realizations.count.min(REALIZATIONS_OF_A_RECORD);
    let times = times_assumed.len() as u32 + 2;
    let of_sets = realizations_of_sets(ready);
    progress.begins(realizations.count * times + of_a_record + of_sets + realizations_of_the_sheet(ready));

    let bins = SweBins::of_record(&ready.lanes(&ready.changes()), &ready.drawn_from).map_err(open)?;
    let study = run(&plan, bins, progress).map_err(halted)?;
    let held = TemperatureHeld::new(&reference_generator, &ready.drawn_from);
    let held = [LevelGroup { lanes: &reference_lanes, generator: &held }];
    let of_reference = Plan { groups: &held, reference: 0, ..plan };
    let held = run(&of_reference, bins, progress).map_err(halted)?;
    let mut other_changes = Vec::with_capacity(times_assumed.len());
    for times_assumed in times_assumed.iter().copied() {
        let standard_deviation_pct = mean_change_sd_pct * times_assumed;
        let generator = MeanChange { standard_deviation_pct, ..reference_generator };
        let only: [Vec<&dyn Generator>; 1] = [vec![&generator]];
        let reference = run_records(&of_reference, &only, progress).map_err(halted)?;
        other_changes.extend(reference.map(|reference| OtherChange { times_assumed, reference }));
    }
    let resampled = |number: u32| recipe.resampled_record(&ready.drawn_from, number);
    let records: Vec<Series> = (0..RESAMPLED_RECORDS).map(resampled).collect();
    let made_of_records: Vec<Box<dyn Generator + Send + '_>> =
        records.par_iter().map(|record| recipe.of(record)).collect();
    let weather_of_records: Vec<_> = made_of_records.iter().map(|made| groups.weather(&**made)).collect();
    let changed: Vec<_> = weather_of_records.iter().map(|weather| groups.changed(weather)).collect();
    let of_each_record: Vec<Vec<&dyn Generator>> =
        changed.iter().map(|changed| changed.iter().map(|of_group| of_group as _).collect()).collect();
    let of_records = Plan { realizations: of_a_record, ..plan };
    let of_records = run_records(&of_records, &of_each_record, progress).map_err(halted)?;
    let (record_years_in_use, reference) = (ready.drawn_from.years.len(), warming.reference);
    let odds_of = |seasons: &BasinSeasons| {
        let below_quantile = scenario.findings.low_snow.below_quantile;
        RefitOdds::of(seasons, record_years_in_use, reference, below_quantile)
    };
    let refit = |seasons: BasinSeasons| {
        (Refit::of(&seasons, record_years_in_use, &warming.levels_c, reference), odds_of(&seasons))
    };
    let (refits, refit_odds): (Vec<Refit>, Vec<Option<RefitOdds>>) = of_records.map(refit).unzip();
    let of_sets = match &ready.parameter_sets {
        Some(sets) => Some(run_sets(ready, sets, &plan, &study.basin, progress).map_err(halted)?),
        None => None,
    };
    let generator_sheet = generator_sheet(ready, progress).map_err(halted)?;

    progress.stage("running warming together with changes of precipitation");
    let (surface, break_even) = warmed(ready, &plan, &groups, &*made, &Quiet(progress)).map_err(halted)?;

    let rule_panel = rule_panel(ready, &plan, &study.basin, progress).map_err(halted)?;

    progress.stage("answering questions about them");
    let runs =
        Runs { study: &study, temperature_held: Some(&held), other_changes: &other_changes, refits: &refits };
    let questions = Questions {
        levels_c: &warming.levels_c,
        reference: warming.reference,
        bands: &ready.basin.bands,
        mean_change_sd_pct,
        criteria: &scenario.findings.criteria(ready.basin.area_km2()),
        seed: scenario.seed,
    };
    let findings = answer(&runs, &questions, progress).map_err(halted)?;
    let places = places(ready, &plan, &groups.changes, &study, &findings).map_err(open)?;
    let (record_years, _) = own_years(ready, measures)?;
    let asked = &scenario.findings;
    let by_year = ByYear::of(
        &study.basin,
        &ByYearQuestions {
            levels_c: &warming.levels_c,
            reference: warming.reference,
            seed: scenario.seed,
            low_snow_below_quantile: asked.low_snow.below_quantile,
            warming_rate: asked.warming_rate,
            redraws_years: scenario.realizations.generator.redraws_years(),
            changes_mean: mean_change_sd_pct != 0.0,
            levels_change_precipitation: warming.warming.changes_precipitation(&warming.levels_c),
            record: &record_years,
            bands: &ready.basin.bands,
        },
    );
    let record_odds =
        odds_of(&study.basin).and_then(|own| RecordOdds::of(&refit_odds, &own, &warming.levels_c, reference));
    let parameter_spread = of_sets
        .and_then(|sets| ParameterSpread::of(&sets, &findings.basin, &warming.levels_c, warming.reference));
    let reference_c = warming.levels_c[warming.reference];
    // With a part of the fit alone this is another model than the one whose error was found.
    let of_fit = ready.fitted.as_ref().filter(|fitted| fitted.left.is_empty()).zip(findings.basin.first());
    let warm_year_biases = of_fit
        .map(|(fitted, headline)| warm_year_biases(&fitted.skill, headline, reference_c))
        .unwrap_or_default();
    let comparisons = ready.comparisons().map_err(open)?;
    let generator = Some(generator_sheet);
    let operations = operations(ready, &study, &held);
    Ok(Findings {
        surface: Some(surface),
        by_year,
        break_even: Some(break_even).filter(|found| !found.levels.is_empty()),
        parameter_spread,
        record_odds,
        rule_panel,
        warm_year_biases,
        comparisons,
        generator,
        operations,
        places,
        ..findings
    })
}

/// What becomes of the water, where the scenario asks it.
fn operations(ready: &Ready, study: &Seasons, held: &Seasons) -> Option<Operations> {
    let (scenario, operation) = (&ready.scenario, ready.operation.as_ref()?);
    let limits = scenario.inflow.as_ref().map(|inflow| inflow.year_class_limits_hm3.as_slice());
    let pool = operation
        .reservoir
        .as_ref()
        .map(|reservoir| pool_shown(reservoir, operation.settings.water_year_starts));
    let questions = OperationsQuestions {
        levels_c: &scenario.warming.levels_c,
        reference: scenario.warming.reference,
        area_km2: operation.area_km2,
        seed: scenario.seed,
        inflow_is_observed: operation.settings.is_observed,
        year_class_limits_hm3: limits.unwrap_or_default(),
        foretold_window: operation.settings.window_from(scenario.season.survey_dates[0]),
        word: operation.settings.word(),
        reservoir: operation.reservoir.as_ref().map(|reservoir| reservoir.name.as_str()),
        pool: pool.as_ref(),
        headline: (&study.basin.measures[0], study.basin.years.index_axis(Axis(1), 0)),
    };
    let found = Operations::of(study.operated.as_ref()?, held.operated.as_ref(), &questions);
    Some(Operations { inflow_skill: ready.inflow_skill.clone(), ..found })
}

/// What figures and pages show of the reservoir itself.
fn pool_shown(reservoir: &Reservoir, starts: WaterYearStart) -> PoolShown {
    let (rule, first) = (reservoir.rule(), starts.0.day_of_common_year() as usize - 1);
    let of_day = |day: usize| rule.not_above_hm3((first + day) % COMMON_DATES);
    PoolShown {
        capacity_hm3: reservoir.capacity_hm3,
        dead_hm3: reservoir.dead_hm3,
        not_above_hm3: if rule.keeps_space(reservoir.capacity_hm3) {
            (0..COMMON_DATES).map(of_day).collect()
        } else {
            Vec::new()
        },
    }
}

/// Watches for the wish to stop alone: runs that are too many and too short to count on a bar.
struct Quiet<'p>(&'p Progress);

impl Watch for Quiet<'_> {
    fn wants_stop(&self) -> bool {
        self.0.wants_stop()
    }
}

fn open(open: OpenLedger) -> Failure {
    Failure::Ours(open.to_string())
}

pub(super) fn halted(halt: Halt) -> Failure {
    match halt {
        Halt::Stopped => Failure::Interrupted,
        Halt::Ledger(ledger) => open(ledger),
        Halt::Pool(pool) => Failure::Ours(pool.to_string()),
    }
}
