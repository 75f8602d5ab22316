//! Winters drawn anew from those with observed snow: what a record of other winters, as many, might have been.
//!
//! A storm that the gauge missed is missing until the snow melts, so errors of daily SWE hang together all winter, and a
//! winter is one piece of evidence: whole winters are drawn, never days.

use super::splits::Winter;
use crate::perturb::winters_stream;
use rand::RngExt;

/// How many times each winter is drawn, `[resample][winter]`: as many winters as have observed snow, each drawn from all of
/// them alike (Efron 1979). A resample hangs on the seed and its place alone.
pub(super) fn resampled_winters(winters: &[Winter], resamples: usize, seed: u64) -> Vec<Vec<u32>> {
    let observed: Vec<usize> = (0..winters.len()).filter(|at| winters[*at].is_observed).collect();
    let mut random = winters_stream(seed);
    let one = |_| {
        let mut times = vec![0; winters.len()];
        for _ in 0..observed.len() {
            times[observed[random.random_range(0..observed.len())]] += 1;
        }
        times
    };
    (0..resamples).map(one).collect()
}

#[cfg(test)]
mod tests {
    use super::*;

    /// By hand: of 10 winters, 8 with readings, each resample has 8, none of the others; a winter is left out of a resample with
    /// a chance of (7/8)^8 = 0.3436. Counted over 2000 resamples of 8 winters, which hang together, a standard error of at
    /// most 0.004: 0.015 is some four of them.
    #[test]
    fn as_many_winters_are_drawn_as_there_are() {
        let winter = |at: i32| Winter {
            water_year: 2001 + at,
            mean_c: 0.0,
            cool_season_mm: 0.0,
            is_observed: at != 2 && at != 9,
        };
        let winters: Vec<Winter> = (0..10).map(winter).collect();
        let drawn = resampled_winters(&winters, 2000, 3);
        let mut left_out = 0;
        for times in &drawn {
            assert_eq!((times.iter().sum::<u32>(), times[2], times[9]), (8, 0, 0));
            left_out += times.iter().filter(|times| **times == 0).count() - 2;
        }
        assert!((left_out as f64 / 16_000.0 - 0.3436).abs() < 0.015, "{left_out}");
        assert_eq!(drawn[..5], resampled_winters(&winters, 5, 3));
    }
}
