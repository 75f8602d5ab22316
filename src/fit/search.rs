//! The search: dynamically dimensioned search (Tolson & Shoemaker 2007), many searchers in lock-step.
//!
//! A search by itself is sequential; here a step asks every searcher for one point, so that all points of a step can be
//! tried side by side. What a searcher does hangs on its own stream of random numbers and its own values alone.

use crate::normal::score_of;
use crate::perturb::search_stream;
use rand::RngExt;
use rand::rngs::ChaCha8Rng;

/// A change has this standard deviation, a share of the parameter's range (Tolson & Shoemaker 2007).
const STEP: f64 = 0.2;

/// A search over the unit cube, each searcher with points and values of its own.
#[derive(Debug, Clone, PartialEq)]
pub struct Search {
    /// Seed of the searchers' streams.
    pub seed: u64,
    /// Where each searcher begins; none begins at a point drawn by its stream.
    pub starts: Vec<Option<Vec<f64>>>,
    /// Parameters.
    pub dimensions: usize,
    /// Points that each searcher tries.
    pub evaluations: usize,
}

/// The best that a searcher has found.
#[derive(Debug, Clone, PartialEq)]
pub struct Found {
    /// Where, in the unit cube.
    pub point: Vec<f64>,
    /// Its value.
    pub value: f64,
}

/// A point to be tried, and whose it is.
#[derive(Debug, Clone, PartialEq)]
pub struct Asked {
    /// The searcher, from 0.
    pub searcher: usize,
    /// The point.
    pub point: Vec<f64>,
}

/// Searches for the highest value. A point's value must hang on the point and its searcher alone.
///
/// In step i of m, a searcher changes each parameter of its best point with a chance of `1 - ln(i)/ln(m)`, at least one, by a
/// normal number of 0.2 of the range, turned back at the bounds; it moves where the value is no lower.
///
/// # Errors
/// What `values` says.
pub fn search<E>(
    plan: &Search,
    mut values: impl FnMut(&[Asked]) -> Result<Vec<f64>, E>,
) -> Result<Vec<Found>, E> {
    let mut streams: Vec<ChaCha8Rng> =
        (0..plan.starts.len()).map(|searcher| search_stream(plan.seed, searcher)).collect();
    let first = streams.iter_mut().zip(&plan.starts).map(|(random, start)| {
        start.clone().unwrap_or_else(|| (0..plan.dimensions).map(|_| random.random::<f64>()).collect())
    });
    let mut asked: Vec<Asked> =
        first.enumerate().map(|(searcher, point)| Asked { searcher, point }).collect();
    let of_first = values(&asked)?;
    let mut found: Vec<Found> = asked
        .iter()
        .zip(of_first)
        .map(|(asked, value)| Found { point: asked.point.clone(), value })
        .collect();
    for step in 1..plan.evaluations {
        let chance = chance_of_change(step, plan.evaluations);
        for ((asked, found), random) in asked.iter_mut().zip(&found).zip(&mut streams) {
            asked.point = changed(&found.point, chance, random);
        }
        for ((found, asked), value) in found.iter_mut().zip(&asked).zip(values(&asked)?) {
            if value >= found.value {
                *found = Found { point: asked.point.clone(), value };
            }
        }
    }
    Ok(found)
}

/// The chance with which a parameter changes in a step, from 1, of so many.
fn chance_of_change(step: usize, steps: usize) -> f64 {
    1.0 - libm::log(step as f64) / libm::log(steps as f64)
}

fn changed(point: &[f64], chance: f64, random: &mut ChaCha8Rng) -> Vec<f64> {
    let mut is_changed: Vec<bool> = point.iter().map(|_| random.random::<f64>() < chance).collect();
    if !is_changed.contains(&true) {
        let only = random.random_range(0..point.len());
        is_changed[only] = true;
    }
    let values = point.iter().zip(is_changed);
    values
        .map(
            |(value, is_changed)| {
                if is_changed { turned_back(value + STEP * normal(random)) } else { *value }
            },
        )
        .collect()
}

/// A standard normal number: the score of a share that is neither 0 nor 1.
fn normal(random: &mut ChaCha8Rng) -> f64 {
    score_of(random.random::<f64>().clamp(1e-12, 1.0 - 1e-12))
}

/// Mirrored at the bound that it passed; at the bound itself where it then passes the other.
fn turned_back(value: f64) -> f64 {
    if value < 0.0 {
        let mirrored = -value;
        if mirrored > 1.0 { 0.0 } else { mirrored }
    } else if value > 1.0 {
        let mirrored = 2.0 - value;
        if mirrored < 0.0 { 1.0 } else { mirrored }
    } else {
        value
    }
}

#[cfg(test)]
mod tests;
