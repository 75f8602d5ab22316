//! `thawline fit`: parameters that bring the model nearest to observed snow, and how it does on winters that it has not seen.

mod told;

use super::arguments::Shared;
use super::assemble::assemble;
use super::browser;
use super::done::{Done, names_of};
use super::ending::Ending;
use super::failure::{Failure, may_be_replaced, unpublished};
use super::output;
use super::pictures::Pictures;
use super::pool::in_pool;
use super::progress::{Progress, is_interrupted, mind_interrupts};
use super::ready::Ready;
use crate::fault::Fault;
use crate::fit::{FitEnd, Held, LEAST_WINTERS, LeftOut, Plan, Site, Value, fit, left_out, without};
use crate::report::numbers::counted;
use crate::report::{FitReport, fit_files, fit_in_words, fit_manifest_json, left_out_lines, publish};
use serde::Serialize;
use std::collections::BTreeSet;
use std::path::{Path, PathBuf};
use std::time::Instant;
use told::Told;

/// The file of the results that is to be looked at first.
const PAGE: &str = "fit.html";

/// What the document says beside the files.
#[derive(Serialize)]
struct Found<'a> {
    parameters: &'a [Value],
    not_identified: &'a [&'static str],
}

/// Runs the command; with the page opened at its end, if that is asked for.
pub(super) fn run(path: &Path, open: bool, pictures: Pictures, shared: &Shared) -> Result<(), Failure> {
    let began = Instant::now();
    browser::may_open(open, shared)?;
    let progress = Progress::new(shared);
    let ready = assemble(path, shared)?;
    mind_interrupts();
    let target = target(&ready, shared)?;
    may_be_replaced(&target, "fit", shared)?;
    if !shared.quiet {
        output::complain(&crate::scenario::unlikely_lines(&ready.unlikely));
    }
    let scenario = &ready.scenario;
    let all_sites = ready.sites();
    if all_sites.is_empty() {
        return Err(refused(
            &ready,
            "observed_swe",
            "no site",
            "observed snow",
            "add an [[observed_swe]] table with its file",
            shared,
        ));
    }
    let left_out = left_out(&all_sites, &ready.record.series, scenario.weather.station_elevation_m);
    if !shared.quiet {
        output::complain(&left_out_lines(&left_out));
    }
    let remaining =
        all_sites.iter().map(|site| Some((site, without(site, &left_out, &ready.record.series)?)));
    let remaining: Vec<_> = remaining.flatten().collect();
    let sites: Vec<Site<'_>> =
        remaining.iter().map(|(site, observations)| Site { observations, ..**site }).collect();
    let plan = Plan {
        held: Held {
            sites: &sites,
            weather: &ready.record.series,
            basin: &ready.basin,
            station_m: scenario.weather.station_elevation_m,
            season: &scenario.season,
        },
        stated: scenario.parameters(),
        searched: scenario.fit.searched.clone(),
        objective: scenario.fit.objective,
        starts: scenario.fit.starts,
        evaluations: scenario.fit.evaluations,
        sets: scenario.fit.parameter_sets,
        seed: scenario.seed,
    };
    let (result, pace) = in_pool(shared, || {
        let mut told = Told::new(&progress, &plan);
        let result = fit(&plan, &mut told);
        (result, told.ends())
    })?;
    let result = result.map_err(|end| match end {
        FitEnd::Stopped => Failure::Interrupted,
        FitEnd::Ledger(open) => Failure::Ours(open.to_string()),
        FitEnd::TooFewWinters(winters) => refused(
            &ready,
            "observed_swe",
            &format!("{winters} water years in use with observed snow{}", and_without(&left_out)),
            &format!("at least {LEAST_WINTERS}, so that halves of them can be told apart"),
            "add years to the record or to the observed snow; `thawline check` says which are not in use and why",
            shared,
        ),
    })?;
    let report = FitReport {
        title: &scenario.title,
        reader: ready.reader(),
        stated: &plan.stated,
        searched: &plan.searched,
        objective: plan.objective,
        starts: plan.starts,
        evaluations: plan.evaluations,
        left_out: &left_out,
        cool_temperature: ready.baseline.as_ref().and_then(|baseline| baseline.cool_temperature.as_ref()),
        result: &result,
        origin: ready.origin(&format!("fit{}", pictures.flags()), path, shared),
    };
    let ours = |error: serde_json::Error| Failure::Ours(error.to_string());
    let mut files = pictures.beside(fit_files(&report).map_err(ours)?, shared)?;
    let names: Vec<&str> = files.iter().map(|(name, _)| name.as_str()).chain(["run.json"]).collect();
    let manifest = fit_manifest_json(&report.origin, &names).map_err(ours)?;
    files.push(("run.json".to_owned(), manifest));
    if is_interrupted() {
        return Err(Failure::Interrupted);
    }
    may_be_replaced(&target, "fit", shared)?;
    publish(&files, &target).map_err(|error| unpublished(&error))?;
    let parameters = &result.fitted[0].values;
    if shared.json {
        let more = Found { parameters, not_identified: &result.not_identified };
        let title = Some(scenario.title.as_str());
        return output::print_json(&Done::new("fit", title, &target, names_of(&files), more));
    }
    if open {
        browser::open(&target.join(PAGE));
    }
    if !shared.quiet {
        output::complain(&format!("{pace}\n{}", fit_in_words(&report)));
        let ending = Ending {
            answer: &fitted_in_words(parameters.len(), result.not_identified.len(), sites.len()),
            folder: &target,
            first: PAGE,
            second_looks: ready.unlikely.len() + left_out.len(),
            said_where: "said above as the fit began",
            began,
        };
        ending.say();
    }
    Ok(())
}

/// `3 parameters fitted to the snow of 2 sites; 1 that it does not tell was left as it was`.
fn fitted_in_words(parameters: usize, left: usize, sites: usize) -> String {
    let fitted =
        format!("{} fitted to the snow of {}", counted(parameters, "parameter"), counted(sites, "site"));
    match left {
        0 => fitted,
        1 => format!("{fitted}; 1 that it does not tell was left as it was"),
        left => format!("{fitted}; {left} that it does not tell were left as they were"),
    }
}

/// `; the record is at fault in these, which no fit sees: 1990 at pillow (gauge against pillow)`; nothing where no rule found any.
fn and_without(left_out: &[LeftOut]) -> String {
    let of_sites: BTreeSet<String> = left_out
        .iter()
        .map(|out| format!("{} at {} ({})", out.water_year, out.site, out.rule.name()))
        .collect();
    if of_sites.is_empty() {
        return String::new();
    }
    let winters: Vec<String> = of_sites.into_iter().collect();
    format!("; the record is at fault in these, which no fit sees: {}", winters.join(", "))
}

fn target(ready: &Ready, shared: &Shared) -> Result<PathBuf, Failure> {
    match (&shared.into, &ready.stem) {
        (Some(into), _) => Ok(into.clone()),
        (None, Some(stem)) => Ok(Path::new("output").join(format!("{stem}-fit"))),
        (None, None) => Err(Failure::CommandLine(
            "a scenario from standard input needs --into DIR for its results".to_owned(),
        )),
    }
}

fn refused(ready: &Ready, key: &str, found: &str, expected: &str, mend: &str, shared: &Shared) -> Failure {
    let file = &ready.files[0];
    let fault = Fault::key(key, found, expected, mend);
    Failure::input(&[fault], &file.name, &file.text, shared.is_coloured())
}
