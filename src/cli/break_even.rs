//! Break-even precipitation by root finding on runs.

use super::level_groups::LevelGroups;
use super::ready::Ready;
use super::wetness::Wetness;
use crate::ensemble::{BasinSeasons, Halt, LevelGroup, Plan, Watch, run_records};
use crate::findings::{BreakEven, Root, break_even_pct, quantile, sorted};
use crate::perturb::{Generator, MonthlyChange};
use crate::season::Measures;

/// Where the precipitation is looked for that makes up for a warming: the plan's realizations under each of the groups'
/// changes with one more factor on all precipitation. No change of its mean is assumed in them.
pub(super) struct Search<'a> {
    /// What is run: its groups are not used, its reference is one of the changes below.
    pub plan: Plan<'a>,
    pub groups: &'a LevelGroups<'a>,
    pub made: &'a dyn Generator,
    pub watch: &'a dyn Watch,
}

/// The reference's median, and the root of every other level.
pub(super) struct Roots {
    pub reference_median: f64,
    pub of_levels: Vec<(usize, Root)>,
}

impl Search<'_> {
    /// Finds all roots. `known` tells the median of a level under a change that has been run, so that it is not run again.
    ///
    /// # Errors
    /// Those of a run.
    pub fn roots(&self, known: impl Fn(usize, f64) -> Option<f64>) -> Result<Roots, Halt> {
        let reference = self.plan.reference;
        let levels: Vec<usize> = (0..self.groups.changes.len()).filter(|level| *level != reference).collect();
        let reference_median = match known(reference, 0.0) {
            Some(median) => median,
            None => self.medians(&[(reference, 0.0)])?[0],
        };
        let roots = break_even_pct(levels.len(), |asked| {
            let asked: Vec<(usize, f64)> = asked.iter().map(|(at, pct)| (levels[*at], *pct)).collect();
            let is_new = |(level, pct): &&(usize, f64)| known(*level, *pct).is_none();
            let unknown: Vec<(usize, f64)> = asked.iter().filter(is_new).copied().collect();
            let mut run = if unknown.is_empty() { Vec::new() } else { self.medians(&unknown)? }.into_iter();
            let median = |(level, pct): &(usize, f64)| known(*level, *pct).or_else(|| run.next());
            let medians = asked.iter().map(median);
            let excess = medians.map(|median| median.map_or(f64::NAN, |median| median - reference_median));
            Ok::<_, Halt>(excess.collect())
        })?;
        Ok(Roots { reference_median, of_levels: levels.into_iter().zip(roots).collect() })
    }

    /// The median period value of the headline measure at each of these levels, in ascending order, each with so many percent
    /// more precipitation.
    fn medians(&self, asked: &[(usize, f64)]) -> Result<Vec<f64>, Halt> {
        let change = |level: usize, pct: f64| (level, self.groups.changes[level].with_precipitation(pct));
        let mut levels: Vec<(usize, MonthlyChange)> =
            asked.iter().map(|(level, pct)| change(*level, *pct)).collect();
        // The reference runs with them: it decides about perennial snow.
        let at = levels.partition_point(|(level, _)| *level < self.plan.reference);
        let is_asked = levels.get(at).is_some_and(|(level, _)| *level == self.plan.reference);
        if !is_asked {
            levels.insert(at, change(self.plan.reference, 0.0));
        }
        let weather = self.groups.weather(self.made);
        let lanes = self.groups.lanes_of(&levels);
        let groups: Vec<LevelGroup<'_>> =
            lanes.iter().map(|(group, lanes)| LevelGroup { lanes, generator: &weather[*group] }).collect();
        let plan = Plan { groups: &groups, reference: at, ..self.plan };
        let unchanged: Vec<&dyn Generator> = groups.iter().map(|group| group.generator).collect();
        let seasons: Vec<BasinSeasons> = run_records(&plan, &[unchanged], self.watch)?.collect();
        let median = |level: usize| {
            let periods = seasons[0].periods.index_axis(ndarray::Axis(0), level);
            quantile(&sorted(periods.row(0).iter().copied()), 0.5)
        };
        let wanted = (0..levels.len()).filter(|level| is_asked || *level != at);
        Ok(wanted.map(median).collect())
    }
}

/// Finds the break-even precipitation of the headline measure at every level; `known` as in [`Search::roots`].
///
/// # Errors
/// Those of a run.
pub(super) fn break_even(
    ready: &Ready,
    plan: &Plan<'_>,
    groups: &LevelGroups<'_>,
    made: &dyn Generator,
    (wetness, known): (&Wetness, impl Fn(usize, f64) -> Option<f64>),
    watch: &dyn Watch,
) -> Result<BreakEven, Halt> {
    let measures = Measures::of_snow(plan.measures.settings().clone(), ready.basin.area_km2());
    let plan = Plan { measures: &measures, ..*plan };
    let roots = Search { plan, groups, made, watch }.roots(known)?;
    let levels_c = &ready.scenario.warming.levels_c;
    let level = |(level, root): (usize, Root)| wetness.level(levels_c[level], root);
    Ok(BreakEven {
        realizations: plan.realizations as usize,
        reference_median: roots.reference_median,
        levels: roots.of_levels.into_iter().map(level).collect(),
        reached: wetness.reached(plan.years),
    })
}
