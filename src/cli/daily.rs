//! `thawline daily`: the record as observed, day by day.

use super::arguments::Shared;
use super::assemble::assemble;
use super::failure::Failure;
use super::output;
use crate::perturb::MonthlyChange;
use crate::report::{DailyError, daily_csv, publish};
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
        let files = ["daily.csv", "run.json"];
        let manifest = serde_json::json!({
            "schema_version": crate::report::SCHEMA_VERSION,
            "program": "thawline",
            "version": env!("CARGO_PKG_VERSION"),
            "command": format!("thawline daily {}", path.display()),
            "files": files,
        });
        let mut manifest = manifest.to_string().into_bytes();
        manifest.push(b'\n');
        let files = [(files[0].to_owned(), table), (files[1].to_owned(), manifest)];
        publish(&files, into, shared.force).map_err(|error| Failure::FileSystem(error.to_string()))?;
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
