//! Days of routing, for many columns of water input side by side.

use super::linear::Store;
use super::routing::Routing;
use crate::units::cubic_hectometres;
use chrono::{Datelike, NaiveDate};

/// A water year of water input, `[day][column]`, mm over the basin.
#[derive(Debug, Clone, Copy)]
pub struct WaterYear<'a> {
    /// Its first day.
    pub first: NaiveDate,
    /// Water input of every column, day by day, mm.
    pub water_input_mm: &'a [f64],
}

impl WaterYear<'_> {
    /// Its days, with that many columns.
    pub fn days(&self, columns: usize) -> usize {
        self.water_input_mm.len() / columns.max(1)
    }
}

/// Routes water input of a basin, and holds what is on its way.
#[derive(Debug, Clone)]
pub struct Router {
    runoff_fraction: [f64; 12],
    stores: [Store; 2],
    slow_share: f64,
    area_km2: f64,
    /// What both stores hold, hm3, `[column]`.
    held_hm3: [Vec<f64>; 2],
}

impl Router {
    /// A router of a basin of so many km2, its stores empty, for so many columns.
    pub fn new(routing: &Routing, area_km2: f64, columns: usize) -> Self {
        let (stores, slow_share) = routing.stores();
        let held_hm3 = [vec![0.0; columns], vec![0.0; columns]];
        Self { runoff_fraction: routing.runoff_fraction, stores, slow_share, area_km2, held_hm3 }
    }

    /// What the stores of a column hold together, hm3.
    pub fn held_hm3(&self, column: usize) -> f64 {
        self.held_hm3[0][column] + self.held_hm3[1][column]
    }

    /// Fills the stores as if all years before had been like this one, which is run for nothing else: a realization begins with
    /// the water on its way that years like its first leave.
    pub fn begin(&mut self, first: &WaterYear<'_>, inflow_hm3: &mut Vec<f64>) {
        self.held_hm3.iter_mut().for_each(|held| held.fill(0.0));
        self.year(first, inflow_hm3);
        let days = first.days(self.held_hm3[0].len());
        for (store, held) in self.stores.iter().zip(&mut self.held_hm3) {
            held.iter_mut().for_each(|held| *held = store.year_after_year(*held, days));
        }
    }

    /// Routes a year; `inflow_hm3` becomes its inflow, `[day][column]`, hm3 a day.
    pub fn year(&mut self, year: &WaterYear<'_>, inflow_hm3: &mut Vec<f64>) {
        let columns = self.held_hm3[0].len();
        inflow_hm3.clear();
        let [quick, slow] = self.stores;
        let [held_quick, held_slow] = &mut self.held_hm3;
        for (date, row) in year.first.iter_days().zip(year.water_input_mm.chunks_exact(columns)) {
            let runs_off = self.runoff_fraction[date.month0() as usize];
            for ((input_mm, quickly), slowly) in row.iter().zip(&mut *held_quick).zip(&mut *held_slow) {
                let water_hm3 = runs_off * cubic_hectometres(*input_mm, self.area_km2);
                let to_slow_hm3 = self.slow_share * water_hm3;
                let (left_quick, from_quick) = quick.day(*quickly, water_hm3 - to_slow_hm3);
                let (left_slow, from_slow) = slow.day(*slowly, to_slow_hm3);
                (*quickly, *slowly) = (left_quick, left_slow);
                inflow_hm3.push(from_quick + from_slow);
            }
        }
    }
}

#[cfg(test)]
mod tests {
    use super::super::routing::SlowStore;
    use super::*;

    fn october(year: i32) -> NaiveDate {
        NaiveDate::from_ymd_opt(year, 10, 1).unwrap()
    }

    /// By hand: 10 mm on 100 km2 are 1 hm3; a runoff fraction of 0.6 leaves 0.6, and without stores it comes the same day.
    #[test]
    fn without_stores_what_runs_off_comes_the_same_day() {
        let routing = Routing { runoff_fraction: [0.6; 12], recession_days: 0.0, slow: None };
        let mut router = Router::new(&routing, 100.0, 2);
        let mut inflow = Vec::new();
        router
            .year(&WaterYear { first: october(2000), water_input_mm: &[10.0, 0.0, 0.0, 20.0] }, &mut inflow);
        assert_eq!(inflow, [0.6, 0.0, 0.0, 1.2]);
    }

    /// Each month has its own fraction: 31 October runs off by October's, the next day by November's.
    #[test]
    fn a_day_runs_off_by_its_month() {
        let mut runoff_fraction = [0.0; 12];
        (runoff_fraction[9], runoff_fraction[10]) = (0.25, 0.75);
        let routing = Routing { runoff_fraction, recession_days: 0.0, slow: None };
        let mut inflow = Vec::new();
        Router::new(&routing, 1000.0, 1)
            .year(&WaterYear { first: october(2000), water_input_mm: &[1.0; 32] }, &mut inflow);
        assert_eq!([inflow[30], inflow[31]], [0.25, 0.75]);
    }

    /// An identity: all that runs off has come, or is on its way.
    #[test]
    fn no_water_is_made_or_lost() {
        let slow = Some(SlowStore { share: 0.4, recession_days: 120.0 });
        let routing = Routing { runoff_fraction: [0.7; 12], recession_days: 6.0, slow };
        let water: Vec<f64> = (0..365).map(|day| f64::from(day * 7919 % 31)).collect();
        let mut router = Router::new(&routing, 250.0, 1);
        let mut inflow = Vec::new();
        router.year(&WaterYear { first: october(2000), water_input_mm: &water }, &mut inflow);
        let runs_off = 0.7 * 0.25 * water.iter().sum::<f64>();
        let found = inflow.iter().sum::<f64>() + router.held_hm3(0);
        assert!((found / runs_off - 1.0).abs() < 1e-12, "{found} of {runs_off}");
        assert!(inflow.iter().all(|inflow| *inflow >= 0.0));
    }
}
