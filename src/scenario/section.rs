//! One table of a scenario: typed values, with every fault and every default noted.

use super::document::Document;
use super::nearest::nearest;
use super::notes::{DefaultInForce, Notes};
use super::precipitation_change::Nested;
use crate::fault::{Fault, Place, Unlikely};
use std::ops::RangeInclusive;
use toml::de::{DeTable, DeValue};

/// A table of the scenario while it is read.
pub(super) struct Section<'d> {
    document: &'d Document<'d>,
    pub notes: &'d Notes,
    path: String,
    table: Option<&'d DeTable<'d>>,
    known: Vec<&'static str>,
}

impl<'d> Section<'d> {
    /// The scenario as a whole.
    pub fn top(document: &'d Document<'d>, notes: &'d Notes) -> Self {
        Self::new(document, notes, String::new(), Some(document.table()))
    }

    fn new(
        document: &'d Document<'d>,
        notes: &'d Notes,
        path: String,
        table: Option<&'d DeTable<'d>>,
    ) -> Self {
        Self { document, notes, path, table, known: Vec::new() }
    }

    /// The dotted path of the table.
    pub fn path(&self) -> &str {
        &self.path
    }

    /// The dotted path of one of the table's keys.
    pub fn path_of(&self, key: &str) -> String {
        if self.path.is_empty() { key.to_owned() } else { format!("{}.{key}", self.path) }
    }

    /// Notes a fault.
    pub fn fault(&self, fault: Fault) {
        self.notes.faults.borrow_mut().push(fault);
    }

    /// Notes something unlikely about a key.
    pub fn unlikely(&self, key: &str, why: impl Into<String>) {
        self.notes.unlikely.borrow_mut().push(Unlikely::new(self.path_of(key), why));
    }

    /// Notes the default of a key that was not typed.
    pub fn default(&self, key: &str, value: impl std::fmt::Display) {
        self.notes
            .defaults
            .borrow_mut()
            .push(DefaultInForce { key: self.path_of(key), value: value.to_string() });
    }

    /// Notes that a key names a data file.
    pub fn names_file(&self, key: &str, file: Option<&str>) {
        let named = file.map(|file| (key.to_owned(), file.to_owned()));
        self.notes.named_files.borrow_mut().extend(named);
    }

    /// Whether the key was typed and holds a table.
    pub fn is_table(&self, key: &str) -> bool {
        let value = self.table.and_then(|table| table.get(key)).map(toml::Spanned::get_ref);
        matches!(value, Some(DeValue::Table(_)))
    }

    /// Whether the key was typed.
    pub fn has(&self, key: &str) -> bool {
        self.table.is_some_and(|table| table.contains_key(key))
    }

    /// Lets a key be known that is read elsewhere or not at all beside another.
    pub fn knows(&mut self, key: &'static str) {
        if !self.known.contains(&key) {
            self.known.push(key);
        }
    }

    pub(super) fn value(&mut self, key: &'static str) -> Option<&'d DeValue<'d>> {
        self.knows(key);
        self.table?.get(key).map(toml::Spanned::get_ref)
    }

    pub(super) fn wrong_type(&self, key: &str, value: &DeValue<'_>, expected: &str) {
        self.fault(Fault::key(
            self.path_of(key),
            described(value),
            expected,
            match key.split_once('[') {
                Some((list, _)) => format!("write {list} as a list of such values, as in the demo scenarios"),
                None if matches!(value, DeValue::Array(_)) && self.path.is_empty() => {
                    format!("write [{key}] once, with single brackets")
                }
                None if expected == "a number" => {
                    match value.as_str().and_then(|text| text.trim().parse::<f64>().ok()) {
                        Some(number) => format!("take the quotes away: {key} = {number}"),
                        None => format!("write a number alone, without quotes and unit: {key} = ..."),
                    }
                }
                None => format!("write {key} = {}", example_of(expected)),
            },
        ));
    }

