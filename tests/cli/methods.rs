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
                        way.insert(way.len() - 1, "value, q05 and q95".to_owned());
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
    let (basin, few) = Basin::of_demo("alder-fork", [24, 10]);
    let small = "\n[findings.surface]\nwarming_c = [0, 2]\nprecipitation_change_pct = [-20, 0, 40]\n\n[findings.rule_panel]\n";
    basin.write("mine.toml", &(few + small));
    let ended = basin.run("study mine.toml --quiet --into out");
    assert_eq!(ended.status, 0, "{}", ended.stderr);
    let summary: Value = serde_json::from_str(&basin.read("out/summary.json")).unwrap();
    let methods = summary["methods"]["kinds"].as_array().unwrap();
    assert!(methods.iter().all(|method| method["says"].as_str().unwrap().len() > 40));
    assert!(summary["methods"]["how_to_find"].as_str().unwrap().contains("the longest"));
    let mut found = Vec::new();
    ways(&summary["findings"], &mut Vec::new(), &mut found);
    ways(&summary["record"], &mut Vec::new(), &mut found);
    assert!(found.len() > 1000, "{}", found.len());
    let mut used = BTreeSet::new();
    for way in &found {
        used.insert(kind_of(way, methods));
    }
    // Sets of parameters are not run here, but stand beside the rule panel in their kind.
    assert_eq!(used.len(), methods.len(), "a method without an interval: {used:?}");
    // By hand, of keys that two kinds could claim.
    let says = |way: &str| {
        let way: Vec<String> = way.split(' ').map(str::to_owned).collect();
        methods[kind_of(&way, methods)]["says"].as_str().unwrap().to_owned()
    };
    assert!(says("record_range levels shift q05").contains("resampled records"));
    assert!(says("basin levels shift q05").contains("a spread that is there"));
    assert!(says("detection periods leaves_spread_range q05_c").contains("first crossing"));
    assert!(says("rule_panel measures rules levels shift q05").contains("a spread that is there"));
    assert!(says("surface break_even range_pct").contains("a root found on runs"));
    let mut bootstrap = ["by_year", "tails", "q10", "q05"].map(str::to_owned).to_vec();
    assert!(methods[kind_of(&bootstrap, methods)]["says"].as_str().unwrap().contains("a spread"));
    bootstrap.insert(3, "value, q05 and q95".to_owned());
    assert!(methods[kind_of(&bootstrap, methods)]["says"].as_str().unwrap().contains("percentile bootstrap"));
}

/// The one kind of a way, by the rule that the summary states.
fn kind_of(way: &[String], methods: &[Value]) -> usize {
    let mut matched: Vec<(usize, usize, usize)> = Vec::new();
    for (kind, method) in methods.iter().enumerate() {
        for key in method["keys"].as_array().unwrap() {
            let parts: Vec<&str> = match key.as_str().unwrap() {
                "value, q05 and q95" => vec!["value, q05 and q95"],
                key => key.split('.').collect(),
            };
            let ends = (parts.len()..=way.len()).filter(|end| way[end - parts.len()..*end] == parts[..]);
            matched.extend(ends.map(|end| (end, parts.len(), kind)));
        }
    }
    let best = matched.iter().max().unwrap_or_else(|| panic!("no method tells of {}", way.join(".")));
    let kinds: BTreeSet<usize> =
        matched.iter().filter(|of| of.0 == best.0 && of.1 == best.1).map(|of| of.2).collect();
    assert_eq!(kinds.len(), 1, "several methods tell of {}", way.join("."));
    best.2
}
