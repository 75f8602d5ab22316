//! What a study leaves, and what it does to a folder that is not empty.

use super::basin::Basin;
use std::fs;
use std::path::Path;

pub(super) fn files(folder: &Path) -> Vec<(String, Vec<u8>)> {
    let mut found = Vec::new();
    let mut folders = vec![folder.to_owned()];
    while let Some(next) = folders.pop() {
        for entry in fs::read_dir(next).unwrap() {
            let path = entry.unwrap().path();
            if path.is_dir() {
                folders.push(path);
            } else {
                let name = path.strip_prefix(folder).unwrap().to_str().unwrap().to_owned();
                found.push((name, fs::read(&path).unwrap()));
            }
        }
    }
    found.sort();
    found
}

/// The manifest names exactly the files there are, and any number of threads gives the same bytes.
#[test]
fn manifest_and_threads() {
    let basin = Basin::new();
    for threads in [1, 2, 7] {
        let ended = basin.run(&format!("study scenario.toml --threads {threads} --into on-{threads}"));
        assert_eq!(ended.status, 0, "{}", ended.stderr);
    }
    let one = files(&basin.path().join("on-1"));
    assert!(one == files(&basin.path().join("on-2")) && one == files(&basin.path().join("on-7")));
    let manifest: serde_json::Value = serde_json::from_str(&basin.read("on-1/run.json")).unwrap();
    let mut named: Vec<&str> =
        manifest["files"].as_array().unwrap().iter().map(|f| f.as_str().unwrap()).collect();
    named.sort_unstable();
    assert_eq!(named, one.iter().map(|(name, _)| name.as_str()).collect::<Vec<_>>());
    assert_eq!(manifest["command"], "thawline study scenario.toml");
}

/// Another seed gives other numbers and stands in the command that repeats the study.
#[test]
fn the_seed_decides() {
    let basin = Basin::new();
    basin.run("study scenario.toml --into a");
    basin.run("study scenario.toml --into b --seed 6");
    assert_ne!(basin.read("a/tables/basin-amounts.csv"), basin.read("b/tables/basin-amounts.csv"));
    let manifest: serde_json::Value = serde_json::from_str(&basin.read("b/run.json")).unwrap();
    assert_eq!(manifest["command"], "thawline study scenario.toml --seed 6");
}

/// Our own earlier results are replaced as a whole; a folder that holds anything else is left alone without --force.
#[test]
fn replacing_results() {
    let basin = Basin::new();
    assert_eq!(basin.run("study scenario.toml").status, 0);
    let old = basin.path().join("output/scenario/figures/old.svg");
    basin.exchange("seed = 5", "seed = 8");
    assert_eq!(basin.run("study scenario.toml").status, 0);
    fs::write(&old, "a user's own").unwrap();
    let before = files(&basin.path().join("output/scenario"));
    let refused = basin.run("study scenario.toml --seed 9");
    assert_eq!(refused.status, 4);
    assert!(refused.stderr.contains("old.svg") && refused.stderr.contains("--force"), "{}", refused.stderr);
    assert!(before == files(&basin.path().join("output/scenario")));
    assert_eq!(basin.run("study scenario.toml --force").status, 0);
    assert!(!old.exists());
    let rest: Vec<_> =
        fs::read_dir(basin.path().join("output")).unwrap().map(|e| e.unwrap().file_name()).collect();
    assert_eq!(rest, ["scenario"], "nothing is left beside the results");
}

/// A target that cannot be written ends with status 4 and without a trace.
#[test]
fn a_target_below_a_file() {
    let basin = Basin::new();
    basin.write("taken", "a file");
    let ended = basin.run("study scenario.toml --into taken/results");
    assert_eq!(ended.status, 4, "{}", ended.stderr);
    assert_eq!(basin.read("taken"), "a file");
    assert_eq!(basin.run("study scenario.toml --into taken").status, 4, "a file is no folder of ours");
}

/// Every table has one header and rows of its length, and no cell is NaN or infinite.
#[test]
fn tables_are_whole() {
    let basin = Basin::new();
    basin.run("study scenario.toml --into out");
    basin.run("daily scenario.toml --into days");
    let tables: Vec<_> = files(&basin.path().join("out/tables"))
        .into_iter()
        .chain(files(&basin.path().join("days")))
        .collect();
    for (name, content) in tables.into_iter().filter(|(name, _)| name.ends_with(".csv")) {
        let mut reader = csv::Reader::from_reader(content.as_slice());
        let mut rows = 0;
        for row in reader.records() {
            let row = row.unwrap_or_else(|error| panic!("{name}: {error}"));
            assert!(row.iter().all(|cell| !["NaN", "inf", "-inf"].contains(&cell)), "{name}: {row:?}");
            rows += 1;
        }
        assert!(rows > 0, "{name}");
    }
}

