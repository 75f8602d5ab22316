//! Gauge catch: what fell, from what the gauge caught (method, section 2).

use super::params::SnowParams;
use super::phase_rule::PhaseRule;
use super::{standard_pressure_kpa, wet_bulb_c};
use crate::fault::{Fault, Unlikely, within};
use crate::weather::Series;
use serde::Serialize;

/// Multipliers of what a gauge caught, for rain and for snow.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct GaugeMultiplier {
    /// Of rain.
    pub rain: f64,
    /// Of snow.
    pub snow: f64,
}

impl GaugeMultiplier {
    /// The gauge catches all.
    pub const NONE: Self = Self { rain: 1.0, snow: 1.0 };

    /// Checks the range of both multipliers.
    ///
    /// # Errors
    /// A multiplier outside 0.1 to 5.
    pub fn check(self) -> Result<Vec<Unlikely>, Vec<Fault>> {
        let mut faults = Vec::new();
        let mut unlikely = Vec::new();
        for (name, value) in [("rain", self.rain), ("snow", self.snow)] {
            let key = format!("weather.gauge_multiplier.{name}");
            within(&mut faults, &key, value, 0.1..=5.0, "", "1.1 says that 10 % more fell than was caught");
            let (most, why) = match name {
                "rain" => (1.2, "gauges lose a few percent of rain, seldom 20 (common practice)"),
                _ => (
                    2.0,
                    "undercatch of snow is 20 to 70 % (Pierre et al. 2019): above 2 only bare gauges in wind",
                ),
            };
            if value > most {
                unlikely.push(Unlikely::new(key.clone(), format!("{value} is above {most}: {why}")));
            }
            if value < 1.0 {
                unlikely.push(Unlikely::new(
                    key,
                    format!("{value} is below 1: gauges catch less than falls, unless snow blows into them"),
                ));
            }
        }
        if faults.is_empty() { Ok(unlikely) } else { Err(faults) }
    }
}

/// What fell over what the gauge caught, of a day with this snow fraction.
#[inline(always)]
pub(super) fn caught(snow_fraction: f64, of_rain: f64, of_snow: f64) -> f64 {
    snow_fraction * of_snow + (1.0 - snow_fraction) * of_rain
}

/// How rain and snow are told apart at a station.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct StationPhase {
    rule: PhaseRule,
    /// Pressure at which the wet bulb is taken; none where the air's temperature tells.
    pressure_kpa: Option<f64>,
}

impl StationPhase {
    /// By the rule and the temperature that the parameters name, at a station's elevation.
    pub fn of(snow: &SnowParams, station_m: f64) -> Self {
        let pressure_kpa = snow.options.wet_bulb.then(|| standard_pressure_kpa(station_m));
        Self { rule: snow.rain_snow, pressure_kpa }
    }

    /// Share of a day's precipitation that falls as snow, days counted from the series' first.
    pub fn snow_fraction(&self, series: &Series, day: usize) -> f64 {
        let mean_c = series.mean_c[day];
        let told_by_c = self
            .pressure_kpa
            .map_or(mean_c, |kpa| wet_bulb_c(mean_c, series.relative_humidity_pct[day], kpa));
        self.rule.snow_fraction(told_by_c)
    }

    /// What fell over what the gauge caught, `f*k_snow + (1 - f)*k_rain`, of a day counted from the series' first.
    pub(super) fn catch(&self, series: &Series, day: usize, multiplier: GaugeMultiplier) -> f64 {
        caught(self.snow_fraction(series, day), multiplier.rain, multiplier.snow)
    }
}

/// Corrects a record's precipitation for catch, once and before any perturbation:
/// `P * (f*k_snow + (1 - f)*k_rain)`, f the snow fraction at the station's own observed temperature.
///
/// Done on the observed record, warming cannot change how much water falls: a warmer day turns snow into rain and must
/// not also shrink the day's total through the multiplier.
pub fn correct_catch(series: &mut Series, multiplier: GaugeMultiplier, phase: StationPhase) {
    for day in 0..series.precipitation_mm.len() {
        series.precipitation_mm[day] *= phase.catch(series, day, multiplier);
    }
}
