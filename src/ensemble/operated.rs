//! What is kept of the water of a run: single years of inflow and storage, and what whole realizations come to.

use crate::operation::{Better, CHANGED, Change, Operated, Operation};
use crate::season::{Measure, period_value};
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
        let years = Array4::from_shape_fn(
            (levels, measures, realizations, years),
            |(level, measure, realization, year)| {
                kept[realization].yearly[(level * years + year) * measures + measure]
            },
        );
        let mut one = Vec::new();
        let periods =
            Array3::from_shape_fn((levels, measures, realizations), |(level, measure, realization)| {
                one.clear();
                one.extend((0..years.dim().3).map(|year| years[[level, measure, realization, year]]));
                period_value(yearly[measure].kind, &mut one)
            });
        let wholes = Array3::from_shape_fn(
            (levels, over_years.len(), realizations),
            |(level, measure, realization)| kept[realization].over_years[level * over_years.len() + measure],
        );
        let changed = Array4::from_shape_fn(
            (levels, tried.len(), CHANGED, realizations),
            |(level, change, measure, realization)| {
                kept[realization].changed[(level * tried.len() + change) * CHANGED + measure]
            },
        );
        Self {
            yearly,
            years,
            periods,
            over_years,
            wholes,
            tried,
            of_changes: Operation::of_changes(),
            changed,
        }
    }
}
