//! What could be changed of a reservoir's rules.

use crate::reservoir::{FloodRule, Reservoir};
use serde::Serialize;

/// One change of the rules.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
#[serde(rename_all = "snake_case")]
pub enum Change {
    /// Nothing: the rules as stated.
    AsStated,
    /// Refill begins and ends so many days later, earlier where negative.
    RefillMovedDays(i32),
    /// Flood space, times a factor.
    FloodSpaceTimes(f64),
    /// Demand, times a factor.
    DemandTimes(f64),
}

impl Change {
    /// The flood rule and the daily demand of each month under it, hm3.
    pub(super) fn of(self, reservoir: &Reservoir) -> (FloodRule, [f64; 12]) {
        let (rule, demand) = (reservoir.rule(), *reservoir.demand_hm3_per_day.daily_hm3());
        match self {
            Self::AsStated => (rule, demand),
            Self::RefillMovedDays(days) => (rule.with_refill_moved(days), demand),
            Self::FloodSpaceTimes(factor) => {
                let scaled = rule.with_flood_space_times(factor, reservoir.capacity_hm3, reservoir.dead_hm3);
                (scaled, demand)
            }
            Self::DemandTimes(factor) => (rule, demand.map(|hm3| factor * hm3)),
        }
    }
}
