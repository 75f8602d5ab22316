//! The sun over level ground and over slopes.

use super::case::Case;
use thawline::snow::{
    day_length_h, declination_rad, extraterrestrial_radiation, inverse_relative_distance,
    potential_radiation, sunset_hour_angle_rad,
};

/// Level ground at one latitude on the stated days.
pub fn sun(case: &Case) {
    let latitude_deg: f64 = case.input("latitude_deg");
    let days: Vec<u16> = case.input("days");
    let of_days = |value: &dyn Fn(u16) -> f64| days.iter().map(|day| value(*day)).collect::<Vec<f64>>();
    let radiation = of_days(&|day| extraterrestrial_radiation(latitude_deg, day));
    let day_h = of_days(&|day| day_length_h(latitude_deg, day));
    case.check("inverse_relative_distance", &of_days(&inverse_relative_distance));
    case.check("declination_rad", &of_days(&declination_rad));
    case.check("sunset_hour_angle_rad", &of_days(&|day| sunset_hour_angle_rad(latitude_deg, day)));
    case.check("radiation_mj_m2", &radiation);
    case.check("day_length_h", &day_h);
    // FAO-56, equation 35, which the program has no use for, takes both to a printed value.
    if let Some(sunshine_h) = case.input_or_none::<f64>("sunshine_h") {
        let solar = radiation.iter().zip(&day_h).map(|(ra, hours)| (0.25 + 0.5 * sunshine_h / hours) * ra);
        case.check("solar_radiation_mj_m2", &solar.collect::<Vec<f64>>());
    }
}

/// Slopes at one latitude on one day, one for each aspect stated: what they have, alone and over level ground.
pub fn slopes(case: &Case) {
    let latitude_deg: f64 = case.input("latitude_deg");
    let day: u16 = case.input("day");
    let slope_deg: f64 = case.input("slope_deg");
    let aspects: Vec<f64> = case.input("aspects_deg");
    let radiation: Vec<f64> =
        aspects.iter().map(|aspect| potential_radiation(latitude_deg, slope_deg, *aspect, day)).collect();
    let level = extraterrestrial_radiation(latitude_deg, day);
    case.check("radiation_mj_m2", &radiation);
    case.check("over_level", &radiation.iter().map(|slope| slope / level).collect::<Vec<f64>>());
}
