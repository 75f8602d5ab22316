//! The sun on a slope: where the sun stands, as a vector, against the slope's upright.
//!
//! Written from the geometry and FAO-56's yearly course. The moments at which the slope's light begins and ends are roots
//! of a quadratic in the tangent of half the hour angle; between them the light is integrated by quadrature.

use super::quadrature::integral;
use std::f64::consts::PI;

/// A slope at a latitude, and the sun's declination on a day.
struct Place {
    latitude: f64,
    declination: f64,
    upright: [f64; 3],
}

impl Place {
    fn new(latitude_deg: f64, slope_deg: f64, aspect_deg: f64, day_of_year: f64) -> Self {
        let rad = PI / 180.0;
        let (slope, aspect) = (slope_deg * rad, aspect_deg * rad);
        let (steep, level) = (libm::sin(slope), libm::cos(slope));
        Self {
            latitude: latitude_deg * rad,
            declination: 0.409 * libm::sin(2.0 * PI * day_of_year / 365.0 - 1.39),
            upright: [steep * libm::sin(aspect), steep * libm::cos(aspect), level],
        }
    }

    /// Towards the sun: east, north, up.
    fn sun(&self, hour_angle: f64) -> [f64; 3] {
        let (sin, cos) = (libm::sin(hour_angle), libm::cos(hour_angle));
        let (high, low) = (libm::sin(self.declination), libm::cos(self.declination));
        let (north, middle) = (libm::sin(self.latitude), libm::cos(self.latitude));
        [-low * sin, middle * high - north * low * cos, north * high + middle * low * cos]
    }

    /// Cosine of the angle between the sun and the slope's upright.
    fn incidence(&self, hour_angle: f64) -> f64 {
        let sun = self.sun(hour_angle);
        sun[0] * self.upright[0] + sun[1] * self.upright[1] + sun[2] * self.upright[2]
    }

    /// Hour angle of sunset; none where the sun does not rise.
    fn sunset(&self) -> Option<f64> {
        let cosine = -libm::tan(self.latitude) * libm::tan(self.declination);
        if cosine >= 1.0 {
            None
        } else if cosine <= -1.0 {
            Some(PI)
        } else {
            Some(libm::acos(cosine))
        }
    }

    /// Hour angles at which the sun crosses the slope's plane.
    fn crossings(&self) -> Vec<f64> {
        let [noon, midnight, evening] = [0.0, PI, PI / 2.0].map(|hour_angle| self.incidence(hour_angle));
        let constant = (noon + midnight) / 2.0;
        let (cosine, sine) = ((noon - midnight) / 2.0, evening - constant);
        // With t the tangent of half the hour angle: (constant - cosine)*t^2 + 2*sine*t + (constant + cosine) = 0.
        let under_root = sine * sine - (constant - cosine) * (constant + cosine);
        if under_root < 0.0 {
            return Vec::new();
        }
        let root = libm::sqrt(under_root);
        let larger = if sine < 0.0 { root - sine } else { -root - sine };
        let tangents = [larger / (constant - cosine), (constant + cosine) / larger];
        tangents
            .into_iter()
            .filter(|tangent| !tangent.is_nan())
            .map(|tangent| 2.0 * libm::atan(tangent))
            .collect()
    }
}

/// MJ per m2 that one radian of the hour angle brings with the sun overhead.
fn strength(day_of_year: f64) -> f64 {
    24.0 * 60.0 / (2.0 * PI) * 0.0820 * (1.0 + 0.033 * libm::cos(2.0 * PI * day_of_year / 365.0))
}

/// Direct radiation without air on a slope, MJ per m2 and day.
pub fn radiation(latitude_deg: f64, slope_deg: f64, aspect_deg: f64, day_of_year: f64) -> f64 {
    let place = Place::new(latitude_deg, slope_deg, aspect_deg, day_of_year);
    let Some(sunset) = place.sunset() else {
        return 0.0;
    };
    let mut ends = vec![-sunset, sunset];
    ends.extend(place.crossings().into_iter().filter(|crossing| *crossing > -sunset && *crossing < sunset));
    ends.sort_by(f64::total_cmp);
    let mut sum = 0.0;
    for spell in ends.windows(2) {
        let (from, to) = (spell[0], spell[1]);
        if place.incidence((from + to) / 2.0) > 0.0 {
            sum += integral(|hour_angle| place.incidence(hour_angle), from, to, 8);
        }
    }
    strength(day_of_year) * sum
}

/// The same, added up over `steps` moments of the day.
pub fn summed_radiation(
    latitude_deg: f64,
    slope_deg: f64,
    aspect_deg: f64,
    day_of_year: f64,
    steps: u32,
) -> f64 {
    let place = Place::new(latitude_deg, slope_deg, aspect_deg, day_of_year);
    let mut sum = 0.0;
    for step in 0..steps {
        let hour_angle = 2.0 * PI * ((f64::from(step) + 0.5) / f64::from(steps) - 0.5);
        let incidence = place.incidence(hour_angle);
        if place.sun(hour_angle)[2] > 0.0 && incidence > 0.0 {
            sum += incidence * 2.0 * PI / f64::from(steps);
        }
    }
    strength(day_of_year) * sum
}

/// The highest radiation on level ground of a year of 365 days.
pub fn highest_radiation(latitude_deg: f64) -> f64 {
    let mut highest = 0.0;
    for day in 1..=365 {
        let level = radiation(latitude_deg, 0.0, 0.0, f64::from(day));
        if level > highest {
            highest = level;
        }
    }
    highest
}
