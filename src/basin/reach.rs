//! How much of a basin its stations do not reach.

use super::Basin;
use serde::Serialize;

/// Shares of the basin's area, or of its snow, beyond its stations.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct BeyondStations {
    /// Elevation of the lowest station, m.
    pub lowest_m: f64,
    /// Elevation of the highest station, m.
    pub highest_m: f64,
    /// Share below the lowest station, 0 to 1.
    pub share_below: f64,
    /// Share above the highest station, 0 to 1.
    pub share_above: f64,
}

impl Basin {
    /// The shares of area above the highest and below the lowest of some stations, each band's area spread evenly over its
    /// height. Results there hang on the gradients alone. None without stations.
    pub fn beyond(&self, stations_m: &[f64]) -> Option<BeyondStations> {
        self.shares_beyond(stations_m, &self.shares())
    }

    /// The same shares of snow: `swe_mm` is what lies on each band, from the lowest. None without stations or snow.
    pub fn swe_beyond(&self, stations_m: &[f64], swe_mm: &[f64]) -> Option<BeyondStations> {
        let volumes: Vec<f64> =
            self.shares().iter().zip(swe_mm).map(|(share, swe_mm)| share * swe_mm).collect();
        let all = volumes.iter().sum::<f64>();
        let shares: Vec<f64> = volumes.iter().map(|volume| volume / all).collect();
        self.shares_beyond(stations_m, &shares).filter(|_| all > 0.0)
    }

    fn shares_beyond(&self, stations_m: &[f64], of_bands: &[f64]) -> Option<BeyondStations> {
        let lowest_m = stations_m.iter().copied().reduce(f64::min)?;
        let highest_m = stations_m.iter().copied().reduce(f64::max)?;
        let below = |elevation_m: f64| {
            let below = self.bands.iter().zip(of_bands).map(|(band, share)| {
                share * ((elevation_m - band.lower_m) / (band.upper_m - band.lower_m)).clamp(0.0, 1.0)
            });
            below.sum::<f64>().min(1.0)
        };
        let (share_below, share_above) = (below(lowest_m), 1.0 - below(highest_m));
        Some(BeyondStations { lowest_m, highest_m, share_below, share_above })
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::basin::{Band, GradientForm, Ground, PrecipitationGradient, TemperatureGradient};

    /// By hand: bands of 100 and 300 km2; a station in the middle of the upper one has half of it above, 150 of 400 km2.
    /// With 100 mm below and 500 mm above, the volumes are 10 and 150 hm3, so 75 of 160 lie above.
    #[test]
    fn snow_lies_higher_than_the_area() {
        let band = |lower_m: f64, area_km2: f64| Band {
            lower_m,
            upper_m: lower_m + 1000.0,
            area_km2,
            elevation_m: lower_m + 500.0,
            ground: Ground::default(),
        };
        let basin = Basin {
            latitude_deg: 40.0,
            bands: vec![band(1000.0, 100.0), band(2000.0, 300.0)],
            temperature: TemperatureGradient::constant(-6.0),
            precipitation: PrecipitationGradient::new(0.0, None, GradientForm::Linear),
        };
        let area = basin.beyond(&[2500.0]).unwrap();
        assert!(
            (area.share_above - 0.375).abs() < 1e-12 && (area.share_below - 0.625).abs() < 1e-12,
            "{area:?}"
        );
        let snow = basin.swe_beyond(&[2500.0], &[100.0, 500.0]).unwrap();
        assert!((snow.share_above - 75.0 / 160.0).abs() < 1e-12, "{snow:?}");
        assert_eq!(basin.swe_beyond(&[2500.0], &[0.0, 0.0]), None, "no snow, no share");
    }
}
