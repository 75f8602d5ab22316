//! `thawline check`
use super::arguments::Shared;
use super::assemble::assemble;
use super::failure::Failure;
use super::output;
use std::path::Path;

/// Runs the command.
pub(super) fn run(path: &Path, shared: &Shared) -> Result<(), Failure> {
    let ready = assemble(path, shared)?;
    output::print(format!("{:#?}\n{:#?}\n", ready.record.counts, ready.record.skipped).as_bytes())
}
