//! `[snow.parameter_sets]`: sets of parameters that a study runs beside its own, to know how far its answer hangs on them.
//!
//! The file is a table, as `thawline fit` writes it: a column a key of a scenario, a row a set. A key may come from it that the
//! scenario leaves open, fitted or not; what the scenario states itself holds for every set, so a column for it would be
//! passed over in silence, and is a fault.

use super::Draft;
use super::document::Document;
use super::fitted::is_stated;
use super::section::Section;
use crate::fault::{Fault, Unlikely};
use crate::fit::{PARAMETERS, Parameter, Parameters, Value};
use crate::table::{Format, Table, Tally};

/// The key that names the file.
pub const PARAMETER_SETS_KEY: &str = "snow.parameter_sets.file";
/// Realizations that are run of each set, unless more or fewer are stated or the study has fewer.
const REALIZATIONS: u32 = 100;
/// A file of more sets is a file of something else.
const MOST_SETS: usize = 1000;
/// Of a set, what it scored in its fit: no parameter, and not read.
const OBJECTIVE: &str = "objective";

/// Sets of parameters as typed.
#[derive(Debug, Clone, PartialEq)]
pub struct ParameterSetsTyped {
    /// The file, as the scenario names it.
    pub file: String,
    /// How many of its sets are run, the first; all where none is stated.
    pub count: Option<usize>,
    /// Realizations of each, where stated.
    pub realizations: Option<u32>,
}

/// Sets of parameters that are run.
#[derive(Debug, Clone, PartialEq)]
pub struct ParameterSets {
    /// The file, as the scenario names it.
    pub file: String,
    /// Sets in the file.
    pub in_file: usize,
    /// What each changes, in the order of the file.
    pub values: Vec<Vec<Value>>,
    /// Everything that a fit may change, of each.
    pub parameters: Vec<Parameters>,
    /// Realizations of each.
    pub realizations: u32,
    /// Whether the first is what the study itself runs with.
    pub first_is_own: bool,
}

/// Reads the table; none where there is none.
pub(super) fn read(snow: &mut Section<'_>) -> Option<ParameterSetsTyped> {
    if !snow.has("parameter_sets") {
        snow.knows("parameter_sets");
        return None;
    }
    let mut section = snow.section("parameter_sets");
    let expected = "the path of the parameter-sets.csv that `thawline fit` has written";
    let file = section.required_text("file", expected, "add file = \"parameter-sets.csv\"");
    section.names_file(PARAMETER_SETS_KEY, file.as_deref());
    let count = if section.has("count") {
        section.whole_in("count", 2..=MOST_SETS as u64, 20).map(|count| count as usize)
    } else {
        section.knows("count");
        section.default("count", "all sets of the file");
        None
    };
    let realizations = if section.has("realizations") {
        let stated = section.whole_in("realizations", 2..=100_000, u64::from(REALIZATIONS));
        stated.map(|realizations| realizations as u32)
    } else {
        section.knows("realizations");
        section.default("realizations", "100, or all of the study's where it has fewer");
        None
    };
    section.finish();
    Some(ParameterSetsTyped { file: file?, count, realizations })
}

