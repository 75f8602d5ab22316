//! Humid air: wet bulb and pressure; and the share that falls as rain.

use super::case::Case;
use thawline::snow::{PhaseRule, s_curve_snow_fraction, standard_pressure_kpa, wet_bulb_c};

/// The standard atmosphere's pressure by elevation.
pub fn standard_pressure(case: &Case) {
    let elevations_m: Vec<f64> = case.input("elevations_m");
    let pressure_hpa: Vec<f64> = elevations_m.iter().map(|m| 10.0 * standard_pressure_kpa(*m)).collect();
    case.check("pressure_hpa", &pressure_hpa);
}

/// Wet bulb of temperatures with their humidities, at one elevation.
pub fn wet_bulb(case: &Case) {
    let mean_c: Vec<f64> = case.input("mean_c");
    let humidity_pct: Vec<f64> = case.input("relative_humidity_pct");
    let pressure_kpa = standard_pressure_kpa(case.input("elevation_m"));
    let air = mean_c.iter().zip(&humidity_pct);
    let wet_c: Vec<f64> = air.map(|(mean, pct)| wet_bulb_c(*mean, *pct, pressure_kpa)).collect();
    case.check("wet_bulb_c", &wet_c);
}

/// The share of rain by the curve of third degree.
pub fn s_curve(case: &Case) {
    let half_snow_at_c: f64 = case.input("half_snow_at_c");
    let mixed_range_c: f64 = case.input("mixed_range_c");
    let rain =
        |mean_c: &f64| 1.0 - s_curve_snow_fraction(*mean_c, half_snow_at_c, 1.0 / (1.4 * mixed_range_c));
    case.check("rain_share", &case.input::<Vec<f64>>("mean_c").iter().map(rain).collect::<Vec<f64>>());
}

/// The share of snow by the smooth curve for land.
pub fn land_curve(case: &Case) {
    let mean_c: Vec<f64> = case.input("mean_c");
    let snow: Vec<f64> = mean_c.iter().map(|mean| PhaseRule::Tanh.snow_fraction(*mean)).collect();
    case.check("snow_share", &snow);
}
