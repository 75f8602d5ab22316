//! How far other winters might have led a fit: ranges of its parameters, and sets of them that lie apart within these.
//!
//! The fit is made again on winters drawn anew. Few winters vary too little among themselves, and as many parameters were bent
//! to them: so the range of these fits is drawn out from the best, as Student's t is wider than the normal distribution.

use super::dispersed::dispersed;
use super::refine::refine;
use super::search::{Asked, Found};
use super::space::{Space, Value};
use super::student::student_score_of;
use crate::normal::score_of;
use serde::Serialize;

/// Fits to winters drawn anew: with 99, the fifth from either end parts 5 % of what there might be from the rest.
pub(super) const RESAMPLES: usize = 99;
/// Of a range: so much lies below its lower end, and as much above its upper.
const TAIL: f64 = 0.05;

/// What is known of a fit's uncertainty.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Uncertainty {
    /// Fits to winters drawn anew.
    pub resamples: usize,
    /// Of each parameter searched for.
    pub ranges: Vec<ParameterRange>,
    /// The fit on all winters, and fits to winters drawn anew that lie within all ranges and far from each other.
    pub sets: Vec<ParameterSet>,
}

/// Where a parameter lies, 90 %.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct ParameterRange {
    /// The scenario's key.
    pub key: &'static str,
    /// Its lower end.
    pub low: f64,
    /// Its upper end.
    pub high: f64,
    /// Whether an end is a bound of the search: the range may reach farther.
    pub is_at_bound: bool,
}

/// A set of parameters.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct ParameterSet {
    /// Those searched for.
    pub values: Vec<Value>,
    /// The objective on all winters.
    pub objective: f64,
}

/// Fits to every resample of the winters from the best on all of them, and takes ranges and up to `sets` sets from it.
/// `values` is asked with all winters as searcher 0, and the resamples as those behind.
///
/// # Errors
/// What `values` says.
pub(super) fn uncertainty<E>(
    space: &Space,
    best: &Found,
    winters: usize,
    sets: usize,
    mut values: impl FnMut(&[Asked]) -> Result<Vec<f64>, E>,
) -> Result<Uncertainty, E> {
    let of_resample = |asked: &Asked| Asked { searcher: asked.searcher + 1, point: asked.point.clone() };
    let starts: Vec<Asked> =
        (0..RESAMPLES).map(|resample| Asked { searcher: resample + 1, point: best.point.clone() }).collect();
    let first = values(&starts)?;
    let found = starts.into_iter().zip(first).map(|(asked, value)| Found { point: asked.point, value });
    let mut found: Vec<Found> = found.collect();
    refine(&mut found, |asked| values(&asked.iter().map(of_resample).collect::<Vec<_>>()))?;
    // A resample whose snow never changes has no objective.
    found.retain(|found| found.value.is_finite());

    let drawn_out = drawn_out(winters, space.searched().len());
    let ends: Vec<[f64; 2]> =
        (0..best.point.len()).map(|at| ends(&found, at, best.point[at], drawn_out)).collect();
    let is_within =
        |point: &[f64]| point.iter().zip(&ends).all(|(x, [low, high])| (*low..=*high).contains(x));
    let within = found.into_iter().map(|found| found.point).filter(|point| is_within(point));
    let points: Vec<Vec<f64>> = std::iter::once(best.point.clone()).chain(within).collect();
    let taken = dispersed(&points, sets);
    let asked: Vec<Asked> =
        taken.iter().map(|at| Asked { searcher: 0, point: points[*at].clone() }).collect();
    let objectives = values(&asked)?;
    let set = |(asked, objective): (Asked, f64)| ParameterSet {
        values: space.values(&space.at(&asked.point)),
        objective,
    };
    let range = |(bounded, [low, high]): (&super::Bounded, &[f64; 2])| ParameterRange {
        key: bounded.parameter.key,
        low: bounded.value(*low),
        high: bounded.value(*high),
        is_at_bound: *low <= 0.0 || *high >= 1.0,
    };
    Ok(Uncertainty {
        resamples: RESAMPLES,
        ranges: space.searched().iter().zip(&ends).map(range).collect(),
        sets: asked.into_iter().zip(objectives).map(set).collect(),
    })
}

/// How many times as far from the best as those of the resampled fits the ends of a range lie: what Student's t, with as
/// many degrees of freedom as winters more than parameters, is wider than a normal distribution, and `sqrt(n / (n - p))` for
/// winters to which parameters were bent.
fn drawn_out(winters: usize, parameters: usize) -> f64 {
    let more = winters.saturating_sub(parameters).max(1);
    let bent = (winters as f64 / more as f64).sqrt();
    bent * student_score_of(1.0 - TAIL, more) / score_of(1.0 - TAIL)
}

/// The ends of a parameter's range, as shares of its range. The best lies between them, also where nearly all resamples lie on
/// one side of it.
fn ends(found: &[Found], at: usize, best: f64, drawn_out: f64) -> [f64; 2] {
    let mut shares: Vec<f64> = found.iter().map(|found| found.point[at]).collect();
    shares.sort_by(f64::total_cmp);
    let beyond = (TAIL * (shares.len() + 1) as f64).round().max(1.0) as usize - 1;
    let of_resamples = [shares.get(beyond), shares.iter().rev().nth(beyond)];
    let [low, high] =
        of_resamples.map(|end| end.map_or(best, |end| (best + drawn_out * (end - best)).clamp(0.0, 1.0)));
    [low.min(best), high.max(best)]
}

#[cfg(test)]
mod tests;