/// Reads a file of sets of parameters.
///
/// # Errors
/// Every fault of the file: columns that are no key of a parameter, cells that are no number or outside the key's range, fewer
/// than two sets.
pub fn read_parameter_sets(file: &str, text: &str) -> Result<Vec<Vec<Value>>, Vec<Fault>> {
    let format = Format::default();
    let table = Table::open(file, text, &format).map_err(|fault| vec![fault])?;
    let mut faults = Vec::new();
    let mut columns: Vec<(usize, &'static Parameter)> = Vec::new();
    for (at, name) in table.names().enumerate().filter(|(_, name)| *name != OBJECTIVE) {
        match Parameter::named(name) {
            Some(parameter) => match table.column(name) {
                Ok(_) => columns.push((at, parameter)),
                Err(repeated) => faults.push(repeated),
            },
            None => {
                let mend =
                    match super::nearest::nearest(name, PARAMETERS.iter().map(|parameter| parameter.key)) {
                        Some(word) => format!("write {word}, or take the column out"),
                        None => "take the column out".to_owned(),
                    };
                faults.push(table.name_fault(at, "the key of a parameter that can be fitted", &mend));
            }
        }
    }
    if columns.is_empty() && faults.is_empty() {
        faults.push(table.file_fault(
            "no parameter",
            "a column a key",
            "take a file that `thawline fit` has written",
        ));
    }
    if !faults.is_empty() {
        return Err(faults);
    }
    let mut tally = Tally::default();
    let mut sets = Vec::new();
    for row in table.rows().take(MOST_SETS + 1) {
        let Some(row) = tally.keep(row) else { continue };
        let mut set = Vec::with_capacity(columns.len());
        for (at, parameter) in &columns {
            let [lowest, highest] = parameter.widest;
            let Some(value) = tally.keep(table.required_number(&row, *at)) else { continue };
            if (lowest..=highest).contains(&value) {
                set.push(Value { key: parameter.key, value });
            } else {
                let expected = format!("a number from {lowest} to {highest}");
                tally.push(table.cell_fault(&row, *at, &expected, "check it, or take the line out"));
            }
        }
        sets.push(set);
    }
    if tally.is_empty() && !(2..=MOST_SETS).contains(&sets.len()) {
        let found = if sets.len() > MOST_SETS {
            format!("more than {MOST_SETS} sets")
        } else {
            format!("{} of them", sets.len())
        };
        let expected = format!("2 to {MOST_SETS} sets, a row each");
        tally.push(table.file_fault(found, &expected, "take a file that `thawline fit` has written"));
    }
    if tally.is_empty() { Ok(sets) } else { Err(tally.into_faults()) }
}

impl ParameterSets {
    /// Says so where the first set, the best of its fit, is not what the study itself runs with.
    pub fn unlikely(&self) -> Option<Unlikely> {
        let why = format!(
            "the first set of {} is not what the study itself runs with: to let its answer lie among those of the sets, name \
             as snow.fitted the parameters.toml of the same fit",
            self.file
        );
        (!self.first_is_own).then(|| Unlikely::new(PARAMETER_SETS_KEY, why))
    }
}

impl Draft {
    /// The sets that are run: the parameters in force, fitted ones among them, with each row's in their place. None where a part
    /// that they belong to has a fault.
    ///
    /// # Errors
    /// A key of the file that the scenario states itself or that its rules and options do not have; fewer sets than are asked
    /// for.
    pub fn parameter_sets(
        &self,
        sets: &[Vec<Value>],
        document: &Document<'_>,
    ) -> Result<Option<ParameterSets>, Vec<Fault>> {
        let Some(typed) = &self.parameter_sets else { return Ok(None) };
        let own = super::parameters(self.basin.as_ref(), self.weather.as_ref(), self.snow);
        let (Some(own), Some(realizations)) = (own, &self.realizations) else { return Ok(None) };
        let mut faults = Vec::new();
        for value in sets.iter().take(1).flatten() {
            let Some(parameter) = Parameter::named(value.key) else { continue };
            if is_stated(document, value.key) {
                faults.push(Fault::key(
                    PARAMETER_SETS_KEY,
                    format!("a column {} in {}, beside the scenario's own", value.key, typed.file),
                    "each parameter from one place",
                    "take it out of the scenario, or the column out of the file",
                ));
            } else if parameter.get(&own).is_none() {
                faults.push(Fault::key(
                    PARAMETER_SETS_KEY,
                    format!("a column {} in {}", value.key, typed.file),
                    "parameters of the rules and options in use",
                    "fit again with these rules and options, or take the column out of the file",
                ));
            }
        }
        let count = typed.count.unwrap_or(sets.len());
        if count > sets.len() {
            faults.push(Fault::key(
                "snow.parameter_sets.count",
                count,
                format!("at most the {} sets of {}", sets.len(), typed.file),
                "take fewer, or fit again with a larger fit.parameter_sets",
            ));
        }
        if let Some(asked) = typed.realizations.filter(|asked| *asked > realizations.count) {
            faults.push(Fault::key(
                "snow.parameter_sets.realizations",
                asked,
                format!("at most the study's own {}, which the sets share", realizations.count),
                "take fewer, or raise realizations.count",
            ));
        }
        if !faults.is_empty() {
            return Err(faults);
        }
        let of = |set: &Vec<Value>| {
            let mut parameters = own.clone();
            // In the list's order: where one limits another, the one that limits is set first.
            for parameter in &PARAMETERS {
                if let Some(value) = set.iter().find(|value| value.key == parameter.key) {
                    parameter.set(&mut parameters, value.value);
                }
            }
            parameters
        };
        let values: Vec<Vec<Value>> = sets[..count].to_vec();
        let parameters: Vec<Parameters> = values.iter().map(of).collect();
        Ok(Some(ParameterSets {
            file: typed.file.clone(),
            in_file: sets.len(),
            first_is_own: parameters.first() == Some(&own),
            values,
            parameters,
            realizations: typed.realizations.unwrap_or(REALIZATIONS).min(realizations.count),
        }))
    }
}
