//! Rooms know only the floors below them.

use std::collections::{BTreeMap, BTreeSet};
use std::fs;
use std::path::{Path, PathBuf};

/// From the ground up; rooms of one floor do not know each other.
const FLOORS: [&[&str]; 12] = [
    &["calendar", "defaults", "fault", "normal", "units"],
    &["table"],
    &["basin", "weather"],
    &["baseline", "observed"],
    &["inflow", "perturb", "reservoir"],
    &["snow"],
    &["demo", "season"],
    &["operation"],
    &["ensemble", "fit"],
    &["findings"],
    &["figures", "scenario"],
    &["report"],
];

/// Above them all.
const TOP: &str = "cli";

fn files(folder: &Path, into: &mut Vec<PathBuf>) {
    for entry in fs::read_dir(folder).unwrap() {
        let path = entry.unwrap().path();
        if path.is_dir() {
            files(&path, into);
        } else if path.extension().is_some_and(|extension| extension == "rs") {
            into.push(path);
        }
    }
}

/// The rooms that a file names, but for its unit tests and its comments: `crate::room`, or the first words of `crate::{...}`.
fn named(text: &str) -> BTreeSet<String> {
    let text = text.split("#[cfg(test)]").next().unwrap_or_default();
    let code: String = text.lines().filter(|line| !line.trim_start().starts_with("//")).collect();
    let word = |text: &str| text.chars().take_while(|sign| sign.is_alphanumeric() || *sign == '_').collect();
    let mut all = BTreeSet::new();
    for after in code.split("crate::").skip(1) {
        match after.strip_prefix('{').and_then(|list| list.split_once('}')) {
            Some((list, _)) => all.extend(list.split(',').map(|item| word(item.trim()))),
            None => drop(all.insert(word(after))),
        }
    }
    all
}

#[test]
fn rooms_know_only_the_floors_below() {
    let source = Path::new(env!("CARGO_MANIFEST_DIR")).join("src");
    let floors: BTreeMap<&str, usize> =
        (0..).zip(FLOORS).flat_map(|(floor, rooms)| rooms.iter().map(move |room| (*room, floor))).collect();
    let mut all = Vec::new();
    files(&source, &mut all);
    let mut seen = BTreeSet::new();
    for file in all {
        let inside = file.strip_prefix(&source).unwrap();
        let room = inside.iter().next().unwrap().to_str().unwrap().trim_end_matches(".rs");
        // Tests in files of their own may look at any room.
        if ["lib", "main", TOP].contains(&room) || inside.ends_with("tests.rs") {
            continue;
        }
        seen.insert(room.to_owned());
        let floor = *floors.get(room).unwrap_or_else(|| panic!("{room} stands on no floor"));
        for other in named(&fs::read_to_string(&file).unwrap()) {
            assert_ne!(other, TOP, "{} knows {TOP}", file.display());
            let is_below = other == room || floors.get(other.as_str()).is_none_or(|below| *below < floor);
            assert!(is_below, "{} knows {other}, which does not stand below it", file.display());
        }
    }
    assert_eq!(seen.len(), floors.len(), "a floor has a room that is not there");
}
