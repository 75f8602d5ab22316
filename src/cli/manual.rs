//! `thawline manual`: one page for man, of every command.

use super::arguments::Shared;
use super::examples::{Example, OF_THE_PROGRAM, of_command};
use super::failure::{Failure, status};
use super::{help, output};
use clap_mangen::Man;
use roff::{Inline, Roff, bold, roman};
use std::io;

const ABOUT_FILES: [(&str, &str); 5] = [
    ("SCENARIO", "a commented TOML file; the paths in it are relative to its folder"),
    (
        "output/<scenario's name>/",
        "what a study leaves, or in the folder that --into names: briefing.html, the page to read first; figures/*.svg; \
         tables/*.csv, the same in tables.xlsx, told to programs in datapackage.json; summary.json, every number; \
         run.json, what repeats the run",
    ),
    (
        "output/<scenario's name>-fit/",
        "what a fit leaves: fit.html, parameters.toml, parameter-sets.csv and more",
    ),
    ("daily.csv, weather.csv", "what daily and weather leave in the folder that --into names"),
    ("README.md", "beside thawline's source: how to prepare a basin of your own, every command and file"),
];

const ENVIRONMENT: [(&str, &str); 3] = [
    ("NO_COLOR", "set and not empty: no colour, unless --color always is given"),
    ("TERM", "dumb: no colour and no bar of progress"),
    (
        "BROWSER",
        "what --open starts, where it is set, but on Windows: programs parted by colons, the first that starts is \
         taken; %s stands for the page",
    ),
];

/// Runs the command.
pub(super) fn run(shared: &Shared) -> Result<(), Failure> {
    if shared.json {
        return Err(Failure::CommandLine(
            "the manual is a page for man, no JSON document: leave --json out".to_owned(),
        ));
    }
    let page = page().map_err(|error| Failure::Ours(error.to_string()))?;
    output::print(page.as_bytes())
}

/// The page, in the language of man.
fn page() -> io::Result<String> {
    let command = help::command();
    let whole = Man::new(command.clone().disable_help_subcommand(true)).manual("thawline");
    let mut title = Vec::new();
    whole.render_title(&mut title)?;
    let mut text = in_utf8(title)?;
    text += &part_of(|page| whole.render_name_section(page), "NAME", ".SH NAME\n")?;
    text += &part_of(|page| whole.render_synopsis_section(page), "SYNOPSIS", ".SH SYNOPSIS\n")?;
    text += &examples("SH", &OF_THE_PROGRAM);
    text += &part_of(|page| whole.render_options_section(page), "OPTIONS", ".SH OPTIONS\n")?;
    text += &Roff::new().control("SH", ["COMMANDS"]).to_roff();
    for command in command.get_subcommands() {
        let name = command.get_name();
        let typed = format!("thawline {name}");
        let own =
            Man::new(command.clone().bin_name(&typed).disable_version_flag(true).disable_help_flag(true));
        text += &Roff::new().control("SS", [typed.as_str()]).to_roff();
        text += &part_of(|page| own.render_description_section(page), "DESCRIPTION", "")?;
        text += &Roff::new().control("PP", []).to_roff();
        text += &part_of(|page| own.render_synopsis_section(page), "SYNOPSIS", "")?;
        text += &part_of(|page| own.render_options_section(page), "OPTIONS", "")?;
        text += &examples("PP", of_command(name));
    }
    let statuses: Vec<(String, &str)> =
        status::MEANINGS.iter().map(|(status, meaning)| (status.to_string(), *meaning)).collect();
    let statuses: Vec<(&str, &str)> =
        statuses.iter().map(|(status, meaning)| (status.as_str(), *meaning)).collect();
    text += &list("EXIT STATUS", &statuses);
    text += &list("FILES", &ABOUT_FILES);
    text += &list("ENVIRONMENT", &ENVIRONMENT);
    text += &Roff::new().control("SH", ["CAUTIONS"]).text([roman(help::CAUTION)]).to_roff();
    Ok(text)
}

/// What a renderer writes under a heading of its own, under another.
fn part_of(
    render: impl Fn(&mut dyn io::Write) -> io::Result<()>,
    heading: &str,
    instead: &str,
) -> io::Result<String> {
    let mut written = Vec::new();
    render(&mut written)?;
    let written = in_utf8(written)?;
    // A command without flags of its own has no such part.
    let part = written.split_once(&format!(".SH {heading}\n"));
    Ok(part.map_or(String::new(), |(_, part)| format!("{instead}{part}")))
}

fn in_utf8(bytes: Vec<u8>) -> io::Result<String> {
    String::from_utf8(bytes).map_err(io::Error::other)
}

/// Examples under a heading of their own, or as a paragraph.
fn examples(heading: &str, examples: &[Example]) -> String {
    let mut roff = Roff::new();
    match heading {
        "SH" => roff.control("SH", ["EXAMPLES"]),
        _ => roff.control("PP", []).text([roman("Examples:")]),
    };
    // As they are typed: a line that is filled or broken is another command.
    roff.control("nf", []);
    for Example { typed, does } in examples {
        roff.text([bold(format!("$ {typed}"))]).text([roman(format!("    {does}"))]);
    }
    roff.control("fi", []);
    roff.to_roff()
}

fn list(heading: &str, entries: &[(&str, &str)]) -> String {
    let mut roff = Roff::new();
    roff.control("SH", [heading]);
    for (what, meaning) in entries {
        entry(&mut roff, bold(*what), meaning);
    }
    roff.to_roff()
}

fn entry(roff: &mut Roff, what: Inline, meaning: &str) {
    roff.control("TP", []).text([what]).text([roman(meaning)]);
}
