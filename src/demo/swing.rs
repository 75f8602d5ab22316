//! Numbers that swing once a year between a winter and a summer value.

use std::f64::consts::TAU;

/// Mean length of a year, days.
const YEAR_DAYS: f64 = 365.25;

/// Day of the year on which the winter value is reached: 20 January, a month after the shortest day, as air
/// temperature lags behind the sun. The summer value stands half a year later.
const WINTER_DAY: f64 = 20.0;

/// A number that changes along a cosine between its value on 20 January and its value on 21 July.
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

    /// Value on a day of the year, 1 to 366.
    pub fn at(self, day_of_year: u32) -> f64 {
        let turn = (f64::from(day_of_year) - WINTER_DAY) / YEAR_DAYS * TAU;
        (self.winter + self.summer) / 2.0 + (self.winter - self.summer) / 2.0 * libm::cos(turn)
    }
}
