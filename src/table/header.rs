//! What is wrong with a header, and where the names that were meant may stand.

use super::{Format, Table, place, reader};
use crate::fault::Fault;
use csv::StringRecord;

/// So many column names are listed; the rest are counted.
const MOST_NAMES: usize = 30;
/// A header that was not recognised is looked for in so many lines.
const LINES_SEARCHED: usize = 500;
/// Separators that are tried where the declared one does not part the header.
const SEPARATORS: [(u8, &str); 4] = [(b',', ","), (b';', ";"), (b'\t', "\\t"), (b'|', "|")];

impl Table<'_> {
    pub(super) fn no_column(&self, name: &str) -> Fault {
        let mend = self
            .with_another_separator(name)
            .or_else(|| self.nearly(name))
            .or_else(|| self.farther_down(name))
            .unwrap_or_else(|| match self.header.len() {
                1 => "this line is taken for the header: if it is a remark, set 'comment' to the sign that remarks \
                      start with, or header_line to the header's line; if it holds all the names, set 'separator'"
                    .to_owned(),
                _ => "name one of the columns that stand there, letter for letter".to_owned(),
            });
        self.header_fault(0..self.header_text.len(), format!("no column called '{name}'"), mend)
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
