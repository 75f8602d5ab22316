//! Where a thread runs the levels of one group: one buffer of weather, one engine, one narrow block, and the years that it
//! has run.

use super::memory::{Memory, Remembered, SnowAt};
use super::plan::LevelGroup;
use super::watch::{Halt, Watch};
use crate::perturb::Generator;
use crate::snow::{Engine, Lanes, Path, YearBlock};
use crate::weather::Series;

/// How a realization begins on bare ground.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum FirstYear {
    /// As the reference decides, which is among the levels: twice, where a band of it keeps its snow through the year.
    AsReferenceDecides,
    /// It is run once.
    Once,
    /// It is run once more on the snow it left.
    Twice,
}

/// One group's part of a thread's workshop, reused from one realization to the next.
pub(super) struct Bench<'p> {
    pub lanes: &'p Lanes,
    engine: Engine<'p>,
    weather: Series,
    means: YearBlock,
    memory: Memory,
    /// The realization's years, as places in the memory.
    years: Vec<usize>,
}

impl<'p> Bench<'p> {
    pub fn new(group: &LevelGroup<'p>, path: Path) -> Self {
        let lanes = group.lanes;
        Self {
            lanes,
            engine: Engine::on_path(lanes, false, path).with_cover(),
            weather: Series::default(),
            means: YearBlock::of_means(lanes),
            memory: Memory::default(),
            years: Vec::new(),
        }
    }

    /// Forgets the years that have been run.
    pub fn forget(&mut self) {
        self.memory.clear();
    }

    /// Forgets the years that have been run, unless they come again and there is room for more.
    pub fn tidy(&mut self, repeats_years: bool) {
        if !repeats_years || self.memory.is_full() {
            self.memory.clear();
        }
    }

    /// Runs so many years of a realization from bare ground, and says how its first year was run; `measure` looks at each
    /// year that has not been run before, and may use the narrow block.
    pub fn run_years(
        &mut self,
        (number, years): (u32, usize),
        generator: &dyn Generator,
        first_year: FirstYear,
        watch: &dyn Watch,
        measure: impl Fn(&mut YearBlock, &mut YearBlock) -> Remembered,
    ) -> Result<FirstYear, Halt> {
        let drawn = generator.drawn(number, years);
        let Self { engine, weather, means, memory, years: run_before, .. } = self;
        let (weather, spans) = match &drawn {
            Some((record, spans)) => (*record, spans.as_slice()),
            None => {
                generator.fill(number, years, weather);
                (&*weather, weather.years.as_slice())
            }
        };
        engine.restart();
        run_before.clear();
        let mut snow = memory.snow_at(engine.snow());
        let mut begun = first_year;
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
            if run_before.is_empty() {
                if begun == FirstYear::AsReferenceDecides {
                    let is_perennial = memory.year(place).is_perennial;
                    begun = if is_perennial { FirstYear::Twice } else { FirstYear::Once };
                }
                if begun == FirstYear::Twice {
                    (place, end) = run(memory, end)?;
                }
            }
            run_before.push(place);
            snow = end;
        }
        Ok(begun)
    }

    /// The years of the realization that was run last, in their order.
    pub fn years(&self) -> impl Iterator<Item = &Remembered> {
        self.years.iter().map(|place| self.memory.year(*place))
    }

    /// A measure of a column, one of so many, year by year.
    pub fn column(&self, measure: usize, measures: usize, column: usize) -> impl Iterator<Item = f64> {
        self.years().map(move |year| year.measured[year.measured.len() / measures * measure + column])
    }
}
