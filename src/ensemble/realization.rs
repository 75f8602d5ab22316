//! One realization under every level: single years of the basin, period values of the bands.

use super::plan::Plan;
use super::watch::{Halt, Watch};
use crate::season::{NONE, NOT_GONE, keeps_snow, period_value};
use crate::snow::Engine;
use crate::weather::Series;

/// What is kept of a realization.
pub(super) struct Kept {
    /// `[level][measure][year]` of the basin.
    pub basin_years: Vec<f64>,
    /// `[level][band][measure]`: the period value.
    pub band_periods: Vec<f64>,
    /// `[level][band][measure]`: years with none, and years whose snow never went.
    pub band_undefined: Vec<[u32; 2]>,
}

/// What a thread reuses from one realization to the next: one buffer of weather, one engine.
pub(super) struct Workshop<'p> {
    plan: &'p Plan<'p>,
    engine: Engine<'p>,
    weather: Series,
    /// `[year][measure][column]`, and the number of columns.
    measured: Vec<f64>,
    columns: usize,
}

impl<'p> Workshop<'p> {
    pub fn new(plan: &'p Plan<'p>) -> Self {
        Self {
            plan,
            engine: Engine::on_path(plan.lanes, false, plan.path),
            weather: Series::default(),
            measured: Vec::new(),
            columns: 0,
        }
    }

    /// Runs a realization from bare ground. Where its first year leaves perennial snow in a band of the reference, that
    /// year is run once more on the snow it left.
    pub fn run(&mut self, number: u32, watch: &dyn Watch) -> Result<Kept, Halt> {
        self.plan.generator.fill(number, &mut self.weather);
        self.engine.restart();
        let bands = self.plan.bands;
        let (lanes, reference) = (self.plan.lanes, self.plan.reference);
        for (year, span) in self.weather.years.iter().enumerate() {
            if watch.wants_stop() {
                return Err(Halt::Stopped);
            }
            let view = self.weather.view(span);
            let mut block = self.engine.year(view)?;
            if year == 0 && (0..bands).any(|band| keeps_snow(block, lanes.column(reference, band))) {
                block = self.engine.year(view)?;
            }
            self.columns = block.width;
            let size = self.plan.measures.list().len() * block.width;
            self.measured.resize(self.weather.years.len() * size, NONE);
            self.plan.measures.take(block, &mut self.measured[year * size..(year + 1) * size]);
        }
        Ok(self.keep())
    }

    fn keep(&self) -> Kept {
        let measures = self.plan.measures.list();
        let (levels, bands, years) = (self.plan.levels, self.plan.bands, self.weather.years.len());
        let mut kept = Kept {
            basin_years: Vec::with_capacity(levels * measures.len() * years),
            band_periods: Vec::with_capacity(levels * bands * measures.len()),
            band_undefined: Vec::with_capacity(levels * bands * measures.len()),
        };
        let column = |measure: usize, column: usize| {
            (0..years)
                .map(move |year| self.measured[(year * measures.len() + measure) * self.columns + column])
        };
        let basins_at = self.plan.lanes.first_mix_column();
        let mut one = Vec::with_capacity(years);
        for level in 0..levels {
            for measure in 0..measures.len() {
                kept.basin_years.extend(column(measure, basins_at + level));
            }
            for band in 0..bands {
                for (number, measure) in measures.iter().enumerate() {
                    one.clear();
                    one.extend(column(number, self.plan.lanes.column(level, band)));
                    let count = |what: f64| one.iter().filter(|value| **value == what).count() as u32;
                    kept.band_undefined.push([count(NONE), count(NOT_GONE)]);
                    kept.band_periods.push(period_value(measure.kind, &mut one));
                }
            }
        }
        kept
    }
}
