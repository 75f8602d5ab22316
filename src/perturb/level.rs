//! Warming levels: an offset and a factor for each month (method, section 3).

use super::global::GlobalWarming;
use super::intensity::WetDayChange;
use crate::basin::Basin;
use crate::fault::Unlikely;
use serde::Serialize;

/// How warming is spread over months and what precipitation does with it; the same for every level of a study.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Warming {
    /// Warming of each month per degree of the level, for daily minima, January first.
    pub tmin_monthly_shape: [f64; 12],
    /// The same for daily maxima.
    pub tmax_monthly_shape: [f64; 12],
    /// Percent of the level by which warming is stronger 1000 m above the basin's mean elevation, and weaker below it.
    pub level_change_pct_per_1000m: f64,
    /// What precipitation does.
    pub precipitation: PrecipitationChange,
    /// Percent by which wet days bring more for each degree of the level, compounded, where they do: how often it is wet then
    /// changes so that the change of precipitation holds.
    pub wet_day_intensity_pct_per_c: Option<f64>,
    /// Where the levels were stated as global warming: how they became the basin's.
    pub global: Option<GlobalWarming>,
}

/// How precipitation changes with the level, January first.
#[derive(Debug, Clone, PartialEq, Serialize)]
#[serde(rename_all = "snake_case")]
pub enum PrecipitationChange {
    /// Percent per degC of the level, compounded.
    PctPerC([f64; 12]),
    /// Percent as stated for each level; none at levels that are not listed.
    PctByLevel(Vec<StatedChange>),
}

/// The change of precipitation that was stated for a level.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct StatedChange {
    /// The level, degC.
    pub level_c: f64,
    /// Percent, January first.
    pub pct: [f64; 12],
}

impl Default for Warming {
    /// The same in every month and at every elevation; precipitation stays.
    fn default() -> Self {
        Self {
            tmin_monthly_shape: [1.0; 12],
            tmax_monthly_shape: [1.0; 12],
            level_change_pct_per_1000m: 0.0,
            precipitation: PrecipitationChange::PctPerC([0.0; 12]),
            wet_day_intensity_pct_per_c: None,
            global: None,
        }
    }
}

impl PrecipitationChange {
    /// Factor on precipitation at a level, month by month: `(1 + p/100)^w`, or `1 + c/100` as stated; never below 0.
    pub fn factor(&self, level_c: f64) -> [f64; 12] {
        match self {
            Self::PctPerC(pct) => pct.map(|pct| libm::pow(1.0 + pct / 100.0, level_c)),
            Self::PctByLevel(stated) => stated
                .iter()
                .find(|stated| stated.level_c == level_c)
                .map_or([1.0; 12], |stated| stated.pct.map(|pct| (1.0 + pct / 100.0).max(0.0))),
        }
    }
}

/// A level's change, month by month, January first.
#[derive(Debug, Clone, PartialEq)]
pub struct MonthlyChange {
    /// Added to daily minima, degC.
    pub tmin_c: [f64; 12],
    /// Added to daily maxima, degC.
    pub tmax_c: [f64; 12],
    /// Times precipitation.
    pub precipitation_factor: [f64; 12],
}

impl MonthlyChange {
    /// No change.
    pub const NONE: Self = Self { tmin_c: [0.0; 12], tmax_c: [0.0; 12], precipitation_factor: [1.0; 12] };

    /// The same with all precipitation changed by so many percent more.
    pub fn with_precipitation(&self, pct: f64) -> Self {
        let precipitation_factor = self.precipitation_factor.map(|factor| factor * (1.0 + pct / 100.0));
        Self { precipitation_factor, ..self.clone() }
    }

    /// What it does to temperatures, precipitation as it was.
    pub fn of_temperatures(&self) -> Self {
        Self { precipitation_factor: Self::NONE.precipitation_factor, ..self.clone() }
    }
}

impl Warming {
    /// The change at a level of `level_c` degC of any sign: `w*m(month)` on temperatures, the stated factor on
    /// precipitation.
    pub fn at(&self, level_c: f64) -> MonthlyChange {
        MonthlyChange {
            tmin_c: self.tmin_monthly_shape.map(|shape| level_c * shape),
            tmax_c: self.tmax_monthly_shape.map(|shape| level_c * shape),
            precipitation_factor: self.precipitation.factor(level_c),
        }
    }

    /// Whether precipitation changes at any of these levels, or its wet days do.
    pub fn changes_precipitation(&self, levels_c: &[f64]) -> bool {
        let is_stated =
            |level_c: &f64| self.precipitation.factor(*level_c).iter().any(|factor| *factor != 1.0);
        let wet_days_change = self.wet_day_intensity_pct_per_c.is_some_and(|pct_per_c| pct_per_c != 0.0);
        wet_days_change || levels_c.iter().any(is_stated)
    }

    /// What the level's temperature change is multiplied by at an elevation of the basin, `1 + e/100*(z - z_mean)/1000`: its
    /// area-weighted mean over the bands is 1, so that the basin warms by the level. 1 to the bit where warming is even.
    pub fn factor_at(&self, elevation_m: f64, basin: &Basin) -> f64 {
        let rise_m = elevation_m - basin.mean_elevation_m();
        1.0 + self.level_change_pct_per_1000m / 100.0 * rise_m / 1000.0
    }

