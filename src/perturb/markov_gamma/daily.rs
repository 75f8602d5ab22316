//! The daily chain: one day after another, before the years are given their variance back.

use super::amounts::Law;
use super::common_year::CommonYear;
use super::occurrence::Occurrence;
use super::record_days::RecordDays;
use super::temperature::Temperature;
use rand::{Rng, RngExt};
use rand_distr::{Distribution, StandardNormal};

/// A month with fewer wet days than this borrows amounts from its neighbours.
const LEAST_AMOUNTS: usize = 30;

/// The chain's laws, day by day and month by month.
#[derive(Debug, Clone, PartialEq)]
pub struct Daily {
    /// A day is wet whose precipitation lies above this, mm.
    pub wet_day_mm: f64,
    /// Which days are wet.
    pub occurrence: Occurrence,
    /// How much falls on them, January first.
    pub laws: [Law; 12],
    /// How warm they are.
    pub temperature: Temperature,
    /// Between which months' amounts each day draws, and the chance of the later one: amounts change without steps.
    between: Vec<([usize; 2], f64)>,
    month: Vec<u8>,
}

/// Where the chain is.
#[derive(Debug, Clone, Copy, Default)]
pub struct Walk {
    /// `2 * was wet two days before + was wet the day before`.
    state: usize,
    /// Departures of temperature and log range from the usual, in standard deviations.
    departure: [f64; 2],
}

/// A day of the chain.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct DrawnDay {
    /// Precipitation above the wet-day threshold, mm; none on a dry day.
    pub excess_mm: Option<f64>,
    /// The usual mean temperature of such a day, degC.
    pub usual_c: f64,
    /// How far from it this one is, degC.
    pub departure_c: f64,
    /// Half the daily range, degC.
    pub half_range_c: f64,
}

impl Daily {
    /// Fits the chain to a record.
    pub fn of(record: &RecordDays, year: &CommonYear, wet_day_mm: f64) -> Self {
        let law = |month: usize| {
            let mut amounts_mm: Vec<f64> = Vec::new();
            for reach in 0..=6 {
                let wet = record.near(month, reach).filter(|day| day.is_wet);
                amounts_mm = wet.map(|day| day.precipitation_mm).collect();
                if amounts_mm.len() >= LEAST_AMOUNTS {
                    break;
                }
            }
            Law::of(&amounts_mm, wet_day_mm)
        };
        Self {
            wet_day_mm,
            occurrence: Occurrence::of(record, year),
            laws: std::array::from_fn(law),
            temperature: Temperature::of(record, year),
            between: year.between.clone(),
            month: year.month.clone(),
        }
    }

    /// Draws the next day, whose place in the common year is `day`.
    pub fn next(&self, walk: &mut Walk, day: usize, random: &mut impl Rng) -> DrawnDay {
        let is_wet = random.random::<f64>() < self.occurrence.chances[day][walk.state];
        walk.state = 2 * (walk.state % 2) + usize::from(is_wet);
        let excess_mm = is_wet.then(|| {
            let ([before, after], weight) = self.between[day];
            let month = if random.random::<f64>() < weight { after } else { before };
            self.laws[month].draw(random) - self.wet_day_mm
        });
        let innovation: [f64; 2] = [StandardNormal.sample(random), StandardNormal.sample(random)];
        let memory = &self.temperature.memory[usize::from(self.month[day])];
        walk.departure = memory.next(&walk.departure, &innovation);
        let [mean, log_range] = self.temperature.usual[day][usize::from(is_wet)];
        let half_range_c = if self.temperature.has_ranges {
            0.5 * libm::exp(log_range.mean + log_range.spread * walk.departure[1])
        } else {
            0.0
        };
        DrawnDay { excess_mm, usual_c: mean.mean, departure_c: mean.spread * walk.departure[0], half_range_c }
    }
}
