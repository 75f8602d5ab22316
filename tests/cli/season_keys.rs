//! Keys of `[season]`: the days around which water and melt are summed, and the volume that is waited for.

use super::basin::Basin;
use serde_json::Value;

const BEFORE_WARMING: &str = "[warming]";

fn with_season(keys: &str) -> Basin {
    let basin = Basin::new();
    basin.exchange(BEFORE_WARMING, &format!("[season]\n{keys}\n\n{BEFORE_WARMING}"));
    basin
}

fn refused(keys: &str) -> String {
    let ended = with_season(keys).run("check scenario.toml");
    assert_eq!((ended.status, ended.stdout.as_str()), (3, ""), "{keys}");
    ended.stderr
}

/// Every fault of these keys in its place.
#[test]
fn faults_of_days_and_volumes() {
    let said = [
        "outflow_before = [\"04-01\", \"04-01\"]",
        "outflow_before = [\"10-01\"]",
        "melt_shares_before = [\"02-29\"]",
        "melt_shares_before = \"04-01\"",
        "arrival_volume_hm3 = 0",
        "arrival_volume_hm3 = \"50\"",
        "arrival_volume_acre_feet = 50000",
    ]
    .map(refused)
    .join("\n");
    insta::assert_snapshot!(said, @r#"
error: season.outflow_before[1]: 04-01 twice
  --> scenario.toml:18:28
   |
18 | outflow_before = ["04-01", "04-01"]
   |                            ^^^^^^^ expected a day after the water year's first, each once
   |
   = help: take it out, or write another day: usual is outflow_before = ["04-01", "05-01"]

1 fault; nothing was run

error: season.outflow_before[0]: 10-01, on which the water year starts
  --> scenario.toml:18:19
   |
18 | outflow_before = ["10-01"]
   |                   ^^^^^^^ expected a day after the water year's first, each once
   |
   = help: take it out, or write another day: usual is outflow_before = ["04-01", "05-01"]

1 fault; nothing was run

error: season.melt_shares_before[0]: "02-29"
  --> scenario.toml:18:23
   |
18 | melt_shares_before = ["02-29"]
   |                       ^^^^^^^ expected a day that every year has, as "MM-DD"
   |
   = help: write 1 April as "04-01"

1 fault; nothing was run

error: season.melt_shares_before: the text "04-01"
  --> scenario.toml:18:22
   |
18 | melt_shares_before = "04-01"
   |                      ^^^^^^^ expected a list of texts in quotes
   |
   = help: write melt_shares_before = ["..."]

1 fault; nothing was run

error: season.arrival_volume_hm3: 0
  --> scenario.toml:18:22
   |
18 | arrival_volume_hm3 = 0
   |                      ^ expected a volume above 0 hm3
   |
   = help: state the water to wait for, in million cubic metres: a thousand acre-feet are 1.23348 hm3

1 fault; nothing was run

error: season.arrival_volume_hm3: the text "50"
  --> scenario.toml:18:22
   |
18 | arrival_volume_hm3 = "50"
   |                      ^^^^ expected a number
   |
   = help: take the quotes away: arrival_volume_hm3 = 50

1 fault; nothing was run

error: 'season.arrival_volume_acre_feet', which is not a key of a scenario
  --> scenario.toml:18:1
   |
18 | arrival_volume_acre_feet = 50000
   | ^^^^^^^^^^^^^^^^^^^^^^^^ expected one of: water_year_starts, survey_dates, volume_windows, outflow_before, melt_shares_before, arrival_volume_hm3
   |
   = help: take it out, or check its table

1 fault; nothing was run
"#);
}

/// The usual days follow the hemisphere and leave out the first day of the water year, before which nothing comes; an empty
/// list asks for nothing.
#[test]
fn usual_days() {
    let basin = Basin::new();
    let says = |basin: &Basin, days: &str| {
        let said = basin.run("check scenario.toml").stdout;
        for key in ["outflow_before", "melt_shares_before"] {
            assert!(said.contains(&format!("season.{key} = {days}")), "{said}");
        }
    };
    says(&basin, "[\"04-01\", \"05-01\"]");
    basin.exchange("latitude_deg = 40", "latitude_deg = -40");
    says(&basin, "[\"10-01\", \"11-01\"]");
    says(&with_season("water_year_starts = \"04-01\""), "[\"05-01\"]");
    let none = with_season("outflow_before = []\nmelt_shares_before = []");
    let ended = none.run("study scenario.toml");
    assert_eq!(ended.status, 0, "{}", ended.stderr);
    let tables = ["amounts", "shares"].map(|of| none.read(&format!("output/scenario/tables/basin-{of}.csv")));
    for of_days in ["outflow_before", "water_input_before", "melt_share_before"] {
        assert!(tables.iter().all(|table| !table.contains(of_days)), "{of_days}");
    }
}

/// Rows of a measure in a table, each by the names of its columns.
fn rows(basin: &Basin, table: &str, measure: &str) -> Vec<std::collections::HashMap<String, String>> {
    let text = basin.read(&format!("output/scenario/tables/{table}.csv"));
    let mut lines = text.lines().map(|line| line.split(',').map(str::to_owned).collect::<Vec<_>>());
    let header = lines.next().unwrap();
    let named = lines.map(|row| header.iter().cloned().zip(row).collect::<std::collections::HashMap<_, _>>());
    named.filter(|row| row["measure"] == measure).collect()
}

/// A drop has come within days, a flood never: what is not reached is said so everywhere, and asked of the basin alone.
#[test]
fn a_volume_that_comes_and_one_that_does_not() {
    let basin = with_season("arrival_volume_hm3 = 0.001");
    let plenty = basin.run("check scenario.toml").stdout;
    assert!(!plenty.contains("arrival"), "{plenty}");
    assert_eq!(basin.run("study scenario.toml").status, 0);
    for row in rows(&basin, "basin-dates", "water_input_arrival_day") {
        assert!(row["q95_day_of_water_year"].parse::<f64>().unwrap() < 60.0, "{row:?}");
        assert_eq!(row["realizations_not_reached"], "0");
    }
    assert_eq!(rows(&basin, "bands-dates", "water_input_arrival_day").len(), 0);

    basin.exchange("= 0.001", "= 5000");
    let checked = basin.run("check scenario.toml").stdout;
    assert!(
        checked.contains("season.arrival_volume_hm3: 5000 hm3 are more than the rain and snow"),
        "{checked}"
    );
    assert_eq!(basin.run("study scenario.toml").status, 0);
    let found = rows(&basin, "basin-dates", "outflow_arrival_day");
    assert_eq!(found.len(), 2, "one a level");
    for row in found {
        assert_eq!(row["q50_day_of_water_year"], "not reached");
        let counts =
            ["realizations_not_reached", "realizations_not_gone", "years_not_reached", "years_not_gone"];
        assert_eq!(counts.map(|name| row[name].as_str()), ["12", "0", "60", "0"]);
    }
    let page = basin.read("output/scenario/briefing.html");
    assert!(page.contains("not reached<br>12 not reached"), "the level table");
    let summary: Value = serde_json::from_str(&basin.read("output/scenario/summary.json")).unwrap();
    let measures = summary["findings"]["basin"].as_array().unwrap();
    let arrival = measures.iter().find(|found| found["measure"]["name"] == "outflow_arrival_day").unwrap();
    assert_eq!(arrival["measure"]["kind"], "arrival_day");
    assert_eq!(arrival["levels"][0]["periods"]["q50"], "not reached");
    let run: Value = serde_json::from_str(&basin.read("output/scenario/run.json")).unwrap();
    assert_eq!(run["parameters"]["season"]["arrival_volume_hm3"], 5000.0);
}

/// 2 hm3 over the test basin's 65 km2 are 30.77 mm: the day by which so much has left the basin, in the record's own years,
/// read off the daily table.
#[test]
fn arrival_is_the_daily_tables() {
    const VOLUME_HM3: f64 = 2.0;
    let basin = with_season("arrival_volume_hm3 = 2");
    basin.exchange("levels_c = [0, 2]", "levels_c = [0]");
    assert_eq!(basin.run("study scenario.toml").status, 0);
    let table = basin.read("output/scenario/tables/record-years.csv");
    let mut lines = table.lines().map(|line| line.split(',').collect::<Vec<_>>());
    let header = lines.next().unwrap();
    let at = header.iter().position(|name| *name == "water_input_arrival_day").unwrap();
    let found: Vec<&str> = lines.map(|row| row[at]).collect();

    let daily = basin.run("daily scenario.toml").stdout;
    let mut expected = Vec::new();
    let (mut come_mm, mut day) = (0.0, 0);
    for line in daily.lines().filter(|line| line.contains(",basin,")) {
        let cells: Vec<&str> = line.split(',').collect();
        if cells[0].ends_with("-10-01") {
            (come_mm, day) = (0.0, 0);
        }
        day += 1;
        let before_mm = come_mm;
        come_mm += cells[7].parse::<f64>().unwrap() + cells[8].parse::<f64>().unwrap();
        let volume_mm = 1000.0 * VOLUME_HM3 / 65.0;
        if before_mm < volume_mm && volume_mm <= come_mm {
            expected.push(day.to_string());
        }
    }
    assert_eq!(expected.len(), 3, "each of the three years brings so much");
    assert_eq!(found, expected);
}
