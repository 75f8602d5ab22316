//! What is wrong with something a user gave: where, what was found, what was expected, how to mend it.
//!
//! Every room that reads or checks input returns *all* its faults. A room that checks a setting knows the setting's
//! key; the scenario reader adds the file, line and column where the user typed it.

use std::fmt;

/// Where a fault lies.
#[derive(Debug, Clone, PartialEq, Eq)]
pub enum Place {
    /// A scenario key, dotted from the top of the file: `snow.melt_base_c`. An element of a list ends in `[2]`.
    Key(String),
    /// A span of bytes in the scenario's own text.
    Span(std::ops::Range<usize>),
    /// A cell, or a whole line where `column` is empty, of a data file.
    Cell {
        /// The file as the scenario names it.
        file: String,
        /// Line, counted from 1, remarks included.
        line: usize,
        /// The column's header, or empty.
        column: String,
        /// The line as it stands in the file.
        text: String,
        /// Bytes of the cell within `text`.
        bytes: std::ops::Range<usize>,
    },
    /// A whole data file.
    File(String),
}

/// One fault in what a user gave.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Fault {
    /// Where it lies.
    pub place: Place,
    /// What stands there.
    pub found: String,
    /// What should stand there.
    pub expected: String,
    /// What to do about it.
    pub mend: String,
}

impl Fault {
    /// A fault in the value of a scenario key.
    pub fn key(
        key: impl Into<String>,
        found: impl fmt::Display,
        expected: impl Into<String>,
        mend: impl Into<String>,
    ) -> Self {
        Self {
            place: Place::Key(key.into()),
            found: found.to_string(),
            expected: expected.into(),
            mend: mend.into(),
        }
    }
}

/// Something allowed but worth a second look; it is said and never stops a run.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Unlikely {
    /// The scenario key or the part of the record it is about.
    pub about: String,
    /// What is unlikely, and against which published or physical range.
    pub why: String,
}

impl Unlikely {
    /// Names what the notice is about and why it was raised.
    pub fn new(about: impl Into<String>, why: impl Into<String>) -> Self {
        Self { about: about.into(), why: why.into() }
    }
}

/// Checks one number of a scenario against the range in which the method is defined.
///
/// The test is written positively, so NaN and infinities fail it.
pub fn within(
    faults: &mut Vec<Fault>,
    key: &str,
    value: f64,
    range: std::ops::RangeInclusive<f64>,
    unit: &str,
    mend: &str,
) {
    if !range.contains(&value) {
        let unit = if unit.is_empty() { String::new() } else { format!(" {unit}") };
        faults.push(Fault::key(
            key,
            value,
            format!("a number from {} to {}{unit}", range.start(), range.end()),
            mend,
        ));
    }
}
