//! Daily temperature: mean and logarithm of the range about what is usual for the day, wet or dry, each day remembering
//! the one before (Richardson 1981).

use super::common_year::CommonYear;
use super::lag_one::{LagOne, Matrix};
use super::normal_score::{Shape, normal_scores, quantile};
use super::record_days::{RecordDay, RecordDays};
use crate::normal::below;

/// A month with fewer wet (or dry) days than this borrows from its neighbours.
const LEAST_DAYS: usize = 20;
/// No part of the year has a smaller share of its month's standard deviation.
const LEAST_SPREAD_SHARE: f64 = 0.3;

/// What is usual on a day: the middle, and what stands for a standard deviation.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub struct Usual {
    /// Median.
    pub median: f64,
    /// Half of the range of the middle 68 %.
    pub spread: f64,
}

/// Temperature of a day as it is drawn.
#[derive(Debug, Clone, PartialEq)]
pub struct Temperature {
    /// `[day][0 dry, 1 wet][0 mean in degC, 1 logarithm of the range in degC]`.
    pub usual: Vec<[[Usual; 2]; 2]>,
    /// `[month][0 dry, 1 wet][variable]`: how departures from the usual, in standard deviations, are distributed.
    pub shapes: [[[Shape; 2]; 2]; 12],
    /// Of each month: how the departures' normal scores follow each other.
    pub memory: [LagOne<2>; 12],
    /// Of each month: the weight of a wet day's amount, as a normal score, in what is new in its temperature. Heavy snow of
    /// autumn and spring comes with cold, and how much of the water falls as snow hangs on it.
    pub with_amount: [f64; 12],
    /// Whether there are ranges.
    pub has_ranges: bool,
}

/// No amount tells more of its day's temperature than this.
const STRONGEST_TIE: f64 = 0.9;

impl Temperature {
    /// From the record, and the quantiles of its amounts month by month; what is usual passes from month to month without
    /// steps.
    pub fn of(record: &RecordDays, year: &CommonYear, amounts: &[Shape; 12]) -> Self {
        let mut usual = vec![[[Usual::default(); 2]; 2]; year.month.len()];
        for is_wet in [false, true] {
            let days: [Vec<&RecordDay>; 12] = std::array::from_fn(|month| enough(record, month, is_wet));
            let of_month = |variable: usize| -> [Usual; 12] {
                std::array::from_fn(|month| usual_of(days[month].iter().map(|day| day.temperature[variable])))
            };
            let monthly = [0, 1].map(|variable| {
                let usual = of_month(variable);
                [usual.map(|usual| usual.median), usual.map(|usual| usual.spread)]
            });
            for (variable, [medians, spreads]) in monthly.iter().enumerate() {
                let (medians, smooth) = (year.without_steps(medians), year.without_steps(spreads));
                for (day, usual) in usual.iter_mut().enumerate() {
                    let least = LEAST_SPREAD_SHARE * spreads[usize::from(year.month[day])];
                    usual[usize::from(is_wet)][variable] =
                        Usual { median: medians[day], spread: smooth[day].max(least) };
                }
            }
        }
        let shape = |month: usize, is_wet: bool, variable: usize| {
            let days = enough(record, month, is_wet);
            Shape::of(days.iter().map(|day| departure(&usual, day)[variable]))
        };
        let scores = scores(record, &usual);
        let memory: [LagOne<2>; 12] = std::array::from_fn(|month| memory_of(record, month, &scores));
        let ties: [f64; 12] = std::array::from_fn(|month| {
            tie_with_amount(record, month, &amounts[month], &memory[month], &scores)
        });
        Self {
            shapes: std::array::from_fn(|month| {
                [false, true].map(|is_wet| [0, 1].map(|variable| shape(month, is_wet, variable)))
            }),
            memory,
            with_amount: std::array::from_fn(|month| {
                let [before, after] = [ties[(month + 11) % 12], ties[(month + 1) % 12]];
                (0.25 * before + 0.5 * ties[month] + 0.25 * after).clamp(-STRONGEST_TIE, STRONGEST_TIE)
            }),
            has_ranges: record.has_ranges,
            usual,
        }
    }

    /// Departures from the usual of a day whose normal scores are given: of the mean, in degC, and the logarithm of the
    /// range.
    #[inline(always)]
    pub fn departures(&self, day: usize, month: usize, is_wet: bool, scores: &[f64; 2]) -> [f64; 2] {
        let state = usize::from(is_wet);
        let (usual, shapes) = (&self.usual[day][state], &self.shapes[month][state]);
        [usual[0].spread * shapes[0].value(scores[0]), usual[1].spread * shapes[1].value(scores[1])]
    }
}

