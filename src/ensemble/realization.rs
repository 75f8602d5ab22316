//! One realization under every level: its years are run once and measured, for basin and bands or for the basin alone.

use super::memory::{Memory, Remembered};
use super::plan::Plan;
use super::swe_days::Tally;
use super::watch::{Halt, Watch};
use crate::perturb::Generator;
use crate::season::{NONE, NOT_GONE, period_value};
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
    memory: Memory,
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
            memory: Memory::default(),
        }
    }

    /// Runs a realization from bare ground, and measures every column, bands and basin means. Where its first year leaves
    /// perennial snow in a band of the reference, that year is run once more on the snow it left.
    pub fn run(&mut self, number: u32, tally: &Tally, watch: &dyn Watch) -> Result<Kept, Halt> {
        let Self { plan, engine, weather, measured, .. } = self;
        plan.generator.fill(number, weather);
        engine.restart();
        measured.begin(plan.measures.list().len(), weather.years.len());
        for (year, span) in weather.years.iter().enumerate() {
            if watch.wants_stop() {
                return Err(Halt::Stopped);
            }
            let view = weather.view(span);
            let mut block = engine.year(view)?;
            if year == 0 && plan.keeps_snow(block) {
                block = engine.year(view)?;
            }
            tally.count(block);
            plan.measures.take(block, measured.year(year, block.width));
        }
        Ok(self.keep())
    }

    /// Runs the same realization from each of several generators, and measures the basin means alone. Years that have the
    /// same name in two of them must have the same weather.
    pub fn run_records(
        &mut self,
        number: u32,
        generators: &[&dyn Generator],
        watch: &dyn Watch,
    ) -> Result<Vec<BasinKept>, Halt> {
        if !generators.iter().all(|generator| generator.repeats_years()) {
            self.memory.clear();
        }
        generators.iter().map(|generator| self.run_remembering(number, *generator, watch)).collect()
    }

    fn run_remembering(
        &mut self,
        number: u32,
        generator: &dyn Generator,
        watch: &dyn Watch,
    ) -> Result<BasinKept, Halt> {
        let Self { plan, engine, weather, means, measured, memory } = self;
        generator.fill(number, weather);
        engine.restart();
        measured.begin(plan.measures.list().len(), weather.years.len());
        for (year, span) in weather.years.iter().enumerate() {
            if watch.wants_stop() {
                return Err(Halt::Stopped);
            }
            let mut run = |engine: &mut Engine<'_>| {
                let start = engine.snow();
                let found = memory.year(span.water_year, start, || {
                    let block = engine.year(weather.view(span))?;
                    let is_perennial = plan.keeps_snow(block);
                    block.copy_means(means);
                    let mut measured = vec![0.0; plan.measures.list().len() * means.width];
                    plan.measures.take(means, &mut measured);
                    Ok::<_, Halt>(Remembered { measured, end: engine.snow(), is_perennial })
                })?;
                engine.put_snow(&found.end);
                measured
                    .year(year, found.measured.len() / plan.measures.list().len())
                    .copy_from_slice(&found.measured);
                Ok::<bool, Halt>(found.is_perennial)
            };
            if run(engine)? && year == 0 {
                run(engine)?;
            }
        }
        Ok(self.keep_basin(0))
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
