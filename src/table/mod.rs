//! Text tables with named columns, read row by row, with the place of every cell at hand for a fault.

mod date;
mod decode;
mod format;
mod header;
mod place;
mod tally;

pub use date::{DateColumn, DateReader};
pub use decode::{NoText, decode};
pub use format::{Decimal, Encoding, Format, USUAL_MISSING};
pub use tally::Tally;

use crate::fault::{Fault, Place};
use csv::{ReaderBuilder, StringRecord};
use std::ops::Range;

/// A text table whose header has been read.
pub struct Table<'a> {
    file: &'a str,
    /// The text from the header's remarks on.
    text: &'a str,
    /// Lines of the file before `text`.
    lines_before: usize,
    format: &'a Format,
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

    fn is_blank(&self) -> bool {
        self.record.iter().all(|cell| cell.trim().is_empty())
    }
}

impl<'a> Table<'a> {
    /// Reads remarks and the header of `text`. `file` names the file in faults.
    ///
    /// # Errors
    /// A file without a header line, or one that is not a table at all.
    pub fn open(file: &'a str, text: &'a str, format: &'a Format) -> Result<Self, Fault> {
        let lines_before = format.header_line.map_or(0, |line| line.saturating_sub(1));
        let start: usize = text.split_inclusive('\n').take(lines_before).map(str::len).sum();
        let text = &text[start..];
        let mut header = StringRecord::new();
        let mut reader = reader(text, format);
        match reader.read_record(&mut header) {
            Ok(true) => {}
            Ok(false) => {
                return Err(Fault {
                    place: Place::File(file.to_owned()),
                    found: "no header line".to_owned(),
                    expected: "a line of column names, then one line a row".to_owned(),
                    mend: match format.header_line {
                        Some(line) => format!("the file ends before line {line}, which header_line names"),
                        None => "check that the file was saved whole; remarks above the header must start with the \
                                 'comment' sign"
                            .to_owned(),
                    },
                });
            }
            Err(error) => return Err(unreadable(file, &error)),
        }
        let (header_line, header_text) = place::line_at(text, header.position(), format.comment);
        header.trim();
        Ok(Self {
            file,
            text,
            lines_before,
            format,
            header,
            header_line: header_line + lines_before,
            header_text,
        })
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

    /// The rows below the header that are not blank, each as it was read or the fault that kept it from being read. Blank
    /// cells beyond the header's, as a separator at the line's end makes them, are let pass.
    pub fn rows(&self) -> impl Iterator<Item = Result<Row<'a>, Fault>> + '_ {
        let mut rows = reader(self.text, self.format).into_records();
        rows.next();
        rows.map(|record| {
            let record = record.map_err(|error| unreadable(self.file, &error))?;
            let (line, text) = place::line_at(self.text, record.position(), self.format.comment);
            Ok(Row { line: line + self.lines_before, text, record })
        })
        .filter(|row| row.as_ref().map_or(true, |row| !row.is_blank()))
        .map(|row| row.and_then(|row| self.with_enough_cells(row)))
    }

    fn with_enough_cells(&self, row: Row<'a>) -> Result<Row<'a>, Fault> {
        let cells = self.header.len();
        if row.record.len() >= cells && row.record.iter().skip(cells).all(|cell| cell.trim().is_empty()) {
            return Ok(row);
        }
        let more = row.record.len() > cells;
        Err(Fault {
            place: self.place(row.line, row.text, "", 0..row.text.len()),
            found: format!("{} cells", row.record.len()),
            expected: format!("{cells} cells, as in the header"),
            mend: if more && self.format.separator == b',' {
                "if numbers have decimal commas, export the table with another separator, or with such numbers in quotes"
            } else if more {
                "check the quotes of this line"
            } else {
                "check the quotes of this line, and that the file was saved whole"
            }
            .to_owned(),
        })
    }

    /// The number in a cell, or none where it holds a mark for 'not measured'.
    ///
    /// # Errors
    /// A cell that holds neither.
    pub fn number(&self, row: &Row<'_>, column: usize) -> Result<Option<f64>, Fault> {
        let cell = row.cell(column);
        if self.format.is_missing(cell) {
            return Ok(None);
        }
        let expected = "a number or a mark for 'not measured'";
        self.format
            .number(cell)
            .map(Some)
            .ok_or_else(|| self.cell_fault(row, column, expected, self.mend_of_number(cell)))
    }

    /// The number in a cell that must hold one.
    ///
    /// # Errors
    /// A cell that does not.
    pub fn required_number(&self, row: &Row<'_>, column: usize) -> Result<f64, Fault> {
        let cell = row.cell(column);
        let mend =
            if cell.is_empty() { "fill it in, or take the line out" } else { self.mend_of_number(cell) };
        self.format.number(cell).ok_or_else(|| self.cell_fault(row, column, "a number", mend))
    }

    fn mend_of_number(&self, cell: &str) -> &'static str {
        let swapped = match self.format.decimal {
            Decimal::Point => Format { decimal: Decimal::Comma, ..Format::default() },
            Decimal::Comma => Format::default(),
        };
        let is_number = |text: &str| swapped.number(text).is_some();
        match self.format.decimal {
            _ if cell.contains('.') && cell.contains(',') => "write it without a sign between thousands",
            Decimal::Point if is_number(cell) => {
                "if that is a decimal comma, state decimal = \",\" where the scenario names the file"
            }
            Decimal::Comma if is_number(cell) => {
                "if that is a decimal point, take decimal = \",\" out where the scenario names the file"
            }
            _ => "if it is such a mark, add it to 'missing' where the scenario names the file",
        }
    }

    /// A fault in one cell.
    pub fn cell_fault(&self, row: &Row<'_>, column: usize, expected: &str, mend: &str) -> Fault {
        let bytes = place::cell_bytes(row.text, column, self.format.separator);
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

fn unreadable(file: &str, error: &csv::Error) -> Fault {
    Fault {
        place: Place::File(file.to_owned()),
        found: error.to_string(),
        expected: "a text table".to_owned(),
        mend: "export the table again as CSV, in UTF-8".to_owned(),
    }
}
