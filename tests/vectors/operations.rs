//! Flows, routed water and a reservoir, through the whole of an operation.

use super::case::Case;
use chrono::{Datelike, NaiveDate};
use std::collections::BTreeMap;
use thawline::calendar::{MonthDay, WaterYearStart};
use thawline::inflow::{Router, Routing, WaterYear};
use thawline::operation::{Operation, OperationSettings};
use thawline::reservoir::{Demand, Reservoir};
use thawline::units::{FlowUnit, acre_feet, cubic_hectometres, depth_mm};

fn unit(name: &str) -> FlowUnit {
    let found = FlowUnit::NAMES.iter().find(|(of, _)| *of == name);
    found.unwrap_or_else(|| panic!("no unit '{name}'")).1
}

/// One of each unit of flow, and as much as each of a depth a day over an area.
pub fn flows(case: &Case) {
    let units: Vec<String> = case.input("units");
    let a_day: Vec<f64> = units.iter().map(|name| unit(name).to_hm3_a_day(1.0)).collect();
    case.check("hm3_a_day", &a_day);
    case.check("acre_feet_a_day", &a_day.iter().copied().map(acre_feet).collect::<Vec<_>>());
    case.check("first_over_each", &a_day.iter().map(|hm3| a_day[0] / hm3).collect::<Vec<_>>());
    if let Some((mm_a_day, area_km2)) =
        case.input_or_none("depth_mm_a_day").zip(case.input_or_none("area_km2"))
    {
        let flow = cubic_hectometres(mm_a_day, area_km2);
        case.check("depth_as_each", &a_day.iter().map(|hm3| flow / hm3).collect::<Vec<_>>());
    }
}

/// A volume as a depth over an area.
pub fn depths(case: &Case) {
    let found = depth_mm(case.input("volume_hm3"), case.input("area_km2"));
    case.check("depth_mm", &[found]);
}

fn day(text: &str) -> MonthDay {
    MonthDay::parse(text).expect("a day of every year")
}

/// A basin of 1000 km2, of which all water runs off at once, so that mm are hm3.
fn plain(reservoir: Option<Reservoir>) -> Operation {
    Operation {
        settings: OperationSettings {
            water_year_starts: WaterYearStart(day("10-01")),
            volume_windows: vec![[day("04-01"), day("07-31")]],
            shares_before: vec![day("04-01")],
            storage_dates: Vec::new(),
            is_observed: true,
        },
        area_km2: 1000.0,
        routing: Routing { runoff_fraction: [1.0; 12], recession_days: 0.0, slow: None },
        reservoir,
        changes: Vec::new(),
    }
}

/// A reservoir that has nothing but a capacity and a demand, and is full.
fn bare(capacity_hm3: f64, demand_hm3: [f64; 12]) -> Reservoir {
    Reservoir {
        name: "By hand".to_owned(),
        capacity_hm3,
        dead_hm3: 0.0,
        starting_hm3: capacity_hm3,
        release_capacity_hm3_per_day: 1e5,
        minimum_release_hm3_per_day: [0.0; 12],
        demand_hm3_per_day: Demand::OnTop(demand_hm3),
        flood_rule: Vec::new(),
        evaporation_hm3_per_day: [0.0; 12],
        full_share: 1.0,
    }
}

fn first_day(water_year: i32) -> NaiveDate {
    WaterYearStart(day("10-01")).first_day(water_year)
}

/// Runs whole water years from one on, of this water on every date; measures of every year, and over all.
fn run(
    operation: &Operation,
    water_years: std::ops::Range<i32>,
    water: impl Fn(usize, NaiveDate) -> f64,
) -> (Vec<BTreeMap<String, f64>>, BTreeMap<String, f64>) {
    let start = operation.settings.water_year_starts;
    let water: Vec<Vec<f64>> = water_years
        .clone()
        .map(|year| {
            let days = first_day(year).iter_days().take(start.days_in(year));
            days.enumerate().map(|(number, date)| water(number, date)).collect()
        })
        .collect();
    let years: Vec<WaterYear<'_>> = water_years
        .zip(&water)
        .map(|(year, water)| WaterYear { first: first_day(year), water_input_mm: water })
        .collect();
    let found = operation.run(&years, 1).expect("books that close");
    let named = |measures: Vec<thawline::season::Measure>, values: &[f64]| {
        measures.into_iter().map(|measure| measure.name.clone()).zip(values.iter().copied()).collect()
    };
    let measures = operation.yearly().len();
    let yearly = found.yearly.chunks(measures).map(|year| named(operation.yearly(), year)).collect();
    (yearly, named(operation.over_years(), &found.over_years))
}

