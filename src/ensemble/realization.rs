//! One realization under every level: its years are run once and measured, for basin and bands or for the basin alone.

use super::bench::{Bench, FirstYear};
use super::memory::Remembered;
use super::plan::Plan;
use super::swe_days::Tally;
use super::watch::{Halt, Watch};
use crate::calendar::day_of_water_year;
use crate::operation::{Operated, Operation};
use crate::perturb::Generator;
use crate::season::{Kind, NONE, NOT_GONE, period_value};

/// What is kept of a realization's basin means: `[level][measure][year]`.
pub(super) struct BasinKept(pub Vec<f64>);

/// What is kept of a realization.
pub(super) struct Kept {
    pub basin: BasinKept,
    /// `[level][band][measure]`: the period value.
    pub band_periods: Vec<f64>,
    /// `[level][band][year]`: the headline measure, which comes first.
    pub band_headline: Vec<f64>,
    /// `[level][band][measure]`: years with none, and years whose snow never went.
    pub band_undefined: Vec<[u32; 2]>,
    /// What became of the water, where it is asked.
    pub operated: Operated,
}

/// What is kept of a realization at nodes.
pub(super) struct NodeKept {
    /// `[node][year]`, the first measure of the basin means.
    pub survey_swe_mm: Vec<f64>,
    /// `[node][measure]`: period values of the basin means, and behind them what became of the water, where it is asked.
    pub basin: Vec<f64>,
    /// `[node][band]`: period values of SWE on the first survey date.
    pub band_swe_mm: Vec<f64>,
}

/// What a thread reuses from one realization to the next: a bench for each group of levels.
pub(super) struct Workshop<'p> {
    plan: &'p Plan<'p>,
    benches: Vec<Bench<'p>>,
    /// The group that has the reference.
    of_reference: usize,
}

impl<'p> Workshop<'p> {
    pub fn new(plan: &'p Plan<'p>) -> Self {
        let has_reference = |group: &usize| plan.reference_in(*group).is_some();
        Self {
            plan,
            benches: plan.groups.iter().map(|group| Bench::new(group, plan.path)).collect(),
            of_reference: (0..plan.groups.len()).find(has_reference).unwrap_or_default(),
        }
    }

    /// Runs a realization from bare ground, and measures every column, bands and basin means.
    pub fn run(&mut self, number: u32, tally: &Tally, watch: &dyn Watch) -> Result<Kept, Halt> {
        let plan = self.plan;
        self.each_group(|group, bench, first_year| {
            let generator = plan.groups[group].generator;
            bench.tidy(generator.drawn(number, plan.years).is_some());
            let levels = bench.lanes.mixes();
            bench.run_years((number, plan.years), generator, first_year, watch, |block, _| Remembered {
                is_perennial: plan.keeps_snow(group, block),
                swe_bins: tally.bins(block, levels),
                water_input_mm: plan.water_input_mm(block, block.mixes_at, levels),
                first: block.first,
                measured: plan.measured(block),
            })
        })?;
        for (group, bench) in self.benches.iter().enumerate() {
            tally.count(plan.levels_before(group), bench.years().map(|year| year.swe_bins.as_slice()));
        }
        let operated = self.operate()?;
        Ok(Kept { operated, ..self.keep() })
    }

    /// What becomes of the water of the years that were run last, level by level.
    fn operate(&self) -> Result<Operated, Halt> {
        let mut all = Operated::default();
        let Some(operation) = self.plan.operation else {
            return Ok(all);
        };
        for bench in &self.benches {
            let years = bench.years().map(Remembered::water_year);
            all.append(operation.run(&years.collect::<Vec<_>>(), bench.lanes.mixes())?);
        }
        Ok(all)
    }

    /// Runs the same realization from the generators of each of several records, one a group, and measures the basin means
    /// alone.
    pub fn run_records(
        &mut self,
        number: u32,
        records: &[Vec<&dyn Generator>],
        watch: &dyn Watch,
    ) -> Result<Vec<BasinKept>, Halt> {
        let plan = self.plan;
        let of_group = |group: usize| records.iter().map(move |record| record[group]);
        for (group, bench) in self.benches.iter_mut().enumerate() {
            bench.tidy(of_group(group).all(|generator| generator.drawn(number, plan.years).is_some()));
        }
        let keep_names: Vec<bool> =
            (0..self.benches.len()).map(|group| of_group(group).all(Generator::keeps_names)).collect();
        let of = |record: &Vec<&dyn Generator>| {
            self.each_group(|group, bench, first_year| {
                if !keep_names[group] {
                    bench.forget();
                }
                let generator = record[group];
                bench.run_years((number, plan.years), generator, first_year, watch, |block, means| {
                    block.copy_means(means);
                    Remembered {
                        is_perennial: plan.keeps_snow(group, block),
                        swe_bins: Vec::new(),
                        water_input_mm: Vec::new(),
                        first: means.first,
                        measured: plan.measured(means),
                    }
                })
            })?;
            Ok(self.keep_basin(|_| 0))
        };
        records.iter().map(of).collect()
    }

