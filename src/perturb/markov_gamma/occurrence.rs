//! Which days are wet: a chain of wet and dry days of first or second order, month by month.

use super::common_year::CommonYear;
use super::record_days::{RecordDay, RecordDays};
use super::scores::Normal;
use rand::{Rng, RngExt};
use rand_distr::{Distribution, StandardNormal};

/// How many days before it a day's chance of being wet hangs on.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Order {
    /// The day before.
    First,
    /// The two days before.
    Second,
}

/// Chance of a wet day by what the two days before it were: `[2 * was wet two days before + was wet the day before]`.
pub type Chances = [f64; 4];

/// The chain.
#[derive(Debug, Clone, PartialEq)]
pub struct Occurrence {
    /// The order that each month speaks for, January first.
    pub orders: [Order; 12],
    /// Chances of each day of the common year.
    pub chances: Vec<Chances>,
    /// Standard deviation of a part's own draw, added to the logarithm of the odds of a wet day on all its days: months are
    /// wet or dry as a whole more often than chains by themselves would have it.
    pub spread: f64,
}

/// Years by which the chain's own variance of wet days is known.
const TRIAL_YEARS: usize = 1000;
/// The spread that is tried out.
const TRIAL_SPREAD: f64 = 0.4;
/// No part's odds are drawn with a larger one.
const LARGEST_SPREAD: f64 = 1.0;

impl Occurrence {
    /// For each month the order with the lower Bayesian information criterion `k ln n - 2 ln L` (Schwarz 1978; for chains
    /// Katz 1981), 2 chances or 4; both are held against the same days, those with two days before them. Chances pass from
    /// month to month without steps.
    ///
    /// The spread of the parts' odds makes up, in sum over the parts, for what their number of wet days varies more in the
    /// record than in the chain: its square in proportion, from trials without one and with one.
    pub fn of(record: &RecordDays, year: &CommonYear, random: &mut impl Rng) -> Self {
        let found: Vec<(Order, Chances)> = (0..12).map(|month| of_month(record, month)).collect();
        let mut chances = vec![[0.0; 4]; year.month.len()];
        for state in 0..4 {
            let mut monthly = [0.0; 12];
            for (value, (_, chances)) in monthly.iter_mut().zip(&found) {
                *value = chances[state];
            }
            for (chances, value) in chances.iter_mut().zip(year.without_steps(&monthly)) {
                chances[state] = value.clamp(0.0, 1.0);
            }
        }
        let mut orders = [Order::First; 12];
        for (order, (found, _)) in orders.iter_mut().zip(&found) {
            *order = *found;
        }
        let mut found = Self { orders, chances, spread: 0.0 };
        let in_record = variance_of_wet_days(&wet_days_of(record, year), year.parts.len());
        let mut tried = |spread: f64| {
            let tried = Self { spread, ..found.clone() };
            let mut state = 0;
            let counts = (0..TRIAL_YEARS).map(|_| tried.wet_days(year, &mut state, random));
            variance_of_wet_days(&counts.collect::<Vec<_>>(), year.parts.len())
        };
        let [without, with] = [0.0, TRIAL_SPREAD].map(&mut tried);
        if with > without {
            let square = TRIAL_SPREAD * TRIAL_SPREAD * (in_record - without) / (with - without);
            found.spread = libm::sqrt(square.max(0.0)).min(LARGEST_SPREAD);
        }
        found
    }

    /// The odds of a wet day in a part, times the usual.
    pub fn draw_odds(&self, random: &mut impl Rng) -> f64 {
        let draw: f64 = StandardNormal.sample(random);
        libm::exp(self.spread * draw)
    }

    /// Whether the next day is wet, and the state after it.
    #[inline(always)]
    pub fn next(&self, day: usize, odds: f64, state: &mut usize, random: &mut impl Rng) -> bool {
        let chance = self.chances[day][*state];
        let wet = odds * chance;
        let is_wet = random.random::<f64>() * (wet + 1.0 - chance) < wet;
        *state = 2 * (*state % 2) + usize::from(is_wet);
        is_wet
    }

    /// Wet days of each part of a year of the chain.
    fn wet_days(&self, year: &CommonYear, state: &mut usize, random: &mut impl Rng) -> Vec<f64> {
        let mut counts = vec![0.0; year.parts.len()];
        let (mut odds, mut last) = (1.0, usize::MAX);
        for (day, part) in year.part.iter().enumerate() {
            if *part != last {
                odds = self.draw_odds(random);
                last = *part;
            }
            if self.next(day, odds, state, random) {
                counts[*part] += 1.0;
            }
        }
        counts
    }
}

/// Wet days of each part of the record's years.
fn wet_days_of(record: &RecordDays, year: &CommonYear) -> Vec<Vec<f64>> {
    let of_year = |days: &[RecordDay]| {
        let mut counts = vec![0.0; year.parts.len()];
        for day in days.iter().filter(|day| day.is_wet) {
            counts[year.part[day.place]] += 1.0;
        }
        counts
    };
    record.days.chunks(year.month.len()).map(of_year).collect()
}

/// Sum over the parts of the variance of their wet days from year to year.
fn variance_of_wet_days(counts: &[Vec<f64>], parts: usize) -> f64 {
    let of_part = |part: usize| {
        let spread = Normal::of(&counts.iter().map(|year| year[part]).collect::<Vec<_>>()).spread;
        spread * spread
    };
    (0..parts).map(of_part).sum()
}

fn of_month(record: &RecordDays, month: usize) -> (Order, Chances) {
    // Dry and wet days by what the two days before them were.
    let mut counts = [[0.0; 2]; 4];
    // The same by the day before alone, with days that have but that one before them.
    let mut of_one = [[0.0; 2]; 2];
    for three in record.days.windows(3).filter(|three| three[2].month == month) {
        let [two_before, before, is_wet] = [0, 1, 2].map(|at| usize::from(three[at].is_wet));
        if three[2].linked >= 1 {
            of_one[before][is_wet] += 1.0;
        }
        if three[2].linked >= 2 {
            counts[2 * two_before + before][is_wet] += 1.0;
        }
    }
    let first_order: [f64; 2] = of_one.map(chance);
    let merged = [0, 1]
        .map(|before: usize| [0, 1].map(|is_wet: usize| counts[before][is_wet] + counts[2 + before][is_wet]));
    let days: f64 = counts.iter().flatten().sum();
    let criterion = |parameters: f64, of: &[[f64; 2]]| {
        parameters * libm::log(days.max(1.0)) - 2.0 * of.iter().map(log_likelihood).sum::<f64>()
    };
    if criterion(4.0, &counts) < criterion(2.0, &merged) {
        let mut chances = counts.map(chance);
        for (state, chance) in chances.iter_mut().enumerate() {
            if counts[state].iter().sum::<f64>() == 0.0 {
                *chance = first_order[state % 2];
            }
        }
        (Order::Second, chances)
    } else {
        let [dry, wet] = first_order;
        (Order::First, [dry, wet, dry, wet])
    }
}

/// The most likely chance; half a day more of each kind (Jeffreys) where all days were the same, so that no state lasts
/// for ever.
fn chance([dry, wet]: [f64; 2]) -> f64 {
    if dry > 0.0 && wet > 0.0 { wet / (dry + wet) } else { (wet + 0.5) / (dry + wet + 1.0) }
}

fn log_likelihood([dry, wet]: &[f64; 2]) -> f64 {
    let all = dry + wet;
    let part = |count: f64| if count > 0.0 { count * libm::log(count / all) } else { 0.0 };
    part(*dry) + part(*wet)
}

#[cfg(test)]
mod tests;
