//! A study told in US units: everything that people read, and nothing that programs read.

use super::basin::{Basin, weather};
use serde_json::Value;
use std::fs;

/// The basin's study in metric units, and the same in US units.
fn both(basin: &Basin) -> (Value, Value) {
    let metric = basin.run("study scenario.toml --into metric --quiet");
    let scenario = basin.read("scenario.toml");
    basin.write("us.toml", &format!("{scenario}\n[report]\nunits = \"us\"\n"));
    let us = basin.run("study us.toml --into us --quiet");
    assert_eq!((metric.status, us.status), (0, 0), "{}{}", metric.stderr, us.stderr);
    let summary =
        |folder: &str| serde_json::from_str(&basin.read(&format!("{folder}/summary.json"))).unwrap();
    (summary("metric"), summary("us"))
}

/// Metric units that stand as words of their own; the scenario's keys, in code, are left aside, and so is the style.
fn metric_words(page: &str) -> Vec<String> {
    let mut text = page.to_owned();
    for (open, close) in [("<style>", "</style>"), ("<code>", "</code>"), ("<", ">")] {
        let mut rest = String::new();
        let mut pieces = text.split(open);
        rest.push_str(pieces.next().unwrap());
        for piece in pieces {
            rest.push(' ');
            rest.push_str(piece.split_once(close).unwrap_or_else(|| panic!("{open} is not closed")).1);
        }
        text = rest;
    }
    let words = text.split(|c: char| !(c.is_alphabetic() || "°²³_".contains(c)));
    let metric = ["mm", "cm", "m", "km", "km²", "km2", "hm³", "hm3", "°C", "degC"];
    words.filter(|word| metric.contains(word) || word.ends_with("_mm")).map(str::to_owned).collect()
}

fn rows(table: &str) -> Vec<csv::StringRecord> {
    csv::Reader::from_reader(table.as_bytes()).records().map(Result::unwrap).collect()
}

fn header(table: &str) -> Vec<String> {
    table.lines().next().unwrap().split(',').map(str::to_owned).collect()
}

/// No metric unit is left on the page, in the figures or in the tables' headers; the metric study has them all, so that the
/// search is known to find them.
#[test]
fn no_metric_unit_is_left() {
    let basin = Basin::new();
    both(&basin);
    let figures = ["swe-by-level", "melt-timing", "swe-through-year", "swe-by-band", "window-volume"];
    let figures = figures.map(|slug| format!("figures/{slug}.svg"));
    for name in figures.iter().map(String::as_str).chain(["briefing.html"]) {
        let [metric, us] =
            ["metric", "us"].map(|folder| metric_words(&basin.read(&format!("{folder}/{name}"))));
        assert!(metric.iter().any(|word| word == "°C"), "{name}: {metric:?}");
        assert_eq!(us, [""; 0], "{name}");
    }
    let on_the_metric_page = metric_words(&basin.read("metric/briefing.html"));
    for unit in ["mm", "m", "km²"] {
        assert!(on_the_metric_page.iter().any(|word| word == unit), "{unit}: {on_the_metric_page:?}");
    }
    for entry in fs::read_dir(basin.path().join("us/tables")).unwrap() {
        let name = entry.unwrap().file_name().into_string().unwrap();
        let table = basin.read(&format!("us/tables/{name}"));
        for column in header(&table) {
            let metric = ["mm", "degC", "c", "m", "km2"];
            assert!(!metric.contains(&column.rsplit('_').next().unwrap()), "{name}: {column}");
        }
        assert!(!table.contains("_mm"), "{name} names a measure in mm");
    }
}

