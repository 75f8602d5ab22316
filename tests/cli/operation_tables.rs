//! Tables of inflow and storage say what `summary.json` says, in the reader's units.

use super::basin::Basin;
use super::tables::{METRIC, Row, Told, US, hold, list, rows};
use serde_json::Value;

/// A basin of 65 km2 whose water goes into a reservoir that is short in some years and spills in others.
const OPERATED: &str = r#"
[inflow]
runoff_fraction = 0.6
recession_days = 5
year_class_limits_hm3 = [6, 15]

[reservoir]
name = "Test pool"
capacity_hm3 = 12
starting_storage_hm3 = 6
release_capacity_m3_per_s = 2
demand_hm3_per_month = 2.2
flood_space = [
    { on = "12-01", storage_not_above_hm3 = 5 },
    { on = "03-01", storage_not_above_hm3 = 5 },
    { on = "06-01", storage_not_above_hm3 = 12 },
]
[reservoir.changes]
refill_moved_days = [-20]
demand_times = [0.8]
"#;

fn study(units: &str) -> (Basin, Value) {
    let basin = Basin::new();
    // Here it is the colder level that loses, so that a change of the rules can bring something back.
    basin.exchange("levels_c = [0, 2]", "levels_c = [0, 2]\nreference_c = 2");
    basin.append(&format!("{OPERATED}\n[report]\nunits = \"{units}\"\n"));
    let ended = basin.run("study scenario.toml --into out --quiet");
    assert_eq!(ended.status, 0, "{}", ended.stderr);
    let summary: Value = serde_json::from_str(&basin.read("out/summary.json")).unwrap();
    (basin, summary["findings"]["operations"].clone())
}

/// The unit of a measure's values, as the reader is told.
fn unit(measure: &Value, told: &Told) -> &'static str {
    match measure["kind"].as_str().unwrap() {
        "volume_hm3" => told.volume.0,
        "share" => "share",
        "day_count" => "days",
        _ => "day_of_water_year",
    }
}

/// Quantiles may be words: none, not reached.
fn hold_quantiles(row: &Row, periods: &Value, factor: f64) {
    for quantile in ["q05", "q25", "q50", "q75", "q95"] {
        match periods[quantile].as_str() {
            Some(word) => assert_eq!(row[quantile], word),
            None => hold(row, quantile, &periods[quantile], factor),
        }
    }
}

fn measures(basin: &Basin, table: &str, found: &Value, told: &Told) {
    let mut rows = rows(basin, table).into_iter();
    for measure in list(found) {
        let factor = told.of(&measure["measure"]);
        for level in list(&measure["levels"]) {
            let row = rows.next().unwrap();
            let name = measure["measure"]["name"].as_str().unwrap();
            assert_eq!(row["measure"], name.replace("_hm3", &format!("_{}", told.volume.0)));
            assert_eq!(row["unit"], unit(&measure["measure"], told), "{name}");
            told.level(&row, level);
            hold(&row, "realizations", &level["periods"]["count"], 1.0);
            hold_quantiles(&row, &level["periods"], factor);
            hold(&row, "shift", &level["shift"]["median"]["value"], factor);
            hold(&row, "shift_monte_carlo_error", &level["shift"]["median"]["monte_carlo_error"], factor);
            hold(&row, "change_pct", &level["percent_change"], 1.0);
            hold(&row, "signal_to_half_spread", &level["signal_to_spread"]["value"], 1.0);
        }
    }
    assert!(rows.next().is_none(), "{table}");
}

fn rule_changes(basin: &Basin, found: &Value, told: &Told) {
    let mut rows = rows(basin, "rule-changes").into_iter();
    for change in list(found) {
        for measure in list(&change["measures"]) {
            let factor = told.of(&measure["measure"]);
            for level in list(&measure["levels"]) {
                let row = rows.next().unwrap();
                let by = change["change"].as_object().map(|by| by.values().next().unwrap().clone());
                hold(&row, "change_by", &by.unwrap_or_default(), 1.0);
                told.level(&row, level);
                hold_quantiles(&row, &level["periods"], factor);
                hold(&row, "shift_from_stated_rules", &level["shift"]["median"]["value"], factor);
                hold(&row, "share_brought_back", &level["brought_back"]["value"], 1.0);
                hold(&row, "share_brought_back_q95", &level["brought_back"]["q95"], 1.0);
            }
        }
    }
    assert!(rows.next().is_none());
    assert!(
        list(found)
            .iter()
            .flat_map(|change| list(&change["measures"]))
            .any(|measure| measure["levels"][0]["brought_back"]["q95"].is_number()),
        "nothing is brought back: {found}"
    );
}

