//! Years that have been run before: one that starts on the same snow, in the same weather, is the same year.
//!
//! Records that are resampled from one record hold its years over and over. Most years start bare, so most have been run;
//! what comes out of the memory is what would have been computed, to the bit.

use crate::snow::Snow;
use std::collections::HashMap;

/// A year as it is remembered.
pub(super) struct Remembered {
    /// Measures of the basin means, `[measure][column]`.
    pub measured: Vec<f64>,
    /// Snow as it ends.
    pub end: Snow,
    /// Whether a band of the reference kept its snow.
    pub is_perennial: bool,
}

/// Years by their name in the record and the snow on which they start.
#[derive(Default)]
pub(super) struct Memory {
    years: HashMap<(i32, Snow), Remembered>,
}

impl Memory {
    /// Forgets all years, as the weather that belongs to their names changes.
    pub fn clear(&mut self) {
        self.years.clear();
    }

    /// The year of that name that starts on this snow; `run` runs it if it has not been.
    ///
    /// # Errors
    /// Those of `run`.
    pub fn year<E>(
        &mut self,
        name: i32,
        start: Snow,
        run: impl FnOnce() -> Result<Remembered, E>,
    ) -> Result<&Remembered, E> {
        use std::collections::hash_map::Entry;
        match self.years.entry((name, start)) {
            Entry::Occupied(entry) => Ok(entry.into_mut()),
            Entry::Vacant(entry) => Ok(entry.insert(run()?)),
        }
    }
}
