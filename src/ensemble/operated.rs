//! What is kept of the water of a run: single years of inflow and storage, and what whole realizations come to.

use crate::operation::{Better, CHANGED, Change, Operated, Operation};
use crate::season::Measure;
use ndarray::{Array3, Array4};

/// Inflow and storage of a run.
#[derive(Debug, Clone, PartialEq)]
pub struct OperatedSeasons {
    /// What was measured of every year.
    pub yearly: Vec<Measure>,
    /// `[level][measure][realization][year]`.
    pub years: Array4<f64>,
    /// `[level][measure][realization]`: period values.
    pub periods: Array3<f64>,
    /// What was measured of whole realizations.
    pub over_years: Vec<Measure>,
    /// `[level][measure][realization]`.
    pub wholes: Array3<f64>,
    /// The rules that were tried, those stated first; none without a reservoir.
    pub tried: Vec<Change>,
    /// What was measured of each, and which way it is better.
    pub of_changes: Vec<(Measure, Better)>,
    /// `[level][change][measure][realization]`.
    pub changed: Array4<f64>,
}

impl OperatedSeasons {
    pub(super) fn gather(operation: &Operation, levels: usize, kept: &[&Operated]) -> Self {
        let (yearly, over_years, tried) = (operation.yearly(), operation.over_years(), operation.tried());
        let (measures, realizations) = (yearly.len(), kept.len());
        let years = kept.first().map_or(0, |kept| kept.yearly.len() / (levels * measures));
        let mut seasons = Self {
            years: Array4::zeros((levels, measures, realizations, years)),
            periods: Array3::zeros((levels, measures, realizations)),
            wholes: Array3::zeros((levels, over_years.len(), realizations)),
            changed: Array4::from_shape_fn(
                (levels, tried.len(), CHANGED, realizations),
                |(level, change, measure, realization)| {
                    kept[realization].changed[(level * tried.len() + change) * CHANGED + measure]
                },
            ),
            yearly,
            over_years,
            tried,
            of_changes: Operation::of_changes(),
        };
        let kinds = operation.yearly_kinds();
        for (realization, kept) in kept.iter().enumerate() {
            for level in 0..levels {
                for (year, values) in kept.years((level, levels), measures).enumerate() {
                    for (measure, value) in values.iter().enumerate() {
                        seasons.years[[level, measure, realization, year]] = *value;
                    }
                }
                let values = kept.period_values((level, levels), &kinds);
                for (measure, value) in values.into_iter().enumerate() {
                    match measure.checked_sub(measures) {
                        None => seasons.periods[[level, measure, realization]] = value,
                        Some(whole) => seasons.wholes[[level, whole, realization]] = value,
                    }
                }
            }
        }
        seasons
    }
}
