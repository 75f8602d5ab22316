//! `thawline daily`: the record as observed, day by day, and how near the model comes to observed snow; some of its years drawn.

mod picture;

pub(super) use picture::{Asked, WaterYears};

use super::arguments::Shared;
use super::assemble::assemble;
use super::done::{Done, NoMore, names_of};
use super::failure::{Failure, may_be_replaced, unpublished};
use super::output;
use super::pictures::Pictures;
use super::progress::{is_interrupted, mind_interrupts};
use super::ready::Ready;
use crate::figures::{Setting, of_days, of_sites};
use crate::fit::Comparison;
use crate::perturb::MonthlyChange;
use crate::report::{
    DailyError, Reader, ReportFile, comparison_json, comparison_words, daily_csv, daily_manifest_json,
    observed_tables, publish,
};
use crate::snow::Lanes;
use picture::Picture;
use std::io::{self, BufWriter, Write};
use std::path::Path;

/// Runs the command: to standard output, or into `daily.csv` of the folder that `--into` names.
pub(super) fn run(
    path: &Path,
    asked: Option<&Asked>,
    pictures: Pictures,
    shared: &Shared,
) -> Result<(), Failure> {
    output::may_be_document("daily", shared)?;
    if shared.into.is_none() {
        if asked.is_some() {
            return Err(Failure::CommandLine(
                "--draw-years leaves a figure, and a figure needs a folder: add --into DIR".to_owned(),
            ));
        }
        if pictures.width_px.is_some() {
            return Err(Failure::CommandLine(
                "--png leaves pictures, and a picture needs a folder: add --into DIR".to_owned(),
            ));
        }
    }
    let ready = assemble(path, shared)?;
    if pictures.width_px.is_some() && asked.is_none() && ready.sites().is_empty() {
        return Err(Failure::CommandLine(
            "--png: nothing is drawn here without observed snow; add --draw-years YEARS".to_owned(),
        ));
    }
    let picture = asked.map(|asked| Picture::of(asked, &ready)).transpose()?;
    let lanes = ready.lanes(&[MonthlyChange::NONE]);
    let comparisons = ready.comparisons().map_err(|open| Failure::Ours(open.to_string()))?;
    if !shared.quiet {
        output::complain(&crate::scenario::unlikely_lines(&ready.unlikely));
        let left_out: Vec<String> =
            ready.record.skipped.iter().map(|year| year.water_year.to_string()).collect();
        if !left_out.is_empty() {
            output::complain(&format!("left out, see check: water years {}\n", left_out.join(", ")));
        }
    }
    if let Some(into) = &shared.into {
        let site = picture.as_ref().and_then(Picture::lanes_of_site);
        let site = site.as_ref().map(|(name, lanes)| (*name, lanes));
        let mut table = Vec::new();
        daily_csv(&lanes, site, &ready.weather, &mut table).map_err(failure)?;
        let mut files = vec![("daily.csv".to_owned(), table)];
        files.extend(of_observed_snow(&ready, &comparisons)?);
        let figures = match &picture {
            Some(picture) => drawn(picture, &ready, &lanes, site.map(|(_, lanes)| lanes))?,
            None => Vec::new(),
        };
        let figures_at: Vec<String> =
            figures.iter().map(|(name, _)| into.join(name).display().to_string()).collect();
        files.extend(figures);
        let mut files = pictures.beside(files, shared)?;
        let names: Vec<&str> = files.iter().map(|(name, _)| name.as_str()).chain(["run.json"]).collect();
        let command = format!("daily{}{}", picture.as_ref().map_or("", Picture::flags), pictures.flags());
        let manifest = daily_manifest_json(&ready.origin(&command, path, shared), &names);
        let manifest = manifest.map_err(|error| Failure::Ours(error.to_string()))?;
        files.push(("run.json".to_owned(), manifest));
        mind_interrupts();
        may_be_replaced(into, "daily", shared)?;
        if is_interrupted() {
            return Err(Failure::Interrupted);
        }
        publish(&files, into).map_err(|error| unpublished(&error))?;
        if shared.json {
            let title = Some(ready.scenario.title.as_str());
            return output::print_json(&Done::new("daily", title, into, names_of(&files), NoMore {}));
        }
        if !shared.quiet {
            say(&comparisons, &ready);
            output::complain(&picture.as_ref().and_then(Picture::left_out).unwrap_or_default());
            output::complain(&format!("daily table: {}\n", into.join("daily.csv").display()));
            for figure in figures_at {
                output::complain(&format!("figure: {figure}\n"));
            }
        }
        return Ok(());
    }
    let mut out = BufWriter::with_capacity(1 << 16, io::stdout().lock());
    daily_csv(&lanes, None, &ready.weather, &mut out).map_err(failure)?;
    out.flush().map_err(|error| output::written(&error))?;
    if !shared.quiet {
        say(&comparisons, &ready);
    }
    Ok(())
}

/// Says how near the model comes to observed snow.
fn say(comparisons: &[Comparison], ready: &Ready) {
    let fitted_file = ready.fitted_from().map(|fitted| fitted.file);
    for comparison in comparisons {
        output::complain(&comparison_words(comparison, fitted_file, ready.reader()));
    }
}

/// Tables, figures and the document of the sites with observed snow; nothing without one.
fn of_observed_snow(ready: &Ready, comparisons: &[Comparison]) -> Result<Vec<ReportFile>, Failure> {
    if comparisons.is_empty() {
        return Ok(Vec::new());
    }
    let setting = setting(ready);
    let mut files = observed_tables(comparisons, setting.units);
    let document = comparison_json(setting.study_title, comparisons)
        .map_err(|error| Failure::Ours(error.to_string()))?;
    files.push(("comparison.json".to_owned(), document));
    let figures = of_sites(comparisons, &setting).into_iter();
    files.extend(figures.map(|(slug, svg)| (format!("figures/{slug}.svg"), svg.text.into_bytes())));
    Ok(files)
}

/// The years that were asked for, drawn.
fn drawn(
    picture: &Picture<'_>,
    ready: &Ready,
    bands: &Lanes,
    of_site: Option<&Lanes>,
) -> Result<Vec<ReportFile>, Failure> {
    let days = picture.days(bands, of_site).map_err(|open| Failure::Ours(open.to_string()))?;
    let figures = of_days(&days, picture.apart(), &setting(ready)).into_iter();
    Ok(figures.map(|(slug, svg)| (format!("figures/{slug}.svg"), svg.text.into_bytes())).collect())
}

fn setting(ready: &Ready) -> Setting<'_> {
    let Reader { units, starts: water_year_starts } = ready.reader();
    Setting {
        study_title: &ready.scenario.title,
        units,
        water_year_starts,
        is_fitted: ready.fitted.is_some(),
    }
}

fn failure(error: DailyError) -> Failure {
    match error {
        DailyError::Ledger(open) => Failure::Ours(open.to_string()),
        DailyError::Write(error) => output::written(&error),
    }
}
