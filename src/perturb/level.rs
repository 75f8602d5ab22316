//! Warming levels: an offset and a factor for each month (method, section 3).

use serde::Serialize;

/// How warming is spread over months and what precipitation does with it; the same for every level of a study.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Warming {
    /// Warming of each month per degree of the level, for daily minima, January first.
    pub tmin_monthly_shape: [f64; 12],
    /// The same for daily maxima.
    pub tmax_monthly_shape: [f64; 12],
    /// Change of precipitation, percent per degC, compounded.
    pub precipitation_change_pct_per_c: f64,
}

impl Default for Warming {
    /// The same in every month; precipitation stays.
    fn default() -> Self {
        Self {
            tmin_monthly_shape: [1.0; 12],
            tmax_monthly_shape: [1.0; 12],
            precipitation_change_pct_per_c: 0.0,
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
}

impl Warming {
    /// The change at a level of `level_c` degC of any sign: `w*m(month)` on temperatures and
    /// `(1 + p/100)^w` on precipitation.
    pub fn at(&self, level_c: f64) -> MonthlyChange {
        let factor = libm::pow(1.0 + self.precipitation_change_pct_per_c / 100.0, level_c);
        MonthlyChange {
            tmin_c: self.tmin_monthly_shape.map(|shape| level_c * shape),
            tmax_c: self.tmax_monthly_shape.map(|shape| level_c * shape),
            precipitation_factor: [factor; 12],
        }
    }

    /// Mean of a monthly shape over the days of a common year; 1 where the level is what the year warms by.
    pub fn yearly_mean(shape: &[f64; 12]) -> f64 {
        const DAYS: [f64; 12] = [31.0, 28.0, 31.0, 30.0, 31.0, 30.0, 31.0, 31.0, 30.0, 31.0, 30.0, 31.0];
        shape.iter().zip(DAYS).map(|(value, days)| value * days).sum::<f64>() / 365.0
    }
}
