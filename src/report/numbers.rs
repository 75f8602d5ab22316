//! Numbers as people read them: rounded to what they can bear, with a true minus, dates by name.

use crate::calendar::{MONTHS, WaterYearStart, date_of};
use chrono::Datelike;
use serde::Serialize;

/// The word for a number that is not there.
pub const DASH: &str = "–";

/// 10 to the power of each number of decimals.
const POWERS_OF_TEN: [f64; 7] = [1.0, 1e1, 1e2, 1e3, 1e4, 1e5, 1e6];

/// How many decimals a number has by its size.
#[derive(Debug, Clone, Copy, Serialize)]
pub struct Decimals {
    /// Those of sizes below a limit, the lowest limit first.
    pub below: &'static [(f64, usize)],
    /// Those of all others.
    pub otherwise: usize,
}

impl Decimals {
    /// Of a number.
    pub fn of(self, value: f64) -> usize {
        let size = value.abs();
        self.below.iter().find(|(limit, _)| size < *limit).map_or(self.otherwise, |(_, decimals)| *decimals)
    }
}

/// A number with so many decimals (at most six), halves rounded away from zero, a true minus, no minus before zero, and thousands set apart by a thin space.
pub fn fixed(value: f64, decimals: usize) -> String {
    #[cfg(test)]
    said::note(value);
    let scale = POWERS_OF_TEN.get(decimals).copied().unwrap_or(1.0);
    let text = format!("{:.decimals$}", (value.abs() * scale).round() / scale);
    let is_zero = text.bytes().all(|byte| byte == b'0' || byte == b'.');
    let (whole, fraction) = text.split_at(text.find('.').unwrap_or(text.len()));
    let mut grouped = String::new();
    for (at, digit) in whole.chars().enumerate() {
        if at > 0 && (whole.len() - at) % 3 == 0 && whole.len() > 4 {
            grouped.push('\u{2009}');
        }
        grouped.push(digit);
    }
    let sign = if value < 0.0 && !is_zero { "−" } else { "" };
    format!("{sign}{grouped}{fraction}")
}

/// The same with a plus before what is above zero.
pub fn signed(value: f64, decimals: usize) -> String {
    let text = fixed(value, decimals);
    let is_zero = text.chars().all(|c| c == '0' || c == '.');
    if value > 0.0 && !is_zero { format!("+{text}") } else { text }
}

/// An error beside a number: one figure or two, `0.04`, `0.9`, `2.7`, `17`.
pub fn precision(error: f64) -> String {
    let decimals = [9.5, 0.95, 0.095].iter().filter(|limit| error < **limit).count();
    if error > 0.0 && error < 0.0005 { "< 0.001".to_owned() } else { fixed(error, decimals) }
}

/// The number without zeros at the end of its decimals: `3.60` as `3.6`, `2.00` as `2`.
pub fn trimmed(number: &str) -> &str {
    if number.contains('.') { number.trim_end_matches('0').trim_end_matches('.') } else { number }
}

/// A stated number in as few decimals as come within a hundredth of it: `30`, `0.3`, `0.0039`; `0` of nothing.
pub fn stated(value: f64) -> String {
    let near = |decimals: &usize| {
        let power = POWERS_OF_TEN[*decimals];
        ((value * power).round() / power - value).abs() <= 0.01 * value.abs()
    };
    trimmed(&fixed(value, (0..6).find(near).unwrap_or(6))).to_owned()
}

/// `14 May`: the date of a day of the water year in a year of 365 days, to the nearest whole day.
pub fn date(day: f64, starts: WaterYearStart) -> String {
    #[cfg(test)]
    said::note(day);
    let date = date_of(starts.first_day(2002), day.round().max(1.0) as usize);
    format!("{} {}", date.day(), MONTHS[date.month0() as usize])
}

/// `1 band`, `10 bands`.
pub fn counted(count: usize, one: &str) -> String {
    format!("{} {one}{}", fixed(count as f64, 0), if count == 1 { "" } else { "s" })
}

/// `12 days earlier`, `1 day later`, `no change to the day`.
pub fn days_moved(days: f64) -> String {
    #[cfg(test)]
    said::note(days);
    let whole = days.abs().round();
    match (whole, days < 0.0) {
        (0.0, _) => "unchanged to the day".to_owned(),
        (1.0, true) => "1 day earlier".to_owned(),
        (1.0, false) => "1 day later".to_owned(),
        (_, true) => format!("{whole} days earlier"),
        (_, false) => format!("{whole} days later"),
    }
}

/// Every number that was put into words on this thread, before it was rounded: for the test that holds words to the
/// summary.
#[cfg(test)]
pub mod said {
    use std::cell::RefCell;

    thread_local!(static SAID: RefCell<Vec<f64>> = const { RefCell::new(Vec::new()) });

    /// Notes a number.
    pub fn note(value: f64) {
        SAID.with_borrow_mut(|said| said.push(value));
    }

    /// Takes all that has been said since the last time.
    pub fn take() -> Vec<f64> {
        SAID.take()
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::calendar::MonthDay;

    /// By hand: 0.1 mm are 0.003937 in, 0.0039 within a hundredth of it; 0.5 mm are 0.01969 in.
    #[test]
    fn stated_numbers_have_the_decimals_that_they_need() {
        let said = [30.0, 0.3, 0.0, 0.1 / 25.4, 0.5 / 25.4, 12.5, 2e-6].map(stated);
        assert_eq!(said, ["30", "0.3", "0", "0.0039", "0.0197", "12.5", "0.000002"]);
    }

    #[test]
    fn numbers_read_well() {
        assert_eq!(fixed(-0.04, 1), "0.0", "no minus before zero");
        assert_eq!(fixed(-12_345.6, 0), "−12\u{2009}346");
        assert_eq!(signed(0.0, 0), "0");
        assert_eq!(signed(-6.5, 0), "−7", "as days_moved rounds");
        assert_eq!(["3.60", "+2.00", "10", "0.0"].map(trimmed), ["3.6", "+2", "10", "0"]);
        assert_eq!(
            [17.4, 2.71, 0.94, 0.04, 0.0004, 0.0].map(precision),
            ["17", "2.7", "0.94", "0.040", "< 0.001", "0.000"]
        );
        assert_eq!(days_moved(-0.6), "1 day earlier");
        let october = WaterYearStart(MonthDay::new(10, 1).unwrap());
        assert_eq!(date(183.0, october), "1 April");
    }
}
