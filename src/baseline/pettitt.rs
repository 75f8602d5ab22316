//! Whether a yearly series steps, and after which year: Pettitt (1979).

use super::ranks::Ranks;
use super::seasons::Yearly;
use super::{LEAST_YEARS, SIGNIFICANT_BELOW_P};
use serde::Serialize;

/// Pettitt's test of a yearly series: the split that parts low from high values best.
///
/// A steady trend looks like a step in its middle, and so may years that hang together; read it beside the trend.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Pettitt {
    /// Pettitt's K: `max |U(t)|`, `U(t) = 2*(sum of the first t ranks) - t(n+1)`.
    pub k: f64,
    /// Last year before the step; the first such split, where several are as good.
    pub last_year_before: i32,
    /// Chance of such a K without a step, `2*exp(-6K^2/(n^3+n^2))` and at most 1; good below 0.5.
    pub p: f64,
    /// Mean of the years up to the step.
    pub mean_before: f64,
    /// Mean of the years after it.
    pub mean_after: f64,
}

impl Pettitt {
    /// Whether the step is significant at 5 %.
    pub fn is_significant(&self) -> bool {
        self.p < SIGNIFICANT_BELOW_P
    }
}

/// The test of a yearly series; none of fewer than [`LEAST_YEARS`] years, and none where all values are the same.
pub fn pettitt(yearly: &Yearly) -> Option<Pettitt> {
    let values: Vec<f64> = yearly.iter().map(|(_, value)| *value).collect();
    let ranks = Ranks::new(&values);
    if values.len() < LEAST_YEARS || ranks.are_constant() {
        return None;
    }
    let n = ranks.n();
    let (mut sum, mut k, mut before) = (0.0, -1.0, 0);
    for (at, rank) in ranks.of[..values.len() - 1].iter().enumerate() {
        sum += rank;
        let years = (at + 1) as f64;
        let parted = (2.0 * sum - years * (n + 1.0)).abs();
        if parted > k {
            (k, before) = (parted, at + 1);
        }
    }
    let mean = |part: &[f64]| part.iter().sum::<f64>() / part.len() as f64;
    Some(Pettitt {
        k,
        last_year_before: yearly[before - 1].0,
        p: (2.0 * libm::exp(-6.0 * k * k / (n * n * (n + 1.0)))).min(1.0),
        mean_before: mean(&values[..before]),
        mean_after: mean(&values[before..]),
    })
}

#[cfg(test)]
mod tests {
    use super::*;

    /// Up and down again: six low years rank 3.5 and three high ones 8, so U is -9 after the third year and 9 after the
    /// sixth.
    #[test]
    fn of_two_splits_as_good_the_first() {
        let yearly: Vec<(i32, f64)> =
            (2001..=2009).map(|year| (year, if (2004..=2006).contains(&year) { 5.0 } else { 1.0 })).collect();
        let found = pettitt(&yearly).unwrap();
        assert_eq!((found.k, found.last_year_before), (9.0, 2003));
    }

    /// Eight years, four low and four high: the first four ranks add up to 10, U = 20 - 36, p = 2 exp(-1536/576).
    #[test]
    fn a_clean_step() {
        let yearly: Vec<(i32, f64)> =
            (2001..=2008).map(|year| (year, if year > 2004 { 7.0 } else { 1.0 })).collect();
        let found = pettitt(&yearly).unwrap();
        assert_eq!((found.k, found.last_year_before), (16.0, 2004));
        assert_eq!((found.mean_before, found.mean_after), (1.0, 7.0));
        assert!((found.p - 2.0 * libm::exp(-1536.0 / 576.0)).abs() < 1e-15);
        assert!(!found.is_significant(), "eight years are too few for the best of steps");
        assert_eq!(pettitt(&yearly[..7]), None);
        assert_eq!(pettitt(&yearly.iter().map(|(year, _)| (*year, 1.0)).collect::<Vec<_>>()), None);
    }
}
