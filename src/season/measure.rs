//! What a measure is, and what it comes to where there is nothing to measure.

use super::Kind;
use serde::{Serialize, Serializer};

/// No value: there was nothing to measure. Ranked before every date.
pub const NONE: f64 = f64::NEG_INFINITY;
/// Snow that never went. Ranked after every date.
pub const NOT_GONE: f64 = f64::INFINITY;
/// Something that had not come by the year's end. Ranked after every date.
pub const NOT_REACHED: f64 = f64::INFINITY;

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
    /// What its numbers count.
    pub kind: Kind,
    /// Of what it is taken.
    pub place: Place,
    /// Whether it is water that leaves the pack or reaches the ground over a part of the year: told as a volume, too.
    pub is_volume: bool,
    /// Whether its driest and wettest years are told beside the mean.
    pub has_extremes_told: bool,
}

impl Measure {
    /// The headline of most studies, for tests that need a measure.
    #[cfg(test)]
    pub fn april_swe() -> Self {
        Self::new(Kind::AmountMm, "swe_04_01_mm", "1 April SWE")
    }

    pub(crate) fn new(kind: Kind, name: impl Into<String>, title: impl Into<String>) -> Self {
        Self {
            name: name.into(),
            title: title.into(),
            kind,
            place: Place::BandsAndBasin,
            is_volume: false,
            has_extremes_told: false,
        }
    }

    /// The same of the basin mean alone.
    pub(super) fn of_basin(self) -> Self {
        Self { place: Place::Basin, ..self }
    }

    /// The same, told as a volume, too.
    pub(crate) fn told_as_volume(self) -> Self {
        Self { is_volume: true, ..self }
    }

    /// The same, its driest and wettest years told beside the mean.
    pub(super) fn told_with_extremes(self) -> Self {
        Self { has_extremes_told: true, ..self }
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
    /// What was waited for had not come by the year's end.
    NotReached,
}

impl Outcome {
    /// The number, if there is one.
    pub fn value(self) -> Option<f64> {
        match self {
            Self::Value(value) => Some(value),
            Self::None | Self::NotGone | Self::NotReached => None,
        }
    }
}

impl Serialize for Outcome {
    /// A number, or the words `none`, `not gone` and `not reached`.
    fn serialize<S: Serializer>(&self, serializer: S) -> Result<S::Ok, S::Error> {
        match self {
            Self::Value(value) => serializer.serialize_f64(*value),
            Self::None => serializer.serialize_str("none"),
            Self::NotGone => serializer.serialize_str("not gone"),
            Self::NotReached => serializer.serialize_str("not reached"),
        }
    }
}
