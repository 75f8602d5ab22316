//! Tamsin River: southern, maritime and wet, its snow line moving up and down through the bands all winter.

use super::errors::Errors;
use super::layout::Layout;
use super::place::{Climate, Hole, Place, YearToYear, gap};
use super::river::River;
use super::snow_site::{SnowSite, Visits};
use super::swing::{SOUTHERN_MIDWINTER_DAY, Swing};
use crate::inflow::{Routing, SlowStore};
use crate::units::FlowUnit;

/// The southern demo: so much falls so near to freezing that a degree turns much of it into rain.
pub const PLACE: Place = Place {
    basin: "Tamsin River",
    latitude_deg: -43.2,
    water_year_starts: (4, 1),
    layout: Layout::US,
    station: "Curlew Saddle",
    station_m: 1219.2,
    lowest: 2500,
    band_height: 500,
    band_areas: &[7.0, 15.0, 24.0, 31.0, 33.0, 29.0, 22.0, 14.0, 7.0, 2.0],
    climate: Climate {
        seed: 15,
        midwinter_day: SOUTHERN_MIDWINTER_DAY,
        mean_c: Swing::between(-1.2, 11.2),
        residual_sd_c: Swing::between(3.2, 2.9),
        residual_lag1: 0.62,
        wet_less_dry_c: Swing::between(0.8, -3.0),
        dry_range_c: Swing::between(8.5, 12.0),
        wet_range_share: 0.66,
        range_log_sd: Swing::between(0.24, 0.20),
        wet_after_dry: [0.26, 0.24, 0.26, 0.28, 0.31, 0.32, 0.32, 0.32, 0.34, 0.34, 0.32, 0.29],
        wet_after_wet: [0.54, 0.52, 0.54, 0.57, 0.60, 0.60, 0.59, 0.60, 0.62, 0.63, 0.60, 0.57],
        wet_day_mm: [10.5, 10.0, 10.5, 11.0, 11.0, 10.5, 10.0, 10.5, 11.0, 11.5, 11.0, 11.0],
        amount_shape: 0.80,
        year_to_year: YearToYear {
            wetness_lag1: 0.15,
            wetness_weight: Swing::between(1.0, 0.5),
            wet_day_log_odds: 0.14,
            amount_log_sd: 0.09,
            warmth_sd_c: 0.4,
        },
    },
    gaps: &[
        gap((1985, 8, 14), 1, Hole::Minimum),
        gap((1986, 7, 11), 9, Hole::Flow),
        gap((1987, 6, 20), 6, Hole::SnowWater),
        gap((1988, 1, 5), 1, Hole::Maximum),
        gap((1990, 10, 2), 3, Hole::Temperatures),
        gap((1992, 7, 9), 4, Hole::Precipitation),
        gap((1993, 12, 2), 4, Hole::Flow),
        gap((1996, 5, 28), 2, Hole::SnowWater),
        gap((1997, 12, 11), 1, Hole::Temperatures),
        gap((1999, 10, 5), 24, Hole::Flow),
        gap((2001, 9, 16), 1, Hole::SnowWater),
        gap((2003, 6, 3), 1, Hole::Minimum),
        gap((2006, 6, 17), 41, Hole::All),
        gap((2009, 8, 22), 9, Hole::SnowWater),
        gap((2010, 3, 8), 5, Hole::Precipitation),
        gap((2012, 6, 12), 3, Hole::Flow),
        gap((2014, 9, 27), 2, Hole::Temperatures),
        gap((2015, 1, 20), 6, Hole::Flow),
        gap((2018, 2, 13), 1, Hole::Maximum),
        gap((2019, 11, 4), 3, Hole::SnowWater),
        gap((2021, 7, 30), 1, Hole::Precipitation),
        gap((2022, 9, 1), 12, Hole::Flow),
    ],
};

/// Weighs the snow by day, near the middle of the basin.
pub const SNOW_SITE: SnowSite = SnowSite {
    name: "Lapwing Flat snow pillow",
    elevation_m: 1463.04,
    visits: Visits::Daily,
    temperature_gradient_c_per_km: -5.5,
    precipitation_gradient_pct_per_100m: 3.0,
    snow_catch: 1.15,
    degree_day_factor_lowest: 0.9,
    degree_day_factor_highest: 4.2,
    melt_base_c: 0.7,
    errors: Errors { seed: 22, year_sd: 0.06, reading_sd: 0.03, reading_lag1: 0.95 },
};

/// Flows into Quillback Reservoir. Less of its water is lost in winter, and the ground keeps more of it than the scenario states.
pub const RIVER: River = River {
    name: "Inflow to Quillback Reservoir",
    remark: "mean inflow of the day in cubic feet per second; M: not measured",
    header: "Day,Into the reservoir (cfs)",
    unit: FlowUnit::CubicFootPerSecond,
    temperature_gradient_c_per_km: -5.7,
    precipitation_gradient_pct_per_100m: 3.2,
    precipitation_gradient_top_m: 1900.0,
    snow_catch: 1.13,
    degree_day_factor_lowest: 0.7,
    degree_day_factor_highest: 3.9,
    routing: Routing {
        runoff_fraction: [0.58, 0.57, 0.60, 0.66, 0.72, 0.76, 0.78, 0.78, 0.76, 0.72, 0.67, 0.61],
        recession_days: 3.2,
        slow: Some(SlowStore { share: 0.35, recession_days: 75.0 }),
    },
    errors: Errors { seed: 23, year_sd: 0.05, reading_sd: 0.08, reading_lag1: 0.8 },
};
