//! The record as the generator is fitted to it: days of common years, wet or dry.

use crate::calendar::{COMMON_DATES, days_of_common_dates};
use crate::weather::Series;

/// The smallest daily range that is taken a logarithm of, degC; thermometers are read to a tenth.
const LEAST_RANGE_C: f64 = 0.1;

/// Much less than a step of the gauge is less than this part of it.
const MUCH_LESS: f64 = 0.75;
/// A gauge has steps where at most one wet day in so many has much less than one.
const MOST_WITH_LESS: usize = 100;

/// One day of the record; 29 February is none.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct RecordDay {
    /// Its place in the common year, from 0.
    pub place: usize,
    /// Month, 0 for January.
    pub month: usize,
    /// How many days before it are the calendar's own, one after another: 0, 1, or 2 for two and more.
    pub linked: usize,
    /// Precipitation, mm.
    pub precipitation_mm: f64,
    /// Whether precipitation lies above the wet-day threshold.
    pub is_wet: bool,
    /// Mean temperature, degC, and the natural logarithm of the daily range in degC.
    pub temperature: [f64; 2],
}

/// The record's years, 365 days each.
#[derive(Debug, Clone, PartialEq)]
pub struct RecordDays {
    /// The days, in order.
    pub days: Vec<RecordDay>,
    /// Of each year, whether it follows on the one before it in `days`.
    pub follows: Vec<bool>,
    /// Wet days have more than this, mm: what the user states, or half of the smallest amount that the gauge can tell.
    pub wet_above_mm: f64,
    /// Whether the record has daily ranges at all, and not the mean alone.
    pub has_ranges: bool,
}

impl RecordDays {
    /// Of a record whose years are corrected for catch.
    ///
    /// A gauge that tells steps of 2.54 mm makes readings of 2.54 mm of what lies between 1.27 and 3.81 mm: amounts are then
    /// counted from half a step on, or laws of amounts would see a gap where the gauge is blind, and thin out the large days
    /// to make up for it.
    pub fn of(record: &Series, wet_day_mm: f64) -> Self {
        let wet_above_mm = half_step_mm(record, wet_day_mm).max(wet_day_mm);
        let mut days: Vec<RecordDay> = Vec::with_capacity(record.years.len() * COMMON_DATES);
        for year in &record.years {
            let view = record.view(year);
            let mut before = None;
            for (place, day) in days_of_common_dates(year.first).enumerate() {
                let day = day - 1;
                let linked = match (before, days.last()) {
                    (None, Some(last)) if year.follows => 1 + usize::from(last.linked > 0),
                    (Some(before), Some(last)) if before + 1 == day => 1 + usize::from(last.linked > 0),
                    _ => 0,
                };
                before = Some(day);
                let range_c = (2.0 * view.half_range_c[day]).max(LEAST_RANGE_C);
                let precipitation_mm = view.precipitation_mm[day];
                days.push(RecordDay {
                    place,
                    month: usize::from(view.month[day]),
                    linked,
                    precipitation_mm,
                    is_wet: precipitation_mm > wet_above_mm,
                    temperature: [view.mean_c[day], libm::log(range_c)],
                });
            }
        }
        Self {
            days,
            follows: record.years.iter().map(|year| year.follows).collect(),
            wet_above_mm,
            has_ranges: record.half_range_c.iter().any(|half_range| *half_range > 0.0),
        }
    }

    /// Days whose month lies at most `reach` months from `month`.
    pub fn near(&self, month: usize, reach: usize) -> impl Iterator<Item = &RecordDay> {
        self.days.iter().filter(move |day| {
            let apart = day.month.abs_diff(month);
            apart.min(12 - apart) <= reach
        })
    }
}

/// Half of the smallest amount that the gauge tells, mm: the lower twentieth of all wet days, where hardly any day has much
/// less. 0 where amounts have no such edge.
fn half_step_mm(record: &Series, wet_day_mm: f64) -> f64 {
    let wet = record.precipitation_mm.iter().copied().filter(|mm| *mm > wet_day_mm);
    let mut sorted: Vec<f64> = wet.collect();
    sorted.sort_by(f64::total_cmp);
    let Some(step_mm) = sorted.get(sorted.len() / 20) else { return 0.0 };
    let less = sorted.iter().take_while(|mm| **mm < MUCH_LESS * step_mm).count();
    if less * MOST_WITH_LESS <= sorted.len() { step_mm / 2.0 } else { 0.0 }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn record(amounts_mm: impl Iterator<Item = f64>) -> Series {
        Series { precipitation_mm: amounts_mm.collect(), ..Series::default() }
    }

    /// By hand: a gauge of 2.54 mm whose snow days are corrected by 1.1 tells 2.54 mm at least, and half of it is 1.27. One
    /// stray day of 0.5 mm among 400 changes nothing, ten do. Amounts from 0.3 mm up without an edge have no step: 5 % of
    /// them lie below 1.3 mm, most of these well below three quarters of it.
    #[test]
    fn a_gauge_that_tells_steps_is_known_by_them() {
        let coarse = |at: usize| 2.54 * (1 + at % 7) as f64 * if at.is_multiple_of(3) { 1.1 } else { 1.0 };
        let strays = |strays: usize| (0..400).map(move |at| if at < strays { 0.5 } else { coarse(at) });
        for (few, half_mm) in [(0, 1.27), (1, 1.27), (10, 0.0)] {
            assert_eq!(half_step_mm(&record(strays(few)), 0.3), half_mm, "{few} stray days");
        }
        assert_eq!(half_step_mm(&record((0..400).map(|at| 0.3 + 0.05 * at as f64)), 0.25), 0.0);
        assert_eq!(half_step_mm(&record([0.0, 0.1].into_iter()), 0.3), 0.0, "no wet day");
    }
}
