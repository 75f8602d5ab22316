//! Ctrl-C: the run ends within a second, with status 130, and earlier results stand.
#![cfg(unix)]

use super::basin::Basin;
use std::io::{BufRead, BufReader};
use std::process::{Command, Stdio};
use std::thread::sleep;
use std::time::Duration;

#[test]
fn an_interrupted_study_leaves_earlier_results_whole() {
    let basin = Basin::new();
    assert_eq!(basin.run("study scenario.toml").status, 0);
    let before = basin.read("output/scenario/run.json");
    basin.exchange("count = 12", "count = 20000");
    for delay in [0, 30, 150, 400] {
        let mut child = Command::new(env!("CARGO_BIN_EXE_thawline"))
            .args(["study", "scenario.toml"])
            .current_dir(basin.path())
            .stderr(Stdio::piped())
            .spawn()
            .unwrap();
        sleep(Duration::from_millis(100 + delay));
        let pid = child.id().to_string();
        assert!(Command::new("kill").args(["-INT", &pid]).status().unwrap().success());
        assert_eq!(child.wait().unwrap().code(), Some(130), "after {delay} ms");
        assert_eq!(basin.read("output/scenario/run.json"), before);
        assert_eq!(
            std::fs::read_dir(basin.path().join("output")).unwrap().count(),
            1,
            "nothing half-published"
        );
    }
}

/// The stage after the run, in which many realizations are resampled, stops as well.
#[test]
fn interrupted_while_it_answers() {
    let basin = Basin::new();
    basin.exchange("count = 12", "count = 10000");
    basin.exchange("years = 5", "years = 1");
    let mut child = Command::new(env!("CARGO_BIN_EXE_thawline"))
        .args(["study", "scenario.toml"])
        .current_dir(basin.path())
        .stderr(Stdio::piped())
        .spawn()
        .unwrap();
    let mut lines = BufReader::new(child.stderr.take().unwrap()).lines();
    assert!(lines.any(|line| line.unwrap().starts_with("answering")), "the run never came to its questions");
    assert!(Command::new("kill").args(["-INT", &child.id().to_string()]).status().unwrap().success());
    assert_eq!(child.wait().unwrap().code(), Some(130));
    assert!(!basin.path().join("output/scenario").exists());
}
