//! What is stated of a reservoir, and whether it can be.

use super::day::Pool;
use super::rule::{FloodRule, RulePoint};
use crate::calendar::MONTHS;
use crate::fault::{Fault, Unlikely, within};
use serde::Serialize;

/// What is asked of a reservoir, a month each, January first, hm3 a day.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
#[serde(rename_all = "snake_case")]
pub enum Demand {
    /// Water that is taken from it on top of the minimum release.
    OnTop([f64; 12]),
    /// A release in all, which the minimum release serves, too.
    InAll([f64; 12]),
}

impl Demand {
    /// Of a day in each month, hm3.
    pub fn daily_hm3(&self) -> &[f64; 12] {
        let (Self::OnTop(daily) | Self::InAll(daily)) = self;
        daily
    }
}

/// A reservoir.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Reservoir {
    /// Its name.
    pub name: String,
    /// The most that it holds, hm3.
    pub capacity_hm3: f64,
    /// What lies below its outlets, hm3.
    pub dead_hm3: f64,
    /// What it holds as a realization begins, hm3.
    pub starting_hm3: f64,
    /// The most that its outlets pass in a day, hm3.
    pub release_capacity_hm3_per_day: f64,
    /// Minimum release, a month each, January first, hm3 a day.
    pub minimum_release_hm3_per_day: [f64; 12],
    /// Demand, hm3 a day.
    pub demand_hm3_per_day: Demand,
    /// Storage that is not to be exceeded, by date; none where it may always be full.
    pub flood_rule: Vec<RulePoint>,
    /// What the air takes, a month each, January first, hm3 a day.
    pub evaporation_hm3_per_day: [f64; 12],
    /// It counts as full from this share of its capacity on.
    pub full_share: f64,
}

/// Larger than the largest there is, hm3.
const LARGEST_HM3: f64 = 1e6;

impl Reservoir {
    /// Everything that is wrong with it.
    ///
    /// # Errors
    /// Volumes that cannot be, one fault each.
    pub fn check(&self) -> Result<(), Vec<Fault>> {
        let mut faults = Vec::new();
        let capacity = self.capacity_hm3;
        if !(capacity > 0.0 && capacity <= LARGEST_HM3) {
            faults.push(Fault::key(
                "reservoir.capacity_hm3",
                capacity,
                format!("a volume above 0, at most {LARGEST_HM3} hm3"),
                "million cubic metres; a thousand acre-feet are 1.23348 hm3",
            ));
            return Err(faults);
        }
        let below = |faults: &mut Vec<Fault>, key: &str, value: f64, from: f64, mend: &str| {
            within(faults, key, value, from..=capacity, "hm3, the capacity", mend);
        };
        below(&mut faults, "reservoir.dead_storage_hm3", self.dead_hm3, 0.0, "what lies below the outlets");
        if self.dead_hm3 == capacity {
            faults.push(Fault::key(
                "reservoir.dead_storage_hm3",
                self.dead_hm3,
                "less than the capacity",
                "a reservoir without water above its outlets can release none",
            ));
        }
        below(
            &mut faults,
            "reservoir.starting_storage_hm3",
            self.starting_hm3,
            0.0,
            "what a realization begins with",
        );
        // Between which volumes a rule may lie is known only of a dead storage that can be.
        let least = if self.dead_hm3 < capacity { self.dead_hm3.max(0.0) } else { 0.0 };
        for (at, point) in self.flood_rule.iter().enumerate() {
            let key = |of: &str| format!("reservoir.flood_space[{at}].{of}");
            let mend = "a volume between dead storage and capacity";
            below(&mut faults, &key("storage_not_above_hm3"), point.not_above_hm3, least, mend);
            if self.flood_rule[..at].iter().any(|other| other.on == point.on) {
                faults.push(Fault::key(
                    key("on"),
                    format!("{} a second time", point.on.words()),
                    "each day once",
                    "take one of the two out, or give it another day",
                ));
            }
        }
        if self.release_capacity_hm3_per_day <= 0.0 || !self.release_capacity_hm3_per_day.is_finite() {
            faults.push(Fault::key(
                "reservoir.release_capacity",
                self.release_capacity_hm3_per_day,
                "more than 0",
                "what all outlets and turbines pass together",
            ));
        }
        let monthly = [
            ("reservoir.minimum_release", &self.minimum_release_hm3_per_day),
            ("reservoir.demand", self.demand_hm3_per_day.daily_hm3()),
            ("reservoir.evaporation", &self.evaporation_hm3_per_day),
        ];
        for (key, daily_hm3) in monthly {
            for (month, hm3) in daily_hm3.iter().enumerate() {
                if !(hm3.is_finite() && *hm3 >= 0.0) {
                    let key = format!("{key}[{month}]");
                    faults.push(Fault::key(key, hm3, "0 or more in every month", "0 where there is none"));
                }
            }
        }
        let passes = self.release_capacity_hm3_per_day;
        let beyond = self.minimum_release_hm3_per_day.iter().enumerate().find(|(_, hm3)| **hm3 > passes);
        if let (Some((month, minimum)), true) = (beyond, faults.is_empty()) {
            faults.push(Fault::key(
                format!("reservoir.minimum_release[{month}]"),
                minimum,
                format!("at most what the outlets pass, {passes:.5} hm3 a day"),
                "correct one of the two; mind their units",
            ));
        }
        let mend = "a share of the capacity";
        within(&mut faults, "reservoir.full_share", self.full_share, 0.5..=1.0, "", mend);
        if faults.is_empty() { Ok(()) } else { Err(faults) }
    }

