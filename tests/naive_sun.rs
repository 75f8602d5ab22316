//! The sun on a slope, added up over the hours of a day: where the sun stands, as a vector, against the slope's upright.
//!
//! It was written from the geometry and FAO-56's yearly course, and shares no line with the closed form.

use std::f64::consts::PI;

/// Direct radiation without air on a slope, MJ per m2 and day, from `steps` moments of the day.
pub fn summed_radiation(latitude_deg: f64, slope_deg: f64, aspect_deg: f64, day: u16, steps: u32) -> f64 {
    let rad = PI / 180.0;
    let year = 2.0 * PI * f64::from(day) / 365.0;
    let declination = 0.409 * libm::sin(year - 1.39);
    let strength_mj_m2_min = 0.0820 * (1.0 + 0.033 * libm::cos(year));
    let (lat, slope, aspect) = (latitude_deg * rad, slope_deg * rad, aspect_deg * rad);
    let upright =
        [libm::sin(slope) * libm::sin(aspect), libm::sin(slope) * libm::cos(aspect), libm::cos(slope)];
    let minutes = 24.0 * 60.0 / f64::from(steps);
    let mut sum = 0.0;
    for step in 0..steps {
        let hour_angle = 2.0 * PI * ((f64::from(step) + 0.5) / f64::from(steps) - 0.5);
        let (sin, cos) = (libm::sin(hour_angle), libm::cos(hour_angle));
        // East, north, up.
        let sun = [
            -libm::cos(declination) * sin,
            libm::cos(lat) * libm::sin(declination) - libm::sin(lat) * libm::cos(declination) * cos,
            libm::sin(lat) * libm::sin(declination) + libm::cos(lat) * libm::cos(declination) * cos,
        ];
        let incidence = sun[0] * upright[0] + sun[1] * upright[1] + sun[2] * upright[2];
        if sun[2] > 0.0 && incidence > 0.0 {
            sum += incidence * strength_mj_m2_min * minutes;
        }
    }
    sum
}
