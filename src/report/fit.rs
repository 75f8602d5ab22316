//! What a fit found: the file of its parameters, a page, a document, tables, words for a terminal.

mod errors;
mod figures;
mod judged;
mod left_out;
mod page;
mod parameter_sets;
mod parameters;
mod tables;
mod temperature_step;
mod values;
mod winters;

pub use left_out::left_out_lines;

use super::SCHEMA_VERSION;
use super::json::lines;
use super::numbers::{counted, fixed, signed};
use super::observed::observed_tables;
use super::reader::Reader;
use super::study::{Input, Origin};
use super::tables::ReportFile;
use crate::baseline::YearlyTests;
use crate::fit::{
    Bounded, Comparison, FitResult, Fitted, Judged, LeftOut, Objective, ParameterRange, Parameters, Split,
    not_seen,
};
use serde::Serialize;
use std::fmt::Write;
use temperature_step::temperature_step;

/// The file of fitted parameters.
pub(super) const PARAMETERS_FILE: &str = "parameters.toml";
/// The file of sets of parameters.
const SETS_FILE: &str = "parameter-sets.csv";

/// A fit, and how it came about.
pub struct FitReport<'a> {
    /// The study's title.
    pub title: &'a str,
    /// Who reads it.
    pub reader: Reader,
    /// The scenario's parameters.
    pub stated: &'a Parameters,
    /// What was searched for.
    pub searched: &'a [Bounded],
    /// What was made as large as it can be.
    pub objective: Objective,
    /// Searches of each split.
    pub starts: usize,
    /// Sets of parameters that each search tried.
    pub evaluations: usize,
    /// Winters that were left out.
    pub left_out: &'a [LeftOut],
    /// Trends and steps of the cool season's temperature, where there are years enough.
    pub cool_temperature: Option<&'a YearlyTests>,
    /// What was found.
    pub result: &'a FitResult,
    /// How it is repeated, and from what.
    pub origin: Origin,
}

#[derive(Serialize)]
struct Document<'a> {
    schema_version: u32,
    program: &'static str,
    title: &'a str,
    conventions: &'static str,
    objective: Objective,
    starts: usize,
    evaluations: usize,
    left_out: &'a [LeftOut],
    result: &'a FitResult,
    /// Each winter as the fit on the half of every other year that it is not in makes it, a site each.
    winters_not_seen: &'a [Comparison],
}

#[derive(Serialize)]
struct Manifest<'a> {
    schema_version: u32,
    program: &'static str,
    version: &'static str,
    command: &'a str,
    seed: u64,
    inputs: &'a [Input],
    files: &'a [&'a str],
}

/// Every file of a fit but `run.json`, which names them all.
///
/// # Errors
/// A number that JSON cannot hold: a fault of ours.
pub fn fit_files(report: &FitReport<'_>) -> serde_json::Result<Vec<ReportFile>> {
    let not_seen = not_seen(report.result);
    let drawn = figures::drawn(report, &not_seen);
    let document = lines(&Document {
        schema_version: SCHEMA_VERSION,
        program: "thawline",
        title: report.title,
        conventions: "SWE in mm as the day begins; errors are modelled less observed; NSE over all readings, KGE (2009) over those \
                      with observed or modelled SWE above 0; skill_above_mean against the mean of the other years on the same day",
        objective: report.objective,
        starts: report.starts,
        evaluations: report.evaluations,
        left_out: report.left_out,
        result: report.result,
        winters_not_seen: &not_seen,
    })?;
    let mut files = vec![
        (PARAMETERS_FILE.to_owned(), parameters::parameters_toml(report)),
        (SETS_FILE.to_owned(), parameter_sets::parameter_sets_csv(report)),
        ("fit.html".to_owned(), page::page(report, &drawn)),
        ("fit.json".to_owned(), document),
        ("tables/fit-scores.csv".to_owned(), tables::scores(report)),
        ("tables/fit-parameters.csv".to_owned(), tables::parameters(report)),
        ("tables/fit-profiles.csv".to_owned(), tables::profiles(report)),
    ];
    files.push(("tables/fit-left-out.csv".to_owned(), left_out::table(report.left_out)));
    files.push(("tables/fit-winters.csv".to_owned(), winters::winters(report, &not_seen)));
    files.extend(observed_tables(&report.result.fitted[0].compared, report.reader.units));
    files.extend(drawn.files());
    Ok(files)
}

