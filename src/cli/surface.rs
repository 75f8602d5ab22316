//! The response surface by runs at its nodes, and the precipitation that makes up for a warming by runs between them.

use super::break_even::{Search, break_even};
use super::level_groups::LevelGroups;
use super::ready::Ready;
use super::wetness::Wetness;
use crate::ensemble::{Halt, LevelGroup, Plan, Watch, run_nodes};
use crate::findings::{BreakEven, Change, Nodes, ResponseSurface, Root, SurfaceQuestions};
use crate::operation::Operation;
use crate::perturb::{Generator, Kept, MeanChange, MonthlyChange};
use crate::season::Measures;

/// Lanes of one run at most: some 25 kB each on every thread.
const MOST_LANES: usize = 2000;

/// Runs the surface, and looks for the break-even precipitation of its warmings and of the study's levels.
///
/// # Errors
/// Those of a run.
pub(super) fn warmed(
    ready: &Ready,
    plan: &Plan<'_>,
    groups: &LevelGroups<'_>,
    made: &dyn Generator,
    watch: &dyn Watch,
) -> Result<(ResponseSurface, BreakEven), Halt> {
    let scenario = &ready.scenario;
    let typed = &scenario.findings.surface;
    let levels_c = &scenario.warming.levels_c;
    let all = plan.realizations;
    let realizations = all.min(typed.realizations);
    // Every node and every step towards a root runs them again.
    let kept = Kept::of(made, realizations, plan.years);
    let plan = Plan { realizations, ..*plan };
    let generator = MeanChange {
        generator: made,
        seed: scenario.seed,
        standard_deviation_pct: scenario.realizations.mean_change_sd_pct.unwrap_or(0.0),
    };
    let survey = scenario.season.survey_dates[0];
    let wetness = Wetness::of(&ready.drawn_from, &generator, [all as usize, plan.years], survey, watch)?;

    // Where the study's levels change nothing but temperatures, they are warmings of the surface.
    let is_plain = |level_c: &f64| {
        let warming = &scenario.warming.warming;
        let factor = warming.precipitation.factor(*level_c);
        warming.wet_day_intensity_pct_per_c.is_none_or(|pct_per_c| pct_per_c == 0.0)
            && factor.iter().all(|factor| *factor == 1.0)
    };
    let levels_are_plain = levels_c.iter().all(is_plain);
    let reference_c = levels_c[scenario.warming.reference];
    let questions = SurfaceQuestions {
        warmings_c: with(&typed.warmings_c, reference_c),
        precipitation_changes_pct: with(&typed.precipitation_changes_pct, 0.0),
        levels_c,
        reference_c,
        levels_warm_alone: levels_are_plain,
        named: &ready.named_changes,
        criteria: &scenario.findings.criteria(ready.basin.area_km2()),
        bands: &ready.basin.bands,
        seed: scenario.seed,
    };
    let nodes = run(ready, &plan, questions.changes(), &kept, watch)?;
    let finer = questions.finer(&nodes);
    let nodes = if finer.is_empty() { nodes } else { nodes.and(run(ready, &plan, finer, &kept, watch)?) };
    let at = |warming_c: f64, pct: f64| nodes.median(Change { warming_c, precipitation_change_pct: pct });

    let known = |level: usize, pct: f64| levels_are_plain.then(|| at(levels_c[level], pct)).flatten();
    let break_even = break_even(ready, &plan, groups, &kept, (&wetness, known), watch)?;
    let found_before = |warming_c: f64| {
        let of_level = break_even.levels.iter().find(|level| level.level_c == warming_c)?;
        let found = match (of_level.precipitation_change_pct, of_level.stays) {
            (Some(pct), _) => Root::At(pct),
            (None, Some(stays)) => Root::Stays(stays),
            (None, None) => Root::Unknown,
        };
        levels_are_plain.then_some(found)
    };
    let curve =
        curve(ready, &plan, &questions, Before { kept: &kept, at: &at, found_before: &found_before }, watch)?;
    Ok((questions.answer(&nodes, &curve, wetness.realized()), break_even))
}

