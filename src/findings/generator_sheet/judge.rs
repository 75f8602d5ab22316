//! Whether the record could be one of the realizations: its number against their 5-95 % range.

use crate::findings::{quantile, sorted};
use serde::Serialize;

/// With fewer numbers their smallest stands for the 5 % quantile of type 8, and no range can be told.
const LEAST_NUMBERS: usize = 13;
/// A number this far outside, as a share of what it is held against, is on the edge but for rounding.
const SAME: f64 = 1e-9;

/// Where the record's number lies.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
#[serde(rename_all = "snake_case")]
pub enum Verdict {
    /// Within the realizations' 5-95 % range.
    Within,
    /// Below it.
    Below,
    /// Above it.
    Above,
}

impl Verdict {
    /// `within`, `below`, `above`.
    pub fn words(self) -> &'static str {
        match self {
            Self::Within => "within",
            Self::Below => "below",
            Self::Above => "above",
        }
    }
}

/// The realizations' range, 5 %, 50 % and 95 %.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct RealizationRange {
    /// 5 % quantile.
    pub q05: f64,
    /// Median.
    pub q50: f64,
    /// 95 % quantile.
    pub q95: f64,
}

impl RealizationRange {
    /// Of the numbers that there are; none of fewer than 13.
    pub(super) fn of(numbers: &[f64]) -> Option<Self> {
        let ranked = sorted(numbers.iter().copied());
        let [q05, q50, q95] = [0.05, 0.5, 0.95].map(|share| quantile(&ranked, share));
        (ranked.len() >= LEAST_NUMBERS).then_some(Self { q05, q50, q95 })
    }

    /// Where a number lies against the range.
    pub(super) fn judge(&self, number: f64) -> Verdict {
        let slack = |end: f64| SAME * end.abs().max(number.abs()).max(SAME);
        if number < self.q05 - slack(self.q05) {
            Verdict::Below
        } else if number > self.q95 + slack(self.q95) {
            Verdict::Above
        } else {
            Verdict::Within
        }
    }
}

/// The chance that a number lies outside the 5-95 % range of `n` others of its own kind: each of the n + 1 gaps between and
/// beyond the n is as likely, and the 5 % quantile of type 8 stands at place `n/20 + 0.35` among them. With 300 it is 10.2 %.
pub(super) fn outside_by_chance(n: usize) -> f64 {
    let n = n as f64;
    2.0 * (0.05 * n + 0.35).max(1.0) / (n + 1.0)
}

#[cfg(test)]
mod tests {
    use super::*;

    /// By hand: of 1 to 13 the 5 % quantile stands at place 13/20 + 1.05/3 = 1, the 95 % one at 13.
    #[test]
    fn the_range_holds_its_ends() {
        let numbers: Vec<f64> = (1..=13).rev().map(f64::from).collect();
        let range = RealizationRange::of(&numbers).unwrap();
        assert_eq!((range.q50, range.q05.round(), range.q95.round()), (7.0, 1.0, 13.0));
        let found = [0.999, 1.0, 7.0, 13.0, 13.0 + 1e-12, 13.001].map(|number| range.judge(number));
        use Verdict::{Above, Below, Within};
        assert_eq!(found, [Below, Within, Within, Within, Within, Above]);
        assert_eq!(RealizationRange::of(&numbers[1..]), None);
    }

    /// By hand: 2 * 15.35 / 301.
    #[test]
    fn one_in_ten_lies_outside_by_chance() {
        assert!((outside_by_chance(300) - 30.7 / 301.0).abs() < 1e-15);
        assert!((outside_by_chance(13) - 2.0 / 14.0).abs() < 1e-12);
    }

    /// WG-14: a standard deviation from 30 years is off by 13 % (normal theory), so that one a tenth too large says nothing. The
    /// 5-95 % range of such deviations is sqrt(17.708/29) to sqrt(42.557/29), 0.781 to 1.211 (table of chi-square, 29 degrees
    /// of freedom); 2000 of them know its ends to 0.006, and 0.02 is three times that.
    #[test]
    fn a_tenth_too_much_deviation_is_no_finding_from_thirty_years() {
        use super::super::moments::standard_deviation;
        use rand_distr::{Distribution, StandardNormal};
        let mut random = crate::perturb::stream(31, 0);
        let mut of_thirty_years = || {
            let years: Vec<f64> = (0..30).map(|_| StandardNormal.sample(&mut random)).collect();
            standard_deviation(&years).unwrap()
        };
        let deviations: Vec<f64> = (0..2000).map(|_| of_thirty_years()).collect();
        let range = RealizationRange::of(&deviations).unwrap();
        assert!((range.q05 - 0.781).abs() < 0.02 && (range.q95 - 1.211).abs() < 0.02, "{range:?}");
        let found = [0.9, 1.1, 0.7, 1.3].map(|deviation| range.judge(deviation));
        assert_eq!(found, [Verdict::Within, Verdict::Within, Verdict::Below, Verdict::Above]);
    }
}
