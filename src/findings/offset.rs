//! How many degrees of warming an increase of precipitation makes up for.
//!
//! Published for a cold basin as 2.7 to 3.5 degC for 20 % more precipitation, and less where winters are warmer (Rasouli et al.,
//! preprint).

use super::crossing::{Crossing, CrossingRange, range_of};
use super::surface::Change;
use super::surface_nodes::Nodes;
use serde::Serialize;

/// The increase that is asked about, percent.
pub(super) const INCREASE_PCT: f64 = 20.0;
/// Steps into which the warmings of the grid are parted about the one that is looked for.
const STEPS: usize = 9;

/// The warming at which so much more precipitation just holds the headline measure at its reference.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Offset {
    /// The increase, percent.
    pub precipitation_change_pct: f64,
    /// The warming, as the study's levels count it; linear between runs at ninths of a step of the surface's grid.
    pub warming: Crossing,
    /// Its Monte Carlo range: 5-95 % over resampled realizations, each by the same runs.
    pub range: Option<CrossingRange>,
}

fn increased(warming_c: f64) -> Change {
    Change { warming_c, precipitation_change_pct: INCREASE_PCT }
}

/// Between which warmings of the grid the increase stops making up, parted into steps: what has to be run to know it better. Empty
/// where it does nowhere.
pub(super) fn between(nodes: &Nodes, warmings_c: &[f64], reference_c: f64) -> Vec<Change> {
    let warmings_c: Vec<f64> = warmings_c.iter().copied().filter(|of| *of >= reference_c).collect();
    let reference = nodes.median(Change { warming_c: reference_c, precipitation_change_pct: 0.0 });
    let is_made_up =
        |warming_c: f64| nodes.median(increased(warming_c)).zip(reference).map(|(mm, of)| mm >= of);
    let passed = warmings_c
        .windows(2)
        .find(|ends| [0, 1].map(|end| is_made_up(ends[end])) == [Some(true), Some(false)]);
    let Some([low, high]) = passed.and_then(|ends| ends.first_chunk::<2>()) else { return Vec::new() };
    (1..STEPS).map(|step| increased(low + (high - low) * step as f64 / STEPS as f64)).collect()
}

impl Offset {
    /// Reads every run with the increase, upwards from the reference; nothing where none is warmer.
    pub(super) fn of(nodes: &Nodes, warmings_c: &[f64], reference_c: f64) -> Option<Self> {
        let finer = between(nodes, warmings_c, reference_c);
        let mut column_c: Vec<f64> = warmings_c.iter().copied().filter(|of| *of >= reference_c).collect();
        column_c.extend(finer.iter().map(|change| change.warming_c));
        column_c.sort_by(f64::total_cmp);
        if column_c.len() < 2 {
            return None;
        }
        let reference = Change { warming_c: reference_c, precipitation_change_pct: 0.0 };
        let crossing = |median: &dyn Fn(Change) -> Option<f64>| {
            let excess = |warming_c: &f64| Some(median(increased(*warming_c))? - median(reference)?);
            column_c
                .iter()
                .map(excess)
                .collect::<Option<Vec<f64>>>()
                .map_or(Crossing::Unknown, |excess| first_below(&column_c, &excess))
        };
        let resampled: Vec<(Change, Vec<f64>)> = column_c
            .iter()
            .map(|warming_c| increased(*warming_c))
            .chain([reference])
            .filter_map(|change| Some((change, nodes.resampled_medians(change)?)))
            .collect();
        let resamples = resampled.first().map_or(0, |(_, medians)| medians.len());
        let of_resample = |resample: usize| {
            crossing(&|change| {
                let (_, medians) = resampled.iter().find(|(of, _)| *of == change)?;
                Some(medians[resample])
            })
        };
        Some(Self {
            precipitation_change_pct: INCREASE_PCT,
            warming: crossing(&|change| nodes.median(change)),
            range: range_of((0..resamples).map(of_resample)),
        })
    }
}

