//! Colour on a terminal, which `script` stands for: unless somebody asks for none.
#![cfg(target_os = "linux")]

use super::basin::Basin;
use std::process::Command;

/// What a command says on a terminal, in an environment.
fn on_a_terminal(basin: &Basin, words: &str, environment: &[(&str, &str)]) -> String {
    let line = format!("'{}' {words}", env!("CARGO_BIN_EXE_thawline"));
    let ended = Command::new("script")
        .args(["-qec", &line, "/dev/null"])
        .current_dir(basin.path())
        .env_remove("NO_COLOR")
        .env("TERM", "xterm")
        .envs(environment.iter().copied())
        .output()
        .unwrap();
    String::from_utf8(ended.stdout).unwrap()
}

/// Faults, help and usage alike: coloured on a terminal; not where NO_COLOR is set and not empty (no-color.org), the terminal is
/// dumb, or never is typed.
#[test]
fn colour_only_where_it_is_wanted() {
    let basin = Basin::new();
    basin.exchange("seed = 5", "sead = 5");
    for words in ["check scenario.toml", "--help", "help study", "study"] {
        let is_coloured = |more: &str, environment: &[(&str, &str)]| {
            let said = on_a_terminal(&basin, &format!("{words} {more}"), environment);
            assert!(said.len() > 50, "{words}: {said}");
            said.contains('\u{1b}')
        };
        assert!(is_coloured("", &[]), "{words}");
        assert!(is_coloured("", &[("NO_COLOR", "")]), "{words}: an empty NO_COLOR is none");
        assert!(!is_coloured("", &[("NO_COLOR", "1")]), "{words}");
        assert!(!is_coloured("", &[("TERM", "dumb")]), "{words}");
        if !words.starts_with("help") {
            assert!(!is_coloured("--color never", &[]), "{words}");
            assert!(!is_coloured("--color=never", &[]), "{words}");
            assert!(is_coloured("--color always", &[("NO_COLOR", "1"), ("TERM", "dumb")]), "{words}");
        }
    }
}

/// A dumb terminal gets lines and no bar that draws over itself.
#[test]
fn no_bar_on_a_dumb_terminal() {
    let basin = Basin::new();
    let dumb = on_a_terminal(&basin, "study scenario.toml", &[("TERM", "dumb")]);
    assert!(!dumb.replace("\r\n", "\n").contains(['\r', '\u{1b}']), "{dumb:?}");
    assert!(dumb.contains("time taken: "), "{dumb:?}");
    let other = on_a_terminal(&basin, "study scenario.toml --force", &[]);
    assert!(other.replace("\r\n", "\n").contains(['\r', '\u{1b}']), "{other:?}");
}
