//! `[report]`: how results are told.

use super::section::Section;
use crate::units::UnitSystem;

/// How results are told, as typed.
#[derive(Debug, Clone, Copy)]
pub struct ReportTyped {
    /// Units of everything that people read.
    pub units: UnitSystem,
}

pub(super) fn read(mut section: Section<'_>) -> Option<ReportTyped> {
    let units = if section.has("units") {
        section.choice("units", &UnitSystem::NAMES)
    } else {
        section.text_or("units", "metric");
        Some(UnitSystem::Metric)
    };
    section.finish();
    Some(ReportTyped { units: units? })
}
