//! One realization under every level: its years are run once and measured, for basin and bands or for the basin alone.

use super::memory::{Memory, Remembered, SnowAt};
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

/// What a thread reuses from one realization to the next: one buffer of weather, one engine, one narrow block, and the
/// years that it has run.
pub(super) struct Workshop<'p> {
    plan: &'p Plan<'p>,
    engine: Engine<'p>,
    weather: Series,
    means: YearBlock,
    memory: Memory,
    /// The realization's years, as places in the memory.
    years: Vec<usize>,
}

impl<'p> Workshop<'p> {
    pub fn new(plan: &'p Plan<'p>) -> Self {
        Self {
            plan,
            engine: Engine::on_path(plan.lanes, false, plan.path),
            weather: Series::default(),
            means: YearBlock::of_means(plan.lanes),
            memory: Memory::default(),
            years: Vec::new(),
        }
    }

    /// Runs a realization from bare ground, and measures every column, bands and basin means.
    pub fn run(&mut self, number: u32, tally: &Tally, watch: &dyn Watch) -> Result<Kept, Halt> {
        let plan = self.plan;
        self.forget(plan.generator.drawn(number, plan.years).is_some());
        self.run_years(number, plan.generator, watch, |block, _| Remembered {
            is_perennial: plan.keeps_snow(block),
            swe_bins: tally.bins(block),
            measured: plan.measured(block),
        })?;
        tally.count(self.years.iter().map(|place| self.memory.year(*place).swe_bins.as_slice()));
        Ok(self.keep())
    }

    /// Runs the same realization from each of several generators, and measures the basin means alone.
    pub fn run_records(
        &mut self,
        number: u32,
        generators: &[&dyn Generator],
        watch: &dyn Watch,
    ) -> Result<Vec<BasinKept>, Halt> {
        let plan = self.plan;
        self.forget(generators.iter().all(|generator| generator.drawn(number, plan.years).is_some()));
        let keep_names = generators.iter().all(|generator| generator.keeps_names());
        let of = |generator: &&dyn Generator| {
            if !keep_names {
                self.memory.clear();
            }
            self.run_years(number, *generator, watch, |block, means| {
                block.copy_means(means);
                Remembered {
                    is_perennial: plan.keeps_snow(block),
                    swe_bins: Vec::new(),
                    measured: plan.measured(means),
                }
            })?;
            Ok(self.keep_basin(0))
        };
        generators.iter().map(of).collect()
    }

    /// Forgets the years that have been run, unless they come again and there is room for more.
    fn forget(&mut self, repeats_years: bool) {
        if !repeats_years || self.memory.is_full() {
            self.memory.clear();
        }
    }

    /// Runs a realization from bare ground; `measure` looks at each year that has not been run before, and may use the
    /// narrow block. Where the first year leaves perennial snow in a band of the reference, that year is run once more on
    /// the snow it left.
    fn run_years(
        &mut self,
        number: u32,
        generator: &dyn Generator,
        watch: &dyn Watch,
        measure: impl Fn(&mut YearBlock, &mut YearBlock) -> Remembered,
    ) -> Result<(), Halt> {
        let Self { plan, engine, weather, means, memory, years } = self;
        let drawn = generator.drawn(number, plan.years);
        let (weather, spans) = match &drawn {
            Some((record, spans)) => (*record, spans.as_slice()),
            None => {
                generator.fill(number, plan.years, weather);
                (&*weather, weather.years.as_slice())
            }
        };
        engine.restart();
        years.clear();
        let mut snow = memory.snow_at(engine.snow());
        for span in spans {
            if watch.wants_stop() {
                return Err(Halt::Stopped);
            }
            let mut run = |memory: &mut Memory, start: SnowAt| {
                memory.place(span.water_year, start, |snow| {
                    engine.put_snow(snow);
                    let year = measure(engine.year(weather.view(span))?, means);
                    Ok::<_, Halt>((year, engine.snow()))
                })
            };
            let (mut place, mut end) = run(memory, snow)?;
            if years.is_empty() && memory.year(place).is_perennial {
                (place, end) = run(memory, end)?;
            }
            years.push(place);
            snow = end;
        }
        Ok(())
    }

    fn keep_basin(&self, first_mean: usize) -> BasinKept {
        let (levels, measures) = (self.plan.levels, self.plan.measures.list().len());
        let mut kept = Vec::with_capacity(levels * measures * self.years.len());
        for level in 0..levels {
            for measure in 0..measures {
                kept.extend(self.column(measure, first_mean + level));
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
        let mut one = Vec::with_capacity(self.years.len());
        for level in 0..levels {
            for band in 0..bands {
                for (number, measure) in measures.iter().enumerate() {
                    one.clear();
                    one.extend(self.column(number, self.plan.lanes.column(level, band)));
                    let count = |what: f64| one.iter().filter(|value| **value == what).count() as u32;
                    kept.band_undefined.push([count(NONE), count(NOT_GONE)]);
                    kept.band_periods.push(period_value(measure.kind, &mut one));
                }
            }
        }
        kept
    }

    /// A measure of a column, year by year.
    fn column(&self, measure: usize, column: usize) -> impl Iterator<Item = f64> {
        let measures = self.plan.measures.list().len();
        self.years.iter().map(move |place| {
            let measured = &self.memory.year(*place).measured;
            measured[measured.len() / measures * measure + column]
        })
    }
}
