//! Warming levels: an offset and a factor for each month (method, section 3).

use super::global::GlobalWarming;
use super::intensity::WetDayChange;
use serde::Serialize;

/// How warming is spread over months and what precipitation does with it; the same for every level of a study.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Warming {
    /// Warming of each month per degree of the level, for daily minima, January first.
    pub tmin_monthly_shape: [f64; 12],
    /// The same for daily maxima.
    pub tmax_monthly_shape: [f64; 12],
    /// What precipitation does.
    pub precipitation: PrecipitationChange,
    /// Percent by which wet days bring more for each degree of the level, compounded, where they do: how often it is wet then
    /// changes so that the change of precipitation holds.
    pub wet_day_intensity_pct_per_c: Option<f64>,
    /// Where the levels were stated as global warming: how they became the basin's.
    pub global: Option<GlobalWarming>,
}

/// How precipitation changes with the level, January first.
#[derive(Debug, Clone, PartialEq, Serialize)]
#[serde(rename_all = "snake_case")]
pub enum PrecipitationChange {
    /// Percent per degC of the level, compounded.
    PctPerC([f64; 12]),
    /// Percent as stated for each level; none at levels that are not listed.
    PctByLevel(Vec<StatedChange>),
}

/// The change of precipitation that was stated for a level.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct StatedChange {
    /// The level, degC.
    pub level_c: f64,
    /// Percent, January first.
    pub pct: [f64; 12],
}

impl Default for Warming {
    /// The same in every month; precipitation stays.
    fn default() -> Self {
        Self {
            tmin_monthly_shape: [1.0; 12],
            tmax_monthly_shape: [1.0; 12],
            precipitation: PrecipitationChange::PctPerC([0.0; 12]),
            wet_day_intensity_pct_per_c: None,
            global: None,
        }
    }
}

impl PrecipitationChange {
    /// Factor on precipitation at a level, month by month: `(1 + p/100)^w`, or `1 + c/100` as stated; never below 0.
    pub fn factor(&self, level_c: f64) -> [f64; 12] {
        match self {
            Self::PctPerC(pct) => pct.map(|pct| libm::pow(1.0 + pct / 100.0, level_c)),
            Self::PctByLevel(stated) => stated
                .iter()
                .find(|stated| stated.level_c == level_c)
                .map_or([1.0; 12], |stated| stated.pct.map(|pct| (1.0 + pct / 100.0).max(0.0))),
        }
    }
}

/// A level's change, month by month, January first.
#[derive(Debug, Clone, PartialEq)]
pub struct MonthlyChange {
    /// Added to daily minima, degC.
    pub tmin_c: [f64; 12],
    /// Added to daily maxima, degC.
    pub tmax_c: [f64; 12],
    /// Times precipitation.
    pub precipitation_factor: [f64; 12],
}

impl MonthlyChange {
    /// No change.
    pub const NONE: Self = Self { tmin_c: [0.0; 12], tmax_c: [0.0; 12], precipitation_factor: [1.0; 12] };

    /// The same with all precipitation changed by so many percent more.
    pub fn with_precipitation(&self, pct: f64) -> Self {
        let precipitation_factor = self.precipitation_factor.map(|factor| factor * (1.0 + pct / 100.0));
        Self { precipitation_factor, ..self.clone() }
    }

    /// What it does to temperatures, precipitation as it was.
    pub fn of_temperatures(&self) -> Self {
        Self { precipitation_factor: Self::NONE.precipitation_factor, ..self.clone() }
    }
}

impl Warming {
    /// The change at a level of `level_c` degC of any sign: `w*m(month)` on temperatures, the stated factor on
    /// precipitation.
    pub fn at(&self, level_c: f64) -> MonthlyChange {
        MonthlyChange {
            tmin_c: self.tmin_monthly_shape.map(|shape| level_c * shape),
            tmax_c: self.tmax_monthly_shape.map(|shape| level_c * shape),
            precipitation_factor: self.precipitation.factor(level_c),
        }
    }

    /// What a level does to wet days, where their intensity changes: `(1 + q/100)^w` on what they bring, and the level's
    /// factor on the mean.
    pub fn wet_days_at(&self, level_c: f64) -> Option<WetDayChange> {
        let pct_per_c = self.wet_day_intensity_pct_per_c?;
        Some(WetDayChange {
            amount_factor: libm::pow(1.0 + pct_per_c / 100.0, level_c),
            mean_factor: self.precipitation.factor(level_c),
        })
    }

    /// Mean of a monthly shape over the days of a common year; 1 where the level is what the year warms by.
    pub fn yearly_mean(shape: &[f64; 12]) -> f64 {
        const DAYS: [f64; 12] = [31.0, 28.0, 31.0, 30.0, 31.0, 30.0, 31.0, 31.0, 30.0, 31.0, 30.0, 31.0];
        shape.iter().zip(DAYS).map(|(value, days)| value * days).sum::<f64>() / 365.0
    }
}