/// The daily table has the stated columns, bands from the lowest and the basin after them, and its basin rows are the
/// area-weighted bands: 40 and 25 km2. 1e-9 mm is rounding.
#[test]
fn the_daily_table() {
    let basin = Basin::new();
    let daily = basin.run("daily scenario.toml").stdout;
    let mut lines = daily.lines();
    assert_eq!(
        lines.next(),
        Some(
            "date,band,tmean_c,rain_mm,snow_mm,melt_mm,refreeze_mm,outflow_mm,bare_ground_rain_mm,ice_mm,liquid_mm,\
             swe_mm"
        )
    );
    let rows: Vec<Vec<&str>> = lines.map(|line| line.split(',').collect()).collect();
    assert_eq!(rows.len(), 3 * (365 * 3));
    for day in rows.chunks(3) {
        assert_eq!([day[0][1], day[1][1], day[2][1]], ["1", "2", "basin"]);
        for column in 2..12 {
            let [low, high, basin] = [0, 1, 2].map(|row: usize| day[row][column].parse::<f64>().unwrap());
            assert!((basin - (40.0 * low + 25.0 * high) / 65.0).abs() < 1e-9, "{day:?}");
        }
    }
}

/// `start` writes what is needed to run the demo, keeps what a user changed, and its files pass `check`.
#[test]
fn start_and_check() {
    let basin = Basin::new();
    assert_eq!(basin.run("start demo").status, 0);
    for scenario in ["alder-fork", "frostbell-creek", "tamsin-river"] {
        let checked = basin.run(&format!("check demo/scenarios/{scenario}.toml"));
        assert_eq!(checked.status, 0, "{}", checked.stderr);
        assert!(checked.stdout.contains("Defaults in force: "), "{}", checked.stdout);
        assert!(
            checked.stdout.ends_with("Worth a second look: nothing\n") && checked.stderr.is_empty(),
            "{}",
            checked.stderr
        );
    }
    basin.write("demo/scenarios/alder-fork.toml", "title = \"mine\"");
    assert_eq!(basin.run("start demo").status, 4);
    assert_eq!(basin.read("demo/scenarios/alder-fork.toml"), "title = \"mine\"");
}

/// A study's results are no daily table's to replace, and a link is no folder.
#[test]
fn other_commands_and_links() {
    let basin = Basin::new();
    assert_eq!(basin.run("study scenario.toml --into out").status, 0);
    assert_eq!(basin.run("daily scenario.toml --into out").status, 4);
    assert!(basin.path().join("out/briefing.html").is_file());
    assert_eq!(basin.run("study scenario.toml --into . --force").status, 4);
    basin.write("file", "a user's own");
    assert_eq!(basin.run("study scenario.toml --into file --force").status, 0);
    assert!(basin.path().join("file/run.json").is_file());
    #[cfg(unix)]
    {
        std::os::unix::fs::symlink("out", basin.path().join("link")).unwrap();
        let ended = basin.run("study scenario.toml --into link");
        assert_eq!(ended.status, 4);
        assert!(ended.stderr.contains("a link"), "{}", ended.stderr);
    }
    let hidden = fs::read_dir(basin.path())
        .unwrap()
        .filter(|entry| entry.as_ref().unwrap().file_name().to_string_lossy().starts_with(".thawline"));
    assert_eq!(hidden.count(), 0, "nothing is left beside the results");
}

/// The command in the manifest can be pasted into a shell.
#[test]
fn a_path_with_spaces_is_quoted() {
    let basin = Basin::new();
    basin.write("my scenario's.toml", super::basin::SCENARIO);
    let mut command = basin.command("study --into out");
    assert_eq!(super::basin::ended(command.arg("my scenario's.toml")).status, 0);
    let manifest: serde_json::Value = serde_json::from_str(&basin.read("out/run.json")).unwrap();
    assert_eq!(manifest["command"], r"thawline study 'my scenario'\''s.toml'");
}
