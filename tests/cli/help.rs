//! Help: where it comes from, what it leads with, and what is said where the command line is not understood.

use super::basin::Basin;

/// The commands as help lists them.
pub(super) fn commands() -> Vec<String> {
    let help = Basin::new().run("--help").stdout;
    let list = help.split_once("\nCommands:\n").unwrap().1.split_once("\n\n").unwrap().0;
    let named = list.lines().filter(|line| line.starts_with("  ") && !line.starts_with("   "));
    let commands: Vec<String> =
        named.map(|line| line.split_whitespace().next().unwrap().to_owned()).collect();
    assert!(commands.len() > 8, "{commands:?}");
    commands.into_iter().filter(|command| command != "help").collect()
}

/// What to type for a page of help, each with the page: of the program, and of every command.
pub(super) fn pages() -> Vec<(String, String)> {
    let basin = Basin::new();
    let of_commands = commands().into_iter().map(|command| format!("{command} --help"));
    let typed = ["--help".to_owned(), "-h".to_owned(), "help help".to_owned()].into_iter().chain(of_commands);
    typed.map(|words| (basin.run(&words).stdout, words)).map(|(page, words)| (words, page)).collect()
}

/// However it is asked for, on standard output with status 0, in 80 columns, and without a mark of colour.
#[test]
fn help_however_it_is_asked_for() {
    let basin = Basin::new();
    let mut typed: Vec<[String; 3]> = vec![["-h", "--help", "help"].map(str::to_owned)];
    for command in commands() {
        typed.push([format!("{command} -h"), format!("{command} --help"), format!("help {command}")]);
    }
    for [short, long, named] in typed {
        for words in [&short, &long, &named] {
            let mut wide = basin.command(words);
            let ended = super::basin::ended(wide.env("COLUMNS", "200"));
            assert_eq!((ended.status, ended.stderr.as_str()), (0, ""), "{words}");
            assert!(ended.stdout.contains("Usage: thawline") && !ended.stdout.contains('\u{1b}'), "{words}");
            let longest = ended.stdout.lines().map(|line| line.chars().count()).max();
            assert!(longest <= Some(80), "{words}: {longest:?}");
        }
        assert_eq!(basin.run(&long).stdout, basin.run(&named).stdout, "{named}");
    }
}

/// One line of what it is, then one to three examples, then how the line is built.
#[test]
fn help_leads_with_examples() {
    for (words, page) in pages().into_iter().filter(|(words, _)| words != "help help") {
        let lines: Vec<&str> = page.lines().collect();
        assert_eq!((lines[1], lines[2]), ("", "Examples:"), "{words}: {page}");
        let usage = lines.iter().position(|line| line.starts_with("Usage: ")).unwrap();
        let examples = lines.iter().enumerate().filter(|(_, line)| line.starts_with("  $ thawline "));
        let at: Vec<usize> = examples.map(|(at, _)| at).collect();
        assert!((1..=3).contains(&at.len()) && at.iter().all(|at| *at < usage), "{words}: {page}");
        // Each with what it does below it, and of the command that is asked about.
        assert!(at.iter().all(|at| lines[at + 1].starts_with("      ")), "{words}: {page}");
        let command = words.strip_suffix(" --help").unwrap_or("");
        let is_of = |line: &str| line.starts_with(&format!("  $ thawline {command}"));
        assert!(at.iter().all(|at| is_of(lines[*at])), "{words}: {page}");
    }
    let help = Basin::new().run("--help").stdout;
    assert!(help.contains("README.md") && !help.contains("://"), "{help}");
}

/// Nothing to do is no success: usage on standard error, status 2, nothing on standard output.
#[test]
fn what_is_missing_is_said_with_the_usage() {
    let basin = Basin::new();
    for words in ["", "study", "daily", "fit", "weather", "check", "start", "completions", "--quiet"] {
        let ended = basin.run(words);
        assert_eq!((ended.status, ended.stdout.as_str()), (2, ""), "thawline {words}");
        assert!(ended.stderr.contains("Usage: thawline"), "thawline {words}: {}", ended.stderr);
    }
}

/// A near miss is told what was meant.
#[test]
fn near_misses() {
    let basin = Basin::new();
    for (typed, meant) in [
        ("chek scenario.toml", "'check'"),
        ("stduy scenario.toml", "'study'"),
        ("manuel", "'manual'"),
        ("study scenario.toml --sed 3", "'--seed'"),
        ("study scenario.toml --opn", "'--open'"),
        ("daily scenario.toml --draw-year 2001", "'--draw-years'"),
        ("completions bsh", "'bash'"),
        ("check scenario.toml --color nver", "'never'"),
    ] {
        let ended = basin.run(typed);
        assert_eq!((ended.status, ended.stdout.as_str()), (2, ""), "{typed}");
        assert!(
            ended.stderr.contains("similar") && ended.stderr.contains(meant),
            "{typed}: {}",
            ended.stderr
        );
    }
}
