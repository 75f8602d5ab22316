//! The command line as it is typed.

use super::daily::WaterYears;
use super::pictures::Pictures;
use clap::{Args, Parser, Subcommand, ValueEnum};
use std::io::IsTerminal;
use std::path::PathBuf;

const EXAMPLES: &str = "\
Examples:
  $ thawline study scenarios/alder-fork.toml
      figures, tables and a briefing into output/alder-fork/
  $ thawline check scenarios/alder-fork.toml
      what would be used, and what was found in the record
  $ thawline daily scenarios/alder-fork.toml > alder-fork-daily.csv
      every day of every band of the record, without any warming

Exit status: 0 done, 1 a fault of thawline, 2 command line, 3 the scenario or
its data, 4 the file system, 130 interrupted.

A planning aid: not for flood forecasting or the operation of dams.";

/// How much snow water is left, and how much earlier it melts, as a basin warms.
#[derive(Debug, Parser)]
#[command(name = "thawline", version, after_help = EXAMPLES, max_term_width = 80, propagate_version = true)]
pub(super) struct Arguments {
    #[command(flatten)]
    pub shared: Shared,
    #[command(subcommand)]
    pub command: Command,
}

#[derive(Debug, Subcommand)]
pub(super) enum Command {
    /// Run every realization under every warming level; leave figures, tables and a briefing
    Study {
        /// The scenario, a TOML file; `-` reads it from standard input
        scenario: PathBuf,
        #[command(flatten)]
        pictures: Pictures,
    },
    /// Run the record as observed; daily states and fluxes of every band as CSV
    Daily {
        /// The scenario, a TOML file; `-` reads it from standard input
        scenario: PathBuf,
        /// Draw these water years, too, at most 5: 2011, or 2010-2012; needs --into
        #[arg(long, value_name = "YEARS")]
        draw_years: Option<WaterYears>,
        /// Of which place: basin, a band by its number from the lowest, 1, or a site with observed snow by its name
        #[arg(long, value_name = "PLACE", requires = "draw_years")]
        draw_band: Option<String>,
        #[command(flatten)]
        pictures: Pictures,
    },
    /// Search for parameters that bring the model nearest to observed snow; judge them on winters not seen
    Fit {
        /// The scenario, a TOML file; `-` reads it from standard input
        scenario: PathBuf,
        #[command(flatten)]
        pictures: Pictures,
    },
    /// Write station weather, day by day, as CSV: the record as realizations are made from it, or a realization
    Weather {
        /// The scenario, a TOML file; `-` reads it from standard input
        scenario: PathBuf,
        /// Which realization, 1 the first; the record itself if left out
        #[arg(long, value_name = "N", value_parser = clap::value_parser!(u32).range(1..=100_000))]
        realization: Option<u32>,
    },
    /// Read and check everything a study would use; write nothing
    Check {
        /// The scenario, a TOML file; `-` reads it from standard input
        scenario: PathBuf,
        /// Make the weather of realizations, too, and hold the record against it
        #[arg(long)]
        weather: bool,
    },
    /// Write the demo scenarios and their invented data
    Start {
        /// The folder to write into
        folder: PathBuf,
    },
}

/// When to colour.
#[derive(Debug, Clone, Copy, PartialEq, Eq, ValueEnum)]
pub(super) enum Colour {
    /// On a terminal, unless NO_COLOR is set
    Auto,
    /// Always
    Always,
    /// Never
    Never,
}

/// Flags that every command takes.
#[derive(Debug, Args)]
pub(super) struct Shared {
    /// Threads; all cores if left out. Results are the same on any number
    #[arg(long, global = true, value_name = "N", value_parser = clap::value_parser!(u16).range(1..=1024))]
    pub threads: Option<u16>,
    /// Seed, in place of the scenario's
    #[arg(long, global = true, value_name = "N", value_parser = clap::value_parser!(u64).range(0..=i64::MAX as u64))]
    pub seed: Option<u64>,
    /// Say nothing but errors
    #[arg(long, short, global = true)]
    pub quiet: bool,
    /// Folder for the results, in place of output/<scenario's name>
    #[arg(long, global = true, value_name = "DIR")]
    pub into: Option<PathBuf>,
    /// Replace what stands in the results' folder, whatever it is
    #[arg(long, global = true)]
    pub force: bool,
    /// Colour in messages
    #[arg(long, global = true, value_enum, default_value_t = Colour::Auto)]
    pub color: Colour,
    /// One JSON document on standard output in place of the words, on failure too
    #[arg(long, global = true)]
    pub json: bool,
}

impl Shared {
    /// Whether messages on standard error are coloured.
    pub fn is_coloured(&self) -> bool {
        let is_set = |name: &str| std::env::var_os(name).is_some_and(|value| !value.is_empty());
        let is_dumb = std::env::var_os("TERM").is_some_and(|term| term == "dumb");
        match self.color {
            Colour::Always => true,
            Colour::Never => false,
            Colour::Auto => std::io::stderr().is_terminal() && !is_set("NO_COLOR") && !is_dumb,
        }
    }
}
