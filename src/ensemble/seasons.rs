//! What a run keeps: single years for the basin, period values for the bands.

use super::plan::Plan;
use super::realization::Kept;
use crate::season::{Measure, period_value};
use ndarray::{Array3, Array4, Axis};

/// The measured seasons of a run.
#[derive(Debug, Clone, PartialEq)]
pub struct Seasons {
    /// What was measured.
    pub measures: Vec<Measure>,
    /// `[level][measure][realization][year]` of the basin.
    pub basin_years: Array4<f64>,
    /// `[level][measure][realization]` of the basin: period values.
    pub basin_periods: Array3<f64>,
    /// `[level][band][measure][realization]`: period values.
    pub band_periods: Array4<f64>,
    /// `[level][band][measure]`: over all realizations, years with none and years whose snow never went.
    pub band_undefined: Array3<[u32; 2]>,
}

impl Seasons {
    pub(super) fn gather(plan: &Plan<'_>, kept: Vec<Kept>) -> Self {
        let measures = plan.measures.list().to_vec();
        let (levels, bands, count) = (plan.levels, plan.bands, measures.len());
        let realizations = kept.len();
        let years = kept.first().map_or(0, |kept| kept.basin_years.len() / (levels * count));
        let mut seasons = Self {
            basin_years: Array4::zeros((levels, count, realizations, years)),
            basin_periods: Array3::zeros((levels, count, realizations)),
            band_periods: Array4::zeros((levels, bands, count, realizations)),
            band_undefined: Array3::from_elem((levels, bands, count), [0, 0]),
            measures,
        };
        for (realization, kept) in kept.into_iter().enumerate() {
            seasons.put(realization, &kept);
        }
        seasons
    }

    fn put(&mut self, realization: usize, kept: &Kept) {
        let mut years = self.basin_years.index_axis_mut(Axis(2), realization);
        years.iter_mut().zip(&kept.basin_years).for_each(|(place, value)| *place = *value);
        let years = self.basin_years.index_axis(Axis(2), realization);
        let mut periods = self.basin_periods.index_axis_mut(Axis(2), realization);
        let mut one = Vec::new();
        for ((at, period), years) in periods.indexed_iter_mut().zip(years.lanes(Axis(2))) {
            one.clear();
            one.extend(years);
            *period = period_value(self.measures[at.1].kind, &mut one);
        }
        let mut bands = self.band_periods.index_axis_mut(Axis(3), realization);
        bands.iter_mut().zip(&kept.band_periods).for_each(|(place, value)| *place = *value);
        for (sum, [none, not_gone]) in self.band_undefined.iter_mut().zip(&kept.band_undefined) {
            sum[0] += none;
            sum[1] += not_gone;
        }
    }
}
