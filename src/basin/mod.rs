//! The basin: its elevation bands and how weather changes with elevation.

mod bands;
mod columns;
mod curve;
mod gradients;
mod ground;
mod ground_columns;
mod reach;
mod told_apart;
mod unread;

pub use bands::{Band, BandColumns, read_bands};
pub use columns::Column;
pub use curve::{CurveColumns, read_curve};
pub use gradients::{GradientForm, PrecipitationGradient, TemperatureGradient};
pub use ground::{Ground, GroundStated};
pub use ground_columns::{ANGLE_NAMES, GroundColumns, VARIATION_NAMES};
pub use reach::BeyondStations;
pub use told_apart::told_apart;
pub use unread::Unread;

use crate::fault::Unlikely;

/// A station farther than this above or below all bands is likely a slip of units, m.
const STATION_REACH_M: f64 = 500.0;
/// A band higher than this is coarse near the snow line: with a few wide bands a basin's melt is 2 to 11 % off (worked from
/// the equations; common practice is 100 to 300 m), m.
const COARSE_BAND_M: f64 = 310.0;
/// Edges closer than this meet, m.
const MEETING_M: f64 = 0.5;
/// Basin over station precipitation outside this is likely a slip of the gradient or the elevations.
const USUAL_PRECIPITATION_RATIO: std::ops::RangeInclusive<f64> = 0.4..=3.0;

/// A basin as the engine needs it: bands from the lowest up, and the gradients that carry station weather to them.
#[derive(Debug, Clone)]
pub struct Basin {
    /// Latitude of the basin, degrees, positive north.
    pub latitude_deg: f64,
    /// Bands, sorted from the lowest; never empty.
    pub bands: Vec<Band>,
    /// Change of temperature with elevation.
    pub temperature: TemperatureGradient,
    /// Change of precipitation with elevation.
    pub precipitation: PrecipitationGradient,
}

impl Basin {
    /// Total area, km2.
    pub fn area_km2(&self) -> f64 {
        self.bands.iter().map(|band| band.area_km2).sum()
    }

    /// Each band's share of the basin's area, from the lowest band up; the shares add up to 1.
    pub fn shares(&self) -> Vec<f64> {
        let total = self.area_km2();
        self.bands.iter().map(|band| band.area_km2 / total).collect()
    }

    /// Mean elevation of the bands, weighted by their areas, m.
    pub fn mean_elevation_m(&self) -> f64 {
        self.bands.iter().zip(self.shares()).map(|(band, share)| share * band.elevation_m).sum()
    }

    /// Whether the basin lies in the southern hemisphere, which sets the defaults of the seasons.
    pub fn is_southern(&self) -> bool {
        self.latitude_deg < 0.0
    }

    /// Basin-mean precipitation over station precipitation, by the precipitation gradient alone.
    pub fn precipitation_ratio(&self, station_elevation_m: f64) -> f64 {
        self.bands
            .iter()
            .zip(self.shares())
            .map(|(band, share)| share * self.precipitation.factor(station_elevation_m, band.elevation_m))
            .sum()
    }

    /// What about the bands and the station is unlikely.
    pub fn unlikely(&self, station_elevation_m: f64) -> Vec<Unlikely> {
        let mut found = Vec::new();
        if let (Some(lowest), Some(highest)) = (self.bands.first(), self.bands.last()) {
            let reach = lowest.lower_m - STATION_REACH_M..=highest.upper_m + STATION_REACH_M;
            if !reach.contains(&station_elevation_m) {
                found.push(Unlikely::new(
                    "weather.station_elevation_m",
                    format!(
                        "{station_elevation_m} m lies far outside the bands, {} to {} m: are both in metres?",
                        lowest.lower_m, highest.upper_m
                    ),
                ));
            }
        }
        let holes: Vec<&[Band]> =
            self.bands.windows(2).filter(|pair| pair[1].lower_m - pair[0].upper_m > MEETING_M).collect();
        if let Some([below, above]) = holes.first() {
            let (from, to) = (below.upper_m, above.lower_m);
            let count = holes.len();
            let holes = if count == 1 { "a hole" } else { &format!("{count} holes, the lowest") };
            found
                .push(Unlikely::new("basin.bands", format!("the bands leave {holes} from {from} to {to} m")));
        }
        let coarse = self.bands.iter().filter(|band| band.upper_m - band.lower_m > COARSE_BAND_M).count();
        if coarse > 0 {
            found.push(Unlikely::new(
                "basin.bands",
                format!(
                    "{coarse} of {} bands are more than 300 m high; near the snow line that is coarse",
                    self.bands.len()
                ),
            ));
        }
        found.extend(self.too_steep());
        found.extend(self.odd_ground());
        let ratio = self.precipitation_ratio(station_elevation_m);
        if !USUAL_PRECIPITATION_RATIO.contains(&ratio) {
            found.push(Unlikely::new(
                "basin.precipitation_gradient_pct_per_100m",
                format!("gives the basin {ratio:.2} times the station's precipitation"),
            ));
        }
        found
    }
}
