//! The sun above a slope: how much would come down on it through a day if there were no air (FAO Irrigation and Drainage
//! Paper 56, Allen et al. 1998, chapter 3).
//!
//! Days are numbers of the calendar year, 1 to 366. Latitudes are degrees, positive north. Hour angles are 0 at noon and
//! positive in the afternoon. FAO-56's constants stand as printed; its declination is a few tenths of a degree off the
//! true sun's around the equinoxes, which makes radiation 1 % low on 1 April at 40 degrees north.

use super::{larger, smaller};
use crate::basin::Ground;
use std::f64::consts::PI;

/// The solar constant, MJ per m2 and minute (FAO-56, equation 21).
const SOLAR_CONSTANT_MJ_M2_MIN: f64 = 0.0820;
/// Minutes for one radian of the hour angle.
const MINUTES_PER_RADIAN: f64 = 12.0 * 60.0 / PI;

/// Inverse relative distance from the earth to the sun, squared: `1 + 0.033*cos(2 pi J/365)` (FAO-56, equation 23).
pub fn inverse_relative_distance(day_of_year: u16) -> f64 {
    1.0 + 0.033 * libm::cos(2.0 * PI * f64::from(day_of_year) / 365.0)
}

/// Declination of the sun, rad: `0.409*sin(2 pi J/365 - 1.39)` (FAO-56, equation 24).
pub fn declination_rad(day_of_year: u16) -> f64 {
    0.409 * libm::sin(2.0 * PI * f64::from(day_of_year) / 365.0 - 1.39)
}

/// Hour angle of sunset over level ground, rad: `acos(-tan(latitude)*tan(declination))` (FAO-56, equation 25). 0 where
/// the sun stays below the horizon all day, pi where it stays above.
pub fn sunset_hour_angle_rad(latitude_deg: f64, day_of_year: u16) -> f64 {
    let cosine = -libm::tan(latitude_deg.to_radians()) * libm::tan(declination_rad(day_of_year));
    libm::acos(larger(smaller(cosine, 1.0), -1.0))
}

/// Hours between sunrise and sunset without refraction: `24*ws/pi`, ws the sunset hour angle (FAO-56, equation 34).
///
/// Printed hours of sun, which count refraction and the disc, are 0.2 h longer at 40 degrees, 0.4 h at 60.
///
/// ```
/// use thawline::snow::day_length_h;
/// assert!((day_length_h(-20.0, 246) - 11.7).abs() < 0.05); // FAO-56, example 9
/// ```
pub fn day_length_h(latitude_deg: f64, day_of_year: u16) -> f64 {
    24.0 / PI * sunset_hour_angle_rad(latitude_deg, day_of_year)
}

/// Radiation above the air on level ground, MJ per m2 and day (FAO-56, equation 21).
///
/// `24*60/pi * 0.0820 * dr * (ws*sin(latitude)*sin(declination) + cos(latitude)*cos(declination)*sin(ws))`. 0 in the
/// polar night.
///
/// ```
/// use thawline::snow::extraterrestrial_radiation;
/// assert!((extraterrestrial_radiation(-20.0, 246) - 32.2).abs() < 0.05); // FAO-56, example 8
/// ```
pub fn extraterrestrial_radiation(latitude_deg: f64, day_of_year: u16) -> f64 {
    let (latitude, declination) = (latitude_deg.to_radians(), declination_rad(day_of_year));
    let sunset = sunset_hour_angle_rad(latitude_deg, day_of_year);
    let half_day = sunset * libm::sin(latitude) * libm::sin(declination)
        + libm::cos(latitude) * libm::cos(declination) * libm::sin(sunset);
    day_scale(day_of_year) * 2.0 * half_day
}

