//! Columns of a table of bands that nothing reads, and ground that has no column.

use super::bands::BandColumns;
use super::ground_columns::{ANGLE_NAMES, VARIATION_NAMES};
use crate::table::Table;
use crate::units::{AreaUnit, LengthUnit, ShareUnit};

/// What a table has beside what is read of it.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Unread {
    /// The names of the columns that are not read.
    pub columns: Vec<String>,
    /// How each part of the ground that the table says nothing of would be called: its word and its usual unit.
    pub ground_without_column: Vec<[&'static str; 2]>,
}

impl BandColumns {
    /// Looks through the header of a table that can be read; none where it cannot.
    pub fn unread(&self, file: &str, text: &str) -> Option<Unread> {
        let table = Table::open(file, text, &self.format).ok()?;
        let ground = &self.ground;
        let is_read = |name: &str| {
            [&self.lower, &self.upper, &self.mean].iter().any(|column| column.reads(name, &LengthUnit::NAMES))
                || self.area.reads(name, &AreaUnit::NAMES)
                || [&ground.slope, &ground.aspect].iter().any(|column| column.reads(name, &ANGLE_NAMES))
                || ground.canopy.reads(name, &ShareUnit::NAMES)
                || ground.accumulation.reads(name, &VARIATION_NAMES)
        };
        let is_there = [
            (ground.slope.is_there(&table, &ANGLE_NAMES), ["slope", "deg"]),
            (ground.aspect.is_there(&table, &ANGLE_NAMES), ["aspect", "deg"]),
            (ground.canopy.is_there(&table, &ShareUnit::NAMES), ["canopy", "fraction"]),
            (ground.accumulation.is_there(&table, &VARIATION_NAMES), ["accumulation", "cv"]),
        ];
        Some(Unread {
            columns: table.names().filter(|name| !is_read(name)).map(str::to_owned).collect(),
            ground_without_column: is_there
                .into_iter()
                .filter(|(is_there, _)| !is_there)
                .map(|(_, words)| words)
                .collect(),
        })
    }
}
