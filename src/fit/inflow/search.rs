//! The search for routing that comes nearest to observed inflow.

use super::super::refine::refine;
use super::super::scores::kling_gupta;
use super::super::search::{Asked, Search, search};
use super::days::InflowRecord;
use crate::inflow::{LONGEST_RECESSION_DAYS, Routing, SlowStore};
use std::convert::Infallible;

/// Points that are tried before the best of them is refined.
const EVALUATIONS: usize = 60;
/// The quick store is searched for up to so many days, or to what is stated where that is more.
const QUICK_DAYS: f64 = 100.0;
/// The slow store keeps water at least so many days longer than the quick one.
const LEAST_APART_DAYS: f64 = 0.5;

/// The routing of the highest Kling-Gupta efficiency (2009) of daily inflow over some of the years; none where observed inflow has
/// none, as where it never changes.
///
/// The search begins at the stated routing. What is maximized is `-(1 - efficiency)^2`, which has its top at the same place, and a
/// round one: the efficiency itself has a crease where mean and spread are right, along which no parabola finds its way.
pub(super) fn fitted(
    record: &InflowRecord,
    stated: &Routing,
    is_seen: &[bool],
    seed: u64,
) -> Option<Routing> {
    kling_gupta(&record.pairs(&record.routed(stated), is_seen))?;
    let values = |asked: &[Asked]| {
        let value = |asked: &Asked| {
            let modelled = record.routed(&routing_at(stated, &asked.point));
            let efficiency = kling_gupta(&record.pairs(&modelled, is_seen)).map(|parts| parts.efficiency);
            efficiency.map_or(f64::NEG_INFINITY, |efficiency| -(1.0 - efficiency) * (1.0 - efficiency))
        };
        Ok::<_, Infallible>(asked.iter().map(value).collect())
    };
    let start = point_of(stated);
    let plan = Search { seed, dimensions: start.len(), starts: vec![Some(start)], evaluations: EVALUATIONS };
    let Ok(mut found) = search(&plan, values);
    let Ok(()) = refine(&mut found, values);
    found.first().map(|best| routing_at(stated, &best.point))
}

/// The stated routing as a point of the unit cube: the largest month's share that runs off, to which the others keep their ratios;
/// the quick store's days, and, of a slow store, its share and how many days it keeps water longer, days by their logarithm.
fn point_of(stated: &Routing) -> Vec<f64> {
    let quick = logarithmic(stated.recession_days, quick_most(stated));
    let mut point = vec![largest(stated), quick];
    if let Some(slow) = stated.slow {
        let apart = slow.recession_days - stated.recession_days - LEAST_APART_DAYS;
        point.extend([slow.share, logarithmic(apart, apart_most(stated.recession_days))]);
    }
    point
}

/// The routing at a point.
fn routing_at(stated: &Routing, point: &[f64]) -> Routing {
    let mut routing = *stated;
    let largest = largest(stated);
    if let Some(largest_there) = point.first().filter(|_| largest > 0.0) {
        routing.runoff_fraction = stated.runoff_fraction.map(|month| month / largest * largest_there);
    }
    if let Some(quick) = point.get(1) {
        routing.recession_days = days(*quick, quick_most(stated));
    }
    if let Some([share, apart]) = point.get(2..4) {
        let quick = routing.recession_days;
        let recession_days =
            (quick + LEAST_APART_DAYS + days(*apart, apart_most(quick))).min(LONGEST_RECESSION_DAYS);
        routing.slow = Some(SlowStore { share: *share, recession_days });
    }
    routing
}

fn largest(routing: &Routing) -> f64 {
    routing.runoff_fraction.iter().copied().fold(0.0, f64::max)
}

fn quick_most(stated: &Routing) -> f64 {
    stated.recession_days.max(QUICK_DAYS)
}

fn apart_most(quick: f64) -> f64 {
    (LONGEST_RECESSION_DAYS - quick - LEAST_APART_DAYS).max(LEAST_APART_DAYS)
}

/// Days as a share of `ln(1 + most)`.
fn logarithmic(days: f64, most: f64) -> f64 {
    (libm::log1p(days.max(0.0)) / libm::log1p(most)).clamp(0.0, 1.0)
}

/// Its inverse.
fn days(share: f64, most: f64) -> f64 {
    libm::expm1(share * libm::log1p(most))
}