/// The values with one more among them, ascending.
fn with(values: &[f64], one: f64) -> Vec<f64> {
    let mut values = values.to_vec();
    if !values.contains(&one) {
        values.push(one);
        values.sort_by(f64::total_cmp);
    }
    values
}

fn change(ready: &Ready, change: &Change) -> MonthlyChange {
    let warmed = ready.scenario.warming.warming.at(change.warming_c).of_temperatures();
    warmed.with_precipitation(change.precipitation_change_pct)
}

/// Runs every node, in as many runs as their lanes need; each begins with the reference, which decides about perennial snow.
fn run(
    ready: &Ready,
    plan: &Plan<'_>,
    changes: Vec<Change>,
    generator: &dyn Generator,
    watch: &dyn Watch,
) -> Result<Nodes, Halt> {
    let measures =
        Measures::of_snow_water_and_timing(plan.measures.settings().clone(), ready.basin.area_km2());
    let operation = plan.operation.map(Operation::as_stated);
    let classes = ready.scenario.snow.options.patchiness.map_or(1, |patchiness| patchiness.classes);
    let nodes_of_a_run = (MOST_LANES / (plan.bands * classes)).max(8);
    let with_reference = |nodes: &[Change]| {
        let of_nodes = changes[..1].iter().chain(nodes);
        let lanes = ready.lanes(&of_nodes.map(|node| change(ready, node)).collect::<Vec<_>>());
        let groups = [LevelGroup { lanes: &lanes, generator }];
        run_nodes(
            &Plan {
                groups: &groups,
                reference: 0,
                measures: &measures,
                operation: operation.as_ref(),
                ..*plan
            },
            watch,
        )
    };
    let (first, others) = changes[1..].split_at(nodes_of_a_run.min(changes.len() - 1));
    let mut runs = with_reference(first)?;
    for nodes in others.chunks(nodes_of_a_run) {
        runs = runs.and(&with_reference(nodes)?);
    }
    Ok(Nodes::new(changes, runs, ready.scenario.seed))
}

/// What has been made and found before the curve is.
struct Before<'a> {
    kept: &'a dyn Generator,
    /// The median at a node, by warming and change of precipitation.
    at: &'a dyn Fn(f64, f64) -> Option<f64>,
    /// The root of a warming that is one of the study's levels.
    found_before: &'a dyn Fn(f64) -> Option<Root>,
}

/// The root of every warming of the grid.
fn curve(
    ready: &Ready,
    plan: &Plan<'_>,
    questions: &SurfaceQuestions<'_>,
    Before { kept, at, found_before }: Before<'_>,
    watch: &dyn Watch,
) -> Result<Vec<(f64, Root)>, Halt> {
    let is_new = |warming_c: &f64| *warming_c == questions.reference_c || found_before(*warming_c).is_none();
    let warmings_c: Vec<f64> = questions.warmings_c.iter().copied().filter(is_new).collect();
    let node =
        |warming_c: &f64| change(ready, &Change { warming_c: *warming_c, precipitation_change_pct: 0.0 });
    let groups = LevelGroups::of_changes(ready, warmings_c.iter().map(node).collect());
    let reference = warmings_c.partition_point(|warming_c| *warming_c < questions.reference_c);
    let measures = Measures::of_snow(plan.measures.settings().clone(), ready.basin.area_km2());
    let plan = Plan { measures: &measures, reference, ..*plan };
    let roots = Search { plan, groups: &groups, made: kept, watch }
        .roots(|warming, pct| at(warmings_c[warming], pct))?;
    let of_warming = |warming_c: f64| {
        if warming_c == questions.reference_c {
            return Root::At(0.0);
        }
        let found = roots.of_levels.iter().find(|(warming, _)| warmings_c[*warming] == warming_c);
        found.map(|(_, root)| *root).or_else(|| found_before(warming_c)).unwrap_or(Root::Unknown)
    };
    Ok(questions.warmings_c.iter().map(|warming_c| (*warming_c, of_warming(*warming_c))).collect())
}
