//! How a file of observed snow is to be read: which column holds what, in which unit, and when it was read.

use crate::table::{DateColumn, Format};
use crate::units::DepthUnit;
use crate::weather::Reading;

/// The column of snow water equivalent.
#[derive(Debug, Clone, PartialEq)]
pub struct SweColumn {
    /// The header's name.
    pub column: String,
    /// The unit in the file.
    pub unit: DepthUnit,
}

/// How a file of observed snow is to be read.
#[derive(Debug, Clone, PartialEq)]
pub struct Columns {
    /// Dates.
    pub date: DateColumn,
    /// Snow water equivalent.
    pub swe: SweColumn,
    /// When on the dated day it was read.
    pub reading: Reading,
    /// How the table is written.
    pub format: Format,
}
