//! How a station's file is to be read: which column holds what, in which unit.

use crate::table::{DateColumn, Format};
use crate::units::{DepthUnit, ShareUnit, TemperatureUnit};

/// A temperature column and its unit.
#[derive(Debug, Clone, PartialEq)]
pub struct TemperatureColumn {
    /// The header's name.
    pub column: String,
    /// The unit in the file.
    pub unit: TemperatureUnit,
}

/// Which temperatures the file holds.
#[derive(Debug, Clone, PartialEq)]
pub enum TemperatureColumns {
    /// Daily minimum and maximum.
    Extremes {
        /// Daily minimum.
        tmin: TemperatureColumn,
        /// Daily maximum.
        tmax: TemperatureColumn,
    },
    /// The daily mean alone; then only the `mean` degree rule is possible.
    MeanAlone(TemperatureColumn),
}

impl TemperatureColumns {
    /// Each column with the scenario's key for it.
    pub fn named(&self) -> Vec<(&'static str, &TemperatureColumn)> {
        match self {
            Self::Extremes { tmin, tmax } => vec![("tmin", tmin), ("tmax", tmax)],
            Self::MeanAlone(mean) => vec![("tmean", mean)],
        }
    }
}

/// When a gauge or pillow was read.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Reading {
    /// As the dated day begins.
    StartOfDay,
    /// As the dated day ends.
    EndOfDay,
}

impl Reading {
    /// Both by the name a scenario gives them.
    pub const NAMES: [(&'static str, Self); 2] =
        [("start-of-day", Self::StartOfDay), ("end-of-day", Self::EndOfDay)];
}

/// What the precipitation column holds.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Gauge {
    /// Each day's amount.
    Daily,
    /// What has come since the gauge was last set back.
    Accumulating {
        /// When it was read.
        reading: Reading,
        /// A fall larger than this sets the gauge back, mm; a smaller one is noise.
        reset_tolerance_mm: f64,
    },
}

/// The precipitation column.
#[derive(Debug, Clone, PartialEq)]
pub struct PrecipitationColumn {
    /// The header's name.
    pub column: String,
    /// The unit in the file.
    pub unit: DepthUnit,
    /// Daily amounts or an accumulating gauge.
    pub gauge: Gauge,
    /// Cells that stand for an amount too small to measure; they are read as 0.
    pub trace: Vec<String>,
}

/// Which column tells of the water in the air.
#[derive(Debug, Clone, PartialEq)]
pub enum HumidityColumn {
    /// Relative humidity of the day.
    Relative {
        /// The header's name.
        column: String,
        /// How the file writes it.
        unit: ShareUnit,
    },
    /// Dew point of the day.
    DewPoint(TemperatureColumn),
}

impl HumidityColumn {
    /// The header's name.
    pub fn column(&self) -> &str {
        match self {
            Self::Relative { column, .. } => column,
            Self::DewPoint(dew_point) => &dew_point.column,
        }
    }
}

/// How a station's file is to be read.
#[derive(Debug, Clone, PartialEq)]
pub struct Columns {
    /// Dates.
    pub date: DateColumn,
    /// Temperatures.
    pub temperature: TemperatureColumns,
    /// Precipitation.
    pub precipitation: PrecipitationColumn,
    /// Humidity, which may be left out.
    pub humidity: Option<HumidityColumn>,
    /// How the table is written.
    pub format: Format,
}
