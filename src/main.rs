//! Starts thawline and ends with its exit status.

#![forbid(unsafe_code)]

use std::process::ExitCode;

fn main() -> ExitCode {
    ExitCode::from(thawline::cli::run())
}
