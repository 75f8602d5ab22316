//! The scenario's text, parsed, with the place of every key and value.

use crate::fault::{Fault, Place};
use std::collections::HashMap;
use std::ops::Range;
use toml::de::{DeTable, DeValue};

/// More faults of a text as TOML are only counted: it is no scenario that somebody could mend fault by fault.
const MOST_SYNTAX_FAULTS: usize = 40;

/// Where a key and its value stand, in bytes.
#[derive(Debug, Clone)]
struct KeyPlace {
    key: Range<usize>,
    value: Range<usize>,
}

/// A parsed scenario.
#[derive(Debug)]
pub struct Document<'t> {
    table: DeTable<'t>,
    places: HashMap<String, KeyPlace>,
    syntax_faults: Vec<Fault>,
    /// First byte of every line.
    line_starts: Vec<usize>,
}

impl<'t> Document<'t> {
    /// Parses a scenario's text as TOML. Syntax faults are kept beside what could be read.
    pub fn parse(text: &'t str) -> Self {
        let (table, errors) = DeTable::parse_recoverable(text);
        let table = table.into_inner();
        let faults = errors.iter().map(|error| Fault {
            place: Place::Span(error.span().unwrap_or(0..0)),
            found: error.message().to_owned(),
            expected: "TOML: key = value, one a line, under [table] lines".to_owned(),
            mend: "quote texts, write lists in [ ], and name each key once".to_owned(),
        });
        let mut places = HashMap::new();
        note_places("", &table, &mut places);
        let lists = places
            .values()
            .map(|place| place.value.clone())
            .filter(|value| text[value.clone()].starts_with('['));
        let syntax_faults = match (text.contains('='), faults.collect::<Vec<_>>()) {
            (false, faults) if !faults.is_empty() => vec![no_scenario(&faults[0])],
            (_, faults) => at_most(MOST_SYNTAX_FAULTS, without_echoes(faults, &lists.collect::<Vec<_>>())),
        };
        let line_starts = std::iter::once(0).chain(text.match_indices('\n').map(|(at, _)| at + 1)).collect();
        Self { table, places, syntax_faults, line_starts }
    }

    /// Adds the faults of the text as TOML. Where there are any, of the others only those are kept that lie wholly before
    /// the first of them: what stands after it may have been read as something else than was meant.
    pub(super) fn keep_what_is_certain(&self, faults: &mut Vec<Fault>) {
        let starts = self.syntax_faults.iter().filter_map(|fault| match &fault.place {
            Place::Span(bytes) => Some(bytes.start),
            _ => None,
        });
        if let Some(first) = starts.min() {
            faults.retain(|fault| match &fault.place {
                Place::Key(key) => self.places.get(key).is_some_and(|place| place.value.end <= first),
                Place::Span(bytes) => bytes.end <= first,
                _ => false,
            });
        }
        faults.extend(self.syntax_faults.iter().cloned());
    }

    /// Bytes of a key's value; of the nearest table above where the key was not typed; nothing where neither was.
    pub fn value_span(&self, key: &str) -> Option<Range<usize>> {
        let mut path = key;
        loop {
            if let Some(place) = self.places.get(path) {
                return Some(if path == key { place.value.clone() } else { place.key.clone() });
            }
            path = &path[..path.rfind(['.', '['])?];
        }
    }

    /// Whether a key was typed.
    pub(super) fn has(&self, key: &str) -> bool {
        self.places.contains_key(key)
    }

    /// The line, from 1, on which a byte stands, and the line's first byte.
    pub(super) fn line_at(&self, byte: usize) -> (usize, usize) {
        let line = self.line_starts.partition_point(|start| *start <= byte);
        (line, self.line_starts.get(line.saturating_sub(1)).copied().unwrap_or(0))
    }

    pub(super) fn key_span(&self, key: &str) -> Range<usize> {
        self.places.get(key).map_or(0..0, |place| place.key.clone())
    }

    pub(super) fn table(&self) -> &DeTable<'t> {
        &self.table
    }
}

/// The first of very many faults; the rest are counted.
fn at_most(most: usize, mut faults: Vec<Fault>) -> Vec<Fault> {
    let more = faults.len().saturating_sub(most);
    faults.truncate(most);
    if let Some(last) = faults.last_mut().filter(|_| more > 0) {
        last.found += &format!(" (and {more} more faults below)");
    }
    faults
}

/// The fault of a text without a single key.
fn no_scenario(first: &Fault) -> Fault {
    Fault {
        place: first.place.clone(),
        found: "no line of this file is key = value, so it is no scenario".to_owned(),
        expected: "a scenario in TOML: key = value, one a line, under [table] lines".to_owned(),
        mend: "name a scenario here; a data file is named within one, by weather.file or basin.bands"
            .to_owned(),
    }
}

/// A list that is never closed makes a fault of every word down to the end of the text. Of those only the first is kept,
/// where the list ought to have ended.
fn without_echoes(mut faults: Vec<Fault>, lists: &[Range<usize>]) -> Vec<Fault> {
    let start_of = |fault: &Fault| match &fault.place {
        Place::Span(bytes) => bytes.start,
        _ => 0,
    };
    let is_unclosed = |fault: &Fault| fault.found.starts_with("unclosed array");
    let is_echo = |fault: &Fault| {
        ["missing comma between array", "string values must be quoted", "unexpected `=` in array"]
            .iter()
            .any(|start| fault.found.starts_with(start))
    };
    faults.sort_by_key(start_of);
    if let Some(unclosed) = faults.iter().rfind(|fault| is_unclosed(fault)).map(start_of) {
        let list = lists.iter().filter(|list| list.end >= unclosed).map(|list| list.start).min().unwrap_or(0);
        let echoes = faults
            .iter()
            .rev()
            .take_while(|fault| start_of(fault) > list && (is_echo(fault) || is_unclosed(fault)))
            .count();
        let first = faults.len() - echoes;
        faults.truncate(first + 1);
        if let Some(kept) = faults.get_mut(first) {
            kept.found = "a list that is not closed before this".to_owned();
            kept.mend = "end the list above with ]".to_owned();
        }
    }
    faults
}

fn note_places(path: &str, table: &DeTable<'_>, places: &mut HashMap<String, KeyPlace>) {
    for (key, value) in table {
        let path =
            if path.is_empty() { key.get_ref().to_string() } else { format!("{path}.{}", key.get_ref()) };
        places.insert(path.clone(), KeyPlace { key: key.span(), value: value.span() });
        note_inside(&path, value.get_ref(), places);
    }
}

fn note_inside(path: &str, value: &DeValue<'_>, places: &mut HashMap<String, KeyPlace>) {
    match value {
        DeValue::Table(table) => note_places(path, table, places),
        DeValue::Array(array) => {
            for (number, element) in array.iter().enumerate() {
                let path = format!("{path}[{number}]");
                let place = KeyPlace { key: element.span(), value: element.span() };
                places.insert(path.clone(), place);
                note_inside(&path, element.get_ref(), places);
            }
        }
        _ => {}
    }
}
