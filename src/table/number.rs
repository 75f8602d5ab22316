//! Numbers in cells, and what the signs in one may mean where it does not read.

use super::{Decimal, Format, Row, Table};
use crate::fault::Fault;

impl Table<'_> {
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
        self.format.number(cell).map(Some).ok_or_else(|| {
            let is_mark = "if it is such a mark, add it to 'missing' where the scenario names the file";
            let mend = self.mend_of_sign(cell).unwrap_or_else(|| is_mark.to_owned());
            self.cell_fault(row, column, expected, &mend)
        })
    }

    /// The number in a cell that must hold one.
    ///
    /// # Errors
    /// A cell that does not.
    pub fn required_number(&self, row: &Row<'_>, column: usize) -> Result<f64, Fault> {
        self.number_or_mend(row, column, "fill it in, or take the line out")
    }

    /// The same where there is more to say than to fill it in.
    ///
    /// # Errors
    /// A cell that holds none, with that mend unless its signs say more.
    pub fn number_or_mend(&self, row: &Row<'_>, column: usize, mend: &str) -> Result<f64, Fault> {
        let cell = row.cell(column);
        self.format.number(cell).ok_or_else(|| {
            let mend = self.mend_of_sign(cell).unwrap_or_else(|| mend.to_owned());
            self.cell_fault(row, column, "a number", &mend)
        })
    }

    /// How to mend a number whose signs are not the declared ones.
    fn mend_of_sign(&self, cell: &str) -> Option<String> {
        let (swapped, sign, other, place) = match self.format.decimal {
            Decimal::Point => {
                let comma = Format { decimal: Decimal::Comma, ..Format::default() };
                (comma, ',', "comma", "state decimal = \",\" where the scenario names the file")
            }
            Decimal::Comma => (
                Format::default(),
                '.',
                "point",
                "take decimal = \",\" out where the scenario names the file",
            ),
        };
        let is_number = swapped.number(cell).is_some();
        let whole: String = cell.chars().filter(|have| *have != sign).collect();
        match (is_number, parts_thousands(cell, sign)) {
            _ if cell.contains('.') && cell.contains(',') => {
                Some("write it without a sign between thousands".to_owned())
            }
            (true, true) => Some(format!(
                "if the {other} parts thousands, write {whole}; if it is a decimal {other}, {place}"
            )),
            (true, false) => Some(format!("if that is a decimal {other}, {place}")),
            (false, true) => Some(format!("write it without a sign between thousands: {whole}")),
            (false, false) => None,
        }
    }
}

/// Whether a sign parts a whole number into groups of three digits: `8.500`, `1.234.567`.
fn parts_thousands(cell: &str, sign: char) -> bool {
    let digits = cell.trim_start_matches(['-', '+', '\u{2212}']);
    let mut groups = digits.split(sign);
    let is_group = |group: &str| group.bytes().all(|byte| byte.is_ascii_digit());
    let first = groups.next().unwrap_or("");
    let rest: Vec<&str> = groups.collect();
    (1..=3).contains(&first.len())
        && is_group(first)
        && !first.starts_with('0')
        && !rest.is_empty()
        && rest.iter().all(|group| group.len() == 3 && is_group(group))
}

#[cfg(test)]
mod tests {
    use super::parts_thousands;

    #[test]
    fn groups_of_three_may_be_thousands() {
        let may_be = |cell: &str| parts_thousands(cell, '.');
        assert!(["8.500", "-12.345", "1.234.567"].iter().all(|cell| may_be(cell)));
        assert!(
            !["8.5", "0.500", "1234.500", "8500", "8.500.1", ".500", "8.5oo"].iter().any(|cell| may_be(cell))
        );
    }
}
