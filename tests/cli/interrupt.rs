//! Ctrl-C: the run ends with status 130, and earlier results stand.
#![cfg(unix)]

use super::basin::Basin;
use std::fs::read_dir;
use std::io::{BufRead, BufReader};
use std::process::{Command, Stdio};
use std::thread::sleep;
use std::time::Duration;

/// Exit status of a study that gets Ctrl-C some time after it has said that a stage begins.
fn interrupted(basin: &Basin, stage: &str, delay_ms: u64) -> Option<i32> {
    let mut child = Command::new(env!("CARGO_BIN_EXE_thawline"))
        .args(["study", "scenario.toml"])
        .current_dir(basin.path())
        .stderr(Stdio::piped())
        .spawn()
        .unwrap();
    let mut lines = BufReader::new(child.stderr.take().unwrap()).lines();
    assert!(lines.any(|line| line.unwrap().starts_with(stage)), "the study never came to '{stage}'");
    sleep(Duration::from_millis(delay_ms));
    assert!(Command::new("kill").args(["-INT", &child.id().to_string()]).status().unwrap().success());
    let went_on = |line: &str| line.starts_with("answering") || line.starts_with("writing");
    assert!(!lines.any(|line| went_on(&line.unwrap())), "the stage that was interrupted ran to its end");
    child.wait().unwrap().code()
}

#[test]
fn an_interrupted_study_leaves_earlier_results_whole() {
    let basin = Basin::new();
    assert_eq!(basin.run("study scenario.toml").status, 0);
    let before = basin.read("output/scenario/run.json");
    basin.exchange("count = 12", "count = 20000");
    for delay_ms in [0, 30, 150, 400] {
        assert_eq!(interrupted(&basin, "running", delay_ms), Some(130), "after {delay_ms} ms");
        assert_eq!(basin.read("output/scenario/run.json"), before);
        assert_eq!(read_dir(basin.path().join("output")).unwrap().count(), 1, "nothing half-published");
    }
}

/// The stage after the run, in which many realizations are resampled, stops as well.
#[test]
fn interrupted_while_it_answers() {
    let basin = Basin::new();
    basin.exchange("count = 12", "count = 10000");
    basin.exchange("years = 5", "years = 1");
    assert_eq!(interrupted(&basin, "answering", 0), Some(130));
    assert!(!basin.path().join("output/scenario").exists());
}
