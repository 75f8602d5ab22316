//! `thawline daily`: the record as observed, day by day.

use super::arguments::Shared;
use super::assemble::assemble;
use super::failure::{Failure, may_be_replaced, unpublished};
use super::output;
use super::progress::{is_interrupted, mind_interrupts};
use crate::perturb::MonthlyChange;
use crate::report::{DailyError, daily_csv, daily_manifest_json, publish};
use std::io::{self, BufWriter, Write};
use std::path::Path;

/// Runs the command: to standard output, or into `daily.csv` of the folder that `--into` names.
pub(super) fn run(path: &Path, shared: &Shared) -> Result<(), Failure> {
    if shared.json {
        return Err(Failure::CommandLine("--json is not for daily, whose output is a CSV table".to_owned()));
    }
    let ready = assemble(path, shared)?;
    let lanes = ready.lanes(&[MonthlyChange::NONE]);
    if !shared.quiet {
        output::complain(&crate::scenario::unlikely_lines(&ready.unlikely));
        let left_out: Vec<String> =
            ready.record.skipped.iter().map(|year| year.water_year.to_string()).collect();
        if !left_out.is_empty() {
            output::complain(&format!("left out, see check: water years {}\n", left_out.join(", ")));
        }
    }
    if let Some(into) = &shared.into {
        let mut table = Vec::new();
        daily_csv(&lanes, &ready.weather, &mut table).map_err(failure)?;
        let names = ["daily.csv", "run.json"];
        let manifest = daily_manifest_json(&ready.origin("daily", path, shared), &names);
        let manifest = manifest.map_err(|error| Failure::Ours(error.to_string()))?;
        let files = [(names[0].to_owned(), table), (names[1].to_owned(), manifest)];
        mind_interrupts();
        may_be_replaced(into, "daily", shared)?;
        if is_interrupted() {
            return Err(Failure::Interrupted);
        }
        publish(&files, into).map_err(|error| unpublished(&error))?;
        if !shared.quiet {
            output::complain(&format!("daily table: {}\n", into.join("daily.csv").display()));
        }
        return Ok(());
    }
    let mut out = BufWriter::with_capacity(1 << 16, io::stdout().lock());
    daily_csv(&lanes, &ready.weather, &mut out).map_err(failure)?;
    out.flush().map_err(|error| output::written(&error))
}

fn failure(error: DailyError) -> Failure {
    match error {
        DailyError::Ledger(open) => Failure::Ours(open.to_string()),
        DailyError::Write(error) => output::written(&error),
    }
}
