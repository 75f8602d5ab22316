//! Wet-bulb temperature by halving.

/// Saturation vapour pressure over water, kPa.
pub fn saturation_kpa(temperature_c: f64) -> f64 {
    0.6108 * libm::exp(17.27 * temperature_c / (temperature_c + 237.3))
}

/// Pressure of the standard atmosphere at an elevation, kPa.
pub fn pressure_kpa(elevation_m: f64) -> f64 {
    101.325 * libm::pow(1.0 - 0.0065 * elevation_m / 288.15, 9.80665 / (287.05287 * 0.0065))
}

/// The temperature at which evaporation cools no further, degC.
pub fn wet_bulb_c(mean_c: f64, relative_humidity_pct: f64, elevation_m: f64) -> f64 {
    let humidity_pct = relative_humidity_pct.clamp(1.0, 100.0);
    let per_c = 0.000665 * pressure_kpa(elevation_m);
    let vapour_kpa = humidity_pct / 100.0 * saturation_kpa(mean_c);
    // Air without any vapour would be the coldest; below -237 degC the formula of saturation makes no sense.
    let mut low_c = mean_c - saturation_kpa(mean_c) / per_c;
    if low_c < -200.0 {
        low_c = -200.0;
    }
    let mut high_c = mean_c;
    while high_c - low_c > 1e-13 {
        let middle_c = (low_c + high_c) / 2.0;
        if middle_c <= low_c || middle_c >= high_c {
            break;
        }
        if saturation_kpa(middle_c) - vapour_kpa > per_c * (mean_c - middle_c) {
            high_c = middle_c;
        } else {
            low_c = middle_c;
        }
    }
    (low_c + high_c) / 2.0
}
