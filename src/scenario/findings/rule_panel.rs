//! `[findings.rule_panel]`: the headline again under other rules of the snow.

use super::super::section::Section;
use crate::fault::Unlikely;

/// The key of how many realizations it runs at most.
pub const REALIZATIONS_KEY: &str = "findings.rule_panel.realizations";
const TABLE: &str = "findings.rule_panel";

/// The panel as typed.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct RulePanelTyped {
    /// Realizations of each rule at most, where stated.
    pub realizations: Option<u32>,
}

impl RulePanelTyped {
    /// Realizations of each rule in a study of so many: all, unless fewer are stated, so that the study's own row is the study's answer.
    pub fn realizations_of(self, count: u32) -> u32 {
        self.realizations.map_or(count, |stated| stated.min(count))
    }

    /// Among so many levels, the reference one of them, whether there is one to shift to.
    pub fn unlikely(self, levels: usize) -> Option<Unlikely> {
        (levels < 2).then(|| {
            Unlikely::new(
                TABLE,
                "there is no level but the reference, so that no rule has a shift and nothing is run: state another in warming",
            )
        })
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
        section.whole_in("realizations", 2..=100_000, 100).map(|realizations| realizations as u32)
    } else {
        section.knows("realizations");
        section.default("realizations", "all of the study's");
        None
    };
    section.finish();
    Some(RulePanelTyped { realizations })
}
