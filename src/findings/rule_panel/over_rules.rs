//! What rules say together: ranges over those that were tuned, and which of them say what.

use super::super::crossing::Judged;
use super::super::quantile::sorted;
use super::super::record_range::Range;
use super::super::resample::Estimate;
use super::{LevelOfRule, OfRule};
use serde::Serialize;

/// Whether a shift outweighs a spread.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
#[serde(rename_all = "snake_case")]
pub enum Weight {
    /// It does.
    Outweighs,
    /// It does not.
    DoesNotOutweigh,
    /// The ratio's 5-95 % Monte Carlo range holds 1.
    CannotTell,
    /// There is no ratio, or no range of it.
    NoRatio,
}

/// From the lowest to the highest number of the rules that have one.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct RangeOverRules {
    /// The lowest.
    pub lowest: f64,
    /// The highest.
    pub highest: f64,
    /// Places of the rules without a number.
    pub without: Vec<usize>,
}

/// From which warming on the shift outweighs the spread, over rules.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct OutweighsOverRules {
    /// The range over the rules under which it does, degC, the others named as those without; none where there is none.
    pub range_c: Option<RangeOverRules>,
    /// Places of the rules under which it does not up to the highest level.
    pub does_not: Vec<usize>,
    /// Places of the rules under which other realizations might say otherwise than these.
    pub cannot_tell: Vec<usize>,
    /// Places of the rules that cannot be asked.
    pub unknown: Vec<usize>,
}

/// A level over the rules that were tuned, the study's own among them.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct LevelOverRules {
    /// The level, degC.
    pub level_c: f64,
    /// Median shifts.
    pub shift: Option<RangeOverRules>,
    /// Percent changes.
    pub percent_change: Option<RangeOverRules>,
    /// Ratios of signal to spread.
    pub signal_to_spread: Option<RangeOverRules>,
    /// Places of the rules under which the shift outweighs the spread.
    pub outweighs: Vec<usize>,
    /// Places of those under which it does not.
    pub does_not_outweigh: Vec<usize>,
    /// Places of those whose ratio lies too near 1 to tell.
    pub cannot_tell: Vec<usize>,
    /// Places of those without a ratio, or without an error of it.
    pub no_ratio: Vec<usize>,
    /// Whether it outweighs under one rule and does not under another.
    pub hangs_on_rule: bool,
}

impl Weight {
    /// Of a ratio by its range over resampled realizations.
    pub fn of(ratio: Option<Estimate>, range: Option<Range>) -> Self {
        match ratio.and(range) {
            None => Self::NoRatio,
            Some(range) if range.q05 > 1.0 => Self::Outweighs,
            Some(range) if range.q95 < 1.0 => Self::DoesNotOutweigh,
            Some(_) => Self::CannotTell,
        }
    }
}

impl RangeOverRules {
    /// None where no rule has a number.
    fn of(numbers: impl Iterator<Item = (usize, Option<f64>)>) -> Option<Self> {
        let (mut found, mut without) = (Vec::new(), Vec::new());
        for (rule, number) in numbers {
            match number.filter(|number| number.is_finite()) {
                Some(number) => found.push(number),
                None => without.push(rule),
            }
        }
        let found = sorted(found);
        Some(Self { lowest: *found.first()?, highest: *found.last()?, without })
    }
}

impl OutweighsOverRules {
    pub(super) fn of(rules: &[OfRule], is_tuned: &[bool]) -> Self {
        let tuned = places(is_tuned);
        let told = |is_told: fn(Judged) -> bool| -> Vec<usize> {
            tuned.iter().copied().filter(|rule| is_told(rules[*rule].judged())).collect()
        };
        let from = |rule: &usize| match rules[*rule].judged() {
            Judged::Outweighs { level_c, .. } => (*rule, Some(level_c)),
            Judged::DoesNot { .. } | Judged::CannotTell { .. } | Judged::Unknown => (*rule, None),
        };
        Self {
            range_c: RangeOverRules::of(tuned.iter().map(from)),
            does_not: told(|judged| matches!(judged, Judged::DoesNot { .. })),
            cannot_tell: told(|judged| matches!(judged, Judged::CannotTell { .. })),
            unknown: told(|judged| judged == Judged::Unknown),
        }
    }
}

impl LevelOverRules {
    pub(super) fn of(rules: &[OfRule], is_tuned: &[bool], level: usize) -> Option<Self> {
        let level_c = rules.first()?.levels.get(level)?.level_c;
        let tuned = places(is_tuned);
        let at = |rule: usize| rules[rule].levels.get(level);
        let over = |number: fn(&LevelOfRule) -> Option<f64>| {
            RangeOverRules::of(tuned.iter().map(|rule| (*rule, at(*rule).and_then(number))))
        };
        let saying = |weight: Weight| -> Vec<usize> {
            let says = |rule: &usize| at(*rule).map_or(Weight::NoRatio, |level| level.weight) == weight;
            tuned.iter().copied().filter(says).collect()
        };
        let [outweighs, does_not_outweigh] = [Weight::Outweighs, Weight::DoesNotOutweigh].map(saying);
        Some(Self {
            level_c,
            shift: over(|level| level.shift.map(|shift| shift.median.value)),
            percent_change: over(|level| level.percent_change),
            signal_to_spread: over(|level| level.signal_to_spread.map(|ratio| ratio.value)),
            hangs_on_rule: !outweighs.is_empty() && !does_not_outweigh.is_empty(),
            outweighs,
            does_not_outweigh,
            cannot_tell: saying(Weight::CannotTell),
            no_ratio: saying(Weight::NoRatio),
        })
    }

