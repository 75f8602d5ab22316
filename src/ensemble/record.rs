//! The record's own years, measured: what the reference looks like before anything is resampled.

use crate::season::Measures;
use crate::snow::{Engine, Lanes, OpenLedger};
use crate::weather::Series;

/// One water year of the record, measured in the basin mean.
#[derive(Debug, Clone, PartialEq)]
pub struct RecordYear {
    /// The water year.
    pub water_year: i32,
    /// Values in the order of the measures.
    pub values: Vec<f64>,
}

/// Runs the record through lanes that hold one level, and measures the basin mean of every year. Years after a gap
/// start bare.
///
/// # Errors
/// A ledger that does not close.
pub fn record_years(
    lanes: &Lanes,
    measures: &Measures,
    weather: &Series,
) -> Result<Vec<RecordYear>, OpenLedger> {
    let mut engine = Engine::new(lanes, false);
    let mut years = Vec::with_capacity(weather.years.len());
    let mut taken = Vec::new();
    engine.years(weather, |span, block| {
        let width = block.width;
        taken.resize(measures.list().len() * width, 0.0);
        measures.take(block, &mut taken);
        let values = taken.chunks_exact(width).map(|row| row[lanes.first_mix_column()]).collect();
        years.push(RecordYear { water_year: span.water_year, values });
        Ok::<(), OpenLedger>(())
    })?;
    Ok(years)
}
