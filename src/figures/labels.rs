//! Numbers as figures write them: rounded to what a reader can use, with their unit and a true minus sign.

use crate::basin::Band;
use crate::calendar::{MONTHS, WaterYearStart};
use crate::units::UnitSystem;
use chrono::{Datelike, NaiveDate, TimeDelta};

const MINUS: &str = "\u{2212}";
const THIN_SPACE: char = '\u{2009}';

/// `12 000`, `112`, `4.3`, `0.30`: an amount of water without its sign and unit, to a tenth below 10 mm and a hundredth
/// below 1 mm; to a tenth of an inch and a hundredth below 1 in.
pub(super) fn size(units: UnitSystem, amount_mm: f64) -> String {
    let amount = units.depth().of(amount_mm).abs();
    let decimals = match (units, amount) {
        (_, 0.0) => 0,
        (_, ..0.995) => 2,
        (UnitSystem::Metric, 9.95..) => 0,
        _ => 1,
    };
    grouped(amount, decimals)
}

/// `112 mm`: the same with its unit.
pub(super) fn size_and_unit(units: UnitSystem, amount_mm: f64) -> String {
    format!("{} {}", size(units, amount_mm), units.depth().word)
}

/// `1 240`, `112`, `41.4`, `4.30`: a volume of water without its unit, to three digits.
pub(super) fn volume(units: UnitSystem, volume_hm3: f64) -> String {
    let volume = units.volume().of(volume_hm3);
    let decimals = match volume {
        0.0 => 0,
        ..9.995 => 2,
        ..99.95 => 1,
        _ => 0,
    };
    grouped(volume, decimals)
}

/// `1 800–2 000 m`: an elevation band by its edges.
pub(super) fn band(units: UnitSystem, band: &Band) -> String {
    let [lower, upper] = [band.lower_m, band.upper_m].map(|edge_m| elevation(units, edge_m));
    format!("{lower}–{upper} {}", units.elevation().word)
}

/// `1 800`, `−20`: an elevation without its unit.
pub(super) fn elevation(units: UnitSystem, elevation_m: f64) -> String {
    let elevation = units.elevation().of(elevation_m).round();
    let sign = if elevation < 0.0 { MINUS } else { "" };
    format!("{sign}{}", grouped(elevation.abs(), 0))
}

/// Whether [`size`] writes it as nothing.
pub(super) fn is_nothing(units: UnitSystem, amount_mm: f64) -> bool {
    units.depth().of(amount_mm).abs() < 0.005
}

/// `+12`, `−112`, `0`: a change of an amount of water without its unit.
pub(super) fn signed(units: UnitSystem, change_mm: f64) -> String {
    if is_nothing(units, change_mm) {
        "0".to_owned()
    } else {
        format!("{}{}", sign(change_mm), size(units, change_mm))
    }
}

/// `−27 %`, `+2.3 %`.
pub(super) fn signed_percent(percent: f64) -> String {
    let text = percent_size(percent);
    if text == "0" { "0 %".to_owned() } else { format!("{}{text} %", sign(percent)) }
}

/// `27`, `2.3`, `0`: a percentage without its sign.
pub(super) fn percent_size(percent: f64) -> String {
    match percent.abs() {
        ..0.05 => "0".to_owned(),
        ..9.95 => grouped(percent.abs(), 1),
        _ => grouped(percent.abs(), 0),
    }
}

/// `0.88`, `−0.04`: a score, or anything else to two decimals.
pub(super) fn score(score: f64) -> String {
    let text = grouped(score.abs(), 2);
    if score < 0.0 && text != "0.00" { format!("{MINUS}{text}") } else { text }
}

/// `1 winter`, `24 winters`.
pub(super) fn counted(count: usize, one: &str) -> String {
    format!("{} {one}{}", grouped(count as f64, 0), if count == 1 { "" } else { "s" })
}

/// What a shift comes of: `warming`, or that with the change of precipitation that the study states for its levels.
pub fn cause(levels_change_precipitation: bool) -> &'static str {
    if levels_change_precipitation { "warming with its stated change of precipitation" } else { "warming" }
}

/// `+2 °C`, `−0.9 °F`, `0 °C`: a warming level.
pub(super) fn level(units: UnitSystem, level_c: f64) -> String {
    warming(units, level_c, 100.0)
}

/// `+1.4 °C`: a warming between levels, to a tenth.
pub(super) fn between_levels(units: UnitSystem, warming_c: f64) -> String {
    warming(units, warming_c, 10.0)
}

/// A warming rounded to so many parts of a degree, halves away from zero.
fn warming(units: UnitSystem, warming_c: f64, parts: f64) -> String {
    let unit = units.warming();
    let size = (unit.of(warming_c).abs() * parts).round() / parts;
    let sign = if size == 0.0 { "" } else { sign(warming_c) };
    format!("{sign}{size} {}", unit.word)
}

/// `1.6 ×`.
pub(super) fn times(ratio: f64) -> String {
    format!("{} ×", grouped(ratio, if ratio < 99.95 { 1 } else { 0 }))
}

/// `12 d earlier`, `3 d later`, `same day`.
pub(super) fn days(shift: f64) -> String {
    let whole = grouped(shift.abs().round(), 0);
    match (whole.as_str(), shift < 0.0) {
        ("0", _) => "same day".to_owned(),
        (_, true) => format!("{whole} d earlier"),
        (_, false) => format!("{whole} d later"),
    }
}