    /// What it cannot do of what is asked of it.
    pub fn unlikely(&self) -> Vec<Unlikely> {
        let mut unlikely = Vec::new();
        let on_top = |month: usize| match self.demand_hm3_per_day {
            Demand::OnTop(_) => self.minimum_release_hm3_per_day[month],
            Demand::InAll(_) => 0.0,
        };
        let asked = |month: usize| self.demand_hm3_per_day.daily_hm3()[month] + on_top(month);
        let is_too_much = |month: &usize| asked(*month) > self.release_capacity_hm3_per_day;
        if let Some(month) = (0..12).find(is_too_much) {
            unlikely.push(Unlikely::new(
                "reservoir",
                format!(
                    "in {} {:.2} hm3 a day are asked of it and its outlets pass {:.2}: it is short on every such day; mind the units",
                    MONTHS[month],
                    asked(month),
                    self.release_capacity_hm3_per_day
                ),
            ));
        }
        let highest_hm3 = self.flood_rule.iter().map(|point| point.not_above_hm3).reduce(f64::max);
        let full_hm3 = self.full_share * self.capacity_hm3;
        if let Some(highest_hm3) = highest_hm3.filter(|highest_hm3| *highest_hm3 < full_hm3) {
            unlikely.push(Unlikely::new(
                "reservoir.flood_space",
                format!(
                    "the rule never lets it hold more than {highest_hm3} hm3, and it counts as full from {full_hm3} hm3 on: it hardly ever fills; \
                     state full_share if it is full below that"
                ),
            ));
        }
        unlikely
    }

    /// What does not change from day to day.
    pub fn pool(&self) -> Pool {
        Pool {
            capacity_hm3: self.capacity_hm3,
            dead_hm3: self.dead_hm3,
            release_capacity_hm3: self.release_capacity_hm3_per_day,
            minimum_serves: match self.demand_hm3_per_day {
                Demand::OnTop(_) => 0.0,
                Demand::InAll(_) => 1.0,
            },
        }
    }

    /// Its flood rule, day by day.
    pub fn rule(&self) -> FloodRule {
        if self.flood_rule.is_empty() {
            FloodRule::none(self.capacity_hm3)
        } else {
            FloodRule::through(&self.flood_rule)
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::calendar::MonthDay;

    fn reservoir() -> Reservoir {
        let point = |month, not_above_hm3| RulePoint { on: MonthDay::new(month, 1).unwrap(), not_above_hm3 };
        Reservoir {
            name: "Test pool".to_owned(),
            capacity_hm3: 100.0,
            dead_hm3: 5.0,
            starting_hm3: 50.0,
            release_capacity_hm3_per_day: 2.0,
            minimum_release_hm3_per_day: [0.5; 12],
            demand_hm3_per_day: Demand::OnTop([1.0; 12]),
            flood_rule: vec![point(12, 60.0), point(6, 100.0)],
            evaporation_hm3_per_day: [0.0; 12],
            full_share: 0.99,
        }
    }

    /// By hand: 1.6 in July on top of 0.5 are more than the outlets' 2; as a release in all they are not.
    #[test]
    fn more_than_the_outlets_pass_is_said() {
        assert_eq!(reservoir().unlikely(), []);
        let mut july = [1.0; 12];
        july[6] = 1.6;
        let said = Reservoir { demand_hm3_per_day: Demand::OnTop(july), ..reservoir() }.unlikely();
        assert_eq!(said.len(), 1);
        assert!(
            said[0].why.starts_with("in July 2.10 hm3 a day are asked of it and its outlets pass 2.00"),
            "{}",
            said[0].why
        );
        assert_eq!(Reservoir { demand_hm3_per_day: Demand::InAll(july), ..reservoir() }.unlikely(), []);
    }

    /// By hand: a rule up to 98 never reaches 99 % of 100, and does reach 98 %.
    #[test]
    fn a_rule_that_never_lets_it_fill_is_said() {
        let mut low = reservoir();
        low.flood_rule[1].not_above_hm3 = 98.0;
        assert!(
            low.unlikely()[0].why.contains("never lets it hold more than 98 hm3"),
            "{:?}",
            low.unlikely()
        );
        assert_eq!(Reservoir { full_share: 0.98, ..low }.unlikely(), []);
    }
}
