//! What other rules would change, and how much of what warming takes they would bring back.

use super::super::distribution::Distribution;
use super::super::quantile::{quantile, sorted};
use super::super::ranged::Ranged;
use super::super::resample::{Ranked, Resamples};
use super::super::shift::Shift;
use super::super::yardstick::Levels;
use crate::ensemble::OperatedSeasons;
use crate::operation::{Better, Change};
use crate::season::{Kind, Measure};
use serde::Serialize;

/// A set of rules.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct RuleChange {
    /// What is changed.
    pub change: Change,
    /// What it comes to.
    pub measures: Vec<ChangedMeasure>,
}

/// One measure under a set of rules.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct ChangedMeasure {
    /// The measure.
    pub measure: Measure,
    /// One entry a level.
    pub levels: Vec<ChangedLevel>,
}

/// The same at one level.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct ChangedLevel {
    /// The level, degC.
    pub level_c: f64,
    /// Over realizations.
    pub periods: Distribution,
    /// Paired change from the rules as stated, at the same level; none of those.
    pub shift: Option<Shift>,
    /// The median of these changes over the median of what warming alone changes from the level to the reference: 1 where the change
    /// brings back all that the warming takes. None where warming takes next to nothing or makes it better, and at the reference.
    pub brought_back: Option<Ranged>,
}

/// A warming that changes a measure by less changes next to nothing: a tenth of a percent, a tenth of a day, and of a volume a
/// hundredth of what it is at the reference, but at least 1000 m3.
fn least_change(kind: Kind, at_reference: f64) -> f64 {
    match kind {
        Kind::Share => 0.001,
        Kind::VolumeHm3 => (0.01 * at_reference.abs()).max(0.001),
        _ => 0.1,
    }
}

pub(super) fn rule_changes(
    operated: &OperatedSeasons,
    levels: Levels<'_>,
    resamples: &Resamples,
) -> Vec<RuleChange> {
    let of = |level: usize, change: usize, measure: usize| -> Vec<f64> {
        (0..operated.changed.dim().3)
            .map(|realization| operated.changed[[level, change, measure, realization]])
            .collect()
    };
    let of_level = |level: usize, change: usize, at: usize| {
        let (measure, better) = &operated.of_changes[at];
        let (values, as_stated) = (of(level, change, at), of(level, 0, at));
        let shift = || Shift::of(&as_stated, &values, resamples).map(|(shift, _)| shift);
        let is_changed = operated.tried[change] != Change::AsStated;
        let brought_back = (is_changed && level != levels.reference).then(|| {
            let at_reference = of(levels.reference, 0, at);
            let median = quantile(&sorted(at_reference.iter().copied()), 0.5);
            let taken = differences(&as_stated, &at_reference);
            let given = differences(&as_stated, &values);
            share(&given, &taken, *better, least_change(measure.kind, median), resamples)
        });
        ChangedLevel {
            level_c: levels.levels_c[level],
            periods: Distribution::of(measure.kind, values.iter().copied()),
            shift: is_changed.then(shift).flatten(),
            brought_back: brought_back.flatten(),
        }
    };
    let of_measure = |change: usize, at: usize| ChangedMeasure {
        measure: operated.of_changes[at].0.clone(),
        levels: (0..levels.levels_c.len()).map(|level| of_level(level, change, at)).collect(),
    };
    let of_change = |(at, change): (usize, &Change)| RuleChange {
        change: *change,
        measures: (0..operated.of_changes.len()).map(|measure| of_measure(at, measure)).collect(),
    };
    operated.tried.iter().enumerate().map(of_change).collect()
}

/// Realization by realization, where both have a value.
fn differences(from: &[f64], to: &[f64]) -> Ranked {
    let pairs = from.iter().zip(to).enumerate();
    let both = pairs.filter(|(_, (from, to))| from.is_finite() && to.is_finite());
    Ranked::new(both.map(|(realization, (from, to))| (to - from, realization)))
}

/// One median over another; nothing where that is next to nothing, or no loss.
fn share(
    given: &Ranked,
    taken: &Ranked,
    better: Better,
    least: f64,
    resamples: &Resamples,
) -> Option<Ranged> {
    let is_loss = |taken: f64| match better {
        Better::More => taken >= least,
        Better::Less => taken <= -least,
    };
    let of = |weights: &[u32]| {
        let ([given], [taken]) = (given.quantiles(weights, [0.5])?, taken.quantiles(weights, [0.5])?);
        is_loss(taken).then(|| given / taken)
    };
    let realizations = given.values().iter().chain(taken.values()).map(|(_, at)| at + 1).max()?;
    let value = of(&vec![1; realizations])?;
    Some(Ranged::new(value, resamples.each(of)))
}

#[cfg(test)]
mod tests {
    use super::*;

    /// By hand: warming takes 0.10 in the median (0.08, 0.10, 0.12), a change of the rules gives 0.04: 40 % of it come back.
    #[test]
    fn what_is_brought_back_is_a_share_of_what_was_taken() {
        let (reference, warm, changed) = ([0.98, 0.97, 0.96], [0.90, 0.87, 0.84], [0.93, 0.91, 0.90]);
        let taken = differences(&warm, &reference);
        let given = differences(&warm, &changed);
        let resamples = Resamples::new(1, 3);
        let found = share(&given, &taken, Better::More, 0.001, &resamples).unwrap();
        assert!((found.value - 0.4).abs() < 1e-12, "{found:?}");
        assert_eq!(share(&given, &differences(&warm, &warm), Better::More, 0.001, &resamples), None);
        assert_eq!(share(&given, &taken, Better::Less, 0.001, &resamples), None, "what warming makes better");
    }
}
