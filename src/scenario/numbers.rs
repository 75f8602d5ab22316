//! Numbers of a scenario's table: alone, in lists, within ranges.

use super::section::{Section, described};
use crate::fault::Fault;
use std::ops::RangeInclusive;
use toml::de::DeValue;

/// A number, a list of numbers, or a list of such lists.
#[derive(Debug, Clone, PartialEq)]
pub(super) enum Nested {
    One(f64),
    List(Vec<f64>),
    Lists(Vec<Vec<f64>>),
}

impl Section<'_> {
    /// A number, if one was typed; NaN and infinities are faults.
    pub fn number(&mut self, key: &'static str) -> Option<f64> {
        let value = self.value(key)?;
        let number = finite(value);
        if number.is_none() {
            self.wrong_type(key, value, "a number");
        }
        number
    }

    /// A number within a range, or its default.
    pub fn number_or(
        &mut self,
        key: &'static str,
        default: f64,
        range: RangeInclusive<f64>,
        mend: &str,
    ) -> f64 {
        if !self.has(key) {
            self.value(key);
            self.default(key, default);
            return default;
        }
        self.number_in(key, range, mend).unwrap_or(default)
    }

    /// A number within a range, if one was typed.
    pub fn number_in(&mut self, key: &'static str, range: RangeInclusive<f64>, mend: &str) -> Option<f64> {
        let number = self.number(key)?;
        if range.contains(&number) {
            return Some(number);
        }
        let expected = format!("a number from {} to {}", range.start(), range.end());
        self.fault(Fault::key(self.path_of(key), number, expected, mend));
        None
    }

    /// A number within a range that must be there.
    pub fn required_number(
        &mut self,
        key: &'static str,
        range: RangeInclusive<f64>,
        mend: &str,
    ) -> Option<f64> {
        if !self.has(key) {
            self.value(key);
            self.missing(key, "a number", &format!("add it: {mend}"));
            return None;
        }
        self.number_in(key, range, mend)
    }

    /// A whole number within a range, or its default.
    pub fn whole_or(&mut self, key: &'static str, default: u64, range: RangeInclusive<u64>) -> u64 {
        if !self.has(key) {
            self.knows(key);
            self.default(key, default);
            return default;
        }
        self.whole_in(key, range, default).unwrap_or(default)
    }

    /// A whole number within a range, if one was typed.
    pub fn whole_in(&mut self, key: &'static str, range: RangeInclusive<u64>, example: u64) -> Option<u64> {
        let value = self.value(key)?;
        let whole = match value {
            DeValue::Integer(integer) => u64::from_str_radix(integer.as_str(), integer.radix()).ok(),
            _ => None,
        };
        let whole = whole.filter(|whole| range.contains(whole));
        if whole.is_none() {
            let expected = format!("a whole number from {} to {}", range.start(), range.end());
            let mend = format!("for example {example}");
            self.fault(Fault::key(self.path_of(key), described(value), expected, mend));
        }
        whole
    }

    /// A list of numbers, if one was typed.
    pub fn numbers(&mut self, key: &'static str) -> Option<Vec<f64>> {
        let value = self.value(key)?;
        let DeValue::Array(array) = value else {
            self.wrong_type(key, value, "a list of numbers");
            return None;
        };
        let mut numbers = Vec::with_capacity(array.len());
        for (at, element) in array.iter().enumerate() {
            match finite(element.get_ref()) {
                Some(number) => numbers.push(number),
                None => self.wrong_type(&format!("{key}[{at}]"), element.get_ref(), "a number"),
            }
        }
        (numbers.len() == array.len()).then_some(numbers)
    }

    /// A number, a list of numbers or a list of lists of numbers, if one was typed.
    pub fn nested_numbers(&mut self, key: &'static str) -> Option<Nested> {
        const EXPECTED: &str = "a number, a list of numbers, or a list of lists of numbers";
        let value = self.value(key)?;
        let list = |value: &DeValue<'_>| match value {
            DeValue::Array(array) => array.iter().map(|element| finite(element.get_ref())).collect(),
            _ => None,
        };
        let nested = match value {
            DeValue::Array(array) if array.iter().any(|element| element.get_ref().is_array()) => {
                array.iter().map(|element| list(element.get_ref())).collect::<Option<_>>().map(Nested::Lists)
            }
            DeValue::Array(_) => list(value).map(Nested::List),
            other => finite(other).map(Nested::One),
        };
        if nested.is_none() {
            self.wrong_type(key, value, EXPECTED);
        }
        nested
    }

    /// A list of years, if one was typed.
    pub fn years(&mut self, key: &'static str) -> Option<Vec<i32>> {
        const POSSIBLE: RangeInclusive<f64> = 1500.0..=2500.0;
        let numbers = self.numbers(key)?;
        let is_year = |number: &f64| POSSIBLE.contains(number) && number.fract() == 0.0;
        if let Some(other) = numbers.iter().find(|number| !is_year(number)) {
            let mend = format!("for example {key} = [1986, 1998]");
            self.fault(Fault::key(
                self.path_of(key),
                other,
                "water years, each named for the year in which it ends",
                mend,
            ));
            return None;
        }
        Some(numbers.into_iter().map(|number| number as i32).collect())
    }

    /// Twelve numbers, January first, or one for all months, if they were typed; `more` is what else may be meant.
    pub fn one_or_monthly(&mut self, key: &'static str, more: &str) -> Option<[f64; 12]> {
        const EXPECTED: &str = "one number, or twelve, January first";
        let value = self.value(key)?;
        let more = if more.is_empty() { String::new() } else { format!("; {more}") };
        if let DeValue::Array(_) = value {
            return self.twelve(key, EXPECTED, &format!("give one a month, or one alone{more}"));
        }
        let number = finite(value);
        if number.is_none() {
            let text = value.as_str().and_then(|text| text.trim().parse::<f64>().ok());
            let mend = match text {
                Some(number) => format!("take the quotes away: {key} = {number}"),
                None => format!("write {key} = ..., or twelve numbers in [ ]{more}"),
            };
            self.fault(Fault::key(self.path_of(key), described(value), EXPECTED, mend));
        }
        number.map(|number| [number; 12])
    }

    /// Twelve numbers, January first, if they were typed.
    pub fn monthly(&mut self, key: &'static str) -> Option<[f64; 12]> {
        self.twelve(key, "twelve numbers, January first", "give one a month")
    }

    fn twelve(&mut self, key: &'static str, expected: &str, mend: &str) -> Option<[f64; 12]> {
        let numbers = self.numbers(key)?;
        let found = numbers.len();
        let twelve = <[f64; 12]>::try_from(numbers).ok();
        if twelve.is_none() {
            self.fault(Fault::key(self.path_of(key), format!("{found} numbers"), expected, mend));
        }
        twelve
    }
}

fn finite(value: &DeValue<'_>) -> Option<f64> {
    match value {
        DeValue::Integer(integer) => {
            i64::from_str_radix(integer.as_str(), integer.radix()).ok().map(|n| n as f64)
        }
        DeValue::Float(float) => float.as_str().parse().ok(),
        _ => None,
    }
    .filter(|number: &f64| number.is_finite())
}
