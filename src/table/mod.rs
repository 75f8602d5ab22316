//! Text tables with named columns, read row by row, with the place of every cell at hand for a fault.

mod date;
mod decode;
mod format;
mod header;
mod number;
mod place;
mod runaway;
mod tally;

pub use date::{DateColumn, DateReader};
pub use decode::{NoText, decode};
pub use format::{Decimal, Encoding, Format, USUAL_MISSING};
pub use header::joined;
pub use tally::Tally;

use crate::fault::{Fault, Place};
use csv::{ReaderBuilder, StringRecord};
use runaway::LONGEST_RECORD;
use std::ops::Range;

/// How to mend a cell that holds line breaks and no value.
const RUNNING_ON: &str = "a quote opens here and closes lines below, if at all: close it, or take it out";

/// A text table whose header has been read.
pub struct Table<'a> {
    file: &'a str,
    /// The text from the header's remarks on.
    text: &'a str,
    /// Lines of the file before `text`.
    lines_before: usize,
    format: &'a Format,
    header: StringRecord,
    /// The header and the blank records above it.
    records_above_rows: usize,
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
    /// A file without a header line or with values in its place, one that is not a table at all, or one with a quote that is
    /// never closed.
    pub fn open(file: &'a str, text: &'a str, format: &'a Format) -> Result<Self, Fault> {
        let lines_before = format.header_line.map_or(0, |line| line.saturating_sub(1));
        let start: usize = text.split_inclusive('\n').take(lines_before).map(str::len).sum();
        let text = &text[start..];
        if let Some(line) = runaway::overlong_record(text, format) {
            return Err(overlong(file, line + lines_before));
        }
        let mut header = StringRecord::new();
        let mut reader = reader(text, format);
        let mut records_above_rows = 0;
        while is_blank(&header) {
            records_above_rows += 1;
            match reader.read_record(&mut header) {
                Ok(true) => {}
                Ok(false) => return Err(no_header(file, format)),
                Err(error) => return Err(unreadable(file, &error)),
            }
        }
        let (header_line, header_text) = place::line_at(text, header.position(), format.comment);
        header.trim();
        let table = Self {
            file,
            text,
            lines_before,
            format,
            header,
            records_above_rows,
            header_line: header_line + lines_before,
            header_text,
        };
        if table.starts_with_values() { Err(table.no_names()) } else { Ok(table) }
    }

    /// The column of a name.
    ///
    /// # Errors
    /// Names the columns that there are, when there is none of this name or more than one.
    pub fn column(&self, name: &str) -> Result<usize, Fault> {
        let mut places = self.header.iter().enumerate().filter(|(_, have)| *have == name).map(|(i, _)| i);
        match (places.next(), places.next()) {
            (Some(column), None) => Ok(column),
            (Some(first), Some(second)) => Err(self.repeated_column(name, [first, second])),
            (None, _) => Err(self.no_column(name)),
        }
    }

    /// Whether there is a column of this name.
    pub fn has(&self, name: &str) -> bool {
        self.header.iter().any(|have| have == name)
    }

    /// The columns' names, in order.
    pub fn names(&self) -> impl Iterator<Item = &str> {
        self.header.iter()
    }

    /// The name of the only column whose name holds a word, capitals or not.
    pub fn the_only_column_with(&self, word: &str) -> Option<&str> {
        let mut with = self.header.iter().filter(|name| name.to_lowercase().contains(word));
        with.next().filter(|_| with.next().is_none())
    }

    /// The rows below the header that are not blank, each as it was read or the fault that kept it from being read. Blank
    /// cells beyond the header's, as a separator at the line's end makes them, are let pass.
    pub fn rows(&self) -> impl Iterator<Item = Result<Row<'a>, Fault>> + '_ {
        let mut reader = reader(self.text, self.format);
        let mut records_to_skip = self.records_above_rows;
        let mut record = StringRecord::new();
        std::iter::from_fn(move || {
            loop {
                match reader.read_record(&mut record) {
                    Ok(false) => return None,
                    Err(error) => return Some(Err(unreadable(self.file, &error))),
                    Ok(true) if records_to_skip > 0 => records_to_skip -= 1,
                    Ok(true) if is_blank(&record) => {}
                    Ok(true) => {
                        let (line, text) = place::line_at(self.text, record.position(), self.format.comment);
                        return Some(Ok(Row {
                            line: line + self.lines_before,
                            text,
                            record: record.clone(),
                        }));
                    }
                }
            }
        })
        .map(|row| row.and_then(|row| self.with_enough_cells(row)))
    }

    fn with_enough_cells(&self, row: Row<'a>) -> Result<Row<'a>, Fault> {
        let cells = self.header.len();
        if row.record.len() >= cells && row.record.iter().skip(cells).all(|cell| cell.trim().is_empty()) {
            return Ok(row);
        }
        let found = row.record.len();
        let mend = if row.record.iter().any(|cell| cell.contains('\n')) {
            RUNNING_ON
        } else if found > cells && self.format.separator == b',' {
            "if numbers have decimal commas, export the table with another separator, or with such numbers in quotes; else \
             take out what is too many"
        } else if found > cells {
            "take out what is too many, and check the quotes of this line"
        } else {
            "check the quotes of this line, and that the file was saved whole"
        };
        Err(Fault {
            place: self.place(row.line, row.text, "", 0..row.text.len()),
            found: if found == 1 { "1 cell".to_owned() } else { format!("{found} cells") },
            expected: format!("{cells} cells, as in the header"),
            mend: mend.to_owned(),
        })
    }

    /// A fault in one cell.
    pub fn cell_fault(&self, row: &Row<'_>, column: usize, expected: &str, mend: &str) -> Fault {
        let bytes = place::cell_bytes(row.text, column, self.format.separator);
        let mend = if row.cell(column).contains('\n') { RUNNING_ON } else { mend };
        Fault {
            place: self.place(row.line, row.text, self.header.get(column).unwrap_or(""), bytes),
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

    fn place(&self, line: usize, text: &str, column: &str, bytes: Range<usize>) -> Place {
        let (text, bytes) = place::around(text, bytes);
        Place::Cell { file: self.file.to_owned(), line, column: column.to_owned(), text, bytes }
    }
}

fn reader<'t>(text: &'t str, format: &Format) -> csv::Reader<&'t [u8]> {
    ReaderBuilder::new()
        .has_headers(false)
        .flexible(true)
        .delimiter(format.separator)
        .comment(format.comment)
        .from_reader(text.as_bytes())
}

fn is_blank(record: &StringRecord) -> bool {
    record.iter().all(|cell| cell.trim().is_empty())
}

fn no_header(file: &str, format: &Format) -> Fault {
    Fault {
        place: Place::File(file.to_owned()),
        found: "no header line".to_owned(),
        expected: "a line of column names, then one line a row".to_owned(),
        mend: match format.header_line {
            Some(line) => format!("the file ends before line {line}, which header_line names"),
            None => "check that the file was saved whole; remarks above the header must start with the 'comment' sign"
                .to_owned(),
        },
    }
}

fn overlong(file: &str, line: usize) -> Fault {
    Fault {
        place: Place::File(file.to_owned()),
        found: format!(
            "a quote on line {line} opens a cell that does not end within {} KiB",
            LONGEST_RECORD >> 10
        ),
        expected: "rows of a line each, or of a few where cells hold line breaks".to_owned(),
        mend: format!("close the quote on line {line}, or take it out"),
    }
}

fn unreadable(file: &str, error: &csv::Error) -> Fault {
    Fault {
        place: Place::File(file.to_owned()),
        found: error.to_string(),
        expected: "a text table".to_owned(),
        mend: "export the table again as CSV, in UTF-8".to_owned(),
    }
}
