//! Heights of a scenario in metres, or in feet for who has them so: `station_elevation_m` or `station_elevation_ft`.

use super::section::Section;
use crate::fault::Fault;
use crate::units::LengthUnit;
use std::ops::RangeInclusive;

/// A height that is stated under one of two keys.
pub(super) struct Height {
    /// The key for metres.
    pub metres: &'static str,
    /// The key for feet.
    pub feet: &'static str,
    /// What can be meant, m.
    pub range_m: RangeInclusive<f64>,
    /// What it is measured from, for example " above the sea".
    pub from: &'static str,
    /// More on how to choose it.
    pub hint: &'static str,
}

impl Height {
    /// The elevation of a station or a site.
    pub const fn above_the_sea(metres: &'static str, feet: &'static str) -> Self {
        Self { metres, feet, range_m: -500.0..=9000.0, from: " above the sea", hint: "" }
    }
}

impl Section<'_> {
    /// A height that must be there, in m, under one of its two keys.
    pub fn required_height(&mut self, height: &Height) -> Option<f64> {
        let Height { metres, feet, range_m, from, hint } = height;
        let is_in = |value_m: f64| range_m.contains(&value_m);
        match (self.has(metres), self.has(feet)) {
            (true, true) => {
                self.knows(metres);
                self.knows(feet);
                let found = format!("{feet} beside {metres}");
                self.fault(Fault::key(self.path_of(feet), found, "one of the two", "take one of them out"));
                None
            }
            (false, true) => {
                self.knows(metres);
                let value = self.number(feet)?;
                let value_m = LengthUnit::Foot.to_metres(value);
                if is_in(value_m) {
                    return Some(value_m);
                }
                let [least, most] = [range_m.start(), range_m.end()].map(|end_m| in_feet(*end_m));
                let expected = format!("a number from {least} to {most}");
                let mend = if is_in(value) && value_m < *range_m.start() {
                    format!("in feet{from}; if it is in metres, write {metres} = {value}")
                } else {
                    format!("in feet{from}{hint}")
                };
                self.fault(Fault::key(self.path_of(feet), value, expected, mend));
                None
            }
            (_, false) => {
                self.knows(feet);
                if !self.has(metres) {
                    self.knows(metres);
                    let mend = format!("add it, in metres{from}{hint}; or {feet}, in feet");
                    self.missing(metres, "a number", &mend);
                    return None;
                }
                let value = self.number(metres)?;
                if is_in(value) {
                    return Some(value);
                }
                let value_m = LengthUnit::Foot.to_metres(value);
                let expected = format!("a number from {} to {}", range_m.start(), range_m.end());
                let mend = if is_in(value_m) {
                    format!("in metres{from}: {value} ft is {value_m:.0} m, or write {feet} = {value}")
                } else {
                    format!("in metres{from}{hint}")
                };
                self.fault(Fault::key(self.path_of(metres), value, expected, mend));
                None
            }
        }
    }
}

/// Metres as whole feet.
fn in_feet(value_m: f64) -> f64 {
    (value_m / LengthUnit::Foot.to_metres(1.0)).round()
}
