//! What a run keeps: single years for the basin, period values for the bands and single years of their headline measure, counts
//! for the days.

use super::operated::OperatedSeasons;
use super::plan::Plan;
use super::realization::Kept;
use super::swe_days::SweDays;
use crate::operation::Operated;
use crate::season::{Measure, period_value};
use ndarray::{Array3, Array4, Axis};

/// The measured seasons of a run.
#[derive(Debug, Clone, PartialEq)]
pub struct Seasons {
    /// The basin.
    pub basin: BasinSeasons,
    /// `[level][band][measure][realization]`: period values.
    pub band_periods: Array4<f64>,
    /// `[level][band][measure]`: over all realizations, years with none and years whose snow never went.
    pub band_undefined: Array3<[u32; 2]>,
    /// `[level][band][realization][year]`: single years of the headline measure, which comes first.
    pub band_headline: Array4<f64>,
    /// SWE of the basin on every day of the water year.
    pub swe_days: SweDays,
    /// What became of the water, where it is asked.
    pub operated: Option<OperatedSeasons>,
}

/// The measured seasons of the basin means.
#[derive(Debug, Clone, PartialEq)]
pub struct BasinSeasons {
    /// What was measured.
    pub measures: Vec<Measure>,
    /// `[level][measure][realization][year]`.
    pub years: Array4<f64>,
    /// `[level][measure][realization]`: period values.
    pub periods: Array3<f64>,
}

impl BasinSeasons {
    /// Puts realizations together, each `[level][measure][year]`.
    pub(super) fn gather<'k>(
        plan: &Plan<'_>,
        kept: impl ExactSizeIterator<Item = &'k [f64]> + Clone,
    ) -> Self {
        let measures = plan.measures.list().to_vec();
        let (levels, count) = (plan.levels(), measures.len());
        let years = kept.clone().next().map_or(0, |kept| kept.len() / (levels * count));
        let mut seasons = Self {
            years: Array4::zeros((levels, count, kept.len(), years)),
            periods: Array3::zeros((levels, count, kept.len())),
            measures,
        };
        for (realization, kept) in kept.enumerate() {
            let mut years = seasons.years.index_axis_mut(Axis(2), realization);
            years.iter_mut().zip(kept).for_each(|(place, value)| *place = *value);
        }
        let mut one = Vec::with_capacity(years);
        for (at, period) in seasons.periods.indexed_iter_mut() {
            one.clear();
            let (level, measure, realization) = at;
            let years = seasons.years.index_axis(Axis(0), level);
            one.extend(years.index_axis(Axis(0), measure).row(realization));
            *period = period_value(seasons.measures[at.1].kind, &mut one);
        }
        seasons
    }
}

impl Seasons {
    pub(super) fn gather(plan: &Plan<'_>, kept: &[Kept], swe_days: SweDays) -> Self {
        let basin = BasinSeasons::gather(plan, kept.iter().map(|kept| kept.basin.0.as_slice()));
        let (levels, bands, count) = (plan.levels(), plan.bands, basin.measures.len());
        let mut seasons = Self {
            basin,
            band_periods: Array4::zeros((levels, bands, count, kept.len())),
            band_undefined: Array3::from_elem((levels, bands, count), [0, 0]),
            band_headline: Array4::zeros((levels, bands, kept.len(), plan.years)),
            swe_days,
            operated: plan.operation.map(|operation| {
                let kept: Vec<&Operated> = kept.iter().map(|kept| &kept.operated).collect();
                OperatedSeasons::gather(operation, plan.levels(), &kept)
            }),
        };
        for (realization, kept) in kept.iter().enumerate() {
            let mut bands = seasons.band_periods.index_axis_mut(Axis(3), realization);
            bands.iter_mut().zip(&kept.band_periods).for_each(|(place, value)| *place = *value);
            let mut headline = seasons.band_headline.index_axis_mut(Axis(2), realization);
            headline.iter_mut().zip(&kept.band_headline).for_each(|(place, value)| *place = *value);
            for (sum, [none, not_gone]) in seasons.band_undefined.iter_mut().zip(&kept.band_undefined) {
                sum[0] += none;
                sum[1] += not_gone;
            }
        }
        seasons
    }
}
