//! What must hold of routed and stored water, whatever the basin, the reservoir and its rules.

use super::cases;
use super::operated::{Operating, storing};
use proptest::prelude::*;
use thawline::inflow::{Router, WaterYear};
use thawline::reservoir::{Day, Demand, Outcome, Pool, Reservoir, step};
use thawline::season::NONE;

/// 1e-9 of 1 hm3 or of the volume: the rounding of a year of days.
fn same(a: f64, b: f64) -> bool {
    (a - b).abs() <= 1e-9 * a.abs().max(b.abs()).max(1.0)
}

/// No more than another, but for rounding.
fn no_more(a: f64, b: f64) -> bool {
    a <= b || same(a, b)
}

prop_compose! {
    /// A pool that holds at most 100, a day of it, and what it holds.
    fn days()(
        dead in prop_oneof![Just(0.0), 0.0..90.0],
        outlets in 0.1..60.0,
        minimum in 0.0..=1.0,
        minimum_serves in prop_oneof![Just(0.0), Just(1.0)],
        storage in prop_oneof![4 => 0.0..=100.0, 1 => Just(100.0)],
        inflow in prop_oneof![1 => Just(0.0), 4 => 0.0..150.0],
        evaporation in prop_oneof![Just(0.0), 0.0..20.0],
        not_above in prop_oneof![Just(1.0), 0.0..=1.0],
        demand in prop_oneof![Just(0.0), 0.0..80.0],
    ) -> (Pool, f64, Day) {
        let pool = Pool { capacity_hm3: 100.0, dead_hm3: dead, release_capacity_hm3: outlets, minimum_serves };
        let day = Day {
            inflow_hm3: inflow,
            evaporation_hm3: evaporation,
            minimum_hm3: minimum * outlets,
            not_above_hm3: dead + not_above * (100.0 - dead),
            demand_hm3: demand,
        };
        (pool, storage, day)
    }
}

fn released(out: &Outcome) -> f64 {
    out.minimum_hm3 + out.flood_hm3 + out.for_demand_hm3
}

proptest! {
    #![proptest_config(cases(2000))]

    /// One day of any pool: its water is all there; nothing is negative; storage lies between 0 and capacity, and below the dead
    /// storage only where it began there or the air took it; the outlets pass no more than they can; water is short or runs over
    /// only where outlets or dead storage leave no other way.
    #[test]
    fn a_day_keeps_its_bounds_and_its_priorities((pool, storage, day) in days()) {
        let out = step(&pool, storage, &day);
        let near = |a: f64, b: f64| (a - b).abs() <= 1e-9;
        prop_assert!(near(
            storage + day.inflow_hm3,
            out.storage_hm3 + out.evaporated_hm3 + released(&out) + out.spill_hm3,
        ));
        for part in [out.evaporated_hm3, out.minimum_hm3, out.flood_hm3, out.for_demand_hm3, out.spill_hm3, out.shortage_hm3] {
            prop_assert!(part >= 0.0, "{out:?}");
        }
        prop_assert!((0.0..=pool.capacity_hm3).contains(&out.storage_hm3));
        let untouched = storage + day.inflow_hm3 - out.evaporated_hm3;
        prop_assert!(out.storage_hm3 >= pool.dead_hm3.min(untouched) - 1e-9, "{out:?}");
        prop_assert!(released(&out) <= pool.release_capacity_hm3 + 1e-9);
        prop_assert!(out.minimum_hm3 <= day.minimum_hm3 && out.evaporated_hm3 <= day.evaporation_hm3);
        let served = pool.minimum_serves * out.minimum_hm3 + out.flood_hm3 + out.for_demand_hm3;
        prop_assert!(near(out.shortage_hm3, (day.demand_hm3 - served).max(0.0)));
        let is_full = near(released(&out), pool.release_capacity_hm3);
        let is_empty = out.storage_hm3 <= pool.dead_hm3 + 1e-9;
        if out.minimum_hm3 < day.minimum_hm3 - 1e-9 || out.shortage_hm3 > 1e-9 {
            prop_assert!(is_full || is_empty, "short with water and outlets left: {out:?}");
        }
        if out.storage_hm3 > day.not_above_hm3 + 1e-9 {
            prop_assert!(is_full, "above the rule with outlets left: {out:?}");
        }
        if out.spill_hm3 > 0.0 {
            prop_assert!(is_full && out.storage_hm3 == pool.capacity_hm3, "{out:?}");
        }
        if out.flood_hm3 > 0.0 {
            prop_assert!(untouched - out.minimum_hm3 - out.flood_hm3 >= day.not_above_hm3 - 1e-9, "{out:?}");
        }
    }

    /// More in store and less demanded never leaves less, nor more short.
    ///
    /// What is released in all is min(minimum + max(demand, flood), outlets, what lies above the dead storage), or with max(demand,
    /// minimum + flood) where the minimum serves; it rises with storage, never faster than storage, and with demand. So storage in the evening rises
    /// with storage in the morning and falls with demand, and shortage, max(demand - what can be released, 0), the other way.
    #[test]
    fn a_day_with_more_water_and_less_demand_is_no_worse(
        (pool, storage, day) in days(),
        more in 0.0..=1.0,
        less in 0.0..=1.0,
    ) {
        let worse = step(&pool, storage, &day);
        let better = step(
            &pool,
            storage + more * (pool.capacity_hm3 - storage),
            &Day { demand_hm3: less * day.demand_hm3, ..day },
        );
        prop_assert!(no_more(worse.storage_hm3, better.storage_hm3), "{worse:?} {better:?}");
        prop_assert!(no_more(worse.spill_hm3, better.spill_hm3), "{worse:?} {better:?}");
        prop_assert!(no_more(better.shortage_hm3, worse.shortage_hm3), "{worse:?} {better:?}");
        // With as much demanded the minimum release is no smaller either.
        prop_assert!(no_more(worse.minimum_hm3, better.minimum_hm3), "{worse:?} {better:?}");
    }
}

