//! Trends and steps of the record in words, by the tests' names and with their numbers.

use super::numbers::{fixed, signed};
use super::reader::Reader;
use crate::baseline::{Baseline, Detrended, LEAST_YEARS, TheilSen, YearlyTests};

/// What the tests say of one season's yearly values.
pub(super) struct TrendWords {
    /// Which values.
    pub name: &'static str,
    /// Size of the trend, whether it is one, and whether there is a step; or why none of it was tested.
    pub sentences: Vec<String>,
}

/// A quantity's size in the reader's unit, a word for it, and decimals of its change.
struct Scale {
    per_metric: f64,
    word: &'static str,
    decimals: usize,
}

impl Scale {
    fn degrees(reader: Reader) -> Self {
        let unit = reader.units.warming();
        Self { per_metric: unit.of(1.0), word: unit.word, decimals: 2 }
    }

    fn water(reader: Reader) -> Self {
        let unit = reader.units.depth();
        let decimals = if unit.of(1.0) < 1.0 { 2 } else { 0 };
        Self { per_metric: unit.of(1.0), word: unit.word, decimals }
    }
}

/// `2004.7 on average (1985 to 2024)`.
pub(super) fn years_stand_for(baseline: &Baseline) -> String {
    let mid_year = fixed(baseline.mid_year, 1).replace('\u{2009}', "");
    format!("{mid_year} on average ({} to {})", baseline.first_water_year, baseline.last_water_year)
}

/// Every season that is tested.
pub(super) fn trends_in_words(reader: Reader, baseline: &Baseline) -> Vec<TrendWords> {
    let tested = [
        ("cool-season temperature", &baseline.cool_temperature, Scale::degrees(reader)),
        ("warm-season temperature", &baseline.warm_temperature, Scale::degrees(reader)),
        ("cool-season precipitation", &baseline.cool_precipitation, Scale::water(reader)),
    ];
    let words = tested.into_iter().map(|(name, tests, scale)| TrendWords {
        name,
        sentences: match tests {
            Some(tests) => vec![slope(tests, &scale), trend(tests), step(tests, &scale)],
            None => vec![format!("not tested: needs {LEAST_YEARS} years that differ")],
        },
    });
    words.collect()
}

/// What was taken out of the years that realizations are drawn from.
pub(super) fn detrended_in_words(reader: Reader, detrended: &Detrended) -> String {
    let degrees = Scale::degrees(reader);
    let slope = |trend: Option<TheilSen>| {
        trend.map_or("nothing".to_owned(), |trend| per_decade(trend.slope_per_year, &degrees))
    };
    format!(
        "realizations are drawn from the years as if all were {}: cool season {}, warm season {} taken out",
        detrended.to_year,
        slope(detrended.cool),
        slope(detrended.warm)
    )
}

fn per_decade(slope_per_year: f64, scale: &Scale) -> String {
    difference(
        10.0 * slope_per_year * scale.per_metric,
        scale.decimals,
        &format!("{} per decade", scale.word),
    )
}

/// `+0.31 °C per decade (Theil-Sen; 95 %: +0.05 to +0.58)`.
fn slope(tests: &YearlyTests, scale: &Scale) -> String {
    let [low, high] = tests
        .theil_sen
        .interval_95_per_year
        .map(|slope| signed(10.0 * slope * scale.per_metric, scale.decimals));
    format!("{} (Theil-Sen; 95 %: {low} to {high})", per_decade(tests.theil_sen.slope_per_year, scale))
}

/// `Mann-Kendall p = 0.02 (z = +2.30, corrected for lag-1 +0.32): a trend`.
fn trend(tests: &YearlyTests) -> String {
    let test = &tests.mann_kendall;
    let (score, how) = match &test.corrected {
        Some(corrected) if test.variance_ratio != 1.0 => (corrected, "corrected for lag-1"),
        _ => (&test.plain, "no correction for lag-1"),
    };
    let lag1 = test.lag1.map_or(String::new(), |lag1| format!(" {}", signed(lag1, 2)));
    format!(
        "Mann-Kendall {} (z = {}, {how}{lag1}): {}",
        p_in_words(test.p()),
        signed(score.z, 2),
        if test.is_significant() { "a trend" } else { "no trend to speak of" }
    )
}

/// The step of a season's temperatures, as [`step`] has it.
pub(super) fn step_in_words(reader: Reader, tests: &YearlyTests) -> String {
    step(tests, &Scale::degrees(reader))
}

/// `Pettitt p = 0.01: a step after 1999, by +0.9 °C`.
fn step(tests: &YearlyTests, scale: &Scale) -> String {
    let pettitt = &tests.pettitt;
    if !pettitt.is_significant() {
        return format!(
            "Pettitt {} (K = {}): no step to speak of",
            p_in_words(pettitt.p),
            fixed(pettitt.k, 0)
        );
    }
    let size = (pettitt.mean_after - pettitt.mean_before) * scale.per_metric;
    format!(
        "Pettitt {} (K = {}): a step after {}, by {}",
        p_in_words(pettitt.p),
        fixed(pettitt.k, 0),
        pettitt.last_year_before,
        difference(size, scale.decimals, scale.word)
    )
}

/// `p = 0.04`, `p < 0.001`.
fn p_in_words(p: f64) -> String {
    if p < 0.001 { "p < 0.001".to_owned() } else { format!("p = {}", fixed(p, if p < 0.01 { 3 } else { 2 })) }
}

/// `+0.12 °C`: a difference with its unit.
fn difference(value: f64, decimals: usize, word: &str) -> String {
    format!("{} {word}", signed(value, decimals))
}
