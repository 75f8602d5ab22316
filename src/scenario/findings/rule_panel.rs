//! `[findings.rule_panel]`: the headline again under other published rules of the snow.

use super::super::section::Section;

/// The key of how many realizations it runs.
pub const REALIZATIONS_KEY: &str = "findings.rule_panel.realizations";
/// Realizations of each rule where none are stated: a shift's median is then known about as well as its third figure.
pub const REALIZATIONS: u32 = 100;

/// The panel as typed.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct RulePanelTyped {
    /// Realizations of each rule, where stated.
    pub realizations: Option<u32>,
}

impl RulePanelTyped {
    /// Realizations of each rule in a study of so many.
    pub fn realizations_of(self, count: u32) -> u32 {
        self.realizations.unwrap_or(REALIZATIONS).min(count)
    }
}

/// Reads the table; none where there is none.
pub(super) fn read(findings: &mut Section<'_>) -> Option<RulePanelTyped> {
    if !findings.has("rule_panel") {
        findings.knows("rule_panel");
        return None;
    }
    let mut section = findings.section("rule_panel");
    let realizations = if section.has("realizations") {
        let stated = section.whole_in("realizations", 2..=100_000, u64::from(REALIZATIONS));
        stated.map(|realizations| realizations as u32)
    } else {
        section.knows("realizations");
        section.default("realizations", "100, or all of the study's where it has fewer");
        None
    };
    section.finish();
    Some(RulePanelTyped { realizations })
}
