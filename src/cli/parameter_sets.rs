//! Some realizations from every set of parameters that a study runs beside its own.

use super::level_groups::LevelGroups;
use super::ready::Ready;
use crate::ensemble::{BasinSeasons, Halt, LevelGroup, Plan, Watch, run_records};
use crate::findings::SetRuns;
use crate::fit::Parameters;
use crate::perturb::Generator;
use crate::scenario::ParameterSets;
use crate::season::{MELT_OUT_DAY, Measure};
use ndarray::{Array3, Axis, Slice};

/// How many realizations of sets there will be.
pub(super) fn realizations_of_sets(ready: &Ready) -> u32 {
    ready.parameter_sets.as_ref().map_or(0, |sets| sets.realizations * sets.parameters.len() as u32)
}

/// Runs the first realizations of the study under every level from each set: its snow, the weather corrected for catch by its
/// multipliers, the generator made anew from that, the same draws. Of each set period values of the headline and of melt-out are
/// kept, of the basin, and the headline's single years; beside them those of `own`, the study's runs.
///
/// # Errors
/// Those of a run.
pub(super) fn run_sets(
    ready: &Ready,
    sets: &ParameterSets,
    plan: &Plan<'_>,
    own: &BasinSeasons,
    watch: &dyn Watch,
) -> Result<SetRuns, Halt> {
    let all = plan.measures.list();
    let is_kept = |(at, measure): &(usize, &Measure)| *at == 0 || measure.name == MELT_OUT_DAY;
    let kept: Vec<usize> = all.iter().enumerate().filter(is_kept).map(|(at, _)| at).collect();
    let plan = Plan { realizations: sets.realizations, ..*plan };
    let one = |parameters: &Parameters| -> Result<[Array3<f64>; 2], Halt> {
        let of_set = ready.with(parameters);
        let made = of_set.recipe().of(&of_set.drawn_from);
        let seasons = run_set(&of_set, &*made, &plan, watch)?;
        Ok([seasons.periods.select(Axis(1), &kept), seasons.years.index_axis_move(Axis(1), 0)])
    };
    let of_sets = sets.parameters.iter().map(one).collect::<Result<Vec<_>, _>>()?;
    let (periods, headline_years) = of_sets.into_iter().map(|[periods, years]| (periods, years)).unzip();
    let same = Slice::from(..sets.realizations as usize);
    let own = own.periods.select(Axis(1), &kept).slice_axis(Axis(2), same).to_owned();
    Ok(SetRuns { measures: kept.iter().map(|at| all[*at].clone()).collect(), periods, headline_years, own })
}

/// The basin's seasons with another set's snow, and weather that is corrected for catch as the set does it: `plan`'s groups are made anew.
///
/// # Errors
/// Those of a run.
pub(super) fn run_set(
    of_set: &Ready,
    made: &dyn Generator,
    plan: &Plan<'_>,
    watch: &dyn Watch,
) -> Result<BasinSeasons, Halt> {
    let groups = LevelGroups::of(of_set);
    let lanes = groups.lanes(&groups.changes);
    let weather = groups.weather(made);
    let changed = groups.changed(&weather);
    let of_groups: Vec<LevelGroup<'_>> =
        lanes.iter().zip(&changed).map(|(lanes, generator)| LevelGroup { lanes, generator }).collect();
    let plan = Plan { groups: &of_groups, ..*plan };
    let only: [Vec<&dyn Generator>; 1] = [changed.iter().map(|of_group| of_group as _).collect()];
    let mut seasons = run_records(&plan, &only, watch)?;
    seasons.next().ok_or(Halt::Stopped)
}
