//! What routing is made of: which share of the water runs off, and through which stores.

use super::linear::Store;
use crate::fault::{Fault, Unlikely, within};
use serde::Serialize;

/// A store that keeps water for seasons, side by side with the quick one.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct SlowStore {
    /// Share of what runs off that passes it, 0 to 1.
    pub share: f64,
    /// Days in which its outflow falls to 1/e.
    pub recession_days: f64,
}

/// How water input becomes inflow.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Routing {
    /// Share of water input that runs off, a month each, January first; 0 to 1.
    pub runoff_fraction: [f64; 12],
    /// Days in which the quick store's outflow falls to 1/e; 0 for none.
    pub recession_days: f64,
    /// The slow store, if there is one.
    pub slow: Option<SlowStore>,
}

/// No store keeps water longer, days.
pub const LONGEST_RECESSION_DAYS: f64 = 2000.0;

impl Routing {
    /// Everything that is wrong with it, and what is unlikely.
    ///
    /// # Errors
    /// Numbers outside the ranges in which the method is defined.
    pub fn check(&self) -> Result<Vec<Unlikely>, Vec<Fault>> {
        let mut faults = Vec::new();
        for (month, fraction) in self.runoff_fraction.iter().enumerate() {
            let key = if self.is_even() {
                "inflow.runoff_fraction".to_owned()
            } else {
                format!("inflow.runoff_fraction[{month}]")
            };
            within(
                &mut faults,
                &key,
                *fraction,
                0.0..=1.0,
                "",
                "a share of the water that reaches the ground",
            );
            if self.is_even() {
                break;
            }
        }
        let days = 0.0..=LONGEST_RECESSION_DAYS;
        let mend = "days in which the outflow falls to 1/e, without rain or melt";
        within(&mut faults, "inflow.recession_days", self.recession_days, days.clone(), "days", mend);
        if let Some(slow) = self.slow {
            within(&mut faults, "inflow.slow.share", slow.share, 0.0..=1.0, "", "a share of what runs off");
            within(&mut faults, "inflow.slow.recession_days", slow.recession_days, days, "days", mend);
            if faults.is_empty() && slow.recession_days <= self.recession_days {
                faults.push(Fault::key(
                    "inflow.slow.recession_days",
                    slow.recession_days,
                    format!("more than the quick store's {} days", self.recession_days),
                    "exchange the two, or take [inflow.slow] out",
                ));
            }
        }
        if !faults.is_empty() {
            return Err(faults);
        }
        let runs_off_all = self.runoff_fraction.iter().all(|fraction| *fraction >= 0.95);
        Ok(Vec::from_iter(runs_off_all.then(|| {
            Unlikely::new(
                "inflow.runoff_fraction",
                "all year hardly any water is lost to soil, plants and air; mountain basins commonly lose a third or more of it (common practice)",
            )
        })))
    }

    /// Whether all months have one fraction.
    pub fn is_even(&self) -> bool {
        self.runoff_fraction.iter().all(|fraction| *fraction == self.runoff_fraction[0])
    }

    /// Both stores, and the share of what runs off that passes the second.
    pub(super) fn stores(&self) -> ([Store; 2], f64) {
        let slow = self.slow.unwrap_or(SlowStore { share: 0.0, recession_days: 0.0 });
        ([self.recession_days, slow.recession_days].map(Store::new), slow.share)
    }
}
