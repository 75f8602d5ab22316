//! The nodes of a response surface as they were run, and what is read from each.

use super::quantile::{quantile, sorted};
use super::resample::{Estimate, Ranked, Resamples};
use super::surface::{Change, NodeMeasure, SurfaceNode};
use crate::ensemble::NodeRuns;
use crate::season::{Kind, MELT_OUT_DAY, Measure};
use ndarray::Axis;

/// Measures that stand on the surface beside the headline's and the first volume: half of the net melt done, melt-out, days under snow.
const BESIDE: [&str; 3] = ["melt_d50_day", MELT_OUT_DAY, "snow_covered_days"];
/// The same of what becomes of the water, behind the first window's inflow.
const OF_STORAGE: [&str; 3] = ["storage_year_end_hm3", "shortage_hm3", "reliability_volume_share"];

/// All nodes that were run.
#[derive(Debug, Clone)]
pub struct Nodes {
    changes: Vec<Change>,
    runs: NodeRuns,
    resamples: Resamples,
}

impl Nodes {
    /// What the runs came to, a node each change; `seed` is the study's.
    pub fn new(changes: Vec<Change>, runs: NodeRuns, seed: u64) -> Self {
        let resamples = Resamples::new(seed, runs.periods.len_of(Axis(2)));
        Self { changes, runs, resamples }
    }

    fn at(&self, change: Change) -> Option<usize> {
        self.changes.iter().position(|run| *run == change)
    }

    /// Median period value of the headline measure at a change, mm; none where it was not run.
    pub fn median(&self, change: Change) -> Option<f64> {
        let at = self.at(change)?;
        Some(quantile(&sorted(self.period_values(at, 0)), 0.5))
    }

    fn period_values(&self, node: usize, measure: usize) -> Vec<f64> {
        self.runs.periods.index_axis(Axis(0), node).row(measure).to_vec()
    }

    /// SWE on the survey date of each band at a change, `[band][realization]`, mm.
    pub(super) fn of_band(&self, change: Change, band: usize) -> Option<Vec<f64>> {
        Some(self.runs.band_swe_mm.index_axis(Axis(0), self.at(change)?).row(band).to_vec())
    }

    /// The headline's period values at a change, a realization each, mm.
    pub(super) fn of_basin(&self, change: Change) -> Option<Vec<f64>> {
        Some(self.period_values(self.at(change)?, 0))
    }

    /// The headline of single years of all realizations at a change, mm.
    pub(super) fn single_years(&self, change: Change) -> Option<Vec<f64>> {
        Some(self.runs.survey_swe_mm.index_axis(Axis(0), self.at(change)?).iter().copied().collect())
    }

    pub(super) fn resamples(&self) -> &Resamples {
        &self.resamples
    }

    /// The same runs and those of other changes; both begin with the reference.
    #[must_use]
    pub fn and(self, other: Self) -> Self {
        let changes = self.changes.into_iter().chain(other.changes.into_iter().skip(1)).collect();
        Self { changes, runs: self.runs.and(&other.runs), resamples: self.resamples }
    }

    pub(super) fn resampled_medians(&self, change: Change) -> Option<Vec<f64>> {
        let ranked = Ranked::new(self.of_basin(change)?.into_iter().zip(0..));
        let median = |weights: &[u32]| ranked.quantiles(weights, [0.5]).map_or(f64::NAN, |[median]| median);
        Some(self.resamples.each(median))
    }

    /// Places of the measures that stand on the surface.
    fn shown(&self) -> Vec<usize> {
        let measures = &self.runs.measures;
        let beside = |name: &&str| measures.iter().position(|measure| measure.name == **name);
        let volume = measures.iter().position(|measure| measure.is_volume);
        let inflow = measures.iter().position(|measure| measure.is_volume && measure.kind == Kind::VolumeHm3);
        let of_snow = std::iter::once(0).chain(volume).chain(BESIDE.iter().filter_map(beside));
        of_snow.chain(inflow).chain(OF_STORAGE.iter().filter_map(beside)).collect()
    }

    /// What stands on the surface.
    pub(super) fn measures(&self) -> Vec<Measure> {
        self.shown().into_iter().map(|at| self.runs.measures[at].clone()).collect()
    }

    /// How many realizations each node ran.
    pub(super) fn realizations(&self) -> usize {
        self.runs.periods.len_of(Axis(2))
    }

    /// What a change came to; none where it was not run.
    pub(super) fn node(&self, change: Change) -> Option<SurfaceNode> {
        let node = self.at(change)?;
        let measures = self.shown().iter().map(|at| self.measure(node, *at)).collect();
        let of_bands = self.runs.band_swe_mm.index_axis(Axis(0), node);
        let band_swe_mm =
            of_bands.outer_iter().map(|of_band| quantile(&sorted(of_band.iter().copied()), 0.5));
        Some(SurfaceNode { change, measures, band_swe_mm: band_swe_mm.collect() })
    }

    fn measure(&self, node: usize, at: usize) -> NodeMeasure {
        let kind = self.runs.measures[at].kind;
        let [here, reference] = [node, 0].map(|node| {
            let values = self.period_values(node, at);
            let median = quantile(&sorted(values.iter().copied()), 0.5);
            let ranked = Ranked::new(values.into_iter().zip(0..));
            (median, ranked)
        });
        let difference =
            |here: f64, reference: f64| Some(here - reference).filter(|change| change.is_finite());
        let percent = |here: f64, reference: f64| percent_of(kind, here, reference);
        let both = |of: &dyn Fn(f64, f64) -> Option<f64>| {
            let resampled = self.resamples.each(|weights| {
                let [[here], [reference]] =
                    [here.1.quantiles(weights, [0.5])?, reference.1.quantiles(weights, [0.5])?];
                of(here, reference)
            });
            Some(Estimate::new(of(here.0, reference.0)?, resampled))
        };
        NodeMeasure { median: kind.outcome(here.0), change: both(&difference), change_pct: both(&percent) }
    }
}

/// How far one median lies above another, percent of that; none where it is too small for a percentage, or of no such kind.
fn percent_of(kind: Kind, here: f64, reference: f64) -> Option<f64> {
    super::shift::percent_change(kind, here - reference, reference)
}
