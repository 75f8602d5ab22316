//! Alder Fork: a wet winter, a dry summer, and lower bands that lie near the snow line.

use super::errors::Errors;
use super::layout::Layout;
use super::place::{Climate, Hole, Place, YearToYear, gap};
use super::snow_site::{SnowSite, Visits};
use super::swing::{NORTHERN_MIDWINTER_DAY, Swing};

/// The main demo: its lower bands lose most of their snow to a degree of warming, its upper ones almost none.
pub const PLACE: Place = Place {
    basin: "Alder Fork",
    latitude_deg: 39.4,
    water_year_starts: (10, 1),
    layout: Layout::METRIC,
    station: "Cutbank",
    station_m: 1830.0,
    lowest: 1500,
    band_height: 200,
    band_areas: &[24.0, 47.0, 72.0, 94.0, 102.0, 93.0, 75.0, 52.0, 30.0, 11.0],
    climate: Climate {
        seed: 14,
        midwinter_day: NORTHERN_MIDWINTER_DAY,
        mean_c: Swing::between(-2.0, 17.5),
        residual_sd_c: Swing::between(4.2, 2.6),
        residual_lag1: 0.7,
        wet_less_dry_c: Swing::between(0.5, -4.0),
        dry_range_c: Swing::between(12.0, 18.0),
        wet_range_share: 0.68,
        range_log_sd: Swing::between(0.25, 0.13),
        wet_after_dry: [0.27, 0.27, 0.27, 0.23, 0.20, 0.12, 0.10, 0.10, 0.12, 0.17, 0.24, 0.27],
        wet_after_wet: [0.60, 0.60, 0.58, 0.52, 0.50, 0.42, 0.38, 0.38, 0.45, 0.50, 0.58, 0.60],
        wet_day_mm: [9.5, 9.0, 8.0, 6.5, 5.5, 4.5, 4.5, 4.5, 5.0, 7.5, 9.0, 9.5],
        amount_shape: 0.85,
        year_to_year: YearToYear {
            wetness_lag1: 0.25,
            wetness_weight: Swing::between(1.0, 0.2),
            wet_day_log_odds: 0.20,
            amount_log_sd: 0.12,
            warmth_sd_c: 0.6,
        },
    },
    gaps: &[
        gap((1985, 4, 25), 12, Hole::SnowWater),
        gap((1986, 12, 9), 1, Hole::Minimum),
        gap((1987, 12, 25), 12, Hole::SnowWater),
        gap((1989, 7, 21), 1, Hole::Maximum),
        gap((1991, 3, 2), 4, Hole::Temperatures),
        gap((1992, 4, 25), 12, Hole::SnowWater),
        gap((1993, 11, 17), 3, Hole::Precipitation),
        gap((1996, 2, 5), 1, Hole::Temperatures),
        gap((1998, 1, 11), 47, Hole::All),
        gap((1998, 1, 26), 12, Hole::SnowWater),
        gap((2001, 5, 30), 1, Hole::Minimum),
        gap((2002, 12, 25), 42, Hole::SnowWater),
        gap((2004, 12, 24), 5, Hole::Precipitation),
        gap((2009, 10, 14), 3, Hole::Temperatures),
        gap((2011, 2, 23), 12, Hole::SnowWater),
        gap((2013, 8, 8), 1, Hole::Maximum),
        gap((2017, 1, 22), 2, Hole::Precipitation),
        gap((2020, 3, 26), 42, Hole::SnowWater),
        gap((2020, 4, 3), 1, Hole::Minimum),
    ],
};

/// Surveyed five times a winter, a little above the middle of the basin.
pub const SNOW_SITE: SnowSite = SnowSite {
    name: "Heron Meadow snow course",
    elevation_m: 2290.0,
    visits: Visits::Monthly { months: &[1, 2, 3, 4, 5], scatter_days: 3 },
    temperature_gradient_c_per_km: -6.0,
    precipitation_gradient_pct_per_100m: 4.0,
    snow_catch: 1.12,
    degree_day_factor_lowest: 0.7,
    degree_day_factor_highest: 3.9,
    melt_base_c: 0.8,
    errors: Errors { seed: 21, year_sd: 0.06, reading_sd: 0.03, reading_lag1: 0.0 },
};
