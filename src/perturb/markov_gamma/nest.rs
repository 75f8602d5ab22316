//! Years given back the variance that daily chains lack: months first, then seasons, precipitation and temperature
//! together (nesting, Srikanthan & Pegram 2009).
//!
//! The totals and means of each part of a year are turned into standard scores, freed of what they remember of each other
//! in the chain, given the record's correlations and memory, and turned back with the record's means and standard
//! deviations. What a part then has more or less is put on its wet days as a factor on what lies above the wet-day
//! threshold, and on all its days as a shift of temperature. Seasons follow on the parts so changed. Precipitation is
//! scored by its square root, which keeps totals above zero and their distribution skewed.

use super::common_year::CommonYear;
use super::lag_one::{LagOne, Matrix};
use super::scores::{Normal, mean_product, squared};
use super::sums::{DrawnPart, RecordPart};

/// A factor on a part's, or a season's, precipitation stays within these.
const FACTORS: [f64; 2] = [0.05, 20.0];
/// The spread of daily temperature within a part is changed by a factor within these.
const SPREADS: [f64; 2] = [0.5, 2.0];
/// From fewer pairs of years no memory from year to year can be told.
const LEAST_PAIRS: usize = 10;
/// No year remembers the one before it more than this.
const STRONGEST_MEMORY: f64 = 0.8;
/// Variables: precipitation and temperature of the cool season, then of the warm one.
const SEASONAL: usize = 4;

