//! Starts thawline and ends with its exit status.

use std::process::ExitCode;

fn main() -> ExitCode {
    ExitCode::from(thawline::cli::run())
}
