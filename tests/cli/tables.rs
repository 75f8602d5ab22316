//! Tables say what `summary.json` says, in the reader's units, and leave a cell empty where there is no number.

use super::basin::Basin;
use serde_json::Value;
use std::collections::HashMap;

/// A row by the names of its columns.
pub(super) type Row = HashMap<String, String>;

/// A study with an assumed change of mean precipitation, in one unit system, and realizations enough for the generator sheet
/// to be judged.
fn study(units: &str) -> (Basin, Value) {
    let basin = Basin::new();
    basin.exchange("count = 12", "count = 16");
    basin.exchange("years = 5", "years = 5\nmean_change_sd_pct = 8");
    basin.exchange("[warming]", &format!("[report]\nunits = \"{units}\"\n\n[warming]"));
    let ended = basin.run("study scenario.toml --into out --quiet");
    assert_eq!(ended.status, 0, "{}", ended.stderr);
    let summary: Value = serde_json::from_str(&basin.read("out/summary.json")).unwrap();
    let findings = summary["findings"].clone();
    (basin, findings)
}

pub(super) fn rows(basin: &Basin, table: &str) -> Vec<Row> {
    let text = basin.read(&format!("out/tables/{table}.csv"));
    let mut reader = csv::Reader::from_reader(text.as_bytes());
    let header: Vec<String> = reader.headers().unwrap().iter().map(str::to_owned).collect();
    let named = |row: csv::StringRecord| header.iter().cloned().zip(row.iter().map(str::to_owned)).collect();
    reader.records().map(|row| named(row.unwrap())).collect()
}

pub(super) fn list(value: &Value) -> &[Value] {
    value.as_array().map_or(&[], Vec::as_slice)
}

/// A cell against a number of the summary, which may be missing, times a factor; 1e-12 is the rounding of a conversion.
pub(super) fn hold(row: &Row, column: &str, expected: &Value, factor: f64) {
    let cell = row.get(column).unwrap_or_else(|| panic!("no column {column}: {row:?}"));
    match expected.as_f64() {
        Some(expected) => {
            let (found, expected): (f64, f64) = (cell.parse().unwrap(), factor * expected);
            assert!((found - expected).abs() <= 1e-12 * expected.abs(), "{column}: {found} for {expected}");
        }
        None => assert_eq!(cell, "", "{column} of {row:?}, for {expected}"),
    }
}

