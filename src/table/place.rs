//! Where a row and a cell stand in the text, and how much of a long line is shown.

use std::ops::Range;

/// A line is shown up to so many bytes on either side of the cell at fault.
const SHOWN_BESIDE: usize = 120;

/// Line number and text of the record at `position`. The position may stand on the remarks before the record.
pub(super) fn line_at<'a>(
    text: &'a str,
    position: Option<&csv::Position>,
    comment: Option<u8>,
) -> (usize, &'a str) {
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
pub(super) fn cell_bytes(line: &str, column: usize, separator: u8) -> Range<usize> {
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

/// The part of a long line around some of its bytes, and where they stand in that part.
pub(super) fn around(line: &str, bytes: Range<usize>) -> (String, Range<usize>) {
    let longest = 4 * SHOWN_BESIDE;
    let bytes = bytes.start.min(line.len())..bytes.end.min(line.len());
    if line.len() <= longest {
        return (line.to_owned(), bytes);
    }
    let mut from = bytes.start.saturating_sub(SHOWN_BESIDE);
    let mut to = (bytes.start + 2 * SHOWN_BESIDE).min(bytes.end + SHOWN_BESIDE).min(line.len());
    while !line.is_char_boundary(from) {
        from -= 1;
    }
    while !line.is_char_boundary(to) {
        to += 1;
    }
    (line[from..to].to_owned(), bytes.start - from..bytes.end.min(to) - from)
}
