//! The weather that was made against the record: `check --weather`, and the same sheet in a study.

use super::basin::Basin;
use serde_json::Value;

/// Realizations enough for a 5-95 % range.
fn basin() -> Basin {
    let basin = Basin::new();
    basin.exchange("count = 12", "count = 20");
    basin
}

fn sheet(basin: &Basin, words: &str) -> Value {
    let ended = basin.run(words);
    assert_eq!(ended.status, 0, "{}", ended.stderr);
    serde_json::from_str::<Value>(&ended.stdout).unwrap()["generator"].clone()
}

#[test]
fn check_makes_weather_where_it_is_asked_to() {
    let basin = basin();
    let plain = basin.run("check scenario.toml");
    assert_eq!(sheet(&basin, "check scenario.toml --json"), Value::Null, "it is not asked for");
    assert!(plain.stderr.is_empty(), "{}", plain.stderr);
    let with_sheet = basin.run("check scenario.toml --weather");
    assert_eq!(with_sheet.status, 0);
    assert_eq!(
        with_sheet.stderr,
        "making the weather of 20 realizations of 3 years and holding the record against it\n"
    );
    let added = with_sheet.stdout.strip_prefix(&plain.stdout).expect("the page, and more");
    for said in [
        "Does the weather that was made look like the record?",
        "against 20 realizations of 3 years",
        "1 April SWE",
        "10 % quantile",
        "longest run of dry years",
        "correlation over years, cool season",
    ] {
        assert!(added.contains(said), "{said}: {added}");
    }
    assert_eq!(basin.run("check scenario.toml --weather --quiet").stdout, "");
}

/// The sheet of `check` is the study's, whatever the number of threads; another seed makes other weather.
#[test]
fn the_sheet_is_the_studys() {
    let basin = basin();
    let checked = sheet(&basin, "check scenario.toml --weather --json --quiet");
    assert_eq!(basin.run("study scenario.toml --into out --quiet").status, 0);
    let summary: Value = serde_json::from_str(&basin.read("out/summary.json")).unwrap();
    assert_eq!(checked, summary["findings"]["generator"]);
    assert_eq!((checked["realizations"].as_u64(), checked["years"].as_u64()), (Some(20), Some(3)));
    assert!(checked["lines_judged"].as_u64().unwrap() > 50, "{checked}");
    for threads in ["1", "3"] {
        let again = sheet(&basin, &format!("check scenario.toml --weather --json --threads {threads}"));
        assert_eq!(again, checked, "{threads} threads");
    }
    let of_seed = sheet(&basin, "check scenario.toml --weather --json --seed 6");
    assert_ne!(of_seed, checked);
    let page = basin.read("out/briefing.html");
    assert!(page.contains("Does the weather that was made look like the record?"));
    assert!(basin.path().join("out/figures/generator-sheet.svg").exists());
}

/// Means of 1 April SWE over years of the record, by hand from the study's own years: the sheet's record is the record.
#[test]
fn the_records_side_is_the_record() {
    let basin = basin();
    let checked = sheet(&basin, "check scenario.toml --weather --json --quiet");
    assert_eq!(basin.run("study scenario.toml --into out --quiet").status, 0);
    let summary: Value = serde_json::from_str(&basin.read("out/summary.json")).unwrap();
    let line = &checked["statistics"][0];
    assert_eq!((&line["subject"], &line["statistic"]), (&"survey_swe".into(), &"survey_swe_mean".into()));
    let found = line["lines"][0]["record"].as_f64().unwrap();
    let mean = summary["record"]["headline_mean"].as_f64().unwrap();
    // Sums of three numbers, in another order at most.
    assert!((found - mean).abs() <= 1e-12 * mean && mean > 10.0, "{found} for {mean}");
}

/// So few realizations have no 5 % quantile of their own: nothing is judged, and the page says so.
#[test]
fn too_few_realizations_judge_nothing() {
    let basin = Basin::new();
    let ended = basin.run("check scenario.toml --weather");
    assert!(ended.stdout.contains("no line is judged"), "{}", ended.stdout);
    let checked = sheet(&basin, "check scenario.toml --weather --json");
    assert_eq!((checked["lines_judged"].as_u64(), checked["lines_outside"].as_u64()), (Some(0), Some(0)));
}
