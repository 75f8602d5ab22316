//! Random operations: a basin's routing, a reservoir, changes of its rules, and years of water input at several levels.

use crate::naive_operation;
use chrono::NaiveDate;
use proptest::array::{uniform2, uniform12};
use proptest::collection::vec;
use proptest::prelude::*;
use std::collections::BTreeMap;
use thawline::calendar::{MonthDay, WaterYearStart};
use thawline::inflow::{Routing, SlowStore, WaterYear};
use thawline::operation::{Change, Operated, Operation, OperationSettings};
use thawline::reservoir::{Demand, Reservoir, RulePoint};

/// A random operation and what is put through it.
#[derive(Debug, Clone)]
pub struct Operating {
    pub operation: Operation,
    pub first_water_year: i32,
    /// Mean water input of each month, mm a day, `[level][year]`.
    pub months_mm: Vec<Vec<[f64; 12]>>,
}

/// The day so many days after 1 January in a common year.
fn month_day(after: u32) -> MonthDay {
    let date = NaiveDate::from_yo_opt(2001, after + 1).expect("a day of a common year");
    MonthDay::parse(&date.format("%m-%d").to_string()).expect("a day of every year")
}

/// The day so many days after another, around the year's end.
fn days_after(first: MonthDay, days: u32) -> MonthDay {
    month_day((first.day_of_common_year() - 1 + days) % 365)
}

prop_compose! {
    fn settings()(
        month in 1..=12_u32,
        start_day in prop_oneof![3 => Just(1_u32), 1 => Just(15)],
        windows in vec(uniform2(0..365_u32), 0..3),
        before in vec(0..365_u32, 0..3),
        storage in vec(0..365_u32, 0..3),
    ) -> OperationSettings {
        let start = MonthDay::new(month, start_day).expect("a day");
        let window = |[a, b]: [u32; 2]| [a.min(b), a.max(b)].map(|days| days_after(start, days));
        OperationSettings {
            water_year_starts: WaterYearStart(start),
            volume_windows: windows.into_iter().map(window).collect(),
            shares_before: before.into_iter().map(month_day).collect(),
            storage_dates: storage.into_iter().map(month_day).collect(),
            is_observed: true,
        }
    }
}

prop_compose! {
    fn routings()(
        is_even in any::<bool>(),
        fractions in uniform12(0.0..=1.0),
        recession_days in prop_oneof![Just(0.0), 0.2..40.0],
        slow in prop::option::of((0.0..=1.0, 0.1..400.0)),
    ) -> Routing {
        let runoff_fraction = if is_even { [fractions[0]; 12] } else { fractions };
        let slow = slow.map(|(share, longer)| SlowStore { share, recession_days: recession_days + longer });
        Routing { runoff_fraction, recession_days, slow }
    }
}

prop_compose! {
    /// A reservoir below a basin of so many km2: from one that is hardly there to one that holds years of inflow.
    fn reservoirs(area_km2: f64)(
        capacity_m in 0.02..3.0,
        dead in prop_oneof![Just(0.0), 0.0..0.6],
        start in 0.0..=1.0,
        outlets_mm in 0.5..30.0,
        minimum in prop_oneof![Just([0.0; 12]), uniform12(0.0..=1.0)],
        minimum_mm in 0.0..1.5_f64,
        demand_mm in uniform12(prop_oneof![1 => Just(0.0), 4 => 0.0..8.0]),
        is_target in any::<bool>(),
        rule in vec((0..365_u32, 0.0..=1.0), 0..5),
        evaporation_mm in prop_oneof![Just([0.0; 12]), uniform12(0.0..1.0)],
        full_share in prop_oneof![Just(1.0), 0.5..=1.0],
    ) -> Reservoir {
        let hm3 = |mm: f64| mm * area_km2 / 1000.0;
        let capacity_hm3 = hm3(1000.0 * capacity_m);
        let dead_hm3 = dead * capacity_hm3;
        let rule: BTreeMap<u32, f64> = rule.into_iter().collect();
        let demand = demand_mm.map(hm3);
        Reservoir {
            name: "Random".to_owned(),
            capacity_hm3,
            dead_hm3,
            starting_hm3: start * capacity_hm3,
            release_capacity_hm3_per_day: hm3(outlets_mm),
            minimum_release_hm3_per_day: minimum.map(|share| hm3(share * minimum_mm.min(outlets_mm))),
            demand_hm3_per_day: if is_target { Demand::InAll(demand) } else { Demand::OnTop(demand) },
            flood_rule: rule
                .into_iter()
                .map(|(day, share)| RulePoint {
                    on: month_day(day),
                    not_above_hm3: (dead_hm3 + share * (capacity_hm3 - dead_hm3)).min(capacity_hm3),
                })
                .collect(),
            evaporation_hm3_per_day: evaporation_mm.map(hm3),
            full_share,
        }
    }
}

