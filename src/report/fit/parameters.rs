//! `parameters.toml`: what was fitted, for a scenario to name.

use super::{FitReport, effort, rounded};
use crate::fit::Parameter;
use std::fmt::Write;

/// The file: a key of a scenario a line, and how to use it.
pub(super) fn parameters_toml(report: &FitReport<'_>) -> Vec<u8> {
    let mut text = format!(
        "# Parameters fitted to observed snow: {}.\n# {}.\n\
         # To use them, name this file in the scenario's table [snow], by a path from the scenario's folder:\n\
         #   fitted = \"parameters.toml\"\n\
         # Keys that the scenario states itself go before: take there out what is to be taken from here.\n\n",
        one_line(report.title),
        effort(report)
    );
    for value in &report.result.fitted[0].values {
        if let Some(parameter) = Parameter::named(value.key) {
            let unit =
                if parameter.unit.is_empty() { String::new() } else { format!(", {}", parameter.unit) };
            let _ = writeln!(text, "# {}{unit}", parameter.title);
        }
        let _ = writeln!(text, "{} = {}", value.key, rounded(value.value));
    }
    for key in &report.result.not_identified {
        let _ = writeln!(text, "# {key}: not identified by the snow, stays as the scenario has it");
    }
    text.into_bytes()
}

/// A title is one line already; a comment must be.
fn one_line(title: &str) -> String {
    title.chars().filter(|c| !c.is_control()).collect()
}
