//! The rule panel and replayed years of a study: against studies and runs of their own, and what is refused.

use super::basin::Basin;
use serde_json::Value;

/// The demo basin with few realizations and these lines more.
fn demo(more: &str) -> Basin {
    let (basin, few) = Basin::of_demo("alder-fork", [10, 4]);
    basin.write("mine.toml", &(few + more));
    basin
}

fn json(basin: &Basin, file: &str) -> Value {
    serde_json::from_str(&basin.read(file)).unwrap()
}

/// Cells of a table's column in the rows of a water year, or in all.
fn column(basin: &Basin, file: &str, name: &str) -> Vec<(String, String)> {
    let text = basin.read(file);
    let mut lines = text.lines().map(|line| line.split(',').collect::<Vec<_>>());
    let header = lines.next().unwrap();
    let at = header.iter().position(|cell| *cell == name).unwrap_or_else(|| panic!("no {name} in {file}"));
    lines.map(|cells| (cells[0].to_owned(), cells[at].to_owned())).collect()
}

/// Identity: a study that states a rule of the panel with what was tuned answers, with the same seed, what its row says, and its own years have
/// the mean peak and the median melt-out that the panel says; which are the other study's within the stated 1 % and one day.
#[test]
fn a_row_of_the_panel_is_a_study_of_its_own() {
    let basin = demo("\n[findings.rule_panel]\n");
    let ended = basin.run("study mine.toml --into panel");
    assert_eq!(ended.status, 0, "{}", ended.stderr);
    let panel = json(&basin, "panel/summary.json")["findings"]["rule_panel"].clone();
    let (row, rule) = panel["rules"]
        .as_array()
        .unwrap()
        .iter()
        .enumerate()
        .find(|(_, rule)| rule["temperature_c"] == -0.4)
        .unwrap();
    assert_eq!(rule["is_tuned"], true, "{rule}");
    // The demo's linear rule, 4 degC wide, about -0.4 degC.
    let [lowest, highest] = [0, 1].map(|end| rule["degree_day_factors"][end].as_f64().unwrap());
    let snow = format!(
        "[snow]\nrain_snow = {{ rule = \"linear\", snow_only_below_c = -2.4, rain_only_above_c = 1.6 }}\ndegree_day_factor_mm_per_c_day = {{ lowest = {lowest}, highest = {highest} }}\n"
    );
    let mine = basin.read("mine.toml");
    let line = mine.lines().find(|line| line.starts_with("gauge_multiplier")).unwrap();
    let gauge = format!("gauge_multiplier = {{ rain = 1.0, snow = {} }}", rule["gauge_multiplier_snow"]);
    let other = mine
        .replacen(line, &gauge, 1)
        .replacen("[snow]\n", &snow, 1)
        .replace("\n[findings.rule_panel]\n", "");
    basin.write("other.toml", &other);
    let ended = basin.run("study other.toml --into other");
    assert_eq!(ended.status, 0, "{}", ended.stderr);
    let study = json(&basin, "other/summary.json")["findings"].clone();
    assert!(study["rule_panel"].is_null());
    let of_panel = &panel["measures"][0]["rules"][row];
    assert_eq!(of_panel["precipitation_spread"], study["basin"][0]["precipitation_spread"]);
    let warmed =
        study["basin"][0]["levels"].as_array().unwrap().iter().filter(|level| !level["shift"].is_null());
    for (of_panel, of_study) in of_panel["levels"].as_array().unwrap().iter().zip(warmed) {
        assert_eq!(of_panel["shift"], of_study["shift"]);
        assert_eq!(of_panel["signal_to_spread"], of_study["signal_to_spread"]);
    }
    let peaks = |folder: &str| -> f64 {
        let peaks = column(&basin, &format!("{folder}/tables/record-years.csv"), "peak_swe_mm");
        let peaks: Vec<f64> = peaks.iter().filter_map(|(_, peak)| peak.parse().ok()).collect();
        peaks.iter().sum::<f64>() / peaks.len() as f64
    };
    let melt_out = |folder: &str| -> f64 {
        let days = column(&basin, &format!("{folder}/tables/record-years.csv"), "melt_out_day");
        let mut days: Vec<f64> = days.iter().filter_map(|(_, day)| day.parse().ok()).collect();
        days.sort_by(f64::total_cmp);
        (days[(days.len() - 1) / 2] + days[days.len() / 2]) / 2.0
    };
    let said = |of: &Value, key: &str| of[key].as_f64().unwrap();
    assert!((peaks("other") - said(&rule["fit"], "mean_peak_swe_mm")).abs() < 1e-6);
    assert!((melt_out("other") - said(&rule["fit"], "median_melt_out_day")).abs() < 1e-9);
    assert!((peaks("other") / peaks("panel") - 1.0).abs() <= 0.01);
    assert!((melt_out("other") - melt_out("panel")).abs() <= 1.0);
    let page = basin.read("panel/briefing.html");
    assert!(page.contains("If the model's rules were others") && page.contains("id=\"rule-panel-title\""));
    assert!(!basin.read("other/briefing.html").contains("If the model's rules were others"));
    // A header, and a row for each of six rules, two measures and four levels.
    assert_eq!(basin.read("panel/tables/rule-panel.csv").lines().count(), 1 + 6 * 2 * 4);
}

