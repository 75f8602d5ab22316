//! The ledger: water in equals water out plus what stays, for every lane and water year (method, section 7).

use thiserror::Error;

/// A ledger may be open by this share of its larger side, and by as many mm below 1 mm.
const CLOSED_TO: f64 = 1e-9;

/// Water that is not accounted for: the engine has a fault, and its results must not be used.
#[derive(Debug, Clone, Copy, PartialEq, Error)]
#[error(
    "the water ledger of lane {lane} is open by {open_mm:e} mm: {input_mm} mm came in, {accounted_mm} mm are \
     accounted for"
)]
pub struct OpenLedger {
    /// The lane.
    pub lane: usize,
    /// In minus accounted for, mm.
    pub open_mm: f64,
    /// Rain and snow, mm.
    pub input_mm: f64,
    /// Outflow, bare-ground rain, sublimation and change of SWE, mm.
    pub accounted_mm: f64,
}

/// One lane's water of a year, mm.
#[derive(Debug, Clone, Copy, Default, PartialEq)]
pub(super) struct Ledger {
    /// Rain and snow.
    pub input_mm: f64,
    pub outflow_mm: f64,
    pub bare_ground_rain_mm: f64,
    pub sublimation_mm: f64,
    /// Change of SWE from the year's first morning to its end.
    pub change_mm: f64,
}

impl Ledger {
    /// Closes the year: `rain + snow = outflow + bare-ground rain + sublimation + change of SWE`, to
    /// `1e-9 * max(1 mm, the larger side)`.
    ///
    /// # Errors
    /// A ledger that stays open, or one that holds NaN.
    pub fn close(self, lane: usize) -> Result<(), OpenLedger> {
        let Self { input_mm, outflow_mm, bare_ground_rain_mm, sublimation_mm, change_mm } = self;
        let accounted_mm = outflow_mm + bare_ground_rain_mm + sublimation_mm + change_mm;
        let open_mm = input_mm - accounted_mm;
        let allowed_mm = CLOSED_TO * input_mm.abs().max(accounted_mm.abs()).max(1.0);
        if open_mm.abs() <= allowed_mm {
            Ok(())
        } else {
            Err(OpenLedger { lane, open_mm, input_mm, accounted_mm })
        }
    }
}

#[cfg(test)]
mod tests {
    use super::Ledger;

    #[test]
    fn an_open_ledger_is_an_error() {
        let ledger = Ledger {
            input_mm: 800.0,
            outflow_mm: 500.0,
            bare_ground_rain_mm: 200.0,
            sublimation_mm: 50.0,
            change_mm: 50.0,
        };
        assert!(ledger.close(0).is_ok());
        let open = Ledger { change_mm: 50.000_01, ..ledger }.close(3).unwrap_err();
        assert_eq!(open.lane, 3);
        let little = Ledger { input_mm: 1e-10, ..Ledger::default() };
        assert!(little.close(0).is_ok(), "below 1 mm the tolerance is absolute");
        assert!(Ledger { input_mm: f64::NAN, ..ledger }.close(0).is_err(), "NaN never closes");
    }
}
