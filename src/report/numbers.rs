//! Numbers as people read them: rounded to what they can bear, with a true minus, dates by name.

use crate::calendar::{MONTHS, WaterYearStart, date_of};
use chrono::Datelike;

/// The word for a number that is not there.
pub const DASH: &str = "–";

/// A number with so many decimals (at most three), halves rounded away from zero, a true minus, no minus before zero, and thousands set apart by a thin space.
pub fn fixed(value: f64, decimals: usize) -> String {
    let scale = [1.0, 10.0, 100.0, 1000.0].get(decimals).copied().unwrap_or(1.0);
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

/// The number without zeros at the end of its decimals: `3.60` as `3.6`, `2.00` as `2`.
pub fn trimmed(number: &str) -> &str {
    if number.contains('.') { number.trim_end_matches('0').trim_end_matches('.') } else { number }
}

/// `14 May`: the date of a day of the water year in a year of 365 days, to the nearest whole day.
pub fn date(day: f64, starts: WaterYearStart) -> String {
    let date = date_of(starts.first_day(2002), day.round().max(1.0) as usize);
    format!("{} {}", date.day(), MONTHS[date.month0() as usize])
}

/// `1 band`, `10 bands`.
pub fn counted(count: usize, one: &str) -> String {
    format!("{} {one}{}", fixed(count as f64, 0), if count == 1 { "" } else { "s" })
}

/// `12 days earlier`, `1 day later`, `no change to the day`.
pub fn days_moved(days: f64) -> String {
    let whole = days.abs().round();
    match (whole, days < 0.0) {
        (0.0, _) => "unchanged to the day".to_owned(),
        (1.0, true) => "1 day earlier".to_owned(),
        (1.0, false) => "1 day later".to_owned(),
        (_, true) => format!("{whole} days earlier"),
        (_, false) => format!("{whole} days later"),
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::calendar::MonthDay;

    #[test]
    fn numbers_read_well() {
        assert_eq!(fixed(-0.04, 1), "0.0", "no minus before zero");
        assert_eq!(fixed(-12_345.6, 0), "−12\u{2009}346");
        assert_eq!(signed(0.0, 0), "0");
        assert_eq!(signed(-6.5, 0), "−7", "as days_moved rounds");
        assert_eq!(["3.60", "+2.00", "10", "0.0"].map(trimmed), ["3.6", "+2", "10", "0"]);
        assert_eq!(days_moved(-0.6), "1 day earlier");
        let october = WaterYearStart(MonthDay::new(10, 1).unwrap());
        assert_eq!(date(183.0, october), "1 April");
    }
}
