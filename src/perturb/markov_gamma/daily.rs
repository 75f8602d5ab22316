//! The daily chain: one day after another, before the years are given their variance back.

use super::amounts::Law;
use super::common_year::CommonYear;
use super::normal_score::Shape;
use super::occurrence::Occurrence;
use super::record_days::RecordDays;
use super::temperature::Temperature;
use rand::{Rng, RngExt};
use rand_distr::{Distribution, StandardNormal};

/// A month with fewer wet days than this borrows amounts from its neighbours.
const LEAST_AMOUNTS: usize = 30;

/// Draws by which the quantiles of a month's amounts are known.
const SAMPLED_AMOUNTS: usize = 2000;

/// The chain's laws, day by day and month by month.
#[derive(Debug, Clone, PartialEq)]
pub struct Daily {
    /// A day is wet whose precipitation lies above this, mm.
    pub wet_above_mm: f64,
    /// Which days are wet.
    pub occurrence: Occurrence,
    /// How much falls on them, January first.
    pub laws: [Law; 12],
    /// Their quantiles, by which an amount's normal score is known.
    amounts: [Shape; 12],
    /// How warm they are.
    pub temperature: Temperature,
    /// Between which months' amounts each day draws, and the chance of the later one: amounts change without steps.
    between: Vec<([usize; 2], f64)>,
    month: Vec<u8>,
    part: Vec<usize>,
}

/// Where the chain is.
#[derive(Debug, Clone, Copy)]
pub struct Walk {
    /// The part that it is in, and the odds of a wet day there.
    part: usize,
    odds: f64,
    /// `2 * was wet two days before + was wet the day before`.
    state: usize,
    /// Normal scores of the departures of temperature and log range from the usual.
    scores: [f64; 2],
}

impl Walk {
    /// Before any day, after two dry ones of usual temperature.
    pub const START: Self = Self { part: usize::MAX, odds: 1.0, state: 0, scores: [0.0; 2] };
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
    pub fn of(record: &RecordDays, year: &CommonYear, random: &mut impl Rng) -> Self {
        let law = |month: usize| {
            let mut amounts_mm: Vec<f64> = Vec::new();
            for reach in 0..=6 {
                let wet = record.near(month, reach).filter(|day| day.is_wet);
                amounts_mm = wet.map(|day| day.precipitation_mm).collect();
                if amounts_mm.len() >= LEAST_AMOUNTS {
                    break;
                }
            }
            // A record without a wet day, as resampling may make one, draws none either: any law will do.
            if amounts_mm.is_empty() {
                amounts_mm.push(record.wet_above_mm + 1.0);
            }
            Law::of(&amounts_mm, record.wet_above_mm)
        };
        let laws: [Law; 12] = std::array::from_fn(law);
        let amounts = laws.map(|law| Shape::of((0..SAMPLED_AMOUNTS).map(|_| law.draw(random))));
        Self {
            wet_above_mm: record.wet_above_mm,
            occurrence: Occurrence::of(record, year, random),
            laws,
            temperature: Temperature::of(record, year, &amounts),
            amounts,
            between: year.between.clone(),
            month: year.month.clone(),
            part: year.part.clone(),
        }
    }

    /// Draws the next day, whose place in the common year is `day`.
    pub fn next(&self, walk: &mut Walk, day: usize, random: &mut impl Rng) -> DrawnDay {
        let part = self.part[day];
        if part != walk.part {
            walk.odds = self.occurrence.draw_odds(random);
            walk.part = part;
        }
        let is_wet = self.occurrence.next(day, walk.odds, &mut walk.state, random);
        let month = usize::from(self.month[day]);
        let mut innovation: [f64; 2] = [StandardNormal.sample(random), StandardNormal.sample(random)];
        let mut excess_mm = None;
        if is_wet {
            let ([before, after], weight) = self.between[day];
            let of = if random.random::<f64>() < weight { after } else { before };
            let amount_mm = self.laws[of].draw(random);
            let tie = self.temperature.with_amount[month];
            innovation[0] =
                tie * self.amounts[of].score(amount_mm) + libm::sqrt(1.0 - tie * tie) * innovation[0];
            excess_mm = Some(amount_mm - self.wet_above_mm);
        }
        walk.scores = self.temperature.memory[month].next(&walk.scores, &innovation);
        let [departure_c, of_log_range] = self.temperature.departures(day, month, is_wet, &walk.scores);
        let [mean, log_range] = self.temperature.usual[day][usize::from(is_wet)];
        let half_range_c =
            if self.temperature.has_ranges { 0.5 * libm::exp(log_range.median + of_log_range) } else { 0.0 };
        DrawnDay { excess_mm, usual_c: mean.median, departure_c, half_range_c }
    }
}

#[cfg(test)]
mod tests;
