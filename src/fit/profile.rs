//! Profiles: how much a fit loses as one parameter is held away from its best, the others refined beside it.

use super::refine::refine;
use super::search::{Asked, Found};
use super::space::Space;
use serde::Serialize;

/// Values of each parameter, spread evenly over its bounds.
const POINTS: usize = 9;
/// A parameter whose profile never falls by more than this, in units of the objective, is not identified by the snow.
pub const FLAT_PROFILE: f64 = 0.01;

/// The objective over the bounds of one parameter.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Profile {
    /// The scenario's key.
    pub key: &'static str,
    /// The value at which the parameter is held, and the highest objective found there.
    pub points: Vec<(f64, f64)>,
    /// Highest less lowest objective of the profile and the best found anywhere.
    pub fall: f64,
    /// Whether it falls by more than 0.01 somewhere within the bounds.
    pub is_identified: bool,
}

/// Profiles of all parameters about the best point; at each held value the other parameters begin at the best and are refined
/// by the climb, not searched for anew.
///
/// # Errors
/// What `values` says, which is asked for points of the whole space.
pub(super) fn profiles<E>(
    space: &Space,
    best: &Found,
    mut values: impl FnMut(&[Vec<f64>]) -> Result<Vec<f64>, E>,
) -> Result<Vec<Profile>, E> {
    let held: Vec<(usize, f64)> = (0..space.searched().len())
        .flat_map(|place| (0..POINTS).map(move |at| (place, at as f64 / (POINTS - 1) as f64)))
        .collect();
    let whole = |searcher: usize, others: &[f64]| {
        let (place, share) = held[searcher];
        let mut point = others.to_vec();
        point.insert(place, share);
        point
    };
    let mut others_of = Vec::with_capacity(held.len());
    for (place, _) in &held {
        let mut others = best.point.clone();
        others.remove(*place);
        others_of.push(others);
    }
    let points: Vec<Vec<f64>> = others_of.iter().enumerate().map(|(at, others)| whole(at, others)).collect();
    let first = values(&points)?;
    let mut found: Vec<Found> =
        others_of.into_iter().zip(first).map(|(point, value)| Found { point, value }).collect();
    refine(&mut found, |asked: &[Asked]| {
        let points: Vec<Vec<f64>> = asked.iter().map(|asked| whole(asked.searcher, &asked.point)).collect();
        values(&points)
    })?;
    let profile = |(place, found): (usize, &[Found])| {
        let bounded = &space.searched()[place];
        let shares = held[place * POINTS..].iter().map(|(_, share)| bounded.value(*share));
        let points: Vec<(f64, f64)> = shares.zip(found.iter().map(|found| found.value)).collect();
        let highest = points.iter().fold(best.value, |highest, (_, value)| highest.max(*value));
        let fall = points.iter().map(|(_, value)| highest - value).fold(0.0, f64::max);
        Profile { key: bounded.parameter.key, points, fall, is_identified: fall > FLAT_PROFILE }
    };
    Ok(found.chunks(POINTS).enumerate().map(profile).collect())
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::basin::{GradientForm, PrecipitationGradient, TemperatureGradient};
    use crate::fit::{Bounded, PARAMETERS, Parameters};
    use crate::snow::{DegreeRule, GaugeMultiplier, SnowParams};

    /// By hand: the value falls by the square of the first coordinate's distance from 0.5 and does not hang on the second, and the third
    /// makes up for the first: `-(x + z - 1)^2` is 0 along the whole profile of either.
    #[test]
    fn what_changes_nothing_or_is_made_up_for_is_flat() {
        let stated = Parameters {
            snow: SnowParams::defaults(DegreeRule::Mean, false),
            gauge: GaugeMultiplier::NONE,
            temperature: TemperatureGradient::constant(-6.0),
            precipitation: PrecipitationGradient::new(0.0, None, GradientForm::Linear),
        };
        let searched: Vec<Bounded> =
            PARAMETERS.iter().filter(|p| p.get(&stated).is_some()).take(3).map(Bounded::usual).collect();
        let space = Space::new(&stated, &searched);
        let best = Found { point: vec![0.5, 0.3, 0.5], value: 0.0 };
        let alone = |points: &[Vec<f64>]| -> Result<Vec<f64>, ()> {
            Ok(points.iter().map(|point| -(point[0] - 0.5) * (point[0] - 0.5)).collect())
        };
        let of_alone = profiles(&space, &best, alone).expect("values are always given");
        let identified: Vec<bool> = of_alone.iter().map(|profile| profile.is_identified).collect();
        assert_eq!(identified, [true, false, false]);
        assert!((of_alone[0].fall - 0.25).abs() < 1e-12);
        let together = |points: &[Vec<f64>]| -> Result<Vec<f64>, ()> {
            Ok(points
                .iter()
                .map(|point| -(point[0] + point[2] - 1.0) * (point[0] + point[2] - 1.0))
                .collect())
        };
        let of_both = profiles(&space, &best, together).expect("values are always given");
        assert!(of_both.iter().all(|profile| !profile.is_identified));
    }
}
