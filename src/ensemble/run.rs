//! The run: realizations over threads, results in the order of their numbers.

use super::nodes::NodeRuns;
use super::plan::Plan;
use super::realization::Workshop;
use super::seasons::{BasinSeasons, Seasons};
use super::swe_days::{SweBins, Tally};
use super::watch::{Halt, Watch};
use crate::perturb::Generator;
use rayon::prelude::*;

/// Runs every realization under every level, on the threads of the current rayon pool, and keeps basin and bands.
///
/// Each realization depends on its number alone and results are put together in that order, so that any number of
/// threads gives the same bits. Memory: for each group of levels one engine, one year block, one realization of weather
/// and its years, measured, and one table of counted days a thread, beside what [`Seasons`] keeps.
///
/// # Errors
/// A ledger that does not close, or `watch` wanting to stop.
pub fn run(plan: &Plan<'_>, bins: SweBins, watch: &dyn Watch) -> Result<Seasons, Halt> {
    let tally = Tally::new(bins, plan.levels());
    let kept = each(plan, watch, |workshop, number| workshop.run(number, &tally, watch))?;
    Ok(Seasons::gather(plan, &kept, tally.finish()))
}

/// The basin means of the plan's realizations from the generators of each of several records instead of its own, one for
/// each of its groups, put together one record at a time as they are asked for: the same bits as [`run`] keeps of them,
/// with less work. Where a group's generators all keep names, years of one name in one realization must have the same
/// weather whichever of them made it, as those of one record resampled have: what has been run is not run again. Where they
/// all take a record's years as they are, that holds for all realizations together.
///
/// # Errors
/// Those of [`run`].
pub fn run_records(
    plan: &Plan<'_>,
    records: &[Vec<&dyn Generator>],
    watch: &dyn Watch,
) -> Result<impl Iterator<Item = BasinSeasons>, Halt> {
    let kept = each(plan, watch, |workshop, number| workshop.run_records(number, records, watch))?;
    let of = move |at: usize| {
        let realizations: Vec<&[f64]> = kept.iter().map(|kept| kept[at].0.as_slice()).collect();
        BasinSeasons::gather(plan, realizations.into_iter())
    };
    Ok((0..records.len()).map(of))
}

/// Period values of a plan whose levels are nodes of warming and precipitation, all in one group.
///
/// # Errors
/// Those of [`run`].
pub fn run_nodes(plan: &Plan<'_>, watch: &dyn Watch) -> Result<NodeRuns, Halt> {
    let kept = each(plan, watch, |workshop, number| workshop.run_nodes(number, watch))?;
    Ok(NodeRuns::gather(plan, &kept))
}

fn each<'p, T: Send>(
    plan: &'p Plan<'p>,
    watch: &dyn Watch,
    one: impl Fn(&mut Workshop<'p>, u32) -> Result<T, Halt> + Sync,
) -> Result<Vec<T>, Halt> {
    (0..plan.realizations)
        .into_par_iter()
        .map_init(
            || Workshop::new(plan),
            |workshop, number| {
                let kept = one(workshop, number)?;
                watch.realization_done();
                Ok(kept)
            },
        )
        .collect()
}
