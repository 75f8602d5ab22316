//! Every interval of the summary is told how it was made.

use super::basin::Basin;
use serde_json::Value;
use std::collections::BTreeSet;

/// Names of keys that hold an end of an interval, or an error.
fn is_of_an_interval(key: &str) -> bool {
    let is_quantile = key.len() >= 3
        && key.starts_with('q')
        && key[1..3].chars().all(|digit| digit.is_ascii_digit())
        && !key.starts_with("q50");
    is_quantile
        || ["error", "range", "_95", "95_per", "resampled", "lowest_of", "highest_of"]
            .iter()
            .any(|part| key.contains(part))
        || key == "bound"
}

/// The way to every such key, as the names that stand on it; an object with a value beside its ends counts as a name of its own.
fn ways(value: &Value, on_the_way: &mut Vec<String>, found: &mut Vec<Vec<String>>) {
    match value {
        Value::Object(entries) => {
            for (key, inner) in entries {
                on_the_way.push(key.clone());
                if is_of_an_interval(key) {
                    let mut way = on_the_way.clone();
                    if entries.contains_key("value") && (key == "q05" || key == "q95") {
                        way.push("value, q05 and q95".to_owned());
                    }
                    found.push(way);
                }
                ways(inner, on_the_way, found);
                on_the_way.pop();
            }
        }
        Value::Array(items) => items.iter().for_each(|item| ways(item, on_the_way, found)),
        _ => {}
    }
}

/// In a study that asks for all there is to ask, no interval is without a method and no method without an interval.
#[test]
fn every_interval_has_a_method() {
    let basin = Basin::new();
    assert_eq!(basin.run("start .").status, 0);
    let scenario = basin.read("scenarios/alder-fork.toml").replace("../demo-data", "demo-data");
    let few = scenario.replacen("[realizations]\n", "[realizations]\ncount = 24\nyears = 10\n", 1);
    let small = "\n[findings.surface]\nwarming_c = [0, 2]\nprecipitation_change_pct = [-20, 0, 40]\n\n[findings.rule_panel]\n";
    basin.write("mine.toml", &(few + small));
    let ended = basin.run("study mine.toml --quiet --into out");
    assert_eq!(ended.status, 0, "{}", ended.stderr);
    let summary: Value = serde_json::from_str(&basin.read("out/summary.json")).unwrap();
    let methods = summary["methods"].as_array().unwrap();
    let keys = |method: &Value| -> Vec<String> {
        let keys = method["keys"].as_array().unwrap().iter();
        keys.map(|key| key.as_str().unwrap().to_owned()).collect()
    };
    let told: BTreeSet<String> = methods.iter().flat_map(keys).collect();
    assert!(methods.iter().all(|method| method["says"].as_str().unwrap().len() > 40));
    let mut found = Vec::new();
    ways(&summary["findings"], &mut Vec::new(), &mut found);
    ways(&summary["record"], &mut Vec::new(), &mut found);
    assert!(found.len() > 1000, "{}", found.len());
    let mut used = BTreeSet::new();
    for way in &found {
        let on_it: Vec<&String> = way.iter().filter(|name| told.contains(*name)).collect();
        assert!(!on_it.is_empty(), "no method tells of {}", way.join("."));
        used.extend(on_it);
    }
    // Sets of parameters are not run here.
    let unused: Vec<&String> = told.iter().filter(|key| !used.contains(key)).collect();
    assert_eq!(unused, ["parameter_spread"], "a method without an interval");
}
