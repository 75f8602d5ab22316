//! The run: realizations over threads, results in the order of their numbers.

use super::plan::Plan;
use super::realization::Workshop;
use super::seasons::{BasinSeasons, Seasons};
use super::swe_days::{SweBins, Tally};
use super::watch::{Halt, Watch};
use rayon::prelude::*;

/// Runs every realization under every level, on the threads of the current rayon pool, and keeps basin and bands.
///
/// Each realization depends on its number alone and results are put together in that order, so that any number of
/// threads gives the same bits. Memory: one engine, one year block and one realization of weather a thread, beside what
/// [`Seasons`] keeps.
///
/// # Errors
/// A ledger that does not close, or `watch` wanting to stop.
pub fn run(plan: &Plan<'_>, bins: SweBins, watch: &dyn Watch) -> Result<Seasons, Halt> {
    let tally = Tally::new(bins, plan.levels);
    let kept = each(plan, watch, |workshop, number| workshop.run(number, &tally, watch))?;
    Ok(Seasons::gather(plan, kept, tally.finish()))
}

/// The same for the basin means alone: the same bits as [`run`] keeps of them, with less work.
///
/// # Errors
/// Those of [`run`].
pub fn run_basin(plan: &Plan<'_>, watch: &dyn Watch) -> Result<BasinSeasons, Halt> {
    let kept = each(plan, watch, |workshop, number| workshop.run_basin(number, watch))?;
    Ok(BasinSeasons::gather(plan, kept.iter().map(|kept| kept.0.as_slice())))
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
