//! Wet days that bring more with warming: whole studies with the option, against what must hold of them.

use super::basin::Basin;
use super::results::files;
use rand::rngs::ChaCha8Rng;
use rand::{RngExt, SeedableRng};
use serde_json::Value;
use std::fmt::Write;

const LEVELS: &str = "levels_c = [0, 2]";

fn with(keys: &str) -> Basin {
    let basin = Basin::new();
    basin.exchange(LEVELS, &format!("{LEVELS}\n{keys}"));
    basin
}

fn findings(basin: &Basin) -> Value {
    let ended = basin.run("study scenario.toml --into out --quiet");
    assert_eq!(ended.status, 0, "{}", ended.stderr);
    let summary: Value = serde_json::from_str(&basin.read("out/summary.json")).unwrap();
    summary["findings"].clone()
}

/// A measure's findings at every level.
fn levels<'a>(findings: &'a Value, name: &str) -> &'a [Value] {
    let found = findings["basin"].as_array().unwrap().iter().find(|found| found["measure"]["name"] == name);
    found.unwrap()["levels"].as_array().unwrap()
}

/// Driest year, mean and wettest year at a level, medians over realizations.
fn three(level: &Value) -> [f64; 3] {
    ["driest", "mean", "wettest"]
        .map(|years| level["driest_and_wettest"][years]["median"]["value"].as_f64().unwrap())
}

/// Twenty water years from 1 October 2000 of which three days in ten are wet, with 8 mm in the mean.
fn wet_days_by_chance() -> String {
    let first = chrono::NaiveDate::from_ymd_opt(2000, 10, 1).unwrap();
    let end = chrono::NaiveDate::from_ymd_opt(2020, 10, 1).unwrap();
    let mut random = ChaCha8Rng::seed_from_u64(1);
    let mut text = String::from("date,tmin_c,tmax_c,precip_mm\n");
    for (day, date) in first.iter_days().take_while(|date| *date < end).enumerate() {
        let mean_c = 3.0 - 11.0 * libm::cos(std::f64::consts::TAU * (day as f64 - 105.0) / 365.25);
        let [is_wet, amount]: [f64; 2] = random.random();
        let wet_mm = if is_wet < 0.3 { -8.0 * libm::log(1.0 - amount) } else { 0.0 };
        writeln!(text, "{date},{:.1},{:.1},{wet_mm:.1}", mean_c - 5.0, mean_c + 5.0 + 0.1 * (day % 2) as f64)
            .unwrap();
    }
    text
}

/// At a mean that stands, to rounding, whatever the realization; the driest year is drier, the wettest wetter, and the largest
/// day's water larger. The assumed change of the mean is the same at every level, and a stated one, 5 % per degC, is the factor
/// 1.1025 at +2 degC.
#[test]
fn extremes_move_while_the_mean_stands() {
    let keys = "wet_day_intensity_pct_per_c = 15";
    let basin = with(keys);
    basin.write("weather.csv", &wet_days_by_chance());
    basin.exchange("count = 12\nyears = 5", "count = 60\nyears = 20");
    let fixed = findings(&basin);
    let [before, after] = [0, 1].map(|at| three(&levels(&fixed, "precipitation_before_04_01_mm")[at]));
    assert!((after[1] / before[1] - 1.0).abs() < 1e-12, "{before:?} and {after:?}");
    assert!(after[0] < 0.97 * before[0] && after[2] > 1.01 * before[2], "{before:?} and {after:?}");
    let largest = levels(&fixed, "water_input_largest_1_day_mm");
    let [before, after] = [0, 1].map(|at| largest[at]["periods"]["q50"].as_f64().unwrap());
    assert!(after > 1.1 * before, "{before} and {after}");
    let shift = &levels(&fixed, "precipitation_before_04_01_mm")[1]["shift"];
    assert!(["q05", "q95"].iter().all(|end| shift[end].as_f64().unwrap().abs() < 1e-9), "{shift}");

    let basin = with(&format!("{keys}\nprecipitation_change_pct_per_c = 5"));
    basin.exchange("years = 5", "years = 5\nmean_change_sd_pct = 10");
    let changed = findings(&basin);
    let [before, after] = [0, 1].map(|at| three(&levels(&changed, "precipitation_before_04_01_mm")[at]));
    assert!((after[1] / before[1] - 1.1025).abs() < 1e-12, "{before:?} and {after:?}");
    assert!(!changed["break_even"]["levels"][0]["precipitation_change_pct"].is_null());
    assert!(
        changed["basin"][0]["yardsticks"].as_array().unwrap().len() > 3,
        "other changes of the mean stand"
    );
    let page = basin.read("out/briefing.html");
    assert!(
        page.contains("wet days, those with more than 0.3 mm, change by +15.0 % per °C in what they bring")
    );
    assert!(
        page.contains("the warming with its stated change of precipitation") && page.contains("driest year")
    );
    let run: Value = serde_json::from_str(&basin.read("out/run.json")).unwrap();
    assert_eq!(run["parameters"]["warming"]["wet_day_intensity_pct_per_c"], 15.0);
}

/// Levels in groups of their own whose weather is the same are the study without the option: every finding, to the last digit.
#[test]
fn no_more_on_a_wet_day_is_the_study_without_it() {
    for generator in ["year-blocks", "markov-gamma"] {
        let [without, with] = ["", "wet_day_intensity_pct_per_c = 0"].map(|keys| {
            let basin = with(keys);
            basin.exchange("years = 5", &format!("years = 5\ngenerator = \"{generator}\""));
            basin.write("weather.csv", &super::basin::weather(6));
            findings(&basin)
        });
        assert!(without == with, "{generator}");
    }
}

/// The same bytes on one thread and on two, with both generators, and with a reference that is warmed itself.
#[test]
fn threads_do_not_show() {
    for generator in ["year-blocks", "markov-gamma"] {
        let basin =
            with("reference_c = 1\nwet_day_intensity_pct_per_c = 7\nprecipitation_change_pct_per_c = -3");
        basin.write("weather.csv", &super::basin::weather(6));
        basin.exchange(
            "years = 5",
            &format!("years = 5\nmean_change_sd_pct = 4\ngenerator = \"{generator}\""),
        );
        for threads in [1, 2] {
            let ended =
                basin.run(&format!("study scenario.toml --threads {threads} --into on-{threads} --quiet"));
            assert_eq!(ended.status, 0, "{}", ended.stderr);
        }
        let [one, two] = ["on-1", "on-2"].map(|folder| files(&basin.path().join(folder)));
        assert!(one == two, "{generator}");
    }
}

#[test]
fn faults_and_what_is_unlikely() {
    let refused = with("wet_day_intensity_pct_per_c = 70").run("check scenario.toml");
    assert_eq!(refused.status, 3);
    insta::assert_snapshot!(refused.stderr, @"
error: warming.wet_day_intensity_pct_per_c: 70
  --> scenario.toml:19:31
   |
19 | wet_day_intensity_pct_per_c = 70
   |                               ^^ expected a number from -20 to 20
   |
   = help: percent per degC; the air can hold about 7 more; leave it out for wet days as they were

1 fault; nothing was run
");
    let checked = with("wet_day_intensity_pct_per_c = -2").run("check scenario.toml").stdout;
    assert!(
        checked.contains(
            "wet days                   −2.0 % per °C on each, and so many that the mean is as said"
        ),
        "{checked}"
    );
    assert!(
        checked.contains("warming.wet_day_intensity_pct_per_c: outside 0 to 10 percent per degC"),
        "{checked}"
    );
}
