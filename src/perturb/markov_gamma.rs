//! `markov-gamma`: weather that never happened but could, drawn day by day (method, section 8).
//!
//! A chain of wet and dry days (Richardson 1981), amounts by the law that each month speaks for, temperature that is usual
//! for such a day and remembers the day before; then the years are given back the variance that such chains lack. Water
//! years have 365 days: the calendar of a common year.

mod amounts;
mod common_year;
mod daily;
mod incomplete_gamma;
mod lag_one;
mod mixed_exponential;
mod nest;
mod normal_score;
mod occurrence;
mod record_days;
mod scores;
mod sums;
mod temperature;
mod truncated_gamma;

use super::mean_change::stream_after_mean_change;
use super::stream::calibration_stream;
use super::{Generator, Recipe};
use crate::weather::{Series, YearSpan};
use common_year::CommonYear;
use daily::{Daily, Walk};
use nest::{Nest, NestWalk};
use record_days::RecordDays;
use sums::{DrawnPart, record_parts};

/// Years of the chain by which its own variance is known: a standard deviation to 1.6 %.
const CALIBRATION_YEARS: usize = 2000;

/// Draws weather like a record's.
#[derive(Debug, Clone, PartialEq)]
pub struct MarkovGamma {
    seed: u64,
    year: CommonYear,
    daily: Daily,
    nest: Nest,
}

impl MarkovGamma {
    /// Fits a record whose years are corrected for catch.
    ///
    /// What fell on days below the wet-day threshold is given to wet days, so that the record's means hold.
    pub fn fit(record: &Series, recipe: &Recipe) -> Self {
        let Recipe { seed, wet_day_mm, .. } = *recipe;
        let year = CommonYear::new(recipe.water_year_starts, recipe.cool_season_ends);
        let days = RecordDays::of(record, wet_day_mm);
        let mut random = calibration_stream(seed);
        let daily = Daily::of(&days, &year, &mut random);
        let mut walk = Walk::START;
        let mut drawn_year = || {
            let mut parts = vec![DrawnPart::default(); year.parts.len()];
            for (day, part) in year.part.iter().enumerate() {
                parts[*part].add(&daily.next(&mut walk, day, &mut random));
            }
            parts
        };
        drawn_year();
        let drawn: Vec<Vec<DrawnPart>> = (0..CALIBRATION_YEARS).map(|_| drawn_year()).collect();
        let nest = Nest::of(&year, days.wet_above_mm, &record_parts(&days, &year), &days.follows, &drawn);
        Self { seed, year, daily, nest }
    }
}

impl Generator for MarkovGamma {
    /// One year more is drawn and forgotten before the first, so that no realization begins on a day of no weather.
    fn fill(&self, realization: u32, years: usize, into: &mut Series) {
        let mut random = stream_after_mean_change(self.seed, realization);
        let (mut walk, mut nest_walk) = (Walk::START, NestWalk::default());
        let mut parts = vec![DrawnPart::default(); self.year.parts.len()];
        let mut changes = Vec::with_capacity(parts.len());
        let days = self.year.month.len();
        let wet_above_mm = self.daily.wet_above_mm;
        for number in 0..=years {
            if number <= 1 {
                into.clear();
            }
            let start = into.mean_c.len();
            parts.fill(DrawnPart::default());
            for (day, part) in self.year.part.iter().enumerate() {
                let drawn = self.daily.next(&mut walk, day, &mut random);
                parts[*part].add(&drawn);
                into.mean_c.push(drawn.usual_c + self.nest.spread(*part) * drawn.departure_c);
                into.half_range_c.push(drawn.half_range_c);
                into.precipitation_mm.push(drawn.excess_mm.map_or(0.0, |excess_mm| wet_above_mm + excess_mm));
            }
            self.nest.year(&parts, &mut nest_walk, &mut changes);
            let weather = into.mean_c[start..].iter_mut().zip(&mut into.precipitation_mm[start..]);
            for ((mean_c, precipitation_mm), part) in weather.zip(&self.year.part) {
                *mean_c += changes[*part].shift_c;
                if *precipitation_mm > 0.0 {
                    *precipitation_mm =
                        wet_above_mm + changes[*part].excess_factor * (*precipitation_mm - wet_above_mm);
                }
            }
            into.month.extend_from_slice(&self.year.month);
            into.day_of_year.extend_from_slice(&self.year.day_of_year);
            let first = self.year.first;
            let (water_year, follows) = (number as i32, number > 1);
            into.years.push(YearSpan { water_year, first, start, days, follows });
        }
    }
}

#[cfg(test)]
mod tests;