fn demand(reservoir: &Reservoir, of: impl Fn(usize, f64) -> f64) -> Reservoir {
    let changed = |daily: &[f64; 12]| std::array::from_fn(|month| of(month, daily[month]));
    let demand_hm3_per_day = match &reservoir.demand_hm3_per_day {
        Demand::OnTop(daily) => Demand::OnTop(changed(daily)),
        Demand::InAll(daily) => Demand::InAll(changed(daily)),
    };
    Reservoir { demand_hm3_per_day, ..reservoir.clone() }
}

fn of_all_years(operating: &Operating, name: &str) -> Vec<f64> {
    operating.by_year().iter().map(|year| year[name]).collect()
}

proptest! {
    #![proptest_config(cases(64))]

    /// What flows in stays, is released, runs over or goes into the air, in every year; storage lies where it can.
    #[test]
    fn a_years_water_is_all_there(operating in storing()) {
        let reservoir = operating.reservoir();
        let mut from = reservoir.starting_hm3;
        let mut had_reached_dead = from >= reservoir.dead_hm3;
        for year in operating.by_year() {
            let of = |name: &str| year[name];
            let to = of("storage_year_end_hm3");
            let left = of("release_hm3") + of("spill_hm3") + of("evaporation_hm3");
            prop_assert!(same(from + of("inflow_year_hm3"), to + left), "{from} {year:?}");
            for (name, value) in &year {
                let is_storage = name.starts_with("storage_");
                prop_assert!(!is_storage || (0.0..=reservoir.capacity_hm3).contains(value), "{name}: {value}");
            }
            // A start below is left behind in the first year or never; from then on only the air takes of dead storage.
            if had_reached_dead && of("evaporation_hm3") == 0.0 {
                prop_assert!(of("storage_lowest_hm3") >= reservoir.dead_hm3 - 1e-9, "{year:?}");
            }
            had_reached_dead = to >= reservoir.dead_hm3;
            from = to;
        }
    }

    /// Routing makes no water and loses none: of two years, each put through twice, all has come or is in store.
    #[test]
    fn routing_neither_makes_nor_loses_water(operating in storing()) {
        use chrono::Datelike;
        let operation = &operating.operation;
        let mut router = Router::new(&operation.routing, operation.area_km2, 1);
        let (mut came, mut ran_off, mut inflow) = (0.0, 0.0, Vec::new());
        for (first, input_mm) in operating.years(0).iter().chain(&operating.years(0)) {
            router.year(&WaterYear { first: *first, water_input_mm: input_mm }, &mut inflow);
            prop_assert!(inflow.iter().all(|hm3| *hm3 >= 0.0));
            came += inflow.iter().sum::<f64>();
            for (date, mm) in first.iter_days().zip(input_mm) {
                ran_off += operation.routing.runoff_fraction[date.month0() as usize] * mm * operation.area_km2 / 1000.0;
            }
        }
        prop_assert!(same(came + router.held_hm3(0), ran_off), "{came} + {} of {ran_off}", router.held_hm3(0));
    }

    /// More demand in any month never means less shortage in any year, nor more spill, nor more days without shortage (by the day's
    /// property above, from day to day). Reliability by volume is a mean over days, weighted by their demand: more demand on
    /// days that have water raises it, so that it falls for certain only where all demand grows by one factor.
    #[test]
    fn more_demand_never_means_less_shortage(operating in storing(), more in prop::array::uniform12(1.0..2.5), factor in 1.0..2.5) {
        let reservoir = operating.reservoir();
        let monthly = operating.with(demand(reservoir, |month, hm3| more[month] * hm3 + 0.01 * (more[month] - 1.0)));
        for (name, is_more) in [("shortage_hm3", true), ("shortage_days", true), ("spill_hm3", false), ("storage_year_end_hm3", false)] {
            for (less, more) in of_all_years(&operating, name).iter().zip(of_all_years(&monthly, name)) {
                prop_assert!(if is_more { no_more(*less, more) } else { no_more(more, *less) }, "{name}: {less} and then {more}");
            }
        }
        let scaled = operating.with(demand(reservoir, |_, hm3| factor * hm3));
        let (stated, scaled) = (operating.over_years(), scaled.over_years());
        for name in ["reliability_time_share", "reliability_volume_share", "years_without_shortage_share"] {
            prop_assert!(no_more(scaled[name], stated[name]), "{name}: {} and then {}", stated[name], scaled[name]);
        }
    }

    /// Where nothing is demanded nothing is short; how much of nothing is met has no number.
    #[test]
    fn no_demand_is_always_met(operating in storing()) {
        let nothing = operating.with(demand(operating.reservoir(), |_, _| 0.0));
        prop_assert!(of_all_years(&nothing, "shortage_hm3").iter().all(|hm3| *hm3 == 0.0));
        let all = nothing.over_years();
        prop_assert_eq!(all["reliability_time_share"], 1.0);
        prop_assert_eq!(all["years_without_shortage_share"], 1.0);
        for none in ["reliability_volume_share", "resilience_share", "vulnerability_share", "shortage_of_an_event_hm3"] {
            prop_assert_eq!(all[none], NONE);
        }
        prop_assert_eq!(all["longest_shortage_days"], 0.0);
    }

    /// A larger reservoir, without a flood rule or under the same one, never spills more nor is short of more.
    ///
    /// It holds as much or more, by no more than it is larger: what it lacks to be full is never less. It spills only while its outlets
    /// are full, and then no more than the smaller.
    #[test]
    fn a_larger_reservoir_never_spills_more(operating in storing(), times in 1.0..3.0, has_rule in any::<bool>()) {
        let mut reservoir = operating.reservoir().clone();
        if !has_rule {
            reservoir.flood_rule.clear();
        }
        let larger = Reservoir { capacity_hm3: times * reservoir.capacity_hm3, ..reservoir.clone() };
        let (small, large) = (operating.with(reservoir), operating.with(larger));
        for name in ["spill_hm3", "shortage_hm3", "shortage_days"] {
            for (small, large) in of_all_years(&small, name).iter().zip(of_all_years(&large, name)) {
                prop_assert!(no_more(large, *small), "{name}: {small}, and of the larger {large}");
            }
        }
    }
}
