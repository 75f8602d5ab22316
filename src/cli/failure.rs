//! How a command fails: what is said, and with which exit status.

use super::arguments::Shared;
use crate::fault::Fault;
use crate::report::{PublishError, may_replace};
use crate::scenario::{Document, Drawing, Located, draw, located};
use std::path::Path;
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

    /// Each with what it means, as help and manual say it.
    pub const MEANINGS: [(u8, &str); 6] = [
        (DONE, "done"),
        (OURS, "a fault of thawline's own; please report it"),
        (COMMAND_LINE, "the command line asks for what cannot be"),
        (INPUT, "the scenario or its data, a missing file of data included"),
        (FILE_SYSTEM, "the file system: something could not be written"),
        (INTERRUPTED, "interrupted; earlier results stand as they were"),
    ];
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

    /// Faults of the scenario or its data, drawn against the scenario's text.
    pub(super) fn input(faults: &[Fault], file: &str, text: &str, is_coloured: bool) -> Self {
        let document = Document::parse(text);
        let drawing = Drawing { file, text, document: &document, is_coloured };
        Self::Input {
            drawn: draw(faults, &drawing),
            faults: faults.iter().map(|fault| located(fault, &drawing)).collect(),
        }
    }
}

/// Refuses a target folder that holds anything but earlier results of the same command, unless `--force` is given.
pub(super) fn may_be_replaced(target: &Path, command: &str, shared: &Shared) -> Result<(), Failure> {
    if shared.force { Ok(()) } else { may_replace(target, command).map_err(|error| unpublished(&error)) }
}

/// A failure to publish.
pub(super) fn unpublished(error: &PublishError) -> Failure {
    Failure::FileSystem(error.to_string())
}
