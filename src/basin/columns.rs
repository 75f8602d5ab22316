//! Columns of an area-elevation table, with a unit that is stated or stands in the column's own name.

use crate::fault::Fault;
use crate::table::Table;

/// A column of elevations or areas.
#[derive(Debug, Clone, PartialEq)]
pub enum Column<U> {
    /// Called by its name in the header, in a stated unit.
    Stated {
        /// The header's name.
        column: String,
        /// The unit in the file.
        unit: U,
    },
    /// Called by this word and its unit: `lower_m` or `lower_ft`.
    WithUnit(&'static str),
}

impl<U: Copy> Column<U> {
    /// Place and unit of the column; `units` are all there are, with their names.
    ///
    /// # Errors
    /// No such column, or several.
    pub(super) fn find(&self, table: &Table<'_>, units: &[(&'static str, U)]) -> Result<(usize, U), Fault> {
        match self {
            Self::Stated { column, unit } => table.column(column).map(|at| (at, *unit)),
            Self::WithUnit(word) => {
                let names: Vec<(String, U)> =
                    units.iter().map(|(name, unit)| (format!("{word}_{name}"), *unit)).collect();
                let there: Vec<&(String, U)> = names.iter().filter(|(name, _)| table.has(name)).collect();
                match there.as_slice() {
                    [(name, unit)] => table.column(name).map(|at| (at, *unit)),
                    [] => {
                        let fault = table.column(&names[0].0).map(|at| (at, names[0].1));
                        let all: Vec<&str> = names.iter().map(|(name, _)| name.as_str()).collect();
                        fault.map_err(|fault| Fault {
                            found: format!("no column called '{}'", all.join("' or '")),
                            ..fault
                        })
                    }
                    several => {
                        let all: Vec<&str> = several.iter().map(|(name, _)| name.as_str()).collect();
                        Err(table.beside_each_other(&all))
                    }
                }
            }
        }
    }

    /// Whether the table has such a column, or one is stated.
    pub(super) fn is_there(&self, table: &Table<'_>, units: &[(&'static str, U)]) -> bool {
        match self {
            Self::Stated { .. } => true,
            Self::WithUnit(word) => units.iter().any(|(name, _)| table.has(&format!("{word}_{name}"))),
        }
    }
}

/// Two columns, or the faults of both.
pub(super) fn both<T>(a: Result<T, Fault>, b: Result<T, Fault>) -> Result<[T; 2], Vec<Fault>> {
    match (a, b) {
        (Ok(a), Ok(b)) => Ok([a, b]),
        (a, b) => Err([a.err(), b.err()].into_iter().flatten().collect()),
    }
}
