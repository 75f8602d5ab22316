//! Modelled inflow of the record's own years against observed inflow: how near it comes, and routing that comes nearer.
//!
//! [`days`] routes the record as it was observed, without warming; [`scores`] says how near that comes to what was observed; and
//! [`search`] looks for routing that comes nearer, on half of the years and judged on the other half, then on all of them.

mod days;
mod scores;
mod search;

#[cfg(test)]
mod tests;

pub use days::{InflowRecord, InflowYear};
pub use scores::{InflowScores, VolumeScores};

use super::splits::Split;
use crate::inflow::Routing;
use rayon::prelude::*;
use serde::Serialize;

/// How near modelled inflow comes to observed inflow, and what was fitted for it.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct InflowSkill {
    /// Water years in use.
    pub years_in_use: usize,
    /// The routing in force: fitted to all years with readings where a fit was asked for and possible, else as stated.
    pub routing: Routing,
    /// How it did over all of them, which a fit has seen.
    pub scores: InflowScores,
    /// The fit; none where none was asked for, or observed inflow never changes.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub fit: Option<InflowFit>,
}

/// A fit of the routing.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct InflowFit {
    /// The routing as stated, from which the search began.
    pub stated: Routing,
    /// How it did over all years.
    pub of_stated: InflowScores,
    /// Fitted on half of the years each and judged on the others; none where a half has too few years.
    #[serde(skip_serializing_if = "Vec::is_empty")]
    pub halves: Vec<InflowHalf>,
}

/// Routing that was fitted on half of the years with readings, and how it did on the other half.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct InflowHalf {
    /// The years that it was fitted on, of those with readings in their order.
    pub fitted_on: Split,
    /// What was found.
    pub routing: Routing,
    /// How it did on these years.
    pub seen: InflowScores,
    /// How it did on the others.
    pub not_seen: InflowScores,
    /// How the routing as stated did on the others.
    pub of_stated: InflowScores,
}

impl InflowSkill {
    /// The lowest skill above the day-of-year mean that there is to show: of years that no fit had seen, where there are such; none where
    /// too few years have observed inflow on the same day.
    pub fn lowest_above_mean(&self) -> Option<f64> {
        let halves = self.fit.as_ref().map_or(&[][..], |fit| &fit.halves);
        let not_seen = halves.iter().map(|half| half.not_seen.skill_above_day_of_year_mean);
        let all = if halves.is_empty() {
            vec![self.scores.skill_above_day_of_year_mean]
        } else {
            not_seen.collect()
        };
        all.into_iter().flatten().reduce(f64::min)
    }
}

/// A half of the years has at least so many with readings, or it is no half to judge by.
const LEAST_YEARS_OF_A_HALF: usize = 2;

/// Holds the routing against observed inflow, and looks for better where it is to be fitted; none where no day of the record has
/// observed inflow. Two of the same record, routing and seed are the same to the bit.
pub fn inflow_skill(record: &InflowRecord, stated: &Routing, fits: bool, seed: u64) -> Option<InflowSkill> {
    let observed = record.observed_years();
    if !observed.contains(&true) {
        return None;
    }
    let of_stated = record.scores(stated, &observed);
    let years_in_use = record.years.len();
    let of_all = fits.then(|| search::fitted(record, stated, &observed, seed)).flatten();
    let Some(routing) = of_all else {
        return Some(InflowSkill { years_in_use, routing: *stated, scores: of_stated, fit: None });
    };
    let half = |(fitted_on, seen, others): (Split, Vec<bool>, Vec<bool>)| {
        let routing = search::fitted(record, stated, &seen, seed)?;
        Some(InflowHalf {
            fitted_on,
            routing,
            seen: record.scores(&routing, &seen),
            not_seen: record.scores(&routing, &others),
            of_stated: record.scores(stated, &others),
        })
    };
    let halves: Vec<Option<InflowHalf>> = halves(&observed).into_par_iter().map(half).collect();
    let halves = halves.into_iter().flatten().collect();
    let fit = Some(InflowFit { stated: *stated, of_stated, halves });
    Some(InflowSkill { years_in_use, routing, scores: record.scores(&routing, &observed), fit })
}

/// Every other year with readings, from the first and from the second, each with the others; none where they are too few.
fn halves(observed: &[bool]) -> Vec<(Split, Vec<bool>, Vec<bool>)> {
    let in_order: Vec<usize> = (0..observed.len()).filter(|year| observed[*year]).collect();
    if in_order.len() < 2 * LEAST_YEARS_OF_A_HALF {
        return Vec::new();
    }
    let every_other = |from: usize| {
        let mut is_in = vec![false; observed.len()];
        in_order.iter().skip(from).step_by(2).for_each(|year| is_in[*year] = true);
        is_in
    };
    let (odd, even) = (every_other(0), every_other(1));
    vec![(Split::Odd, odd.clone(), even.clone()), (Split::Even, even, odd)]
}
