//! Years given back the variance that daily chains lack: months first, then seasons, precipitation and temperature
//! together (nesting, Srikanthan & Pegram 2009).
//!
//! The totals and means of each part of a year are turned into standard scores, freed of what they remember of each other
//! in the chain, given the record's correlations and memory, and turned back with the record's means and standard
//! deviations. What a part then has more or less is put on its wet days as a factor on what lies above the wet-day
//! threshold, and on all its days as a shift of temperature. Seasons follow on the parts so changed. Precipitation is
//! scored by its square root, which keeps totals above zero and their distribution skewed.

mod parts;
mod sequence;
mod years;

use super::common_year::CommonYear;
use super::lag_one::LagOne;
use super::scores::{Normal, squared};
use super::sums::{DrawnPart, RecordPart};
use parts::part_nests;

/// A factor on a part's, or a season's, precipitation stays within these.
const FACTORS: [f64; 2] = [0.05, 20.0];
/// Variables: precipitation and temperature of the cool season, then of the warm one.
const SEASONAL: usize = 4;

/// How a year's parts and seasons are changed.
#[derive(Debug, Clone, PartialEq)]
pub struct Nest {
    wet_above_mm: f64,
    parts: Vec<PartNest>,
    seasons: Stage<SEASONAL>,
}

#[derive(Debug, Clone, PartialEq)]
struct PartNest {
    days: f64,
    season: usize,
    /// Factor on the departures of daily temperature.
    spread: f64,
    stage: Stage<2>,
    /// What remains between the mean of nested years and the record's.
    excess_factor: f64,
    shift_c: f64,
}

/// From the chain's scores to the record's values. Even variables are roots of precipitation, odd ones temperatures.
#[derive(Debug, Clone, PartialEq)]
struct Stage<const N: usize> {
    own: [Normal; N],
    own_memory: LagOne<N>,
    target: [Normal; N],
    target_memory: LagOne<N>,
}

/// Scores of the part and of the year before, in the chain and in the record's measure.
#[derive(Debug, Clone, Copy, Default)]
pub struct NestWalk {
    part: [[f64; 2]; 2],
    year: [[f64; SEASONAL]; 2],
}

/// What a part's days are changed by.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct PartChange {
    /// Times what lies above the wet-day threshold.
    pub excess_factor: f64,
    /// Added to temperature, degC.
    pub shift_c: f64,
}

impl<const N: usize> Stage<N> {
    /// The record's values for the chain's; both scores are remembered.
    fn moved(&self, values: [f64; N], [own_before, target_before]: &mut [[f64; N]; 2]) -> [f64; N] {
        let mut scores = values;
        for (score, own) in scores.iter_mut().zip(&self.own) {
            *score = own.score(*score);
        }
        let innovation = self.own_memory.innovation(own_before, &scores);
        *own_before = scores;
        *target_before = self.target_memory.next(target_before, &innovation);
        let mut moved = *target_before;
        for (value, target) in moved.iter_mut().zip(&self.target) {
            *value = target.value(*value);
        }
        moved
    }
}

impl Nest {
    /// From the record's parts and from those of many years of the chain, both `[year][part]`; `follows` tells which of the
    /// record's years follow on the one before.
    pub fn of(
        year: &CommonYear,
        wet_above_mm: f64,
        record: &[Vec<RecordPart>],
        follows: &[bool],
        drawn: &[Vec<DrawnPart>],
    ) -> Self {
        let mut nest = Self {
            wet_above_mm,
            parts: part_nests(year, wet_above_mm, record, follows, drawn),
            seasons: Stage {
                own: [Normal::default(); SEASONAL],
                own_memory: LagOne::NONE,
                target: [Normal::default(); SEASONAL],
                target_memory: LagOne::NONE,
            },
        };
        nest.fit_seasons(record, follows, drawn);
        nest.fit_remainder(record, drawn);
        nest
    }

    /// Factor on the departures of daily temperature in a part.
    pub fn spread(&self, part: usize) -> f64 {
        self.parts[part].spread
    }

    /// What the parts of a year are changed by, in `changes`.
    pub fn year(&self, drawn: &[DrawnPart], walk: &mut NestWalk, changes: &mut Vec<PartChange>) {
        self.move_parts(drawn, &mut walk.part, changes);
        let values = self.season_values(drawn, changes);
        let moved = self.seasons.moved(values, &mut walk.year);
        for season in 0..2 {
            let at = 2 * season;
            let wet_mm = self.wet_mm(drawn, season);
            let excess = |root: f64| (squared(root) - wet_mm).max(0.0);
            let factor = ratio(excess(moved[at]), excess(values[at]));
            let shift_c = moved[at + 1] - values[at + 1];
            let of_season =
                self.parts.iter().zip(changes.iter_mut()).filter(|(part, _)| part.season == season);
            for (part, change) in of_season {
                change.excess_factor *= factor * part.excess_factor;
                change.shift_c += shift_c + part.shift_c;
            }
        }
    }