/// Where an excess first falls below 0, by straight lines; unknown where it lies below from the first on, or is no number.
fn first_below(warmings_c: &[f64], excess: &[f64]) -> Crossing {
    if excess.iter().any(|excess| excess.is_nan()) || excess.first().is_none_or(|first| *first < 0.0) {
        return Crossing::Unknown;
    }
    let ends = warmings_c.windows(2).zip(excess.windows(2));
    let found = ends.into_iter().find(|(_, excess)| excess[1] < 0.0).map(|(warmings_c, excess)| {
        warmings_c[0] + (warmings_c[1] - warmings_c[0]) * excess[0] / (excess[0] - excess[1])
    });
    match (found, warmings_c.last()) {
        (Some(level_c), _) => Crossing::At { level_c, until_c: None },
        (None, Some(up_to_c)) => Crossing::NotReached { up_to_c: *up_to_c },
        (None, None) => Crossing::Unknown,
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::ensemble::NodeRuns;
    use crate::season::Measure;
    use ndarray::Array3;

    /// Ten realizations of 400 to 490 mm that lose so much at a warming, and gain with precipitation.
    fn nodes(changes: &[Change], loss: impl Fn(f64) -> f64) -> Nodes {
        let measure = Measure::april_swe();
        let value = |change: &Change, at: usize| {
            (400.0 + 10.0 * at as f64)
                * (1.0 - loss(change.warming_c))
                * (1.0 + change.precipitation_change_pct / 100.0)
        };
        let runs = NodeRuns {
            measures: vec![measure],
            periods: Array3::from_shape_fn((changes.len(), 1, 10), |(node, _, at)| value(&changes[node], at)),
            survey_swe_mm: Array3::zeros((changes.len(), 10, 0)),
            band_swe_mm: Array3::zeros((changes.len(), 0, 10)),
        };
        Nodes::new(changes.to_vec(), runs, 1)
    }

    fn found(warmings_c: &[f64], loss: impl Fn(f64) -> f64) -> Option<Offset> {
        let reference = Change { warming_c: 0.0, precipitation_change_pct: 0.0 };
        let mut changes = vec![reference];
        changes.extend(warmings_c.iter().map(|warming_c| increased(*warming_c)));
        let more = between(&nodes(&changes, &loss), warmings_c, 0.0);
        assert!(more.is_empty() || more.len() == STEPS - 1);
        changes.extend(more);
        Offset::of(&nodes(&changes, &loss), warmings_c, 0.0)
    }

    /// By hand: of a loss w^2/24, 1.2 (1 - w^2/24) is 1 at w = 2; straight lines over ninths of 4 degC miss it by less than
    /// (4/9)^2/8 * 2/(2 * 2), 0.013 degC, where one line over all 4 would give 1.2/1.8 of 4. All realizations are alike in it, so the range
    /// is that point.
    #[test]
    fn an_increase_makes_up_for_the_warming_that_needs_it() {
        for warmings_c in [vec![0.0, 4.0], vec![-1.0, 0.0, 1.0, 3.0, 4.0]] {
            let offset = found(&warmings_c, |warming_c| warming_c * warming_c / 24.0).unwrap();
            let Crossing::At { level_c, .. } = offset.warming else { panic!("{offset:?}") };
            assert!((level_c - 2.0).abs() < 0.013, "{level_c}");
            let range = offset.range.unwrap();
            assert!([range.q05_c, range.q95_c].iter().all(|end| (end.unwrap() - level_c).abs() < 1e-9));
        }
    }

    #[test]
    fn an_increase_may_make_up_for_all_or_there_is_nothing_warmer() {
        let cold = found(&[0.0, 1.0, 2.0], |warming_c| warming_c / 100.0).unwrap();
        assert_eq!(cold.warming, Crossing::NotReached { up_to_c: 2.0 });
        assert_eq!(found(&[-2.0, 0.0], |_| 0.0), None);
    }
}
