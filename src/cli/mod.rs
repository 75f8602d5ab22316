//! The command line: what was typed, one file a command, and how each ends.

mod arguments;
mod assemble;
mod break_even;
mod check;
mod clashes;
mod daily;
mod failure;
mod fit;
mod generator_sheet;
mod input;
mod last_words;
mod level_groups;
mod output;
mod own_years;
mod parameter_sets;
mod pictures;
mod places;
mod pool;
mod progress;
mod ready;
mod replayed_years;
mod rule_panel;
mod runs;
mod size;
mod start;
mod study;
mod surface;
mod weather;
mod wetness;

pub use failure::{Failure, status};

use arguments::{Arguments, Command};
use clap::Parser;
use clap::error::ErrorKind;

/// Runs the program and gives its exit status: 0 done, 1 a fault of ours, 2 command line, 3 the scenario or its data,
/// 4 the file system, 130 interrupted.
pub fn run() -> u8 {
    let arguments = match Arguments::try_parse() {
        Ok(arguments) => arguments,
        Err(error) => return without_arguments(&error),
    };
    let shared = arguments.shared;
    let result = match arguments.command {
        Command::Study { scenario, pictures } => study::run(&scenario, pictures, &shared),
        Command::Daily { scenario, draw_years, draw_band, pictures } => {
            let asked = draw_years.map(|years| daily::Asked { years, place: draw_band });
            daily::run(&scenario, asked.as_ref(), pictures, &shared)
        }
        Command::Fit { scenario, pictures } => fit::run(&scenario, pictures, &shared),
        Command::Weather { scenario, realization } => weather::run(&scenario, realization, &shared),
        Command::Check { scenario, weather } => check::run(&scenario, weather, &shared),
        Command::Start { folder } => start::run(&folder, &shared),
    };
    match result {
        Ok(()) => status::DONE,
        Err(failure) => last_words::say(&failure, &shared),
    }
}

/// Help and version on standard output; what is wrong with the command line on standard error, or as a document.
fn without_arguments(error: &clap::Error) -> u8 {
    let is_help = matches!(error.kind(), ErrorKind::DisplayHelp | ErrorKind::DisplayVersion);
    if !is_help && std::env::args_os().any(|argument| argument == "--json") {
        let text = error.render().to_string();
        return last_words::document(&Failure::CommandLine(text.trim_end().to_owned()));
    }
    match (is_help, error.print()) {
        (true, Ok(())) => status::DONE,
        (true, Err(_)) => status::FILE_SYSTEM,
        (false, _) => status::COMMAND_LINE,
    }
}
