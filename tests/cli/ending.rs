//! How a study and a fit end on standard error: the answer, the folder, what to look at first, warnings, time.

use super::basin::Basin;
use std::fs;
use std::path::Path;

/// The last five lines, behind the last stage.
fn ending<'a>(said: &'a str, last_stage: &str) -> Vec<&'a str> {
    let behind: Vec<&str> = said.lines().skip_while(|line| !line.starts_with(last_stage)).skip(1).collect();
    assert!(!behind.is_empty(), "{said}");
    behind
}

/// The seconds of `time taken: 0.4 s`.
fn seconds(line: &str) -> f64 {
    line.strip_prefix("time taken: ").unwrap().strip_suffix(" s").unwrap().parse().unwrap()
}

/// Exactly five lines after the last stage; the answer is the page's, whole and in one of them. The page's own notices, counted by
/// hand there, are the things worth a second look.
#[test]
fn a_study_ends_in_five_lines() {
    let basin = Basin::new();
    let ended = basin.run("study scenario.toml");
    assert_eq!((ended.status, ended.stdout.as_str()), (0, ""), "{}", ended.stderr);
    let lines = ending(&ended.stderr, "writing figures");
    assert_eq!(lines.len(), 5, "{lines:?}");
    let summary: serde_json::Value =
        serde_json::from_str(&basin.read("output/scenario/summary.json")).unwrap();
    let verdict = summary["answer"]["verdict"].as_str().unwrap();
    assert_eq!(lines[0], format!("answer: {verdict}"));
    assert_eq!(lines[1], "results: output/scenario");
    assert_eq!(lines[2], "look first at: output/scenario/briefing.html");
    assert!(seconds(lines[4]) > 0.0, "{lines:?}");

    let page = basin.read("output/scenario/briefing.html");
    let few = usize::from(page.contains("This study ran only 12 realizations."));
    let mismatch = usize::from(page.contains("All that follows is of weather that was made"));
    let run: serde_json::Value = serde_json::from_str(&basin.read("output/scenario/run.json")).unwrap();
    let of_input = run["unlikely"].as_array().unwrap().len();
    assert_eq!(few, 1, "the basin has too few realizations for a range");
    let expected = match few + mismatch + of_input {
        1 => "warnings: 1 thing is worth a second look, said at the top of the briefing".to_owned(),
        some => format!("warnings: {some} things are worth a second look, said at the top of the briefing"),
    };
    assert_eq!(lines[3], expected);
    let quiet = basin.run("study scenario.toml -q");
    assert_eq!((quiet.status, quiet.stdout.as_str(), quiet.stderr.as_str()), (0, "", ""));
}

/// One thing more about the input is one thing more to look at.
#[test]
fn warnings_are_counted() {
    let count = |basin: &Basin| -> usize {
        let said = basin.run("study scenario.toml --force").stderr;
        let line = said.lines().find_map(|line| line.strip_prefix("warnings: ")).unwrap().to_owned();
        line.split(' ').next().unwrap().parse().unwrap()
    };
    let basin = Basin::new();
    let before = count(&basin);
    basin.exchange("precipitation_gradient_pct_per_100m = 3", "precipitation_gradient_pct_per_100m = 25");
    assert_eq!(count(&basin), before + 1);
}

/// The program reads the clock where it talks and nowhere else, so that no time can reach a file.
#[test]
fn only_the_command_line_reads_the_clock() {
    let mut readers = Vec::new();
    let mut folders = vec![Path::new(env!("CARGO_MANIFEST_DIR")).join("src")];
    while let Some(folder) = folders.pop() {
        for entry in fs::read_dir(folder).unwrap() {
            let path = entry.unwrap().path();
            if path.is_dir() {
                folders.push(path);
            } else if path.extension().is_some_and(|kind| kind == "rs") && !path.ends_with("tests.rs") {
                let text = fs::read_to_string(&path).unwrap();
                let reads = ["Instant::", "SystemTime", "Utc::now", "Local::now", "elapsed()"];
                if reads.iter().any(|read| text.contains(read)) {
                    readers.push(path);
                }
            }
        }
    }
    assert!(
        !readers.is_empty()
            && readers.iter().all(|path| path.components().any(|part| part.as_os_str() == "cli")),
        "{readers:?}"
    );
}
