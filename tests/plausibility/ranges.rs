//! The idealised ranges: where their numbers come from, and how a range is cut into bands.
//!
//! Station normals and yearly totals are well-known numbers of real places, quoted from memory and rounded; what no
//! publication gives (day-to-day spread, how many days are wet) is an ordinary value for such a place. None was chosen
//! by its result.

use super::climate::Climate;
use thawline::basin::{Band, Basin, GradientForm, Ground, PrecipitationGradient, TemperatureGradient};

/// A mountain range: a station's climate, how it changes with elevation, and where the area lies.
#[derive(Debug, Clone, Copy)]
pub struct Range {
    pub climate: Climate,
    pub station_m: f64,
    /// degC per km, January first.
    pub temperature_c_per_km: [f64; 12],
    /// Percent per 100 m, up to an elevation in m.
    pub precipitation_pct_per_100m: f64,
    pub precipitation_top_m: f64,
    /// Elevation of the foot and the top, m.
    pub reach_m: [f64; 2],
    pub hypsometry: Hypsometry,
}

/// Where a range's area lies.
#[derive(Debug, Clone, Copy)]
pub enum Hypsometry {
    /// Most at the foot, falling to nothing at the top.
    BottomHeavy,
    /// The same at every elevation.
    Even,
    /// Nothing at the foot, most at the top.
    TopHeavy,
}

/// Bands are so high, m.
const BAND_M: f64 = 50.0;

/// The west slope of the Washington Cascades, warm and maritime.
///
/// Stampede Pass, 1206 m: 4.4 degC in the mean of the year, -3 in January, 13.7 in August; some 2200 mm a year, three
/// quarters from October to March, on 200 days (station normals, from memory). Temperature gradient: the middle of 3.9
/// to 5.2 degC per km (Minder, Mote & Lundquist 2010, abstract). Precipitation grows by 3 % per 100 m (0 to 10 is what
/// is reported), no further than the crest. Most of the area lies low.
pub const CASCADES: Range = Range {
    climate: Climate {
        yearly_mean_c: 4.4,
        swing_c: 8.4,
        coldest_day: 15.0,
        day_sd_c: 3.5,
        year_sd_c: 0.8,
        half_range_c: 3.5,
        yearly_precipitation_mm: 2200.0,
        wet_share: 0.55,
        wet_season_excess: 0.785,
        wettest_day: 359.0,
        year_variation: 0.2,
    },
    station_m: 1206.0,
    temperature_c_per_km: [-4.5; 12],
    precipitation_pct_per_100m: 3.0,
    precipitation_top_m: 2000.0,
    reach_m: [300.0, 2300.0],
    hypsometry: Hypsometry::BottomHeavy,
};

/// The Colorado Front Range at Niwot Ridge, cold and continental.
///
/// Station C1, 3022 m: 1.5 degC in the mean of the year, -8 in January, 12 in July, 750 mm; station D1, 3739 m: -3.7
/// degC and 1000 mm, which makes -7 degC per km and 5 % per 100 m; spring is the wettest season (Greenland 1989,
/// Williams et al. 1996, from memory).
pub const ROCKIES: Range = Range {
    climate: Climate {
        yearly_mean_c: 1.5,
        swing_c: 10.0,
        coldest_day: 15.0,
        day_sd_c: 4.5,
        year_sd_c: 0.9,
        half_range_c: 6.0,
        yearly_precipitation_mm: 750.0,
        wet_share: 0.4,
        wet_season_excess: 0.2,
        wettest_day: 105.0,
        year_variation: 0.18,
    },
    station_m: 3022.0,
    temperature_c_per_km: [-7.0; 12],
    precipitation_pct_per_100m: 5.0,
    precipitation_top_m: 3800.0,
    reach_m: [2500.0, 3900.0],
    hypsometry: Hypsometry::Even,
};

/// The southern Yukon around Wolf Creek, a cold and dry interior.
///
/// Whitehorse, 706 m: -0.5 degC in the mean of the year, -15.5 in January, 14.3 in July, 300 mm a year with what gauges
/// lose made good, most of it in July and August (station normals, from memory). In winter it is no colder up the
/// slopes than in the valley; 5 % more falls per 100 m.
pub const YUKON: Range = Range {
    climate: Climate {
        yearly_mean_c: -0.5,
        swing_c: 15.0,
        coldest_day: 12.0,
        day_sd_c: 6.0,
        year_sd_c: 1.3,
        half_range_c: 5.0,
        yearly_precipitation_mm: 300.0,
        wet_share: 0.3,
        wet_season_excess: 0.45,
        wettest_day: 213.0,
        year_variation: 0.15,
    },
    station_m: 706.0,
    temperature_c_per_km: [0.0, 0.0, -2.0, -5.0, -6.5, -6.5, -6.5, -6.5, -6.0, -4.5, -2.0, 0.0],
    precipitation_pct_per_100m: 5.0,
    precipitation_top_m: 2000.0,
    reach_m: [700.0, 2000.0],
    hypsometry: Hypsometry::Even,
};

