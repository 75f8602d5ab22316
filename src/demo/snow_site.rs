//! What an invented snow site is made of: plain numbers, and the water that its snow would have held.

use super::errors::Errors;
use super::place::Place;
use super::weather::Day;
use crate::basin::{Basin, GradientForm, Ground, PrecipitationGradient, TemperatureGradient};
use crate::perturb::MonthlyChange;
use crate::snow::{
    DegreeRule, Engine, GaugeMultiplier, LaneSpec, Lanes, OpenLedger, SnowParams, StationPhase, correct_catch,
};
use crate::weather::{Series, YearSpan};
use chrono::Datelike;

/// A place where the water in the snow is measured. Its snow differs from the defaults, as real snow does.
#[derive(Debug)]
pub struct SnowSite {
    /// Its name and what it is.
    pub name: &'static str,
    /// Elevation, m.
    pub elevation_m: f64,
    /// When it is measured.
    pub visits: Visits,
    /// Change of temperature with elevation on the way from the station, degC per km.
    pub temperature_gradient_c_per_km: f64,
    /// Change of precipitation on that way, percent of the station's per 100 m.
    pub precipitation_gradient_pct_per_100m: f64,
    /// Snow that fell over snow that the station's gauge caught.
    pub snow_catch: f64,
    /// Lowest degree-day factor of the year, mm per degC and day.
    pub degree_day_factor_lowest: f64,
    /// Highest degree-day factor of the year, mm per degC and day.
    pub degree_day_factor_highest: f64,
    /// Melt base temperature, degC.
    pub melt_base_c: f64,
    /// How far what is read lies from what is there.
    pub errors: Errors,
}

/// When a snow site is measured.
#[derive(Debug)]
pub enum Visits {
    /// By people who walk to it about the first of some months.
    Monthly {
        /// These months, 1 to 12.
        months: &'static [u32],
        /// They come up to so many days early or late.
        scatter_days: u32,
    },
    /// By a pillow under the snow, every day.
    Daily,
}

impl SnowSite {
    /// Snow water equivalent at the site as each day begins, mm: this program's own engine, run on the weather before
    /// any hole was cut into it.
    ///
    /// # Errors
    /// A ledger that does not close.
    pub fn swe_mm(&self, place: &Place, days: &[Day]) -> Result<Vec<f64>, OpenLedger> {
        let basin = Basin {
            latitude_deg: place.latitude_deg,
            bands: Vec::new(),
            temperature: TemperatureGradient::constant(self.temperature_gradient_c_per_km),
            precipitation: PrecipitationGradient::new(
                self.precipitation_gradient_pct_per_100m,
                None,
                GradientForm::Linear,
            ),
        };
        let snow = SnowParams {
            degree_day_factor_lowest: self.degree_day_factor_lowest,
            degree_day_factor_highest: self.degree_day_factor_highest,
            melt_base_c: self.melt_base_c,
            ..SnowParams::defaults(DegreeRule::Diurnal, basin.is_southern())
        };
        let mut weather = whole_years(place, days);
        let multiplier = GaugeMultiplier { rain: 1.0, snow: self.snow_catch };
        correct_catch(&mut weather, multiplier, StationPhase::of(&snow, place.station_m));
        let lanes = Lanes::new(&[vec![LaneSpec {
            basin: &basin,
            station_m: place.station_m,
            elevation_m: self.elevation_m,
            ground: Ground::default(),
            change: &MonthlyChange::NONE,
            warming_factor: 1.0,
            snow: &snow,
            share: 1.0,
        }]]);
        let lane = lanes.column(0, 0);
        let mut engine = Engine::new(&lanes, false);
        let mut swe_mm = Vec::with_capacity(days.len());
        for year in &weather.years {
            let block = engine.year(weather.view(year))?;
            swe_mm.extend((0..year.days).map(|day| block.row(&block.swe_mm, day)[lane]));
        }
        Ok(swe_mm)
    }
}

/// The days as water years, each on the snow of the one before.
pub(super) fn whole_years(place: &Place, days: &[Day]) -> Series {
    let mut weather = Series::default();
    let years = days.chunk_by(|_, day| day.date != place.start_in(day.date.year()));
    for year in years {
        weather.years.push(YearSpan {
            water_year: year[0].date.year() + 1,
            first: year[0].date,
            start: weather.mean_c.len(),
            days: year.len(),
            follows: true,
        });
        for day in year {
            weather.mean_c.push((day.tmin_c + day.tmax_c) / 2.0);
            weather.half_range_c.push((day.tmax_c - day.tmin_c) / 2.0);
            weather.precipitation_mm.push(day.precipitation_mm);
            weather.month.push(day.date.month0() as u8);
            weather.day_of_year.push(day.date.ordinal() as u16);
        }
    }
    weather
}
