//! Mixed exponential amounts above the wet-day threshold (Wilks 1999), by likelihood.

use rand::{Rng, RngExt};

/// Amounts above a threshold whose excess is exponential with one of two means.
///
/// Cutting such a mixture off below a threshold leaves such a mixture of the excess, so nothing else need be fitted.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct MixedExponential {
    /// Share of the days with the smaller mean, 0 to 1.
    pub smaller_share: f64,
    /// The smaller mean excess, mm.
    pub smaller_mean_mm: f64,
    /// The larger mean excess, mm.
    pub larger_mean_mm: f64,
    /// The threshold, mm.
    pub above_mm: f64,
}

/// Accelerated steps at most.
const MOST_STEPS: usize = 200;
/// A step that betters the log-likelihood of a day by less is the last.
const SMALLEST_GAIN: f64 = 1e-12;
/// Shares and means are kept within these, so that a class does not run empty.
const SHARES: [f64; 2] = [0.005, 0.995];
/// A mean excess is at least this part of the whole mean.
const LEAST_MEAN_PART: f64 = 1e-3;

impl MixedExponential {
    /// The most likely mixture for amounts that lie above a threshold, and its log-likelihood.
    ///
    /// By expectation and maximization, sped up by squared extrapolation (Varadhan & Roland 2008) in the logarithms of
    /// the odds and means; a step that does not gain falls back to the plain one.
    pub fn most_likely(amounts_mm: &[f64], above_mm: f64) -> (Self, f64) {
        let excess: Vec<f64> = amounts_mm.iter().map(|amount| amount - above_mm).collect();
        let mean = excess.iter().sum::<f64>() / excess.len() as f64;
        let mut at =
            Self { smaller_share: 0.5, smaller_mean_mm: 0.4 * mean, larger_mean_mm: 1.6 * mean, above_mm };
        let mut likelihood = at.log_likelihood(&excess);
        for _ in 0..MOST_STEPS {
            let once = at.improved(&excess, mean);
            let twice = once.improved(&excess, mean);
            let leap = Self::of_free(extrapolated([at.free(), once.free(), twice.free()]), above_mm, mean);
            let leap = leap.improved(&excess, mean);
            let [of_leap, of_twice] = [leap, twice].map(|candidate| candidate.log_likelihood(&excess));
            let (next, reached) = if of_leap > of_twice { (leap, of_leap) } else { (twice, of_twice) };
            let gain = reached - likelihood;
            (at, likelihood) = (next, reached);
            // Not a number ends it as well.
            if gain.is_nan() || gain <= SMALLEST_GAIN * excess.len() as f64 {
                break;
            }
        }
        (at.in_order(), likelihood)
    }

    /// Log-likelihood of what lies above the threshold.
    fn log_likelihood(&self, excess: &[f64]) -> f64 {
        excess.iter().map(|excess| self.densities(*excess)).map(|[a, b]| libm::log(a + b)).sum()
    }

    /// The two parts of the density of an excess.
    fn densities(&self, excess: f64) -> [f64; 2] {
        let part = |share: f64, mean: f64| share / mean * libm::exp(-excess / mean);
        [part(self.smaller_share, self.smaller_mean_mm), part(1.0 - self.smaller_share, self.larger_mean_mm)]
    }

    /// One step of expectation and maximization.
    fn improved(&self, excess: &[f64], mean: f64) -> Self {
        let (mut share, mut smaller, mut larger) = (0.0, 0.0, 0.0);
        for excess in excess {
            let [a, b] = self.densities(*excess);
            let of_smaller = if a + b > 0.0 { a / (a + b) } else { 0.0 };
            share += of_smaller;
            smaller += of_smaller * excess;
            larger += (1.0 - of_smaller) * excess;
        }
        let count = excess.len() as f64;
        let bounded = |sum: f64, share: f64| (sum / share.max(1e-9)).max(LEAST_MEAN_PART * mean);
        Self {
            smaller_share: (share / count).clamp(SHARES[0], SHARES[1]),
            smaller_mean_mm: bounded(smaller, share),
            larger_mean_mm: bounded(larger, count - share),
            above_mm: self.above_mm,
        }
    }

    fn free(&self) -> [f64; 3] {
        [
            libm::log(self.smaller_share / (1.0 - self.smaller_share)),
            libm::log(self.smaller_mean_mm),
            libm::log(self.larger_mean_mm),
        ]
    }

    fn of_free([odds, smaller, larger]: [f64; 3], above_mm: f64, mean: f64) -> Self {
        let [least, most] = [LEAST_MEAN_PART * mean, mean / LEAST_MEAN_PART];
        Self {
            smaller_share: (1.0 / (1.0 + libm::exp(-odds))).clamp(SHARES[0], SHARES[1]),
            smaller_mean_mm: libm::exp(smaller).clamp(least, most),
            larger_mean_mm: libm::exp(larger).clamp(least, most),
            above_mm,
        }
    }

    fn in_order(self) -> Self {
        if self.smaller_mean_mm <= self.larger_mean_mm {
            return self;
        }
        Self {
            smaller_share: 1.0 - self.smaller_share,
            smaller_mean_mm: self.larger_mean_mm,
            larger_mean_mm: self.smaller_mean_mm,
            ..self
        }
    }

    /// An amount above the threshold, mm.
    pub fn draw(&self, random: &mut impl Rng) -> f64 {
        let mean = if random.random::<f64>() < self.smaller_share {
            self.smaller_mean_mm
        } else {
            self.larger_mean_mm
        };
        self.above_mm - mean * libm::log(1.0 - random.random::<f64>())
    }
}

/// Where three points that a map leads through one after another seem to go.
fn extrapolated([first, second, third]: [[f64; 3]; 3]) -> [f64; 3] {
    let mut step = [0.0; 3];
    let mut bend = [0.0; 3];
    for at in 0..3 {
        step[at] = second[at] - first[at];
        bend[at] = third[at] - second[at] - step[at];
    }
    let square = |of: [f64; 3]| of[0] * of[0] + of[1] * of[1] + of[2] * of[2];
    let bends = square(bend);
    if bends.is_nan() || bends <= 0.0 {
        return third;
    }
    let length = -libm::sqrt(square(step) / bends);
    let mut leap = [0.0; 3];
    for at in 0..3 {
        leap[at] = first[at] - 2.0 * length * step[at] + length * length * bend[at];
    }
    leap
}

#[cfg(test)]
mod tests;
