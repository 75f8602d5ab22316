//! Standard output and standard error: a closed pipe ends quietly, a full disk is an error.

use super::arguments::Shared;
use super::failure::Failure;
use serde::Serialize;
use std::io::{self, ErrorKind, Write};

/// Writes to standard output and flushes.
pub(super) fn print(text: &[u8]) -> Result<(), Failure> {
    let mut out = io::stdout().lock();
    out.write_all(text).and_then(|()| out.flush()).map_err(|error| written(&error))
}

/// Prints one JSON document, with a line end.
pub(super) fn print_json(document: &impl Serialize) -> Result<(), Failure> {
    let mut text = serde_json::to_vec_pretty(document).map_err(|error| Failure::Ours(error.to_string()))?;
    text.push(b'\n');
    print(&text)
}

/// Refuses `--json` for a table that goes to standard output itself.
pub(super) fn may_be_document(command: &str, shared: &Shared) -> Result<(), Failure> {
    if shared.json && shared.into.is_none() {
        return Err(Failure::CommandLine(format!(
            "{command} writes a CSV table to standard output, where --json wants a document: add --into DIR to have the \
             table there, or leave --json out"
        )));
    }
    Ok(())
}

/// Writes to standard error; if that is closed there is nobody left to tell.
pub(super) fn complain(text: &str) {
    let _ = io::stderr().lock().write_all(text.as_bytes());
}

/// What a failed write to standard output means.
pub(super) fn written(error: &io::Error) -> Failure {
    if error.kind() == ErrorKind::BrokenPipe {
        Failure::ClosedPipe
    } else {
        Failure::FileSystem(format!("cannot write to standard output: {error}"))
    }
}
