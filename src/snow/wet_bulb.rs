//! Wet-bulb temperature, for rain and snow: in dry air a falling flake cools itself and stays snow longer.

use super::{larger, smaller};
use crate::weather::saturation_vapour_pressure_kpa;

/// The psychrometer's coefficient of a ventilated wet bulb, per degC (FAO-56, Allen et al. 1998, equation 8).
const PSYCHROMETER_PER_C: f64 = 0.000_665;
/// Drier air than this is taken as a failed sensor's, percent.
const LOWEST_HUMIDITY_PCT: f64 = 1.0;
/// Newton's steps get this small, degC, and then the next one would be nothing but rounding.
const SETTLED_C: f64 = 1e-7;
/// More steps than any air between -90 and 60 degC needs.
const MOST_STEPS: usize = 24;

/// Pressure of the standard atmosphere, kPa: `101.325*(1 - 0.0065*H/288.15)^5.25588` (ISO 2533:1975, below 11 km).
///
/// The elevation is taken as geopotential height H; geometric heights are 2.5 m more at 4000 m, which is 0.02 kPa. 0 at
/// and above 44 km.
pub fn standard_pressure_kpa(elevation_m: f64) -> f64 {
    const LAPSE_C_PER_M: f64 = 0.0065;
    const SEA_LEVEL_K: f64 = 288.15;
    const GRAVITY_M_S2: f64 = 9.806_65;
    const GAS_CONSTANT_J_KG_K: f64 = 287.052_87;
    let exponent = GRAVITY_M_S2 / (GAS_CONSTANT_J_KG_K * LAPSE_C_PER_M);
    101.325 * libm::pow(larger(1.0 - LAPSE_C_PER_M * elevation_m / SEA_LEVEL_K, 0.0), exponent)
}

/// Wet-bulb temperature, degC: where `e_s(Tw) - RH/100*e_s(T) = 0.000665*p*(T - Tw)`, e_s over water at all temperatures.
///
/// Newton's method from the air's temperature downwards: the function grows and bends upwards, so that every step stays
/// above the root and none can overshoot. Within 1e-12 degC of the root for -90 to 60 degC and 5 to 110 kPa, in 9
/// steps at most. Humidity is taken as 1 to 100 %; saturated air keeps its temperature to the bit.
///
/// Over ice instead of water the result would be 0.3 degC higher well below 0 degC, where nothing but snow
/// falls anyway. The fitted formula of Stull (2011, J. Appl. Meteor. Clim. 50:2267) is 0.5 to 0.7 degC colder around
/// 0 degC.
pub fn wet_bulb_c(mean_c: f64, relative_humidity_pct: f64, pressure_kpa: f64) -> f64 {
    let humidity = smaller(larger(relative_humidity_pct, LOWEST_HUMIDITY_PCT), 100.0) / 100.0;
    let vapour_kpa = humidity * saturation_vapour_pressure_kpa(mean_c);
    let per_c = PSYCHROMETER_PER_C * pressure_kpa;
    let mut wet_c = mean_c;
    for _ in 0..MOST_STEPS {
        let saturated_kpa = saturation_vapour_pressure_kpa(wet_c);
        let from_zero_c = wet_c + 237.3;
        let slope = saturated_kpa * 17.27 * 237.3 / (from_zero_c * from_zero_c) + per_c;
        let step_c = (saturated_kpa - vapour_kpa - per_c * (mean_c - wet_c)) / slope;
        wet_c -= step_c;
        if step_c.abs() < SETTLED_C {
            break;
        }
    }
    smaller(wet_c, mean_c)
}

#[cfg(test)]
mod tests;
