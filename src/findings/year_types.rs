//! Types of years: how many fall into each fifth of the reference, and where the fifths would have to be drawn anew.
//!
//! Allocations often go by the type of a year. With warming the same limits sort more years into the dry types; limits that keep
//! each type as frequent as it was mean less water under the same name (Null & Viers 2013 compare the two).

use super::ranged::{Ranged, bound_of_certain};
use super::resample::{Ranked, Resamples};
use serde::Serialize;

/// Quantiles of the reference's single years at which one type ends and the next begins.
pub const TYPE_LIMITS: [f64; 4] = [0.2, 0.4, 0.6, 0.8];
/// Types, from the driest.
pub const TYPES: usize = TYPE_LIMITS.len() + 1;

/// The types of one level's years.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct YearTypes {
    /// The level, degC.
    pub level_c: f64,
    /// Whether it is the reference, whose limits are those of all levels.
    pub is_reference: bool,
    /// Share of years in each type by the reference's limits, from the driest, 0 to 1: a type holds what is below its upper limit
    /// and not below its lower one.
    pub shares: [Ranged; TYPES],
    /// Where no year falls into a type, or all do, the one-sided 95 % bound on the share.
    pub bounds: [Option<f64>; TYPES],
    /// The limits that would keep each type as frequent as at the reference: the level's own quantiles, in the unit of the
    /// measure.
    pub kept_limits: [Ranged; TYPE_LIMITS.len()],
}

/// Sorts single years, a ranked list a level; nothing where one is no number. The reference's limits are those of the same
/// resample.
pub(super) fn year_types(
    years: &[Ranked],
    levels_c: &[f64],
    reference: usize,
    realizations: usize,
    resamples: &Resamples,
) -> Option<Vec<YearTypes>> {
    let once = vec![1; realizations];
    let found = sorted_into_types(years, reference, &once)?;
    let resampled = resamples.each(|weights| sorted_into_types(years, reference, weights));
    let ranged = |number: &dyn Fn(&[Level]) -> f64| {
        Ranged::new(number(&found), resampled.iter().map(|all| all.as_ref().map(|all| number(all))))
    };
    let level = |(level, level_c): (usize, &f64)| YearTypes {
        level_c: *level_c,
        is_reference: level == reference,
        shares: std::array::from_fn(|at| ranged(&|all| all[level].shares[at])),
        bounds: std::array::from_fn(|at| bound_of_certain(found[level].shares[at], realizations)),
        kept_limits: std::array::from_fn(|at| ranged(&|all| all[level].limits[at])),
    };
    Some(levels_c.iter().enumerate().map(level).collect())
}

struct Level {
    shares: [f64; TYPES],
    limits: [f64; TYPE_LIMITS.len()],
}

fn sorted_into_types(years: &[Ranked], reference: usize, weights: &[u32]) -> Option<Vec<Level>> {
    let fixed = years[reference].quantiles(weights, TYPE_LIMITS)?;
    // Of years that are alike, such as many without any outflow, a fifth cannot be told from the next.
    if fixed.windows(2).any(|limits| limits[0] >= limits[1]) {
        return None;
    }
    let of_level = |years: &Ranked| {
        let limits = years.quantiles(weights, TYPE_LIMITS)?;
        let mut counts = [0.0; TYPES];
        for (value, realization) in years.values() {
            counts[fixed.partition_point(|limit| limit <= value)] += f64::from(weights[*realization]);
        }
        let all: f64 = counts.iter().sum();
        let is_known = all > 0.0 && limits.iter().chain(&fixed).all(|limit| limit.is_finite());
        is_known.then(|| Level { shares: counts.map(|count| count / all), limits })
    };
    years.iter().map(of_level).collect()
}

#[cfg(test)]
mod tests {
    use super::*;

    fn ranked(values: impl Iterator<Item = f64>) -> Ranked {
        Ranked::new(values.enumerate().map(|(at, value)| (value, at / 10)))
    }

    /// By hand: 100 years of 1 to 100 have a fifth in each type; 30 less leaves 1 to 70 above 0, so the driest fifth holds what was
    /// below its limit of 20.4 (type 8: rank 100*0.2 + 0.4) and is now: 50 years; then 20, 20, 10 and none. Half as much keeps
    /// the fifths with limits half as high.
    #[test]
    fn years_move_into_dry_types_by_fixed_limits() {
        let reference = || (1..=100).map(f64::from);
        let years = [
            ranked(reference()),
            ranked(reference().map(|mm| mm - 30.0)),
            ranked(reference().map(|mm| mm / 2.0)),
        ];
        let found = year_types(&years, &[0.0, 1.0, 2.0], 0, 10, &Resamples::new(1, 10)).unwrap();
        let shares = |level: usize| found[level].shares.map(|share| share.value);
        assert_eq!(shares(0), [0.2; 5]);
        assert_eq!(shares(1), [0.5, 0.2, 0.2, 0.1, 0.0]);
        let limits = |level: usize| found[level].kept_limits.map(|limit| limit.value);
        for (kept, own) in limits(2).iter().zip(limits(0)) {
            assert!((kept - own / 2.0).abs() < 1e-12, "{kept} of {own}");
        }
        assert!((limits(0)[0] - 20.4).abs() < 1e-9);
        // With 45 years of 0 the limits at 20 and at 40 % are both 0.
        let alike = ranked((1..=100).map(|at| if at <= 45 { 0.0 } else { f64::from(at) }));
        assert!(year_types(&[alike], &[0.0], 0, 10, &Resamples::new(1, 10)).is_none());
        assert_eq!(found[1].bounds.map(|bound| bound.is_some()), [false, false, false, false, true]);
    }
}
