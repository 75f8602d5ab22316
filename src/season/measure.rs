//! What a measure is, and what it comes to where there is nothing to measure.

use serde::{Serialize, Serializer};

/// No value: there was nothing to measure. Ranked before every date.
pub const NONE: f64 = f64::NEG_INFINITY;
/// Snow that never went. Ranked after every date.
pub const NOT_GONE: f64 = f64::INFINITY;

/// Amount or date.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
#[serde(rename_all = "snake_case")]
pub enum Kind {
    /// An amount of water, mm.
    AmountMm,
    /// A day of the water year, counted from 1.
    DayOfWaterYear,
}

impl Kind {
    /// The reference median from which on a change is told as a percentage too; nothing where it never is.
    pub fn least_reference(self) -> Option<f64> {
        match self {
            Self::AmountMm => Some(10.0),
            Self::DayOfWaterYear => None,
        }
    }
}

/// Of what a measure is taken.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
#[serde(rename_all = "snake_case")]
pub enum Place {
    /// Of every band and of the basin mean.
    BandsAndBasin,
    /// Of the basin mean alone.
    Basin,
}

/// One measure of a water year.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Measure {
    /// Its name in tables, with the unit: `swe_04_01_mm`, `melt_out_day`.
    pub name: String,
    /// Its name in a sentence: `1 April SWE`.
    pub title: String,
    /// Amount or date.
    pub kind: Kind,
    /// Of what it is taken.
    pub place: Place,
    /// Whether it is water that is told as a volume, too.
    pub is_volume: bool,
}

impl Measure {
    pub(super) fn amount(name: String, title: String) -> Self {
        Self { name, title, kind: Kind::AmountMm, place: Place::BandsAndBasin, is_volume: false }
    }

    pub(super) fn date(name: &str, title: &str) -> Self {
        Self {
            name: name.to_owned(),
            title: title.to_owned(),
            kind: Kind::DayOfWaterYear,
            place: Place::BandsAndBasin,
            is_volume: false,
        }
    }
}

/// What a measure came to.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Outcome {
    /// A number.
    Value(f64),
    /// Nothing to measure.
    None,
    /// Snow never went.
    NotGone,
}

impl From<f64> for Outcome {
    fn from(number: f64) -> Self {
        if number == NOT_GONE {
            Self::NotGone
        } else if number.is_finite() {
            Self::Value(number)
        } else {
            Self::None
        }
    }
}

impl Outcome {
    /// The number, if there is one.
    pub fn value(self) -> Option<f64> {
        match self {
            Self::Value(value) => Some(value),
            Self::None | Self::NotGone => None,
        }
    }
}

impl Serialize for Outcome {
    /// A number, or the words `none` and `not gone`.
    fn serialize<S: Serializer>(&self, serializer: S) -> Result<S::Ok, S::Error> {
        match self {
            Self::Value(value) => serializer.serialize_f64(*value),
            Self::None => serializer.serialize_str("none"),
            Self::NotGone => serializer.serialize_str("not gone"),
        }
    }
}