/// `12 days earlier`, `1 day later`, `on the same day`.
pub(super) fn days_in_words(shift: f64) -> String {
    let whole = grouped(shift.abs().round(), 0);
    let unit = if whole == "1" { "day" } else { "days" };
    match (whole.as_str(), shift < 0.0) {
        ("0", _) => "on the same day".to_owned(),
        (_, true) => format!("{whole} {unit} earlier"),
        (_, false) => format!("{whole} {unit} later"),
    }
}

/// The date of a day of the water year, counted from 1, in a year without 29 February; days outside the year run on.
pub(super) fn date_of(starts: WaterYearStart, day: f64) -> NaiveDate {
    // No water year that ends in 2002 holds a leap day.
    let first = starts.first_day(2002);
    TimeDelta::try_days(day.round() as i64 - 1)
        .and_then(|days| first.checked_add_signed(days))
        .unwrap_or(first)
}

/// `14 May`.
pub(super) fn day_of_month(starts: WaterYearStart, day: f64) -> String {
    let date = date_of(starts, day);
    format!("{} {}", date.day(), MONTHS[date.month0() as usize])
}

/// The text with a capital at its beginning.
pub fn sentence(text: &str) -> String {
    let mut chars = text.chars();
    chars.next().map_or_else(String::new, |first| first.to_uppercase().chain(chars).collect())
}

/// A number that is not negative, with thin spaces between thousands.
pub(super) fn grouped(number: f64, decimals: usize) -> String {
    let text = format!("{number:.decimals$}");
    let (whole, fraction) = text.split_once('.').unwrap_or((&text, ""));
    let mut grouped = String::new();
    for (at, digit) in whole.chars().enumerate() {
        if at > 0 && (whole.len() - at).is_multiple_of(3) {
            grouped.push(THIN_SPACE);
        }
        grouped.push(digit);
    }
    if !fraction.is_empty() {
        grouped.push('.');
        grouped.push_str(fraction);
    }
    grouped
}

fn sign(number: f64) -> &'static str {
    if number < 0.0 { MINUS } else { "+" }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::calendar::MonthDay;

    #[test]
    fn amounts_are_rounded_to_what_a_reader_can_use() {
        let mm = UnitSystem::Metric;
        let written = [12_000.4, 112.4, 9.96, 9.94, 1.04, 0.996, 0.3, 0.0].map(|amount| size(mm, amount));
        assert_eq!(written, ["12\u{2009}000", "112", "10", "9.9", "1.0", "1.0", "0.30", "0"]);
        assert_eq!(signed(mm, -112.4), "−112");
        assert_eq!(signed(mm, -0.001), "0");
        let written = [30_480.0, 254.0, 25.4, 12.7, 0.0].map(|amount| size(UnitSystem::Us, amount));
        assert_eq!(written, ["1\u{2009}200.0", "10.0", "1.0", "0.50", "0"]);
        assert_eq!([-127.0, 0.1].map(|change| signed(UnitSystem::Us, change)), ["−5.0", "0"]);
        assert_eq!([-26.6, 2.31, -0.01].map(signed_percent), ["−27 %", "+2.3 %", "0 %"]);
    }

    #[test]
    fn volumes_and_bands_are_rounded_to_what_a_reader_can_use() {
        let written =
            [1240.4, 99.96, 41.38, 9.996, 4.34, 0.3, 0.0].map(|hm3| volume(UnitSystem::Metric, hm3));
        assert_eq!(written, ["1\u{2009}240", "100", "41.4", "10.0", "4.34", "0.30", "0"]);
        let of = |lower_m, upper_m| {
            let ground = crate::basin::Ground::default();
            Band { lower_m, upper_m, area_km2: 1.0, elevation_m: lower_m, ground }
        };
        assert_eq!(band(UnitSystem::Metric, &of(900.0, 1200.0)), "900–1\u{2009}200 m");
        assert_eq!(band(UnitSystem::Us, &of(-304.8, 0.0)), "−1\u{2009}000–0 ft");
    }

    #[test]
    fn levels_show_the_digits_they_have() {
        let [metric, us] = [UnitSystem::Metric, UnitSystem::Us];
        assert_eq!(
            [2.0, -0.5, 0.0, 1.25, 10.0, 0.59819, -1.125].map(|c| level(metric, c)),
            ["+2 °C", "−0.5 °C", "0 °C", "+1.25 °C", "+10 °C", "+0.6 °C", "−1.13 °C"]
        );
        assert_eq!([2.0, -0.5, 0.0, 0.25].map(|c| level(us, c)), ["+3.6 °F", "−0.9 °F", "0 °F", "+0.45 °F"]);
        assert_eq!([1.4499, 1.25, 0.04].map(|c| between_levels(metric, c)), ["+1.4 °C", "+1.3 °C", "0 °C"]);
        assert_eq!(between_levels(us, 1.4499), "+2.6 °F");
        assert_eq!([0.04, 1.55, 123.4].map(times), ["0.0 ×", "1.6 ×", "123 ×"]);
    }

    #[test]
    fn days_of_the_water_year_become_dates() {
        let starts = |month| WaterYearStart(MonthDay::new(month, 1).unwrap());
        assert_eq!(day_of_month(starts(10), 183.0), "1 April");
        assert_eq!(day_of_month(starts(4), 183.4), "30 September");
        assert_eq!(day_of_month(starts(1), 60.0), "1 March");
        assert_eq!(day_of_month(starts(10), -1.0), "29 September");
        assert_eq!([-11.6, 3.2, 0.3].map(days), ["12 d earlier", "3 d later", "same day"]);
    }
}
