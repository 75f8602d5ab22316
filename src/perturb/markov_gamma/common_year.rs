//! The generator's year: 365 days, the calendar of a common year, cut into months and seasons.

use crate::calendar::{COMMON_DATES, MonthDay, WaterYearStart, day_of_water_year};
use chrono::{Datelike, NaiveDate};

/// A water year without 29 February.
#[derive(Debug, Clone, PartialEq)]
pub struct CommonYear {
    /// Its first day, in a year whose water year holds no leap day.
    pub first: NaiveDate,
    /// Month of each day, 0 for January.
    pub month: Vec<u8>,
    /// Calendar day of each day, 1 to 365.
    pub day_of_year: Vec<u16>,
    /// Which part each day belongs to: the year cut where months begin and where the cool season ends.
    pub part: Vec<usize>,
    /// Of each part, its days, and whether it belongs to the cool season.
    pub parts: Vec<(usize, bool)>,
    /// Of each day, the months before and after it by their middles, and the weight of the latter.
    pub between: Vec<([usize; 2], f64)>,
}

impl CommonYear {
    /// Of water years that start on `starts`; the cool season lasts until the day before `cool_ends`.
    pub fn new(starts: WaterYearStart, cool_ends: MonthDay) -> Self {
        // No water year that ends in 2002 holds a leap day.
        let first = starts.first_day(2002);
        let cool_days = day_of_water_year(first, cool_ends) - 1;
        let dates = || first.iter_days().take(COMMON_DATES);
        let month: Vec<u8> = dates().map(|date| date.month0() as u8).collect();
        let mut part = Vec::with_capacity(COMMON_DATES);
        let mut parts: Vec<(usize, bool)> = Vec::new();
        for (day, of) in month.iter().enumerate() {
            if day == 0 || day == cool_days || *of != month[day - 1] {
                parts.push((0, day < cool_days));
            }
            if let Some((days, _)) = parts.last_mut() {
                *days += 1;
            }
            part.push(parts.len() - 1);
        }
        Self {
            first,
            day_of_year: dates().map(|date| date.ordinal() as u16).collect(),
            between: dates().map(between).collect(),
            month,
            part,
            parts,
        }
    }

    /// A value for every day from one a month, without a step where months meet: straight lines between the middles of the
    /// months, bent so that the mean over each month's days is the month's value.
    pub fn without_steps(&self, monthly: &[f64; 12]) -> Vec<f64> {
        let mut middles = *monthly;
        // Gauss and Seidel: three quarters of a month's mean are its own middle's, so each turn leaves a third of the error.
        for _ in 0..60 {
            for month in 0..12 {
                let (mut own, mut others, mut days) = (0.0, 0.0, 0.0);
                for (at, (ends, weight)) in self.between.iter().enumerate() {
                    if usize::from(self.month[at]) != month {
                        continue;
                    }
                    days += 1.0;
                    for (end, weight) in ends.iter().zip([1.0 - weight, *weight]) {
                        if *end == month { own += weight } else { others += weight * middles[*end] }
                    }
                }
                middles[month] = (days * monthly[month] - others) / own;
            }
        }
        let value = |([before, after], weight): &([usize; 2], f64)| {
            (1.0 - weight) * middles[*before] + weight * middles[*after]
        };
        self.between.iter().map(value).collect()
    }
}

/// Where a date stands between the middles of months.
fn between(date: NaiveDate) -> ([usize; 2], f64) {
    const DAYS: [f64; 12] = [31.0, 28.0, 31.0, 30.0, 31.0, 30.0, 31.0, 31.0, 30.0, 31.0, 30.0, 31.0];
    let month = date.month0() as usize;
    let through = f64::from(date.day()) - 0.5;
    let own = DAYS[month] / 2.0;
    if through < own {
        let before = (month + 11) % 12;
        let apart = DAYS[before] / 2.0 + own;
        ([before, month], (DAYS[before] / 2.0 + through) / apart)
    } else {
        let after = (month + 1) % 12;
        ([month, after], (through - own) / (own + DAYS[after] / 2.0))
    }
}

#[cfg(test)]
mod tests;
