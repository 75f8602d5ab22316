//! The ratio of two chances from counts, with its interval: Katz et al. (1978).

use super::NORMAL_975;
use serde::Serialize;

/// A ratio of two chances and its 95 % interval.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct RiskRatio {
    /// `(a/n1) / (c/n2)`.
    pub ratio: f64,
    /// Lower end of the interval.
    pub low_95: f64,
    /// Upper end.
    pub high_95: f64,
}

/// The chance of what was so in `count` of `n`, over that of `other_count` of `other_n`. Its logarithm is taken for normal
/// with the error `sqrt(1/a - 1/n1 + 1/c - 1/n2)` (Katz et al. 1978, Biometrics 34:469); the two samples are taken for
/// independent. None where a count is zero, since that logarithm does not exist, or more than its total.
///
/// ```
/// let found = thawline::baseline::risk_ratio([189, 11034], [104, 11037]).unwrap();
/// assert!((found.ratio - 1.8178).abs() < 1e-4);
/// ```
pub fn risk_ratio([count, n]: [usize; 2], [other_count, other_n]: [usize; 2]) -> Option<RiskRatio> {
    if count == 0 || other_count == 0 || count > n || other_count > other_n {
        return None;
    }
    let [a, n1, c, n2] = [count, n, other_count, other_n].map(|count| count as f64);
    let ratio = (a / n1) / (c / n2);
    let reach = NORMAL_975 * (1.0 / a - 1.0 / n1 + 1.0 / c - 1.0 / n2).max(0.0).sqrt();
    Some(RiskRatio { ratio, low_95: ratio * libm::exp(-reach), high_95: ratio * libm::exp(reach) })
}

#[cfg(test)]
mod tests {
    use super::*;

    /// SN-06: 189 of 11034 against 104 of 11037, printed as 1.82 (1.43 to 2.30) and computed as 1.8178 (1.4330 to 2.3059),
    /// to 1e-4 (Agresti's table; formula of Katz et al. 1978). SN-08: at a zero count there is none.
    #[test]
    fn the_published_table_and_zero_counts() {
        let found = risk_ratio([189, 11034], [104, 11037]).unwrap();
        for (number, expected) in [(found.ratio, 1.8178), (found.low_95, 1.4330), (found.high_95, 2.3059)] {
            assert!((number - expected).abs() < 1e-4, "{found:?}");
        }
        // The error of the logarithm, printed as 0.121347, is a 3.92th of the interval's length in logarithms: exact to its digits.
        let error = libm::log(found.high_95 / found.low_95) / (2.0 * 1.959_964);
        assert!((error - 0.121_347).abs() < 1e-6, "{error}");
        assert_eq!(risk_ratio([0, 30], [8, 30]), None);
        assert_eq!(risk_ratio([8, 30], [0, 30]), None);
        let same = risk_ratio([8, 30], [8, 30]).unwrap();
        assert_eq!(same.ratio, 1.0);
        assert!(same.low_95 < 1.0 && same.high_95 > 1.0);
    }
}
