//! The temperature-held spread: what precipitation alone does, when no realization is warm or cool by chance.

use super::crossing::Crossing;
use super::resample::{Estimate, Ranked, Resamples};
use super::spread::{Spread, signal_to_spread};
use super::yardstick::{LevelShift, Levels};
use serde::Serialize;

/// The reference's spread over realizations whose monthly mean temperatures are held at the record's, and the same
/// shifts against it. Beside the spread with its own temperatures, it shows whether a verdict hangs on the warmth that
/// realizations draw by chance.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct TemperatureHeldSpread {
    /// The spread.
    pub spread: Option<Spread>,
    /// One entry a level with a shift.
    pub levels: Vec<HeldLevel>,
    /// From which warming on the shift outweighs it.
    pub outweighs: Crossing,
}

/// A level's shift against the temperature-held spread.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct HeldLevel {
    /// The level, degC.
    pub level_c: f64,
    /// Shift over the half of the spread that it points to.
    pub signal_to_spread: Option<Estimate>,
}

impl TemperatureHeldSpread {
    /// Holds the study's shifts against period values at the reference with temperatures held.
    pub(super) fn of(
        periods: &[f64],
        shifts: &[LevelShift],
        levels: Levels<'_>,
        resamples: &Resamples,
    ) -> Self {
        let spread = Spread::of(periods);
        let spreads = Spread::resampled(&Ranked::new(periods.iter().copied().zip(0..)), resamples);
        let found: Vec<HeldLevel> = shifts
            .iter()
            .map(|shift| HeldLevel {
                level_c: shift.level_c,
                signal_to_spread: spread
                    .and_then(|spread| signal_to_spread(shift.median, &spread, &shift.resampled, &spreads))
                    .map(|(ratio, _)| ratio),
            })
            .collect();
        let ratio = |level_c: f64| {
            let level = found.iter().find(|level| level.level_c == level_c);
            level.and_then(|level| level.signal_to_spread).map(|ratio| ratio.value)
        };
        Self { spread, outweighs: levels.crossing(ratio), levels: found }
    }
}
