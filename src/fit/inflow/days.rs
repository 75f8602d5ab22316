//! Water input of the record's own years beside observed inflow, and what routing makes of it.

use crate::calendar::MonthDay;
use crate::inflow::{ObservedInflow, Router, Routing, WaterYear};
use crate::snow::{Engine, Lanes, OpenLedger};
use crate::weather::Series;
use chrono::NaiveDate;

/// A water year of the record.
#[derive(Debug, Clone, PartialEq)]
pub struct InflowYear {
    /// The water year.
    pub water_year: i32,
    /// Its first day.
    pub first: NaiveDate,
    /// Whether it follows on the one before; else water on its way is that of a year like itself.
    pub follows: bool,
    /// Water that reaches the ground, day by day, mm over the basin.
    pub water_input_mm: Vec<f64>,
    /// Observed inflow, where there is any, day by day, hm3.
    pub observed_hm3: Vec<Option<f64>>,
}

/// The record's own years.
#[derive(Debug, Clone, PartialEq)]
pub struct InflowRecord {
    /// Area of the basin, km2.
    pub area_km2: f64,
    /// The window of inflow that volumes are told of, first and last day.
    pub window: Option<[MonthDay; 2]>,
    /// The water years in use, in their order.
    pub years: Vec<InflowYear>,
}

impl InflowRecord {
    /// Runs every year of the record through lanes whose first basin mean is the basin's without any warming. Snow after a gap starts
    /// bare.
    ///
    /// # Errors
    /// A ledger that does not close.
    pub fn run(
        lanes: &Lanes,
        weather: &Series,
        observed: &ObservedInflow,
        area_km2: f64,
        window: Option<[MonthDay; 2]>,
    ) -> Result<Self, OpenLedger> {
        let basin = lanes.first_mix_column();
        let mut years = Vec::with_capacity(weather.years.len());
        Engine::new(lanes, false).years(weather, |span, block| {
            let of = |table: &[f64], day: usize| block.row(table, day)[basin];
            let input = |day| of(&block.outflow_mm, day) + of(&block.bare_ground_rain_mm, day);
            let dates = span.first.iter_days().take(block.days);
            years.push(InflowYear {
                water_year: span.water_year,
                first: span.first,
                follows: span.follows,
                water_input_mm: (0..block.days).map(input).collect(),
                observed_hm3: dates.map(|date| observed.hm3_a_day.get(&date).copied()).collect(),
            });
            Ok::<(), OpenLedger>(())
        })?;
        Ok(Self { area_km2, window, years })
    }

    /// Whether each year has observed inflow on any day.
    pub fn observed_years(&self) -> Vec<bool> {
        self.years.iter().map(|year| year.observed_hm3.iter().any(Option::is_some)).collect()
    }

    /// Inflow by a routing, `[year][day]`, hm3 a day. The first year, and each that does not follow on the one before, begins
    /// with the water on its way that years like it leave.
    pub fn routed(&self, routing: &Routing) -> Vec<Vec<f64>> {
        let mut router = Router::new(routing, self.area_km2, 1);
        let mut all = Vec::with_capacity(self.years.len());
        for (at, year) in self.years.iter().enumerate() {
            let of_year = WaterYear { first: year.first, water_input_mm: &year.water_input_mm };
            let mut inflow_hm3 = Vec::with_capacity(year.water_input_mm.len());
            if at == 0 || !year.follows {
                router.begin(&of_year, &mut inflow_hm3);
            }
            router.year(&of_year, &mut inflow_hm3);
            all.push(inflow_hm3);
        }
        all
    }
}
