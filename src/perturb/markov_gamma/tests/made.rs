//! Records made by known laws: a chain of wet and dry days, exponential amounts, temperature that remembers the day before;
//! and years that are wet and cool, or dry and warm, as a whole, more like the year before than chance.

use crate::calendar::WaterYearStart;
use crate::weather::{Series, YearSpan};
use chrono::Datelike;
use rand::rngs::ChaCha8Rng;
use rand::{RngExt, SeedableRng};
use rand_distr::{Distribution, StandardNormal};

/// What a made record is like.
#[derive(Clone, Copy)]
pub struct Made {
    pub years: usize,
    pub starts: WaterYearStart,
    pub seed: u64,
    /// Standard deviation of the logarithm of a year's amounts, and of its temperature in degC.
    pub yearly: [f64; 2],
    /// Months without any precipitation, January first.
    pub dry_months: [bool; 12],
}

/// Correlation of a year's anomaly with that of the year before, and of precipitation with temperature.
const FROM_YEAR_TO_YEAR: f64 = 0.5;
const WET_AND_WARM: f64 = -0.6;

impl Made {
    pub fn record(&self) -> Series {
        let mut random = ChaCha8Rng::seed_from_u64(self.seed);
        let mut series = Series::default();
        let (mut wetness, mut warmth, mut lasting_c, mut was_wet) = (0.0, 0.0, 0.0, false);
        for number in 0..self.years {
            let mut normal = || -> f64 { StandardNormal.sample(&mut random) };
            let new = libm::sqrt(1.0 - FROM_YEAR_TO_YEAR * FROM_YEAR_TO_YEAR);
            let (first, second) = (normal(), normal());
            wetness = FROM_YEAR_TO_YEAR * wetness + new * first;
            let of_warmth = WET_AND_WARM * first + libm::sqrt(1.0 - WET_AND_WARM * WET_AND_WARM) * second;
            warmth = FROM_YEAR_TO_YEAR * warmth + new * of_warmth;
            let [of_amounts, of_temperature] = self.yearly;
            let factor = libm::exp(of_amounts * wetness - 0.5 * of_amounts * of_amounts);
            let water_year = 1971 + number as i32;
            let (first, days) = (self.starts.first_day(water_year), self.starts.days_in(water_year));
            let start = series.mean_c.len();
            series.years.push(YearSpan { water_year, first, start, days, follows: number > 0 });
            for date in first.iter_days().take(days) {
                let angle = std::f64::consts::TAU * (f64::from(date.ordinal()) - 15.0) / 365.25;
                let winter = libm::cos(angle);
                let chance = if was_wet { 0.6 } else { 0.25 + 0.1 * winter };
                let month = date.month0() as usize;
                was_wet = random.random::<f64>() < chance && !self.dry_months[month];
                let amount_mm = -factor * (8.0 + 2.0 * winter) * libm::log(1.0 - random.random::<f64>());
                let mut normal = || -> f64 { StandardNormal.sample(&mut random) };
                lasting_c = 0.7 * lasting_c + 2.5 * normal();
                let of_wet_day = if was_wet { -1.5 } else { 0.0 };
                let range_c = (if was_wet { 7.0 } else { 11.0 }) * libm::exp(0.25 * normal());
                series.mean_c.push(4.0 - 9.0 * winter + of_temperature * warmth + lasting_c + of_wet_day);
                series.half_range_c.push(range_c / 2.0);
                series.precipitation_mm.push(if was_wet { amount_mm } else { 0.0 });
                series.month.push(date.month0() as u8);
                series.day_of_year.push(date.ordinal() as u16);
            }
        }
        series
    }
}
