//! What help says, and how it leaves the program; and what is said where the command line could not be read.

use super::arguments::{Arguments, Colour};
use super::examples::{Example, OF_THE_PROGRAM, of_command};
use super::failure::{Failure, status};
use super::{last_words, output};
use clap::error::ErrorKind;
use clap::{CommandFactory, ValueEnum};
use std::ffi::OsString;
use std::fmt::Write;
use std::io::IsTerminal;

/// What it is, examples, and only then how the line is built.
const TEMPLATE: &str = "\
{about-with-newline}
{before-help}{usage-heading} {usage}

{all-args}{after-help}";

/// Where more is told.
pub(super) const MORE: &str = "\
Your own basin in ten minutes, what the method does and what it does not: \
README.md, beside thawline's source.";

/// What must not be done with it.
pub(super) const CAUTION: &str = "A planning aid: not for flood forecasting or the operation of dams.";

/// The command line with its help.
pub(super) fn command() -> clap::Command {
    Arguments::command()
        .subcommand_value_name("COMMAND")
        .help_template(TEMPLATE)
        .before_help(in_words(&OF_THE_PROGRAM))
        .after_help(last_of_help())
        .mut_subcommands(|command| {
            let examples = in_words(of_command(command.get_name()));
            command.help_template(TEMPLATE).before_help(examples)
        })
}

fn in_words(examples: &[Example]) -> String {
    let mut text = String::from("Examples:");
    for Example { typed, does } in examples {
        let _ = write!(text, "\n  $ {typed}\n      {does}");
    }
    text
}

fn last_of_help() -> String {
    let mut text = String::from("Exit status:");
    for (status, meaning) in status::MEANINGS {
        let _ = write!(text, "\n  {status:>3}  {meaning}");
    }
    let _ = write!(text, "\n\n{MORE}\n\n{CAUTION}");
    text
}

/// Help and version on standard output; what is wrong with the command line on standard error, or as a document. Gives the
/// exit status.
pub(super) fn instead_of_a_command(error: &clap::Error) -> u8 {
    let typed: Vec<OsString> = std::env::args_os().collect();
    let is_help = matches!(error.kind(), ErrorKind::DisplayHelp | ErrorKind::DisplayVersion);
    if !is_help && typed.iter().any(|word| word == "--json") {
        let message = error.render().to_string().trim_end().to_owned();
        return last_words::document(&Failure::CommandLine(message));
    }
    let is_terminal = if is_help { std::io::stdout().is_terminal() } else { std::io::stderr().is_terminal() };
    let styled = error.render();
    let text = match colour(&typed).is_used(is_terminal) {
        true => styled.ansi().to_string(),
        false => styled.to_string(),
    };
    if !is_help {
        output::complain(&text);
        return status::COMMAND_LINE;
    }
    match output::print(text.as_bytes()) {
        Ok(()) => status::DONE,
        Err(failure) => last_words::on_standard_error(&failure),
    }
}

/// When to colour, looked up in a line that could not be read as a whole.
fn colour(typed: &[OsString]) -> Colour {
    let words = typed.iter().map(|word| word.to_string_lossy());
    let following = words.clone().skip(1).map(Some).chain([None]);
    let named = words.zip(following).find_map(|(word, next)| match word.strip_prefix("--color") {
        Some("") => next.map(std::borrow::Cow::into_owned),
        Some(rest) => rest.strip_prefix('=').map(str::to_owned),
        None => None,
    });
    named.and_then(|name| Colour::from_str(&name, false).ok()).unwrap_or(Colour::Auto)
}
