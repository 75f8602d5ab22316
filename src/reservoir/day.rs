//! One day of a reservoir, in the usual order of priority: minimum release, flood space, demand, spill.

/// What does not change from day to day, hm3 and hm3 a day.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Pool {
    /// The most that it holds.
    pub capacity_hm3: f64,
    /// What lies below its outlets: only the air takes of it.
    pub dead_hm3: f64,
    /// The most that its outlets pass in a day.
    pub release_capacity_hm3: f64,
    /// 1 where the minimum release serves the demand, too; 0 where the demand is on top of it.
    pub minimum_serves: f64,
}

/// What comes, and what is asked, on one day, hm3.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Day {
    /// Inflow.
    pub inflow_hm3: f64,
    /// What the air takes, if it is there.
    pub evaporation_hm3: f64,
    /// Minimum release.
    pub minimum_hm3: f64,
    /// Storage is not to exceed this as the day ends.
    pub not_above_hm3: f64,
    /// Demand.
    pub demand_hm3: f64,
}

/// What became of it, hm3.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Outcome {
    /// Storage as the day ends.
    pub storage_hm3: f64,
    /// What the air took.
    pub evaporated_hm3: f64,
    /// Released as the minimum.
    pub minimum_hm3: f64,
    /// Released to make flood space.
    pub flood_hm3: f64,
    /// Of that, what served no demand.
    pub unasked_hm3: f64,
    /// Released, beyond both, for the demand.
    pub for_demand_hm3: f64,
    /// What ran over.
    pub spill_hm3: f64,
    /// Demand that was not met.
    pub shortage_hm3: f64,
}

/// One day.
///
/// - the air takes its water first, of whatever there is;
/// - the minimum release is paid from what lies above the dead storage;
/// - storage above the flood rule is released as far as the outlets pass it;
/// - what was released for flood space serves the demand, and so does the minimum where that is stated; the rest of the demand is
///   released next, from what lies above the dead storage and as far as the outlets pass it;
/// - what does not fit runs over, beside the outlets.
///
/// `storage + inflow = storage' + evaporated + minimum + flood + for demand + spill`, to rounding.
#[inline(always)]
pub fn step(pool: &Pool, storage_hm3: f64, day: &Day) -> Outcome {
    let there = storage_hm3 + day.inflow_hm3;
    let evaporated_hm3 = day.evaporation_hm3.min(there);
    let there = there - evaporated_hm3;
    let above_dead = (there - pool.dead_hm3).max(0.0);
    let minimum_hm3 = day.minimum_hm3.min(above_dead).min(pool.release_capacity_hm3);
    let outlets_left = pool.release_capacity_hm3 - minimum_hm3;
    let over_rule = (there - minimum_hm3 - day.not_above_hm3).max(0.0);
    let flood_hm3 = over_rule.min(outlets_left).min(above_dead - minimum_hm3);
    let not_served_hm3 = (day.demand_hm3 - pool.minimum_serves * minimum_hm3).max(0.0);
    let asked = (not_served_hm3 - flood_hm3).max(0.0);
    let for_demand_hm3 =
        asked.min(outlets_left - flood_hm3).min(above_dead - minimum_hm3 - flood_hm3).max(0.0);
    let left = there - minimum_hm3 - flood_hm3 - for_demand_hm3;
    let storage_hm3 = left.min(pool.capacity_hm3);
    Outcome {
        storage_hm3,
        evaporated_hm3,
        minimum_hm3,
        flood_hm3,
        unasked_hm3: (flood_hm3 - not_served_hm3).max(0.0),
        for_demand_hm3,
        spill_hm3: left - storage_hm3,
        shortage_hm3: asked - for_demand_hm3,
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    const POOL: Pool =
        Pool { capacity_hm3: 100.0, dead_hm3: 10.0, release_capacity_hm3: 8.0, minimum_serves: 0.0 };
    const DAY: Day = Day {
        inflow_hm3: 3.0,
        evaporation_hm3: 1.0,
        minimum_hm3: 2.0,
        not_above_hm3: 100.0,
        demand_hm3: 4.0,
    };

    /// By hand: 50 + 3 - 1 = 52; 2 and 4 are released; 46 stay.
    #[test]
    fn a_plain_day() {
        let out = step(&POOL, 50.0, &DAY);
        assert_eq!([out.storage_hm3, out.minimum_hm3, out.for_demand_hm3], [46.0, 2.0, 4.0]);
        assert_eq!(
            [out.flood_hm3, out.spill_hm3, out.shortage_hm3, out.evaporated_hm3],
            [0.0, 0.0, 0.0, 1.0]
        );
    }

    /// By hand: 50 + 3 - 1 - 2 = 50, 10 above the rule of 40; the outlets pass 8 - 2 = 6, which serve the demand of 4: 44 stay.
    #[test]
    fn water_released_for_flood_space_serves_the_demand() {
        let out = step(&POOL, 50.0, &Day { not_above_hm3: 40.0, ..DAY });
        assert_eq!(
            [out.flood_hm3, out.for_demand_hm3, out.shortage_hm3, out.storage_hm3],
            [6.0, 0.0, 0.0, 44.0]
        );
    }

    /// By hand: 11 + 0 - 1 = 10 is all dead storage: nothing is released, 4 are short.
    #[test]
    fn dead_storage_is_not_released() {
        let out = step(&POOL, 11.0, &Day { inflow_hm3: 0.0, ..DAY });
        assert_eq!(
            [out.storage_hm3, out.minimum_hm3, out.for_demand_hm3, out.shortage_hm3],
            [10.0, 0.0, 0.0, 4.0]
        );
    }

    /// By hand: 99 + 20 - 1 = 118; the outlets pass all of their 8, 110 do not fit: 10 run over.
    #[test]
    fn what_does_not_fit_runs_over() {
        let out = step(&POOL, 99.0, &Day { inflow_hm3: 20.0, ..DAY });
        assert_eq!([out.storage_hm3, out.spill_hm3], [100.0, 10.0]);
        assert_eq!([out.minimum_hm3, out.flood_hm3, out.for_demand_hm3], [2.0, 6.0, 0.0]);
    }

    /// By hand: the minimum of 2 serves a target of 4, so that 2 more are released; of an empty pool 4 are short, the minimum's 2
    /// among them.
    #[test]
    fn a_target_is_served_by_the_minimum() {
        let pool = Pool { minimum_serves: 1.0, ..POOL };
        let out = step(&pool, 50.0, &DAY);
        assert_eq!([out.minimum_hm3, out.for_demand_hm3, out.storage_hm3], [2.0, 2.0, 48.0]);
        let out = step(&pool, 10.0, &Day { inflow_hm3: 1.0, ..DAY });
        assert_eq!([out.minimum_hm3, out.for_demand_hm3, out.shortage_hm3], [0.0, 0.0, 4.0]);
    }

    /// By hand: the air takes no more than there is.
    #[test]
    fn an_empty_pool_loses_nothing() {
        let pool = Pool { dead_hm3: 0.0, ..POOL };
        let out = step(&pool, 0.0, &Day { inflow_hm3: 0.25, ..DAY });
        assert_eq!([out.evaporated_hm3, out.storage_hm3, out.shortage_hm3], [0.25, 0.0, 4.0]);
    }
}