    /// The factors of the lowest and the highest band, where warming changes with elevation.
    pub fn factors_at_ends(&self, basin: &Basin) -> Option<[f64; 2]> {
        let ends = [basin.bands.first()?, basin.bands.last()?];
        let factors = ends.map(|band| self.factor_at(band.elevation_m, basin));
        (self.level_change_pct_per_1000m != 0.0).then_some(factors)
    }

    /// What of the warming is unlikely in this basin.
    pub fn unlikely_in(&self, basin: &Basin) -> Option<Unlikely> {
        let factors = basin.bands.iter().map(|band| self.factor_at(band.elevation_m, basin));
        let least = factors.fold(f64::INFINITY, f64::min);
        (least < 0.0).then(|| {
            Unlikely::new(
                "warming.level_change_pct_per_1000m",
                format!("warms one of the bands by {least:.2} times the level: a level of +1 cools it"),
            )
        })
    }

    /// What a level does to wet days, where their intensity changes: `(1 + q/100)^w` on what they bring, and the level's
    /// factor on the mean.
    pub fn wet_days_at(&self, level_c: f64) -> Option<WetDayChange> {
        let pct_per_c = self.wet_day_intensity_pct_per_c?;
        Some(WetDayChange {
            amount_factor: libm::pow(1.0 + pct_per_c / 100.0, level_c),
            mean_factor: self.precipitation.factor(level_c),
        })
    }

    /// Mean of a monthly shape over the days of a common year; 1 where the level is what the year warms by.
    pub fn yearly_mean(shape: &[f64; 12]) -> f64 {
        const DAYS: [f64; 12] = [31.0, 28.0, 31.0, 30.0, 31.0, 30.0, 31.0, 31.0, 30.0, 31.0, 30.0, 31.0];
        shape.iter().zip(DAYS).map(|(value, days)| value * days).sum::<f64>() / 365.0
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    /// By definition: 0 % per degree changes nothing, 2 % do but at 0 degC; a change stated for a level that is not run is none;
    /// wet days that intensify are a change.
    #[test]
    fn a_change_of_precipitation_is_told_from_none() {
        let plain = Warming::default();
        let pct_per_c =
            Warming { precipitation: PrecipitationChange::PctPerC([2.0; 12]), ..Warming::default() };
        let stated = vec![StatedChange { level_c: 3.0, pct: [5.0; 12] }];
        let by_level =
            Warming { precipitation: PrecipitationChange::PctByLevel(stated), ..Warming::default() };
        let wet_days = Warming { wet_day_intensity_pct_per_c: Some(7.0), ..Warming::default() };
        let no_wet_days = Warming { wet_day_intensity_pct_per_c: Some(0.0), ..Warming::default() };
        let told = [&plain, &pct_per_c, &by_level, &wet_days, &no_wet_days].map(|warming| {
            [&[0.0, 2.0][..], &[0.0, 3.0], &[0.0]].map(|at| warming.changes_precipitation(at))
        });
        let expected = [[false; 3], [true, true, false], [false, true, false], [true; 3], [false; 3]];
        assert_eq!(told, expected);
    }
    use crate::basin::{Band, GradientForm, Ground, PrecipitationGradient, TemperatureGradient};

    fn basin() -> Basin {
        let band = |lower_m: f64, area_km2: f64| Band {
            lower_m,
            upper_m: lower_m + 1000.0,
            area_km2,
            elevation_m: lower_m + 500.0,
            ground: Ground::default(),
        };
        Basin {
            latitude_deg: 40.0,
            bands: vec![band(1000.0, 100.0), band(2000.0, 300.0)],
            temperature: TemperatureGradient::constant(-6.0),
            precipitation: PrecipitationGradient::new(0.0, None, GradientForm::Linear),
        }
    }

    /// By hand: 100 km2 about 1500 m and 300 km2 about 2500 m have their mean at 2250 m. 20 % a kilometre are 0.2*(-0.75) at
    /// the lower and 0.2*0.25 at the upper, and 100*0.85 + 300*1.05 = 400.
    #[test]
    fn the_basin_warms_by_the_level() {
        let basin = basin();
        let warming = Warming { level_change_pct_per_1000m: 20.0, ..Warming::default() };
        let found = warming.factors_at_ends(&basin).unwrap();
        assert!((found[0] - 0.85).abs() < 1e-12 && (found[1] - 1.05).abs() < 1e-12, "{found:?}");
        assert_eq!(warming.unlikely_in(&basin), None);
        let even = Warming::default();
        assert_eq!(even.factor_at(1234.5, &basin).to_bits(), 1.0_f64.to_bits(), "exactly 1 where it is off");
        assert_eq!(even.factors_at_ends(&basin), None);
    }

    /// 1 + 1.6*(-0.75) = -0.2, by hand.
    #[test]
    fn a_band_that_a_warmer_level_cools_is_said() {
        let warming = Warming { level_change_pct_per_1000m: 160.0, ..Warming::default() };
        let said = warming.unlikely_in(&basin()).unwrap();
        assert_eq!(said.why, "warms one of the bands by -0.20 times the level: a level of +1 cools it");
    }
}
