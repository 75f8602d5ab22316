//! Idealised weather: a yearly wave with day-to-day and year-to-year weather on it, from a few published numbers.

use chrono::Datelike;
use rand::rngs::ChaCha8Rng;
use rand::{RngExt, SeedableRng};
use thawline::calendar::{MonthDay, WaterYearStart};
use thawline::weather::{Series, YearSpan};

/// Water years of a record, 1981 to 2010.
pub const YEARS: usize = 30;
const FIRST_WATER_YEAR: i32 = 1981;
/// Correlation of a day's departure with that of the day before: weather stays for a few days.
const LAG_ONE: f64 = 0.7;

/// The climate of a station.
#[derive(Debug, Clone, Copy)]
pub struct Climate {
    /// Mean temperature of the year, degC; the record's own mean is brought to it.
    pub yearly_mean_c: f64,
    /// Half of the difference between the warmest and the coldest time of the year, degC.
    pub swing_c: f64,
    /// Calendar day of the year that is coldest.
    pub coldest_day: f64,
    /// Standard deviation of a day about the yearly wave, degC.
    pub day_sd_c: f64,
    /// Standard deviation of a whole year about the mean, degC.
    pub year_sd_c: f64,
    /// Half the daily range, degC.
    pub half_range_c: f64,
    /// Precipitation of a year, mm; the record's own mean is brought to it.
    pub yearly_precipitation_mm: f64,
    /// Share of days that are wet.
    pub wet_share: f64,
    /// By how much more than the yearly mean falls at the wettest time, a fraction.
    pub wet_season_excess: f64,
    /// Calendar day of the year around which most falls.
    pub wettest_day: f64,
    /// Coefficient of variation of a year's precipitation.
    pub year_variation: f64,
}

impl Climate {
    /// Daily weather of 30 water years from 1 October on, each of which starts bare; always the same.
    pub fn series(&self) -> Series {
        let start = water_year_starts();
        let mut random = ChaCha8Rng::seed_from_u64(1);
        let mut series = Series::default();
        let mut departure_c = 0.0;
        for number in 0..YEARS {
            let water_year = FIRST_WATER_YEAR + number as i32;
            let (first, days) = (start.first_day(water_year), start.days_in(water_year));
            series.years.push(YearSpan {
                water_year,
                first,
                start: series.mean_c.len(),
                days,
                follows: false,
            });
            let year_c = self.year_sd_c * normal(&mut random);
            let year_factor = libm::exp(self.year_variation * normal(&mut random));
            for date in first.iter_days().take(days) {
                let day = f64::from(date.ordinal());
                let fresh_c = self.day_sd_c * (1.0 - LAG_ONE * LAG_ONE).sqrt() * normal(&mut random);
                departure_c = LAG_ONE * departure_c + fresh_c;
                series.mean_c.push(year_c + departure_c - self.swing_c * wave(day, self.coldest_day));
                series.half_range_c.push(self.half_range_c);
                let is_wet = random.random::<f64>() < self.wet_share;
                let amount = -libm::log(1.0 - random.random::<f64>());
                let season = 1.0 + self.wet_season_excess * wave(day, self.wettest_day);
                series.precipitation_mm.push(if is_wet { year_factor * season * amount } else { 0.0 });
                series.month.push(date.month0() as u8);
                series.day_of_year.push(date.ordinal() as u16);
            }
        }
        let days = series.mean_c.len() as f64;
        let rise_c = self.yearly_mean_c - series.mean_c.iter().sum::<f64>() / days;
        series.mean_c.iter_mut().for_each(|mean_c| *mean_c += rise_c);
        let fallen = series.precipitation_mm.iter().sum::<f64>() / YEARS as f64;
        let factor = self.yearly_precipitation_mm / fallen;
        series.precipitation_mm.iter_mut().for_each(|precipitation_mm| *precipitation_mm *= factor);
        series
    }
}

/// Water years start on 1 October.
pub fn water_year_starts() -> WaterYearStart {
    WaterYearStart(MonthDay::new(10, 1).expect("a day of every year"))
}

/// 1 on a day of the year, -1 half a year later.
fn wave(day: f64, top: f64) -> f64 {
    libm::cos(std::f64::consts::TAU * (day - top) / 365.25)
}

/// A nearly normal draw: the sum of twelve uniform ones less 6.
fn normal(random: &mut ChaCha8Rng) -> f64 {
    (0..12).map(|_| random.random::<f64>()).sum::<f64>() - 6.0
}