/// `run.json` of a fit.
///
/// # Errors
/// A text that JSON cannot hold: a fault of ours.
pub fn fit_manifest_json(origin: &Origin, files: &[&str]) -> serde_json::Result<Vec<u8>> {
    lines(&Manifest {
        schema_version: SCHEMA_VERSION,
        program: "thawline",
        version: env!("CARGO_PKG_VERSION"),
        command: &origin.command,
        seed: origin.seed,
        inputs: &origin.inputs,
        files,
    })
}

/// The fit in a few lines: its parameters, and how it does on years that it has not seen.
pub fn fit_in_words(report: &FitReport<'_>) -> String {
    let result = report.result;
    let mut text = String::new();
    for value in &result.fitted[0].values {
        let range = result.uncertainty.ranges.iter().find(|range| range.key == value.key);
        let ends = range.map_or(String::new(), |range| format!(" ({})", range_in_words(range, 2)));
        let _ = writeln!(text, "  {} = {}{ends}", value.key, rounded(value.value));
    }
    if !result.not_identified.is_empty() {
        let _ =
            writeln!(text, "  not identified by the snow, and left: {}", result.not_identified.join(", "));
    }
    for sentence in of_other_years(report) {
        let _ = writeln!(text, "{sentence}");
    }
    text
}

/// `range 2.01 to 2.27`; an end at a bound of the search is said, and where both ends are one there is none.
fn range_in_words(range: &ParameterRange, decimals: usize) -> String {
    let ParameterRange { low, high, is_at_bound, .. } = *range;
    if low == high {
        return "at a bound of the search; no range".to_owned();
    }
    let at_bound = if is_at_bound { ", one end at a bound of the search" } else { "" };
    format!("range {} to {}{at_bound}", fixed(low, decimals), fixed(high, decimals))
}

/// A sentence a site: what is lost where the climate differs; and a step in the temperatures by which it does.
fn of_other_years(report: &FitReport<'_>) -> Vec<String> {
    let fitted = &report.result.fitted;
    let of = |split: Split| fitted.iter().find(|fitted| fitted.split == split);
    let (Some(cold), Some(warm)) = (of(Split::Coldest), of(Split::Warmest)) else { return Vec::new() };
    let sites = cold.on_others.iter().zip(&warm.on_own).zip(&warm.on_others);
    let of_sites = sites.map(|((on_warm, warm_own), on_cold)| of_a_site(on_warm, warm_own, on_cold));
    of_sites.chain(temperature_step(report.reader, report.cool_temperature, &report.result.winters)).collect()
}

fn of_a_site(on_warm: &Judged, warm_own: &Judged, on_cold: &Judged) -> String {
    let mut text = format!(
        "{}: fitted on the coldest half of the winters, NSE in the warmest half is {}; fitted on that half itself it is {}. \
         Fitted on the warmest half, it is {} in the coldest.",
        on_warm.site,
        score(on_warm.nash_sutcliffe),
        score(warm_own.nash_sutcliffe),
        score(on_cold.nash_sutcliffe)
    );
    if let Some(bias) = on_warm.peak.and_then(|peak| peak.bias_pct) {
        let _ = write!(text, " In winters warmer than it has seen, peak SWE is off by {} %", signed(bias, 1));
        if let Some(error) = on_warm.peak_standard_error_pct {
            let _ = write!(text, " (standard error {} %)", fixed(error, 1));
        }
        if let Some(error) = on_warm.melt_out {
            let _ = write!(text, ", and melt-out by {} days in mean size", fixed(error.mean_size_days, 1));
        }
        text.push('.');
    }
    text
}

/// Who has seen what: `the coldest half, judged on the warmest half`.
fn judgements(fitted: &Fitted) -> Vec<(Split, &[Judged])> {
    let own = (fitted.split, fitted.on_own.as_slice());
    let others = fitted.split.others().map(|split| (split, fitted.on_others.as_slice()));
    std::iter::once(own).chain(others).collect()
}

fn score(score: Option<f64>) -> String {
    score.map_or("none".to_owned(), |score| fixed(score, 2))
}

/// A parameter's value as it is handed on: six decimals, far finer than the search.
fn rounded(value: f64) -> f64 {
    (value * 1e6).round() / 1e6
}

/// `8 winters with observed snow, 48 000 sets of parameters tried`.
fn effort(report: &FitReport<'_>) -> String {
    let winters = report.result.winters.iter().filter(|winter| winter.is_observed).count();
    format!(
        "{} with observed snow, {} of parameters tried",
        counted(winters, "winter"),
        counted(report.result.tried, "set")
    )
}
