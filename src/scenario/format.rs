//! How a data file is written: separator, decimal sign, remarks, letters, marks for 'not measured', dates.

use super::section::Section;
use crate::fault::Fault;
use crate::table::{DateColumn, Decimal, Encoding, Format, USUAL_MISSING};
use chrono::format::{Item, StrftimeItems};

/// A header farther down than this is none.
const FARTHEST_HEADER: u64 = 10_000;

/// Reads how the file that `section` names is written, marks for 'not measured' included.
pub(super) fn read_format(section: &mut Section<'_>) -> Option<Format> {
    let layout = read_layout(section);
    let missing = section.texts("missing").unwrap_or_else(|| {
        if !section.has("missing") {
            section.default("missing", format!("{USUAL_MISSING:?}"));
        }
        USUAL_MISSING.map(str::to_owned).to_vec()
    });
    Some(Format { missing, ..layout? })
}

/// The same of a file in which every cell must be filled.
pub(super) fn read_layout(section: &mut Section<'_>) -> Option<Format> {
    let separator = section.text_or("separator", ",");
    let decimal = section.choice_or("decimal", &Decimal::NAMES, ".");
    let comment = section.text_or("comment", "#");
    let encoding = section.choice_or("encoding", &Encoding::NAMES, "utf-8");
    let header_line = section.whole_in("header_line", 1..=FARTHEST_HEADER, 12).map(|line| line as usize);
    let separator = one_byte(section, "separator", &separator);
    let comment =
        if comment.is_empty() { Some(None) } else { one_byte(section, "comment", &comment).map(Some) };
    Some(Format {
        separator: separator?,
        decimal: decimal?,
        comment: comment?,
        encoding: encoding?,
        header_line,
        missing: Vec::new(),
    })
}

fn one_byte(section: &Section<'_>, key: &str, text: &str) -> Option<u8> {
    match text.as_bytes() {
        [byte] if byte.is_ascii() && !matches!(byte, b'"' | b'\n' | b'\r') => Some(*byte),
        _ => {
            section.fault(Fault::key(
                section.path_of(key),
                format!("{text:?}"),
                "one plain character",
                "for example \",\" or \";\" or \"\\t\"",
            ));
            None
        }
    }
}

/// Reads `date = { column, format }`, or `columns` where the parts of a date stand in several.
pub(super) fn read_date(mut section: Section<'_>) -> Option<DateColumn> {
    let columns = if section.has("columns") {
        let columns = section.texts("columns");
        if section.has("column") {
            section.fault(Fault::key(
                section.path_of("column"),
                "column beside columns",
                "one of the two",
                "name one column, or in columns all that make up the date",
            ));
        }
        section.knows("column");
        if columns.as_ref().is_some_and(Vec::is_empty) {
            let mend = "for example columns = [\"year\", \"month\", \"day\"] with format = \"%Y %m %d\"";
            section.fault(Fault::key(
                section.path_of("columns"),
                "an empty list",
                "at least one column",
                mend,
            ));
            None
        } else {
            columns
        }
    } else {
        section.knows("columns");
        Some(vec![section.text_or("column", "date")])
    };
    let default = match columns.as_ref().map_or(1, Vec::len) {
        1 => "%Y-%m-%d",
        _ => "%Y %m %d",
    };
    let format = section.text_or("format", default);
    let is_sound = StrftimeItems::new(&format).all(|item| !matches!(item, Item::Error));
    if !is_sound {
        section.fault(Fault::key(
            section.path_of("format"),
            format!("{format:?}"),
            "a date format in the signs of strftime",
            "for example \"%Y-%m-%d\" or \"%m/%d/%Y\"",
        ));
    }
    section.finish();
    is_sound.then_some(DateColumn { columns: columns?, format })
}
