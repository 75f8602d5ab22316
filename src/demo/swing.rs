//! Numbers that swing once a year between a winter and a summer value.

use std::f64::consts::TAU;

/// Mean length of a year, days.
const YEAR_DAYS: f64 = 365.25;

/// Midwinter in the north: 20 January, a month after the shortest day, as air temperature lags behind the sun.
pub const NORTHERN_MIDWINTER_DAY: f64 = 20.0;
/// Midwinter in the south: 21 July.
pub const SOUTHERN_MIDWINTER_DAY: f64 = 202.0;

/// A number that changes along a cosine between its value in midwinter and its value half a year later.
#[derive(Debug, Clone, Copy)]
pub struct Swing {
    /// Value in midwinter.
    winter: f64,
    /// Value in midsummer.
    summer: f64,
}

impl Swing {
    /// A number between two values, reached in midwinter and midsummer.
    pub const fn between(winter: f64, summer: f64) -> Self {
        Self { winter, summer }
    }

    /// Value so many days after midwinter, of any sign.
    pub fn at(self, days_after_midwinter: f64) -> f64 {
        let turn = days_after_midwinter / YEAR_DAYS * TAU;
        (self.winter + self.summer) / 2.0 + (self.winter - self.summer) / 2.0 * libm::cos(turn)
    }
}
