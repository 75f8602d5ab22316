//! Text tables with named columns, read row by row, with the place of every cell at hand for a fault.

use crate::fault::{Fault, Place};
use csv::{ReaderBuilder, StringRecord};
use std::collections::BTreeMap;

/// How many faults of one column are shown whole; the rest are counted.
const SHOWN_PER_COLUMN: usize = 3;

/// How a text table is written.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Format {
    /// Between cells.
    pub separator: u8,
    /// Lines that start with it are remarks.
    pub comment: Option<u8>,
}

impl Default for Format {
    fn default() -> Self {
        Self { separator: b',', comment: Some(b'#') }
    }
}

/// A text table whose header has been read.
pub struct Table<'a> {
    file: &'a str,
    text: &'a str,
    format: Format,
    header: StringRecord,
    header_line: usize,
    header_text: &'a str,
}

/// One row of a table.
pub struct Row<'a> {
    /// Line in the file, from 1.
    pub line: usize,
    text: &'a str,
    record: StringRecord,
}

impl Row<'_> {
    /// The cell of a column, trimmed of blanks.
    pub fn cell(&self, column: usize) -> &str {
        self.record.get(column).unwrap_or("").trim()
    }
}

impl<'a> Table<'a> {
    /// Reads remarks and the header of `text`. `file` names the file in faults.
    ///
    /// # Errors
    /// A file without a header line, or one that is not a table at all.
    pub fn open(file: &'a str, text: &'a str, format: Format) -> Result<Self, Fault> {
        let text = text.strip_prefix('\u{feff}').unwrap_or(text);
        let mut header = StringRecord::new();
        let mut reader = reader(text, format);
        match reader.read_record(&mut header) {
            Ok(true) => {}
            Ok(false) => {
                return Err(Fault {
                    place: Place::File(file.to_owned()),
                    found: "no header line".to_owned(),
                    expected: "a line of column names, then one line a row".to_owned(),
                    mend:
                        "check that the file was saved whole; remarks above the header must start with the \
                           'comment' sign"
                            .to_owned(),
                });
            }
            Err(error) => return Err(unreadable(file, &error)),
        }
        let (header_line, header_text) = line_at(text, header.position(), format.comment);
        header.trim();
        Ok(Self { file, text, format, header, header_line, header_text })
    }

    /// The column of a name.
    ///
    /// # Errors
    /// Names the columns that there are, when there is none of this name or more than one.
    pub fn column(&self, name: &str) -> Result<usize, Fault> {
        let mut places = self.header.iter().enumerate().filter(|(_, have)| *have == name).map(|(i, _)| i);
        match (places.next(), places.next()) {
            (Some(column), None) => Ok(column),
            (Some(_), Some(_)) => Err(self
                .header_fault(format!("more than one column called '{name}'"), "rename all but one of them")),
            (None, _) => Err(self.header_fault(
                format!("no column called '{name}'"),
                "name one of the columns that stand there, letter for letter",
            )),
        }
    }

    /// Whether there is a column of this name.
    pub fn has(&self, name: &str) -> bool {
        self.header.iter().any(|have| have == name)
    }

    /// The rows below the header, each as it was read or the fault that kept it from being read.
    pub fn rows(&self) -> impl Iterator<Item = Result<Row<'a>, Fault>> + '_ {
        let mut rows = reader(self.text, self.format).into_records();
        let cells = self.header.len();
        rows.next();
        rows.map(move |record| {
            let record = record.map_err(|error| unreadable(self.file, &error))?;
            let (line, text) = line_at(self.text, record.position(), self.format.comment);
            let row = Row { line, text, record };
            if row.record.len() == cells {
                return Ok(row);
            }
            Err(Fault {
                place: Place::Cell {
                    file: self.file.to_owned(),
                    line,
                    column: String::new(),
                    text: text.to_owned(),
                    bytes: 0..text.len(),
                },
                found: format!("{} cells", row.record.len()),
                expected: format!("{cells} cells, as in the header"),
                mend: "check the separator and quotes of this line".to_owned(),
            })
        })
    }

    /// A fault in one cell.
    pub fn cell_fault(&self, row: &Row<'_>, column: usize, expected: &str, mend: &str) -> Fault {
        Fault {
            place: Place::Cell {
                file: self.file.to_owned(),
                line: row.line,
                column: self.header.get(column).unwrap_or("").to_owned(),
                text: row.text.to_owned(),
                bytes: cell_bytes(row.text, column, self.format.separator),
            },
            found: format!("'{}'", row.cell(column)),
            expected: expected.to_owned(),
            mend: mend.to_owned(),
        }
    }

