//! The command line: what was typed, one file a command, and how each ends.

mod arguments;
mod assemble;
mod break_even;
mod browser;
mod check;
mod clashes;
mod completions;
mod daily;
mod done;
mod ending;
mod examples;
mod failure;
mod fit;
mod generator_sheet;
mod held_to_inflow;
mod help;
mod input;
mod last_words;
mod level_groups;
mod manual;
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
use clap::FromArgMatches;

/// Runs the program and gives its exit status: 0 done, 1 a fault of ours, 2 command line, 3 the scenario or its data,
/// 4 the file system, 130 interrupted.
pub fn run() -> u8 {
    let typed = help::command().try_get_matches();
    let arguments = match typed.and_then(|typed| Arguments::from_arg_matches(&typed)) {
        Ok(arguments) => arguments,
        Err(error) => return help::instead_of_a_command(&error),
    };
    let shared = arguments.shared;
    if let Some(place) = arguments.command.writes_elsewhere().filter(|_| shared.into.is_some()) {
        let failure = Failure::CommandLine(format!("{place}: leave --into out"));
        return last_words::say(&failure, &shared);
    }
    let result = match arguments.command {
        Command::Study { scenario, open, pictures } => study::run(&scenario, open, pictures, &shared),
        Command::Daily { scenario, draw_years, draw_band, pictures } => {
            let asked = draw_years.map(|years| daily::Asked { years, place: draw_band });
            daily::run(&scenario, asked.as_ref(), pictures, &shared)
        }
        Command::Fit { scenario, open, pictures } => fit::run(&scenario, open, pictures, &shared),
        Command::Weather { scenario, realization } => weather::run(&scenario, realization, &shared),
        Command::Check { scenario, weather } => check::run(&scenario, weather, &shared),
        Command::Start { folder } => start::run(&folder, &shared),
        Command::Completions { shell } => completions::run(shell, &shared),
        Command::Manual => manual::run(&shared),
    };
    match result {
        Ok(()) => status::DONE,
        Err(failure) => last_words::say(&failure, &shared),
    }
}
