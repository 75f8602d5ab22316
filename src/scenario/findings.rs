//! `[findings]`: what a study is asked beside its headline, one table a question.

use super::section::Section;

/// What is asked, as typed.
#[derive(Debug, Clone, Default)]
pub struct FindingsTyped {}

pub(super) fn read(section: Section<'_>) -> Option<FindingsTyped> {
    section.finish();
    Some(FindingsTyped {})
}
