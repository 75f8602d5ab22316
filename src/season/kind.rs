//! Of which kind a measure is: what its numbers count, and what becomes of them where there is nothing to count.

use super::{NONE, Outcome, SEASONAL_COVER_DAYS};
use serde::Serialize;

/// No percentage is given of a reference median below this, mm.
pub const LEAST_REFERENCE_MM: f64 = 10.0;

/// No percentage is given of a reference median below this, hm3.
const LEAST_REFERENCE_HM3: f64 = 0.1;

/// What a measure's numbers count.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
#[serde(rename_all = "snake_case")]
pub enum Kind {
    /// An amount of water, mm.
    AmountMm,
    /// An amount of water times the days it lay, mm days.
    AmountMmDays,
    /// A volume of water, hm3.
    VolumeHm3,
    /// A part of something, 1 for all of it; told as percent.
    Share,
    /// A number of days.
    DayCount,
    /// A day of the water year, counted from 1.
    DayOfWaterYear,
    /// A day of the water year by which something has come.
    ArrivalDay,
}

impl Kind {
    /// Whether its numbers are days of the water year, of which means are not taken.
    pub const fn is_date(self) -> bool {
        matches!(self, Self::DayOfWaterYear | Self::ArrivalDay)
    }

    /// The median at the reference below which no percent change is given: 10 mm, of amounts times days as much as a
    /// seasonal cover of 10 mm has, of volumes 0.1 hm3. None where there is never a percentage.
    pub fn least_reference(self) -> Option<f64> {
        match self {
            Self::AmountMm => Some(LEAST_REFERENCE_MM),
            Self::AmountMmDays => Some(LEAST_REFERENCE_MM * SEASONAL_COVER_DAYS as f64),
            Self::VolumeHm3 => Some(LEAST_REFERENCE_HM3),
            Self::Share | Self::DayCount | Self::DayOfWaterYear | Self::ArrivalDay => None,
        }
    }

    /// A number of this kind in a row of numbers, said in words.
    pub fn outcome(self, number: f64) -> Outcome {
        match self {
            _ if number.is_finite() => Outcome::Value(number),
            Self::ArrivalDay if number > NONE => Outcome::NotReached,
            Self::DayOfWaterYear if number > NONE => Outcome::NotGone,
            _ => Outcome::None,
        }
    }
}

#[cfg(test)]
mod tests {
    use super::super::{NOT_GONE, NOT_REACHED};
    use super::*;

    #[test]
    fn what_has_no_number_is_said_by_its_kind() {
        assert_eq!(Kind::DayOfWaterYear.outcome(NOT_GONE), Outcome::NotGone);
        assert_eq!(Kind::ArrivalDay.outcome(NOT_REACHED), Outcome::NotReached);
        for kind in [Kind::AmountMm, Kind::Share, Kind::DayCount, Kind::DayOfWaterYear, Kind::ArrivalDay] {
            assert_eq!(kind.outcome(NONE), Outcome::None);
            assert_eq!(kind.outcome(f64::NAN), Outcome::None);
            assert_eq!(kind.outcome(0.25), Outcome::Value(0.25));
        }
    }
}
