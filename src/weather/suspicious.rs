//! Values that are hardly weather: how many there are, where the first stands, and what may be done about them.

use crate::calendar::date_of;
use chrono::NaiveDate;
use serde::Serialize;
use std::fmt;

/// A kind of value that is hardly weather: how many there are, and where the first stands.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Suspicion {
    /// The scenario key of the column.
    pub about: &'static str,
    /// What is suspicious, from its noun in the plural on.
    pub what: String,
    /// How many values or days.
    pub count: usize,
    /// Whether they were taken as missing.
    pub is_taken_as_missing: bool,
    /// Whether a setting asked for that; then it needs no second look.
    pub is_as_asked: bool,
    /// The first.
    pub first: FirstPlace,
    /// What may be done about it; empty where nothing need be.
    pub mend: String,
}

/// Where the first of many values stands.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct FirstPlace {
    /// Its day.
    pub date: NaiveDate,
    /// Its line in the file; none where the day has no line.
    pub line: Option<usize>,
    /// The value, with its unit.
    pub value: String,
}

impl fmt::Display for Suspicion {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self.what.split_once(' ') {
            Some((many, rest)) if self.count == 1 => write!(f, "1 {} {rest}", many.trim_end_matches('s'))?,
            _ => write!(f, "{} {}", self.count, self.what)?,
        }
        if self.is_taken_as_missing {
            f.write_str(", taken as missing")?;
        }
        write!(f, "; the first on {}", self.first.date)?;
        if let Some(line) = self.first.line {
            write!(f, " (line {line})")?;
        }
        if !self.first.value.is_empty() {
            write!(f, ": {}", self.first.value)?;
        }
        if !self.mend.is_empty() {
            write!(f, ". {}", self.mend)?;
        }
        Ok(())
    }
}

/// Collects what is suspicious about one record.
pub(super) struct Finder {
    pub first_day: NaiveDate,
    /// Line of the file that each day stands on; 0 where it has none.
    pub line: Vec<usize>,
    pub found: Vec<Suspicion>,
}

impl Finder {
    /// Notes the days for which `value` gives the value in words, if there are any.
    pub fn note(
        &mut self,
        about: &'static str,
        what: impl Into<String>,
        mend: impl Into<String>,
        value: impl Fn(usize) -> Option<String>,
    ) {
        let mut days = (0..self.line.len()).filter_map(|day| value(day).map(|value| (day, value)));
        if let Some((first, value)) = days.next() {
            let line = self.line.get(first).copied().filter(|line| *line > 0);
            self.found.push(Suspicion {
                about,
                what: what.into(),
                count: 1 + days.count(),
                is_taken_as_missing: false,
                is_as_asked: false,
                first: FirstPlace { date: date_of(self.first_day, first + 1), line, value },
                mend: mend.into(),
            });
        }
    }

    /// Notes the values of a column for which `is` holds and takes them as missing; gives their number.
    pub fn drop(
        &mut self,
        about: &'static str,
        what: impl Into<String>,
        column: &mut [Option<f64>],
        unit: &str,
        is: impl Fn(usize, f64) -> bool,
    ) -> usize {
        let known = self.found.len();
        self.note(about, what, "", |day| {
            column[day].filter(|value| is(day, *value)).map(|value| said(value, unit))
        });
        for (day, value) in column.iter_mut().enumerate() {
            *value = value.filter(|value| !is(day, *value));
        }
        self.found.get_mut(known).map_or(0, |new| {
            new.is_taken_as_missing = true;
            new.count
        })
    }
}

impl Suspicion {
    /// Marks the newest of what was found as asked for by a setting, if `count` says that there is one.
    pub(super) fn as_asked(finder: &mut Finder, count: usize) -> usize {
        if let Some(newest) = finder.found.last_mut().filter(|_| count > 0) {
            newest.is_as_asked = true;
        }
        count
    }
}

/// A value with its unit.
pub(super) fn said(value: f64, unit: &str) -> String {
    if value.abs() < 1e6 { format!("{:.1} {unit}", value + 0.0) } else { format!("{value:e} {unit}") }
}
