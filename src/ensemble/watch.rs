//! What a run tells whoever watches it, and how it is asked to stop.

/// Told of a run's progress; asked once a realization whether to stop. Every event is optional.
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
