//! The response surface: what stands on the survey date under any warming together with any change of precipitation, from real
//! runs at the nodes of a grid and at named changes beside it.

use super::break_even::{Root, Stays};
use super::elasticity::Slopes;
use super::offset::{INCREASE_PCT, Offset, between};
use super::quantile::{quantile, sorted};
use super::resample::Estimate;
use super::surface_nodes::Nodes;
use super::tipping::{Criterion, FailureLine};
use crate::basin::Band;
use crate::season::{Measure, Outcome};
use serde::Serialize;

/// A change of climate: every day warmer by so much, and all its precipitation changed by so much.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Change {
    /// Warming of the basin, degC, on the scale of the study's levels.
    pub warming_c: f64,
    /// Change of all precipitation, percent; it is the whole of the change, also where a study states one with its levels.
    pub precipitation_change_pct: f64,
}

/// A change with a name.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct NamedChange {
    /// Its name.
    pub name: String,
    /// Where it comes from.
    pub origin: ChangeOrigin,
    /// The change.
    #[serde(flatten)]
    pub change: Change,
}

/// Where a named change comes from.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
#[serde(rename_all = "snake_case")]
pub enum ChangeOrigin {
    /// A case that the scenario names.
    Case,
    /// A line of the scenario's file of projections.
    Projection,
}

/// What is asked of the surface.
#[derive(Debug, Clone)]
pub struct SurfaceQuestions<'a> {
    /// Warmings of the grid, ascending, the reference's among them, degC.
    pub warmings_c: Vec<f64>,
    /// Precipitation changes of the grid, ascending, 0 among them, percent.
    pub precipitation_changes_pct: Vec<f64>,
    /// The study's levels, degC.
    pub levels_c: &'a [f64],
    /// The reference, degC.
    pub reference_c: f64,
    /// Whether the study's levels change temperatures alone.
    pub levels_warm_alone: bool,
    /// Changes beside the grid.
    pub named: &'a [NamedChange],
    /// What the user wants to hold.
    pub criteria: &'a [Criterion],
    /// The bands, from the lowest.
    pub bands: &'a [Band],
    /// Seed of the study, for the Monte Carlo error.
    pub seed: u64,
}

/// The surface, and what is read from its nodes.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct ResponseSurface {
    /// Realizations that were run, the study's first; no change of mean precipitation is assumed in them.
    pub realizations: usize,
    /// Whether the study's levels change temperatures alone, so that they are warmings of the surface.
    pub levels_warm_alone: bool,
    /// Warmings of the grid, degC.
    pub warmings_c: Vec<f64>,
    /// Precipitation changes of the grid, percent.
    pub precipitation_changes_pct: Vec<f64>,
    /// Median period value of the headline measure at the reference, mm.
    pub reference_median_mm: f64,
    /// What was measured, the headline's first.
    pub measures: Vec<Measure>,
    /// Nodes of the grid, all precipitation changes of the first warming before those of the second.
    pub nodes: Vec<SurfaceNode>,
    /// The changes that have a name.
    pub named: Vec<NamedNode>,
    /// For each warming of the grid the precipitation that brings the headline back to the reference. Found by runs of its own.
    pub break_even: Vec<CurvePoint>,
    /// The warming that a stated increase of precipitation makes up for; none where the grid has no warmer one.
    pub offset: Option<Offset>,
    /// For each criterion that can be drawn, where on the grid it begins to fail.
    pub failure_lines: Vec<FailureLine>,
    /// How much degrees and percents do, at every level.
    pub slopes: Vec<Slopes>,
    /// Realizations of the study by their own weather at the reference.
    pub realized: Vec<Realized>,
}

/// One node.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct SurfaceNode {
    /// What is changed there.
    #[serde(flatten)]
    pub change: Change,
    /// One entry a measure of the surface.
    pub measures: Vec<NodeMeasure>,
    /// Median period value of SWE on the survey date in each band, from the lowest, mm.
    pub band_swe_mm: Vec<f64>,
}

/// A named change, run.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct NamedNode {
    /// Its name.
    pub name: String,
    /// Where it comes from.
    pub origin: ChangeOrigin,
    /// What it comes to.
    #[serde(flatten)]
    pub node: SurfaceNode,
}