    /// Runs a realization and gives the period values of a plan whose levels are nodes, all in one group: of every measure of
    /// the basin means, and of each band's SWE on the first survey date.
    pub fn run_nodes(&mut self, number: u32, watch: &dyn Watch) -> Result<NodeKept, Halt> {
        let plan = self.plan;
        let (nodes, bands, measures) = (plan.levels(), plan.bands, plan.measures.list());
        let survey = plan.measures.settings().survey_dates[0];
        self.each_group(|group, bench, first_year| {
            let generator = plan.groups[group].generator;
            bench.tidy(generator.drawn(number, plan.years).is_some());
            let lanes = bench.lanes;
            bench.run_years((number, plan.years), generator, first_year, watch, |block, means| {
                block.copy_means(means);
                let mut measured = plan.measured(means);
                let swe_mm = block.row(&block.swe_mm, day_of_water_year(block.first, survey) - 1);
                let of_node = |node: usize| (0..bands).map(move |band| swe_mm[lanes.column(node, band)]);
                measured.extend((0..nodes).flat_map(of_node));
                Remembered {
                    is_perennial: plan.keeps_snow(group, block),
                    swe_bins: Vec::new(),
                    water_input_mm: plan.water_input_mm(block, block.mixes_at, nodes),
                    first: block.first,
                    measured,
                }
            })
        })?;
        let operated = self.operate()?;
        let kinds = plan.operation.map(Operation::yearly_kinds);
        let bench = &self.benches[self.of_reference];
        let of_bands = nodes * bands;
        let mut one = Vec::with_capacity(plan.years);
        let mut period = |kind, place: &dyn Fn(&[f64]) -> f64| {
            one.clear();
            one.extend(bench.years().map(|year| place(&year.measured)));
            period_value(kind, &mut one)
        };
        let mut kept = NodeKept {
            survey_swe_mm: Vec::with_capacity(nodes * plan.years),
            basin: Vec::with_capacity(nodes * measures.len()),
            band_swe_mm: Vec::with_capacity(of_bands),
        };
        for node in 0..nodes {
            kept.survey_swe_mm.extend(bench.years().map(|year| year.measured[node]));
            for (at, measure) in measures.iter().enumerate() {
                let place = |year: &[f64]| year[(year.len() - of_bands) / measures.len() * at + node];
                kept.basin.push(period(measure.kind, &place));
            }
            if let Some(kinds) = &kinds {
                kept.basin.extend(operated.period_values((node, nodes), kinds));
            }
        }
        for band in 0..of_bands {
            let place = |year: &[f64]| year[year.len() - of_bands + band];
            kept.band_swe_mm.push(period(Kind::AmountMm, &place));
        }
        Ok(kept)
    }

    /// Runs the reference's group first, and then the others, whose first year is run as often as its own: all levels begin
    /// alike.
    fn each_group(
        &mut self,
        mut run: impl FnMut(usize, &mut Bench<'p>, FirstYear) -> Result<FirstYear, Halt>,
    ) -> Result<(), Halt> {
        let first = self.of_reference;
        let begun = run(first, &mut self.benches[first], FirstYear::AsReferenceDecides)?;
        for (group, bench) in self.benches.iter_mut().enumerate().filter(|(group, _)| *group != first) {
            run(group, bench, begun)?;
        }
        Ok(())
    }

    /// The basin means of every level; `first_mean` says in which column those of a group begin.
    fn keep_basin(&self, first_mean: impl Fn(&Bench<'p>) -> usize) -> BasinKept {
        let (levels, measures) = (self.plan.levels(), self.plan.measures.list().len());
        let mut kept = Vec::with_capacity(levels * measures * self.plan.years);
        for bench in &self.benches {
            for level in 0..bench.lanes.mixes() {
                for measure in 0..measures {
                    kept.extend(bench.column(measure, measures, first_mean(bench) + level));
                }
            }
        }
        BasinKept(kept)
    }

    fn keep(&self) -> Kept {
        let (levels, bands, measures) = (self.plan.levels(), self.plan.bands, self.plan.measures.list());
        let mut kept = Kept {
            basin: self.keep_basin(|bench| bench.lanes.first_mix_column()),
            band_periods: Vec::with_capacity(levels * bands * measures.len()),
            band_headline: Vec::with_capacity(levels * bands * self.plan.years),
            band_undefined: Vec::with_capacity(levels * bands * measures.len()),
            operated: Operated::default(),
        };
        let mut one = Vec::with_capacity(self.plan.years);
        for bench in &self.benches {
            for (level, band) in
                (0..bench.lanes.mixes()).flat_map(|level| (0..bands).map(move |band| (level, band)))
            {
                for (number, measure) in measures.iter().enumerate() {
                    one.clear();
                    one.extend(bench.column(number, measures.len(), bench.lanes.column(level, band)));
                    if number == 0 {
                        kept.band_headline.extend(&one);
                    }
                    let count = |what: f64| one.iter().filter(|value| **value == what).count() as u32;
                    kept.band_undefined.push([count(NONE), count(NOT_GONE)]);
                    kept.band_periods.push(period_value(measure.kind, &mut one));
                }
            }
        }
        kept
    }
}
