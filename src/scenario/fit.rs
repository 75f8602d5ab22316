//! `[fit]`: what a fit to observed snow may change, and how it searches.

use super::nearest::nearest;
use super::section::Section;
use crate::fault::Fault;
use crate::fit::{Bounded, Objective, PARAMETERS, Parameter, Parameters};

/// A fit as typed.
#[derive(Debug, Clone)]
pub struct FitTyped {
    /// What is searched for.
    pub searched: Vec<Bounded>,
    /// Searches of each split.
    pub starts: usize,
    /// Sets of parameters that each search tries.
    pub evaluations: usize,
    /// Sets of parameters that are handed on.
    pub parameter_sets: usize,
    /// What is made as large as it can be.
    pub objective: Objective,
}

const STARTS: u64 = 8;
const EVALUATIONS: u64 = 1000;
const PARAMETER_SETS: u64 = 20;
const OBJECTIVES: [(&str, Objective); 2] =
    [("nash-sutcliffe", Objective::NashSutcliffe), ("season", Objective::Season)];

impl Default for FitTyped {
    fn default() -> Self {
        Self {
            searched: usual(),
            starts: STARTS as usize,
            evaluations: EVALUATIONS as usize,
            parameter_sets: PARAMETER_SETS as usize,
            objective: Objective::NashSutcliffe,
        }
    }
}

fn usual() -> Vec<Bounded> {
    PARAMETERS.iter().filter(|parameter| parameter.is_usual).map(Bounded::usual).collect()
}

/// Reads the table. `of` are the scenario's parameters, where they could be read: one that they do not have cannot be fitted.
pub(super) fn read(mut section: Section<'_>, of: Option<&Parameters>) -> Option<FitTyped> {
    let mut searched = read_parameters(&mut section, of);
    let bounds = section.section("bounds");
    if let Some(searched) = &mut searched {
        read_bounds(bounds, "", searched);
    }
    let starts = section.whole_or("starts", STARTS, 1..=64) as usize;
    let evaluations = section.whole_or("evaluations", EVALUATIONS, 10..=100_000) as usize;
    let parameter_sets = section.whole_or("parameter_sets", PARAMETER_SETS, 1..=100) as usize;
    let objective = section.choice_or("objective", &OBJECTIVES, "nash-sutcliffe");
    section.finish();
    Some(FitTyped { searched: searched?, starts, evaluations, parameter_sets, objective: objective? })
}

fn read_parameters(section: &mut Section<'_>, of: Option<&Parameters>) -> Option<Vec<Bounded>> {
    if !section.has("parameters") {
        section.knows("parameters");
        section.default("parameters", "the usual ones");
        return Some(usual());
    }
    let typed = section.texts("parameters")?;
    let mut searched: Vec<Bounded> = Vec::with_capacity(typed.len());
    for (at, key) in typed.iter().enumerate() {
        let path = section.path_of(&format!("parameters[{at}]"));
        let fault = |expected: String, mend: String| {
            section.fault(Fault::key(path.clone(), format!("{key:?}"), expected, mend));
        };
        match Parameter::named(key) {
            None => {
                let keys = PARAMETERS.iter().map(|parameter| parameter.key);
                let mend = match nearest(key, keys.clone()) {
                    Some(word) => format!("write \"{word}\""),
                    None => format!("take some of: {}", keys.collect::<Vec<_>>().join(", ")),
                };
                fault("the key of a parameter that can be fitted".to_owned(), mend);
            }
            Some(parameter) if searched.iter().any(|bounded| bounded.parameter.key == parameter.key) => {
                fault("each parameter once".to_owned(), "take one of them out".to_owned());
            }
            Some(parameter) if of.is_some_and(|of| parameter.get(of).is_none()) => fault(
                "a parameter of the rules and options in use".to_owned(),
                "take it out, or turn on in [snow] or [basin] what it belongs to".to_owned(),
            ),
            Some(parameter) => searched.push(Bounded::usual(parameter)),
        }
    }
    if typed.is_empty() {
        section.fault(Fault::key(
            section.path_of("parameters"),
            "an empty list",
            "the keys of one or more parameters",
            "name some, or leave the list out for the usual ones",
        ));
    }
    (searched.len() == typed.len() && !typed.is_empty()).then_some(searched)
}

/// Reads the bounds in this table and the tables below it; `above` are the names down to it, each with a dot behind.
fn read_bounds(mut section: Section<'_>, above: &str, searched: &mut [Bounded]) {
    let below = PARAMETERS.iter().filter_map(|parameter| parameter.key.strip_prefix(above));
    for name in below {
        match name.split_once('.') {
            Some((table, _)) => {
                if section.is_table(table) {
                    read_bounds(section.section(table), &format!("{above}{table}."), searched);
                } else {
                    section.section(table);
                }
            }
            None => {
                let bounds = read_pair(&mut section, name, above);
                let Some(bounds) = bounds else { continue };
                let key = format!("{above}{name}");
                match searched.iter_mut().find(|bounded| bounded.parameter.key == key) {
                    Some(bounded) => bounded.bounds = bounds,
                    None => section.fault(Fault::key(
                        section.path_of(name),
                        format!("bounds of {key}, which is not fitted"),
                        "bounds of parameters that are fitted",
                        format!("add \"{key}\" to fit.parameters, or take its bounds out"),
                    )),
                }
            }
        }
    }
    section.finish();
}

fn read_pair(section: &mut Section<'_>, name: &'static str, above: &str) -> Option<[f64; 2]> {
    let typed = section.numbers(name)?;
    let [lowest, highest] = Parameter::named(&format!("{above}{name}"))?.widest;
    match typed[..] {
        [low, high] if lowest <= low && low < high && high <= highest => Some([low, high]),
        _ => {
            let words: Vec<String> = typed.iter().map(f64::to_string).collect();
            section.fault(Fault::key(
                section.path_of(name),
                format!("[{}]", words.join(", ")),
                format!("a lower and a higher number from {lowest} to {highest}"),
                format!("{name} = [lowest, highest]"),
            ));
            None
        }
    }
}
