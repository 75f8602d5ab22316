//! How much of a basin its stations do not reach.

use super::Basin;
use serde::Serialize;

/// Shares of the basin's area beyond its stations.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct BeyondStations {
    /// Elevation of the lowest station, m.
    pub lowest_m: f64,
    /// Elevation of the highest station, m.
    pub highest_m: f64,
    /// Share of the area below the lowest station, 0 to 1.
    pub share_below: f64,
    /// Share of the area above the highest station, 0 to 1.
    pub share_above: f64,
}

impl Basin {
    /// The shares of area above the highest and below the lowest of some stations, each band's area spread evenly over its
    /// height. Results there hang on the gradients alone. None without stations.
    pub fn beyond(&self, stations_m: &[f64]) -> Option<BeyondStations> {
        let lowest_m = stations_m.iter().copied().reduce(f64::min)?;
        let highest_m = stations_m.iter().copied().reduce(f64::max)?;
        let share_below = self.share_below(lowest_m);
        Some(BeyondStations {
            lowest_m,
            highest_m,
            share_below,
            share_above: 1.0 - self.share_below(highest_m),
        })
    }

    /// Share of the area that lies below an elevation.
    fn share_below(&self, elevation_m: f64) -> f64 {
        let below = self.bands.iter().zip(self.shares()).map(|(band, share)| {
            share * ((elevation_m - band.lower_m) / (band.upper_m - band.lower_m)).clamp(0.0, 1.0)
        });
        below.sum::<f64>().min(1.0)
    }
}
