//! The document of a command that has done what it was asked.

use crate::report::{ReportFile, SCHEMA_VERSION};
use serde::Serialize;
use std::path::Path;

/// What every command says, and what one says beside it.
#[derive(Serialize)]
pub(super) struct Done<'a, More> {
    schema_version: u32,
    program: &'static str,
    status: &'static str,
    command: &'static str,
    #[serde(skip_serializing_if = "Option::is_none")]
    title: Option<&'a str>,
    /// The folder that was written into.
    into: String,
    /// The files in it, by their paths from there.
    files: Vec<&'a str>,
    #[serde(flatten)]
    more: More,
}

/// For commands that say nothing beside what they wrote.
#[derive(Serialize)]
pub(super) struct NoMore {}

impl<'a, More> Done<'a, More> {
    pub fn new(
        command: &'static str,
        title: Option<&'a str>,
        into: &Path,
        files: Vec<&'a str>,
        more: More,
    ) -> Self {
        let into = into.display().to_string();
        Self {
            schema_version: SCHEMA_VERSION,
            program: "thawline",
            status: "done",
            command,
            title,
            into,
            files,
            more,
        }
    }
}

/// The paths of files from the folder that they are written into.
pub(super) fn names_of(files: &[ReportFile]) -> Vec<&str> {
    files.iter().map(|(name, _)| name.as_str()).collect()
}
