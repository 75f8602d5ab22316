//! Days of the year in a scenario: `MM-DD`, alone or in pairs.

use super::section::Section;
use crate::calendar::MonthDay;
use crate::fault::Fault;
use toml::de::DeValue;

impl Section<'_> {
    /// A day of the year written `MM-DD`, if one was typed.
    pub fn day(&mut self, key: &'static str) -> Option<MonthDay> {
        let text = self.text(key)?;
        self.parse_day(key, text)
    }

    /// Reads `MM-DD`; `key` is where it was typed.
    pub fn parse_day(&self, key: &str, text: &str) -> Option<MonthDay> {
        let day = MonthDay::parse(text);
        if day.is_none() {
            self.fault(Fault::key(
                self.path_of(key),
                format!("{text:?}"),
                "a day that every year has, as \"MM-DD\"",
                "write 1 April as \"04-01\"",
            ));
        }
        day
    }

    /// Lists of two days each, if they were typed.
    pub fn day_pairs(&mut self, key: &'static str) -> Option<Vec<[MonthDay; 2]>> {
        let value = self.value(key)?;
        let expected = "pairs of days, [[\"04-01\", \"07-31\"]]";
        let DeValue::Array(array) = value else {
            self.wrong_type(key, value, expected);
            return None;
        };
        let mut pairs = Vec::with_capacity(array.len());
        for (at, element) in array.iter().enumerate() {
            let texts: Option<Vec<&str>> = match element.get_ref() {
                DeValue::Array(pair) => pair.iter().map(|day| day.get_ref().as_str()).collect(),
                _ => None,
            };
            let place = format!("{key}[{at}]");
            match texts.as_deref() {
                Some([from, to]) => {
                    let days = [self.parse_day(&place, from), self.parse_day(&place, to)];
                    if let [Some(from), Some(to)] = days {
                        pairs.push([from, to]);
                    }
                }
                _ => self.wrong_type(&place, element.get_ref(), expected),
            }
        }
        (pairs.len() == array.len()).then_some(pairs)
    }
}
