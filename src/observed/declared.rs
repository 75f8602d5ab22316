//! Is a site's column in the unit that was declared? Told by the precipitation that its snow would need.

use super::Observations;
use crate::fault::Unlikely;
use crate::units::DepthUnit;
use crate::weather::Series;
use chrono::Datelike;
use std::collections::BTreeMap;
use std::ops::RangeInclusive;

/// A year's highest SWE over its precipitation is hardly outside this where snow is measured (common practice).
const HARDLY_OUTSIDE: RangeInclusive<f64> = 0.08..=2.0;
/// And mostly within this,
const USUAL: RangeInclusive<f64> = 0.1..=1.5;
/// about here.
const MIDDLE: f64 = 0.5;

impl Observations {
    /// What to say where the readings would be likely in another unit and are not in `unit`, the declared one. `key` is the
    /// scenario's for the site; `weather` holds the station's years, corrected for catch.
    pub fn unit_slip(&self, key: &str, unit: DepthUnit, weather: &Series) -> Option<Unlikely> {
        let precipitation_mm = weather.precipitation_mm.iter().sum::<f64>() / weather.years.len() as f64;
        let highest_mm = self.mean_yearly_highest_mm()?;
        if HARDLY_OUTSIDE.contains(&(highest_mm / precipitation_mm)) {
            return None;
        }
        let in_unit = |other: DepthUnit| highest_mm / unit.to_millimetres(1.0) * other.to_millimetres(1.0);
        let others = DepthUnit::NAMES.iter().filter(|(_, other)| *other != unit);
        let ratio = |other: DepthUnit| in_unit(other) / precipitation_mm;
        let from_middle = |other: DepthUnit| libm::log(ratio(other) / MIDDLE).abs();
        let (name, other) = others
            .filter(|(_, other)| USUAL.contains(&ratio(*other)))
            .min_by(|(_, a), (_, b)| from_middle(*a).total_cmp(&from_middle(*b)))?;
        Some(Unlikely::new(
            format!("{key}.swe.unit"),
            format!(
                "the highest readings of a calendar year are {highest_mm:.0} mm in the mean, with {precipitation_mm:.0} mm of \
                 precipitation a year; read as {name} they would be {:.0} mm",
                in_unit(*other)
            ),
        ))
    }

    /// Mean over calendar years of the highest reading; none where no year has snow.
    fn mean_yearly_highest_mm(&self) -> Option<f64> {
        let mut highest: BTreeMap<i32, f64> = BTreeMap::new();
        for state in &self.states {
            let year = highest.entry(state.date.year()).or_default();
            *year = year.max(state.swe_mm);
        }
        let mean_mm = highest.values().sum::<f64>() / highest.len() as f64;
        (mean_mm > 0.0).then_some(mean_mm)
    }
}
