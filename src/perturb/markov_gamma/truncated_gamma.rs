//! Gamma amounts above the wet-day threshold, by exact likelihood.

use super::incomplete_gamma::upper_share;
use rand::{Rng, RngExt};
use rand_distr::{Distribution, StandardNormal};

/// A gamma distribution of which only what lies above a threshold is seen and drawn.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct TruncatedGamma {
    /// Shape.
    pub shape: f64,
    /// Scale, mm.
    pub scale_mm: f64,
    /// The threshold, mm.
    pub above_mm: f64,
}

/// Shapes that are looked at.
const SHAPES: [f64; 2] = [0.05, 100.0];
/// Steps of the coarse look over shapes.
const COARSE: usize = 16;
/// Halvings, by the golden section, of the interval of the best shape: to 1e-10 of the shape.
const FINE: usize = 52;
/// A gamma of which less lies above the threshold says nothing about what does, and takes long to draw from.
const LEAST_SHARE_ABOVE: f64 = 0.05;

/// What the likelihood needs to know of a sample: its size, its mean and its mean logarithm.
#[derive(Clone, Copy)]
struct Sample {
    count: f64,
    mean: f64,
    mean_log: f64,
}

impl TruncatedGamma {
    /// The most likely gamma for amounts that lie above a threshold, and its log-likelihood; none where most of that gamma
    /// would lie below it.
    ///
    /// The scale that belongs to a shape makes the mean above the threshold that of the sample (which is where the
    /// likelihood's slope in the scale is zero); the shape is then searched for the highest likelihood.
    pub fn most_likely(amounts_mm: &[f64], above_mm: f64) -> Option<(Self, f64)> {
        let count = amounts_mm.len() as f64;
        let mean = |of: fn(f64) -> f64| amounts_mm.iter().map(|amount| of(*amount)).sum::<f64>() / count;
        let sample = Sample { count, mean: mean(|amount| amount), mean_log: mean(libm::log) };
        let of = |log_shape: f64| {
            let shape = libm::exp(log_shape);
            let found = Self { shape, scale_mm: scale_of(shape, sample.mean, above_mm), above_mm };
            (found, found.log_likelihood(sample))
        };
        let [low, high] = SHAPES.map(libm::log);
        let step = (high - low) / COARSE as f64;
        let coarse = (0..=COARSE).map(|at| low + step * at as f64);
        let best = coarse.max_by(|a, b| of(*a).1.total_cmp(&of(*b).1))?;
        let found = of(highest(|log_shape| of(log_shape).1, best - step, best + step));
        (found.0.share_above() >= LEAST_SHARE_ABOVE).then_some(found)
    }

    fn log_likelihood(&self, sample: Sample) -> f64 {
        let Self { shape, scale_mm, .. } = *self;
        let of_one = (shape - 1.0) * sample.mean_log
            - sample.mean / scale_mm
            - shape * libm::log(scale_mm)
            - libm::lgamma(shape)
            - libm::log(self.share_above());
        sample.count * of_one
    }

    fn share_above(&self) -> f64 {
        upper_share(self.shape, self.above_mm / self.scale_mm)
    }

    /// An amount above the threshold, mm.
    pub fn draw(&self, random: &mut impl Rng) -> f64 {
        loop {
            let amount_mm = self.scale_mm * standard_gamma(self.shape, random);
            if amount_mm > self.above_mm {
                return amount_mm;
            }
        }
    }
}

/// Mean of a gamma of scale 1 above `above`: `a * Q(a+1, x) / Q(a, x)`.
fn mean_above(shape: f64, above: f64) -> f64 {
    let share = upper_share(shape, above);
    if share > 0.0 { shape * upper_share(shape + 1.0, above) / share } else { above + 1.0 }
}

/// The scale at which the mean above the threshold is that of the sample, to 1e-13.
fn scale_of(shape: f64, mean_mm: f64, above_mm: f64) -> f64 {
    let untruncated = mean_mm / shape;
    if above_mm <= 0.0 {
        return untruncated;
    }
    // The mean above the threshold lies above the gamma's own, so the scale lies below that of the untruncated one; far
    // below it hardly anything is left above the threshold, and its mean is the threshold itself.
    let [mut low, mut high] = [libm::log(untruncated) - 20.0, libm::log(untruncated)];
    let excess = |log_scale: f64| {
        let scale = libm::exp(log_scale);
        scale * mean_above(shape, above_mm / scale) - mean_mm
    };
    let [mut below, mut over] = [excess(low), excess(high)];
    if !(below < 0.0 && over > 0.0) {
        return untruncated;
    }
    // The Illinois variant of the rule of false position.
    for _ in 0..100 {
        let middle = (low * over - high * below) / (over - below);
        let found = excess(middle);
        if found.abs() < 1e-13 * mean_mm || high - low < 1e-13 {
            return libm::exp(middle);
        }
        if found > 0.0 {
            (high, over) = (middle, found);
            below /= 2.0;
        } else {
            (low, below) = (middle, found);
            over /= 2.0;
        }
    }
    libm::exp((low + high) / 2.0)
}

/// The highest place of a function with one hill between two ends, by the golden section.
fn highest(of: impl Fn(f64) -> f64, mut low: f64, mut high: f64) -> f64 {
    const GOLDEN: f64 = 0.618_033_988_749_894_9;
    let [mut left, mut right] = [high - GOLDEN * (high - low), low + GOLDEN * (high - low)];
    let [mut at_left, mut at_right] = [of(left), of(right)];
    for _ in 0..FINE {
        if at_left > at_right {
            high = right;
            (right, at_right) = (left, at_left);
            left = high - GOLDEN * (high - low);
            at_left = of(left);
        } else {
            low = left;
            (left, at_left) = (right, at_right);
            right = low + GOLDEN * (high - low);
            at_right = of(right);
        }
    }
    (low + high) / 2.0
}

/// A gamma draw of scale 1 after Marsaglia & Tsang (2000); shapes below 1 by a draw of one more and a power of a uniform.
///
/// Every transcendental is `libm`'s: the random-number crate's own gamma goes through the system's maths library.
pub fn standard_gamma(shape: f64, random: &mut impl Rng) -> f64 {
    if shape < 1.0 {
        let whole = standard_gamma(shape + 1.0, random);
        return whole * libm::pow(1.0 - random.random::<f64>(), 1.0 / shape);
    }
    let d = shape - 1.0 / 3.0;
    let c = 1.0 / libm::sqrt(9.0 * d);
    loop {
        let normal: f64 = StandardNormal.sample(random);
        let root = 1.0 + c * normal;
        if root <= 0.0 {
            continue;
        }
        let v = root * root * root;
        let log_uniform = libm::log(1.0 - random.random::<f64>());
        if log_uniform < 0.5 * normal * normal + d * (1.0 - v + libm::log(v)) {
            return d * v;
        }
    }
}

#[cfg(test)]
mod tests;