fn changes() -> impl Strategy<Value = Vec<Change>> {
    let change = prop_oneof![
        (-120..120_i32).prop_map(Change::RefillMovedDays),
        (0.0..3.0).prop_map(Change::FloodSpaceTimes),
        (0.0..3.0).prop_map(Change::DemandTimes),
    ];
    vec(change, 0..4)
}

/// Years of water input: dry months among wet ones, so that they shrink to dry years.
fn months_mm(levels: std::ops::Range<usize>) -> impl Strategy<Value = Vec<Vec<[f64; 12]>>> {
    let month = prop_oneof![1 => Just(0.0), 3 => 0.0..14.0];
    (levels, 1..4_usize)
        .prop_flat_map(move |(levels, years)| vec(vec(uniform12(month.clone()), years), levels))
}

prop_compose! {
    /// Any operation, of which there may be no reservoir.
    pub fn operating()(area_km2 in 5.0..900.0)(
        settings in settings(),
        routing in routings(),
        reservoir in prop::option::weighted(0.9, reservoirs(area_km2)),
        changes in changes(),
        first_water_year in 1995..2005,
        months_mm in months_mm(1..4),
        area_km2 in Just(area_km2),
    ) -> Operating {
        let changes = if reservoir.is_some() { changes } else { Vec::new() };
        Operating { operation: Operation { settings, area_km2, routing, reservoir, changes }, first_water_year, months_mm }
    }
}

prop_compose! {
    /// One with a reservoir that can be, at one level.
    pub fn storing()(area_km2 in 5.0..900.0)(
        settings in settings(),
        routing in routings(),
        reservoir in reservoirs(area_km2),
        first_water_year in 1995..2005,
        months_mm in months_mm(1..2),
        area_km2 in Just(area_km2),
    ) -> Operating {
        let operation = Operation { settings, area_km2, routing, reservoir: Some(reservoir), changes: Vec::new() };
        Operating { operation, first_water_year, months_mm }
    }
}

impl Operating {
    /// Its years at one level: every day its month's mean, times a pattern that has a mean of about 1.
    pub fn years(&self, level: usize) -> Vec<naive_operation::Year> {
        use chrono::Datelike;
        let start = self.operation.settings.water_year_starts;
        let year = |(number, months): (usize, &[f64; 12])| {
            let water_year = self.first_water_year + number as i32;
            let first = start.first_day(water_year);
            let input = |(day, date): (usize, NaiveDate)| {
                let pattern = ((day + 37 * number) * 7919 % 31) as f64 / 15.0;
                months[date.month0() as usize] * pattern
            };
            let days = first.iter_days().enumerate().take(start.days_in(water_year));
            (first, days.map(input).collect())
        };
        self.months_mm[level].iter().enumerate().map(year).collect()
    }

    /// Runs the levels named, side by side.
    pub fn run(&self, levels: &[usize]) -> Operated {
        let of_levels: Vec<_> = levels.iter().map(|level| self.years(*level)).collect();
        let inputs: Vec<Vec<f64>> = (0..of_levels[0].len())
            .map(|year| {
                let days = 0..of_levels[0][year].1.len();
                days.flat_map(|day| of_levels.iter().map(move |years| years[year].1[day])).collect()
            })
            .collect();
        let years: Vec<WaterYear<'_>> = of_levels[0]
            .iter()
            .zip(&inputs)
            .map(|((first, _), input)| WaterYear { first: *first, water_input_mm: input })
            .collect();
        self.operation.run(&years, levels.len()).expect("books that close")
    }

    /// The reservoir, which must be there.
    pub fn reservoir(&self) -> &Reservoir {
        self.operation.reservoir.as_ref().expect("a reservoir")
    }

    /// The same with another reservoir.
    pub fn with(&self, reservoir: Reservoir) -> Self {
        let mut other = self.clone();
        other.operation.reservoir = Some(reservoir);
        other
    }

    /// Every year of the first level, each by the names of the measures.
    pub fn by_year(&self) -> Vec<BTreeMap<String, f64>> {
        let names: Vec<String> =
            self.operation.yearly().into_iter().map(|measure| measure.name.clone()).collect();
        let yearly = self.run(&[0]).yearly;
        yearly
            .chunks(names.len())
            .map(|year| names.iter().cloned().zip(year.iter().copied()).collect())
            .collect()
    }

    /// Over all years of the first level, by the names of the measures.
    pub fn over_years(&self) -> BTreeMap<String, f64> {
        let names = self.operation.over_years().into_iter().map(|measure| measure.name.clone());
        names.zip(self.run(&[0]).over_years).collect()
    }
}
