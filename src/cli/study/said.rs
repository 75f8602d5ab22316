//! Holds what the page says to `summary.json`: every number that is rounded for a sentence or a table, as it was before
//! rounding and but for its sign, stands there (or in `run.json`, where it is an assumption). Counts that are written as they
//! are pass by here.

use super::*;
use crate::cli::arguments::Arguments;
use crate::report::numbers::said;
use clap::Parser;
use serde_json::Value;

/// Limits that are part of a definition and stand in sentences: 1 and 10 mm, 10 and 20 years, the bracket's 100 %, the
/// humid range of 1 to 3 degC, 2 degC of the caution about cause, the middle of Dai's curve, the classes of percent of median.
const OF_DEFINITIONS: [f64; 11] = [1.0, 10.0, 20.0, 100.0, 3.0, 60.0, 80.0, 120.0, 140.0, 2.0, 1.2];

/// Equal but for the rounding of a change of unit, 100 times or a thousandth.
const SAME: f64 = 1e-12;

fn numbers(of: &Value, into: &mut Vec<f64>) {
    match of {
        Value::Number(number) => into.extend(number.as_f64().map(f64::abs)),
        Value::Array(values) => values.iter().for_each(|value| numbers(value, into)),
        Value::Object(entries) => entries.values().for_each(|value| numbers(value, into)),
        Value::Null | Value::Bool(_) | Value::String(_) => {}
    }
}

#[test]
fn every_number_of_the_page_stands_in_the_summary() {
    let folder = tempfile::tempdir().unwrap();
    let arguments = Arguments::try_parse_from(["thawline", "study", "x", "--quiet"]).unwrap();
    let shared = arguments.shared;
    crate::cli::start::run(folder.path(), &shared).unwrap();
    let path = folder.path().join("scenarios/alder-fork.toml");
    let scenario = std::fs::read_to_string(&path).unwrap();
    let scenario = scenario.replace("[realizations]\n", "[realizations]\ncount = 40\nyears = 12\n");
    std::fs::write(&path, scenario).unwrap();

    let ready = assemble(&path, &shared).unwrap();
    let measures = Measures::new(ready.scenario.season.clone(), ready.basin.area_km2());
    let findings = runs::find(&ready, &measures, &Progress::new(&shared)).unwrap();
    let (years, record) = own_years(&ready, &measures).unwrap();
    let findings = Findings { record, ..findings };
    said::take();
    let study = describe(&ready, &measures, years, &findings, &path, &shared);
    let answer = answer_in_words(&findings, study.warming, study.reader);
    let files = write_files(&study, &answer).unwrap();
    let mut said: Vec<f64> = said::take().into_iter().map(f64::abs).collect();
    assert!(said.len() > 1000, "only {} numbers said", said.len());

    let mut known = OF_DEFINITIONS.to_vec();
    for (_, text) in files.iter().filter(|(name, _)| name == "summary.json" || name == "run.json") {
        numbers(&serde_json::from_slice(text).unwrap(), &mut known);
    }
    // Shares are told as percentages, trends by decade.
    let told: Vec<f64> = known.iter().flat_map(|number| [100.0 * number, 10.0 * number]).collect();
    known.extend(told);
    known.sort_by(f64::total_cmp);
    said.retain(|number| {
        let at = known.partition_point(|known| *known < number * (1.0 - SAME));
        known.get(at).is_none_or(|known| *known > number * (1.0 + SAME))
    });
    said.sort_by(f64::total_cmp);
    said.dedup();
    assert!(said.is_empty(), "said, but not in the summary: {said:?}");
}
