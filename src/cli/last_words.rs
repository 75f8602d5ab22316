//! The last words of a command that failed: on standard error for people, or one JSON document for programs.

use super::arguments::Shared;
use super::failure::Failure;
use super::output;
use crate::scenario::Located;
use serde::Serialize;

#[derive(Serialize)]
struct FailureDocument<'a> {
    schema_version: u32,
    program: &'static str,
    status: &'static str,
    exit_status: u8,
    message: String,
    faults: &'a [Located],
}

/// Says what failed, on standard error, or as a document on standard output; gives the exit status.
pub(super) fn say(failure: &Failure, shared: &Shared) -> u8 {
    let is_pipe = matches!(failure, Failure::ClosedPipe);
    if shared.json && !is_pipe { document(failure) } else { on_standard_error(failure) }
}

/// Says what failed on standard error; gives the exit status.
pub(super) fn on_standard_error(failure: &Failure) -> u8 {
    if matches!(failure, Failure::ClosedPipe) {
        return failure.exit_status();
    }
    let text = match failure {
        Failure::Input { drawn, .. } => drawn.clone(),
        other => format!("error: {other}\n"),
    };
    output::complain(&text);
    failure.exit_status()
}

/// The failure as one JSON document on standard output; gives the exit status.
pub(super) fn document(failure: &Failure) -> u8 {
    let (message, faults) = match failure {
        Failure::Input { faults, .. } => {
            let plural = if faults.len() == 1 { "" } else { "s" };
            (format!("{} fault{plural} in the scenario or its data", faults.len()), faults.as_slice())
        }
        other => (other.to_string(), [].as_slice()),
    };
    let document = FailureDocument {
        schema_version: crate::report::SCHEMA_VERSION,
        program: "thawline",
        status: "failed",
        exit_status: failure.exit_status(),
        message,
        faults,
    };
    match output::print_json(&document) {
        Ok(()) => failure.exit_status(),
        Err(unsaid) => unsaid.exit_status(),
    }
}
