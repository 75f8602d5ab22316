//! How a text table is written: what the scenario declares about a file.

use serde::Serialize;

/// How a file's bytes stand for letters.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
pub enum Encoding {
    /// Unicode in bytes; ASCII is part of it.
    #[serde(rename = "utf-8")]
    Utf8,
    /// One byte a letter, as western Windows programs write it (Windows-1252, which holds Latin-1).
    #[serde(rename = "latin-1")]
    Latin1,
    /// Two bytes a letter, after a byte-order mark.
    #[serde(rename = "utf-16")]
    Utf16,
}

impl Encoding {
    /// Every encoding by the name a scenario gives it.
    pub const NAMES: [(&'static str, Self); 3] =
        [("utf-8", Self::Utf8), ("latin-1", Self::Latin1), ("utf-16", Self::Utf16)];
}

/// The sign between a number's whole part and its fraction.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
pub enum Decimal {
    /// `3.5`.
    #[serde(rename = ".")]
    Point,
    /// `3,5`.
    #[serde(rename = ",")]
    Comma,
}

impl Decimal {
    /// Both signs by themselves.
    pub const NAMES: [(&'static str, Self); 2] = [(".", Self::Point), (",", Self::Comma)];
}

/// How a text table is written.
#[derive(Debug, Clone, PartialEq, Eq, Serialize)]
pub struct Format {
    /// Between cells.
    pub separator: u8,
    /// Within numbers.
    pub decimal: Decimal,
    /// Lines that start with it are remarks.
    pub comment: Option<u8>,
    /// Letters.
    pub encoding: Encoding,
    /// The line, from 1, on which the column names stand, where lines above it are no remarks by their first sign.
    pub header_line: Option<usize>,
    /// Cells that stand for 'not measured', beside an empty one. A mark that is a number stands for that number however
    /// it is written: `-9999` for `-9999.0`.
    pub missing: Vec<String>,
}

/// Marks for 'not measured' where a scenario names none.
pub const USUAL_MISSING: [&str; 4] = ["", "NA", "-9999", "-99.9"];

impl Default for Format {
    fn default() -> Self {
        Self {
            separator: b',',
            decimal: Decimal::Point,
            comment: Some(b'#'),
            encoding: Encoding::Utf8,
            header_line: None,
            missing: USUAL_MISSING.map(str::to_owned).to_vec(),
        }
    }
}

impl Format {
    /// Whether a cell, trimmed, says that nothing was measured.
    pub fn is_missing(&self, cell: &str) -> bool {
        cell.is_empty()
            || self.missing.iter().any(|mark| {
                let stands_for = || self.number(mark).or_else(|| mark.parse().ok());
                mark == cell || self.number(cell).is_some_and(|number| stands_for() == Some(number))
            })
    }

    /// The number in a cell, trimmed; none where it is not a finite one written as this format says. A true minus sign
    /// is read as one.
    pub fn number(&self, cell: &str) -> Option<f64> {
        let finite = |text: &str| text.parse::<f64>().ok().filter(|number| number.is_finite());
        match self.decimal {
            Decimal::Point => finite(cell),
            Decimal::Comma if cell.contains('.') => None,
            Decimal::Comma => finite(&cell.replace(',', ".")),
        }
        .or_else(|| cell.strip_prefix('\u{2212}').and_then(|size| self.number(size)).map(|size| -size))
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn numbers_and_marks_are_read_as_declared() {
        let point = Format::default();
        let comma = Format { decimal: Decimal::Comma, ..Format::default() };
        assert_eq!((point.number("3.5"), point.number("3,5")), (Some(3.5), None));
        assert_eq!(
            (comma.number("3,5"), comma.number("3.5"), comma.number("4")),
            (Some(3.5), None, Some(4.0))
        );
        assert_eq!(
            (point.number("\u{2212}2.5"), point.number("NaN"), point.number("1e400")),
            (Some(-2.5), None, None)
        );
        assert!(point.is_missing("-9999.0") && point.is_missing("-99.90") && point.is_missing("NA"));
        assert!(comma.is_missing("-99,9") && comma.is_missing("-99,90") && comma.is_missing("-9999"));
        assert!(!point.is_missing("-999") && !point.is_missing("0"));
    }
}
