//! The run: realizations over threads, results in the order of their numbers.

use super::plan::Plan;
use super::realization::Workshop;
use super::seasons::Seasons;
use super::watch::{Halt, Watch};
use rayon::prelude::*;

/// Runs every realization under every level, on the threads of the current rayon pool.
///
/// Each realization depends on its number alone and results are put together in that order, so that any number of
/// threads gives the same bits. Memory: one engine, one year block and one realization of weather a thread, beside what
/// [`Seasons`] keeps.
///
/// # Errors
/// A ledger that does not close, or `watch` wanting to stop.
pub fn run(plan: &Plan<'_>, watch: &dyn Watch) -> Result<Seasons, Halt> {
    watch.begins(plan.realizations);
    let kept = (0..plan.realizations)
        .into_par_iter()
        .map_init(
            || Workshop::new(plan),
            |workshop, number| {
                let kept = workshop.run(number, watch)?;
                watch.realization_done();
                Ok(kept)
            },
        )
        .collect::<Result<Vec<_>, Halt>>()?;
    Ok(Seasons::gather(plan, kept))
}
