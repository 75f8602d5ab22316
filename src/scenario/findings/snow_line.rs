//! `[findings.snow_line]`: how much snow water makes the snow line.

use super::super::section::Section;

/// What was asked.
#[derive(Debug, Clone, Copy, Default)]
pub struct SnowLineTyped {
    /// The snow line lies where the headline SWE reaches this much, mm.
    pub swe_mm: f64,
}

pub(super) fn read(mut section: Section<'_>) -> SnowLineTyped {
    let swe_mm = section.number_or("swe_mm", 100.0, 1.0..=5000.0, "for example 100");
    section.finish();
    SnowLineTyped { swe_mm }
}
