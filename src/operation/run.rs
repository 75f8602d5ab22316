//! A realization's years, routed, stored and measured, every level side by side.

use super::all_books::{self, AllBooks, Better, CHANGED};
use super::change::Change;
use super::dates::Dates;
use super::inflow_measures;
use super::plan::Operation;
use super::year_books::YearBooks;
use crate::calendar::COMMON_DATES;
use crate::inflow::{Router, WaterYear};
use crate::reservoir::{Day, OpenPool, Pool, Reservoir, step};
use crate::season::{Kind, Measure, period_value};

/// What a realization comes to.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct Operated {
    /// `[level][year][measure]`, the measures of [`Operation::yearly`].
    pub yearly: Vec<f64>,
    /// `[level][measure]`, the measures of [`Operation::over_years`].
    pub over_years: Vec<f64>,
    /// `[level][change][measure]`, what [`Operation::tried`] comes to.
    pub changed: Vec<f64>,
}

impl Operated {
    /// The years of one of so many levels, each with so many measures.
    pub fn years(
        &self,
        (level, levels): (usize, usize),
        measures: usize,
    ) -> impl Iterator<Item = &[f64]> + Clone {
        let years = self.yearly.len() / (levels * measures);
        self.yearly.chunks_exact(measures).skip(level * years).take(years)
    }

    /// Period values of [`Operation::measures`] at one of so many levels; `kinds` are those of its yearly ones.
    pub fn period_values(&self, (level, levels): (usize, usize), kinds: &[Kind]) -> Vec<f64> {
        let years = self.years((level, levels), kinds.len());
        let mut one = Vec::with_capacity(years.clone().count());
        let of_years = kinds.iter().enumerate().map(|(at, kind)| {
            one.clear();
            one.extend(years.clone().map(|year| year[at]));
            period_value(*kind, &mut one)
        });
        let mut values: Vec<f64> = of_years.collect();
        let over_years = self.over_years.len() / levels;
        values.extend(&self.over_years[level * over_years..(level + 1) * over_years]);
        values
    }

    /// Puts more levels behind its own.
    pub fn append(&mut self, more: Self) {
        self.yearly.extend(more.yearly);
        self.over_years.extend(more.over_years);
        self.changed.extend(more.changed);
    }
}

/// One reservoir at one level under one set of rules.
#[derive(Clone)]
struct Column {
    level: usize,
    change: usize,
    storage_hm3: f64,
    year: YearBooks,
    all: AllBooks,
}

/// A set of rules, laid out for the days.
struct Rules {
    /// Of each date of a common year.
    not_above_hm3: Vec<f64>,
    /// Of a day in each month.
    demand_hm3: [f64; 12],
}

impl Operation {
    /// What is told of each of the rules tried, and which way it is better.
    pub fn of_changes() -> Vec<(Measure, Better)> {
        all_books::list_of_changes()
    }

    /// Runs the years of a realization, in their order, at so many levels.
    ///
    /// The stores begin as years like the first leave them, so that water is on its way; the reservoir begins with its stated storage.
    ///
    /// # Errors
    /// A water balance that does not close: a fault of ours.
    pub fn run(&self, years: &[WaterYear<'_>], levels: usize) -> Result<Operated, OpenPool> {
        let mut router = Router::new(&self.routing, self.area_km2, levels);
        let mut inflow = Vec::new();
        if let Some(first) = years.first() {
            router.begin(first, &mut inflow);
        }
        let mut stored = self.reservoir.as_ref().map(|reservoir| Stored::new(self, reservoir, levels));
        let mut yearly = vec![Vec::new(); levels];
        let mut of_level = Vec::new();
        for year in years {
            router.year(year, &mut inflow);
            let dates = Dates::of(&self.settings, year.first, year.days(levels));
            if let Some(stored) = &mut stored {
                stored.year(&dates, &inflow, levels)?;
            }
            for (level, into) in yearly.iter_mut().enumerate() {
                of_level.clear();
                of_level.extend(inflow.iter().skip(level).step_by(levels));
                inflow_measures::take(&dates, &of_level, into);
                if let Some(stored) = &stored {
                    stored.measures(level, into);
                }
            }
        }
        let (over_years, changed) = stored.map_or_else(Default::default, |stored| stored.in_all());
        Ok(Operated { yearly: yearly.concat(), over_years, changed })
    }
}

/// The reservoir at every level under every set of rules.
struct Stored<'a> {
    reservoir: &'a Reservoir,
    pool: Pool,
    full_hm3: f64,
    rules: Vec<Rules>,
    columns: Vec<Column>,
    /// `[date][column]`: storage on the dates of the year that was run last.
    on_dates_hm3: Vec<f64>,
}

