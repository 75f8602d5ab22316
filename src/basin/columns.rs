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
    /// Place and unit of the column; `units` are all there are, with their names. `advice` says how the scenario names a
    /// column that is not called by its word and unit.
    ///
    /// # Errors
    /// No such column, or several.
    pub(super) fn find(
        &self,
        table: &Table<'_>,
        units: &[(&'static str, U)],
        advice: &str,
    ) -> Result<(usize, U), Fault> {
        match self {
            Self::Stated { column, unit } => table.column(column).map(|at| (at, *unit)),
            Self::WithUnit(word) => {
                let names = usual_names(word, units);
                let mut there = names.iter().zip(units).filter(|(name, _)| table.has(name));
                match (there.next(), there.next()) {
                    (Some((name, (_, unit))), None) => table.column(name).map(|at| (at, *unit)),
                    (None, _) => {
                        let names: Vec<&str> = names.iter().map(String::as_str).collect();
                        Err(table.no_usual_column(&names, advice))
                    }
                    (Some(_), Some(_)) => {
                        let all = names.iter().map(String::as_str).filter(|name| table.has(name));
                        Err(table.beside_each_other(&all.collect::<Vec<_>>()))
                    }
                }
            }
        }
    }

    /// The same of a column that may be left out: none where it is neither stated nor there by its word and unit.
    ///
    /// # Errors
    /// A stated column that is not there, or several.
    pub(super) fn find_if_there(
        &self,
        table: &Table<'_>,
        units: &[(&'static str, U)],
    ) -> Result<Option<(usize, U)>, Fault> {
        self.is_there(table, units).then(|| self.find(table, units, "")).transpose()
    }

    /// How a scenario names a column that the table does not have by its word and unit; none where it has it.
    pub(super) fn naming(&self, table: &Table<'_>, units: &[(&'static str, U)]) -> Option<String> {
        let Self::WithUnit(word) = self else { return None };
        if self.is_there(table, units) {
            return None;
        }
        // `area_below` is looked for among the file's names as 'area'.
        let start = word.split('_').next().unwrap_or(word);
        let own = table.the_only_column_with(start);
        let is_of = |name: &str, unit: &str| {
            name.split(|sign: char| !sign.is_alphanumeric()).any(|part| part == unit)
        };
        let unit = units.iter().map(|(unit, _)| *unit).find(|unit| own.is_some_and(|name| is_of(name, unit)));
        let unit = unit.unwrap_or_else(|| units.first().map_or("", |(unit, _)| *unit));
        Some(format!("{word} = {{ column = \"{}\", unit = \"{unit}\" }}", own.unwrap_or("...")))
    }

    /// Whether a column of this name is what this reads.
    pub(super) fn reads(&self, name: &str, units: &[(&'static str, U)]) -> bool {
        match self {
            Self::Stated { column, .. } => column == name,
            Self::WithUnit(word) => usual_names(word, units).iter().any(|usual| usual == name),
        }
    }

    /// Whether the table has such a column, or one is stated.
    pub(super) fn is_there(&self, table: &Table<'_>, units: &[(&'static str, U)]) -> bool {
        match self {
            Self::Stated { .. } => true,
            Self::WithUnit(word) => usual_names(word, units).iter().any(|name| table.has(name)),
        }
    }
}

/// The names that a column goes by without being named: its word with each unit.
fn usual_names<U>(word: &str, units: &[(&'static str, U)]) -> Vec<String> {
    units.iter().map(|(unit, _)| format!("{word}_{unit}")).collect()
}

/// How to name the columns that are not there by their usual names, in the table of the scenario that `key` opens.
pub(super) fn advice(key: &str, namings: impl IntoIterator<Item = Option<String>>) -> String {
    let namings: Vec<String> = namings.into_iter().flatten().collect();
    format!("if the file has other names, name them:\n  {key} = {{ file = \"...\", {} }}", namings.join(", "))
}

/// Two columns, or the faults of both.
pub(super) fn both<T>(a: Result<T, Fault>, b: Result<T, Fault>) -> Result<[T; 2], Vec<Fault>> {
    match (a, b) {
        (Ok(a), Ok(b)) => Ok([a, b]),
        (a, b) => Err([a.err(), b.err()].into_iter().flatten().collect()),
    }
}
