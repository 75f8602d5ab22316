//! `thawline study`: the main job, from a scenario to a published briefing.

use super::arguments::Shared;
use super::assemble::assemble;
use super::browser;
use super::done::{Done, names_of};
use super::ending::Ending;
use super::failure::{Failure, may_be_replaced, unpublished};
use super::held_to_inflow::held_to_inflow;
use super::output;
use super::own_years::own_years;
use super::pictures::Pictures;
use super::places;
use super::pool::in_pool;
use super::progress::{Progress, is_interrupted, mind_interrupts};
use super::ready::Ready;
use super::runs;
use super::size::check_size;
use crate::ensemble::RecordYear;
use crate::figures::{FIGURES, Setting, of_sites};
use crate::findings::{BandFindings, Findings};
use crate::report::numbers::counted;
use crate::report::{
    Answer, Origin, Reader, Record, ReportFile, Study, answer_in_words, briefing_html, data_package_json,
    manifest_json, publish, second_looks, summary_json, tables, workbook_xlsx,
};
use crate::season::Measures;
use serde::Serialize;
use std::path::{Path, PathBuf};
use std::time::Instant;

#[cfg(test)]
mod said;

/// The file of the results that is to be looked at first.
const PAGE: &str = "briefing.html";

/// What the document says beside the files.
#[derive(Serialize)]
struct Answered<'a> {
    answer: &'a Answer,
}

/// Runs the command; with the briefing opened at its end, if that is asked for.
pub(super) fn run(path: &Path, open: bool, pictures: Pictures, shared: &Shared) -> Result<(), Failure> {
    let began = Instant::now();
    browser::may_open(open, shared)?;
    let progress = Progress::new(shared);
    let ready = assemble(path, shared)?;
    mind_interrupts();
    let ready = in_pool(shared, || held_to_inflow(ready))??;
    let target = target(&ready, shared)?;
    may_be_replaced(&target, "study", shared)?;
    let scenario = &ready.scenario;
    let measures = ready.measures();
    check_size(
        &ready,
        measures.list().len() + ready.operation.as_ref().map_or(0, |of| of.measures().len()),
        shared,
    )?;
    if !shared.quiet {
        output::complain(&crate::scenario::unlikely_lines(&ready.unlikely));
    }

    progress.stage(&format!(
        "running {} of {} under {} and {}",
        counted(scenario.realizations.count as usize, "realization"),
        counted(scenario.realizations.years, "year"),
        counted(scenario.warming.levels_c.len(), "level"),
        counted(ready.basin.bands.len(), "band")
    ));
    let findings = in_pool(shared, || runs::find(&ready, &measures, &progress))??;
    let (years, record) = own_years(&ready, &measures)?;
    let findings = Findings { record, ..findings };
    let findings = places::with_record(findings, &ready, &years, measures.list());

    progress.stage("writing figures, tables and briefing");
    let command = format!("study{}", pictures.flags());
    let origin = ready.origin(&command, path, shared);
    let study = describe(&ready, &measures, years, &findings, origin);
    let answer = answer_in_words(&findings, study.warming, study.reader);
    let files = write_files(&study, &answer, |files| pictures.beside(files, shared))?;
    if is_interrupted() {
        return Err(Failure::Interrupted);
    }
    may_be_replaced(&target, "study", shared)?;
    publish(&files, &target).map_err(|error| unpublished(&error))?;
    if shared.json {
        let more = Answered { answer: &answer };
        return output::print_json(&Done::new("study", Some(study.title), &target, names_of(&files), more));
    }
    if open {
        browser::open(&target.join(PAGE));
    }
    if !shared.quiet {
        let ending = Ending {
            answer: &answer.verdict,
            folder: &target,
            first: PAGE,
            second_looks: second_looks(&study),
            said_where: "said at the top of the briefing",
            began,
        };
        ending.say();
    }
    Ok(())
}

