//! Published measures of how well modelled values agree with observed ones.
//!
//! All need at least two pairs, and observed values that are not all the same; else they are none. They cost one or two
//! passes over the pairs, in their order.

use serde::Serialize;

/// An observed value and the modelled one of the same day.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Pair {
    /// Observed.
    pub observed: f64,
    /// Modelled.
    pub modelled: f64,
}

/// Nash-Sutcliffe efficiency (Nash & Sutcliffe 1970): `1 - sum((m - o)^2) / sum((o - mean o)^2)`.
///
/// 1 is perfect, 0 is no better than the observed mean, and there is no lower bound.
///
/// ```
/// use thawline::fit::{Pair, nash_sutcliffe};
/// let pairs = [1.0, 2.0, 3.0, 4.0, 5.0].map(|observed| Pair { observed, modelled: observed + 1.0 });
/// assert_eq!(nash_sutcliffe(&pairs), Some(0.5));
/// ```
pub fn nash_sutcliffe(pairs: &[Pair]) -> Option<f64> {
    let observed = moments(pairs, |pair| pair.observed)?;
    let errors = pairs.iter().map(|pair| (pair.modelled - pair.observed) * (pair.modelled - pair.observed));
    let errors: f64 = errors.sum();
    (observed.squares > 0.0).then(|| 1.0 - errors / observed.squares)
}

/// Kling-Gupta efficiency as of 2009, and its parts.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct KlingGupta {
    /// `1 - sqrt((r - 1)^2 + (alpha - 1)^2 + (beta - 1)^2)`; 1 is perfect.
    pub efficiency: f64,
    /// r: linear correlation; 0 where the modelled values are all the same.
    pub correlation: f64,
    /// alpha: standard deviation of the modelled over that of the observed values.
    pub variability_ratio: f64,
    /// beta: mean of the modelled over mean of the observed values.
    pub mean_ratio: f64,
}

/// Kling-Gupta efficiency (Gupta, Kling, Yilmaz & Martinez 2009).
///
/// Predicting the observed mean scores `1 - sqrt(2) = -0.414` (Knoben, Freer & Woods 2019), its correlation taken as 0.
/// None also where the observed mean is 0.
pub fn kling_gupta(pairs: &[Pair]) -> Option<KlingGupta> {
    let observed = moments(pairs, |pair| pair.observed)?;
    let modelled = moments(pairs, |pair| pair.modelled)?;
    if observed.squares <= 0.0 || observed.mean == 0.0 {
        return None;
    }
    let products = pairs.iter().map(|p| (p.observed - observed.mean) * (p.modelled - modelled.mean));
    let products: f64 = products.sum();
    let correlation =
        if modelled.squares > 0.0 { products / (observed.squares * modelled.squares).sqrt() } else { 0.0 };
    let variability_ratio = (modelled.squares / observed.squares).sqrt();
    let mean_ratio = modelled.mean / observed.mean;
    let squares = [correlation, variability_ratio, mean_ratio].map(|part| (part - 1.0) * (part - 1.0));
    let efficiency = 1.0 - squares.iter().sum::<f64>().sqrt();
    Some(KlingGupta { efficiency, correlation, variability_ratio, mean_ratio })
}

/// Mean, and sum of squares about it.
struct Moments {
    mean: f64,
    squares: f64,
}

/// None of fewer than two pairs. Values that are all the same have no squares, whatever their mean is rounded to.
fn moments(pairs: &[Pair], value: impl Fn(&Pair) -> f64) -> Option<Moments> {
    if pairs.len() < 2 {
        return None;
    }
    let first = value(&pairs[0]);
    if pairs.iter().all(|pair| value(pair) == first) {
        return Some(Moments { mean: first, squares: 0.0 });
    }
    let mean = pairs.iter().map(&value).sum::<f64>() / pairs.len() as f64;
    let squares = pairs.iter().map(|pair| (value(pair) - mean) * (value(pair) - mean)).sum();
    Some(Moments { mean, squares })
}

#[cfg(test)]
mod tests {
    use super::*;

    fn pairs(observed: &[f64], modelled: &[f64]) -> Vec<Pair> {
        observed.iter().zip(modelled).map(|(o, m)| Pair { observed: *o, modelled: *m }).collect()
    }

    #[test]
    fn what_cannot_be_scored_has_no_score() {
        let constant = pairs(&[0.1; 3], &[1.0, 2.0, 3.0]);
        assert_eq!((nash_sutcliffe(&constant), kling_gupta(&constant)), (None, None));
        let bare = pairs(&[0.0, 0.0], &[0.0, 0.0]);
        assert_eq!((nash_sutcliffe(&bare), kling_gupta(&bare)), (None, None));
        let one = pairs(&[1.0], &[1.0]);
        assert_eq!((nash_sutcliffe(&one), kling_gupta(&one)), (None, None));
        let about_zero = pairs(&[-1.0, 1.0], &[-1.0, 1.0]);
        assert_eq!((nash_sutcliffe(&about_zero), kling_gupta(&about_zero)), (Some(1.0), None));
    }

    /// Identity: whatever agrees to the bit scores 1 to the bit.
    #[test]
    fn agreement_is_one() {
        let values = [0.1, 0.7, 12.3, 345.6, 0.3];
        let same = pairs(&values, &values);
        assert_eq!(nash_sutcliffe(&same), Some(1.0));
        let parts = KlingGupta { efficiency: 1.0, correlation: 1.0, variability_ratio: 1.0, mean_ratio: 1.0 };
        assert_eq!(kling_gupta(&same), Some(parts));
    }
}
