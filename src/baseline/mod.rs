//! The baseline: what the record's own years say before anything is perturbed (method, section 11).
//!
//! A trend or a step in the record says how far its years stand for one climate. `seasons` makes yearly values of it;
//! `mann_kendall`, `theil_sen` and `pettitt` ask them for a trend, its size and a step; `wilson` is the interval of a
//! count over the record's years, `risk_ratio` that of two of them; `detrend` takes a trend of temperature out; `years` says of which years a normal is the
//! median. A test sees nothing of a series but its
//! `ranks`, years and values.

mod detrend;
mod mann_kendall;
mod pettitt;
mod ranks;
mod risk_ratio;
mod seasons;
#[cfg(test)]
mod tests;
mod theil_sen;
mod wilson;
mod years;

pub use detrend::{Detrended, detrend};
pub use mann_kendall::{MannKendall, ScoreTest, mann_kendall};
pub use pettitt::{Pettitt, pettitt};
pub use risk_ratio::{RiskRatio, risk_ratio};
pub use seasons::{SeasonYears, Seasons, Yearly};
pub use theil_sen::{TheilSen, theil_sen};
pub use wilson::wilson;
pub use years::{BASELINE_YEARS_KEY, BaselineChoice, BaselineYears, ENOUGH_BASELINE_YEARS, USUAL_BASELINE};

use crate::calendar::MonthDay;
use crate::fault::Unlikely;
use crate::weather::Series;
use serde::Serialize;

/// No test is made of fewer years.
///
/// All three tests take their chances from large-sample forms: the normal distribution for Kendall's score and for the
/// interval of the slope, Pettitt's exponential for the step. Below eight years the score is too coarse for them.
pub const LEAST_YEARS: usize = 8;

/// A test is called significant below this p.
pub const SIGNIFICANT_BELOW_P: f64 = 0.05;

/// A trend is drawn out beyond the record's own years by no more than this without a word, years.
const DETREND_REACH_YEARS: i32 = 5;

/// A smaller trend of temperature is not worth a word, however significant, degC per decade.
const LEAST_TREND_C_PER_DECADE: f64 = 0.1;

/// Quantile of the standard normal distribution at 0.975.
const NORMAL_975: f64 = 1.959_963_984_540_054;

/// A record's years, and whether their seasons hold a trend or a step.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Baseline {
    /// First usable water year.
    pub first_water_year: i32,
    /// Last usable water year.
    pub last_water_year: i32,
    /// Mean of the usable water years: the time that the record stands for.
    pub mid_year: f64,
    /// How many water years are usable.
    pub usable_years: usize,
    /// Mean temperature of the cool season, slopes in degC per year.
    pub cool_temperature: Option<YearlyTests>,
    /// Precipitation of the cool season, slopes in mm per year.
    pub cool_precipitation: Option<YearlyTests>,
    /// Mean temperature of the warm season, slopes in degC per year.
    pub warm_temperature: Option<YearlyTests>,
}

/// The three tests of one yearly series.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct YearlyTests {
    /// Years tested.
    pub n: usize,
    /// Whether there is a trend.
    pub mann_kendall: MannKendall,
    /// How large it is.
    pub theil_sen: TheilSen,
    /// Whether there is a step, and after which year.
    pub pettitt: Pettitt,
}

impl Baseline {
    /// The baseline of a record's usable years; the cool season ends as `survey`, the first survey date, begins.
    ///
    /// Nothing for a series without years. Precipitation is tested as the series holds it: before or after gauge catch,
    /// and with days that lack it as dry.
    pub fn of(series: &Series, survey: MonthDay) -> Option<Self> {
        let (first, last) = (series.years.first()?, series.years.last()?);
        let sum: f64 = series.years.iter().map(|year| f64::from(year.water_year)).sum();
        let seasons = Seasons::of(series, survey);
        Some(Self {
            first_water_year: first.water_year,
            last_water_year: last.water_year,
            mid_year: sum / series.years.len() as f64,
            usable_years: series.years.len(),
            cool_temperature: YearlyTests::of(&seasons.cool.mean_c),
            cool_precipitation: YearlyTests::of(&seasons.cool.precipitation_mm),
            warm_temperature: YearlyTests::of(&seasons.warm.mean_c),
        })
    }
}

impl Baseline {
    /// What about the record as a baseline is unlikely: a trend of temperature that stays in, or one taken out to a year far
    /// from the record's own.
    pub fn unlikely(&self, detrend_to: Option<i32>) -> Vec<Unlikely> {
        let mut found = Vec::new();
        let seasons = [("cool", &self.cool_temperature), ("warm", &self.warm_temperature)];
        for (season, tests) in seasons {
            let Some(tests) = tests else { continue };
            let per_decade_c = 10.0 * tests.theil_sen.slope_per_year;
            if detrend_to.is_some() && !tests.mann_kendall.is_significant() {
                found.push(Unlikely::new(
                    "weather.detrend_to",
                    format!(
                        "takes {per_decade_c:+.2} degC per decade out of the {season} season, which is no significant trend \
                         (Mann-Kendall p = {:.2})",
                        tests.mann_kendall.p()
                    ),
                ));
            }
            let is_large = per_decade_c.abs() >= LEAST_TREND_C_PER_DECADE;
            if detrend_to.is_none() && is_large && tests.mann_kendall.is_significant() {
                found.push(Unlikely::new(
                    "weather temperature",
                    format!(
                        "the {season} season has a trend of {per_decade_c:+.2} degC per decade, so its years do not stand for \
                         one climate. If no change of sensor made it, detrend_to = {:.0} in [weather] takes it out",
                        self.mid_year
                    ),
                ));
            }
        }
        let near = self.first_water_year - DETREND_REACH_YEARS..=self.last_water_year + DETREND_REACH_YEARS;
        if let Some(year) = detrend_to.filter(|year| !near.contains(year)) {
            let (first, last) = (self.first_water_year, self.last_water_year);
            let why = format!(
                "{year} lies far from the record's own years, {first} to {last}: a trend is drawn out to there"
            );
            found.push(Unlikely::new("weather.detrend_to", why));
        }
        found
    }
}

impl YearlyTests {
    /// The tests of a yearly series; none of fewer than [`LEAST_YEARS`] years, and none where all values are the same.
    pub fn of(yearly: &Yearly) -> Option<Self> {
        Some(Self {
            n: yearly.len(),
            mann_kendall: mann_kendall(yearly)?,
            theil_sen: theil_sen(yearly)?,
            pettitt: pettitt(yearly)?,
        })
    }
}
