//! Normal scores: where a value stands among its like, on the scale of a standard normal; and the way back.

use crate::normal::{below, score_of};

/// The distribution's shape is kept at scores from minus to plus this: one value in 370 lies beyond.
const OUTERMOST: f64 = 3.0;
/// At so many scores, a quarter apart.
const PLACES: usize = 25;
const APART: f64 = 2.0 * OUTERMOST / (PLACES - 1) as f64;

/// The values of a distribution at evenly spaced normal scores: its quantiles, whatever its form.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Shape([f64; PLACES]);

impl Shape {
    /// Of a sample, by its quantiles (Hyndman & Fan 1996, type 8). Without values it is that of a standard normal.
    pub fn of(values: impl Iterator<Item = f64>) -> Self {
        let mut sorted: Vec<f64> = values.collect();
        sorted.sort_by(f64::total_cmp);
        let score = |at: usize| APART * at as f64 - OUTERMOST;
        Self(std::array::from_fn(|at| match sorted.as_slice() {
            [] => score(at),
            sorted => quantile(sorted, below(score(at))),
        }))
    }

    /// The score of a value: the way back.
    pub fn score(&self, value: f64) -> f64 {
        let after = self.0.partition_point(|place| *place < value).clamp(1, PLACES - 1);
        let [low, high] = [self.0[after - 1], self.0[after]];
        let through = if high > low { ((value - low) / (high - low)).clamp(0.0, 1.0) } else { 0.5 };
        APART * (after as f64 - 1.0 + through) - OUTERMOST
    }

    /// The value of a score; straight lines between the kept ones, and none beyond the outermost: what a failed sensor
    /// leaves at the ends must not lead on to what no thermometer has read.
    #[inline(always)]
    pub fn value(&self, score: f64) -> f64 {
        let place = ((score + OUTERMOST) / APART).clamp(0.0, (PLACES - 1) as f64);
        let before = (place as usize).min(PLACES - 2);
        let [low, high] = [self.0[before], self.0[before + 1]];
        low + (high - low) * (place - before as f64)
    }
}

/// The normal score of each value by its rank r among n, `(r - 1/3)/(n + 1/3)`; values that are equal share their mean
/// rank.
pub fn normal_scores(values: &[f64]) -> Vec<f64> {
    let mut order: Vec<usize> = (0..values.len()).collect();
    order.sort_by(|a, b| values[*a].total_cmp(&values[*b]));
    let mut scores = vec![0.0; values.len()];
    let mut from = 0;
    for tied in order.chunk_by(|a, b| values[*a] == values[*b]) {
        let rank = from as f64 + (tied.len() as f64 + 1.0) / 2.0;
        let score = score_of((rank - 1.0 / 3.0) / (values.len() as f64 + 1.0 / 3.0));
        for at in tied {
            scores[*at] = score;
        }
        from += tied.len();
    }
    scores
}

/// Quantile of sorted values, type 8; they must not be empty.
pub fn quantile(sorted: &[f64], share: f64) -> f64 {
    let count = sorted.len() as f64;
    let place = ((count + 1.0 / 3.0) * share + 1.0 / 3.0).clamp(1.0, count);
    let before = (place as usize).min(sorted.len()) - 1;
    let after = (before + 1).min(sorted.len() - 1);
    sorted[before] + (sorted[after] - sorted[before]) * (place - (before + 1) as f64)
}

#[cfg(test)]
mod tests;