    fn move_parts(&self, drawn: &[DrawnPart], walk: &mut [[f64; 2]; 2], changes: &mut Vec<PartChange>) {
        changes.clear();
        for (part, drawn) in self.parts.iter().zip(drawn) {
            let wet_mm = self.wet_above_mm * drawn.wet_days;
            let mean_c = part.mean_c(drawn);
            let [root, moved_c] = part.stage.moved([libm::sqrt(wet_mm + drawn.excess_mm), mean_c], walk);
            changes.push(PartChange {
                excess_factor: ratio((squared(root) - wet_mm).max(0.0), drawn.excess_mm),
                shift_c: moved_c - mean_c,
            });
        }
    }

    /// Roots of the seasons' precipitation and their mean temperatures, with the parts' changes.
    fn season_values(&self, drawn: &[DrawnPart], changes: &[PartChange]) -> [f64; SEASONAL] {
        let mut values = [0.0; SEASONAL];
        let mut days = [0.0; 2];
        for ((part, drawn), change) in self.parts.iter().zip(drawn).zip(changes) {
            let at = 2 * part.season;
            values[at] += self.wet_above_mm * drawn.wet_days + change.excess_factor * drawn.excess_mm;
            values[at + 1] += part.days * (part.mean_c(drawn) + change.shift_c);
            days[part.season] += part.days;
        }
        for season in 0..2 {
            values[2 * season] = libm::sqrt(values[2 * season]);
            values[2 * season + 1] /= f64::max(days[season], 1.0);
        }
        values
    }

    /// What the wet days of a season have up to the threshold, mm.
    fn wet_mm(&self, drawn: &[DrawnPart], season: usize) -> f64 {
        let of_season = self.parts.iter().zip(drawn).filter(|(part, _)| part.season == season);
        self.wet_above_mm * of_season.map(|(_, drawn)| drawn.wet_days).sum::<f64>()
    }

    /// Precipitation and mean temperature of both seasons of a year of the record.
    fn record_seasons(&self, year: &[RecordPart]) -> [f64; SEASONAL] {
        let mut values = [0.0; SEASONAL];
        let mut days = [0.0; 2];
        for (part, record) in self.parts.iter().zip(year) {
            values[2 * part.season] += record.precipitation_mm;
            values[2 * part.season + 1] += part.days * record.mean_c;
            days[part.season] += part.days;
        }
        for season in 0..2 {
            values[2 * season + 1] /= f64::max(days[season], 1.0);
        }
        values
    }

    /// Takes from the parts what is still between the mean of nested years and the record's.
    fn fit_remainder(&mut self, record: &[Vec<RecordPart>], drawn: &[Vec<DrawnPart>]) {
        let (mut walk, mut changes) = (NestWalk::default(), Vec::new());
        let mut sums = vec![[0.0; 3]; self.parts.len()];
        for year in drawn {
            self.year(year, &mut walk, &mut changes);
            for (((sums, part), drawn), change) in sums.iter_mut().zip(&self.parts).zip(year).zip(&changes) {
                sums[0] += self.wet_above_mm * drawn.wet_days;
                sums[1] += change.excess_factor * drawn.excess_mm;
                sums[2] += part.mean_c(drawn) + change.shift_c;
            }
        }
        let years = drawn.len() as f64;
        for (at, (part, sums)) in self.parts.iter_mut().zip(sums).enumerate() {
            let mean = |of: fn(&RecordPart) -> f64| {
                record.iter().map(|year| of(&year[at])).sum::<f64>() / record.len() as f64
            };
            let [wet_mm, excess_mm, mean_c] = sums.map(|sum| sum / years);
            let wanted_mm = (mean(|part| part.precipitation_mm) - wet_mm).max(0.0);
            part.excess_factor = ratio(wanted_mm, excess_mm);
            part.shift_c = mean(|part| part.mean_c) - mean_c;
        }
    }
}

impl PartNest {
    /// Mean temperature before nesting, degC.
    fn mean_c(&self, drawn: &DrawnPart) -> f64 {
        (drawn.usual_c + self.spread * drawn.departure_c) / self.days
    }
}

fn ratio(wanted: f64, found: f64) -> f64 {
    if found > 0.0 { (wanted / found).clamp(FACTORS[0], FACTORS[1]) } else { 1.0 }
}
