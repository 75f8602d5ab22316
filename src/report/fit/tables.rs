//! Tables of a fit: scores by fit and judged years, parameters, profiles.

use super::super::tables::{finish, optional, write, yes_or_no};
use super::FitReport;
use super::judged::{COLUMNS, numbers};
use super::judgements;
use crate::fit::{Judged, Split};
use csv::Writer;

/// One row a fit, the years it is judged on, and a site; the scenario's own parameters last.
pub(super) fn scores(report: &FitReport<'_>) -> Vec<u8> {
    let mut writer = Writer::from_writer(Vec::new());
    let head = ["fitted_on", "judged_on", "site"].into_iter().chain(COLUMNS);
    write(&mut writer, &head.map(str::to_owned).collect::<Vec<_>>());
    let mut rows = |fitted_on: &str, judged_on: Split, sites: &[Judged]| {
        for judged in sites {
            let names = [fitted_on.to_owned(), judged_on.words().to_owned(), judged.site.clone()];
            let row: Vec<String> = names.into_iter().chain(numbers(judged).map(optional)).collect();
            write(&mut writer, &row);
        }
    };
    for fitted in &report.result.fitted {
        for (judged_on, sites) in judgements(fitted) {
            rows(fitted.split.words(), judged_on, sites);
        }
    }
    for (judged_on, sites) in &report.result.unfitted {
        rows("nothing: the scenario's own parameters", *judged_on, sites);
    }
    finish(writer)
}

/// One row a parameter.
pub(super) fn parameters(report: &FitReport<'_>) -> Vec<u8> {
    let mut writer = Writer::from_writer(Vec::new());
    let names = [
        "key",
        "unit",
        "lowest",
        "highest",
        "scenario",
        "identified",
        "profile_falls_by",
        "range_low",
        "range_high",
        "range_ends_at_bound",
    ];
    let splits = report
        .result
        .fitted
        .iter()
        .map(|fitted| format!("fitted_on_{}", fitted.split.words().replace(' ', "_")));
    write(&mut writer, &names.map(str::to_owned).into_iter().chain(splits).collect::<Vec<_>>());
    for profile in &report.result.profiles {
        let Some(bounded) = report.searched.iter().find(|bounded| bounded.parameter.key == profile.key)
        else {
            continue;
        };
        let [lowest, highest] = bounded.bounds;
        let mut row = vec![
            profile.key.to_owned(),
            bounded.parameter.unit.to_owned(),
            optional(Some(lowest)),
            optional(Some(highest)),
            optional(bounded.parameter.get(report.stated)),
            yes_or_no(profile.is_identified).to_owned(),
            optional(Some(profile.fall)),
        ];
        let range = report.result.uncertainty.ranges.iter().find(|range| range.key == profile.key);
        row.extend([
            optional(range.map(|range| range.low)),
            optional(range.map(|range| range.high)),
            range.map_or(String::new(), |range| yes_or_no(range.is_at_bound)),
        ]);
        let of_split = report.result.fitted.iter().map(|fitted| bounded.parameter.get(&fitted.parameters));
        row.extend(of_split.map(optional));
        write(&mut writer, &row);
    }
    finish(writer)
}

/// One row a held value of a parameter.
pub(super) fn profiles(report: &FitReport<'_>) -> Vec<u8> {
    let mut writer = Writer::from_writer(Vec::new());
    write(&mut writer, &["key", "held_at", "objective"].map(str::to_owned));
    for profile in &report.result.profiles {
        for (value, objective) in &profile.points {
            write(&mut writer, &[profile.key.to_owned(), optional(Some(*value)), optional(Some(*objective))]);
        }
    }
    finish(writer)
}
