//! `parameters.toml`: what was fitted, for a scenario to name.

use super::{FitReport, effort, rounded};
use crate::fit::{Parameter, SkillInShort, skill_in_short};
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
    text += "\n# How the fit did, for the briefing of a study that takes it.\n";
    for skill in skill_in_short(report.result) {
        let _ = write!(text, "\n[[skill]]\n{}", table(&skill));
    }
    text.into_bytes()
}

/// A line a number; what is none has no line.
fn table(skill: &SkillInShort) -> String {
    let numbers = [
        ("nash_sutcliffe", skill.nash_sutcliffe),
        ("nash_sutcliffe_not_seen", skill.nash_sutcliffe_not_seen),
        ("nash_sutcliffe_colder_to_warmer", skill.nash_sutcliffe_colder_to_warmer),
        ("survey_bias_colder_to_warmer_pct", skill.survey_bias_colder_to_warmer_pct),
        ("survey_bias_standard_error_pct", skill.survey_bias_standard_error_pct),
        ("halves_apart_c", Some(skill.halves_apart_c)),
    ];
    let mut text =
        format!("site = {}\nwinters = {}\n", toml::Value::from(skill.site.as_str()), skill.winters);
    for (name, value) in numbers {
        if let Some(value) = value {
            let _ = writeln!(text, "{name} = {:?}", rounded(value));
        }
    }
    text
}

/// A title is one line already; a comment must be.
fn one_line(title: &str) -> String {
    title.chars().filter(|c| !c.is_control()).collect()
}
