//! Sets of parameters that a study runs beside its own: read, refused, run, and held against precipitation and warming.

use super::basin::Basin;
use serde_json::Value;

/// The demo basin without its own gauge multiplier and with few realizations, and a table of sets.
fn demo(of_sets: &str, sets: &str) -> Basin {
    let (basin, few) = Basin::of_demo("alder-fork", [24, 8]);
    basin.write("mine.toml", &(few + of_sets));
    basin.write("sets.csv", sets);
    basin
}

fn json(basin: &Basin, file: &str) -> Value {
    serde_json::from_str(&basin.read(file)).unwrap()
}

const OF_SETS: &str = "\n[snow.parameter_sets]\nfile = \"sets.csv\"\nrealizations = 24\n";

/// Identity: two sets that are what the study itself runs with answer what it answers, and leave no spread. Read from `check`, the
/// study's own melt base.
#[test]
fn sets_like_the_study_answer_like_it() {
    let basin = demo(OF_SETS, "snow.melt_base_c\n9\n9\n");
    let own = serde_json::from_str::<Value>(&basin.run("check mine.toml --json").stdout).unwrap();
    let melt_base_c = &own["snow"]["melt_base_c"];
    basin.write(
        "sets.csv",
        &format!("# by hand\nsnow.melt_base_c,objective\n{melt_base_c},0.9\n{melt_base_c},0.8\n"),
    );
    let ended = basin.run("study mine.toml --threads 2 --into two");
    assert_eq!(ended.status, 0, "{}", ended.stderr);
    let found = &json(&basin, "two/summary.json")["findings"];
    let headline = &found["basin"][0];
    let spread = &found["parameter_spread"];
    assert_eq!((&spread["sets"], &spread["realizations"]), (&Value::from(2), &Value::from(24)));
    let of_sets = &spread["measures"][0];
    for end in ["lowest", "highest"] {
        assert_eq!(of_sets["reference"][end], headline["precipitation_spread"]["q50"], "{end}");
    }
    let warmed = headline["levels"].as_array().unwrap().iter().filter(|level| !level["shift"].is_null());
    for (level, by_set) in warmed.zip(of_sets["levels"].as_array().unwrap()) {
        assert_eq!(by_set["level_c"], level["level_c"]);
        assert_eq!(by_set["shift"]["lowest"], level["shift"]["median"]["value"]);
        assert_eq!(by_set["shift"]["highest"], level["shift"]["median"]["value"]);
        assert_eq!(by_set["weighed"]["parameters"], 0.0);
        assert!(by_set["weighed"]["warming_over_parameters"].is_null());
        assert_ne!(by_set["weighed"]["largest"], "parameters");
    }
    let inputs = json(&basin, "two/run.json")["inputs"].to_string();
    assert!(inputs.contains("\"parameter_sets\"") && inputs.contains("sets.csv"), "{inputs}");
    assert!(!basin.run("check mine.toml").stdout.contains("not what the study itself runs with"));
}

/// Sets whose gauges catch half as much snow or twice as much, about a study between them, move snow by more than any warming of
/// the demo; said on the page, in the tables and in the summary, the same bytes on one thread and on two.
#[test]
fn parameters_can_be_the_largest() {
    let keys = "weather.gauge_multiplier.snow";
    let basin = demo(OF_SETS, &format!("{keys}\n1.1\n0.2\n4.5\n"));
    let scenario = basin.read("mine.toml");
    let line =
        scenario.lines().find(|line| line.trim_start().starts_with("gauge_multiplier")).unwrap().to_owned();
    basin.write("mine.toml", &scenario.replacen(&line, "gauge_multiplier = { rain = 1.05 }", 1));
    let ended = basin.run("study mine.toml --threads 2 --into two");
    assert_eq!(ended.status, 0, "{}", ended.stderr);
    let ended = basin.run("study mine.toml --threads 1 --into one");
    assert_eq!(ended.status, 0, "{}", ended.stderr);
    for file in ["summary.json", "briefing.html", "tables/parameter-spread.csv"] {
        assert!(basin.read(&format!("one/{file}")) == basin.read(&format!("two/{file}")), "{file}");
    }
    let summary = json(&basin, "one/summary.json");
    let level = &summary["findings"]["parameter_spread"]["measures"][0]["levels"][0];
    assert_eq!(level["weighed"]["largest"], "parameters", "{level}");
    assert!(level["weighed"]["warming_over_parameters"].as_f64().unwrap() < 1.0, "{level}");
    let words = summary["answer"]["parameters"].to_string();
    assert!(words.contains("the choice of parameters moves it the most"), "{words}");
    assert!(words.contains("the warming moves it less than the choice of parameters does"), "{words}");
    let page = basin.read("one/briefing.html");
    assert!(
        page.contains("If other parameters were right")
            && page.contains("3 sets of parameters, all of sets.csv")
    );
    let check = basin.run("check mine.toml");
    assert!(
        check.stdout.contains("3 sets of parameters, all of sets.csv, with 24 realizations of each"),
        "{}",
        check.stdout
    );
    assert!(check.stdout.contains("not what the study itself runs with"), "{}", check.stdout);
}

/// Every fault of table and file has its place and says how to mend it.
#[test]
fn what_cannot_be_run_is_refused() {
    let refused = |of_sets: &str, sets: &str, expected: &[&str]| {
        let ended = demo(of_sets, sets).run("check mine.toml");
        assert_eq!(ended.status, 3, "{}", ended.stdout);
        for expected in expected {
            assert!(ended.stderr.contains(expected), "{expected}: {}", ended.stderr);
        }
    };
    let plain = "snow.melt_base_c\n0.5\n1\n";
    refused(
        OF_SETS,
        "snow.melt_bse_c,snow.refreeze_fraction\n1,0.1\n",
        &["sets.csv:1:1", "write snow.melt_base_c, or take the column out"],
    );
    refused(
        OF_SETS,
        "snow.melt_base_c\nwarm\n90\n",
        &["sets.csv:2:1", "sets.csv:3:1", "a number from -20 to 20"],
    );
    refused(OF_SETS, "snow.melt_base_c\n0.5\n", &["1 of them", "2 to 1000 sets, a row each"]);
    refused(
        OF_SETS,
        "weather.gauge_multiplier.snow\n1.1\n1.2\n",
        &["beside the scenario's own", "each parameter from one place"],
    );
    refused(
        OF_SETS,
        "snow.cold_content.daily_share\n0.2\n0.3\n",
        &["parameters of the rules and options in use"],
    );
    refused(
        "\n[snow.parameter_sets]\nfile = \"sets.csv\"\ncount = 3\n",
        plain,
        &["at most the 2 sets of sets.csv"],
    );
    refused("\n[snow.parameter_sets]\nfile = \"none.csv\"\n", plain, &["there is no such file"]);
    refused(
        "\n[snow.parameter_sets]\ncont = 3\n",
        plain,
        &["'count'?", "the path of the parameter-sets.csv"],
    );
    refused(
        "\n[snow.parameter_sets]\nfile = \"sets.csv\"\nrealizations = 1\n",
        plain,
        &["a whole number from 2"],
    );
    refused(
        "\n[snow.parameter_sets]\nfile = \"sets.csv\"\nrealizations = 90000\n",
        plain,
        &["90000", "which the sets share", "raise realizations.count"],
    );
}
