//! What a run over nodes of warming and precipitation keeps: period values, and the headline's single years.

use super::plan::Plan;
use super::realization::NodeKept;
use crate::operation::Operation;
use crate::season::Measure;
use ndarray::Array3;

/// Period values at nodes, each a change of climate.
#[derive(Debug, Clone, PartialEq)]
pub struct NodeRuns {
    /// What was measured.
    pub measures: Vec<Measure>,
    /// `[node][measure][realization]`, of the basin means and of what became of the water, where it is asked.
    pub periods: Array3<f64>,
    /// `[node][realization][year]`: SWE of the basin on the first survey date in single years, mm.
    pub survey_swe_mm: Array3<f64>,
    /// `[node][band][realization]`, of SWE on the first survey date, mm.
    pub band_swe_mm: Array3<f64>,
}

impl NodeRuns {
    pub(super) fn gather(plan: &Plan<'_>, kept: &[NodeKept]) -> Self {
        let mut measures = plan.measures.list().to_vec();
        measures.extend(plan.operation.into_iter().flat_map(Operation::measures));
        let table = |rows: usize, of: fn(&NodeKept) -> &[f64]| {
            Array3::from_shape_fn((plan.levels(), rows, kept.len()), |(node, row, realization)| {
                of(&kept[realization])[node * rows + row]
            })
        };
        Self {
            periods: table(measures.len(), |kept| &kept.basin),
            band_swe_mm: table(plan.bands, |kept| &kept.band_swe_mm),
            survey_swe_mm: Array3::from_shape_fn(
                (plan.levels(), kept.len(), plan.years),
                |(node, kept_at, year)| kept[kept_at].survey_swe_mm[node * plan.years + year],
            ),
            measures,
        }
    }

    /// The same with the nodes of another run of the same measures, bands and realizations behind its own, but for that run's
    /// first, which both have.
    #[must_use]
    pub fn and(self, other: &Self) -> Self {
        let both = |own: &Array3<f64>, other: &Array3<f64>| {
            let (nodes, rows, columns) = own.dim();
            let all = (nodes + other.dim().0 - 1, rows, columns);
            Array3::from_shape_fn(all, |(node, row, column)| match node.checked_sub(nodes) {
                None => own[[node, row, column]],
                Some(more) => other[[more + 1, row, column]],
            })
        };
        Self {
            periods: both(&self.periods, &other.periods),
            survey_swe_mm: both(&self.survey_swe_mm, &other.survey_swe_mm),
            band_swe_mm: both(&self.band_swe_mm, &other.band_swe_mm),
            measures: self.measures,
        }
    }
}
