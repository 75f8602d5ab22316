//! How wet and how warm the periods of the record and of the realizations are, against the record's mean.

use crate::baseline::{SeasonYears, Seasons};
use crate::calendar::MonthDay;
use crate::ensemble::{Halt, Watch};
use crate::findings::{BreakEvenLevel, Reached, Realized, Root};
use crate::perturb::Generator;
use crate::weather::Series;

/// Mean precipitation and temperature of periods: of the cool season, or of whole years where the first survey date leaves no
/// season before it.
pub(super) struct Wetness {
    is_of_whole_years: bool,
    realizations: Vec<Realized>,
    record_wettest_pct: Option<f64>,
}

impl Wetness {
    /// Makes every realization of so many years, and looks at its weather.
    pub fn of(
        record: &Series,
        generator: &dyn Generator,
        [realizations, years]: [usize; 2],
        survey: MonthDay,
        watch: &dyn Watch,
    ) -> Result<Self, Halt> {
        let mean =
            |values: &[(i32, f64)]| values.iter().map(|(_, value)| value).sum::<f64>() / values.len() as f64;
        let is_of_whole_years = Seasons::of(record, survey).cool.precipitation_mm.is_empty();
        let of = |series: &Series| -> SeasonYears {
            let seasons = Seasons::of(series, survey);
            if is_of_whole_years { seasons.warm } else { seasons.cool }
        };
        let record = of(record);
        let (record_mm, record_c) = (mean(&record.precipitation_mm), mean(&record.mean_c));
        let above = |values: &[(i32, f64)]| 100.0 * (mean(values) / record_mm - 1.0);
        let mut series = Series::default();
        let mut realized = Vec::with_capacity(realizations);
        for number in 0..realizations as u32 {
            if watch.wants_stop() {
                return Err(Halt::Stopped);
            }
            generator.fill(number, years, &mut series);
            let season = of(&series);
            realized.push(Realized {
                warmer_c: mean(&season.mean_c) - record_c,
                wetter_pct: above(&season.precipitation_mm),
            });
        }
        let record_wettest_pct = record.precipitation_mm.windows(years).map(above).max_by(f64::total_cmp);
        Ok(Self { is_of_whole_years, realizations: realized, record_wettest_pct })
    }

    /// What a level's root comes to, and whether so much was ever there.
    pub fn level(&self, level_c: f64, root: Root) -> BreakEvenLevel {
        let (precipitation_change_pct, stays) = match root {
            Root::At(pct) => (Some(pct), None),
            Root::Stays(stays) => (None, Some(stays)),
            Root::Unknown => (None, None),
        };
        let reached =
            |pct: f64| self.realizations.iter().filter(|realized| realized.wetter_pct >= pct).count();
        BreakEvenLevel {
            level_c,
            precipitation_change_pct,
            stays,
            realizations_that_reached: precipitation_change_pct.map_or(0, reached),
            record_reached: self
                .record_wettest_pct
                .map(|wettest| precipitation_change_pct.is_some_and(|needed| wettest >= needed)),
        }
    }

    /// How wet periods have been.
    pub fn reached(&self, years: usize) -> Reached {
        let wettest = self.realizations.iter().map(|realized| realized.wetter_pct);
        Reached {
            years,
            is_of_whole_years: self.is_of_whole_years,
            record_wettest_pct: self.record_wettest_pct,
            realizations_wettest_pct: wettest.fold(f64::NEG_INFINITY, f64::max),
            realizations: self.realizations.len(),
        }
    }

    /// Every realization's own precipitation and temperature.
    pub fn realized(&self) -> &[Realized] {
        &self.realizations
    }
}
