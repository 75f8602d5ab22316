//! Levels of global warming, as a warming of the basin beyond what its record already holds (method, section 3).

use serde::Serialize;

/// How a level of global warming becomes a warming of the basin.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct GlobalWarming {
    /// Degrees that the basin warms per degree of global warming.
    pub local_per_global: f64,
    /// Global warming that the record already holds, at its mid-year or the year it was detrended to, degC above 1850-1900.
    pub already_in_record_c: f64,
}

impl GlobalWarming {
    /// The basin's warming beyond its record at a level of global warming: `ratio * (level - already)`, degC.
    ///
    /// ```
    /// use thawline::perturb::GlobalWarming;
    /// // Of 1.5 degC of global warming, 0.94 reached leave 0.56 (IPCC AR6 WGII, Cross-Chapter Box CLIMATE, Fig. 1).
    /// let world = GlobalWarming { local_per_global: 1.0, already_in_record_c: 0.94 };
    /// assert!((world.local_c(1.5) - 0.56).abs() < 1e-12);
    /// ```
    pub fn local_c(&self, global_c: f64) -> f64 {
        self.local_per_global * (global_c - self.already_in_record_c)
    }

    /// The level of global warming at which the basin has warmed by `local_c` beyond its record, degC.
    pub fn global_c(&self, local_c: f64) -> f64 {
        local_c / self.local_per_global + self.already_in_record_c
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    /// IPCC AR6 WGII, Cross-Chapter Box CLIMATE, Fig. 1 (DC-05): for the same period, SR1.5 counts 0.87 degC as reached and
    /// leaves 0.63 to 1.5 degC, AR6 counts 0.94 and leaves 0.56. AR6 WGII chapter 16 (DC-06): 2011-2020 stands 1.09 degC
    /// above 1850-1900, land 1.59, so land warms 1.459 times the globe, to the 0.01 that is printed.
    #[test]
    fn global_levels_are_no_local_ones() {
        let left =
            |already_in_record_c| GlobalWarming { local_per_global: 1.0, already_in_record_c }.local_c(1.5);
        assert!((left(0.87) - 0.63).abs() < 0.005 && (left(0.94) - 0.56).abs() < 0.005);
        let land = GlobalWarming { local_per_global: 1.459, already_in_record_c: 0.0 };
        assert!((land.local_c(1.09) - 1.59).abs() < 0.01);
        let record = GlobalWarming { already_in_record_c: 1.09, ..land };
        assert!(
            record.local_c(2.0) < 1.4,
            "+2 degC of global warming is not +2 degC beyond a record of 2011-2020"
        );
        assert!((record.global_c(record.local_c(2.0)) - 2.0).abs() < 1e-12);
    }
}
