//! `snow.fitted`: a file of fitted parameters, for the keys that the scenario does not state itself.
//!
//! The file is TOML, a key of a scenario a line: `snow.melt_base_c = 0.4`. Reading it and taking from it are two steps, since
//! the scenario is read without touching any other file.

use super::document::Document;
use super::nearest::nearest;
use super::section::{Section, described};
use super::{DefaultInForce, Draft};
use crate::fault::{Fault, Place};
use crate::fit::{PARAMETERS, Parameter, Parameters, SkillInShort, Value};
use serde::Deserialize;
use std::ops::Range;
use toml::de::{DeTable, DeValue};

/// The key that names the file.
pub const FITTED_KEY: &str = "snow.fitted";

/// Tables of the file that say how the fit did.
const SKILL_KEY: &str = "skill";

/// Numbers of `[snow.rain_snow]`: who states one of them states the rule, and no fitted number belongs to it.
const OF_RAIN_AND_SNOW: [&str; 4] =
    ["snow_only_below_c", "rain_only_above_c", "half_snow_at_c", "mixed_range_c"];

/// What was taken from a file of fitted parameters.
#[derive(Debug, Clone, PartialEq)]
pub struct Fitted {
    /// The file, as the scenario names it.
    pub file: String,
    /// What is in force from it.
    pub taken: Vec<Value>,
    /// Keys of the file that the scenario states itself, or that its rules and options do not have.
    pub left: Vec<&'static str>,
    /// How the fit did, a site each.
    pub skill: Vec<SkillInShort>,
}

/// What a file of fitted parameters holds.
#[derive(Debug, Clone, PartialEq)]
pub struct FittedFile {
    /// Keys and values.
    pub values: Vec<Value>,
    /// How the fit did, a site each; a file need not say so.
    pub skill: Vec<SkillInShort>,
}

/// The part of the file that holds no parameter.
#[derive(Deserialize)]
struct Beside {
    #[serde(default)]
    skill: Vec<SkillInShort>,
}

pub(super) fn read(snow: &mut Section<'_>) -> Option<String> {
    let file = if snow.has("fitted") {
        snow.required_text("fitted", "the path of a file that `thawline fit` has written", "take it out")
    } else {
        snow.knows("fitted");
        None
    };
    snow.names_file(FITTED_KEY, file.as_deref());
    file
}

/// Reads a file of fitted parameters.
///
/// # Errors
/// Every fault of the file: what is no TOML, no parameter, no number, or outside its range.
pub fn read_fitted(file: &str, text: &str) -> Result<FittedFile, Vec<Fault>> {
    let document = Document::parse(text);
    let mut reader = Reader { file, text, document: &document, values: Vec::new(), faults: Vec::new() };
    reader.table("", document.table());
    let skill = reader.skill();
    document.keep_what_is_certain(&mut reader.faults);
    for fault in &mut reader.faults {
        if let Place::Span(bytes) = &fault.place {
            fault.place = cell(file, text, &document, bytes.clone());
        }
    }
    if reader.faults.is_empty() {
        Ok(FittedFile { values: reader.values, skill })
    } else {
        Err(reader.faults)
    }
}

struct Reader<'a> {
    file: &'a str,
    text: &'a str,
    document: &'a Document<'a>,
    values: Vec<Value>,
    faults: Vec<Fault>,
}

impl Reader<'_> {
    fn table(&mut self, above: &str, table: &DeTable<'_>) {
        for (name, value) in table {
            let key = format!("{above}{}", name.get_ref());
            if key == SKILL_KEY {
                continue;
            }
            match (value.get_ref(), Parameter::named(&key)) {
                (DeValue::Table(below), None) => self.table(&format!("{key}."), below),
                (_, None) => {
                    let mend = match nearest(&key, PARAMETERS.iter().map(|parameter| parameter.key)) {
                        Some(word) => format!("write {word}, or take the line out"),
                        None => "take the line out".to_owned(),
                    };
                    self.fault(name.span(), key, "the key of a parameter that can be fitted", mend);
                }
                (value_of, Some(parameter)) => self.number(parameter, value_of, value.span()),
            }
        }
    }

    /// The tables of skill; a file that is no TOML is a fault of the document's.
    fn skill(&mut self) -> Vec<SkillInShort> {
        match toml::from_str::<Beside>(self.text) {
            Ok(beside) => beside.skill,
            Err(error) => {
                if let Some(bytes) = error.span() {
                    let expected = "numbers of a fit's skill, as `thawline fit` writes them";
                    self.fault(
                        bytes,
                        error.message().to_owned(),
                        expected,
                        "fit again, or take the [[skill]] tables out".to_owned(),
                    );
                }
                Vec::new()
            }
        }
    }

    fn number(&mut self, parameter: &'static Parameter, value: &DeValue<'_>, span: Range<usize>) {
        let text = match value {
            DeValue::Integer(integer) => integer.as_str(),
            DeValue::Float(float) => float.as_str(),
            _ => "",
        };
        let [lowest, highest] = parameter.widest;
        match text.parse::<f64>() {
            Ok(number) if (lowest..=highest).contains(&number) => {
                self.values.push(Value { key: parameter.key, value: number });
            }
            _ => self.fault(
                span,
                described(value),
                &format!("a number from {lowest} to {highest}"),
                format!("{} = 1.5, for example", parameter.key),
            ),
        }
    }

    fn fault(&mut self, bytes: Range<usize>, found: String, expected: &str, mend: String) {
        let place = cell(self.file, self.text, self.document, bytes);
        self.faults.push(Fault { place, found, expected: expected.to_owned(), mend });
    }
}

