//! One table of a scenario: typed values, with every fault and every default noted.

use super::document::Document;
use super::nearest::nearest;
use super::notes::Notes;
use crate::defaults::DefaultInForce;
use crate::fault::{Fault, Place, Unlikely};
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
        self.default_with(key, value, None);
    }

    /// The same of a default that something else in the scenario brings.
    pub fn default_with(&self, key: &str, value: impl std::fmt::Display, with: Option<&'static str>) {
        let default = DefaultInForce { key: self.path_of(key), value: value.to_string(), with };
        self.notes.defaults.borrow_mut().push(default);
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

    /// Whether the key was typed and holds a list.
    pub fn is_list(&self, key: &str) -> bool {
        let value = self.table.and_then(|table| table.get(key)).map(toml::Spanned::get_ref);
        matches!(value, Some(DeValue::Array(_)))
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

    /// A yes or no, if one was typed.
    pub fn flag(&mut self, key: &'static str) -> Option<bool> {
        match self.value(key)? {
            DeValue::Boolean(flag) => Some(*flag),
            other => {
                self.wrong_type(key, other, "true or false");
                None
            }
        }
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

    pub(super) fn missing(&self, key: &str, expected: &str, mend: &str) {
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

    /// Faults every key that was not asked for, naming the nearest that was.
    pub fn finish(self) {
        self.finish_knowing(|_| None);
    }

    /// The same of a table inside `around`, all of whose keys have been asked for: a key that belongs there was typed below
    /// the line that opens this table.
    pub fn finish_inside(self, around: &Self) {
        let (line, path) = (around.path.clone(), self.path.clone());
        self.finish_knowing(|key| {
            around.known.contains(&key).then(|| {
                let expected = format!("'{key}' in [{line}]");
                (expected, format!("write it above the line [{path}], among the keys of [{line}]"))
            })
        });
    }

    /// Faults every key that was not asked for; `belongs` says what is expected and how to mend it where a key belongs
    /// elsewhere.
    fn finish_knowing(self, belongs: impl Fn(&str) -> Option<(String, String)>) {
        for key in self.table.into_iter().flat_map(|table| table.keys()) {
            let key = key.get_ref().as_ref();
            if self.known.contains(&key) {
                continue;
            }
            let near = || {
                let word = nearest(key, self.known.iter().copied())?;
                Some((format!("'{word}'?"), format!("write '{word}', or take the key out")))
            };
            let (expected, mend) = belongs(key).or_else(near).unwrap_or_else(|| {
                let expected = match self.known.as_slice() {
                    [] => format!("no key: [{}] has none", self.path),
                    known => format!("one of: {}", known.join(", ")),
                };
                (expected, "take it out, or check its table".to_owned())
            });
            self.fault(Fault {
                place: Place::Span(self.document.key_span(&self.path_of(key))),
                found: format!("'{}', which is not a key of a scenario", self.path_of(key)),
                expected,
                mend,
            });
        }
    }
}

pub(super) fn described(value: &DeValue<'_>) -> String {
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
