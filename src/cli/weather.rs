//! `thawline weather`: station weather as a study runs it before any warming: the record, corrected for catch and without
//! gaps, or a realization.

use super::arguments::Shared;
use super::assemble::assemble;
use super::done::{Done, NoMore, names_of};
use super::failure::{Failure, may_be_replaced, unpublished};
use super::output;
use crate::perturb::{Generator, MeanChange};
use crate::report::{daily_manifest_json, publish, weather_csv};
use crate::weather::Series;
use std::io::{self, BufWriter, Write};
use std::path::Path;

/// Runs the command: to standard output, or into `weather.csv` of the folder that `--into` names.
pub(super) fn run(path: &Path, realization: Option<u32>, shared: &Shared) -> Result<(), Failure> {
    output::may_be_document("weather", shared)?;
    let ready = assemble(path, shared)?;
    let realizations = &ready.scenario.realizations;
    if let Some(number) = realization.filter(|number| *number > realizations.count) {
        return Err(Failure::CommandLine(format!(
            "--realization {number}: the scenario has realizations 1 to {}",
            realizations.count
        )));
    }
    let recipe = ready.recipe();
    let made = recipe.of(&ready.drawn_from);
    let generator = MeanChange {
        generator: &*made,
        seed: recipe.seed,
        standard_deviation_pct: realizations.mean_change_sd_pct.unwrap_or(0.0),
    };
    let (weather, are_record_years) = match realization {
        None => (ready.drawn_from.clone(), true),
        Some(number) => {
            let mut weather = Series::default();
            generator.fill(number - 1, realizations.years, &mut weather);
            (weather, made.keeps_names())
        }
    };
    if let Some(into) = &shared.into {
        let mut table = Vec::new();
        weather_csv(&weather, are_record_years, &mut table).map_err(|error| output::written(&error))?;
        let number = realization.map_or(String::new(), |number| format!(" --realization {number}"));
        let command = format!("weather{number}");
        let manifest =
            daily_manifest_json(&ready.origin(&command, path, shared), &["weather.csv", "run.json"]);
        let manifest = manifest.map_err(|error| Failure::Ours(error.to_string()))?;
        may_be_replaced(into, "weather", shared)?;
        let files = [("weather.csv".to_owned(), table), ("run.json".to_owned(), manifest)];
        publish(&files, into).map_err(|error| unpublished(&error))?;
        if shared.json {
            let title = Some(ready.scenario.title.as_str());
            return output::print_json(&Done::new("weather", title, into, names_of(&files), NoMore {}));
        }
        if !shared.quiet {
            output::complain(&format!("weather table: {}\n", into.join("weather.csv").display()));
        }
        return Ok(());
    }
    let mut out = BufWriter::with_capacity(1 << 16, io::stdout().lock());
    weather_csv(&weather, are_record_years, &mut out).map_err(|error| output::written(&error))?;
    out.flush().map_err(|error| output::written(&error))
}