    /// A fault of the file as a whole.
    pub fn file_fault(&self, found: impl Into<String>, expected: &str, mend: &str) -> Fault {
        Fault {
            place: Place::File(self.file.to_owned()),
            found: found.into(),
            expected: expected.to_owned(),
            mend: mend.to_owned(),
        }
    }

    fn header_fault(&self, found: String, mend: &str) -> Fault {
        Fault {
            place: Place::Cell {
                file: self.file.to_owned(),
                line: self.header_line,
                column: String::new(),
                text: self.header_text.to_owned(),
                bytes: 0..self.header_text.len(),
            },
            found,
            expected: format!("one of: {}", self.header.iter().collect::<Vec<_>>().join(" | ")),
            mend: if self.header.len() == 1 {
                "this line is taken for the header: if it is a remark, set 'comment' to the sign that remarks start \
                 with; if it holds all the names, set 'separator'"
                    .to_owned()
            } else {
                mend.to_owned()
            },
        }
    }
}

/// Faults of a data file: the first few of each column whole, the others counted.
#[derive(Default)]
pub struct Tally {
    faults: Vec<Fault>,
    by_column: BTreeMap<String, (usize, usize)>,
}

impl Tally {
    /// Adds a fault.
    pub fn push(&mut self, fault: Fault) {
        let column = match &fault.place {
            Place::Cell { column, .. } => column.clone(),
            _ => String::new(),
        };
        let (count, last) = self.by_column.entry(column).or_default();
        *count += 1;
        if *count <= SHOWN_PER_COLUMN {
            *last = self.faults.len();
            self.faults.push(fault);
        }
    }

    /// What was read, or nothing where a fault took its place.
    pub fn keep<T>(&mut self, read: Result<T, Fault>) -> Option<T> {
        read.map_err(|fault| self.push(fault)).ok()
    }

    /// Whether nothing has been added.
    pub fn is_empty(&self) -> bool {
        self.faults.is_empty()
    }

    /// All faults, with a word on those that were only counted.
    pub fn into_faults(mut self) -> Vec<Fault> {
        for (count, last) in self.by_column.into_values() {
            if count > SHOWN_PER_COLUMN {
                let more = count - SHOWN_PER_COLUMN;
                self.faults[last].found += &format!(" (and {more} more faults in this column)");
            }
        }
        self.faults
    }
}

fn reader(text: &str, format: Format) -> csv::Reader<&[u8]> {
    ReaderBuilder::new()
        .has_headers(false)
        .flexible(true)
        .delimiter(format.separator)
        .comment(format.comment)
        .from_reader(text.as_bytes())
}

fn unreadable(file: &str, error: &csv::Error) -> Fault {
    Fault {
        place: Place::File(file.to_owned()),
        found: error.to_string(),
        expected: "a text table".to_owned(),
        mend: "export the table again as CSV, in UTF-8".to_owned(),
    }
}

/// Line number and text of the record at `position`. The position may stand on the remarks before the record.
fn line_at<'a>(text: &'a str, position: Option<&csv::Position>, comment: Option<u8>) -> (usize, &'a str) {
    let Some(position) = position else { return (0, "") };
    let mut line = usize::try_from(position.line()).unwrap_or(0);
    let start = usize::try_from(position.byte()).unwrap_or(0);
    for candidate in text.get(start..).unwrap_or("").lines() {
        let is_remark = comment.is_some() && candidate.bytes().next() == comment;
        if !candidate.is_empty() && !is_remark {
            return (line, candidate);
        }
        line += 1;
    }
    (line, "")
}

/// Bytes of the cell number `column` in a line, quotes minded.
fn cell_bytes(line: &str, column: usize, separator: u8) -> std::ops::Range<usize> {
    let (mut start, mut seen, mut quoted) = (0, 0, false);
    for (at, byte) in line.bytes().enumerate() {
        if byte == b'"' {
            quoted = !quoted;
        } else if byte == separator && !quoted {
            if seen == column {
                return start..at;
            }
            seen += 1;
            start = at + 1;
        }
    }
    if seen == column { start..line.len() } else { 0..line.len() }
}