/// A year of inflow: some amounts from a day on, or a flow that never changes; hm3 and days.
pub fn inflow_year(case: &Case) {
    let water_year: i32 = case.input("water_year");
    let amounts: Vec<f64> = case.input_or_none("amounts_hm3").unwrap_or_default();
    let from: String = case.input_or_none("from").unwrap_or_else(|| "10-01".to_owned());
    let even =
        case.input_or_none::<String>("every_day_one").map_or(0.0, |name| unit(&name).to_hm3_a_day(1.0));
    let from = thawline::calendar::day_of_water_year(first_day(water_year), day(&from)) - 1;
    let water = |number: usize, _| {
        even + number.checked_sub(from).and_then(|at| amounts.get(at)).copied().unwrap_or(0.0)
    };
    let (yearly, _) = run(&plain(None), water_year..water_year + 1, water);
    for name in yearly[0].keys() {
        case.check(name, &[yearly[0][name]]);
    }
    case.check("year_acre_feet", &[acre_feet(yearly[0]["inflow_year_hm3"])]);
}

/// What runs out of a linear reservoir after one day's water, day by day.
pub fn recession(case: &Case) {
    let (recession_days, water): (f64, f64) = (case.input("recession_days"), case.input("water_hm3"));
    let (days, every): (usize, usize) = (case.input("days"), case.input("every"));
    let routing = Routing { recession_days, ..plain(None).routing };
    let mut input = vec![0.0; days];
    input[0] = water;
    let mut outflow = Vec::new();
    Router::new(&routing, 1000.0, 1)
        .year(&WaterYear { first: first_day(2001), water_input_mm: &input }, &mut outflow);
    case.check("outflow_hm3", &outflow);
    let later = outflow.iter().skip(1).step_by(every).collect::<Vec<_>>();
    case.check("ratios", &later.windows(2).map(|pair| pair[1] / pair[0]).collect::<Vec<_>>());
}

/// A reservoir of the capacity of a storage-yield analysis, and of a little less and more: two years of the same months, each month's
/// inflow and demand even over its days.
pub fn storage_yield(case: &Case) {
    let inflow: [f64; 12] = case.input("inflow_hm3_from_october");
    let (demand, capacity): (f64, f64) = (case.input("demand_hm3_a_month"), case.input("capacity_hm3"));
    let days_in =
        |month0: usize| [31.0, 28.0, 31.0, 30.0, 31.0, 30.0, 31.0, 31.0, 30.0, 31.0, 30.0, 31.0][month0];
    let mut lowest = Vec::new();
    let mut missing = Vec::new();
    let mut short_days = Vec::new();
    for times in case.input::<Vec<f64>>("capacity_times") {
        let demand = std::array::from_fn(|month0| demand / days_in(month0));
        let operation = plain(Some(bare(times * capacity, demand)));
        // Water years 2002 and 2003 are common ones.
        let (yearly, _) = run(&operation, 2002..2004, |_, date| {
            let month0 = date.month0() as usize;
            inflow[(month0 + 3) % 12] / days_in(month0)
        });
        lowest.push(yearly.iter().map(|year| year["storage_lowest_hm3"]).fold(f64::INFINITY, f64::min));
        missing.push(yearly.iter().map(|year| year["shortage_hm3"]).sum());
        short_days.push(yearly.iter().map(|year| year["shortage_days"]).sum::<f64>().min(1.0));
    }
    case.check("lowest_hm3", &lowest);
    case.check("shortage_hm3", &missing);
    case.check("is_short", &short_days);
}

/// Reliability, resilience and vulnerability of a common year in which inflow meets demand but on some days.
pub fn shortages(case: &Case) {
    let (demand, capacity): (f64, f64) = (case.input("demand_hm3"), case.input("capacity_hm3"));
    let other: Vec<(usize, f64)> = case.input("inflow_hm3_on_days");
    let operation = plain(Some(bare(capacity, [demand; 12])));
    let (_, found) = run(&operation, 2002..2003, |number, _| {
        other.iter().find(|(day, _)| *day == number + 1).map_or(demand, |(_, hm3)| *hm3)
    });
    for name in found.keys() {
        case.check(name, &[found[name]]);
    }
}
