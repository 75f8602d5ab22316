//! SWE of the basin day by day, kept as counts: how often each day of the water year began with how much.
//!
//! Counts are integers, so they add up to the same whatever the order of the threads, and their memory does not grow
//! with realizations or years.

use crate::snow::{Engine, Lanes, OpenLedger, YearBlock};
use crate::weather::Series;
use ndarray::{Array3, ArrayView1, Axis};
use std::sync::{Mutex, MutexGuard, PoisonError};

/// Days of a water year that are counted: the 366th comes in leap years alone.
pub const COUNTED_DAYS: usize = 365;
/// Bins up to the highest SWE that was expected.
const BINS_TO_HIGHEST: f64 = 250.0;
/// Bins beyond it, for years wetter than any expected, as a multiple.
const TIMES_HIGHEST: usize = 4;

/// How SWE is binned: bin k holds what rounds to k widths, so a bare basin is exactly 0.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct SweBins {
    /// Width of a bin, mm: a power of two, so that whole widths are exact.
    pub width_mm: f64,
    /// How many; the last one also holds all that lies above it.
    pub count: usize,
}

impl SweBins {
    /// Bins for SWE of about so much, at least 250 of them up to there and four times as far.
    pub fn up_to(highest_mm: f64) -> Self {
        let fit = |width: f64| width * BINS_TO_HIGHEST <= highest_mm;
        let width_mm = (-6..=10).map(|power| libm::exp2(f64::from(power))).rev().find(|width| fit(*width));
        let width_mm = width_mm.unwrap_or(libm::exp2(-6.0));
        let to_highest = libm::ceil(highest_mm.max(1.0) / width_mm).min(1024.0 * BINS_TO_HIGHEST);
        Self { width_mm, count: TIMES_HIGHEST * to_highest as usize + 1 }
    }

    /// Bins for what a record brings to the basin means of some lanes.
    ///
    /// # Errors
    /// A ledger that does not close.
    pub fn of_record(lanes: &Lanes, weather: &Series) -> Result<Self, OpenLedger> {
        let mut highest_mm = 0.0;
        Engine::new(lanes, false).years(weather, |_, block| {
            for day in 0..block.days {
                let means = &block.row(&block.swe_mm, day)[block.mixes_at..];
                highest_mm = means.iter().copied().fold(highest_mm, f64::max);
            }
            Ok::<(), OpenLedger>(())
        })?;
        Ok(Self::up_to(highest_mm))
    }

    fn bin(&self, swe_mm: f64) -> usize {
        ((swe_mm / self.width_mm + 0.5) as usize).min(self.count - 1)
    }
}

/// The counts while they are taken. A realization is counted into a table that no other thread has, so that none waits for
/// another; there are as many as were counted at one time, and they add up to the same whoever counted what.
pub(super) struct Tally {
    bins: SweBins,
    levels: usize,
    /// Tables that no thread has, each `[level][day][bin]`.
    tables: Mutex<Vec<Vec<u32>>>,
}

impl Tally {
    pub fn new(bins: SweBins, levels: usize) -> Self {
        Self { bins, levels, tables: Mutex::default() }
    }

    /// The bin of S(d) of every counted day of a year for the basin mean of each of a group's levels, `[level][day]`.
    pub fn bins(&self, block: &YearBlock, levels: usize) -> Vec<u32> {
        let bin = |level: usize, day: usize| {
            self.bins.bin(block.swe_mm[day * block.width + block.mixes_at + level]) as u32
        };
        (0..levels).flat_map(|level| (0..COUNTED_DAYS).map(move |day| bin(level, day))).collect()
    }

    /// Counts a realization's years under the levels from `first_level` on, each the bins of its days.
    pub fn count<'y>(&self, first_level: usize, years: impl Iterator<Item = &'y [u32]>) {
        let mut table = self.tables().pop().unwrap_or_else(|| vec![0; self.size()]);
        let from = first_level * COUNTED_DAYS * self.bins.count;
        for year in years {
            for (day, bin) in table[from..].chunks_exact_mut(self.bins.count).zip(year) {
                day[*bin as usize] += 1;
            }
        }
        self.tables().push(table);
    }

    pub fn finish(self) -> SweDays {
        let shape = (self.levels, COUNTED_DAYS, self.bins.count);
        let mut days = SweDays { bins: self.bins, counts: Array3::zeros(shape) };
        for table in self.tables().iter() {
            days.counts.iter_mut().zip(table).for_each(|(sum, count)| *sum += count);
        }
        days
    }

    fn size(&self) -> usize {
        self.levels * COUNTED_DAYS * self.bins.count
    }

    /// The free tables. They are whole whenever the lock is free, even if a thread that held it has panicked.
    fn tables(&self) -> MutexGuard<'_, Vec<Vec<u32>>> {
        self.tables.lock().unwrap_or_else(PoisonError::into_inner)
    }
}

/// How often each day of the water year began with how much SWE, over all years of all realizations.
#[derive(Debug, Clone, PartialEq)]
pub struct SweDays {
    /// The bins.
    pub bins: SweBins,
    /// `[level][day][bin]`; day 0 is the water year's first.
    pub counts: Array3<u32>,
}

impl SweDays {
    /// The counts of a day at a level.
    pub fn day(&self, level: usize, day: usize) -> ArrayView1<'_, u32> {
        self.counts.index_axis(Axis(0), level).index_axis_move(Axis(0), day)
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn bins_are_fine_enough_and_reach_far_enough() {
        for highest_mm in [0.0, 3.0, 249.0, 250.0, 499.9, 500.0, 1234.5, 30_000.0] {
            let bins = SweBins::up_to(highest_mm);
            assert!(bins.width_mm <= highest_mm.max(4.0) / 250.0, "{highest_mm}: {bins:?}");
            assert!(bins.width_mm * (bins.count - 1) as f64 >= 4.0 * highest_mm, "{highest_mm}: {bins:?}");
            assert!(bins.count <= 2100, "{highest_mm}: {bins:?}");
        }
        assert_eq!(SweBins::up_to(f64::MAX).count, SweBins::up_to(f64::MAX / 2.0).count, "bounded memory");
    }

    #[test]
    fn a_bin_holds_what_rounds_to_it() {
        let bins = SweBins { width_mm: 2.0, count: 5 };
        let found = [0.0, 0.99, 1.0, 2.9, 3.1, 7.9, 8.0, 1e9].map(|swe_mm| bins.bin(swe_mm));
        assert_eq!(found, [0, 0, 1, 1, 2, 4, 4, 4]);
    }
}