    fn missing(&self, key: &str, expected: &str, mend: &str) {
        if self.table.is_some() {
            self.fault(Fault::key(self.path_of(key), format!("no '{key}'"), expected, mend));
        }
    }

    /// A table inside this one; an empty one where it was not typed.
    pub fn section(&mut self, key: &'static str) -> Self {
        let path = self.path_of(key);
        let table = match self.value(key) {
            Some(DeValue::Table(table)) => Some(table),
            Some(other) => {
                self.wrong_type(key, other, "a table");
                None
            }
            None => None,
        };
        Self::new(self.document, self.notes, path, table)
    }

    /// The tables of a list, each under its own `[[key]]`; none where there are none.
    pub fn sections(&mut self, key: &'static str) -> Vec<Self> {
        let (list, value) = (self.path_of(key), self.value(key));
        let refuse = |path: String, found: &DeValue<'_>| {
            self.fault(Fault::key(
                path,
                described(found),
                format!("a list of tables '{key}'"),
                format!("begin each with a line [[{list}]]"),
            ));
        };
        let elements = match value {
            None => return Vec::new(),
            Some(DeValue::Array(array)) => array,
            Some(other) => {
                refuse(list.clone(), other);
                return Vec::new();
            }
        };
        let mut sections = Vec::with_capacity(elements.len());
        for (at, element) in elements.iter().enumerate() {
            let path = format!("{list}[{at}]");
            match element.get_ref() {
                DeValue::Table(table) => {
                    sections.push(Self::new(self.document, self.notes, path, Some(table)));
                }
                other => refuse(path, other),
            }
        }
        sections
    }

    /// A table that must be there.
    pub fn required_section(&mut self, key: &'static str) -> Self {
        if self.table.is_some() && !self.has(key) {
            let (found, mend) = if self.path.is_empty() {
                (format!("no [{key}]"), format!("add a line [{key}] and its keys below it"))
            } else {
                let line = match self.path.split_once('[') {
                    Some((list, _)) => format!("[[{list}]]"),
                    None => format!("[{}]", self.path),
                };
                (
                    format!("no '{key}'"),
                    format!("add {key} = {{ column = \"...\", unit = \"...\" }} in {line}"),
                )
            };
            self.fault(Fault::key(self.path_of(key), found, format!("a table '{key}'"), mend));
        }
        self.section(key)
    }

    /// A number, if one was typed; NaN and infinities are faults.
    pub fn number(&mut self, key: &'static str) -> Option<f64> {
        let value = self.value(key)?;
        let number = finite(value);
        if number.is_none() {
            self.wrong_type(key, value, "a number");
        }
        number
    }

    /// A number within a range, or its default.
    pub fn number_or(
        &mut self,
        key: &'static str,
        default: f64,
        range: RangeInclusive<f64>,
        mend: &str,
    ) -> f64 {
        if !self.has(key) {
            self.value(key);
            self.default(key, default);
            return default;
        }
        self.number_in(key, range, mend).unwrap_or(default)
    }

    /// A number within a range, if one was typed.
    pub fn number_in(&mut self, key: &'static str, range: RangeInclusive<f64>, mend: &str) -> Option<f64> {
        let number = self.number(key)?;
        if range.contains(&number) {
            return Some(number);
        }
        let expected = format!("a number from {} to {}", range.start(), range.end());
        self.fault(Fault::key(self.path_of(key), number, expected, mend));
        None
    }

    /// A number within a range that must be there.
    pub fn required_number(
        &mut self,
        key: &'static str,
        range: RangeInclusive<f64>,
        mend: &str,
    ) -> Option<f64> {
        if !self.has(key) {
            self.value(key);
            self.missing(key, "a number", mend);
            return None;
        }
        self.number_in(key, range, mend)
    }

    /// A whole number within a range, or its default.
    pub fn whole_or(&mut self, key: &'static str, default: u64, range: RangeInclusive<u64>) -> u64 {
        let Some(value) = self.value(key) else {
            self.default(key, default);
            return default;
        };
        let whole = match value {
            DeValue::Integer(integer) => u64::from_str_radix(integer.as_str(), integer.radix()).ok(),
            _ => None,
        };
        match whole.filter(|whole| range.contains(whole)) {
            Some(whole) => whole,
            None => {
                let expected = format!("a whole number from {} to {}", range.start(), range.end());
                self.fault(Fault::key(
                    self.path_of(key),
                    described(value),
                    expected,
                    format!("for example {default}"),
                ));
                default
            }
        }
    }

    /// A list of numbers, if one was typed.
    pub fn numbers(&mut self, key: &'static str) -> Option<Vec<f64>> {
        let value = self.value(key)?;
        let DeValue::Array(array) = value else {
            self.wrong_type(key, value, "a list of numbers");
            return None;
        };
        let mut numbers = Vec::with_capacity(array.len());
        for (at, element) in array.iter().enumerate() {
            match finite(element.get_ref()) {
                Some(number) => numbers.push(number),
                None => self.wrong_type(&format!("{key}[{at}]"), element.get_ref(), "a number"),
            }
        }
        (numbers.len() == array.len()).then_some(numbers)
    }

    /// A number, a list of numbers or a list of lists of numbers, if one was typed.
    pub fn nested_numbers(&mut self, key: &'static str) -> Option<Nested> {
        const EXPECTED: &str = "a number, a list of numbers, or a list of lists of numbers";
        let value = self.value(key)?;
        let list = |value: &DeValue<'_>| match value {
            DeValue::Array(array) => array.iter().map(|element| finite(element.get_ref())).collect(),
            _ => None,
        };
        let nested = match value {
            DeValue::Array(array) if array.iter().any(|element| element.get_ref().is_array()) => {
                array.iter().map(|element| list(element.get_ref())).collect::<Option<_>>().map(Nested::Lists)
            }
            DeValue::Array(_) => list(value).map(Nested::List),
            other => finite(other).map(Nested::One),
        };
        if nested.is_none() {
            self.wrong_type(key, value, EXPECTED);
        }
        nested
    }

    /// Twelve numbers, January first, if they were typed; with `or_one`, one number for all months will do.
    pub fn monthly(&mut self, key: &'static str, or_one: bool) -> Option<[f64; 12]> {
        if or_one && self.value(key).is_some_and(|value| !matches!(value, DeValue::Array(_))) {
            return self.number(key).map(|number| [number; 12]);
        }
        let numbers = self.numbers(key)?;
        let found = numbers.len();
        let twelve = <[f64; 12]>::try_from(numbers).ok();
        if twelve.is_none() {
            self.fault(Fault::key(
                self.path_of(key),
                format!("{found} numbers"),
                "twelve numbers, January first",
                "give one a month",
            ));
        }
        twelve
    }

    /// A text, if one was typed.
    pub fn text(&mut self, key: &'static str) -> Option<&'d str> {
        let value = self.value(key)?;
        let text = value.as_str();
        if text.is_none() {
            self.wrong_type(key, value, "a text in quotes");
        }
        text
    }

    /// A text that must be there and not be empty.
    pub fn required_text(&mut self, key: &'static str, expected: &str, mend: &str) -> Option<String> {
        if !self.has(key) {
            self.value(key);
            self.missing(key, expected, mend);
            return None;
        }
        let text = self.text(key)?;
        if text.trim().is_empty() {
            self.fault(Fault::key(self.path_of(key), "an empty text", expected, mend));
            return None;
        }
        Some(text.to_owned())
    }

    /// A text, or its default.
    pub fn text_or(&mut self, key: &'static str, default: &str) -> String {
        if !self.has(key) {
            self.value(key);
            self.default(key, format!("{default:?}"));
            return default.to_owned();
        }
        self.text(key).unwrap_or(default).to_owned()
    }

    /// A list of texts, if one was typed.
    pub fn texts(&mut self, key: &'static str) -> Option<Vec<String>> {
        let value = self.value(key)?;
        let texts: Option<Vec<String>> = match value {
            DeValue::Array(array) => {
                array.iter().map(|element| element.get_ref().as_str().map(str::to_owned)).collect()
            }
            _ => None,
        };
        if texts.is_none() {
            self.wrong_type(key, value, "a list of texts in quotes");
        }
        texts
    }

    /// One of several words, if one was typed.
    pub fn choice<T: Copy>(&mut self, key: &'static str, choices: &[(&'static str, T)]) -> Option<T> {
        let typed = self.text(key)?;
        if let Some((_, choice)) = choices.iter().find(|(word, _)| *word == typed) {
            return Some(*choice);
        }
        let words: Vec<String> = choices.iter().map(|(word, _)| format!("{word:?}")).collect();
        let mend = match nearest(typed, choices.iter().map(|(word, _)| *word)) {
            Some(word) => format!("did you mean {word:?}?"),
            None => "take one of these".to_owned(),
        };
        self.fault(Fault::key(self.path_of(key), format!("{typed:?}"), words.join(" or "), mend));
        None
    }

    /// One of several words that must be there.
    pub fn required_choice<T: Copy>(
        &mut self,
        key: &'static str,
        choices: &[(&'static str, T)],
    ) -> Option<T> {
        if self.has(key) {
            return self.choice(key, choices);
        }
        self.knows(key);
        let words: Vec<String> = choices.iter().map(|(word, _)| format!("{word:?}")).collect();
        let mend = format!("add {key} = {}", words.first().map_or("", String::as_str));
        self.missing(key, &words.join(" or "), &mend);
        None
    }

    /// Faults every key that was not asked for, naming the nearest that was.
    pub fn finish(self) {
        for key in self.table.into_iter().flat_map(|table| table.keys()) {
            let key = key.get_ref().as_ref();
            if self.known.contains(&key) {
                continue;
            }
            let (expected, mend) = match nearest(key, self.known.iter().copied()) {
                Some(word) => (format!("'{word}'?"), format!("write '{word}', or take the key out")),
                None => (
                    format!("one of: {}", self.known.join(", ")),
                    "take it out, or check its table".to_owned(),
                ),
            };
            self.fault(Fault {
                place: Place::Span(self.document.key_span(&self.path_of(key))),
                found: format!("'{}', which is not a key of a scenario", self.path_of(key)),
                expected,
                mend,
            });
        }
    }
}

fn finite(value: &DeValue<'_>) -> Option<f64> {
    match value {
        DeValue::Integer(integer) => {
            i64::from_str_radix(integer.as_str(), integer.radix()).ok().map(|n| n as f64)
        }
        DeValue::Float(float) => float.as_str().parse().ok(),
        _ => None,
    }
    .filter(|number: &f64| number.is_finite())
}

fn described(value: &DeValue<'_>) -> String {
    match value {
        DeValue::String(text) => format!("the text {text:?}"),
        DeValue::Integer(integer) => integer.as_str().to_owned(),
        DeValue::Float(float) => float.as_str().to_owned(),
        DeValue::Boolean(boolean) => boolean.to_string(),
        DeValue::Datetime(date) => format!("the date {date}"),
        DeValue::Array(_) => "a list".to_owned(),
        DeValue::Table(_) => "a table".to_owned(),
    }
}

/// How a value of the expected kind is typed.
fn example_of(expected: &str) -> &str {
    match expected {
        "a list of numbers" => "[0, 1, 2]",
        "a text in quotes" => "\"...\"",
        "a list of texts in quotes" => "[\"...\"]",
        "a table" => "{ ... }",
        other => other,
    }
}