/// Identity: a replayed year at the reference is the record's year, and at a level that year of a record with a reference at that level. Without
/// names, the three years of least snow and the one of most are told.
#[test]
fn replayed_years_are_the_records_years() {
    let basin = demo("\n[findings.replayed_years]\nyears = [1990, 2001]\n");
    let warm = basin.read("mine.toml").replacen(
        "levels_c = [0, 1, 2, 3, 4]",
        "levels_c = [2, 3]\nreference_c = 2",
        1,
    );
    basin.write("warm.toml", &warm.replace("\n[findings.replayed_years]\nyears = [1990, 2001]\n", ""));
    for name in ["mine", "warm"] {
        let ended = basin.run(&format!("study {name}.toml --into {name}"));
        assert_eq!(ended.status, 0, "{}", ended.stderr);
    }
    let replayed = json(&basin, "mine/summary.json")["findings"]["record"]["replayed_years"].clone();
    let years = replayed["years"].as_array().unwrap();
    assert_eq!((years.len(), &replayed["are_named"]), (2, &Value::from(true)));
    for (folder, level) in [("mine", 0), ("warm", 2)] {
        for year in years {
            for (key, name) in [
                ("headline_mm", "swe_04_01_mm"),
                ("peak_swe_mm", "peak_swe_mm"),
                ("melt_out_day", "melt_out_day"),
            ] {
                let rows = column(&basin, &format!("{folder}/tables/record-years.csv"), name);
                let (_, cell) = rows
                    .iter()
                    .find(|(row, _)| row.parse::<i64>().ok() == year["water_year"].as_i64())
                    .unwrap();
                let [own, told] =
                    [cell.parse::<f64>().unwrap(), year["levels"][level][key].as_f64().unwrap()];
                assert!((own - told).abs() <= 1e-9 * own.abs(), "{name} of {year}: {own}");
            }
        }
    }
    let found = json(&basin, "warm/summary.json")["findings"]["record"]["replayed_years"]["years"].clone();
    let mut swe: Vec<(f64, String)> = column(&basin, "warm/tables/record-years.csv", "swe_04_01_mm")
        .into_iter()
        .filter_map(|(year, swe)| Some((swe.parse().ok()?, year)))
        .collect();
    swe.sort_by(|a, b| a.0.total_cmp(&b.0));
    let mut expected: Vec<String> = swe[..3].iter().chain(swe.last()).map(|(_, year)| year.clone()).collect();
    expected.sort();
    let told: Vec<String> =
        found.as_array().unwrap().iter().map(|year| year["water_year"].to_string()).collect();
    assert_eq!(told, expected);
    assert!(basin.read("mine/briefing.html").contains("1990's weather at +2 °C: 1 April SWE of "));
}

/// Where fewer realizations are stated than the study has, table and page say so; and with no level but the reference there is no panel, and a
/// note why.
#[test]
fn fewer_realizations_and_a_lone_level_are_said() {
    let basin = demo("\n[findings.rule_panel]\nrealizations = 5\n");
    let ended = basin.run("study mine.toml --into few");
    assert_eq!(ended.status, 0, "{}", ended.stderr);
    for (name, expected) in [("realizations", "5"), ("realizations_of_study", "10")] {
        let cells = column(&basin, "few/tables/rule-panel.csv", name);
        assert!(cells.iter().all(|(_, cell)| cell == expected), "{name}: {cells:?}");
    }
    let page = basin.read("few/briefing.html");
    assert!(page.contains("by the study's first 5 of 10 realizations, the same under each"));
    assert!(page.contains("The study's first 5 of 10 realizations of 4 years"), "the figure");
    let lone = basin.read("mine.toml").replacen("levels_c = [0, 1, 2, 3, 4]", "levels_c = [0]", 1);
    basin.write("lone.toml", &lone);
    let checked = basin.run("check lone.toml");
    let said = checked.stdout + &checked.stderr;
    assert!(checked.status == 0 && said.contains("there is no level but the reference"), "{said}");
    let ended = basin.run("study lone.toml --into lone");
    assert_eq!(ended.status, 0, "{}", ended.stderr);
    assert!(json(&basin, "lone/summary.json")["findings"]["rule_panel"].is_null());
}

/// Every fault has its place and says how to mend it.
#[test]
fn what_cannot_be_asked_is_refused() {
    let refused = |more: &str, expected: &[&str]| {
        let ended = demo(more).run("check mine.toml");
        assert_eq!(ended.status, 3, "{more}: {}", ended.stdout);
        for expected in expected {
            assert!(ended.stderr.contains(expected), "{expected}: {}", ended.stderr);
        }
    };
    refused("\n[findings.rule_panel]\nrealizations = 1\n", &["a whole number from 2"]);
    refused(
        "\n[findings.rule_panel]\nrealizations = 11\n",
        &["at most the study's own 10", "raise realizations.count"],
    );
    refused("\n[findings.rule_panel]\nrealisations = 5\n", &["'realizations'?"]);
    refused("\n[findings.replayed_years]\nyears = [1990, 1990]\n", &["a year twice", "each once"]);
    refused("\n[findings.replayed_years]\nyears = []\n", &["0 years"]);
    refused("\n[findings.replayed_years]\nyears = [1801]\n", &["1801, not in use", "thawline check"]);
    refused("\n[findings.replayed_years]\nyears = \"1990\"\n", &["a list of numbers"]);
    refused("\n[findings.rule_pannel]\n", &["rule_panel"]);
}