impl<'a> Stored<'a> {
    fn new(operation: &Operation, reservoir: &'a Reservoir, levels: usize) -> Self {
        let tried = operation.tried();
        let rules = tried.iter().map(|change| Rules::of(*change, reservoir));
        let start_hm3 = reservoir.starting_hm3;
        let changes = tried.len();
        let column = |at: usize| Column {
            level: at / changes,
            change: at % changes,
            storage_hm3: start_hm3,
            year: YearBooks::open(start_hm3),
            all: AllBooks::default(),
        };
        Self {
            reservoir,
            pool: reservoir.pool(),
            full_hm3: reservoir.full_share * reservoir.capacity_hm3,
            rules: rules.collect(),
            columns: (0..levels * changes).map(column).collect(),
            on_dates_hm3: Vec::new(),
        }
    }

    /// Steps every column through a year of inflow, `[day][level]`.
    fn year(&mut self, dates: &Dates, inflow_hm3: &[f64], levels: usize) -> Result<(), OpenPool> {
        for column in &mut self.columns {
            column.year = YearBooks::open(column.storage_hm3);
        }
        self.on_dates_hm3.clear();
        let mut asked = dates.storage.iter().peekable();
        let days = dates.month.iter().zip(&dates.common).enumerate();
        for ((number, (month, common)), inflow) in days.zip(inflow_hm3.chunks_exact(levels)) {
            if asked.next_if_eq(&&number).is_some() {
                self.on_dates_hm3.extend(self.columns.iter().map(|column| column.storage_hm3));
            }
            let evaporation_hm3 = self.reservoir.evaporation_hm3_per_day[*month];
            let minimum_hm3 = self.reservoir.minimum_release_hm3_per_day[*month];
            // The rules as stated come first.
            let stated_rule_hm3 = self.rules[0].not_above_hm3[*common];
            for column in &mut self.columns {
                let rules = &self.rules[column.change];
                let day = Day {
                    inflow_hm3: inflow[column.level],
                    evaporation_hm3,
                    minimum_hm3,
                    not_above_hm3: rules.not_above_hm3[*common],
                    demand_hm3: rules.demand_hm3[*month],
                };
                let out = step(&self.pool, column.storage_hm3, &day);
                column.storage_hm3 = out.storage_hm3;
                column.year.enter((number + 1) as f64, &day, &out, (self.full_hm3, stated_rule_hm3));
                column.all.enter(&day, &out);
            }
        }
        for column in &mut self.columns {
            column.year.ledger.close(column.year.from_hm3, column.storage_hm3)?;
            column.all.enter_year(&column.year);
        }
        Ok(())
    }

    /// The measures of the year that was run last, at a level, under the rules as stated.
    fn measures(&self, level: usize, into: &mut Vec<f64>) {
        let at = level * self.rules.len();
        into.extend(self.on_dates_hm3.iter().skip(at).step_by(self.columns.len()));
        into.extend(self.columns[at].year.measures());
    }

    /// What all years come to, `[level][measure]` under the rules as stated and `[level][change][measure]`.
    fn in_all(&self) -> (Vec<f64>, Vec<f64>) {
        let as_stated = self.columns.iter().filter(|column| column.change == 0);
        let over_years = as_stated.flat_map(|column| column.all.measures()).collect();
        let mut changed = Vec::with_capacity(self.columns.len() * CHANGED);
        for column in &self.columns {
            changed.extend(column.all.measures_of_changes());
        }
        (over_years, changed)
    }
}

impl Rules {
    fn of(change: Change, reservoir: &Reservoir) -> Self {
        let (rule, demand_hm3) = change.of(reservoir);
        Self { not_above_hm3: (0..COMMON_DATES).map(|date| rule.not_above_hm3(date)).collect(), demand_hm3 }
    }
}
