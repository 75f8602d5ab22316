//! A reservoir's books, a water year at a time.

use super::day::Outcome;
use thiserror::Error;

/// What came into a pool, and where it went, hm3.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub struct PoolLedger {
    /// Inflow.
    pub inflow_hm3: f64,
    /// What left it: by the outlets, over the top and into the air.
    pub left_hm3: f64,
}

impl PoolLedger {
    /// Enters a day.
    #[inline(always)]
    pub fn enter(&mut self, inflow_hm3: f64, day: &Outcome) {
        self.inflow_hm3 += inflow_hm3;
        self.left_hm3 +=
            day.evaporated_hm3 + day.minimum_hm3 + day.flood_hm3 + day.for_demand_hm3 + day.spill_hm3;
    }

    /// Closes the year between two storages, to 1e-9 of 1 hm3 or of the larger side.
    ///
    /// # Errors
    /// Books that do not close: a fault of ours, never of the input.
    pub fn close(&self, from_hm3: f64, to_hm3: f64) -> Result<(), OpenPool> {
        let (came, went) = (from_hm3 + self.inflow_hm3, to_hm3 + self.left_hm3);
        let off_hm3 = came - went;
        if off_hm3.abs() <= 1e-9 * came.abs().max(went.abs()).max(1.0) {
            Ok(())
        } else {
            Err(OpenPool { off_hm3 })
        }
    }
}

/// A reservoir's books that do not close.
#[derive(Debug, Clone, Copy, PartialEq, Error)]
#[error("the reservoir's water balance of a year is off by {off_hm3} hm3")]
pub struct OpenPool {
    /// By how much, hm3.
    pub off_hm3: f64,
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn books_close_or_say_by_how_much_not() {
        let out = Outcome {
            storage_hm3: 0.0,
            evaporated_hm3: 1.0,
            minimum_hm3: 2.0,
            flood_hm3: 3.0,
            unasked_hm3: 0.0,
            for_demand_hm3: 4.0,
            spill_hm3: 5.0,
            shortage_hm3: 100.0,
        };
        let mut ledger = PoolLedger::default();
        ledger.enter(20.0, &out);
        assert_eq!(ledger.close(10.0, 15.0), Ok(()));
        assert_eq!(ledger.close(10.0, 16.0), Err(OpenPool { off_hm3: -1.0 }));
    }
}
