//! The manual: one page for man that says what help says.

use super::basin::Basin;
use super::help::{commands, pages};
use std::collections::BTreeSet;

/// The page without man's marks.
fn manual() -> String {
    let ended = Basin::new().run("manual");
    assert_eq!((ended.status, ended.stderr.as_str()), (0, ""));
    ended.stdout.replace("\\-", "-").replace("\\fB", "").replace("\\fI", "").replace("\\fR", "")
}

#[test]
fn every_command_and_flag_of_help_is_in_it() {
    let manual = manual();
    for command in commands() {
        assert!(manual.contains(&format!(".SS \"thawline {command}\"\n")), "{command}");
    }
    let mut flags = BTreeSet::new();
    for (_, page) in pages() {
        // What help says of a flag stands farther in.
        let of_options =
            page.lines().filter(|line| line.trim_start().starts_with('-') && !line.starts_with("       "));
        flags.extend(of_options.map(|line| line.trim().split("  ").next().unwrap().to_owned()));
    }
    assert!(flags.len() >= 14, "{flags:?}");
    for flag in flags {
        assert!(manual.lines().any(|line| line.split(" [default").next() == Some(&flag)), "{flag}: {manual}");
    }
    for heading in ["NAME", "SYNOPSIS", "EXAMPLES", "OPTIONS", "COMMANDS", "FILES", "ENVIRONMENT", "CAUTIONS"]
    {
        assert!(manual.contains(&format!(".SH {heading}\n")), "{heading}");
    }
    for variable in ["NO_COLOR", "TERM", "BROWSER"] {
        assert!(manual.contains(&format!("\n{variable}\n")), "{variable}");
    }
}

/// The statuses of help are those of the manual, in order and to the letter, and all that there are.
#[test]
fn exit_statuses_are_those_of_help() {
    let help = Basin::new().run("--help").stdout;
    let of_help: Vec<(&str, &str)> = help
        .split_once("\nExit status:\n")
        .unwrap()
        .1
        .split_once("\n\n")
        .unwrap()
        .0
        .lines()
        .map(|line| line.trim().split_once("  ").unwrap())
        .collect();
    let numbers: Vec<&str> = of_help.iter().map(|(status, _)| *status).collect();
    assert_eq!(numbers, ["0", "1", "2", "3", "4", "130"]);
    let manual = manual();
    let section = manual.split_once(".SH \"EXIT STATUS\"\n").unwrap().1.split_once("\n.SH ").unwrap().0;
    let of_manual: Vec<(&str, &str)> =
        section.split(".TP\n").skip(1).map(|entry| entry.trim_end().split_once('\n').unwrap()).collect();
    assert_eq!(of_manual, of_help);
}
