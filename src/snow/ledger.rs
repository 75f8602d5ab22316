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
    /// Outflow, bare-ground rain and change of SWE, mm.
    pub accounted_mm: f64,
}

/// Closes one lane's year: `rain + snow = outflow + bare-ground rain + change of SWE`, to
/// `1e-9 * max(1 mm, the larger side)`.
///
/// # Errors
/// A ledger that stays open, or one that holds NaN.
pub(super) fn close(
    lane: usize,
    input_mm: f64,
    outflow_mm: f64,
    bare_ground_rain_mm: f64,
    change_mm: f64,
) -> Result<(), OpenLedger> {
    let accounted_mm = outflow_mm + bare_ground_rain_mm + change_mm;
    let open_mm = input_mm - accounted_mm;
    let allowed_mm = CLOSED_TO * input_mm.abs().max(accounted_mm.abs()).max(1.0);
    if open_mm.abs() <= allowed_mm {
        Ok(())
    } else {
        Err(OpenLedger { lane, open_mm, input_mm, accounted_mm })
    }
}

#[cfg(test)]
mod tests {
    use super::close;

    #[test]
    fn an_open_ledger_is_an_error() {
        assert!(close(0, 800.0, 500.0, 250.0, 50.0).is_ok());
        let open = close(3, 800.0, 500.0, 250.0, 50.000_01).unwrap_err();
        assert_eq!(open.lane, 3);
        assert!(close(0, 1e-10, 0.0, 0.0, 0.0).is_ok(), "below 1 mm the tolerance is absolute");
        assert!(close(0, f64::NAN, 0.0, 0.0, 0.0).is_err(), "NaN never closes");
    }
}
