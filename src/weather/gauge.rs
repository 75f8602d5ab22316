//! Accumulating gauges: readings to daily amounts (method, section 1).
//!
//! A gauge that is read while it sways falls a little and rises again. Clipping each fall to zero counts every rise
//! after it once more; taking the running maximum since the last reset does not. A fall larger than the stated
//! tolerance is a reset: the gauge was emptied or the water year began.

use super::columns::Reading;
use serde::Serialize;

/// What was met while readings became daily amounts.
#[derive(Debug, Clone, Copy, Default, PartialEq, Serialize)]
pub struct GaugeCount {
    /// Falls larger than the tolerance.
    pub resets: usize,
    /// Falls from one reading to the next within the tolerance, taken for noise.
    pub small_falls: usize,
    /// Their sum, mm.
    pub small_falls_mm: f64,
    /// Water that came while readings were missing: known as a total, on no day of its own, and not run, mm.
    pub between_readings_mm: f64,
}

/// Daily amounts from the readings of an accumulating gauge, both in mm.
///
/// With M the running maximum since the last reset, a `start-of-day` gauge gives `P(d) = M(d+1) - M(d)`, an
/// `end-of-day` gauge `P(d) = M(d) - M(d-1)`. A day that lacks either reading is missing. So is the day of a reset,
/// except on the first day of a water year of an end-of-day gauge: set back to zero at its start, its own reading is
/// that day's amount. `is_first_day` tells whether day `d` begins a water year.
pub(super) fn daily_amounts(
    readings: &[Option<f64>],
    reading: Reading,
    reset_tolerance_mm: f64,
    is_first_day: impl Fn(usize) -> bool,
) -> (Vec<Option<f64>>, GaugeCount) {
    let mut amounts = vec![None; readings.len()];
    let mut count = GaugeCount::default();
    let mut last: Option<(usize, f64)> = None;
    let mut reading_before = f64::NEG_INFINITY;
    for (day, now) in readings.iter().enumerate().filter_map(|(day, now)| now.map(|now| (day, now))) {
        let before = std::mem::replace(&mut reading_before, now);
        let Some((last_day, highest)) = last else {
            last = Some((day, now));
            continue;
        };
        let belongs_to = match reading {
            Reading::StartOfDay => day - 1,
            Reading::EndOfDay => day,
        };
        let follows = day == last_day + 1;
        if now < highest - reset_tolerance_mm {
            count.resets += 1;
            if follows && reading == Reading::EndOfDay && is_first_day(day) && now >= 0.0 {
                amounts[belongs_to] = Some(now);
            }
            last = Some((day, now));
            continue;
        }
        if now < before {
            count.small_falls += 1;
            count.small_falls_mm += before - now;
        }
        let risen_to = now.max(highest);
        if follows {
            amounts[belongs_to] = Some(risen_to - highest);
        } else {
            count.between_readings_mm += risen_to - highest;
        }
        last = Some((day, risen_to));
    }
    (amounts, count)
}

#[cfg(test)]
mod tests {
    use super::*;

    /// Worked by hand: a sway of 1 mm is not counted twice, and the year's first reading after a reset serves only
    /// where it was taken at the end of that day.
    #[test]
    fn running_maximum_and_reset() {
        let readings = [Some(10.0), Some(9.0), Some(12.0), None, Some(15.0), Some(0.5), Some(2.5)];
        let (start, count) = daily_amounts(&readings, Reading::StartOfDay, 5.0, |day| day == 5);
        assert_eq!(start, [Some(0.0), Some(2.0), None, None, None, Some(2.0), None]);
        assert_eq!(count.resets, 1);
        assert_eq!((count.small_falls, count.small_falls_mm, count.between_readings_mm), (1, 1.0, 3.0));
        let (end, _) = daily_amounts(&readings, Reading::EndOfDay, 5.0, |day| day == 5);
        assert_eq!(end, [None, Some(0.0), Some(2.0), None, None, Some(0.5), Some(2.0)]);
    }
}