/// What a reader's units make of mm, of hm3 and of a degC of warming: 25.4 mm an inch, 1233.4818375 m3 an acre-foot (NIST
/// SP 811), 9 degF for 5 degC.
pub(super) struct Told {
    pub depth: (&'static str, f64),
    pub volume: (&'static str, f64),
    pub warming: (&'static str, f64),
}

pub(super) const METRIC: Told = Told { depth: ("mm", 1.0), volume: ("hm3", 1.0), warming: ("degC", 1.0) };
pub(super) const US: Told = Told {
    depth: ("in", 1.0 / 25.4),
    volume: ("thousand_acre_feet", 1.0 / 1.233_481_837_547_52),
    warming: ("degF", 1.8),
};

impl Told {
    /// The factor of a measure's values.
    pub fn of(&self, measure: &Value) -> f64 {
        match measure["kind"].as_str().unwrap() {
            "amount_mm" | "amount_mm_days" => self.depth.1,
            "volume_hm3" => self.volume.1,
            _ => 1.0,
        }
    }

    pub fn level(&self, row: &Row, level: &Value) {
        hold(row, &format!("level_{}", self.warming.0), &level["level_c"], self.warming.1);
    }

    fn outweighs(&self, row: &Row, name: &str, crossing: &Value) {
        assert_eq!(row[name].replace(' ', "_"), crossing["crossing"].as_str().unwrap());
        for (end, number) in [("from", "level_c"), ("until", "until_c")] {
            hold(row, &format!("{name}_{end}_{}", self.warming.0), &crossing[number], self.warming.1);
        }
    }

    /// A measure's name with the unit in which it is told.
    fn name(&self, measure: &Value) -> String {
        let name = measure["name"].as_str().unwrap();
        let (of, kind) = (self.depth.0, measure["kind"].as_str().unwrap());
        let unit = match kind {
            "amount_mm" => "mm",
            "amount_mm_days" => "mm_days",
            _ => return name.to_owned(),
        };
        format!("{}{}", name.strip_suffix(unit).unwrap(), unit.replace("mm", of))
    }
}

/// Volumes by chance: the depth times the area is the volume, 40 and 25 km2, and a range over records stands beside.
fn volumes(basin: &Basin, findings: &Value, told: &Told) {
    let mut rows = rows(basin, "volumes").into_iter();
    for found in list(&findings["basin"]).iter().filter(|found| found["measure"]["is_volume"] == true) {
        for (level, range) in list(&found["levels"]).iter().zip(list(&found["record_range"]["levels"])) {
            for (exceeded, range) in list(&level["exceeded"]).iter().zip(list(&range["exceeded_mm"])) {
                let row = rows.next().expect("a row a measure, level and chance");
                assert_eq!(row["measure"], told.name(&found["measure"]));
                told.level(&row, level);
                hold(&row, "chance_of_exceedance_pct", &exceeded["chance_pct"], 1.0);
                hold(&row, "change_pct", &exceeded["change_pct"], 1.0);
                let quantities = [("depth", "amount_mm", told.depth), ("volume", "volume_hm3", told.volume)];
                for (of, key, (unit, factor)) in quantities {
                    hold(&row, &format!("{of}_{unit}"), &exceeded[key]["value"], factor);
                    let error = &exceeded[key]["monte_carlo_error"];
                    hold(&row, &format!("{of}_monte_carlo_error_{unit}"), error, factor);
                }
                for end in ["q05", "q95"] {
                    let (unit, factor) = told.depth;
                    hold(&row, &format!("depth_record_{end}_{unit}"), &range[end], factor);
                    let (unit, factor) = told.volume;
                    hold(&row, &format!("volume_record_{end}_{unit}"), &range[end], factor * 65.0 / 1000.0);
                }
            }
        }
    }
    assert!(rows.next().is_none());
}

fn yardsticks(basin: &Basin, findings: &Value, told: &Told) {
    let mut rows = rows(basin, "yardsticks").into_iter();
    let mut held_rows = 0;
    for found in list(&findings["basin"]) {
        let held = &found["temperature_held"];
        for of in list(&found["yardsticks"]).iter().chain([held]) {
            for level in list(&of["levels"]) {
                let row = rows.next().expect("a row a measure, yardstick and level");
                let is_held = std::ptr::eq(of, held);
                held_rows += usize::from(is_held);
                assert_eq!(row["measure"], told.name(&found["measure"]));
                assert_eq!(
                    row["temperatures"],
                    if is_held { "temperature_held" } else { "own_temperatures" }
                );
                told.level(&row, level);
                for quantile in ["q05", "q50", "q95", "standard_deviation"] {
                    let number = &of["spread"][quantile];
                    hold(&row, &format!("spread_{quantile}"), number, told.of(&found["measure"]));
                }
                hold(&row, "signal_to_half_spread", &level["signal_to_spread"]["value"], 1.0);
                let error = &level["signal_to_spread"]["monte_carlo_error"];
                hold(&row, "signal_to_half_spread_monte_carlo_error", error, 1.0);
                let over_deviation = &level["signal_to_standard_deviation"];
                hold(&row, "signal_to_standard_deviation", over_deviation, 1.0);
                told.outweighs(&row, "outweighs", &of["outweighs"]);
                if is_held {
                    assert_eq!(
                        ["years", "periods", "mean_change_sd_pct", "times_assumed"].map(|name| &*row[name]),
                        ["5", "16", "8", "1"]
                    );
                } else {
                    told.outweighs(&row, "outweighs_standard_deviation", &of["outweighs_standard_deviation"]);
                    for name in ["years", "periods", "mean_change_sd_pct", "times_assumed"] {
                        hold(&row, name, &of[name], 1.0);
                    }
                }
            }
        }
    }
    assert!(rows.next().is_none() && held_rows > 0);
}

fn record_range(basin: &Basin, findings: &Value, told: &Told) {
    let mut rows = rows(basin, "record-range").into_iter();
    for found in list(&findings["basin"]) {
        let range = &found["record_range"];
        for level in &list(&range["levels"])[1..] {
            let row = rows.next().expect("a row a measure and level but the reference");
            assert_eq!(row["measure"], told.name(&found["measure"]));
            told.level(&row, level);
            hold(&row, "records", &range["records"], 1.0);
            hold(&row, "realizations_of_each", &range["realizations"], 1.0);
            for end in ["q05", "q95"] {
                hold(&row, &format!("shift_{end}"), &level["shift"][end], told.of(&found["measure"]));
                for (column, key) in [
                    ("change_pct", "percent_change"),
                    ("signal_to_half_spread", "signal_to_spread"),
                    ("chance_period_below_reference", "period_below_reference"),
                    ("chance_reaches_reference_median", "reaches_reference_median"),
                ] {
                    hold(&row, &format!("{column}_{end}"), &level[key][end], 1.0);
                }
            }
        }
    }
    assert!(rows.next().is_none());
}

fn break_even(basin: &Basin, findings: &Value, told: &Told) {
    let (found, rows) = (&findings["break_even"], rows(basin, "break-even"));
    assert_eq!(rows.len(), list(&found["levels"]).len());
    for (row, level) in rows.iter().zip(list(&found["levels"])) {
        told.level(row, level);
        hold(row, "precipitation_change_pct", &level["precipitation_change_pct"], 1.0);
        hold(row, "realizations_that_reached", &level["realizations_that_reached"], 1.0);
        hold(row, "realizations_run", &found["realizations"], 1.0);
        let reached = &found["reached"];
        for name in ["realizations", "realizations_wettest_pct", "record_wettest_pct"] {
            hold(row, name, &reached[name], 1.0);
        }
        hold(row, "years_of_a_period", &reached["years"], 1.0);
        let said = level["record_reached"].as_bool().map_or("", |is| if is { "yes" } else { "no" });
        assert_eq!(row["record_reached"], said);
    }
}

/// Two measures at each level: the headline, and the precipitation before its date.
fn driest_and_wettest(basin: &Basin, findings: &Value, told: &Told) {
    let mut rows = rows(basin, "driest-and-wettest").into_iter();
    let told_of = |found: &&Value| found["measure"]["has_extremes_told"] == true;
    let measures: Vec<&Value> = list(&findings["basin"]).iter().filter(told_of).collect();
    let names: Vec<String> = measures.iter().map(|found| told.name(&found["measure"])).collect();
    let depth = told.depth.0;
    assert_eq!(names, [format!("swe_04_01_{depth}"), format!("precipitation_before_04_01_{depth}")]);
    for found in measures {
        for level in list(&found["levels"]) {
            let row = rows.next().expect("a row a measure and level");
            assert_eq!(row["measure"], told.name(&found["measure"]));
            told.level(&row, level);
            let years = [("driest", "driest_year"), ("mean", "mean"), ("wettest", "wettest_year")];
            for (key, column) in years {
                let over = &level["driest_and_wettest"][key];
                hold(&row, &format!("{column}_median_{depth}"), &over["median"]["value"], told.depth.1);
                let error = &over["median"]["monte_carlo_error"];
                hold(&row, &format!("{column}_median_monte_carlo_error_{depth}"), error, told.depth.1);
                for end in ["q05", "q95"] {
                    hold(&row, &format!("{column}_{end}_{depth}"), &over[end], told.depth.1);
                }
            }
        }
    }
    assert!(rows.next().is_none());
}

/// 365 days a level; with a start on 1 October, day 183 of a year of 365 days is 1 April (USGS usage of the water year).
fn swe_through_year(basin: &Basin, findings: &Value, told: &Told) {
    let (found, rows) = (&findings["swe_through_year"], rows(basin, "swe-through-year"));
    assert_eq!(rows.len(), 2 * 365);
    for (rows, level) in rows.chunks(365).zip(list(&found["levels"])) {
        for (at, row) in rows.iter().enumerate() {
            told.level(row, level);
            assert_eq!(row["day_of_water_year"], (at + 1).to_string());
            for quantile in ["q10", "q50", "q90"] {
                let expected = &level[format!("{quantile}_mm")][at];
                hold(row, &format!("swe_{quantile}_{}", told.depth.0), expected, told.depth.1);
            }
            hold(row, &format!("swe_bin_width_{}", told.depth.0), &found["bin_mm"], told.depth.1);
            hold(row, "years", &found["years"], 1.0);
        }
        let dates = [0, 91, 92, 182, 364].map(|at| rows[at]["date_in_365_day_year"].as_str());
        assert_eq!(dates, ["10-01", "12-31", "01-01", "04-01", "09-30"]);
    }
}

/// A row a line; a temperature has its zero moved, a difference of temperatures has none to move.
fn generator_sheet(basin: &Basin, findings: &Value, told: &Told) {
    let mut rows = rows(basin, "generator-sheet").into_iter();
    for of in list(&findings["generator"]["statistics"]) {
        let (unit, factor, zero) = match of["quantity"].as_str().unwrap() {
            "depth_mm" => (told.depth.0, told.depth.1, 0.0),
            "temperature_c" => {
                (told.warming.0, told.warming.1, if told.warming.1 == 1.0 { 0.0 } else { 32.0 })
            }
            "difference_c" => (told.warming.0, told.warming.1, 0.0),
            plain => (plain, 1.0, 0.0),
        };
        for line in list(&of["lines"]) {
            let row = rows.next().expect("a row a line");
            for (column, name) in [
                ("subject", &of["subject"]),
                ("statistic", &of["statistic"]),
                ("part_of_year", &line["period"]),
            ] {
                assert_eq!(row[column], name.as_str().unwrap());
            }
            assert_eq!(row["unit"], unit);
            assert_eq!(row["record_lies"], line["verdict"].as_str().unwrap_or(""));
            let moved = |number: &Value| {
                number.as_f64().map_or(Value::Null, |number| (factor * number + zero).into())
            };
            hold(&row, "record", &moved(&line["record"]), 1.0);
            for quantile in ["q05", "q50", "q95"] {
                hold(&row, &format!("realizations_{quantile}"), &moved(&line["range"][quantile]), 1.0);
            }
            hold(&row, "realizations_with_number", &line["realizations"], 1.0);
            hold(&row, "years_of_each", &findings["generator"]["years"], 1.0);
        }
    }
    assert!(rows.next().is_none());
}

#[test]
fn cells_are_the_summarys_numbers() {
    for (units, told) in [("metric", METRIC), ("us", US)] {
        let (basin, findings) = study(units);
        volumes(&basin, &findings, &told);
        yardsticks(&basin, &findings, &told);
        record_range(&basin, &findings, &told);
        break_even(&basin, &findings, &told);
        driest_and_wettest(&basin, &findings, &told);
        swe_through_year(&basin, &findings, &told);
        generator_sheet(&basin, &findings, &told);
    }
}

/// Tables of mixed measures name the unit of each row, so that no number stands without one.
#[test]
fn units_of_rows_follow_the_measure() {
    for (units, depth) in [("metric", "mm"), ("us", "in")] {
        let (basin, _) = study(units);
        let unit = |table: &str, measure: &str, column: &str| {
            let rows = rows(&basin, table);
            rows.iter().find(|row| row["measure"] == measure).unwrap()[column].clone()
        };
        let (swe, area) = (format!("swe_04_01_{depth}"), format!("swe_area_{depth}_days"));
        for (measure, value, change) in [
            (swe.as_str(), depth.to_owned(), depth.to_owned()),
            (area.as_str(), format!("{depth}_days"), format!("{depth}_days")),
            ("melt_d50_day", "day_of_water_year".to_owned(), "days".to_owned()),
            ("snowfall_fraction", "share".to_owned(), "share".to_owned()),
        ] {
            assert_eq!(unit("yardsticks", measure, "unit"), value);
            assert_eq!(unit("yardsticks", measure, "unit_of_standard_deviation"), change);
            assert_eq!(unit("record-range", measure, "unit_of_shift"), change);
        }
    }
}

/// A study of the reference alone shifts nothing: its yardsticks have a spread and no level, and nothing else has rows but
/// what the reference brings by itself.
#[test]
fn a_study_of_one_level() {
    let basin = Basin::new();
    basin.exchange("levels_c = [0, 2]", "levels_c = [0]");
    assert_eq!(basin.run("study scenario.toml --into out --quiet").status, 0);
    let yardsticks = rows(&basin, "yardsticks");
    let headline: Vec<&Row> = yardsticks.iter().filter(|row| row["measure"] == "swe_04_01_mm").collect();
    assert!(!headline.is_empty());
    for row in headline {
        assert!(row["spread_q50"].parse::<f64>().unwrap() > 0.0);
        let empty = ["level_degC", "signal_to_half_spread", "outweighs_from_degC"].map(|name| &*row[name]);
        assert_eq!((empty, row["outweighs"].as_str()), ([""; 3], "unknown"));
    }
    assert!(rows(&basin, "record-range").is_empty());
    // Nothing is warmer, so nothing was looked for.
    assert!(!basin.path().join("out/tables/break-even.csv").exists());
    assert!(rows(&basin, "volumes").iter().all(|row| row["change_pct"].is_empty()));
    assert_eq!(rows(&basin, "swe-through-year").len(), 365);
}
