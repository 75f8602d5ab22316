//! Units at the door: what a file states becomes degC and mm here, and nowhere else. `system` is the way out, to a reader.

mod system;

pub use system::{Unit, UnitSystem};

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

    /// A temperature in degC, in this unit.
    pub fn from_celsius(self, value_c: f64) -> f64 {
        match self {
            Self::Celsius => value_c,
            Self::Fahrenheit => value_c * 1.8 + 32.0,
            Self::Kelvin => value_c + 273.15,
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

/// How a share of something is written.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
pub enum ShareUnit {
    /// From 0 to 1.
    #[serde(rename = "fraction")]
    Fraction,
    /// From 0 to 100.
    #[serde(rename = "pct")]
    Percent,
}

impl ShareUnit {
    /// Both by the name a scenario gives them.
    pub const NAMES: [(&'static str, Self); 2] = [("fraction", Self::Fraction), ("pct", Self::Percent)];

    /// How the whole is written.
    pub fn of_all(self) -> f64 {
        match self {
            Self::Fraction => 1.0,
            Self::Percent => 100.0,
        }
    }

    /// A share in this unit, from 0 to 1.
    pub fn to_fraction(self, value: f64) -> f64 {
        value / self.of_all()
    }

    /// A share in this unit, percent.
    pub fn to_percent(self, value: f64) -> f64 {
        value * (Self::Percent.of_all() / self.of_all())
    }
}

/// Unit of a length: an elevation, or a depth of water where it is large.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
pub enum LengthUnit {
    /// Metres.
    #[serde(rename = "m")]
    Metre,
    /// International feet, 0.3048 m. The survey foot, 2 parts in a million longer, moves no elevation that matters.
    #[serde(rename = "ft")]
    Foot,
}

impl LengthUnit {
    /// Every unit by the name a scenario gives it.
    pub const NAMES: [(&'static str, Self); 2] = [("m", Self::Metre), ("ft", Self::Foot)];

    /// A length in this unit, in m.
    pub fn to_metres(self, value: f64) -> f64 {
        match self {
            Self::Metre => value,
            Self::Foot => value * METRES_PER_FOOT,
        }
    }
}

/// Unit of an area.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
pub enum AreaUnit {
    /// Square kilometres.
    #[serde(rename = "km2")]
    SquareKilometre,
    /// Square miles of 5280 international feet.
    #[serde(rename = "mi2")]
    SquareMile,
    /// Hectares.
    #[serde(rename = "ha")]
    Hectare,
    /// Acres of 43,560 square international feet.
    #[serde(rename = "acre")]
    Acre,
}

impl AreaUnit {
    /// Every unit by the name a scenario gives it.
    pub const NAMES: [(&'static str, Self); 4] = [
        ("km2", Self::SquareKilometre),
        ("mi2", Self::SquareMile),
        ("ha", Self::Hectare),
        ("acre", Self::Acre),
    ];

    /// An area in this unit, in km2.
    pub fn to_square_kilometres(self, value: f64) -> f64 {
        match self {
            Self::SquareKilometre => value,
            Self::SquareMile => value * ACRES_PER_SQUARE_MILE * SQUARE_METRES_PER_ACRE / 1e6,
            Self::Hectare => value / 100.0,
            Self::Acre => value * SQUARE_METRES_PER_ACRE / 1e6,
        }
    }
}

/// Unit of a flow.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
pub enum FlowUnit {
    /// Cubic metres per second.
    #[serde(rename = "m3/s")]
    CubicMetrePerSecond,
    /// Cubic international feet per second.
    #[serde(rename = "cfs")]
    CubicFootPerSecond,
    /// Million cubic metres a day.
    #[serde(rename = "hm3/day")]
    CubicHectometrePerDay,
    /// Acre-feet a day.
    #[serde(rename = "acre-feet/day")]
    AcreFootPerDay,
}

impl FlowUnit {
    /// Every unit by the name a scenario gives it.
    pub const NAMES: [(&'static str, Self); 4] = [
        ("m3/s", Self::CubicMetrePerSecond),
        ("cfs", Self::CubicFootPerSecond),
        ("hm3/day", Self::CubicHectometrePerDay),
        ("acre-feet/day", Self::AcreFootPerDay),
    ];

    /// A flow in this unit, in hm3 a day. A year's volume is the sum over its days, 365 or 366 of them: no length of a year is assumed
    /// anywhere.
    ///
    /// ```
    /// use thawline::units::{FlowUnit, acre_feet};
    /// let a_day = FlowUnit::CubicFootPerSecond.to_hm3_a_day(1.0);
    /// assert!((acre_feet(a_day) - 1.9834710744).abs() < 1e-9);
    /// ```
    pub fn to_hm3_a_day(self, value: f64) -> f64 {
        match self {
            Self::CubicMetrePerSecond => value * SECONDS_A_DAY / 1e6,
            Self::CubicFootPerSecond => {
                value * METRES_PER_FOOT * METRES_PER_FOOT * METRES_PER_FOOT * SECONDS_A_DAY / 1e6
            }
            Self::CubicHectometrePerDay => value,
            Self::AcreFootPerDay => value / acre_feet(1.0),
        }
    }
}

/// Water `depth_mm` deep over `area_km2`, in hm3 (million cubic metres): 1 mm on 1 km2 is 1000 m3.
///
/// ```
/// assert_eq!(thawline::units::cubic_hectometres(450.0, 250.0), 112.5);
/// ```
pub fn cubic_hectometres(depth_mm: f64, area_km2: f64) -> f64 {
    depth_mm * area_km2 / 1000.0
}

/// How deep `volume_hm3` of water would stand on `area_km2`, in mm.
///
/// ```
/// assert_eq!(thawline::units::depth_mm(112.5, 250.0), 450.0);
/// ```
pub fn depth_mm(volume_hm3: f64, area_km2: f64) -> f64 {
    1000.0 * volume_hm3 / area_km2
}

/// A volume of `volume_hm3` in acre-feet, each 43,560 cubic international feet or 1233.4818 m3.
///
/// ```
/// assert!((thawline::units::acre_feet(1.0) - 810.71319).abs() < 1e-5);
/// ```
pub fn acre_feet(volume_hm3: f64) -> f64 {
    volume_hm3 * 1e6 / (SQUARE_METRES_PER_ACRE * METRES_PER_FOOT)
}

const SECONDS_A_DAY: f64 = 86_400.0;
const METRES_PER_FOOT: f64 = 0.3048;
const SQUARE_METRES_PER_ACRE: f64 = 43_560.0 * METRES_PER_FOOT * METRES_PER_FOOT;
const ACRES_PER_SQUARE_MILE: f64 = 640.0;
