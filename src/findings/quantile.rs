//! Quantiles, Hyndman & Fan (1996) type 8: median-unbiased whatever the distribution.

use crate::season::{NONE, NOT_GONE};

/// The values in ascending order; years with none before and snow that never went after every date.
pub fn sorted(values: impl IntoIterator<Item = f64>) -> Vec<f64> {
    let mut sorted: Vec<f64> = values.into_iter().collect();
    sorted.sort_unstable_by(f64::total_cmp);
    sorted
}

/// The quantile `p` (0 to 1) of values in ascending order: position `n*p + (p + 1)/3`, linear between neighbours, held
/// at the ends. Of no values it is none; between a date and none it is none.
///
/// ```
/// use thawline::findings::quantile;
/// let sample = [2.0, 4.0, 7.0, 8.0, 10.0, 15.0, 20.0, 30.0, 40.0, 50.0];
/// assert!((quantile(&sample, 0.1) - 2.7333).abs() < 1e-4);
/// ```
pub fn quantile(sorted: &[f64], p: f64) -> f64 {
    quantile_by(sorted.len(), p, |at| sorted[at])
}

/// The same of values that are not in one slice: `value_at(i)` is the i-th smallest of `n`, from 0.
pub(super) fn quantile_by(n: usize, p: f64, value_at: impl Fn(usize) -> f64) -> f64 {
    if n == 0 {
        return NONE;
    }
    let (below, share) = position(n, p);
    let low = value_at(below);
    if share == 0.0 { low } else { between(low, value_at(below + 1), share) }
}

/// Index from 0 of the value below the quantile, and how far it lies towards the next.
pub(super) fn position(n: usize, p: f64) -> (usize, f64) {
    let position = n as f64 * p + (p + 1.0) / 3.0;
    if position < 1.0 {
        return (0, 0.0);
    }
    if position >= n as f64 {
        return (n - 1, 0.0);
    }
    let below = position.floor();
    (below as usize - 1, position - below)
}

/// Linear between two ranked values; none or `not gone` where one of them has no number.
pub(super) fn between(low: f64, high: f64, share: f64) -> f64 {
    if low == high || share == 0.0 {
        low
    } else if low == NONE {
        NONE
    } else if high == NOT_GONE {
        NOT_GONE
    } else {
        low + share * (high - low)
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn quantiles_next_to_undefined_dates() {
        assert_eq!(quantile(&[NONE, 200.0], 0.5), NONE);
        assert_eq!(quantile(&[200.0, NOT_GONE], 0.5), NOT_GONE);
        assert_eq!(quantile(&[NONE, NONE, NONE], 0.5), NONE);
        assert_eq!(quantile(&[], 0.5), NONE);
        assert_eq!(quantile(&[7.0], 0.95), 7.0);
    }
}
