//! Every command that a page shows behind a `$` works as it is written.
#![cfg(unix)]

use super::basin::{Basin, SMALL_FIT};
use super::help::pages;
use std::collections::BTreeSet;
use std::process::Command;

/// The demo's scenarios made small: what is tested is that the lines run.
const SMALL: &str = "[realizations]\ncount = 4\nyears = 3\n";

/// What stands behind `$` in a text, man's marks taken away.
fn examples(text: &str) -> Vec<String> {
    let plain = text.replace("\\-", "-").replace("\\fB", "").replace("\\fR", "");
    let behind = plain.lines().filter_map(|line| line.trim().strip_prefix("$ ").map(str::to_owned));
    behind.filter(|line| line.contains("thawline")).collect()
}

#[test]
fn every_example_runs_as_it_is_written() {
    let basin = Basin::new();
    assert_eq!(basin.run("start .").status, 0);
    for scenario in ["alder-fork", "frostbell-creek", "tamsin-river"] {
        let file = format!("scenarios/{scenario}.toml");
        let text = basin.read(&file);
        assert!(text.contains("[realizations]\n"), "{file}");
        let fit = if scenario == "alder-fork" { SMALL_FIT } else { "" };
        basin.write(&file, &(text.replace("[realizations]\n", SMALL) + fit));
    }
    let manual = basin.run("manual").stdout;
    let readme = include_str!("../../README.md");
    let mut lines: BTreeSet<String> = pages().iter().flat_map(|(_, page)| examples(page)).collect();
    assert!(lines.len() >= 12, "{lines:?}");
    let of_help = lines.clone();
    for (name, text) in [("the manual", manual.as_str()), ("README.md", readme)] {
        let found = examples(text);
        assert!(found.len() > 3, "{name} has {found:?}");
        lines.extend(found);
    }
    assert!(examples(&manual).iter().all(|line| of_help.contains(line)), "man and help show the same");

    let programs = std::path::Path::new(env!("CARGO_BIN_EXE_thawline")).parent().unwrap();
    let path = format!("{}:{}", programs.display(), std::env::var("PATH").unwrap());
    for line in lines {
        let ended = Command::new("sh")
            .args(["-c", &line])
            .current_dir(basin.path())
            .envs([("PATH", path.as_str()), ("BROWSER", "true")])
            .output()
            .unwrap();
        assert!(ended.status.success(), "$ {line}: {}", String::from_utf8_lossy(&ended.stderr));
    }
}
