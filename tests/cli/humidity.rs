//! Humidity of the station: read in its units, from the dew point, filled, told, and carried into realizations.

use super::basin::{Basin, weather};
use serde_json::Value;

const PRECIPITATION: &str = "precipitation = { column = \"precip_mm\", unit = \"mm\" }\n";

/// The sound record of so many years with a column `air` more, by the number of the day and its wetness.
fn record(years: i64, air: impl Fn(usize, bool) -> String) -> String {
    let sound = weather(years);
    let (header, rows) = sound.split_once('\n').unwrap();
    let rows = rows.lines().enumerate();
    let rows = rows.map(|(day, row)| format!("{row},{}\n", air(day, !row.ends_with(",0.0"))));
    format!("{header},air\n{}", rows.collect::<String>())
}

/// The sound basin with that record and a key for the column.
fn with(key: &str, air: impl Fn(usize, bool) -> String) -> Basin {
    let basin = Basin::new();
    basin.write("weather.csv", &record(3, air));
    basin.exchange(PRECIPITATION, &format!("{PRECIPITATION}{key}\n"));
    basin
}

const PERCENT: &str = "relative_humidity = { column = \"air\" }";

/// Humidities of the weather table, and its days' amounts.
fn humidities(basin: &Basin, flags: &str) -> Vec<(f64, f64)> {
    let ended = basin.run(&format!("weather scenario.toml {flags}"));
    assert_eq!(ended.status, 0, "{}", ended.stderr);
    let mut lines = ended.stdout.lines();
    assert!(lines.next().unwrap().ends_with(",precipitation_mm,relative_humidity_pct"));
    let numbers = |line: &str| {
        let cells: Vec<&str> = line.rsplit(',').take(2).collect();
        (cells[0].parse().unwrap(), cells[1].parse().unwrap())
    };
    lines.map(numbers).collect()
}

fn said(basin: &Basin) -> String {
    let ended = basin.run("check scenario.toml");
    assert_eq!(ended.status, 0, "{}", ended.stderr);
    ended.stdout.split_whitespace().collect::<Vec<_>>().join(" ")
}

#[test]
fn percent_and_fractions_are_the_same_humidity() {
    let percent = with(PERCENT, |day, _| (20 + day % 75).to_string());
    let fraction = with("relative_humidity = { column = \"air\", unit = \"fraction\" }", |day, _| {
        format!("0.{}", 20 + day % 75)
    });
    let found = humidities(&percent, "");
    assert_eq!(found.len(), 1095);
    for (day, (pct, _)) in found.iter().enumerate() {
        assert_eq!(*pct, (20 + day % 75) as f64);
    }
    for ((a, _), (b, _)) in found.iter().zip(humidities(&fraction, "")) {
        assert!((a - b).abs() < 1e-12 * a, "{a} and {b}");
    }
    assert!(said(&percent).contains("weather.relative_humidity.unit = \"pct\""), "a default in force");
    // The years of a realization have their own days' humidity: on the same day of two years it is not the same.
    let drawn = humidities(&percent, "--realization 1");
    assert_eq!(drawn.len(), 5 * 365);
    assert!(drawn.iter().all(|(pct, _)| (20.0..95.0).contains(pct)));
}

/// By hand, from the formula: e(5) = 0.872311 and e(10) = 1.227963 kPa; of a day's mean of 10 degC a dew point of 5 degC is
/// 71.0372 %. A dew point above the mean is saturation.
#[test]
fn dew_points_become_humidities_at_the_observed_mean() {
    let basin = with("dew_point = { column = \"air\", unit = \"degF\" }", |day, _| {
        if day % 2 == 0 { "41" } else { "62.6" }.to_owned()
    });
    let temperatures = |_: usize, line: &str| {
        let cells: Vec<&str> = line.split(',').collect();
        format!("{},5.0,15.0,{},{}\n", cells[0], cells[3], cells[4])
    };
    let text = basin.read("weather.csv");
    let (header, rows) = text.split_once('\n').unwrap();
    let rows: String = rows.lines().enumerate().map(|(day, line)| temperatures(day, line)).collect();
    basin.write("weather.csv", &format!("{header}\n{rows}"));
    for (day, (pct, _)) in humidities(&basin, "").iter().enumerate() {
        let expected = if day % 2 == 0 { 71.037_2 } else { 100.0 };
        assert!((pct - expected).abs() < 1e-4, "{pct}: {expected} to the digits of the two pressures");
    }
    let said = said(&basin);
    assert!(said.contains("547 days above 100 % read as 100 %"), "{said}");
    let notice = "weather.dew_point: 547 values more than 1 degC above the day's maximum; the first on 2000-10-02 (line 3): \
                  17.0 degC above 15.0 degC.";
    assert!(said.contains(notice), "{said}");
}

/// Wet days are every fourth of 1095, 274. A fifth of them not measured: the 55 that stand at a multiple of 20 days. All wet
/// days of January have 80 % and all others 90 %; a dry day takes its month's mean of all days, dry ones with 40 %.
#[test]
fn what_was_not_measured_is_filled_and_told() {
    let basin = with(PERCENT, |day, is_wet| match (day % 20, is_wet) {
        (0 | 1, _) => "NA".to_owned(),
        (_, true) => "90".to_owned(),
        (4, _) => "104".to_owned(),
        (_, false) => "40".to_owned(),
    });
    let found = humidities(&basin, "");
    assert!(found.iter().filter(|(_, mm)| *mm > 0.0).all(|(pct, _)| *pct == 90.0));
    let dry = found.iter().enumerate().filter(|(day, _)| day % 20 == 1);
    assert!(dry.clone().count() == 55 && dry.clone().all(|(_, (pct, _))| (40.0..90.0).contains(pct)));
    let words = said(&basin);
    let line = "humidity missing 110 days; 55 of 274 wet days in use have the mean of the wet days of their month; 0 days \
                above 100 % read as 100 %";
    assert!(words.contains(line), "{words}");
    let ended = basin.run("study scenario.toml --into out --quiet");
    assert_eq!(ended.status, 0, "{}", ended.stderr);
    let run: Value = serde_json::from_str(&basin.read("out/run.json")).unwrap();
    assert_eq!(
        run["left_out"]["counts"]["humidity"],
        serde_json::json!({
            "missing_days": 110, "lowered_to_100_days": 0, "wet_days": 274, "filled_wet_days": 55
        })
    );
    let page = basin.read("out/briefing.html");
    assert!(page.contains("Of 274 wet days in use, 55 have no humidity of their own"));
}

/// Nothing reads it yet where no option asks for it: the same study, to the byte of its findings.
#[test]
fn humidity_alone_changes_no_finding() {
    let findings = |basin: &Basin| {
        let ended = basin.run("study scenario.toml --into out --quiet");
        assert_eq!(ended.status, 0, "{}", ended.stderr);
        serde_json::from_str::<Value>(&basin.read("out/summary.json")).unwrap()["findings"].clone()
    };
    let plain = Basin::new();
    for generator in ["year-blocks", "markov-gamma"] {
        let key = format!("years = 5\ngenerator = \"{generator}\"");
        let [without, with] = [Basin::new(), with(PERCENT, |_, _| "70".to_owned())].map(|basin| {
            basin.exchange("years = 5", &key);
            basin.write("weather.csv", &record(6, |_, _| "70".to_owned()));
            findings(&basin)
        });
        assert!(without == with, "{generator}");
    }
    assert!(!plain.run("weather scenario.toml").stdout.contains("humidity"));
}
