//! What is wrong with a header, and where the names that were meant may stand.

use super::{Format, Table, place, reader};
use crate::fault::Fault;
use csv::StringRecord;

/// How the fault of a column that is not there begins.
const NO_COLUMN: &str = "no column called ";
/// So many column names are listed; the rest are counted.
const MOST_NAMES: usize = 30;
/// A header that was not recognised is looked for in so many lines.
const LINES_SEARCHED: usize = 500;
/// Separators that are tried where the declared one does not part the header.
const SEPARATORS: [(u8, &str); 4] = [(b',', ","), (b';', ";"), (b'\t', "\\t"), (b'|', "|")];

impl Table<'_> {
    /// Whether values stand where the names should: a number or a date first, and so on for most of the line.
    pub(super) fn starts_with_values(&self) -> bool {
        let cells: Vec<&str> = self.header.iter().filter(|cell| !cell.is_empty()).collect();
        let is_value = |cell: &&str| {
            self.format.number(cell).is_some()
                || cell.starts_with(|first: char| first.is_ascii_digit())
                    && cell.chars().all(|sign| sign.is_ascii_digit() || "-/.:TZ ".contains(sign))
        };
        cells.len() > 1
            && cells.first().is_some_and(is_value)
            && cells.iter().filter(|cell| is_value(cell)).count() * 2 > cells.len()
    }

    pub(super) fn no_names(&self) -> Fault {
        let sign = char::from(self.format.separator);
        Fault {
            place: self.place(self.header_line, self.header_text, "", 0..self.header_text.len()),
            found: "values where the column names should stand".to_owned(),
            expected: format!("{} names", self.header.len()),
            mend: format!(
                "add a line of names above it, with '{sign}' between them, and name them where the scenario names the file; if \
                 the names stand on a line of their own, state header_line"
            ),
        }
    }

    pub(super) fn no_column(&self, name: &str) -> Fault {
        let mend = self
            .with_another_separator(name)
            .or_else(|| self.nearly(name))
            .or_else(|| self.farther_down(name))
            .unwrap_or_else(|| match self.header.len() {
                1 if self.header_text.contains(" = ") || self.header_text.starts_with('[') => {
                    "that looks like a line of a scenario: name the data file here".to_owned()
                }
                1 => "this line is taken for the header: if it is a remark, set 'comment' to the sign that remarks \
                      start with, or header_line to the header's line; if it holds all the names, set 'separator'"
                    .to_owned(),
                _ => "name one of the columns that stand there, letter for letter".to_owned(),
            });
        self.header_fault(0..self.header_text.len(), format!("{NO_COLUMN}'{name}'"), mend)
    }

    /// The fault of columns that hold the same quantity in several units.
    pub fn beside_each_other(&self, names: &[&str]) -> Fault {
        Fault {
            expected: "each quantity in one unit".to_owned(),
            ..self.header_fault(
                0..self.header_text.len(),
                format!("the columns '{}' beside each other", names.join("' and '")),
                "take all but one of them out".to_owned(),
            )
        }
    }

    pub(super) fn repeated_column(&self, name: &str, [_, second]: [usize; 2]) -> Fault {
        let bytes = place::cell_bytes(self.header_text, second, self.format.separator);
        let found = format!("more than one column called '{name}'");
        self.header_fault(bytes, found, "rename all but one of them".to_owned())
    }

    fn header_fault(&self, bytes: std::ops::Range<usize>, found: String, mend: String) -> Fault {
        let mut names: Vec<&str> = self.header.iter().take(MOST_NAMES).collect();
        let more = format!("and {} more", self.header.len().saturating_sub(MOST_NAMES));
        if self.header.len() > MOST_NAMES {
            names.push(&more);
        }
        Fault {
            place: self.place(self.header_line, self.header_text, "", bytes),
            found,
            expected: format!("one of: {}", names.join(" | ")),
            mend,
        }
    }

    fn with_another_separator(&self, name: &str) -> Option<String> {
        let others = SEPARATORS.iter().filter(|(byte, _)| *byte != self.format.separator);
        let (_, sign) = others.into_iter().find(|(byte, _)| {
            parts(self.header_text, *byte, self.format)
                .is_some_and(|names| names.iter().any(|have| have.trim() == name))
        })?;
        Some(format!(
            "the names stand apart by another sign: state separator = \"{sign}\" where the scenario names the file"
        ))
    }

    /// A column whose name differs in capitals or blanks alone.
    fn nearly(&self, name: &str) -> Option<String> {
        let plain = |name: &str| name.split_whitespace().collect::<String>().to_lowercase();
        let near = self.header.iter().find(|have| plain(have) == plain(name))?;
        Some(format!("did you mean '{near}'? Names are compared letter for letter"))
    }

    fn farther_down(&self, name: &str) -> Option<String> {
        let mut lines = self.text.lines().enumerate().take(LINES_SEARCHED);
        let (line, _) = lines.find(|(_, line)| {
            parts(line, self.format.separator, self.format)
                .is_some_and(|names| names.len() > 1 && names.iter().any(|have| have.trim() == name))
        })?;
        let line = line + 1 + self.lines_before;
        Some(format!(
            "that name stands on line {line}: state header_line = {line} where the scenario names the file, or the sign that \
             the remarks above it start with as comment"
        ))
    }
}

/// A line's cells under a separator.
fn parts(line: &str, separator: u8, format: &Format) -> Option<StringRecord> {
    let format = Format { separator, ..format.clone() };
    reader(line, &format).into_records().next()?.ok()
}

/// Joins faults of one place with one mend, as the columns of a header that is not read as it was meant leave them.
pub fn joined(faults: Vec<Fault>) -> Vec<Fault> {
    let mut joined: Vec<Fault> = Vec::new();
    for fault in faults {
        let like = joined.iter_mut().find(|have| have.place == fault.place && have.mend == fault.mend);
        match like {
            Some(have) => {
                have.found += ", ";
                have.found += fault.found.strip_prefix(NO_COLUMN).unwrap_or(&fault.found);
            }
            None => joined.push(fault),
        }
    }
    joined
}
