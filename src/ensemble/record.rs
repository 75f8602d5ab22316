//! The record's own years under every level, measured: what each of them would be before anything is resampled.

use crate::calendar::{COMMON_DATES, day_of_water_year, days_of_common_dates};
use crate::season::Measures;
use crate::snow::{Engine, Lanes, OpenLedger};
use crate::weather::Series;
use ndarray::{Array2, Array3};

/// One water year of the record.
#[derive(Debug, Clone, PartialEq)]
pub struct RecordYear {
    /// The water year.
    pub water_year: i32,
    /// The basin mean at the reference, in the order of the measures.
    pub values: Vec<f64>,
    /// SWE as each survey date begins, `[survey][level][band]`, mm.
    pub survey_swe_mm: Array3<f64>,
    /// SWE at the reference as each of the 365 dates begins that every year has, `[date][band]`, mm.
    pub reference_swe_mm: Array2<f64>,
}

/// The lanes that the record is run through, and what is kept of them.
#[derive(Clone, Copy)]
pub struct RecordRun<'a> {
    /// Every band at every level, a group of lanes and a basin mean for each level.
    pub lanes: &'a Lanes,
    /// How many levels.
    pub levels: usize,
    /// The reference among them.
    pub reference: usize,
    /// Bands of a level.
    pub bands: usize,
    /// What is measured.
    pub measures: &'a Measures,
}

impl RecordRun<'_> {
    /// Runs every year of the record; years after a gap start bare.
    ///
    /// # Errors
    /// A ledger that does not close.
    pub fn years(&self, weather: &Series) -> Result<Vec<RecordYear>, OpenLedger> {
        let Self { lanes, levels, reference, bands, measures } = *self;
        let surveys = &measures.settings().survey_dates;
        let mut engine = Engine::new(lanes, false).with_cover();
        let mut years = Vec::with_capacity(weather.years.len());
        let mut taken = Vec::new();
        engine.years(weather, |span, block| {
            let width = block.width;
            let swe = |day: usize, level: usize, band: usize| {
                block.swe_mm[(day - 1) * width + lanes.column(level, band)]
            };
            let survey_days: Vec<usize> =
                surveys.iter().map(|survey| day_of_water_year(span.first, *survey)).collect();
            let survey_swe_mm =
                Array3::from_shape_fn((surveys.len(), levels, bands), |(survey, level, band)| {
                    swe(survey_days[survey], level, band)
                });
            let dates: Vec<usize> = days_of_common_dates(span.first).collect();
            let reference_swe_mm = Array2::from_shape_fn((COMMON_DATES, bands), |(date, band)| {
                swe(dates[date], reference, band)
            });
            taken.resize(measures.list().len() * width, 0.0);
            measures.take(block, &mut taken);
            let basin = lanes.first_mix_column() + reference;
            let values = taken.chunks_exact(width).map(|row| row[basin]).collect();
            years.push(RecordYear { water_year: span.water_year, values, survey_swe_mm, reference_swe_mm });
            Ok::<(), OpenLedger>(())
        })?;
        Ok(years)
    }
}