fn describe<'a>(
    ready: &'a Ready,
    measures: &'a Measures,
    years: Vec<RecordYear>,
    findings: &'a Findings,
    origin: Origin,
) -> Study<'a> {
    let scenario = &ready.scenario;
    Study {
        title: &scenario.title,
        reader: ready.reader(),
        basin: &ready.basin,
        station_elevation_m: scenario.weather.station_elevation_m,
        beyond_stations: ready.basin.beyond(&ready.stations_m()),
        swe_beyond_stations: ready.basin.swe_beyond(&ready.stations_m(), &reference_swe_mm(findings)),
        gauge_multiplier: scenario.weather.gauge_multiplier,
        season: measures.settings(),
        snow: &scenario.snow,
        fitted: ready.fitted_from(),
        parameter_sets: ready.sets_from(),
        operation: ready.operation.as_ref(),
        warming: &scenario.warming.warming,
        mean_change_sd_pct: scenario.realizations.mean_change_sd_pct,
        generator: scenario.realizations.generator,
        wet_day_mm: scenario.realizations.wet_day_mm,
        record: Record {
            counts: &ready.record.counts,
            skipped: &ready.record.skipped,
            years,
            measures: measures.list(),
            mean_precipitation_mm: ready.mean_precipitation_mm(),
            baseline: ready.baseline.as_ref(),
            detrended: ready.detrended.as_ref(),
        },
        findings,
        defaults: &ready.defaults,
        unlikely: &ready.unlikely,
        origin,
    }
}

/// Median of the headline measure in each band at the reference, mm; 0 where there is none.
fn reference_swe_mm(findings: &Findings) -> Vec<f64> {
    let of_band = |band: &BandFindings| {
        let headline = band.measures.first()?;
        headline.levels[findings.reference].periods.q50.value()
    };
    findings.bands.iter().map(|band| of_band(band).unwrap_or(0.0)).collect()
}

/// Every file, `run.json` the last; `with_pictures` adds what it makes of the figures.
fn write_files(
    study: &Study<'_>,
    answer: &Answer,
    with_pictures: impl FnOnce(Vec<ReportFile>) -> Result<Vec<ReportFile>, Failure>,
) -> Result<Vec<ReportFile>, Failure> {
    let ours = |error: serde_json::Error| Failure::Ours(error.to_string());
    let Reader { units, starts: water_year_starts } = study.reader;
    let is_fitted = study.fitted.is_some();
    let setting = Setting { study_title: study.title, units, water_year_starts, is_fitted };
    let mut files = Vec::new();
    let mut drawn = Vec::new();
    for figure in &FIGURES {
        if let Some(svg) = (figure.draw)(study.findings, &setting) {
            files.push((format!("figures/{}.svg", figure.slug), svg.text.clone().into_bytes()));
            drawn.push((*figure, svg));
        }
    }
    let drawn_of_sites = of_sites(&study.findings.comparisons, &setting);
    for (slug, svg) in &drawn_of_sites {
        files.push((format!("figures/{slug}.svg"), svg.text.clone().into_bytes()));
    }
    let mut files = with_pictures(files)?;
    let tables = tables(study);
    let workbook = workbook_xlsx(study.title, &tables).map_err(|error| Failure::Ours(error.to_string()))?;
    let package = data_package_json(study.title, &tables).map_err(ours)?;
    files.extend(tables);
    files.push(("tables.xlsx".to_owned(), workbook));
    files.push(("datapackage.json".to_owned(), package));
    files.push(("briefing.html".to_owned(), briefing_html(study, answer, &drawn, &drawn_of_sites)));
    files.push(("summary.json".to_owned(), summary_json(study, answer).map_err(ours)?));
    let names: Vec<&str> = files.iter().map(|(name, _)| name.as_str()).chain(["run.json"]).collect();
    let manifest = manifest_json(study, &names).map_err(ours)?;
    files.push(("run.json".to_owned(), manifest));
    Ok(files)
}

fn target(ready: &Ready, shared: &Shared) -> Result<PathBuf, Failure> {
    match (&shared.into, &ready.stem) {
        (Some(into), _) => Ok(into.clone()),
        (None, Some(stem)) => Ok(Path::new("output").join(stem)),
        (None, None) => Err(Failure::CommandLine(
            "a scenario from standard input needs --into DIR for its results".to_owned(),
        )),
    }
}
