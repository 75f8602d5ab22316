//! What a run tells whoever watches it, how it is asked to stop, and why it has no result.

use crate::reservoir::OpenPool;
use crate::snow::OpenLedger;
use thiserror::Error;

/// Told of a run's progress; asked once a water year of a realization whether to stop. Every event is optional.
pub trait Watch: Sync {
    /// A run of so many realizations begins.
    fn begins(&self, _realizations: u32) {}
    /// One more realization is done.
    fn realization_done(&self) {}
    /// Whether the run should stop.
    fn wants_stop(&self) -> bool {
        false
    }
}

/// Watches nothing.
#[derive(Debug, Clone, Copy)]
pub struct Silent;

impl Watch for Silent {}

/// Why a run has no result.
#[derive(Debug, Clone, Copy, PartialEq, Error)]
pub enum Halt {
    /// It was asked to stop.
    #[error("stopped")]
    Stopped,
    /// Water was lost or made: a fault of the engine.
    #[error(transparent)]
    Ledger(#[from] OpenLedger),
    /// The same of a reservoir.
    #[error(transparent)]
    Pool(#[from] OpenPool),
}
