//! `--json`: one document on standard output from every command, whether it was done or failed.

use super::basin::{Basin, Ended, SMALL_FIT};
use super::help::commands;
use serde_json::Value;

/// The one document on standard output; a second, or anything beside it, is a fault of the parser.
fn document(ended: &Ended, words: &str) -> Value {
    let document: Value = serde_json::from_str(&ended.stdout)
        .unwrap_or_else(|error| panic!("thawline {words}: {error}: {}", ended.stdout));
    assert_eq!(
        (&document["program"], &document["schema_version"]),
        (&"thawline".into(), &3.into()),
        "{words}"
    );
    document
}

#[test]
fn of_what_was_done() {
    let basin = Basin::new();
    assert_eq!(basin.run("start . --quiet").status, 0);
    let demo = basin.read("scenarios/alder-fork.toml");
    basin.write("scenarios/alder-fork.toml", &(demo + SMALL_FIT));
    for (words, folder, first) in [
        ("study scenario.toml --json", "output/scenario", "briefing.html"),
        ("fit scenarios/alder-fork.toml --json", "output/alder-fork-fit", "fit.html"),
        ("daily scenario.toml --into days --json", "days", "daily.csv"),
        ("weather scenario.toml --json --into weather", "weather", "weather.csv"),
        ("start --json demo", "demo", "scenarios/alder-fork.toml"),
    ] {
        let ended = basin.run(words);
        assert_eq!(ended.status, 0, "{words}: {}", ended.stderr);
        let document = document(&ended, words);
        assert_eq!((&document["status"], &document["into"]), (&"done".into(), &folder.into()), "{words}");
        assert_eq!(document["command"], words.split(' ').next().unwrap());
        let files = document["files"].as_array().unwrap();
        assert!(files.contains(&first.into()), "{words}: {files:?}");
        // Exactly the files that there are.
        let mut there: Vec<Value> = super::results::files(&basin.path().join(folder))
            .into_iter()
            .map(|(name, _)| name.into())
            .collect();
        let mut files = files.clone();
        for names in [&mut files, &mut there] {
            names.sort_by_key(Value::to_string);
        }
        assert_eq!(files, there, "{words}");
    }
    assert_eq!(document(&basin.run("check scenario.toml --json"), "check")["status"], "checked");
}

#[test]
fn of_what_failed() {
    let basin = Basin::new();
    basin.write("taken", "a file where a folder is wanted");
    let cases = [
        ("", 2, "requires a subcommand"),
        ("stduy scenario.toml", 2, "study"),
        ("study", 2, "<SCENARIO>"),
        ("study nowhere.toml", 3, "1 fault"),
        ("study scenario.toml --into taken", 4, "not a folder"),
        ("study scenario.toml --open", 2, "leave one of them out"),
        ("fit scenario.toml", 3, "1 fault"),
        ("fit scenario.toml --open", 2, "leave one of them out"),
        ("daily scenario.toml", 2, "add --into DIR"),
        ("daily nowhere.toml --into days", 3, "1 fault"),
        ("daily scenario.toml --into taken", 4, "not a folder"),
        ("weather scenario.toml", 2, "add --into DIR"),
        ("weather scenario.toml --realization 13 --into made", 2, "realizations 1 to 12"),
        ("check nowhere.toml", 3, "1 fault"),
        ("check scenario.toml --into there", 2, "check writes nothing: leave --into out"),
        ("start there --into here", 2, "leave --into out"),
        ("completions bash --into there", 2, "leave --into out"),
        ("manual --into there", 2, "leave --into out"),
        ("start taken", 4, "cannot write"),
        ("start", 2, "<FOLDER>"),
        ("completions bash", 2, "leave --json out"),
        ("completions tcsh", 2, "tcsh"),
        ("manual", 2, "leave --json out"),
    ];
    for (words, status, said) in cases {
        let ended = basin.run(&format!("{words} --json"));
        assert_eq!(ended.status, status, "thawline {words}");
        // Warnings stand there as they do in a run that is done; what failed stands in the document alone.
        assert!(!ended.stderr.contains("error"), "thawline {words}: {}", ended.stderr);
        let document = document(&ended, words);
        assert_eq!(
            (&document["status"], &document["exit_status"]),
            (&"failed".into(), &status.into()),
            "{words}"
        );
        assert!(document["message"].as_str().unwrap().contains(said), "thawline {words}: {document}");
        assert_eq!(document["faults"].as_array().unwrap().is_empty(), status != 3, "{words}");
    }
    for command in commands() {
        assert!(cases.iter().any(|(words, ..)| words.split(' ').next() == Some(&command)), "{command}");
    }
}
