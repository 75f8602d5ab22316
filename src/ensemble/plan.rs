//! The plan of a run: what is stepped, by which weather, and what is measured.

use crate::perturb::Generator;
use crate::season::{Measures, NONE, keeps_snow};
use crate::snow::{Lanes, Path, YearBlock};

/// What is to be run.
#[derive(Clone, Copy)]
pub struct Plan<'a> {
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
    /// Makes the weather.
    pub generator: &'a dyn Generator,
    /// How many realizations.
    pub realizations: u32,
    /// Water years of each.
    pub years: usize,
    /// Compiled form of the engine's row passes.
    pub path: Path,
}

impl Plan<'_> {
    /// Whether a band of the reference kept its snow through a year.
    pub(super) fn keeps_snow(&self, block: &YearBlock) -> bool {
        (0..self.bands).any(|band| keeps_snow(block, self.lanes.column(self.reference, band)))
    }

    /// Every measure of every column of a year, `[measure][column]`.
    pub(super) fn measured(&self, block: &mut YearBlock) -> Vec<f64> {
        let mut measured = vec![NONE; self.measures.list().len() * block.width];
        self.measures.take(block, &mut measured);
        measured
    }
}