/// Every number of the tables is the metric one by definition: 25.4 mm an inch, 0.3048 m a foot, 2.58998811 km2 a square
/// mile (UN-09 of the printed values; 1e-8, as printed), 5 degC of warming for 9 degF. 1e-12 is rounding.
#[test]
fn the_tables_hold_the_same_numbers() {
    let basin = Basin::new();
    both(&basin);
    let groups = ["amounts", "swe-area", "shares", "day-counts", "dates"];
    let of_groups = groups.iter().flat_map(|group| [format!("basin-{group}"), format!("bands-{group}")]);
    for name in of_groups.chain(["record-years".to_owned()]) {
        let [metric, us] = ["metric", "us"].map(|folder| basin.read(&format!("{folder}/tables/{name}.csv")));
        let (metric_header, us_header) = (header(&metric), header(&us));
        assert_eq!(metric_header.len(), us_header.len());
        let mut converted = 0;
        for (metric_row, us_row) in rows(&metric).iter().zip(&rows(&us)) {
            for (at, (metric_name, us_name)) in metric_header.iter().zip(&us_header).enumerate() {
                let unit = |name: &str| name.trim_end_matches("_days").rsplit('_').next().unwrap().to_owned();
                let (factor, tolerance) = match (unit(metric_name).as_str(), unit(us_name).as_str()) {
                    ("mm", "in") => (1.0 / 25.4, 1e-12),
                    ("m", "ft") => (1.0 / 0.3048, 1e-12),
                    ("km2", "mi2") => (1.0 / 2.589_988_11, 1e-8),
                    ("degC", "degF") => (1.8, 1e-12),
                    (same, other) => {
                        assert_eq!(same, other);
                        if metric_name != "measure" {
                            assert_eq!(metric_row[at], us_row[at], "{name}: {us_name}");
                        }
                        continue;
                    }
                };
                let (Ok(expected), Ok(found)) = (metric_row[at].parse::<f64>(), us_row[at].parse::<f64>())
                else {
                    assert_eq!(metric_row[at], us_row[at], "{name}: {us_name}");
                    continue;
                };
                let expected = expected * factor;
                assert!((found - expected).abs() <= tolerance * expected.abs(), "{name}: {us_name} {found}");
                converted += 1;
            }
        }
        assert!(converted > 0, "{name}");
    }
}

/// The page says what the tables hold, rounded: the reference's median, the change at +2 degC, which is +3.6 degF, and from
/// where on warming outweighs.
#[test]
fn the_page_says_what_the_tables_hold() {
    let basin = Basin::new();
    let (_, us) = both(&basin);
    let page = basin.read("us/briefing.html");
    let table = basin.read("us/tables/basin-amounts.csv");
    let column = |name: &str| header(&table).iter().position(|column| column == name).unwrap();
    let amounts = rows(&table);
    let of = |row: usize, name: &str| amounts[row][column(name)].parse::<f64>().unwrap();
    assert_eq!(&amounts[1][column("measure")], "swe_04_01_in");
    assert_eq!([of(0, "level_degF"), of(1, "level_degF")], [0.0, 3.6]);
    let (median, fall) = (of(0, "q50_in"), -of(1, "shift_in"));
    assert!(median > 1.0 && fall > 1.0, "amounts of a tenth of an inch: {median}, {fall}");
    let said = format!("At +3.6 °F, the 5-year mean 1 April SWE falls by {fall:.1} in (−");
    assert!(page.contains(&said), "{said}");
    assert!(page.contains(&format!("median {median:.1} in, 5–95 %")), "{median}");
    assert!(basin.read("us/figures/swe-by-level.svg").contains(&format!("1 April SWE is {fall:.1} in (")));
    let crossing_c = us["findings"]["basin"][0]["outweighs"]["level_c"].as_f64().unwrap();
    let table = basin.read("us/tables/yardsticks.csv");
    let at = header(&table).iter().position(|column| column == "outweighs_from_degF").unwrap();
    let is_it = |row: &csv::StringRecord| {
        row[at].parse::<f64>().is_ok_and(|from| (from - crossing_c * 1.8).abs() < 1e-9)
    };
    assert!(rows(&table).iter().any(is_it), "{crossing_c}");
    // So few realizations leave it at that.
    let verdict = us["answer"]["verdict"].as_str().unwrap();
    assert!(verdict.starts_with("Up to +3.6 °F these realizations cannot tell"), "{verdict}");
}

/// Programs read metric numbers, whoever reads the words: the findings are the same, and both documents say which units.
#[test]
fn programs_read_metric_numbers() {
    let basin = Basin::new();
    let (metric, us) = both(&basin);
    assert_eq!(metric["findings"], us["findings"]);
    assert_eq!(us["units"]["numbers"], "metric");
    assert_eq!(
        [&metric, &us].map(|it| it["units"]["words_figures_and_tables"].as_str()),
        [Some("metric"), Some("us")]
    );
    let manifest: Value = serde_json::from_str(&basin.read("us/run.json")).unwrap();
    assert_eq!(manifest["parameters"]["report_units"], "us");
    assert_eq!(manifest["parameters"]["levels_c"], metric["findings"]["levels_c"]);
    assert_eq!(basin.run("daily us.toml").stdout, basin.run("daily scenario.toml").stdout);
}

