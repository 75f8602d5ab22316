//! Does the record stand for one climate? Trends and steps of its seasons, by name and with numbers.

use super::super::numbers::{fixed, signed};
use super::record::difference;
use super::{Checked, Page};
use crate::baseline::{LEAST_YEARS, YearlyTests};

/// A quantity's size in the reader's unit, a word for it, and decimals of a change per decade and of a level.
struct Scale {
    per_metric: f64,
    word: &'static str,
    decimals: usize,
}

impl Checked<'_> {
    pub(super) fn write_baseline(&self, page: &mut Page) {
        page.head("Baseline");
        let Some(baseline) = self.baseline else { return };
        page.line(
            "years stand for",
            format!(
                "{} on average ({} to {})",
                fixed(baseline.mid_year, 1).replace('\u{2009}', ""),
                baseline.first_water_year,
                baseline.last_water_year
            ),
        );
        let (warming, depth) = (self.reader.units.warming(), self.reader.units.depth());
        let degrees = Scale { per_metric: warming.of(1.0), word: warming.word, decimals: 2 };
        let water = Scale {
            per_metric: depth.of(1.0),
            word: depth.word,
            decimals: if depth.word == "in" { 2 } else { 0 },
        };
        let tests = [
            ("cool-season temperature", &baseline.cool_temperature, &degrees),
            ("warm-season temperature", &baseline.warm_temperature, &degrees),
            ("cool-season precipitation", &baseline.cool_precipitation, &water),
        ];
        for (name, tests, scale) in tests {
            match tests {
                Some(tests) => {
                    page.line(name, slope(tests, scale));
                    page.line("", trend(tests));
                    page.line("", step(tests, scale));
                }
                None => page.line(name, format!("not tested: needs {LEAST_YEARS} years that differ")),
            }
        }
        match self.detrended {
            Some(detrended) => {
                let slope = |trend: Option<crate::baseline::TheilSen>| {
                    trend.map_or("no days".to_owned(), |trend| per_decade(trend.slope_per_year, &degrees))
                };
                page.line(
                    "detrended",
                    format!(
                        "realizations are drawn from the years as if all were {}: cool season {}, warm season {} taken out",
                        detrended.to_year,
                        slope(detrended.cool),
                        slope(detrended.warm)
                    ),
                );
            }
            None => page.line(
                "detrended",
                "no; a change of sensor looks like a trend, so look before you state detrend_to",
            ),
        }
    }
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
