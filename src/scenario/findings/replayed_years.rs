//! `[findings.replayed_years]`: years of the record, as they were, at every level.

use super::super::section::Section;
use crate::fault::Fault;

/// The key of the years.
pub const YEARS_KEY: &str = "findings.replayed_years.years";
/// More rows than that are read by nobody.
const MOST_YEARS: usize = 20;

/// The years as typed.
#[derive(Debug, Clone, Default, PartialEq, Eq)]
pub struct ReplayedYearsTyped {
    /// Water years, where stated; none for the three of least snow and the one of most.
    pub years: Option<Vec<i32>>,
}

/// Reads the table; without it the years are found in the record.
pub(super) fn read(findings: &mut Section<'_>) -> ReplayedYearsTyped {
    if !findings.has("replayed_years") {
        findings.knows("replayed_years");
        return ReplayedYearsTyped::default();
    }
    let mut section = findings.section("replayed_years");
    let years = section.years("years");
    if !section.has("years") {
        section.default("years", "the three years of least snow at the reference and the one of most");
    }
    let has_twice = |years: &Vec<i32>| (1..years.len()).any(|at| years[..at].contains(&years[at]));
    if let Some(years) = &years
        && (years.is_empty() || years.len() > MOST_YEARS || has_twice(years))
    {
        section.fault(Fault::key(
            section.path_of("years"),
            if has_twice(years) { "a year twice".to_owned() } else { format!("{} years", years.len()) },
            format!("1 to {MOST_YEARS} water years, each once"),
            "for example years = [1977, 1983]",
        ));
    }
    section.finish();
    ReplayedYearsTyped { years }
}
