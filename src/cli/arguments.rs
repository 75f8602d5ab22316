//! The command line as it is typed.

use super::daily::WaterYears;
use super::pictures::Pictures;
use clap::{Args, Parser, Subcommand, ValueEnum};
use clap_complete::Shell;
use std::ffi::OsStr;
use std::io::IsTerminal;
use std::path::PathBuf;

/// How much snow water is left, and how much earlier it melts, as a basin warms.
#[derive(Debug, Parser)]
#[command(name = "thawline", version, max_term_width = 80, propagate_version = true)]
pub(super) struct Arguments {
    #[command(flatten)]
    pub shared: Shared,
    #[command(subcommand)]
    pub command: Command,
}

#[derive(Debug, Subcommand)]
pub(super) enum Command {
    /// Run every realization under every level; leave figures, tables and a briefing
    Study {
        /// The scenario, a TOML file; `-` reads it from standard input
        scenario: PathBuf,
        /// Open the briefing in your browser once it is written; not with --json
        #[arg(long)]
        open: bool,
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
    /// Search for parameters nearest to observed snow; judge them on winters not seen
    Fit {
        /// The scenario, a TOML file; `-` reads it from standard input
        scenario: PathBuf,
        /// Open the page in your browser once it is written; not with --json
        #[arg(long)]
        open: bool,
        #[command(flatten)]
        pictures: Pictures,
    },
    /// Write station weather, day by day, as CSV: the record, or a realization of it
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
    /// Write completions of commands and flags for a shell, to standard output
    Completions {
        /// The shell that is to complete them
        shell: Shell,
    },
    /// Write the manual page, for man, to standard output
    Manual,
}

impl Command {
    /// Where it writes, of a command that has no use for `--into`.
    pub fn writes_elsewhere(&self) -> Option<&'static str> {
        match self {
            Self::Check { .. } => Some("check writes nothing"),
            Self::Start { .. } => Some("start writes into the folder that it is given"),
            Self::Completions { .. } => Some("completions go to standard output"),
            Self::Manual => Some("the manual goes to standard output"),
            Self::Study { .. } | Self::Daily { .. } | Self::Fit { .. } | Self::Weather { .. } => None,
        }
    }
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
#[command(next_help_heading = "Options of every command")]
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
    /// One JSON document on standard output in place of the words, on failure too; daily and weather need --into with it
    #[arg(long, global = true)]
    pub json: bool,
}

impl Shared {
    /// Whether messages on standard error are coloured.
    pub fn is_coloured(&self) -> bool {
        self.color.is_used(std::io::stderr().is_terminal())
    }
}

impl Colour {
    /// Whether to colour what goes to a terminal, or to anything else.
    pub fn is_used(self, is_terminal: bool) -> bool {
        let [no_color, term] = ["NO_COLOR", "TERM"].map(std::env::var_os);
        self.is_used_with(is_terminal, no_color.as_deref(), term.as_deref())
    }

    /// `NO_COLOR` counts where it is set and not empty (no-color.org); a dumb terminal knows no colours.
    fn is_used_with(self, is_terminal: bool, no_color: Option<&OsStr>, term: Option<&OsStr>) -> bool {
        match self {
            Self::Always => true,
            Self::Never => false,
            Self::Auto => {
                is_terminal && no_color.is_none_or(OsStr::is_empty) && term.is_none_or(|term| term != "dumb")
            }
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    /// The convention of no-color.org: present and not empty means no colour, whatever its value; empty is as if it were unset.
    #[test]
    fn who_asks_for_no_colour_gets_none() {
        let auto = |no_color: Option<&str>, term: Option<&str>| {
            Colour::Auto.is_used_with(true, no_color.map(OsStr::new), term.map(OsStr::new))
        };
        assert!(auto(None, None) && auto(Some(""), Some("xterm")));
        assert!(!auto(Some("1"), None) && !auto(Some("0"), None) && !auto(None, Some("dumb")));
        assert!(!Colour::Auto.is_used_with(false, None, Some(OsStr::new("xterm"))));
        assert!(!Colour::Never.is_used_with(true, None, None));
        assert!(Colour::Always.is_used_with(false, Some(OsStr::new("1")), Some(OsStr::new("dumb"))));
    }
}
