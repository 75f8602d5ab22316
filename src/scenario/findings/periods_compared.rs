//! `[findings.periods_compared]`: which years of the record are held against the rest.

use super::super::section::Section;

/// Most years that a period may be asked to have.
const MOST_YEARS: u64 = 1000;

/// What was asked.
#[derive(Debug, Clone, Copy, Default)]
pub struct PeriodsComparedTyped {
    /// The last so many years of those in use against all before them.
    pub last_years: usize,
}

pub(super) fn read(mut section: Section<'_>) -> PeriodsComparedTyped {
    let last_years = section.whole_or("last_years", 20, 1..=MOST_YEARS) as usize;
    section.finish();
    PeriodsComparedTyped { last_years }
}
