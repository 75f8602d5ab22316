//! `thawline daily`: the record as observed, day by day.

use super::arguments::Shared;
use super::assemble::assemble;
use super::failure::Failure;
use super::output;
use crate::perturb::MonthlyChange;
use crate::report::daily_csv;
use std::io::{self, BufWriter, Write};
use std::path::Path;

/// Runs the command.
pub(super) fn run(path: &Path, shared: &Shared) -> Result<(), Failure> {
    let ready = assemble(path, shared)?;
    let lanes = ready.lanes(&[MonthlyChange::NONE]);
    let mut out = BufWriter::new(io::stdout().lock());
    daily_csv(&lanes, &ready.weather, &mut out).map_err(|e| Failure::Ours(e.to_string()))?;
    out.flush().map_err(|error| output::written(&error))
}
