//! The crossing: from which warming on the shift outweighs the spread.

use super::quantile::{quantile, sorted};
use serde::Serialize;

/// Where signal to spread first passes 1, scanning up from the reference.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
#[serde(rename_all = "snake_case", tag = "crossing")]
pub enum Crossing {
    /// At this warming, degC, linear between levels.
    At {
        /// The warming.
        level_c: f64,
        /// Where it falls back to 1 or below at a higher level, if it does, degC; linear between levels. More than one
        /// return is not told apart.
        until_c: Option<f64>,
    },
    /// Not up to the highest level.
    NotReached {
        /// The highest level, degC.
        up_to_c: f64,
    },
    /// There is no warmer level, or no ratio at one.
    Unknown,
}

/// Scans `(level, ratio)` pairs in ascending order of level, all above the reference, whose own ratio is 0.
///
/// ```
/// use thawline::findings::{crossing, Crossing};
/// assert_eq!(crossing(0.0, &[(1.0, Some(0.5)), (2.0, Some(1.5))]), Crossing::At { level_c: 1.5, until_c: None });
/// let and_back = crossing(0.0, &[(1.0, Some(2.0)), (2.0, Some(0.0))]);
/// assert_eq!(and_back, Crossing::At { level_c: 0.5, until_c: Some(1.5) });
/// assert_eq!(crossing(0.0, &[(1.0, Some(0.5))]), Crossing::NotReached { up_to_c: 1.0 });
/// ```
pub fn crossing(reference_c: f64, ratios: &[(f64, Option<f64>)]) -> Crossing {
    let mut below = (reference_c, 0.0);
    let mut at = None;
    for (level_c, ratio) in ratios.iter().copied() {
        let Some(ratio) = ratio else {
            return Crossing::Unknown;
        };
        if (ratio > 1.0) == at.is_none() {
            let share = (1.0 - below.1) / (ratio - below.1);
            let crossed_c = below.0 + share * (level_c - below.0);
            match at {
                None => at = Some(crossed_c),
                Some(level_c) => return Crossing::At { level_c, until_c: Some(crossed_c) },
            }
        }
        below = (level_c, ratio);
    }
    match (at, ratios.last()) {
        (Some(level_c), _) => Crossing::At { level_c, until_c: None },
        (None, Some((up_to_c, _))) => Crossing::NotReached { up_to_c: *up_to_c },
        (None, None) => Crossing::Unknown,
    }
}

/// How far the crossing would move with other realizations: its 5-95 % range over resamples.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct CrossingRange {
    /// 5 % quantile, degC; none where it is not reached.
    pub q05_c: Option<f64>,
    /// 95 % quantile, degC; none where it is not reached.
    pub q95_c: Option<f64>,
    /// Share of the resamples that cross and fall back at a higher level.
    pub falls_back_share: f64,
}

/// Where so many of the resamples fall back, and so many do not, nothing is said of it.
const OPEN_SHARES: [f64; 2] = [0.05, 0.95];

/// What a crossing and its Monte Carlo range say together.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Judged {
    /// From here on, in these realizations and in others of the same kind.
    Outweighs {
        /// The warming, degC.
        level_c: f64,
        /// Where it falls back, if it does, degC.
        until_c: Option<f64>,
        /// Whether these realizations cannot tell if it falls back at a higher level.
        is_open_above: bool,
    },
    /// At no level, in these realizations and in others.
    DoesNot {
        /// The highest level, degC.
        up_to_c: f64,
    },
    /// These realizations say one thing, and others of the same kind may say the other.
    CannotTell {
        /// Where these cross; none where they do not.
        crosses_at_c: Option<f64>,
        /// Where others may cross first; none where too few realizations leave that unknown.
        may_cross_at_c: Option<f64>,
    },
    /// There is no warmer level, or no ratio at one.
    Unknown,
}

/// Judges a crossing by its range: told only where the 5 and the 95 % end say the same.
///
/// ```
/// use thawline::findings::{judged, Crossing, CrossingRange, Judged};
/// let at = Crossing::At { level_c: 3.8, until_c: None };
/// let both = CrossingRange { q05_c: Some(3.5), q95_c: Some(3.9), falls_back_share: 0.0 };
/// let told = Judged::Outweighs { level_c: 3.8, until_c: None, is_open_above: false };
/// assert_eq!(judged(at, Some(both)), told);
/// let open = CrossingRange { q95_c: None, ..both };
/// let cannot = Judged::CannotTell { crosses_at_c: Some(3.8), may_cross_at_c: Some(3.5) };
/// assert_eq!(judged(at, Some(open)), cannot);
/// ```
pub fn judged(crossing: Crossing, range: Option<CrossingRange>) -> Judged {
    let may_cross_at_c = range.and_then(|range| range.q05_c);
    match (crossing, range) {
        (Crossing::Unknown, _) => Judged::Unknown,
        (Crossing::At { level_c, until_c }, Some(CrossingRange { q95_c: Some(_), falls_back_share, .. })) => {
            let is_open_above = (OPEN_SHARES[0]..OPEN_SHARES[1]).contains(&falls_back_share);
            Judged::Outweighs { level_c, until_c, is_open_above }
        }
        (Crossing::NotReached { up_to_c }, Some(CrossingRange { q05_c: None, .. })) => {
            Judged::DoesNot { up_to_c }
        }
        (Crossing::At { level_c, .. }, _) => {
            Judged::CannotTell { crosses_at_c: Some(level_c), may_cross_at_c }
        }
        (Crossing::NotReached { .. }, _) => Judged::CannotTell { crosses_at_c: None, may_cross_at_c },
    }
}

