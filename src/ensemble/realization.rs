//! One realization under every level: its years are run once and measured, for basin and bands or for the basin alone.

use super::plan::Plan;
use super::swe_days::Tally;
use super::watch::{Halt, Watch};
use crate::season::{NONE, NOT_GONE, keeps_snow, period_value};
use crate::snow::{Engine, YearBlock};
use crate::weather::Series;

/// What is kept of a realization's basin means: `[level][measure][year]`.
pub(super) struct BasinKept(pub Vec<f64>);

/// What is kept of a realization.
pub(super) struct Kept {
    pub basin: BasinKept,
    /// `[level][band][measure]`: the period value.
    pub band_periods: Vec<f64>,
    /// `[level][band][measure]`: years with none, and years whose snow never went.
    pub band_undefined: Vec<[u32; 2]>,
}

/// What a thread reuses from one realization to the next: one buffer of weather, one engine, one narrow block.
pub(super) struct Workshop<'p> {
    plan: &'p Plan<'p>,
    engine: Engine<'p>,
    weather: Series,
    means: YearBlock,
    measured: Measured,
}

/// Measured years, `[year][measure][column]`.
#[derive(Default)]
struct Measured {
    values: Vec<f64>,
    measures: usize,
    columns: usize,
    years: usize,
}

impl<'p> Workshop<'p> {
    pub fn new(plan: &'p Plan<'p>) -> Self {
        Self {
            plan,
            engine: Engine::on_path(plan.lanes, false, plan.path),
            weather: Series::default(),
            means: YearBlock::of_means(plan.lanes),
            measured: Measured::default(),
        }
    }

    /// Runs a realization and measures every column, bands and basin means.
    pub fn run(&mut self, number: u32, tally: &Tally, watch: &dyn Watch) -> Result<Kept, Halt> {
        let measures = self.plan.measures;
        self.each_year(number, watch, |year, block, _, measured| {
            tally.count(block);
            measures.take(block, measured.year(year, block.width));
        })?;
        Ok(self.keep())
    }

    /// Runs a realization and measures the basin means alone, which is less work.
    pub fn run_basin(&mut self, number: u32, watch: &dyn Watch) -> Result<BasinKept, Halt> {
        let measures = self.plan.measures;
        self.each_year(number, watch, |year, block, means, measured| {
            block.copy_means(means);
            measures.take(means, measured.year(year, means.width));
        })?;
        Ok(self.keep_basin(0))
    }

    /// Runs a realization from bare ground and hands each year to `look`. Where its first year leaves perennial snow in
    /// a band of the reference, that year is run once more on the snow it left.
    fn each_year(
        &mut self,
        number: u32,
        watch: &dyn Watch,
        mut look: impl FnMut(usize, &mut YearBlock, &mut YearBlock, &mut Measured),
    ) -> Result<(), Halt> {
        self.plan.generator.fill(number, &mut self.weather);
        self.engine.restart();
        let (lanes, reference) = (self.plan.lanes, self.plan.reference);
        self.measured.begin(self.plan.measures.list().len(), self.weather.years.len());
        for (year, span) in self.weather.years.iter().enumerate() {
            if watch.wants_stop() {
                return Err(Halt::Stopped);
            }
            let view = self.weather.view(span);
            let mut block = self.engine.year(view)?;
            let is_perennial = |block: &YearBlock| {
                (0..self.plan.bands).any(|band| keeps_snow(block, lanes.column(reference, band)))
            };
            if year == 0 && is_perennial(block) {
                block = self.engine.year(view)?;
            }
            look(year, block, &mut self.means, &mut self.measured);
        }
        Ok(())
    }

    fn keep_basin(&self, first_mean: usize) -> BasinKept {
        let (levels, measured) = (self.plan.levels, &self.measured);
        let mut kept = Vec::with_capacity(levels * measured.measures * measured.years);
        for level in 0..levels {
            for measure in 0..measured.measures {
                kept.extend(measured.column(measure, first_mean + level));
            }
        }
        BasinKept(kept)
    }

    fn keep(&self) -> Kept {
        let (levels, bands, measures) = (self.plan.levels, self.plan.bands, self.plan.measures.list());
        let mut kept = Kept {
            basin: self.keep_basin(self.plan.lanes.first_mix_column()),
            band_periods: Vec::with_capacity(levels * bands * measures.len()),
            band_undefined: Vec::with_capacity(levels * bands * measures.len()),
        };
        let mut one = Vec::with_capacity(self.measured.years);
        for level in 0..levels {
            for band in 0..bands {
                for (number, measure) in measures.iter().enumerate() {
                    one.clear();
                    one.extend(self.measured.column(number, self.plan.lanes.column(level, band)));
                    let count = |what: f64| one.iter().filter(|value| **value == what).count() as u32;
                    kept.band_undefined.push([count(NONE), count(NOT_GONE)]);
                    kept.band_periods.push(period_value(measure.kind, &mut one));
                }
            }
        }
        kept
    }
}

impl Measured {
    fn begin(&mut self, measures: usize, years: usize) {
        (self.measures, self.years) = (measures, years);
    }

    /// The place of a year's measures.
    fn year(&mut self, year: usize, columns: usize) -> &mut [f64] {
        self.columns = columns;
        let size = self.measures * columns;
        self.values.resize(self.years * size, NONE);
        &mut self.values[year * size..(year + 1) * size]
    }

    /// A measure of a column, year by year.
    fn column(&self, measure: usize, column: usize) -> impl Iterator<Item = f64> {
        let at = move |year: usize| (year * self.measures + measure) * self.columns + column;
        (0..self.years).map(move |year| self.values[at(year)])
    }
}
