//! The plan of a run: what is stepped, by which weather, and what is measured.

use crate::operation::Operation;
use crate::perturb::Generator;
use crate::season::{Measures, NONE, keeps_snow};
use crate::snow::{Lanes, Path, YearBlock};

/// Levels that share their weather.
#[derive(Clone, Copy)]
pub struct LevelGroup<'a> {
    /// Every band at each of the levels, a group of lanes and a basin mean for each level.
    pub lanes: &'a Lanes,
    /// Makes the weather.
    pub generator: &'a dyn Generator,
}

impl LevelGroup<'_> {
    /// How many levels it has.
    pub fn levels(&self) -> usize {
        self.lanes.mixes()
    }
}

/// What is to be run.
#[derive(Clone, Copy)]
pub struct Plan<'a> {
    /// All levels in their order: one group, or where levels change the weather's days, one for each weather.
    pub groups: &'a [LevelGroup<'a>],
    /// The reference among the levels.
    pub reference: usize,
    /// Bands of a level.
    pub bands: usize,
    /// What is measured.
    pub measures: &'a Measures,
    /// What becomes of the water, where it is asked.
    pub operation: Option<&'a Operation>,
    /// How many realizations.
    pub realizations: u32,
    /// Water years of each.
    pub years: usize,
    /// Compiled form of the engine's row passes.
    pub path: Path,
}

impl Plan<'_> {
    /// How many levels there are.
    pub fn levels(&self) -> usize {
        self.groups.iter().map(LevelGroup::levels).sum()
    }

    /// How many levels stand in the groups before one.
    pub(super) fn levels_before(&self, group: usize) -> usize {
        self.groups[..group].iter().map(LevelGroup::levels).sum()
    }

    /// The reference's place in a group, if that is its group.
    pub(super) fn reference_in(&self, group: usize) -> Option<usize> {
        let place = self.reference.checked_sub(self.levels_before(group))?;
        (place < self.groups[group].levels()).then_some(place)
    }

    /// Whether a band of the reference kept its snow through a year of a group that has the reference.
    pub(super) fn keeps_snow(&self, group: usize, block: &YearBlock) -> bool {
        let lanes = self.groups[group].lanes;
        let keeps = |level: usize| (0..self.bands).any(|band| keeps_snow(block, lanes.column(level, band)));
        self.reference_in(group).is_some_and(keeps)
    }

    /// Water input of every level of a year, mm, `[day][level]`, where it is asked what becomes of it. The basin means of so many
    /// levels stand side by side from a column on.
    pub(super) fn water_input_mm(&self, block: &YearBlock, from: usize, levels: usize) -> Vec<f64> {
        if self.operation.is_none() {
            return Vec::new();
        }
        let mut water_input_mm = Vec::with_capacity(block.days * levels);
        for day in 0..block.days {
            let [outflow, rain] =
                [&block.outflow_mm, &block.bare_ground_rain_mm].map(|of| &block.row(of, day)[from..]);
            water_input_mm
                .extend(outflow.iter().zip(rain).take(levels).map(|(outflow, rain)| outflow + rain));
        }
        water_input_mm
    }

    /// Every measure of every column of a year, `[measure][column]`.
    pub(super) fn measured(&self, block: &mut YearBlock) -> Vec<f64> {
        let mut measured = vec![NONE; self.measures.list().len() * block.width];
        self.measures.take(block, &mut measured);
        measured
    }
}