/// A season that is too warm is left out with its temperature in the reader's unit, and `check` speaks it too. 40 degC more on
/// 30 of 182 cool days are 6.6 degC or 11.9 degF more.
#[test]
fn the_record_is_told_in_the_same_units() {
    let basin = Basin::new();
    let warm: Vec<String> = weather(6)
        .lines()
        .map(|line| {
            let cells: Vec<&str> = line.split(',').collect();
            if !cells[0].starts_with("2004-01") || cells[0] == "2004-01-31" {
                return line.to_owned();
            }
            let warmer = |at: usize| cells[at].parse::<f64>().unwrap() + 40.0;
            format!("{},{},{},{}", cells[0], warmer(1), warmer(2), cells[3])
        })
        .collect();
    basin.write("weather.csv", &(warm.join("\n") + "\n"));
    both(&basin);
    let temperatures = |text: &str, unit: &str| -> Vec<f64> {
        let (_, why) = text.split_once("cool-season mean temperature ").unwrap();
        why.split(&format!(" {unit}"))
            .take(2)
            .map(|at| at.rsplit(' ').next().unwrap().parse().unwrap())
            .collect()
    };
    let in_f = temperatures(&basin.read("us/briefing.html"), "degF");
    let in_c = temperatures(&basin.read("metric/briefing.html"), "degC");
    assert_eq!(temperatures(&basin.read("us/tables/record-years.csv"), "degF"), in_f);
    assert!(
        (in_f[0] - in_f[1] - 11.9).abs() < 0.15 && (in_f[0] - 32.0 - 1.8 * in_c[0]).abs() < 0.15,
        "{in_f:?}"
    );
    let checked = basin.run("check us.toml").stdout.split_whitespace().collect::<Vec<_>>().join(" ");
    assert_eq!(temperatures(&checked, "degF"), in_f);
    let until_defaults = checked.split("Defaults in force").next().unwrap();
    assert_eq!(metric_words(until_defaults), [""; 0], "{checked}");
    assert!(until_defaults.contains("0 °F, +3.6 °F"), "{checked}");
}

/// Notices speak of the scenario's own numbers, which are metric whoever reads them, and the page says so.
#[test]
fn notices_keep_the_units_of_the_scenario() {
    let basin = Basin::new();
    basin.exchange("temperature_gradient_c_per_km = -6.0", "temperature_gradient_c_per_km = -9.0");
    both(&basin);
    let page = basin.read("us/briefing.html");
    let (_, notices) = page
        .split_once("<h4 id=\"second-look\">Worth a second look (in the scenario's metric units)</h4>")
        .unwrap();
    assert!(notices.contains("outside -8 to -2 degC per km"), "{notices}");
    assert!(basin.read("metric/briefing.html").contains("<h4 id=\"second-look\">Worth a second look</h4>"));
}

/// A level that is no short decimal reads well, and stands in full in the tables.
#[test]
fn levels_that_are_no_short_decimals() {
    let basin = Basin::new();
    basin.exchange("levels_c = [0, 2]", "levels_c = [0, 0.59819, 3.6000000000000005]");
    both(&basin);
    let page = basin.read("metric/briefing.html");
    assert!(page.contains("+0.6 °C") && page.contains("+3.6 °C"));
    assert!(!page.contains("+0.598") && !page.contains("+3.60"), "a level in full");
    assert!(basin.read("metric/tables/basin-amounts.csv").contains(",0.59819,"));
    assert!(basin.read("us/briefing.html").contains("+1.08 °F"));
}

/// The default is noted, and a word that is no system of units is a fault that names the two.
#[test]
fn the_choice_of_units() {
    let basin = Basin::new();
    assert!(basin.run("check scenario.toml").stdout.contains("report.units = \"metric\""));
    let scenario = basin.read("scenario.toml");
    basin.write("scenario.toml", &format!("{scenario}\n[report]\nunits = \"imperial\"\n"));
    let ended = basin.run("check scenario.toml");
    assert_eq!(ended.status, 3);
    assert!(ended.stderr.contains("expected \"metric\" or \"us\""), "{}", ended.stderr);
}