/// The central Spanish Pyrenees, with the Izas catchment in them.
///
/// Izas, 2056 to 2280 m: 3 degC in the mean of the year, below 0 on some 130 days, 2000 mm a year (Lopez-Moreno et al.,
/// from memory). Temperature gradient -5.2 degC per km (Navarro-Serrano et al. 2018, from memory); autumn and spring
/// are wet.
pub const PYRENEES: Range = Range {
    climate: Climate {
        yearly_mean_c: 3.0,
        swing_c: 7.5,
        coldest_day: 25.0,
        day_sd_c: 3.8,
        year_sd_c: 0.8,
        half_range_c: 3.5,
        yearly_precipitation_mm: 2000.0,
        wet_share: 0.4,
        wet_season_excess: 0.25,
        wettest_day: 335.0,
        year_variation: 0.2,
    },
    station_m: 2056.0,
    temperature_c_per_km: [-5.2; 12],
    precipitation_pct_per_100m: 3.0,
    precipitation_top_m: 2800.0,
    reach_m: [1400.0, 2800.0],
    hypsometry: Hypsometry::Even,
};

/// The western Alps.
///
/// Great St Bernard, 2472 m: -0.6 degC in the mean of the year, -7 in January, 7.7 in July; Jungfraujoch, 3580 m: -7.2
/// degC, which makes -6 degC per km (station normals, from memory). Some 1400 mm a year, evenly through the year.
pub const ALPS: Range = Range {
    climate: Climate {
        yearly_mean_c: -0.6,
        swing_c: 7.6,
        coldest_day: 25.0,
        day_sd_c: 4.0,
        year_sd_c: 0.7,
        half_range_c: 2.5,
        yearly_precipitation_mm: 1400.0,
        wet_share: 0.45,
        wet_season_excess: 0.0,
        wettest_day: 15.0,
        year_variation: 0.15,
    },
    station_m: 2472.0,
    temperature_c_per_km: [-6.0; 12],
    precipitation_pct_per_100m: 2.0,
    precipitation_top_m: 3000.0,
    reach_m: [500.0, 4200.0],
    hypsometry: Hypsometry::Even,
};

impl Range {
    /// The same climate where the area lies otherwise.
    pub fn with(self, hypsometry: Hypsometry) -> Self {
        Self { hypsometry, ..self }
    }

    /// A part of the range.
    pub fn between(self, foot_m: f64, top_m: f64) -> Self {
        Self { reach_m: [foot_m, top_m], ..self }
    }

    /// A single place of it.
    pub fn at(self, elevation_m: f64) -> Self {
        self.between(elevation_m - BAND_M / 2.0, elevation_m + BAND_M / 2.0).with(Hypsometry::Even)
    }

    /// Bands of 50 m and the gradients.
    pub fn basin(&self) -> Basin {
        let [foot_m, top_m] = self.reach_m;
        let count = ((top_m - foot_m) / BAND_M).round() as usize;
        let band = |number: usize| {
            let lower_m = foot_m + BAND_M * number as f64;
            let elevation_m = lower_m + BAND_M / 2.0;
            let area_km2 = match self.hypsometry {
                Hypsometry::BottomHeavy => top_m - elevation_m,
                Hypsometry::Even => BAND_M,
                Hypsometry::TopHeavy => elevation_m - foot_m,
            };
            Band { lower_m, upper_m: lower_m + BAND_M, area_km2, elevation_m, ground: Ground::default() }
        };
        Basin {
            latitude_deg: 45.0,
            bands: (0..count).map(band).collect(),
            temperature: TemperatureGradient {
                tmin_c_per_km: self.temperature_c_per_km,
                tmax_c_per_km: self.temperature_c_per_km,
            },
            precipitation: PrecipitationGradient::new(
                self.precipitation_pct_per_100m,
                Some(self.precipitation_top_m),
                GradientForm::Linear,
            ),
        }
    }
}