/// Direct radiation without air on a slope, MJ per m2 of the slope and day: what comes while the sun is above both the
/// level horizon and the slope's own plane. Higher ground around throws no shadow.
///
/// The cosine of incidence is `A + B*cos(h) + C*sin(h)` at the hour angle h (Lee 1962; Swift 1976, Water Resour. Res.
/// 12:108; both from memory). Between its zeros, which an acos gives, and between sunrise and sunset it is integrated in
/// closed form, over one or two lit spells: a steep slope that looks away from a high sun is lit in the morning and again
/// in the evening. A level slope has the radiation of [`extraterrestrial_radiation`], to rounding.
///
/// `slope_deg` is 0 to 90 from the horizontal, `aspect_deg` the way it faces, clockwise from north.
pub fn potential_radiation(latitude_deg: f64, slope_deg: f64, aspect_deg: f64, day_of_year: u16) -> f64 {
    let (latitude, declination) = (latitude_deg.to_radians(), declination_rad(day_of_year));
    let (slope, aspect) = (slope_deg.to_radians(), aspect_deg.to_radians());
    let upright = libm::cos(slope);
    let (northward, eastward) = (libm::sin(slope) * libm::cos(aspect), libm::sin(slope) * libm::sin(aspect));
    let incidence = Incidence {
        constant: libm::sin(declination) * (libm::sin(latitude) * upright + libm::cos(latitude) * northward),
        cosine: libm::cos(declination) * (libm::cos(latitude) * upright - libm::sin(latitude) * northward),
        sine: -libm::cos(declination) * eastward,
    };
    day_scale(day_of_year) * incidence.lit(sunset_hour_angle_rad(latitude_deg, day_of_year))
}

/// The highest radiation on level ground of a year of 365 days, MJ per m2 and day.
pub fn highest_radiation(latitude_deg: f64) -> f64 {
    (1..=365).map(|day| extraterrestrial_radiation(latitude_deg, day)).fold(0.0, larger)
}

/// Radiation on the ground of a band over the year's highest on level ground, both without air: 0 in the shade, 1 on level
/// ground on the year's best day, somewhat more on slopes that face the sun.
///
/// It looks through the whole year for the highest; for many days at one latitude divide [`potential_radiation`] by
/// [`highest_radiation`], which is the same to the bit.
pub fn relative_radiation(latitude_deg: f64, ground: &Ground, day_of_year: u16) -> f64 {
    potential_radiation(latitude_deg, ground.slope_deg, ground.aspect_deg, day_of_year)
        / highest_radiation(latitude_deg)
}

/// Radiation that one radian of the hour angle brings where the sun is overhead, MJ per m2.
fn day_scale(day_of_year: u16) -> f64 {
    MINUTES_PER_RADIAN * SOLAR_CONSTANT_MJ_M2_MIN * inverse_relative_distance(day_of_year)
}

/// The cosine of the angle between the sun and the upright of a slope: `constant + cosine*cos(h) + sine*sin(h)`.
struct Incidence {
    constant: f64,
    cosine: f64,
    sine: f64,
}

impl Incidence {
    /// Its integral over the hour angles from `-sunset` to `sunset` where it is positive, rad.
    fn lit(&self, sunset: f64) -> f64 {
        let swing = libm::hypot(self.cosine, self.sine);
        if self.constant <= -swing {
            return 0.0;
        }
        if self.constant >= swing {
            return larger(self.between(-sunset, sunset), 0.0);
        }
        // Lit for `half` on either side of its highest; the same spell a turn earlier or later may begin or end the day.
        let (middle, half) = (libm::atan2(self.sine, self.cosine), libm::acos(-self.constant / swing));
        let mut sum = 0.0;
        for turn in [-2.0 * PI, 0.0, 2.0 * PI] {
            let from = larger(middle - half + turn, -sunset);
            let to = smaller(middle + half + turn, sunset);
            if from < to {
                sum += larger(self.between(from, to), 0.0);
            }
        }
        sum
    }

    /// The integral between two hour angles.
    fn between(&self, from: f64, to: f64) -> f64 {
        let antiderivative =
            |h: f64| self.constant * h + self.cosine * libm::sin(h) - self.sine * libm::cos(h);
        antiderivative(to) - antiderivative(from)
    }
}

#[cfg(test)]
mod tests;
