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
    if matches!(failure, Failure::ClosedPipe) {
        return failure.exit_status();
    }
    if shared.json {
        let faults = match failure {
            Failure::Input { faults, .. } => faults.as_slice(),
            _ => &[],
        };
        let message = match failure {
            Failure::Input { faults, .. } => format!("{} faults in the scenario or its data", faults.len()),
            other => other.to_string(),
        };
        let document = FailureDocument {
            schema_version: crate::report::SCHEMA_VERSION,
            program: "thawline",
            status: "failed",
            exit_status: failure.exit_status(),
            message,
            faults,
        };
        return match output::print_json(&document) {
            Ok(()) => failure.exit_status(),
            Err(unsaid) => unsaid.exit_status(),
        };
    }
    let text = match failure {
        Failure::Input { drawn, .. } => drawn.clone(),
        other => format!("error: {other}\n"),
    };
    output::complain(&text);
    failure.exit_status()
}
