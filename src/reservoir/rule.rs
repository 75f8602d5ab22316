//! The flood-space rule: storage is not to exceed a stated volume, by date, linear between.

use crate::calendar::{COMMON_DATES, MonthDay};
use serde::Serialize;

/// How much may be held on a day.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct RulePoint {
    /// The day.
    pub on: MonthDay,
    /// Storage is not to exceed this on it, hm3.
    pub not_above_hm3: f64,
}

/// How much may be held, on each of the 365 dates that every year has, hm3, 1 January first.
#[derive(Debug, Clone, PartialEq)]
pub struct FloodRule {
    not_above_hm3: Vec<f64>,
}

impl FloodRule {
    /// No rule: all of the capacity, all year.
    pub fn none(capacity_hm3: f64) -> Self {
        Self { not_above_hm3: vec![capacity_hm3; COMMON_DATES] }
    }

    /// The rule through its points, linear between them and around the year's end; one point holds all year. At least one, no two on
    /// a day.
    pub fn through(points: &[RulePoint]) -> Self {
        let mut at: Vec<(usize, f64)> =
            points.iter().map(|point| (place(point.on), point.not_above_hm3)).collect();
        at.sort_by_key(|(day, _)| *day);
        let of_day = |day: usize| {
            let next = at.iter().position(|(on, _)| *on > day).unwrap_or(0);
            let before = (next + at.len() - 1) % at.len();
            let ((from, from_hm3), (to, to_hm3)) = (at[before], at[next]);
            let since = (day + COMMON_DATES - from) % COMMON_DATES;
            let all = (to + COMMON_DATES - from - 1) % COMMON_DATES + 1;
            from_hm3 + (to_hm3 - from_hm3) * since as f64 / all as f64
        };
        Self { not_above_hm3: (0..COMMON_DATES).map(of_day).collect() }
    }

    /// The same with its refill moved by so many days, earlier where negative: earlier, each date may hold what it or the date so
    /// many days later may hold, the larger; later, what it or the date so many days before may hold, the smaller. So the rule rises so much
    /// sooner or later, and falls as before, unless it is low, or high, for fewer days than that.
    pub fn with_refill_moved(&self, days: i32) -> Self {
        let moved = |day: usize| {
            let there = (day as i32 - days).rem_euclid(COMMON_DATES as i32) as usize;
            let (own, other) = (self.not_above_hm3[day], self.not_above_hm3[there]);
            if days < 0 { own.max(other) } else { own.min(other) }
        };
        Self { not_above_hm3: (0..COMMON_DATES).map(moved).collect() }
    }

    /// The same with its flood space, capacity less what may be held, times a factor; never less than `least_hm3` may be held.
    pub fn with_flood_space_times(&self, factor: f64, capacity_hm3: f64, least_hm3: f64) -> Self {
        let scaled = |not_above: &f64| (capacity_hm3 - factor * (capacity_hm3 - not_above)).max(least_hm3);
        Self { not_above_hm3: self.not_above_hm3.iter().map(scaled).collect() }
    }

    /// What may be held on a date, counted from 0 on 1 January of a common year, hm3.
    pub fn not_above_hm3(&self, common_date: usize) -> f64 {
        self.not_above_hm3[common_date]
    }

    /// Whether it keeps any space empty.
    pub fn keeps_space(&self, capacity_hm3: f64) -> bool {
        self.not_above_hm3.iter().any(|not_above| *not_above < capacity_hm3)
    }
}

fn place(day: MonthDay) -> usize {
    day.day_of_common_year() as usize - 1
}

#[cfg(test)]
mod tests {
    use super::*;

    fn rule() -> FloodRule {
        let points = [(10, 1, 200.0), (11, 1, 169.0), (3, 1, 169.0), (6, 1, 215.0)];
        let point =
            |(month, day, not_above_hm3)| RulePoint { on: MonthDay::new(month, day).unwrap(), not_above_hm3 };
        FloodRule::through(&points.map(point))
    }

    fn on(rule: &FloodRule, month: u32, day: u32) -> f64 {
        rule.not_above_hm3(place(MonthDay::new(month, day).unwrap()))
    }

    /// By hand: October falls by 1 a day; from 1 March on it rises by 0.5 a day for 92 days; around the year's end it stays.
    #[test]
    fn between_its_points_it_is_a_line() {
        let rule = rule();
        assert_eq!([on(&rule, 10, 1), on(&rule, 10, 11), on(&rule, 11, 1)], [200.0, 190.0, 169.0]);
        assert_eq!([on(&rule, 1, 1), on(&rule, 12, 31), on(&rule, 3, 1)], [169.0; 3]);
        assert_eq!([on(&rule, 3, 11), on(&rule, 6, 1)], [174.0, 215.0]);
        // 15 of the 122 days' fall of 15 from 1 June to 1 October.
        assert!((on(&rule, 6, 16) - (215.0 - 15.0 * 15.0 / 122.0)).abs() < 1e-12);
    }

    /// By hand: moved 10 days earlier it holds on 1 March what it held on 11 March, and drawdown stays where it was.
    #[test]
    fn refill_moves_and_drawdown_stays() {
        let (rule, earlier, later) = (rule(), rule().with_refill_moved(-10), rule().with_refill_moved(10));
        assert_eq!([on(&earlier, 3, 1), on(&later, 3, 11), on(&later, 3, 21)], [174.0, 169.0, 174.0]);
        for (month, day) in [(10, 11), (11, 1), (12, 15), (8, 1), (9, 20)] {
            assert_eq!(on(&earlier, month, day), on(&rule, month, day), "{month}-{day}");
            assert_eq!(on(&later, month, day), on(&rule, month, day), "{month}-{day}");
        }
    }

    /// By hand: of a capacity of 215 half the space of 46 in winter is 23; nothing below the least.
    #[test]
    fn flood_space_scales() {
        let half = rule().with_flood_space_times(0.5, 215.0, 20.0);
        assert_eq!([on(&half, 1, 1), on(&half, 6, 1)], [192.0, 215.0]);
        assert_eq!(on(&rule().with_flood_space_times(10.0, 215.0, 20.0), 1, 1), 20.0);
    }

    #[test]
    fn one_point_holds_all_year() {
        let rule = FloodRule::through(&[RulePoint { on: MonthDay::new(4, 1).unwrap(), not_above_hm3: 90.0 }]);
        assert!((0..COMMON_DATES).all(|day| rule.not_above_hm3(day) == 90.0));
        assert!(rule.keeps_space(100.0) && !FloodRule::none(100.0).keeps_space(100.0));
    }
}