/// Some bytes of the file as a place in one of its lines.
fn cell(file: &str, text: &str, document: &Document<'_>, bytes: Range<usize>) -> Place {
    let (line, start) = document.line_at(bytes.start);
    let of_line = text[start..].lines().next().unwrap_or_default();
    let within = |byte: usize| byte.saturating_sub(start).min(of_line.len());
    Place::Cell {
        file: file.to_owned(),
        line,
        column: String::new(),
        text: of_line.to_owned(),
        bytes: within(bytes.start)..within(bytes.end),
    }
}

impl Draft {
    /// Takes fitted values for the keys that the scenario does not state itself; they are no defaults then. Nothing is taken
    /// where a part that they belong to has a fault.
    pub fn take_fitted(&mut self, name: &str, file: FittedFile, document: &Document<'_>) -> Option<Fitted> {
        let FittedFile { values, skill } = file;
        let mut parameters = super::parameters(self.basin.as_ref(), self.weather.as_ref(), self.snow)?;
        let (mut taken, mut left) = (Vec::new(), Vec::new());
        for parameter in &PARAMETERS {
            let Some(value) = values.iter().find(|value| value.key == parameter.key) else { continue };
            if is_stated(document, parameter.key) || parameter.get(&parameters).is_none() {
                left.push(parameter.key);
            } else {
                parameter.set(&mut parameters, value.value);
                taken.push(*value);
            }
        }
        self.defaults.retain(|default| !taken.iter().any(|value| replaces(value.key, default)));
        self.put(parameters);
        Some(Fitted { file: name.to_owned(), taken, left, skill })
    }

    fn put(&mut self, parameters: Parameters) {
        self.snow = Some(parameters.snow);
        if let Some(weather) = &mut self.weather {
            weather.gauge_multiplier = parameters.gauge;
        }
        if let Some(basin) = &mut self.basin {
            basin.temperature = parameters.temperature;
            basin.precipitation = parameters.precipitation;
        }
    }
}

/// Whether the scenario states the key itself.
pub(super) fn is_stated(document: &Document<'_>, key: &str) -> bool {
    match key.strip_prefix("snow.rain_snow.") {
        Some(_) => OF_RAIN_AND_SNOW.iter().any(|name| document.has(&format!("snow.rain_snow.{name}"))),
        None => document.has(key),
    }
}

/// Whether a fitted value takes the place of a default: of its own key, of the table that it is in, or of the other numbers of
/// its rule.
fn replaces(key: &str, default: &DefaultInForce) -> bool {
    let is_above =
        key.strip_prefix(&default.key).is_some_and(|rest| rest.is_empty() || rest.starts_with('.'));
    is_above || (key.starts_with("snow.rain_snow.") && default.key.starts_with("snow.rain_snow."))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn values_are_read_in_tables_and_dotted_lines() {
        let text = "# fitted\nsnow.melt_base_c = 0.25\n[weather]\ngauge_multiplier = { snow = 1 }\n";
        let values = read_fitted("p.toml", text).unwrap().values;
        let expected = [("snow.melt_base_c", 0.25), ("weather.gauge_multiplier.snow", 1.0)];
        assert_eq!(values, expected.map(|(key, value)| Value { key, value }));
    }

    /// Each fault has its line and its bytes.
    #[test]
    fn every_fault_has_its_place() {
        let text =
            "snow.melt_bse_c = 1\nsnow.refreeze_fraction = \"a\"\nsnow.liquid_holding_fraction = 7.5\n";
        let faults = read_fitted("p.toml", text).unwrap_err();
        let places: Vec<(usize, &str)> = faults
            .iter()
            .filter_map(|fault| match &fault.place {
                Place::Cell { line, text, bytes, .. } => Some((*line, &text[bytes.clone()])),
                _ => None,
            })
            .collect();
        assert_eq!(places.len(), 3, "{faults:?}");
        for expected in [(1, "melt_bse_c"), (2, "\"a\""), (3, "7.5")] {
            assert!(places.contains(&expected), "{places:?}");
        }
        assert!(faults.iter().any(|fault| fault.mend.contains("write snow.melt_base_c")), "{faults:?}");
        assert!(read_fitted("p.toml", "snow.melt_base_c = \n").is_err());
        let skill = |number: &str| {
            read_fitted(
                "p.toml",
                &format!("[[skill]]\nsite = \"a\"\nwinters = 9\nhalves_apart_c = {number}\n"),
            )
        };
        assert!(skill("1.5").is_ok_and(|file| file.skill.len() == 1));
        assert!(skill("nan").is_err() && skill("-inf").is_err() && skill("\"a\"").is_err());
    }
}
