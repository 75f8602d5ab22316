//! Weather and the survey-date SWE that it brings, without warming between them: what the generator sheet is made of.

use super::watch::{Halt, Watch};
use crate::calendar::{MonthDay, day_of_water_year};
use crate::perturb::Generator;
use crate::season::keeps_snow;
use crate::snow::{Engine, Lanes, OpenLedger, YearBlock};
use crate::weather::Series;
use rayon::prelude::*;

/// The lanes of one level, and the day on which the basin's SWE is taken.
#[derive(Clone, Copy)]
pub struct SurveySwe<'a> {
    /// Every band at one level, and their mean.
    pub lanes: &'a Lanes,
    /// Bands.
    pub bands: usize,
    /// The day: SWE as it begins.
    pub survey: MonthDay,
}

impl SurveySwe<'_> {
    /// The basin's SWE on the survey date of each year of a record, mm.
    ///
    /// # Errors
    /// A ledger that does not close.
    pub fn of_record(&self, record: &Series) -> Result<Vec<f64>, OpenLedger> {
        self.of(&mut Engine::new(self.lanes, false), record)
    }

    /// Makes realizations of so many years on the threads of the current rayon pool, runs each, and gives what `look` makes of its weather and
    /// of the SWE on the survey date of its years, mm, in the order of their numbers. Each depends on its number alone, so
    /// that any number of threads gives the same bits.
    ///
    /// # Errors
    /// A ledger that does not close, or `watch` wanting to stop.
    pub fn each_realization<T: Send>(
        &self,
        generator: &dyn Generator,
        realizations: u32,
        years: usize,
        watch: &dyn Watch,
        look: impl Fn(&Series, &[f64]) -> T + Sync,
    ) -> Result<Vec<T>, Halt> {
        (0..realizations)
            .into_par_iter()
            .map_init(
                || (Engine::new(self.lanes, false), Series::default()),
                |(engine, weather), number| {
                    if watch.wants_stop() {
                        return Err(Halt::Stopped);
                    }
                    generator.fill(number, years, weather);
                    let seen = look(weather, &self.of(engine, weather)?);
                    watch.realization_done();
                    Ok(seen)
                },
            )
            .collect()
    }

    /// Runs a series. Years that follow on no other start bare; where such a year leaves perennial snow in a band, it is run
    /// once more on the snow it left, as the first year of a realization is.
    fn of(&self, engine: &mut Engine<'_>, weather: &Series) -> Result<Vec<f64>, OpenLedger> {
        let mean = self.lanes.first_mix_column();
        let keeps_any =
            |block: &YearBlock| (0..self.bands).any(|band| keeps_snow(block, self.lanes.column(0, band)));
        let mut survey_swe_mm = Vec::with_capacity(weather.years.len());
        for span in &weather.years {
            let view = weather.view(span);
            let day = day_of_water_year(span.first, self.survey) - 1;
            let taken_mm = |block: &YearBlock| block.row(&block.swe_mm, day)[mean];
            let swe_mm = if span.follows {
                taken_mm(engine.year(view)?)
            } else {
                engine.restart();
                let block = engine.year(view)?;
                if keeps_any(block) { taken_mm(engine.year(view)?) } else { taken_mm(block) }
            };
            survey_swe_mm.push(swe_mm);
        }
        Ok(survey_swe_mm)
    }
}
