//! How much falls on a wet day: for each month the law that its amounts speak for.

use super::mixed_exponential::MixedExponential;
use super::truncated_gamma::TruncatedGamma;
use rand::Rng;

/// The law of a wet day's amount.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Law {
    /// Gamma, cut off at the threshold.
    Gamma(TruncatedGamma),
    /// Mixed exponential above the threshold.
    MixedExponential(MixedExponential),
}

impl Law {
    /// The law with the lower Bayesian information criterion `k ln n - 2 ln L` (Schwarz 1978) for amounts above a
    /// threshold: gamma with 2 parameters or mixed exponential with 3.
    pub fn of(amounts_mm: &[f64], above_mm: f64) -> Self {
        let (mixed, of_mixed) = MixedExponential::most_likely(amounts_mm, above_mm);
        let log_count = libm::log(amounts_mm.len() as f64);
        match TruncatedGamma::most_likely(amounts_mm, above_mm) {
            Some((gamma, of_gamma))
                if 2.0 * log_count - 2.0 * of_gamma <= 3.0 * log_count - 2.0 * of_mixed =>
            {
                Self::Gamma(gamma)
            }
            _ => Self::MixedExponential(mixed),
        }
    }

    /// An amount above the threshold, mm.
    pub fn draw(&self, random: &mut impl Rng) -> f64 {
        match self {
            Self::Gamma(gamma) => gamma.draw(random),
            Self::MixedExponential(mixed) => mixed.draw(random),
        }
    }
}

#[cfg(test)]
mod tests;
