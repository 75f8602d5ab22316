//! Dates of a table's rows: in one column or in several, in a stated form; and a way out where they do not read.

use super::{Row, Table, Tally};
use crate::fault::{Fault, Place};
use chrono::NaiveDate;
use chrono::format::ParseErrorKind;
use serde::Serialize;

/// Forms of dates that are tried where the stated one does not fit, to suggest one that does.
const USUAL_FORMS: [&str; 10] = [
    "%Y-%m-%d",
    "%m/%d/%Y",
    "%d/%m/%Y",
    "%d.%m.%Y",
    "%d-%m-%Y",
    "%Y/%m/%d",
    "%Y%m%d",
    "%Y-%m-%d %H:%M",
    "%Y-%m-%dT%H:%M:%S",
    "%d-%b-%Y",
];

/// So many dates that read well for each that does not are no mixture.
const FEW_FAILED: usize = 20;

/// What is expected where a date is written as it should be and no such day exists.
const IN_THE_CALENDAR: &str = "a day that the calendar has";

/// Which columns hold a row's date, and how it is written.
#[derive(Debug, Clone, PartialEq, Eq, Serialize)]
pub struct DateColumn {
    /// The columns' names; the cells of several are joined by a blank.
    pub columns: Vec<String>,
    /// The date's form, in the signs of `strftime`.
    pub format: String,
}

/// Reads the dates of a table.
pub struct DateReader<'c> {
    form: &'c str,
    at: Vec<usize>,
    read_well: usize,
    failed: usize,
    /// Lines whose date has the stated form, or seems to, and is no day; no usual form reads them.
    impossible: Vec<usize>,
}

impl<'c> DateReader<'c> {
    /// Finds the date's columns.
    ///
    /// # Errors
    /// Those that are not there.
    pub fn new(table: &Table<'_>, date: &'c DateColumn) -> Result<Self, Vec<Fault>> {
        let found: Vec<Result<usize, Fault>> = date.columns.iter().map(|name| table.column(name)).collect();
        let at: Vec<usize> = found.iter().filter_map(|at| at.as_ref().ok()).copied().collect();
        if at.len() < found.len() {
            return Err(found.into_iter().filter_map(Result::err).collect());
        }
        Ok(Self { form: &date.format, at, read_well: 0, failed: 0, impossible: Vec::new() })
    }

    /// The date's columns; never empty.
    pub fn columns(&self) -> &[usize] {
        &self.at
    }

    /// A row's date, or a fault in the tally.
    pub fn read(&mut self, table: &Table<'_>, row: &Row<'_>, tally: &mut Tally) -> Option<NaiveDate> {
        let text = self.text(row);
        let error = match NaiveDate::parse_from_str(&text, self.form) {
            Ok(date) => {
                self.read_well += 1;
                return Some(date);
            }
            Err(error) => error,
        };
        let expected = format!("a date written as {}", self.form);
        let mut fault = self.fault(table, row, &expected, "");
        if text.trim().is_empty() {
            fault.mend = "fill the date in, or take the line out".to_owned();
        } else {
            self.failed += 1;
            let is_no_day = matches!(error.kind(), ParseErrorKind::OutOfRange | ParseErrorKind::Impossible);
            if is_no_day && !USUAL_FORMS.iter().any(|form| reads(form, &text)) {
                self.impossible.push(row.line);
            }
        }
        tally.push(fault);
        None
    }

    fn text(&self, row: &Row<'_>) -> String {
        match self.at.as_slice() {
            [one] => row.cell(*one).to_owned(),
            several => several.iter().map(|at| row.cell(*at)).collect::<Vec<_>>().join(" "),
        }
    }

    /// A fault of a row's date.
    pub fn fault(&self, table: &Table<'_>, row: &Row<'_>, expected: &str, mend: &str) -> Fault {
        table.cell_fault(row, self.at[0], expected, mend)
    }

    /// Says how to mend the dates that did not read, once all of them have been seen. Gives whether those that read can be
    /// taken for what the file says: not where another form fits the file as a whole.
    pub fn finish(&self, table: &Table<'_>, tally: &mut Tally) -> bool {
        if self.failed == 0 {
            return true;
        }
        let fitting = self.fitting(table);
        let others = self.read_well;
        let mend = if !fitting.is_empty() {
            let forms: Vec<String> = fitting.iter().map(|form| format!("{form:?}")).collect();
            let hours = if fitting.iter().all(|form| form.contains("%H")) {
                "; there may be one line a day: of hourly values make daily ones first"
            } else {
                ""
            };
            format!("if the file writes dates so, state format = {} in date{hours}", forms.join(" or "))
        } else if others > FEW_FAILED * self.failed {
            format!("write it as the {others} dates that read well are written")
        } else if others > 0 {
            format!("the file mixes forms of dates: write it as the {others} that read well are written")
        } else {
            "state the file's own form in date = { column, format }, in the signs of strftime".to_owned()
        };
        tally.mend(table.header.get(self.at[0]).unwrap_or(""), |fault| {
            let is_no_day =
                matches!(&fault.place, Place::Cell { line, .. } if self.impossible.contains(line));
            if is_no_day && others > self.failed && fitting.is_empty() {
                IN_THE_CALENDAR.clone_into(&mut fault.expected);
                "mend the date, or take the line out".clone_into(&mut fault.mend);
            } else {
                mend.clone_into(&mut fault.mend);
            }
        });
        fitting.is_empty()
    }

    /// The usual forms that read the file's dates where the stated one does not: all but a few, and more than it.
    fn fitting(&self, table: &Table<'_>) -> Vec<&'static str> {
        let texts: Vec<String> = table.rows().filter_map(Result::ok).map(|row| self.text(&row)).collect();
        let written: Vec<&String> = texts.iter().filter(|text| !text.trim().is_empty()).collect();
        let fits = |form: &&str| {
            let failed = written.iter().filter(|text| !reads(form, text)).count();
            failed < self.failed && written.len() - failed > FEW_FAILED * failed
        };
        USUAL_FORMS.into_iter().filter(fits).collect()
    }
}

fn reads(form: &str, text: &str) -> bool {
    NaiveDate::parse_from_str(text, form).is_ok()
}
