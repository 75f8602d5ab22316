//! Units at the door: what a file states becomes degC and mm here, and nowhere else.

use serde::Serialize;

/// Unit of a temperature column.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
pub enum TemperatureUnit {
    /// Degrees Celsius.
    #[serde(rename = "degC")]
    Celsius,
    /// Degrees Fahrenheit.
    #[serde(rename = "degF")]
    Fahrenheit,
    /// Kelvin.
    #[serde(rename = "K")]
    Kelvin,
}

impl TemperatureUnit {
    /// Every unit by the name a scenario gives it.
    pub const NAMES: [(&'static str, Self); 3] =
        [("degC", Self::Celsius), ("degF", Self::Fahrenheit), ("K", Self::Kelvin)];

    /// A temperature in this unit, in degC.
    pub fn to_celsius(self, value: f64) -> f64 {
        match self {
            Self::Celsius => value,
            Self::Fahrenheit => (value - 32.0) / 1.8,
            Self::Kelvin => value - 273.15,
        }
    }
}

/// Unit of a water-depth column.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
pub enum DepthUnit {
    /// Millimetres.
    #[serde(rename = "mm")]
    Millimetre,
    /// Centimetres.
    #[serde(rename = "cm")]
    Centimetre,
    /// International inches, 25.4 mm.
    #[serde(rename = "in")]
    Inch,
}

impl DepthUnit {
    /// Every unit by the name a scenario gives it.
    pub const NAMES: [(&'static str, Self); 3] =
        [("mm", Self::Millimetre), ("cm", Self::Centimetre), ("in", Self::Inch)];

    /// A depth in this unit, in mm.
    pub fn to_millimetres(self, value: f64) -> f64 {
        match self {
            Self::Millimetre => value,
            Self::Centimetre => value * 10.0,
            Self::Inch => value * 25.4,
        }
    }
}
