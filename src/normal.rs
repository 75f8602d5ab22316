//! The standard normal distribution: the share below a score, and the score below which a share lies.

use std::f64::consts::{FRAC_1_SQRT_2, PI};

/// The share of a standard normal below a score, `erfc(-score/sqrt(2))/2`: to rounding of the share itself, far below
/// the mean, too.
pub fn below(score: f64) -> f64 {
    0.5 * libm::erfc(-score * FRAC_1_SQRT_2)
}

/// The score below which a share between 0 and 1 lies: Newton's steps from a rational approximation (Abramowitz &
/// Stegun 1964, 26.2.23, within 4.5e-4), which three bring to rounding.
pub fn score_of(share: f64) -> f64 {
    let tail = share.min(1.0 - share);
    let t = libm::sqrt(-2.0 * libm::log(tail));
    let above = 2.515_517 + t * (0.802_853 + t * 0.010_328);
    let under = 1.0 + t * (1.432_788 + t * (0.189_269 + t * 0.001_308));
    let mut score = above / under - t;
    for _ in 0..3 {
        let density = libm::exp(-0.5 * score * score) / libm::sqrt(2.0 * PI);
        score -= (below(score) - tail) / density;
    }
    if share < 0.5 { score } else { -score }
}

#[cfg(test)]
mod tests {
    use super::{below, score_of};

    /// `scipy.stats.norm.ppf` of these shares, scipy 1.17.1; 1e-9 of scores of some ones, since from a share of 1e-6 a
    /// rounding of 1e-16 moves the score by 1e-11.
    #[test]
    fn scores_of_shares() {
        let cases = [
            (1e-6, -4.753_424_308_822_899),
            (0.001, -3.090_232_306_167_813),
            (0.05, -1.644_853_626_951_472_9),
            (0.3, -0.524_400_512_708_040_9),
            (0.5, 0.0),
            (0.7, 0.524_400_512_708_040_7),
            (0.975, 1.959_963_984_540_054),
        ];
        for (share, expected) in cases {
            let found = score_of(share);
            assert!((found - expected).abs() < 1e-9, "{found} for {expected}");
            assert!((below(expected) - share).abs() < 1e-12);
        }
    }
}