fn year_classes(basin: &Basin, found: &Value, told: &Told) {
    let volume = told.volume.0;
    let mut rows = rows(basin, "year-classes").into_iter();
    for level in list(&found["levels"]) {
        for (class, share) in list(&level["shares"]).iter().enumerate() {
            let row = rows.next().unwrap();
            told.level(&row, level);
            assert_eq!(row["class"], (class + 1).to_string());
            hold(&row, &format!("upper_limit_{volume}"), &found["limits_hm3"][class], told.volume.1);
            hold(&row, "share", &share["value"], 1.0);
            hold(&row, "share_bound", &level["bounds"][class], 1.0);
            let kept = &level["kept_limits_hm3"][class]["value"];
            hold(&row, &format!("upper_limit_that_keeps_the_share_{volume}"), kept, told.volume.1);
        }
    }
    assert!(rows.next().is_none());
}

fn outlook(basin: &Basin, found: &Value, told: &Told) {
    let rows = rows(basin, "seasonal-outlook");
    assert_eq!(rows.len(), list(&found["levels"]).len());
    for (row, level) in rows.iter().zip(list(&found["levels"])) {
        told.level(row, level);
        hold(row, "correlation", &level["correlation"]["value"], 1.0);
        hold(row, "rank_correlation_q05", &level["rank_correlation"]["q05"], 1.0);
        let volume = told.volume.0;
        let width = &level["interval_hm3"]["value"];
        hold(row, &format!("interval_of_nine_in_ten_{volume}"), width, told.volume.1);
        hold(row, "old_line_off_pct", &level["old_line_off_pct"]["value"], 1.0);
    }
}

#[test]
fn cells_are_the_summarys_numbers() {
    for (units, told) in [("metric", METRIC), ("us", US)] {
        let (basin, found) = study(units);
        measures(&basin, "inflow", &found["inflow"], &told);
        measures(&basin, "storage", &found["storage"], &told);
        measures(&basin, "reservoir-performance", &found["performance"], &told);
        rule_changes(&basin, &found["rule_changes"], &told);
        year_classes(&basin, &found["year_classes"], &told);
        outlook(&basin, &found["outlook"], &told);
        // The window's volumes by chance of exceedance stand with all other volumes.
        let volumes = rows(&basin, "volumes");
        let name = format!("inflow_04_01_to_07_31_{}", told.volume.0);
        let of_window: Vec<&Row> = volumes.iter().filter(|row| row["measure"] == name).collect();
        assert_eq!(of_window.len(), 10, "five chances at two levels");
        let driest = &found["inflow"][0]["levels"][0]["exceeded"][0];
        assert_eq!(of_window[0]["chance_of_exceedance_pct"], "90");
        hold(
            of_window[0],
            &format!("volume_{}", told.volume.0),
            &driest["volume_hm3"]["value"],
            told.volume.1,
        );
    }
}

/// Where nothing is asked of the water, nothing is told of it.
#[test]
fn without_inflow_there_are_no_such_tables() {
    let basin = Basin::new();
    assert_eq!(basin.run("study scenario.toml --into out --quiet").status, 0);
    let has = |table: &str| basin.path().join(format!("out/tables/{table}.csv")).exists();
    assert!(
        !["inflow", "storage", "reservoir-performance", "rule-changes", "year-classes", "seasonal-outlook"]
            .into_iter()
            .any(has)
    );
    // Without a reservoir there is no storage.
    let inflow = OPERATED.split("[reservoir]").next().unwrap();
    basin.append(inflow);
    assert_eq!(basin.run("study scenario.toml --into out --quiet").status, 0);
    assert!(has("inflow") && has("seasonal-outlook") && !has("storage") && !has("rule-changes"));
}
