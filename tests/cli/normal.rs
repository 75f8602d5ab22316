//! Percent of median: the baseline years, their faults, and the tables that a study leaves.

use super::basin::{Basin, weather};

fn years(basin: &Basin, typed: &str) {
    basin.exchange(
        "station_elevation_m = 2000",
        &format!("station_elevation_m = 2000\nbaseline_years = {typed}"),
    );
}

fn rows(table: &str) -> Vec<Vec<String>> {
    let mut reader = csv::Reader::from_reader(table.as_bytes());
    reader.records().map(|row| row.unwrap().iter().map(str::to_owned).collect()).collect()
}

#[test]
fn baseline_years_that_cannot_be() {
    let said = ["[2003, 2001]", "[2001]", "[2001, 2002.5]", "2001", "[1950, 1960]"].map(|typed| {
        let basin = Basin::new();
        years(&basin, typed);
        let ended = basin.run("check scenario.toml");
        assert_eq!((ended.status, ended.stdout.as_str()), (3, ""), "{typed}");
        let same = basin.run("study scenario.toml --into out");
        assert_eq!((same.status, &same.stderr), (3, &ended.stderr), "{typed}");
        ended.stderr.trim_end().trim_end_matches("1 fault; nothing was run").trim_end().to_owned()
    });
    insta::assert_snapshot!(said.join("\n\n"), @r"
error: weather.baseline_years: [2003, 2001]
  --> scenario.toml:13:18
   |
13 | baseline_years = [2003, 2001]
   |                  ^^^^^^^^^^^^ expected two water years, the first and the last of the period
   |
   = help: baseline_years = [1991, 2020], for example

error: weather.baseline_years: [2001]
  --> scenario.toml:13:18
   |
13 | baseline_years = [2001]
   |                  ^^^^^^ expected two water years, the first and the last of the period
   |
   = help: baseline_years = [1991, 2020], for example

error: weather.baseline_years: 2002.5
  --> scenario.toml:13:18
   |
13 | baseline_years = [2001, 2002.5]
   |                  ^^^^^^^^^^^^^^ expected water years, each named for the year in which it ends
   |
   = help: for example baseline_years = [1986, 1998]

error: weather.baseline_years: 2001
  --> scenario.toml:13:18
   |
13 | baseline_years = 2001
   |                  ^^^^ expected two water years, the first and the last of the period
   |
   = help: baseline_years = [1991, 2020], for example

error: weather.baseline_years: 1950 to 1960, of which no water year is in use
  --> scenario.toml:13:18
   |
13 | baseline_years = [1950, 1960]
   |                  ^^^^^^^^^^^^ expected the first and the last water year of a period with years in use
   |
   = help: the years in use lie from 2001 to 2003: baseline_years = [2001, 2003]
");
}

/// A period without a year in use is told beside a trend that cannot be taken out.
#[test]
fn faults_that_the_record_brings_are_told_together() {
    let basin = Basin::new();
    years(&basin, "[1950, 1960]\ndetrend_to = 2005");
    let said = basin.run("check scenario.toml").stderr;
    assert!(said.contains("weather.detrend_to") && said.contains("2 faults; nothing was run"), "{said}");
}

/// Three years are fewer than twenty, so all in use are the baseline; stated, so few are worth a second look.
#[test]
fn baseline_years_are_said() {
    let basin = Basin::new();
    let checked = basin.run("check scenario.toml");
    let words = checked.stdout.split_whitespace().collect::<Vec<_>>().join(" ");
    for said in [
        "baseline years all 3 years in use, 2001 to 2003, since fewer than 20 of 1991 to 2020 are",
        "weather.baseline_years = [2001, 2003]",
    ] {
        assert!(words.contains(said), "{said}: {words}");
    }
    assert!(!words.contains("weather.baseline_years: "));
    years(&basin, "[2002, 2003]");
    let words = basin.run("check scenario.toml").stdout.split_whitespace().collect::<Vec<_>>().join(" ");
    assert!(words.contains("baseline years 2002 to 2003 as stated, of which 2 are in use"), "{words}");
    assert!(
        words.contains("weather.baseline_years: of the water years 2002 to 2003, 2 are in use"),
        "{words}"
    );
    assert!(!words.contains("weather.baseline_years = "), "what was typed is no default");
}

/// Of every year and level, the table's percentage is 100 times its SWE over the table's median; the median itself is made
/// anew here from the bands of the daily table: 40 and 25 km2. A year's SWE on 1 April is the state at the end of 31 March.
#[test]
fn the_tables_agree_with_the_daily_table() {
    let basin = Basin::new();
    basin.write("weather.csv", &weather(4));
    assert_eq!(basin.run("study scenario.toml --into out").status, 0);
    assert_eq!(basin.run("daily scenario.toml --into days").status, 0);
    let daily = rows(&basin.read("days/daily.csv"));
    let on = |band: &str| -> Vec<f64> {
        let survey = daily.iter().filter(|row| row[0].ends_with("-03-31") && row[1] == band);
        survey.map(|row| row[row.len() - 1].parse().unwrap()).collect()
    };
    let [low, high] = ["1", "2"].map(on);
    let median = |swe: &[f64]| {
        let mut swe = swe.to_vec();
        swe.sort_by(f64::total_cmp);
        // Type 8 of four values: position 4/2 + 1.5/3 = 2.5, halfway between the second and the third.
        (swe[1] + swe[2]) / 2.0
    };
    let normal = (40.0 * median(&low) + 25.0 * median(&high)) / 65.0;
    assert!(normal > 10.0, "there is snow: {normal}");
    let table = rows(&basin.read("out/tables/percent-of-median.csv"));
    assert_eq!(table.len(), 2 * 4);
    for (at, row) in table.iter().take(4).enumerate() {
        let number = |column: usize| row[column].parse::<f64>().unwrap();
        let expected = 100.0 * (40.0 * low[at] + 25.0 * high[at]) / 65.0 / normal;
        assert!(
            (number(5) - normal).abs() < 1e-9 && (number(6) - expected).abs() < 1e-9,
            "{row:?}: {expected}"
        );
        assert_eq!(
            (row[0].as_str(), row[3].as_str(), &row[6]),
            (["2001", "2002", "2003", "2004"][at], "0", &row[9])
        );
    }
    let medians = rows(&basin.read("out/tables/medians.csv"));
    let found: Vec<(&str, f64)> =
        medians.iter().map(|row| (row[1].as_str(), row[5].parse().unwrap())).collect();
    for ((place, found), (name, expected)) in
        found.iter().zip([("1", median(&low)), ("2", median(&high)), ("basin", normal)])
    {
        assert!(*place == name && (found - expected).abs() < 1e-9, "{place}: {found} for {expected}");
    }
    let page = basin.read("out/briefing.html");
    assert!(page.contains("Percent of median") && page.contains("Median year,<br>% of moved normal"));
    for figure in ["record-years", "record-precipitation"] {
        assert!(basin.path().join(format!("out/figures/{figure}.svg")).exists());
    }
}
