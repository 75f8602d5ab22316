//! Standard streams and exit statuses.

use super::basin::{Basin, SCENARIO, ended};
use std::process::Command;

#[test]
fn exit_statuses_of_the_command_line() {
    let basin = Basin::new();
    for (words, status) in [
        ("", 2),
        ("stduy scenario.toml", 2),
        ("study", 2),
        ("study scenario.toml --threads 0", 2),
        ("--help", 0),
        ("help study", 0),
        ("--version", 0),
        ("check nowhere.toml", 3),
        ("check .", 3),
        ("check scenario.toml", 0),
        ("daily scenario.toml --json", 2),
    ] {
        let ended = basin.run(words);
        assert_eq!(ended.status, status, "thawline {words}: {}", ended.stderr);
        if status != 0 {
            assert_eq!(
                ended.stdout.is_empty(),
                !words.contains("--json"),
                "thawline {words}: {}",
                ended.stdout
            );
        }
    }
}

/// A scenario on standard input is read relative to the current folder, and a study of it needs --into.
#[test]
fn a_scenario_from_standard_input() {
    let basin = Basin::new();
    let piped = ended(basin.command("check -").write_stdin(SCENARIO));
    assert_eq!((piped.status, piped.stdout), (0, basin.run("check scenario.toml").stdout));
    assert_eq!(ended(basin.command("study -").write_stdin(SCENARIO)).status, 2);
    let studied = ended(basin.command("study - --into there").write_stdin(SCENARIO));
    assert_eq!(studied.status, 0, "{}", studied.stderr);
    assert!(basin.path().join("there/briefing.html").is_file());
}

/// With --json there is one document on standard output, on success and on failure.
#[test]
fn json_documents() {
    let basin = Basin::new();
    let parse = |text: &str| serde_json::from_str::<serde_json::Value>(text).unwrap();
    assert_eq!(parse(&basin.run("study --json").stdout)["exit_status"], 2);
    let done = parse(&basin.run("study scenario.toml --json").stdout);
    assert_eq!((done["status"].as_str(), done["schema_version"].as_u64()), (Some("done"), Some(3)));
    assert!(done["answer"]["verdict"].as_str().unwrap().contains("1 April SWE"));
    let checked = parse(&basin.run("check scenario.toml --json").stdout);
    assert_eq!(checked["water_years_in_use"].as_array().map(Vec::len), Some(3));
    basin.exchange("seed = 5", "sead = 5");
    let failed = basin.run("study scenario.toml --json");
    let document = parse(&failed.stdout);
    assert_eq!((failed.status, failed.stderr.as_str()), (3, ""));
    assert_eq!(
        (document["faults"][0]["line"].as_u64(), document["exit_status"].as_u64()),
        (Some(2), Some(3))
    );
}

/// Off a terminal there are plain lines on standard error and nothing on standard output; --quiet silences success
/// and not faults; colour comes only when asked for.
#[test]
fn plain_lines_off_a_terminal() {
    let basin = Basin::new();
    let study = basin.run("study scenario.toml");
    assert_eq!((study.status, study.stdout.as_str()), (0, ""));
    assert!(
        !study.stderr.contains(['\r', '\u{1b}']) && study.stderr.lines().count() >= 3,
        "{}",
        study.stderr
    );
    let quiet = basin.run("study scenario.toml --quiet");
    assert_eq!((quiet.status, quiet.stdout.as_str(), quiet.stderr.as_str()), (0, "", ""));
    basin.exchange("seed = 5", "sead = 5");
    assert!(basin.run("check scenario.toml --quiet").stderr.contains("'seed'?"));
    assert!(basin.run("check scenario.toml --color always").stderr.contains('\u{1b}'));
}

/// A reader that goes away ends the daily table quietly; a full disk behind standard output is an error.
#[test]
#[cfg(target_os = "linux")]
fn closed_pipe_and_full_disk() {
    let basin = Basin::new();
    let shell = format!("{} daily scenario.toml --quiet | head -1", env!("CARGO_BIN_EXE_thawline"));
    let piped = Command::new("sh").arg("-c").arg(shell).current_dir(basin.path()).output().unwrap();
    assert!(piped.status.success() && piped.stderr.is_empty(), "{piped:?}");
    let of_scenario =
        ["check scenario.toml", "daily scenario.toml", "weather scenario.toml", "study scenario.toml --json"];
    let of_nothing =
        ["--help", "help study", "fit -h", "--version", "manual", "completions bash", "study --json"];
    for words in of_scenario.into_iter().chain(of_nothing) {
        let full = std::fs::File::options().write(true).open("/dev/full").unwrap();
        let ended = Command::new(env!("CARGO_BIN_EXE_thawline"))
            .args(words.split_whitespace())
            .current_dir(basin.path())
            .stdout(full)
            .output()
            .unwrap();
        assert_eq!(ended.status.code(), Some(4), "{words}");
        let said = String::from_utf8(ended.stderr).unwrap();
        assert!(
            said.contains("cannot write to standard output") || words.contains("--json"),
            "{words}: {said}"
        );
    }
}

/// Nothing ever asks: every command does its work, and says its help, with no standard input at all.
#[test]
#[cfg(unix)]
fn without_standard_input() {
    let basin = Basin::new();
    for words in [
        "study scenario.toml --quiet",
        "study scenario.toml --quiet",
        "daily scenario.toml",
        "weather scenario.toml",
        "check scenario.toml",
        "start demo",
        "start demo",
        "completions zsh",
        "manual",
        "--help",
    ] {
        let line = format!("exec '{}' {words} <&-", env!("CARGO_BIN_EXE_thawline"));
        let ended = Command::new("sh").args(["-c", &line]).current_dir(basin.path()).output().unwrap();
        assert!(ended.status.success(), "{words}: {ended:?}");
    }
}