    /// Which rules say so.
    pub fn saying(&self, weight: Weight) -> &[usize] {
        match weight {
            Weight::Outweighs => &self.outweighs,
            Weight::DoesNotOutweigh => &self.does_not_outweigh,
            Weight::CannotTell => &self.cannot_tell,
            Weight::NoRatio => &self.no_ratio,
        }
    }
}

fn places(is_tuned: &[bool]) -> Vec<usize> {
    (0..is_tuned.len()).filter(|rule| is_tuned[*rule]).collect()
}

#[cfg(test)]
mod tests {
    use super::super::super::crossing::{Crossing, CrossingRange};
    use super::super::super::shift::Shift;
    use super::*;

    /// A ratio and its error, if it has one.
    type Ratio = Option<(f64, Option<f64>)>;

    /// A rule that changes by ten times its ratio at one level, and outweighs from some warming on, with the upper end of its range.
    fn rule(ratio: Ratio, outweighs: Crossing, q95_c: Option<f64>) -> OfRule {
        let q05_c = q95_c.map(|_| 0.1);
        let signal_to_spread = ratio.map(|(value, monte_carlo_error)| Estimate { value, monte_carlo_error });
        let shift = ratio.map(|(value, _)| Shift {
            median: Estimate { value: -10.0 * value, monte_carlo_error: None },
            mean: 0.0,
            q05: 0.0,
            q95: 0.0,
            pairs: 40,
            pairs_without_value: 0,
        });
        let range = ratio
            .and_then(|(value, error)| error.map(|error| Range { q05: value - error, q95: value + error }));
        let weight = Weight::of(signal_to_spread, range);
        let level = LevelOfRule { level_c: 2.0, shift, percent_change: None, signal_to_spread, weight };
        OfRule {
            precipitation_spread: None,
            outweighs,
            outweighs_range: Some(CrossingRange { q05_c, q95_c, falls_back_share: 0.0 }),
            levels: vec![level],
        }
    }

    /// By hand, of ranges above 1, below it, about it, and none.
    #[test]
    fn a_ratio_says_one_of_four_things() {
        let ratio = Some(Estimate { value: 1.1, monte_carlo_error: Some(0.1) });
        let says = |q05, q95| Weight::of(ratio, Some(Range { q05, q95 }));
        assert_eq!(says(1.01, 1.3), Weight::Outweighs);
        assert_eq!(says(0.8, 0.99), Weight::DoesNotOutweigh);
        assert_eq!(says(0.95, 1.3), Weight::CannotTell);
        let range = Some(Range { q05: 2.0, q95: 3.0 });
        assert_eq!([Weight::of(ratio, None), Weight::of(None, range)], [Weight::NoRatio; 2]);
    }

    /// By hand: the study's own rules cannot tell, since others of their realizations might not reach it; one rule says yes, one no,
    /// one has no number, and one was not tuned.
    #[test]
    fn rules_that_differ_are_named_though_the_studys_own_cannot_tell() {
        let at = |level_c| Crossing::At { level_c, until_c: None };
        let rules = [
            rule(Some((1.0, Some(0.1))), at(2.0), None),
            rule(Some((1.5, Some(0.1))), at(1.5), Some(1.6)),
            rule(Some((0.5, Some(0.1))), Crossing::NotReached { up_to_c: 2.0 }, None),
            rule(None, Crossing::Unknown, None),
            rule(Some((9.0, Some(0.1))), at(0.1), Some(0.2)),
        ];
        let is_tuned = [true, true, true, true, false];
        let level = LevelOverRules::of(&rules, &is_tuned, 0).unwrap();
        let all = [Weight::Outweighs, Weight::DoesNotOutweigh, Weight::CannotTell, Weight::NoRatio];
        assert_eq!(all.map(|weight| level.saying(weight).to_vec()), [vec![1], vec![2], vec![0], vec![3]]);
        assert!(level.hangs_on_rule);
        let expected = RangeOverRules { lowest: -15.0, highest: -5.0, without: vec![3] };
        assert_eq!(level.shift, Some(expected));
        let outweighs = OutweighsOverRules::of(&rules, &is_tuned);
        let expected = RangeOverRules { lowest: 1.5, highest: 1.5, without: vec![0, 2, 3] };
        assert_eq!(outweighs.range_c, Some(expected));
        let others = [outweighs.does_not, outweighs.cannot_tell, outweighs.unknown];
        assert_eq!(others, [vec![2], vec![0], vec![3]]);
        let of_two = LevelOverRules::of(&rules[..2], &is_tuned[..2], 0).unwrap();
        assert!(!of_two.hangs_on_rule, "one cannot tell and one says yes");
    }
}
