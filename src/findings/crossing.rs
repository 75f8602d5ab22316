//! The crossing: from which warming on the shift outweighs the spread.

use serde::Serialize;

/// Where signal to spread first passes 1, scanning up from the reference.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
#[serde(rename_all = "snake_case", tag = "crossing")]
pub enum Crossing {
    /// At this warming, degC, linear between levels.
    At {
        /// The warming.
        level_c: f64,
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
/// assert_eq!(crossing(0.0, &[(1.0, Some(0.5)), (2.0, Some(1.5))]), Crossing::At { level_c: 1.5 });
/// assert_eq!(crossing(0.0, &[(1.0, Some(0.5))]), Crossing::NotReached { up_to_c: 1.0 });
/// ```
pub fn crossing(reference_c: f64, ratios: &[(f64, Option<f64>)]) -> Crossing {
    let mut below = (reference_c, 0.0);
    for (level_c, ratio) in ratios.iter().copied() {
        let Some(ratio) = ratio else {
            return Crossing::Unknown;
        };
        if ratio > 1.0 {
            let share = (1.0 - below.1) / (ratio - below.1);
            return Crossing::At { level_c: below.0 + share * (level_c - below.0) };
        }
        below = (level_c, ratio);
    }
    match ratios.last() {
        Some((up_to_c, _)) => Crossing::NotReached { up_to_c: *up_to_c },
        None => Crossing::Unknown,
    }
}
