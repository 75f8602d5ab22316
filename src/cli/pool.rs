//! The threads of a run.

use super::arguments::Shared;
use super::failure::Failure;

/// Runs a piece of work on the number of threads that was asked for.
pub(super) fn in_pool<T: Send>(shared: &Shared, work: impl FnOnce() -> T + Send) -> Result<T, Failure> {
    let threads = shared.threads.map_or(0, usize::from);
    let pool = rayon::ThreadPoolBuilder::new().num_threads(threads).build();
    let pool = pool.map_err(|error| Failure::Ours(format!("cannot start threads: {error}")))?;
    Ok(pool.install(work))
}
