//! Volumes and flows of a scenario, in the unit whose key was typed: `capacity_hm3` or `capacity_thousand_acre_feet`.

use super::section::Section;
use crate::fault::Fault;
use crate::units::{FlowUnit, acre_feet};

/// Units of a volume, each by the end of its key, and what one of it is in hm3.
fn volume_units() -> [(&'static str, f64); 2] {
    [("hm3", 1.0), ("thousand_acre_feet", 1000.0 / acre_feet(1.0))]
}

/// Units of a volume a month or a rate, each by the end of its key, and what one of it is in hm3 a day of a month.
fn flow_units() -> [(&'static str, [f64; 12]); 5] {
    let a_month = |hm3: f64| DAYS_OF_MONTHS.map(|days| hm3 / days);
    let a_day = |unit: FlowUnit| [unit.to_hm3_a_day(1.0); 12];
    let [(hm3, one_hm3), (acre_feet, one_acre_feet)] = volume_units();
    debug_assert_eq!((hm3, acre_feet), ("hm3", "thousand_acre_feet"));
    [
        ("hm3_per_month", a_month(one_hm3)),
        ("thousand_acre_feet_per_month", a_month(one_acre_feet)),
        ("m3_per_s", a_day(FlowUnit::CubicMetrePerSecond)),
        ("cfs", a_day(FlowUnit::CubicFootPerSecond)),
        ("hm3_per_day", a_day(FlowUnit::CubicHectometrePerDay)),
    ]
}

/// What one of the unit at a key's end is in hm3 a day of each month.
fn factors_of(key: &str) -> Option<[f64; 12]> {
    flow_units().into_iter().find(|(unit, _)| key.ends_with(&format!("_{unit}"))).map(|(_, factors)| factors)
}

/// Days of a common year's months: 29 February asks for as much as the day before it.
const DAYS_OF_MONTHS: [f64; 12] = [31.0, 28.0, 31.0, 30.0, 31.0, 30.0, 31.0, 31.0, 30.0, 31.0, 30.0, 31.0];

/// A quantity that is stated under one of several keys.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Stated<T> {
    /// The key that was typed, with its unit.
    pub key: &'static str,
    /// What was typed, in the key's unit.
    pub typed: T,
    /// Its value, in hm3 or hm3 a day.
    pub value: T,
}

impl Section<'_> {
    /// A volume, hm3, under one of the keys for its units, `[hm3, thousand acre-feet]`; none where none was typed.
    pub fn volume(&mut self, keys: [&'static str; 2]) -> Option<Stated<f64>> {
        let at = self.one_of(&keys)?;
        let typed = self.number(keys[at])?;
        Some(Stated { key: keys[at], typed, value: typed * volume_units()[at].1 })
    }

    /// Volumes, hm3, likewise.
    pub fn volumes(&mut self, keys: [&'static str; 2]) -> Option<Stated<Vec<f64>>> {
        let at = self.one_of(&keys)?;
        let typed = self.numbers(keys[at])?;
        let value = typed.iter().map(|typed| typed * volume_units()[at].1).collect();
        Some(Stated { key: keys[at], typed, value })
    }

    /// What flows in a day of each month, hm3, under one of the keys, each with the unit at its end: one number or twelve, January
    /// first; none where none was typed.
    pub fn flow(&mut self, keys: &[&'static str]) -> Option<Stated<[f64; 12]>> {
        let at = self.one_of(keys)?;
        let typed = self.one_or_monthly(keys[at], "")?;
        let mut value = factors_of(keys[at])?;
        value.iter_mut().zip(typed).for_each(|(value, typed)| *value *= typed);
        Some(Stated { key: keys[at], typed, value })
    }

    /// A flow that is the same in every month, hm3 a day, likewise: one number.
    pub fn even_flow(&mut self, keys: &[&'static str]) -> Option<Stated<f64>> {
        let at = self.one_of(keys)?;
        let typed = self.number(keys[at])?;
        Some(Stated { key: keys[at], typed, value: typed * factors_of(keys[at])?[0] })
    }

    /// Which of the keys was typed; a fault where more than one was.
    fn one_of(&mut self, keys: &[&'static str]) -> Option<usize> {
        keys.iter().for_each(|key| self.knows(key));
        let typed: Vec<usize> = (0..keys.len()).filter(|at| self.has(keys[*at])).collect();
        match typed.as_slice() {
            [] => None,
            [at] => Some(*at),
            [first, second, ..] => {
                self.fault(Fault::key(
                    self.path_of(keys[*second]),
                    format!("{} beside {}", keys[*second], keys[*first]),
                    "one of the two",
                    "take one of them out",
                ));
                None
            }
        }
    }
}
