//! Invented daily weather: a chain of wet and dry days, amounts, temperatures, and years that differ.
//!
//! All of it is common practice in weather generators: the wet/dry chain and temperatures conditional on it follow
//! Richardson (1981). It is kept simple, since it has to look like a mountain station and not to be fitted to one.

use super::place::{Climate, FIRST_YEAR, Place, YearToYear};
use crate::perturb::stream;
use chrono::{Datelike, NaiveDate};
use rand::RngExt;
use rand::rngs::ChaCha8Rng;
use rand_distr::{Distribution, StandardNormal};

/// Smallest daily temperature range, degC.
const SMALLEST_RANGE_C: f64 = 1.0;

/// Smallest amount of a wet day, mm: what the gauge resolves.
const SMALLEST_AMOUNT_MM: f64 = 0.1;

/// Stream of the year-to-year draws; the days have the other, so that a change to one leaves the other as it was.
const YEARS_STREAM: u32 = 0;
/// Stream of the days.
const DAYS_STREAM: u32 = 1;

/// One invented day.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Day {
    /// Its date.
    pub date: NaiveDate,
    /// Daily minimum, degC.
    pub tmin_c: f64,
    /// Daily maximum, degC.
    pub tmax_c: f64,
    /// Precipitation, mm.
    pub precipitation_mm: f64,
}

/// What sets one water year apart from the others.
#[derive(Debug, Clone, Copy)]
struct YearMood {
    /// Wetness, standard normal.
    wetness: f64,
    /// Added to temperature, degC.
    warmth_c: f64,
}

/// State that one day hands to the next.
struct Yesterday {
    is_wet: bool,
    /// Temperature less its seasonal mean, in standard deviations.
    residual: f64,
}

/// Draws every day of a place's record; a mood lasts a water year.
pub fn draw(place: &Place) -> Vec<Day> {
    let climate = &place.climate;
    let mut year_draws = stream(climate.seed, YEARS_STREAM);
    let mut day_draws = stream(climate.seed, DAYS_STREAM);
    let mut mood = first_mood(&climate.year_to_year, &mut year_draws);
    let mut yesterday = Yesterday { is_wet: false, residual: 0.0 };
    let mut days = Vec::new();
    for date in place.dates() {
        if date.year() > FIRST_YEAR && date == place.start_in(date.year()) {
            mood = next_mood(mood, &climate.year_to_year, &mut year_draws);
        }
        days.push(draw_day(climate, date, mood, &mut yesterday, &mut day_draws));
    }
    days
}

fn first_mood(years: &YearToYear, random: &mut ChaCha8Rng) -> YearMood {
    YearMood { wetness: normal(random), warmth_c: years.warmth_sd_c * normal(random) }
}

/// Wetness persists a little from year to year, a lag-1 autoregression of unit variance; warmth does not.
fn next_mood(last: YearMood, years: &YearToYear, random: &mut ChaCha8Rng) -> YearMood {
    let lag1 = years.wetness_lag1;
    YearMood {
        wetness: lag1 * last.wetness + (1.0 - lag1 * lag1).sqrt() * normal(random),
        warmth_c: years.warmth_sd_c * normal(random),
    }
}

/// Every day takes the same number of draws, wet or dry.
fn draw_day(
    climate: &Climate,
    date: NaiveDate,
    mood: YearMood,
    yesterday: &mut Yesterday,
    random: &mut ChaCha8Rng,
) -> Day {
    let day = f64::from(date.ordinal()) - climate.midwinter_day;
    let month = date.month0() as usize;
    let wetness = mood.wetness * climate.year_to_year.wetness_weight.at(day);

    let (after_dry, after_wet) = (climate.wet_after_dry[month], climate.wet_after_wet[month]);
    let odds = libm::exp(climate.year_to_year.wet_day_log_odds * wetness);
    let chance = with_odds(if yesterday.is_wet { after_wet } else { after_dry }, odds);
    let is_wet = random.random::<f64>() < chance;
    let amount_mm = climate.wet_day_mm[month]
        * libm::exp(climate.year_to_year.amount_log_sd * wetness)
        * unit_weibull(random.random(), climate.amount_shape);

    let lag1 = climate.residual_lag1;
    let residual = lag1 * yesterday.residual + (1.0 - lag1 * lag1).sqrt() * normal(random);
    let usual_wet_share = after_dry / (1.0 - after_wet + after_dry);
    let wet_departure = f64::from(u8::from(is_wet)) - usual_wet_share;
    let mean_c = climate.mean_c.at(day)
        + climate.wet_less_dry_c.at(day) * wet_departure
        + climate.residual_sd_c.at(day) * residual
        + mood.warmth_c;

    let usual_range_c = climate.dry_range_c.at(day) * if is_wet { climate.wet_range_share } else { 1.0 };
    let range_c = usual_range_c * libm::exp(climate.range_log_sd.at(day) * normal(random));
    let half_range_c = range_c.max(SMALLEST_RANGE_C) / 2.0;

    *yesterday = Yesterday { is_wet, residual };
    Day {
        date,
        tmin_c: mean_c - half_range_c,
        tmax_c: mean_c + half_range_c,
        precipitation_mm: if is_wet { amount_mm.max(SMALLEST_AMOUNT_MM) } else { 0.0 },
    }
}

fn normal(random: &mut ChaCha8Rng) -> f64 {
    StandardNormal.sample(random)
}

/// A chance whose odds are multiplied by `odds`; stays between 0 and 1.
fn with_odds(chance: f64, odds: f64) -> f64 {
    chance * odds / (1.0 - chance + chance * odds)
}

/// Weibull variate of mean 1, by inversion of a uniform draw on [0, 1).
fn unit_weibull(uniform: f64, shape: f64) -> f64 {
    libm::pow(-libm::log1p(-uniform), 1.0 / shape) / libm::tgamma(1.0 + 1.0 / shape)
}
