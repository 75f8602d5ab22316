//! Ticks over a range that need not begin at 0: temperatures, errors, values of a parameter.

use super::axes::value;
use super::labels::grouped;

/// An end of a range this near to a tick, in steps, is on it.
const ROUNDING: f64 = 1e-9;

/// Ticks a step of 1, 2 or 5 times a power of ten apart.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct ValueTicks {
    /// Value and label of each tick, ascending.
    pub ticks: Vec<(f64, String)>,
}

impl ValueTicks {
    /// Ticks inside a range, its ends included, with at most `steps` steps.
    pub fn within(low: f64, high: f64, steps: usize) -> Self {
        Self::of([low, high], steps, libm::ceil, libm::floor)
    }

    /// The same, and on each side the first beyond the range, unless its end has one.
    pub fn around(low: f64, high: f64, steps: usize) -> Self {
        Self::of([low, high], steps, libm::floor, libm::ceil)
    }

    /// The first and the last.
    pub fn ends(&self) -> [f64; 2] {
        [self.ticks.first(), self.ticks.last()].map(|tick| tick.map_or(0.0, |(value, _)| *value))
    }

    fn of([low, high]: [f64; 2], steps: usize, first: fn(f64) -> f64, last: fn(f64) -> f64) -> Self {
        let (low, high) = if low < high { (low, high) } else { (low - 0.5, low + 0.5) };
        let least = (high - low) / steps as f64;
        let power = libm::floor(libm::log10(least)) as i32;
        let (mantissa, power) = [(1, power), (2, power), (5, power)]
            .into_iter()
            .find(|(mantissa, power)| value(*mantissa, *power) >= least * (1.0 - ROUNDING))
            .unwrap_or((1, power + 1));
        let decimals = power.min(0).unsigned_abs() as usize;
        let step = value(mantissa, power);
        let whole = |share: f64, towards: fn(f64) -> f64| {
            let nearest = share.round();
            if (share - nearest).abs() < ROUNDING { nearest } else { towards(share) }
        };
        let (first, last) = (whole(low / step, first) as i64, whole(high / step, last) as i64);
        let tick = |at: i64| {
            let tick = value(mantissa * at, power);
            (tick, label(tick, decimals))
        };
        let ticks = (first..=last).map(tick).collect();
        Self { ticks }
    }
}

/// A number with a true minus sign.
fn label(value: f64, decimals: usize) -> String {
    let sign = if value < 0.0 { "\u{2212}" } else { "" };
    format!("{sign}{}", grouped(value.abs(), decimals))
}

#[cfg(test)]
mod tests {
    use super::*;

    fn labels(ticks: &ValueTicks) -> Vec<&str> {
        ticks.ticks.iter().map(|(_, label)| label.as_str()).collect()
    }

    /// By hand.
    #[test]
    fn ticks_are_round_inside_a_range_and_around_it() {
        assert_eq!(labels(&ValueTicks::within(1.6, 8.0, 4)), ["2", "4", "6", "8"]);
        assert_eq!(labels(&ValueTicks::within(-1.5, 3.5, 5)), ["−1", "0", "1", "2", "3"]);
        assert_eq!(labels(&ValueTicks::within(0.0, 0.15, 3)), ["0.00", "0.05", "0.10", "0.15"]);
        assert_eq!(labels(&ValueTicks::around(-61.0, 118.0, 4)), ["−100", "−50", "0", "50", "100", "150"]);
        assert_eq!(labels(&ValueTicks::around(-7.3, -2.2, 6)), ["−8", "−7", "−6", "−5", "−4", "−3", "−2"]);
        assert_eq!(
            labels(&ValueTicks::around(-2000.0, 1000.0, 3)),
            ["−2\u{2009}000", "−1\u{2009}000", "0", "1\u{2009}000"]
        );
        assert_eq!(ValueTicks::around(-61.0, 118.0, 4).ends(), [-100.0, 150.0]);
        assert_eq!(labels(&ValueTicks::around(3.0, 3.0, 4)), ["2.5", "3.0", "3.5"]);
    }

    #[test]
    fn every_range_lies_between_the_ticks_around_it() {
        for at in 0..2000 {
            let low = f64::from(at - 900) * 0.37;
            let high = low + 0.013 * f64::from(at % 97 + 1) * f64::from(at % 13 + 1);
            let [first, last] = ValueTicks::around(low, high, 5).ends();
            assert!(first <= low + 1e-9 && high <= last + 1e-9, "{low} to {high}: {first} to {last}");
            let inside = ValueTicks::within(low, high, 5).ticks;
            assert!((2..=6).contains(&inside.len()), "{low} to {high}: {inside:?}");
        }
    }
}
