//! The units that a reader asked for. What is computed stays metric; it changes here, on its way to a page.

use super::{AreaUnit, DepthUnit, LengthUnit, acre_feet};
use serde::Serialize;

/// A system of units for what people read.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
#[serde(rename_all = "lowercase")]
pub enum UnitSystem {
    /// mm, degC, m, km2, hm3.
    Metric,
    /// Inches, degF, feet, square miles, acre-feet.
    Us,
}

/// The unit in which a reader is told a quantity.
#[derive(Debug, Clone, Copy)]
pub struct Unit {
    /// Behind a number in a sentence: `°F`.
    pub word: &'static str,
    /// At the end of a column's name: `degF`.
    pub suffix: &'static str,
    from_metric: fn(f64) -> f64,
}

impl Unit {
    /// A metric number in this unit. The number of a metric unit comes back as it is, to the bit.
    ///
    /// ```
    /// use thawline::units::UnitSystem;
    /// assert_eq!(UnitSystem::Us.warming().of(2.0), 3.6);
    /// assert_eq!(UnitSystem::Us.temperature().of(2.0), 35.6);
    /// ```
    pub fn of(self, metric: f64) -> f64 {
        (self.from_metric)(metric)
    }
}

impl UnitSystem {
    /// Every system by the name a scenario gives it.
    pub const NAMES: [(&'static str, Self); 2] = [("metric", Self::Metric), ("us", Self::Us)];

    /// Of a depth of water in mm.
    pub fn depth(self) -> Unit {
        self.either(("mm", "mm"), ("in", "in"), |mm| mm / DepthUnit::Inch.to_millimetres(1.0))
    }

    /// Of a depth of water times the days it lay, in mm days.
    pub fn depth_days(self) -> Unit {
        let us = ("in days", "in_days");
        self.either(("mm days", "mm_days"), us, |mm_days| mm_days / DepthUnit::Inch.to_millimetres(1.0))
    }

    /// Of a temperature in degC.
    pub fn temperature(self) -> Unit {
        self.either(("°C", "degC"), ("°F", "degF"), |c| fahrenheit_degrees(c) + 32.0)
    }

    /// Of a warming in degC, or any other difference of temperatures: it has no zero to move.
    pub fn warming(self) -> Unit {
        self.either(("°C", "degC"), ("°F", "degF"), fahrenheit_degrees)
    }

    /// Of an elevation in m.
    pub fn elevation(self) -> Unit {
        self.either(("m", "m"), ("ft", "ft"), |m| m / LengthUnit::Foot.to_metres(1.0))
    }

    /// Of an area in km2.
    pub fn area(self) -> Unit {
        let to_square_miles = |km2| km2 / AreaUnit::SquareMile.to_square_kilometres(1.0);
        self.either(("km²", "km2"), ("mi²", "mi2"), to_square_miles)
    }

    /// Of a volume of water in hm3.
    pub fn volume(self) -> Unit {
        let us = ("thousand acre-feet", "thousand_acre_feet");
        self.either(("hm³", "hm3"), us, |hm3| acre_feet(hm3) / 1000.0)
    }

    /// Of a degree-day factor in mm per degC and day.
    pub fn degree_day_factor(self) -> Unit {
        let us = ("in per °F and day", "in_per_degF_day");
        self.either(("mm per °C and day", "mm_per_degC_day"), us, |mm_per_c| {
            mm_per_c / DepthUnit::Inch.to_millimetres(fahrenheit_degrees(1.0))
        })
    }

    /// Of a change of temperature with elevation in degC per km.
    pub fn temperature_gradient(self) -> Unit {
        let us = ("°F per 1000 ft", "degF_per_1000ft");
        self.either(("°C per km", "degC_per_km"), us, |c_per_km| {
            fahrenheit_degrees(c_per_km) * LengthUnit::Foot.to_metres(1.0)
        })
    }

    /// Of a change of precipitation with elevation in percent per 100 m.
    pub fn precipitation_gradient(self) -> Unit {
        let us = ("% per 1000 ft", "pct_per_1000ft");
        self.either(("% per 100 m", "pct_per_100m"), us, |pct| pct * LengthUnit::Foot.to_metres(10.0))
    }

    /// Of the same compounded, each 100 m on the last.
    pub fn compound_precipitation_gradient(self) -> Unit {
        let us = ("% per 1000 ft", "pct_per_1000ft");
        self.either(("% per 100 m", "pct_per_100m"), us, |pct| {
            100.0 * libm::expm1(libm::log1p(pct / 100.0) * LengthUnit::Foot.to_metres(10.0))
        })
    }

    /// Of a change of a warming level with elevation in percent per 1000 m.
    pub fn level_change(self) -> Unit {
        let us = ("% per 1000 ft", "pct_per_1000ft");
        self.either(("% per 1000 m", "pct_per_1000m"), us, |pct| pct * LengthUnit::Foot.to_metres(1.0))
    }

    /// Of a change with warming in percent per degC, compounded.
    pub fn percent_per_degree(self) -> Unit {
        self.either(("% per °C", "pct_per_degC"), ("% per °F", "pct_per_degF"), |pct_per_c| {
            100.0 * libm::expm1(libm::log1p(pct_per_c / 100.0) / fahrenheit_degrees(1.0))
        })
    }

    fn either(
        self,
        metric: (&'static str, &'static str),
        us: (&'static str, &'static str),
        to_us: fn(f64) -> f64,
    ) -> Unit {
        let ((word, suffix), from_metric) = match self {
            Self::Metric => (metric, (|value| value) as fn(f64) -> f64),
            Self::Us => (us, to_us),
        };
        Unit { word, suffix, from_metric }
    }
}

/// Celsius degrees as Fahrenheit degrees, 9 to 5: as a quotient, so that 1.1 becomes 1.98 and not its neighbour.
fn fahrenheit_degrees(c: f64) -> f64 {
    c * 9.0 / 5.0
}

#[cfg(test)]
mod tests {
    use super::*;

    fn us(unit: fn(UnitSystem) -> Unit, metric: f64) -> f64 {
        unit(UnitSystem::Us).of(metric)
    }

    /// Definitions: the inch is 25.4 mm, the foot 0.3048 m, 9 degF are 5 degC (NIST SP 811, appendix B.8). 1e-12 is rounding.
    #[test]
    fn exact_conversions() {
        let near = |found: f64, expected: f64| {
            assert!((found - expected).abs() <= 1e-12 * expected.abs(), "{found} for {expected}");
        };
        near(us(UnitSystem::depth, 254.0), 10.0);
        near(us(UnitSystem::depth_days, 60_960.0), 2400.0);
        near(us(UnitSystem::elevation, 3048.0), 10_000.0);
        near(us(UnitSystem::temperature, -40.0), -40.0);
        near(us(UnitSystem::temperature, 100.0), 212.0);
        near(us(UnitSystem::temperature, 0.0), 32.0);
        near(us(UnitSystem::warming, 2.0), 3.6);
        assert_eq!([0.0, 1.1, 3.0].map(|c| us(UnitSystem::warming, c)), [0.0, 1.98, 5.4]);
        // By hand: -6.5 degC per 1000 m is -11.7 degF per 3280.84 ft; 5 % per 100 m is 5 * 3.048 % per 304.8 m.
        near(us(UnitSystem::temperature_gradient, -6.5), -11.7 * 0.3048);
        near(us(UnitSystem::precipitation_gradient, 5.0), 15.24);
        // Compounded: 1.05^3.048 = 1.160339251312095... (Python's decimal module, 50 digits).
        near(us(UnitSystem::level_change, 10.0), 3.048);
        near(us(UnitSystem::compound_precipitation_gradient, 5.0), 16.033_925_131_209_5);
        // Compounded: 1.8 degF bring what 1 degC does, so 1 + 0.1 per degF is 1.1^1.8 per degC, here 1.1^2 per 10/9 degC.
        near(us(UnitSystem::percent_per_degree, 100.0 * (libm::pow(1.1, 1.8) - 1.0)), 10.0);
        near(us(UnitSystem::percent_per_degree, -100.0), -100.0);
    }

    /// 100 degF-days are 55.556 degC-days (exact: 500/9), so 25.4 mm a degC-day are 55.556 in per 100 degF-days. A square
    /// mile is 2.58998811 km2, a hm3 0.81071319 thousand acre-feet (both 1e-7, as printed); 450 mm on 250 km2 are 91.2052
    /// thousand acre-feet (1e-6, as printed).
    #[test]
    fn conversions_against_printed_values() {
        let near = |found: f64, expected: f64, relative: f64| {
            assert!((found / expected - 1.0).abs() <= relative, "{found} for {expected}");
        };
        near(100.0 * us(UnitSystem::degree_day_factor, 25.4), 500.0 / 9.0, 1e-12);
        near(us(UnitSystem::area, 2.589_988_11), 1.0, 1e-8);
        near(us(UnitSystem::volume, 1.0), 0.810_713_19, 1e-8);
        near(us(UnitSystem::volume, crate::units::cubic_hectometres(450.0, 250.0)), 91.2052, 1e-6);
    }

    #[test]
    fn metric_numbers_stay_as_they_are() {
        let all = [
            UnitSystem::depth,
            UnitSystem::depth_days,
            UnitSystem::temperature,
            UnitSystem::warming,
            UnitSystem::elevation,
            UnitSystem::area,
            UnitSystem::volume,
            UnitSystem::degree_day_factor,
            UnitSystem::temperature_gradient,
            UnitSystem::precipitation_gradient,
            UnitSystem::compound_precipitation_gradient,
            UnitSystem::level_change,
            UnitSystem::percent_per_degree,
        ];
        for unit in all {
            for value in [0.1 + 0.2, -0.0, f64::MIN_POSITIVE] {
                assert_eq!(unit(UnitSystem::Metric).of(value).to_bits(), value.to_bits());
            }
        }
    }
}
