//! Daily temperature: mean and logarithm of the range about what is usual for the day, wet or dry, each day remembering
//! the one before (Richardson 1981).

use super::common_year::CommonYear;
use super::lag_one::{LagOne, Matrix};
use super::record_days::{RecordDay, RecordDays};

/// A month with fewer wet (or dry) days than this borrows from its neighbours.
const LEAST_DAYS: usize = 20;
/// No part of the year has a smaller share of its month's standard deviation.
const LEAST_SPREAD_SHARE: f64 = 0.3;

/// What is usual on a day: mean and standard deviation.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub struct Usual {
    /// Mean.
    pub mean: f64,
    /// Standard deviation.
    pub spread: f64,
}

/// Temperature of a day as it is drawn.
#[derive(Debug, Clone, PartialEq)]
pub struct Temperature {
    /// `[day][0 dry, 1 wet][0 mean in degC, 1 logarithm of the range in degC]`.
    pub usual: Vec<[[Usual; 2]; 2]>,
    /// Of each month: how departures from the usual, in standard deviations, follow each other.
    pub memory: [LagOne<2>; 12],
    /// Whether there are ranges.
    pub has_ranges: bool,
}

impl Temperature {
    /// From the record; what is usual passes from month to month without steps.
    pub fn of(record: &RecordDays, year: &CommonYear) -> Self {
        let mut usual = vec![[[Usual::default(); 2]; 2]; year.month.len()];
        for is_wet in [false, true] {
            let mut monthly = [[[0.0; 12]; 2]; 2];
            for month in 0..12 {
                let days = enough(record, month, is_wet);
                for variable in 0..2 {
                    let [mean, spread] = mean_and_spread(days.iter().map(|day| day.temperature[variable]));
                    monthly[variable][0][month] = mean;
                    monthly[variable][1][month] = spread;
                }
            }
            for (variable, [means, spreads]) in monthly.iter().enumerate() {
                let (means, smooth) = (year.without_steps(means), year.without_steps(spreads));
                for (day, usual) in usual.iter_mut().enumerate() {
                    let least = LEAST_SPREAD_SHARE * spreads[usize::from(year.month[day])];
                    usual[usize::from(is_wet)][variable] =
                        Usual { mean: means[day], spread: smooth[day].max(least) };
                }
            }
        }
        let mut found = Self {
            usual,
            memory: [LagOne { a: [[0.0; 2]; 2], b: [[0.0; 2]; 2] }; 12],
            has_ranges: record.has_ranges,
        };
        for (month, memory) in found.memory.iter_mut().enumerate() {
            *memory = memory_of(record, month, |day| departure(&found.usual, day));
        }
        found
    }
}

/// How far a day of the record is from the usual, in standard deviations.
fn departure(usual: &[[[Usual; 2]; 2]], day: &RecordDay) -> [f64; 2] {
    let usual = &usual[day.place][usize::from(day.is_wet)];
    [0, 1].map(|variable| {
        let Usual { mean, spread } = usual[variable];
        if spread > 0.0 { (day.temperature[variable] - mean) / spread } else { 0.0 }
    })
}

fn memory_of(record: &RecordDays, month: usize, departure: impl Fn(&RecordDay) -> [f64; 2]) -> LagOne<2> {
    let (mut now, mut before, mut both, mut count) = ([[0.0; 2]; 2], [[0.0; 2]; 2], [[0.0; 2]; 2], 0.0);
    for (earlier, later) in record.pairs().filter(|(_, later)| later.month == month) {
        let (earlier, later) = (departure(earlier), departure(later));
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

/// Mean and standard deviation (divided by n) of values; 0 where there are none.
fn mean_and_spread(values: impl Iterator<Item = f64> + Clone) -> [f64; 2] {
    let (mut sum, mut count) = (0.0, 0.0);
    for value in values.clone() {
        sum += value;
        count += 1.0;
    }
    if count == 0.0 {
        return [0.0; 2];
    }
    let mean = sum / count;
    let squares: f64 = values.map(|value| (value - mean) * (value - mean)).sum();
    [mean, libm::sqrt(squares / count)]
}
