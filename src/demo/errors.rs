//! How far invented readings lie from what is there.

use super::place::Place;
use crate::perturb::stream;
use chrono::{Datelike, NaiveDate};
use rand::rngs::ChaCha8Rng;
use rand_distr::{Distribution, StandardNormal};

/// Errors of readings, all of them factors: nothing reads 0.
#[derive(Debug)]
pub struct Errors {
    /// Seed of their draws and of those of a snow course's visits.
    pub seed: u64,
    /// Standard deviation of the factor that all readings of a water year share.
    pub year_sd: f64,
    /// Standard deviation of a reading's own factor.
    pub reading_sd: f64,
    /// Correlation of that factor with the reading before's.
    pub reading_lag1: f64,
}

/// Stream of the errors that a year's readings share.
const YEARS_STREAM: u32 = 1;
/// Stream of the readings' own errors.
const READINGS_STREAM: u32 = 2;

/// Draws the factors of one reading after another, in the order of their dates.
pub struct Factors<'a> {
    place: &'a Place,
    errors: &'a Errors,
    year_draws: ChaCha8Rng,
    reading_draws: ChaCha8Rng,
    year: Option<i32>,
    of_year: f64,
    own: f64,
}

impl<'a> Factors<'a> {
    /// Of no reading yet.
    pub fn new(place: &'a Place, errors: &'a Errors) -> Self {
        let [year_draws, reading_draws] = [YEARS_STREAM, READINGS_STREAM].map(|of| stream(errors.seed, of));
        Self { place, errors, year_draws, reading_draws, year: None, of_year: 1.0, own: 0.0 }
    }

    /// Of the next reading.
    pub fn next(&mut self, date: NaiveDate) -> f64 {
        let began = date.year() - i32::from(date < self.place.start_in(date.year()));
        if self.year.replace(began) != Some(began) {
            let drawn: f64 = StandardNormal.sample(&mut self.year_draws);
            self.of_year = 1.0 + self.errors.year_sd * drawn;
        }
        let lag1 = self.errors.reading_lag1;
        let drawn: f64 = StandardNormal.sample(&mut self.reading_draws);
        self.own = lag1 * self.own + (1.0 - lag1 * lag1).sqrt() * drawn;
        self.of_year * (1.0 + self.errors.reading_sd * self.own)
    }
}
