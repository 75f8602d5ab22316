//! Frostbell Creek: high, cold and continental, with precipitation all year.

use super::layout::Layout;
use super::place::{Climate, Hole, Place, YearToYear, gap};
use super::swing::{NORTHERN_MIDWINTER_DAY, Swing};

/// The cold demo: winter lies so far below freezing that years differ more by what falls than by what melts.
pub const PLACE: Place = Place {
    basin: "Frostbell Creek",
    latitude_deg: 43.6,
    water_year_starts: (10, 1),
    layout: Layout::METRIC,
    station: "Harrow Bench",
    station_m: 2960.0,
    lowest: 2700,
    band_height: 150,
    band_areas: &[9.0, 21.0, 36.0, 47.0, 51.0, 44.0, 31.0, 17.0, 6.0],
    climate: Climate {
        seed: 12,
        midwinter_day: NORTHERN_MIDWINTER_DAY,
        mean_c: Swing::between(-11.0, 12.0),
        residual_sd_c: Swing::between(4.7, 2.5),
        residual_lag1: 0.68,
        wet_less_dry_c: Swing::between(1.5, -3.0),
        dry_range_c: Swing::between(13.0, 17.0),
        wet_range_share: 0.70,
        range_log_sd: Swing::between(0.25, 0.15),
        wet_after_dry: [0.26, 0.26, 0.28, 0.28, 0.25, 0.18, 0.24, 0.25, 0.18, 0.18, 0.24, 0.26],
        wet_after_wet: [0.58, 0.58, 0.58, 0.58, 0.55, 0.46, 0.50, 0.50, 0.47, 0.50, 0.56, 0.58],
        wet_day_mm: [5.2, 5.2, 5.8, 6.2, 6.0, 4.8, 4.6, 4.6, 4.4, 5.4, 5.6, 5.2],
        amount_shape: 0.90,
        year_to_year: YearToYear {
            wetness_lag1: 0.2,
            wetness_weight: Swing::between(1.0, 0.3),
            wet_day_log_odds: 0.13,
            amount_log_sd: 0.08,
            warmth_sd_c: 0.6,
        },
    },
    gaps: &[
        gap((1987, 1, 30), 1, Hole::Minimum),
        gap((1990, 6, 12), 1, Hole::Maximum),
        gap((1994, 2, 19), 5, Hole::Temperatures),
        gap((1995, 4, 27), 4, Hole::Precipitation),
        gap((1999, 9, 3), 1, Hole::Temperatures),
        gap((2002, 11, 8), 2, Hole::Temperatures),
        gap((2007, 5, 15), 1, Hole::Minimum),
        gap((2011, 2, 26), 33, Hole::Temperatures),
        gap((2015, 12, 19), 3, Hole::Precipitation),
        gap((2022, 10, 6), 1, Hole::Maximum),
    ],
};
