//! `year-blocks`: whole usable water years of the record in a new order, as the stationary bootstrap of
//! Politis & Romano (1994) takes them (method, section 8).

use super::Generator;
use super::mean_change::stream_after_mean_change;
use super::stream::record_stream;
use crate::weather::{Series, YearSpan};
use rand::{Rng, RngExt};

/// Resamples a record's water years in runs of random length, weather kept jointly and leap days kept.
#[derive(Debug, Clone, Copy)]
pub struct YearBlocks<'r> {
    /// The usable years, catch-corrected.
    pub record: &'r Series,
    /// Seed of the study.
    pub seed: u64,
    /// Mean length of a run of consecutive years, at least 1.
    pub mean_run_years: f64,
}

impl Generator for YearBlocks<'_> {
    fn fill(&self, realization: u32, years: usize, into: &mut Series) {
        into.clear();
        self.draw_years(&mut stream_after_mean_change(self.seed, realization), years, |year, _| {
            into.push_year(self.record, &self.record.years[year], !into.years.is_empty());
        });
    }

    /// Years are the record's own.
    fn drawn(&self, realization: u32, years: usize) -> Option<(&Series, Vec<YearSpan>)> {
        let mut drawn = Vec::with_capacity(years);
        self.draw_years(&mut stream_after_mean_change(self.seed, realization), years, |year, _| {
            drawn.push(self.record.years[year]);
        });
        Some((self.record, drawn))
    }

    fn keeps_names(&self) -> bool {
        true
    }
}

impl YearBlocks<'_> {
    /// The record's years drawn anew, as many as there are, in runs like those of a realization: a record that could have
    /// been, for the uncertainty that comes from having only this one. A run ends as a gap does.
    pub fn resampled_record(&self, number: u32) -> Series {
        let mut resampled = Series::default();
        let mut random = record_stream(self.seed, number);
        self.draw_years(&mut random, self.record.years.len(), |year, continues| {
            resampled.push_year(self.record, &self.record.years[year], continues);
        });
        resampled
    }

    /// Draws years: with probability 1/L, and wherever the record has a gap, a new run starts at any usable year; else the
    /// next year of the record follows, the first after the last. `take` gets the year's place in the record and whether
    /// it continues a run.
    fn draw_years(&self, random: &mut impl Rng, count: usize, mut take: impl FnMut(usize, bool)) {
        let mut last: Option<usize> = None;
        for _ in 0..count {
            let starts_run = random.random::<f64>() * self.mean_run_years < 1.0;
            let anywhere = random.random_range(0..self.record.years.len());
            let next = last.filter(|_| !starts_run).and_then(|last| self.after(last));
            let taken = next.unwrap_or(anywhere);
            take(taken, next.is_some());
            last = Some(taken);
        }
    }

    /// The year that follows in the record, circular; none at a gap.
    fn after(&self, year: usize) -> Option<usize> {
        match self.record.years.get(year + 1) {
            Some(next) => next.follows.then_some(year + 1),
            None => Some(0),
        }
    }
}