/// A measure at a node.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct NodeMeasure {
    /// Median of the period value over realizations.
    pub median: Outcome,
    /// That median less the reference's, in the unit of the measure, with the Monte Carlo error of the difference: both change
    /// with the realizations together.
    pub change: Option<Estimate>,
    /// The same as a percentage of the reference's median; of amounts that are not too small for it.
    pub change_pct: Option<Estimate>,
}

/// The break-even precipitation of a warming of the grid.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct CurvePoint {
    /// The warming, degC.
    pub warming_c: f64,
    /// Precipitation change at which the headline's median is back at the reference's, percent.
    pub precipitation_change_pct: Option<f64>,
    /// Where there is none: on which side it stays, from -50 to +100 %.
    pub stays: Option<Stays>,
    /// Its 5 and 95 % quantiles over resampled realizations, percent, by straight lines between the nodes of the grid, moved by what
    /// these miss of the root that runs have found; an end is none where it lies beyond the grid.
    pub range_pct: Option<[Option<f64>; 2]>,
}

/// A realization's own weather: means over its period against the record's mean, of the cool season.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Realized {
    /// Temperature, degC above.
    pub warmer_c: f64,
    /// Precipitation, percent above; with the assumed change of its mean.
    pub wetter_pct: f64,
}

impl SurfaceQuestions<'_> {
    /// Every change that has to be run, none twice; the reference is the first.
    pub fn changes(&self) -> Vec<Change> {
        let at =
            |warming_c: f64, precipitation_change_pct: f64| Change { warming_c, precipitation_change_pct };
        let grid = self
            .warmings_c
            .iter()
            .flat_map(|warming_c| self.precipitation_changes_pct.iter().map(|pct| at(*warming_c, *pct)));
        let increased = self
            .warmings_c
            .iter()
            .filter(|warming_c| **warming_c >= self.reference_c)
            .map(|warming_c| at(*warming_c, INCREASE_PCT));
        let slopes = self.levels_c.iter().flat_map(|level_c| Slopes::changes(*level_c, self.reference_c));
        let all = std::iter::once(at(self.reference_c, 0.0))
            .chain(grid)
            .chain(self.named.iter().map(|named| named.change))
            .chain(slopes)
            .chain(increased);
        let mut changes: Vec<Change> = Vec::new();
        for change in all {
            if !changes.contains(&change) {
                changes.push(change);
            }
        }
        changes
    }

    /// What has to be run when the grid has been, to know better which warming an increase of precipitation makes up for; after the
    /// reference, which decides about perennial snow.
    pub fn finer(&self, nodes: &Nodes) -> Vec<Change> {
        let reference = Change { warming_c: self.reference_c, precipitation_change_pct: 0.0 };
        let finer = between(nodes, &self.warmings_c, self.reference_c);
        if finer.is_empty() { finer } else { std::iter::once(reference).chain(finer).collect() }
    }

    /// Answers from the nodes; the curve, found by runs of its own, is added to it.
    pub fn answer(&self, nodes: &Nodes, curve: &[(f64, Root)], realized: &[Realized]) -> ResponseSurface {
        let node = |change: Change| nodes.node(change);
        let grid = |warming_c: f64| {
            self.precipitation_changes_pct
                .iter()
                .map(move |pct| Change { warming_c, precipitation_change_pct: *pct })
        };
        let named = self.named.iter().filter_map(|named| {
            Some(NamedNode { name: named.name.clone(), origin: named.origin, node: node(named.change)? })
        });
        let reference = Change { warming_c: self.reference_c, precipitation_change_pct: 0.0 };
        let break_even: Vec<CurvePoint> =
            curve.iter().map(|(warming_c, root)| self.point(nodes, *warming_c, *root)).collect();
        ResponseSurface {
            realizations: nodes.realizations(),
            levels_warm_alone: self.levels_warm_alone,
            warmings_c: self.warmings_c.clone(),
            precipitation_changes_pct: self.precipitation_changes_pct.clone(),
            reference_median_mm: nodes.median(reference).unwrap_or(f64::NAN),
            measures: nodes.measures(),
            nodes: self.warmings_c.iter().copied().flat_map(grid).filter_map(node).collect(),
            named: named.collect(),
            offset: Offset::of(nodes, &self.warmings_c, self.reference_c),
            break_even,
            failure_lines: self.criteria.iter().filter_map(|of| FailureLine::of(of, nodes, self)).collect(),
            slopes: self.levels_c.iter().map(|level_c| Slopes::of(nodes, *level_c, self)).collect(),
            realized: realized.to_vec(),
        }
    }

    fn point(&self, nodes: &Nodes, warming_c: f64, root: Root) -> CurvePoint {
        let (precipitation_change_pct, stays) = match root {
            Root::At(pct) => (Some(pct), None),
            Root::Stays(stays) => (None, Some(stays)),
            Root::Unknown => (None, None),
        };
        // At the reference it is none by definition, without an error.
        let is_found = precipitation_change_pct.filter(|_| warming_c != self.reference_c);
        let range_pct = is_found.and_then(|pct| self.range_pct(nodes, warming_c, pct));
        CurvePoint { warming_c, precipitation_change_pct, stays, range_pct }
    }

    /// The break-even of every resample by straight lines between the grid's nodes, all moved by what the same lines miss of the root
    /// that runs have found.
    fn range_pct(&self, nodes: &Nodes, warming_c: f64, root_pct: f64) -> Option<[Option<f64>; 2]> {
        let medians = |pct: f64| nodes.median(Change { warming_c, precipitation_change_pct: pct });
        let reference_mm =
            nodes.median(Change { warming_c: self.reference_c, precipitation_change_pct: 0.0 })?;
        let excess: Option<Vec<f64>> =
            self.precipitation_changes_pct.iter().map(|pct| Some(medians(*pct)? - reference_mm)).collect();
        let by_lines_pct = root_between(&self.precipitation_changes_pct, &excess?)?;
        if !by_lines_pct.is_finite() {
            return None;
        }
        let at = |warming_c, precipitation_change_pct| {
            nodes.resampled_medians(Change { warming_c, precipitation_change_pct })
        };
        let reference = at(self.reference_c, 0.0)?;
        let column: Option<Vec<Vec<f64>>> =
            self.precipitation_changes_pct.iter().map(|pct| at(warming_c, *pct)).collect();
        let column = column?;
        let roots: Option<Vec<f64>> = (0..reference.len())
            .map(|resample| {
                let excess: Vec<f64> = column.iter().map(|of| of[resample] - reference[resample]).collect();
                Some(root_between(&self.precipitation_changes_pct, &excess)? + root_pct - by_lines_pct)
            })
            .collect();
        let roots = sorted(roots.filter(|roots| !roots.is_empty())?);
        Some([0.05, 0.95].map(|share| Some(quantile(&roots, share)).filter(|end| end.is_finite())))
    }
}