/// The range of the crossing. `ratios` holds, for each level above the reference in ascending order, the ratio of every
/// resample. Nothing where a resample has no ratio at a level that it needs.
pub(super) fn crossing_range(reference_c: f64, ratios: &[(f64, Vec<Option<f64>>)]) -> Option<CrossingRange> {
    let resamples = ratios.first()?.1.len();
    range_of((0..resamples).map(|resample| {
        let one: Vec<(f64, Option<f64>)> =
            ratios.iter().map(|(level_c, of)| (*level_c, of.get(resample).copied().flatten())).collect();
        crossing(reference_c, &one)
    }))
}

/// The 5-95 % range of first crossings; nothing where one is unknown or there are none.
pub(super) fn range_of(crossings: impl Iterator<Item = Crossing>) -> Option<CrossingRange> {
    let mut falls_back = 0;
    let found = crossings
        .map(|crossing| match crossing {
            Crossing::At { level_c, until_c } => {
                falls_back += usize::from(until_c.is_some());
                Some(level_c)
            }
            Crossing::NotReached { .. } => Some(f64::INFINITY),
            Crossing::Unknown => None,
        })
        .collect::<Option<Vec<f64>>>()?;
    if found.is_empty() {
        return None;
    }
    let falls_back_share = falls_back as f64 / found.len() as f64;
    let found = sorted(found);
    let reached = |p| Some(quantile(&found, p)).filter(|level_c| level_c.is_finite());
    Some(CrossingRange { q05_c: reached(0.05), q95_c: reached(0.95), falls_back_share })
}

#[cfg(test)]
mod tests {
    use super::*;

    /// By hand: told where both ends say the same; never of a crossing without a range.
    #[test]
    fn a_crossing_is_judged_by_both_ends_of_its_range() {
        let range = |q05_c, q95_c| Some(CrossingRange { q05_c, q95_c, falls_back_share: 0.5 });
        let never = Crossing::NotReached { up_to_c: 4.0 };
        assert_eq!(judged(never, range(None, None)), Judged::DoesNot { up_to_c: 4.0 });
        let may = Judged::CannotTell { crosses_at_c: None, may_cross_at_c: Some(3.9) };
        assert_eq!(judged(never, range(Some(3.9), None)), may);
        let few = |crosses_at_c| Judged::CannotTell { crosses_at_c, may_cross_at_c: None };
        assert_eq!(judged(never, None), few(None));
        assert_eq!(judged(Crossing::At { level_c: 2.0, until_c: None }, None), few(Some(2.0)));
        let at = Crossing::At { level_c: 2.0, until_c: None };
        let open = Judged::Outweighs { level_c: 2.0, until_c: None, is_open_above: true };
        assert_eq!(judged(at, range(Some(1.9), Some(2.1))), open, "half of the resamples fall back");
        assert_eq!(judged(Crossing::Unknown, range(None, None)), Judged::Unknown);
    }

    /// A reference that does not spread gives no ratio in any resample: that is no range that lies above every level.
    #[test]
    fn no_ratios_have_no_range() {
        assert_eq!(crossing_range(0.0, &[(1.0, Vec::new()), (2.0, Vec::new())]), None);
        assert_eq!(crossing_range(0.0, &[(1.0, vec![None; 3]), (2.0, vec![Some(2.0); 3])]), None);
        let never = crossing_range(0.0, &[(1.0, vec![Some(0.5); 3])]);
        assert_eq!(never, Some(CrossingRange { q05_c: None, q95_c: None, falls_back_share: 0.0 }));
        // By hand: at 0.5 degC up, and in one of two down again half-way from 1 to 2 degC.
        let both = crossing_range(0.0, &[(1.0, vec![Some(2.0); 2]), (2.0, vec![Some(0.0), Some(2.0)])]);
        assert_eq!(both, Some(CrossingRange { q05_c: Some(0.5), q95_c: Some(0.5), falls_back_share: 0.5 }));
    }
}