/// How far a day of the record is from the usual, in standard deviations.
fn departure(usual: &[[[Usual; 2]; 2]], day: &RecordDay) -> [f64; 2] {
    let usual = &usual[day.place][usize::from(day.is_wet)];
    [0, 1].map(|variable| {
        let Usual { median, spread } = usual[variable];
        if spread > 0.0 { (day.temperature[variable] - median) / spread } else { 0.0 }
    })
}

/// Of each day of the record, the normal scores of its departures among those of its month's wet, or dry, days.
fn scores(record: &RecordDays, usual: &[[[Usual; 2]; 2]]) -> Vec<[f64; 2]> {
    let mut scores = vec![[0.0; 2]; record.days.len()];
    for month in 0..12 {
        for is_wet in [false, true] {
            let is_one = |day: &RecordDay| day.month == month && day.is_wet == is_wet;
            let places: Vec<usize> = (0..record.days.len()).filter(|at| is_one(&record.days[*at])).collect();
            let departures: Vec<[f64; 2]> =
                places.iter().map(|at| departure(usual, &record.days[*at])).collect();
            let of = |variable: usize| {
                normal_scores(&departures.iter().map(|departure| departure[variable]).collect::<Vec<_>>())
            };
            for (at, (mean, log_range)) in places.iter().zip(of(0).into_iter().zip(of(1))) {
                scores[*at] = [mean, log_range];
            }
        }
    }
    scores
}

fn memory_of(record: &RecordDays, month: usize, scores: &[[f64; 2]]) -> LagOne<2> {
    let (mut now, mut before, mut both, mut count) = ([[0.0; 2]; 2], [[0.0; 2]; 2], [[0.0; 2]; 2], 0.0);
    let pairs = record.days.windows(2).zip(scores.windows(2));
    for (_, scores) in pairs.filter(|(days, _)| days[1].linked > 0 && days[1].month == month) {
        let [earlier, later] = [scores[0], scores[1]];
        count += 1.0;
        for row in 0..2 {
            for column in 0..2 {
                now[row][column] += later[row] * later[column];
                before[row][column] += earlier[row] * earlier[column];
                both[row][column] += later[row] * earlier[column];
            }
        }
    }
    let mean = |sums: Matrix<2>| sums.map(|row| row.map(|sum| sum / f64::max(count, 1.0)));
    LagOne::of(&mean(now), &mean(before), &mean(both))
}

/// The weight of an amount in what is new in its day's temperature with which both are as correlated as in the record:
/// the slope of temperature on amount over a month's wet days, both as normal scores, over the share `b` that what is new
/// has in a day's score.
///
/// An amount's score is by the law of its month, not by its rank: among the many days on which a coarse gauge told one
/// step, ranks would follow the catch correction, and so temperature.
fn tie_with_amount(
    record: &RecordDays,
    month: usize,
    amounts: &Shape,
    memory: &LagOne<2>,
    scores: &[[f64; 2]],
) -> f64 {
    let wet = record.days.iter().zip(scores).filter(|(day, _)| day.month == month && day.is_wet);
    let pairs: Vec<[f64; 2]> =
        wet.map(|(day, score)| [amounts.score(day.precipitation_mm), score[0]]).collect();
    let mean = |at: usize| pairs.iter().map(|pair| pair[at]).sum::<f64>() / pairs.len() as f64;
    let [of_amounts, of_temperatures] = [mean(0), mean(1)];
    let (mut both, mut squares) = (0.0, 0.0);
    for [amount, temperature] in &pairs {
        both += (amount - of_amounts) * (temperature - of_temperatures);
        squares += (amount - of_amounts) * (amount - of_amounts);
    }
    let new = squares * memory.b[0][0];
    if new > 0.0 { both / new } else { 0.0 }
}

/// Days of a month that are wet, or dry; with those of the months around it where they are too few.
fn enough(record: &RecordDays, month: usize, is_wet: bool) -> Vec<&RecordDay> {
    let mut days = Vec::new();
    for reach in 0..=6 {
        days = record.near(month, reach).filter(|day| day.is_wet == is_wet).collect();
        if days.len() >= LEAST_DAYS {
            break;
        }
    }
    days
}

/// What is usual of values: their median, and half the distance between their quantiles at one standard deviation of a
/// normal below and above it. Neither asks how far off the days are on which a sensor failed; the shape keeps those.
fn usual_of(values: impl Iterator<Item = f64>) -> Usual {
    let mut sorted: Vec<f64> = values.collect();
    sorted.sort_by(f64::total_cmp);
    if sorted.is_empty() {
        return Usual::default();
    }
    let [low, median, high] = [-1.0, 0.0, 1.0].map(|score| quantile(&sorted, below(score)));
    Usual { median, spread: (high - low) / 2.0 }
}