/// How a year's parts and seasons are changed.
#[derive(Debug, Clone, PartialEq)]
pub struct Nest {
    wet_day_mm: f64,
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
        wet_day_mm: f64,
        record: &[Vec<RecordPart>],
        follows: &[bool],
        drawn: &[Vec<DrawnPart>],
    ) -> Self {
        let mut nest = Self {
            wet_day_mm,
            parts: part_nests(year, wet_day_mm, record, follows, drawn),
            seasons: Stage {
                own: [Normal::default(); SEASONAL],
                own_memory: LagOne { a: [[0.0; SEASONAL]; SEASONAL], b: [[0.0; SEASONAL]; SEASONAL] },
                target: [Normal::default(); SEASONAL],
                target_memory: LagOne { a: [[0.0; SEASONAL]; SEASONAL], b: [[0.0; SEASONAL]; SEASONAL] },
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
            let wet_mm = self.wet_day_mm * drawn.wet_days;
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
            values[at] += self.wet_day_mm * drawn.wet_days + change.excess_factor * drawn.excess_mm;
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
        self.wet_day_mm * of_season.map(|(_, drawn)| drawn.wet_days).sum::<f64>()
    }

    fn fit_seasons(&mut self, record: &[Vec<RecordPart>], follows: &[bool], drawn: &[Vec<DrawnPart>]) {
        let (mut walk, mut changes) = ([[0.0; 2]; 2], Vec::new());
        let mut own = Vec::with_capacity(drawn.len());
        for year in drawn {
            self.move_parts(year, &mut walk, &mut changes);
            own.push(self.season_values(year, &changes));
        }
        let totals: Vec<[f64; SEASONAL]> = record.iter().map(|year| self.record_seasons(year)).collect();
        let mut roots = totals.clone();
        for values in &mut roots {
            for value in values.iter_mut().step_by(2) {
                *value = libm::sqrt(*value);
            }
        }
        let always = vec![true; own.len()];
        let (own_normal, own_m0, own_m1) = years_together(&own, &always);
        let (_, m0, m1) = years_together(&roots, follows);
        let pairs = follows.iter().skip(1).filter(|follows| **follows).count();
        let mut target: [Normal; SEASONAL] = std::array::from_fn(|at| Normal::of(&column(&totals, at)));
        for normal in target.iter_mut().step_by(2) {
            *normal = Normal::root_of(*normal);
        }
        self.seasons = Stage {
            own: own_normal,
            own_memory: LagOne::of(&own_m0, &own_m0, &own_m1),
            target,
            target_memory: LagOne::of(&m0, &m0, &memory_of_years(&m1, pairs)),
        };
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
                sums[0] += self.wet_day_mm * drawn.wet_days;
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

fn part_nests(
    year: &CommonYear,
    wet_day_mm: f64,
    record: &[Vec<RecordPart>],
    follows: &[bool],
    drawn: &[Vec<DrawnPart>],
) -> Vec<PartNest> {
    let count = year.parts.len();
    let zero = Stage {
        own: [Normal::default(); 2],
        own_memory: LagOne { a: [[0.0; 2]; 2], b: [[0.0; 2]; 2] },
        target: [Normal::default(); 2],
        target_memory: LagOne { a: [[0.0; 2]; 2], b: [[0.0; 2]; 2] },
    };
    let mut parts: Vec<PartNest> = (0..count)
        .map(|at| {
            let (days, is_cool) = year.parts[at];
            PartNest {
                days: days as f64,
                season: usize::from(!is_cool),
                spread: spread_factor(
                    days as f64,
                    record.iter().map(|year| year[at]),
                    drawn.iter().map(|year| year[at]),
                ),
                stage: zero.clone(),
                excess_factor: 1.0,
                shift_c: 0.0,
            }
        })
        .collect();
    let of_drawn = |year: &Vec<DrawnPart>| -> Vec<[f64; 2]> {
        let of_part = |(part, drawn): (&PartNest, &DrawnPart)| {
            [libm::sqrt(wet_day_mm * drawn.wet_days + drawn.excess_mm), part.mean_c(drawn)]
        };
        parts.iter().zip(year).map(of_part).collect()
    };
    let own = Sequence::of(drawn.iter().map(of_drawn).collect(), &vec![true; drawn.len()]);
    let roots = |year: &Vec<RecordPart>| -> Vec<[f64; 2]> {
        year.iter().map(|part| [libm::sqrt(part.precipitation_mm), part.mean_c]).collect()
    };
    let of_record = Sequence::of(record.iter().map(roots).collect(), follows).smoothed();
    for (at, part) in parts.iter_mut().enumerate() {
        let before = (at + count - 1) % count;
        let total = Normal::of(&record.iter().map(|year| year[at].precipitation_mm).collect::<Vec<_>>());
        part.stage = Stage {
            own: own.normal[at],
            own_memory: LagOne::of(&own.m0[at], &own.m0[before], &own.m1[at]),
            target: [Normal::root_of(total), of_record.normal[at][1]],
            target_memory: LagOne::of(&of_record.m0[at], &of_record.m0[before], &of_record.m1[at]),
        };
    }
    parts
}

/// The factor on departures with which daily temperature varies as much within a part as in the record; how much it
/// varies from year to year is the nesting's.
fn spread_factor(
    days: f64,
    record: impl ExactSizeIterator<Item = RecordPart>,
    drawn: impl Iterator<Item = DrawnPart>,
) -> f64 {
    let years = record.len() as f64;
    let wanted = record.map(|part| part.variance_c2).sum::<f64>() / years;
    let within = |sum: f64, squares: f64| squares / days - (sum / days) * (sum / days);
    let (mut usual, mut departures, mut count) = (0.0, 0.0, 0.0);
    for part in drawn {
        usual += within(part.usual_c, part.squares_c2[0]);
        departures += within(part.departure_c, part.squares_c2[1]);
        count += 1.0;
    }
    if departures <= 0.0 {
        return 1.0;
    }
    libm::sqrt(((wanted - usual / count) / (departures / count)).max(0.0)).clamp(SPREADS[0], SPREADS[1])
}

/// Precipitation roots and temperatures of the parts of years, one part after another.
struct Sequence {
    normal: Vec<[Normal; 2]>,
    /// Correlation within each part.
    m0: Vec<Matrix<2>>,
    /// Correlation of each part with the one before it.
    m1: Vec<Matrix<2>>,
}

impl Sequence {
    fn of(values: Vec<Vec<[f64; 2]>>, follows: &[bool]) -> Self {
        let count = values.first().map_or(0, Vec::len);
        let normal_of = |at: usize| -> [Normal; 2] {
            std::array::from_fn(|variable| {
                Normal::of(&values.iter().map(|year| year[at][variable]).collect::<Vec<_>>())
            })
        };
        let normal: Vec<[Normal; 2]> = (0..count).map(normal_of).collect();
        let scored = |year: &Vec<[f64; 2]>| -> Vec<[f64; 2]> {
            let of_part = |(at, values): (usize, &[f64; 2])| {
                std::array::from_fn(|variable| normal[at][variable].score(values[variable]))
            };
            year.iter().enumerate().map(of_part).collect()
        };
        let scores: Vec<Vec<[f64; 2]>> = values.iter().map(scored).collect();
        let matrix = |pairs: &[([f64; 2], [f64; 2])]| -> Matrix<2> {
            std::array::from_fn(|row| {
                std::array::from_fn(|column| mean_product(pairs.iter().map(|(a, b)| (a[row], b[column]))))
            })
        };
        let m0 = |at: usize| matrix(&scores.iter().map(|year| (year[at], year[at])).collect::<Vec<_>>());
        let m1 = |at: usize| {
            let pairs: Vec<([f64; 2], [f64; 2])> = if at > 0 {
                scores.iter().map(|year| (year[at], year[at - 1])).collect()
            } else {
                let linked = scores.windows(2).zip(&follows[1..]).filter(|(_, follows)| **follows);
                linked.map(|(years, _)| (years[1][0], years[0][count - 1])).collect()
            };
            matrix(&pairs)
        };
        Self { m0: (0..count).map(m0).collect(), m1: (0..count).map(m1).collect(), normal }
    }

    /// The correlations of a short record, steadied: those within a part with a quarter each of its neighbours', those
    /// with the part before the same all year.
    fn smoothed(self) -> Self {
        let count = self.m0.len();
        let m0 = |at: usize| {
            let around = [(at + count - 1) % count, at, (at + 1) % count];
            let mixed =
                mean_of(around.iter().zip([0.25, 0.5, 0.25]).map(|(at, weight)| (&self.m0[*at], weight)));
            std::array::from_fn(|row| {
                std::array::from_fn(
                    |column| if row == column { self.m0[at][row][row] } else { mixed[row][column] },
                )
            })
        };
        let m1 = mean_of(self.m1.iter().map(|m1| (m1, 1.0 / count as f64)));
        Self { m0: (0..count).map(m0).collect(), m1: vec![m1; count], normal: self.normal }
    }
}

fn mean_of<'m>(weighted: impl Iterator<Item = (&'m Matrix<2>, f64)>) -> Matrix<2> {
    let mut mean = [[0.0; 2]; 2];
    for (matrix, weight) in weighted {
        for (mean, value) in mean.iter_mut().flatten().zip(matrix.iter().flatten()) {
            *mean += weight * value;
        }
    }
    mean
}

fn column(values: &[[f64; SEASONAL]], at: usize) -> Vec<f64> {
    values.iter().map(|values| values[at]).collect()
}

/// Means, standard deviations and correlations of years, and correlations with the year before.
fn years_together(
    values: &[[f64; SEASONAL]],
    follows: &[bool],
) -> ([Normal; SEASONAL], Matrix<SEASONAL>, Matrix<SEASONAL>) {
    let normal: [Normal; SEASONAL] = std::array::from_fn(|at| Normal::of(&column(values, at)));
    let scores: Vec<[f64; SEASONAL]> =
        values.iter().map(|values| std::array::from_fn(|at| normal[at].score(values[at]))).collect();
    let m0 = std::array::from_fn(|row| {
        std::array::from_fn(|column| mean_product(scores.iter().map(|of| (of[row], of[column]))))
    });
    let m1 = std::array::from_fn(|row| {
        std::array::from_fn(|column| {
            let linked = scores.windows(2).zip(&follows[1..]).filter(|(_, follows)| **follows);
            mean_product(linked.map(|(years, _)| (years[1][row], years[0][column])))
        })
    });
    (normal, m0, m1)
}

/// The memory from year to year that is kept: that of precipitation with precipitation, and of each season's temperature
/// with itself. A sample's lag-1 correlation lies below that of what it is drawn from by about `(1 + 4r)/n` (Kendall
/// 1954), which is put back.
fn memory_of_years(m1: &Matrix<SEASONAL>, pairs: usize) -> Matrix<SEASONAL> {
    let mut kept = [[0.0; SEASONAL]; SEASONAL];
    if pairs < LEAST_PAIRS {
        return kept;
    }
    let count = pairs as f64;
    for row in 0..SEASONAL {
        for column in 0..SEASONAL {
            let are_amounts = row % 2 == 0 && column % 2 == 0;
            if row == column {
                let unbiased = (count * m1[row][row] + 1.0) / (count - 4.0);
                kept[row][row] = unbiased.clamp(-STRONGEST_MEMORY, STRONGEST_MEMORY);
            } else if are_amounts {
                kept[row][column] = m1[row][column].clamp(-STRONGEST_MEMORY, STRONGEST_MEMORY);
            }
        }
    }
    kept
}

fn ratio(wanted: f64, found: f64) -> f64 {
    if found > 0.0 { (wanted / found).clamp(FACTORS[0], FACTORS[1]) } else { 1.0 }
}
