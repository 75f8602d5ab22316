//! Axes: round ticks for amounts, months for days of the water year.

use super::labels::{date_of, grouped};
use crate::calendar::{MONTHS, WaterYearStart};
use chrono::Datelike;
use std::ops::Range;

/// Ticks from 0 upwards, a step of 1, 2 or 5 times a power of ten apart.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct AmountTicks {
    /// Value and label of each tick; the last value ends the axis.
    pub ticks: Vec<(f64, String)>,
}

impl AmountTicks {
    /// Ticks up to the first that is not below `highest`, with at most `steps` steps.
    pub fn up_to(highest: f64, steps: usize) -> Self {
        let highest = if highest.is_finite() && highest > 0.0 { highest } else { 1.0 };
        let power = libm::floor(libm::log10(highest / steps as f64)) as i32;
        let (mantissa, power) = [(1, power), (2, power), (5, power), (10, power), (20, power)]
            .into_iter()
            .find(|(mantissa, power)| highest <= value(*mantissa * steps as i64, *power))
            .unwrap_or((50, power));
        let count =
            (1..=steps).find(|count| value(mantissa * *count as i64, power) >= highest).unwrap_or(steps);
        let step = value(mantissa, power);
        let decimals = (0..9)
            .find(|decimals| {
                let scaled = step * value(1, *decimals);
                (scaled - scaled.round()).abs() < 1e-9 * scaled.max(1.0) && scaled >= 0.5
            })
            .unwrap_or(9);
        let ticks = (0..=count)
            .map(|at| {
                let tick = value(mantissa * at as i64, power);
                (tick, grouped(tick, decimals as usize))
            })
            .collect();
        Self { ticks }
    }

    /// Where the axis ends.
    pub fn top(&self) -> f64 {
        self.ticks.last().map_or(1.0, |(value, _)| *value)
    }
}

/// `mantissa * 10^power` without the error of a repeated sum.
pub(super) fn value(mantissa: i64, power: i32) -> f64 {
    let ten = libm::pow(10.0, f64::from(power.abs()));
    if power < 0 { mantissa as f64 / ten } else { mantissa as f64 * ten }
}

/// A part of the water year as a calendar.
#[derive(Debug, Clone)]
pub(super) struct Calendar {
    starts: WaterYearStart,
    /// Days of the water year that are shown.
    pub days: Range<f64>,
}

/// A month on the axis.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Month {
    /// Its name.
    pub name: &'static str,
    /// The part of it that is shown, in days of the water year.
    pub days: Range<f64>,
    /// Whether its first day is shown.
    pub begins: bool,
}

impl Month {
    /// Whether all its days are shown.
    pub fn is_whole(&self) -> bool {
        self.days.end - self.days.start > 27.5
    }
}

impl Calendar {
    /// Shows all these days, and at least `least` of them.
    pub fn around(days: Range<f64>, least: f64, starts: WaterYearStart) -> Self {
        let span = days.end - days.start;
        let pad = ((least - span) / 2.0).max(0.04 * span);
        Self { starts, days: days.start - pad..days.end + pad }
    }

    /// Shows these days and no others.
    pub fn exactly(days: Range<f64>, starts: WaterYearStart) -> Self {
        Self { starts, days }
    }

    /// The months that are shown, in order.
    pub fn months(&self) -> Vec<Month> {
        let mut months: Vec<Month> = Vec::new();
        let (from, to) = (self.days.start.floor() as i64, self.days.end.floor() as i64);
        for day in from..=to {
            let date = date_of(self.starts, day as f64);
            let begins = date.day() == 1 && day as f64 >= self.days.start;
            if let (false, Some(month)) = (begins, months.last_mut()) {
                month.days.end = (day as f64 + 1.0).min(self.days.end);
            } else {
                months.push(Month {
                    name: MONTHS[date.month0() as usize],
                    days: (day as f64).max(self.days.start)..(day as f64 + 1.0).min(self.days.end),
                    begins,
                });
            }
        }
        months
    }

    /// The 11th and 21st of the months shown, in days of the water year.
    pub fn thirds(&self) -> Vec<f64> {
        let (from, to) = (self.days.start.ceil() as i64, self.days.end.floor() as i64);
        (from..=to)
            .map(|day| day as f64)
            .filter(|day| matches!(date_of(self.starts, *day).day(), 11 | 21))
            .collect()
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::calendar::MonthDay;

    fn labels(highest: f64) -> Vec<String> {
        AmountTicks::up_to(highest, 6).ticks.into_iter().map(|(_, label)| label).collect()
    }

    #[test]
    fn ticks_are_round_and_few() {
        assert_eq!(labels(512.0), ["0", "100", "200", "300", "400", "500", "600"]);
        assert_eq!(
            labels(12_000.0),
            [
                "0",
                "2\u{2009}000",
                "4\u{2009}000",
                "6\u{2009}000",
                "8\u{2009}000",
                "10\u{2009}000",
                "12\u{2009}000"
            ]
        );
        assert_eq!(labels(0.3), ["0.00", "0.05", "0.10", "0.15", "0.20", "0.25", "0.30"]);
        assert_eq!(labels(0.0), labels(1.0));
        assert_eq!(labels(f64::NAN), labels(1.0));
    }

    #[test]
    fn ticks_reach_every_highest_value() {
        for highest in (1..4000).map(|n| f64::from(n) * 0.37) {
            let ticks = AmountTicks::up_to(highest, 6).ticks;
            assert!((3..=7).contains(&ticks.len()), "{highest}: {ticks:?}");
            assert!(ticks.last().unwrap().0 >= highest, "{highest}: {ticks:?}");
            assert!(ticks[ticks.len() - 2].0 < highest, "{highest}: {ticks:?}");
        }
    }

    #[test]
    fn months_follow_the_water_year() {
        let october = WaterYearStart(MonthDay::new(10, 1).unwrap());
        let calendar = Calendar { starts: october, days: 180.5..250.0 };
        let months = calendar.months();
        let names: Vec<&str> = months.iter().map(|month| month.name).collect();
        assert_eq!(names, ["March", "April", "May", "June"]);
        assert_eq!(months[1].days, 183.0..213.0);
        assert!(!months[0].begins && months[1].begins);
        assert_eq!(calendar.thirds(), [193.0, 203.0, 223.0, 233.0]);
        let southern = Calendar::around(200.0..210.0, 40.0, WaterYearStart(MonthDay::new(4, 1).unwrap()));
        assert_eq!(southern.days, 185.0..225.0);
        assert_eq!(southern.months()[0].name, "October");
    }
}
