//! Holds what the page says to `summary.json`: every number that is rounded for a sentence or a table, as it was before
//! rounding and but for its sign, stands there (or in `run.json`, where it is an assumption). Counts that are written as they
//! are pass by here.

use super::*;
use crate::cli::arguments::Arguments;
use crate::findings::{SheetLine, Statistic, Subject, Verdict};
use crate::report::numbers::said;
use clap::Parser;
use serde_json::Value;

/// Limits that are part of a definition and stand in sentences: 1 and 10 mm, 10 and 20 years, the bracket's 100 %, the
/// humid range of 1 to 3 degC, 2 degC of the caution about cause, the middle of Dai's curve, the classes of percent of median.
const OF_DEFINITIONS: [f64; 11] = [1.0, 10.0, 20.0, 100.0, 3.0, 60.0, 80.0, 120.0, 140.0, 2.0, 1.2];

/// Equal but for the rounding of a change of unit, 100 times or a thousandth.
const SAME: f64 = 1e-12;
/// The main demo's scenario.
const DEMO: &str = "scenarios/alder-fork.toml";

fn numbers(of: &Value, into: &mut Vec<f64>) {
    match of {
        Value::Number(number) => into.extend(number.as_f64().map(f64::abs)),
        Value::Array(values) => values.iter().for_each(|value| numbers(value, into)),
        Value::Object(entries) => entries.values().for_each(|value| numbers(value, into)),
        Value::Null | Value::Bool(_) | Value::String(_) => {}
    }
}

/// The main demo with so many realizations and years, answered.
struct Answered {
    folder: tempfile::TempDir,
    shared: Shared,
    ready: Ready,
    measures: Measures,
    findings: Findings,
}

impl Answered {
    fn of(realizations: &str) -> Self {
        let folder = tempfile::tempdir().unwrap();
        let arguments = Arguments::try_parse_from(["thawline", "study", "x", "--quiet"]).unwrap();
        let shared = arguments.shared;
        crate::cli::start::run(folder.path(), &shared).unwrap();
        let path = folder.path().join(DEMO);
        let scenario = std::fs::read_to_string(&path).unwrap();
        let scenario = scenario.replace("[realizations]\n", &format!("[realizations]\n{realizations}"));
        std::fs::write(&path, scenario).unwrap();
        let ready = assemble(&path, &shared).unwrap();
        let measures = ready.measures();
        let findings = runs::find(&ready, &measures, &Progress::new(&shared)).unwrap();
        Self { folder, shared, ready, measures, findings }
    }

    /// The files of the results, with these findings.
    fn files(&self, change: impl Fn(&mut Findings)) -> Vec<ReportFile> {
        let (years, record) = own_years(&self.ready, &self.measures).unwrap();
        let mut findings = Findings { record, ..self.findings.clone() };
        change(&mut findings);
        said::take();
        let path = self.folder.path().join(DEMO);
        let origin = self.ready.origin("study", &path, &self.shared);
        let study = describe(&self.ready, &self.measures, years, &findings, origin);
        let answer = answer_in_words(&findings, study.warming, study.reader);
        write_files(&study, &answer, Ok).unwrap()
    }
}

/// Where survey SWE from the weather that was made is not the record's, the page's second paragraph says so, with its numbers;
/// where it is, nothing alarms.
#[test]
fn a_mismatch_of_snow_is_the_second_paragraph() {
    let answered = Answered::of("count = 13\nyears = 2\n");
    let notices = |change: fn(&mut Findings)| -> Vec<String> {
        let files = answered.files(change);
        let (_, page) = files.iter().find(|(name, _)| name == "briefing.html").unwrap();
        let page = String::from_utf8(page.clone()).unwrap();
        page.split("<p class=\"notice\">")
            .skip(1)
            .map(|rest| rest.split("</p>").next().unwrap().to_owned())
            .collect()
    };
    fn moved(findings: &mut Findings, verdict: Verdict) {
        for statistic in &mut findings.generator.as_mut().unwrap().statistics {
            let is_mean = statistic.statistic == Statistic::SweMean;
            for line in statistic.lines.iter_mut().filter(|_| statistic.subject == Subject::SurveySwe) {
                let record = if is_mean { 33.3 } else { line.record.unwrap() };
                let verdict = if is_mean { verdict } else { Verdict::Within };
                *line = SheetLine { record: Some(record), verdict: Some(verdict), ..*line };
            }
        }
    }
    let said = notices(|findings| moved(findings, Verdict::Below));
    assert!(said[0].starts_with("This model is not fitted"), "{said:?}");
    let mismatch = "1 April SWE modelled from the weather that was made is not like that modelled from the record: mean 33 mm";
    assert!(said[1].starts_with(mismatch) && said[1].contains("href=\"#generator-sheet\""), "{said:?}");
    let like = notices(|findings| moved(findings, Verdict::Within));
    assert_eq!(like.len() + 1, said.len(), "{like:?}");
}

#[test]
fn every_number_of_the_page_stands_in_the_summary() {
    let answered = Answered::of("count = 40\nyears = 12\n");
    let files = answered.files(|_| {});
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
