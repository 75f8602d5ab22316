//! Years that have been run before: one that starts on the same snow, in the same weather, is the same year.
//!
//! A realization draws some years of its record twice, and records that are resampled from one record hold its years over
//! and over. Most years start bare, so most have been run; what comes out of the memory is what would have been computed,
//! to the bit.

use crate::inflow::WaterYear;
use crate::snow::Snow;
use chrono::NaiveDate;
use std::collections::HashMap;
use std::collections::hash_map::Entry;

/// Numbers that are remembered before the memory is full: 64 MB.
const MOST_NUMBERS: usize = 8_000_000;

/// A year as it is remembered.
pub(super) struct Remembered {
    /// Measures, `[measure][column]`.
    pub measured: Vec<f64>,
    /// Bins of the basin means' SWE, `[level][day]`; empty where the days are not counted.
    pub swe_bins: Vec<u32>,
    /// Water input of the basin means, mm, `[day][level]`; empty where nothing is operated.
    pub water_input_mm: Vec<f64>,
    /// First day of the year.
    pub first: NaiveDate,
    /// Whether a band of the reference kept its snow.
    pub is_perennial: bool,
}

impl Remembered {
    /// Its water, for what becomes of it.
    pub fn water_year(&self) -> WaterYear<'_> {
        WaterYear { first: self.first, water_input_mm: &self.water_input_mm }
    }
}

/// A place in the memory where some snow lies.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub(super) struct SnowAt(usize);

/// Years by their name in the record and the snow on which they start. The snow is hashed but when a year has been run:
/// years that are remembered know where the snow lies on which they end.
#[derive(Default)]
pub(super) struct Memory {
    snows: Vec<Snow>,
    snow_at: HashMap<Snow, SnowAt>,
    years: Vec<(Remembered, SnowAt)>,
    year_at: HashMap<(i32, SnowAt), usize>,
}

impl Memory {
    /// Forgets everything, as the weather that belongs to the years' names changes.
    pub fn clear(&mut self) {
        self.snows.clear();
        self.snow_at.clear();
        self.years.clear();
        self.year_at.clear();
    }

    /// Whether so much is remembered that it is better forgotten: where snow never goes, no year is ever the same.
    pub fn is_full(&self) -> bool {
        let numbers = |year: &Remembered| year.measured.len() + year.water_input_mm.len();
        self.years.first().is_some_and(|(year, _)| numbers(year) * self.years.len() > MOST_NUMBERS)
    }

    /// Where this snow lies.
    pub fn snow_at(&mut self, snow: Snow) -> SnowAt {
        match self.snow_at.entry(snow) {
            Entry::Occupied(entry) => *entry.get(),
            Entry::Vacant(entry) => {
                let at = SnowAt(self.snows.len());
                self.snows.push(entry.key().clone());
                *entry.insert(at)
            }
        }
    }

    /// The place of the year of that name that starts on the snow that lies there, and where the snow lies on which it
    /// ends. `run` runs it if it has not been, on that snow, and gives the snow as it ends.
    ///
    /// # Errors
    /// Those of `run`.
    pub fn place<E>(
        &mut self,
        name: i32,
        start: SnowAt,
        run: impl FnOnce(&Snow) -> Result<(Remembered, Snow), E>,
    ) -> Result<(usize, SnowAt), E> {
        if let Some(place) = self.year_at.get(&(name, start)) {
            return Ok((*place, self.years[*place].1));
        }
        let (year, end) = run(&self.snows[start.0])?;
        let end = self.snow_at(end);
        let place = self.years.len();
        self.years.push((year, end));
        self.year_at.insert((name, start), place);
        Ok((place, end))
    }

    /// The year at a place.
    pub fn year(&self, place: usize) -> &Remembered {
        &self.years[place].0
    }
}
