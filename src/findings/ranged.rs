//! A number with the range in which other realizations of the same kind would put it.

use super::quantile::{quantile, sorted};
use super::record_range::Range;
use serde::Serialize;

/// How the ranges of the findings by year are made.
pub(super) const RANGE_METHOD: &str = "q05 and q95: 5 and 95 % quantiles over 400 resamples of whole realizations (percentile bootstrap, \
     from the study's seed); none where a resample has no number, or of a single realization";

/// A number and its 5-95 % range over resampled realizations.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Ranged {
    /// The number.
    pub value: f64,
    /// 5 % quantile over the resamples; none where one of them has no number.
    pub q05: Option<f64>,
    /// 95 % quantile over the resamples.
    pub q95: Option<f64>,
}

impl Ranged {
    /// The number with its range over the numbers of the resamples.
    pub(super) fn new(value: f64, resampled: impl IntoIterator<Item = Option<f64>>) -> Self {
        let all: Option<Vec<f64>> = resampled.into_iter().collect();
        let in_order = sorted(all.unwrap_or_default());
        let end = |share| Some(quantile(&in_order, share)).filter(|end| end.is_finite());
        Self { value, q05: end(0.05), q95: end(0.95) }
    }

    /// The range, where both its ends are known.
    pub(super) fn range(self) -> Option<Range> {
        Some(Range { q05: self.q05?, q95: self.q95? })
    }

    /// Whether the whole range lies above a number, or below it; nothing where it straddles, or is not known.
    pub fn side_of(&self, number: f64) -> Option<bool> {
        match (self.q05, self.q95) {
            (Some(low), _) if low > number => Some(true),
            (_, Some(high)) if high < number => Some(false),
            _ => None,
        }
    }
}

/// Where a count is zero the one-sided 95 % bound on its chance from above, `1 - 0.05^(1/n)`; where it is all, from below,
/// `0.05^(1/n)`.
pub(super) fn bound_of_certain(chance: f64, realizations: usize) -> Option<f64> {
    let root = libm::pow(0.05, 1.0 / realizations as f64);
    match chance {
        ..=0.0 => Some(1.0 - root),
        1.0.. => Some(root),
        _ => None,
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    /// By hand: of type 8, the 5 % quantile of 1 to 99 stands at rank 99*0.05 + 1.05/3 = 5.3, the 95 % at 94.7.
    #[test]
    fn a_range_is_that_of_the_resamples() {
        let found = Ranged::new(50.0, (1..=99).map(|number| Some(f64::from(number))));
        assert!((found.q05.unwrap() - 5.3).abs() < 1e-9 && (found.q95.unwrap() - 94.7).abs() < 1e-9);
        assert_eq!([4.0, 50.0, 96.0].map(|number| found.side_of(number)), [Some(true), None, Some(false)]);
        let lacks_one = Ranged::new(1.0, [Some(1.0), None]);
        assert_eq!((lacks_one.q05, lacks_one.side_of(0.0)), (None, None));
    }

    /// The exact bound of none in n: 0.05^(1/n) is 0.904966 for n = 30, so 0.0950 (the rule of three says 0.10).
    #[test]
    fn none_of_thirty_is_less_than_one_in_ten() {
        assert!((bound_of_certain(0.0, 30).unwrap() - 0.0950).abs() < 1e-4);
        assert!((bound_of_certain(1.0, 30).unwrap() - 0.9050).abs() < 1e-4);
        assert_eq!(bound_of_certain(0.5, 30), None);
    }
}
