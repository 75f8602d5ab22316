//! How a command fails: what is said, and with which exit status.

use super::arguments::Shared;
use super::output;
use crate::scenario::Located;
use serde::Serialize;
use thiserror::Error;

/// Exit statuses.
pub mod status {
    /// Done.
    pub const DONE: u8 = 0;
    /// A fault of thawline's own.
    pub const OURS: u8 = 1;
    /// The command line.
    pub const COMMAND_LINE: u8 = 2;
    /// The scenario or its data.
    pub const INPUT: u8 = 3;
    /// The file system: cannot write, cannot publish.
    pub const FILE_SYSTEM: u8 = 4;
    /// Interrupted.
    pub const INTERRUPTED: u8 = 130;
}

/// Why a command did not do what it was asked.
#[derive(Debug, Error)]
pub enum Failure {
    /// The command line asks for what cannot be.
    #[error("{0}")]
    CommandLine(String),
    /// Faults of the scenario or its data, drawn and in their places.
    #[error("{drawn}")]
    Input {
        /// For people.
        drawn: String,
        /// For programs.
        faults: Vec<Located>,
    },
    /// Something could not be written.
    #[error("{0}")]
    FileSystem(String),
    /// Interrupted; nothing was published.
    #[error("interrupted; earlier results stand as they were")]
    Interrupted,
    /// The reader of our output has gone: nothing to say.
    #[error("")]
    ClosedPipe,
    /// A fault of ours.
    #[error("a fault of thawline, not of your input: {0}\nplease report it with the scenario that shows it")]
    Ours(String),
}

#[derive(Serialize)]
struct FailureDocument<'a> {
    schema_version: u32,
    program: &'static str,
    status: &'static str,
    exit_status: u8,
    message: String,
    faults: &'a [Located],
}

impl Failure {
    /// The exit status.
    pub fn exit_status(&self) -> u8 {
        match self {
            Self::CommandLine(_) => status::COMMAND_LINE,
            Self::Input { .. } => status::INPUT,
            Self::FileSystem(_) => status::FILE_SYSTEM,
            Self::Interrupted => status::INTERRUPTED,
            Self::ClosedPipe => status::DONE,
            Self::Ours(_) => status::OURS,
        }
    }

    /// Says what failed, on standard error, or as a document on standard output; gives the exit status.
    pub(super) fn report(&self, shared: &Shared) -> u8 {
        if matches!(self, Self::ClosedPipe) {
            return self.exit_status();
        }
        if shared.json {
            let faults = match self {
                Self::Input { faults, .. } => faults.as_slice(),
                _ => &[],
            };
            let message = match self {
                Self::Input { faults, .. } => format!("{} faults in the scenario or its data", faults.len()),
                other => other.to_string(),
            };
            let document = FailureDocument {
                schema_version: crate::report::SCHEMA_VERSION,
                program: "thawline",
                status: "failed",
                exit_status: self.exit_status(),
                message,
                faults,
            };
            return match output::print_json(&document) {
                Ok(()) => self.exit_status(),
                Err(failure) => failure.exit_status(),
            };
        }
        let text = match self {
            Self::Input { drawn, .. } => drawn.clone(),
            other => format!("error: {other}\n"),
        };
        output::complain(&text);
        self.exit_status()
    }
}
