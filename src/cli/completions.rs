//! `thawline completions`: what a shell needs to complete commands and flags.

use super::arguments::Shared;
use super::failure::Failure;
use super::{help, output};
use clap_complete::Shell;

/// Runs the command.
pub(super) fn run(shell: Shell, shared: &Shared) -> Result<(), Failure> {
    if shared.json {
        return Err(Failure::CommandLine(
            "completions are a script for a shell, no JSON document: leave --json out".to_owned(),
        ));
    }
    let mut script = Vec::new();
    clap_complete::generate(shell, &mut help::command(), "thawline", &mut script);
    output::print(&script)
}