/// Where values at ascending places first pass 0 upwards, by straight lines: below all places where none of them is below 0,
/// above all where none reaches it. None where a value is no number, or they fall through 0 alone.
fn root_between(places: &[f64], values: &[f64]) -> Option<f64> {
    if values.iter().any(|value| value.is_nan()) {
        return None;
    }
    let root =
        places.windows(2).zip(values.windows(2)).find(|(_, values)| values[0] < 0.0 && values[1] >= 0.0);
    match root {
        Some((places, values)) => {
            Some(places[0] + (places[1] - places[0]) * values[0] / (values[0] - values[1]))
        }
        None if values.iter().all(|value| *value >= 0.0) => Some(f64::NEG_INFINITY),
        None => values.iter().all(|value| *value < 0.0).then_some(f64::INFINITY),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    /// Hand-computed: -10 at 0 and +30 at 20 are 0 at 5. Where all lies above 0 the root is below the grid, and the other way round.
    #[test]
    fn straight_lines_pass_where_they_should() {
        assert_eq!(root_between(&[0.0, 20.0], &[-10.0, 30.0]), Some(5.0));
        assert_eq!(root_between(&[0.0, 20.0, 40.0], &[-10.0, -5.0, 5.0]), Some(30.0));
        assert_eq!(root_between(&[0.0, 20.0], &[10.0, 30.0]), Some(f64::NEG_INFINITY));
        assert_eq!(root_between(&[0.0, 20.0], &[-10.0, -3.0]), Some(f64::INFINITY));
        assert_eq!(root_between(&[0.0, 20.0], &[3.0, -10.0]), None);
        assert_eq!(root_between(&[0.0, 20.0], &[f64::NAN, 30.0]), None);
    }
}
