//! The slope of a yearly series: Theil (1950), Sen (1968).

use super::ranks::Ranks;
use super::seasons::Yearly;
use super::{LEAST_YEARS, NORMAL_975};
use serde::Serialize;

/// A straight line through a yearly series, by medians.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct TheilSen {
    /// Median of the slopes between all pairs of years, in the series' unit per year.
    pub slope_per_year: f64,
    /// 95 % interval of the slope.
    pub interval_95_per_year: [f64; 2],
    /// Median of the years; the line goes through it and the median value (Conover 1980).
    pub median_year: f64,
    /// Median of the values.
    pub median_value: f64,
}

impl TheilSen {
    /// The line's value in a year.
    pub fn at(&self, year: f64) -> f64 {
        self.median_value + self.slope_per_year * (year - self.median_year)
    }
}

/// The line of a yearly series; none of fewer than [`LEAST_YEARS`] years. Years left out are simply absent.
///
/// The interval's ends are the slopes ranked `(N - C)/2` and `(N + C)/2 + 1` of N, to the nearest whole rank, with C
/// 1.96 standard deviations of Kendall's score (Sen 1968; Gilbert 1987). It takes years for independent.
pub fn theil_sen(yearly: &Yearly) -> Option<TheilSen> {
    if yearly.len() < LEAST_YEARS {
        return None;
    }
    let mut slopes = Vec::new();
    for (at, (year, value)) in yearly.iter().enumerate() {
        for (later_year, later_value) in &yearly[at + 1..] {
            slopes.push((later_value - value) / f64::from(later_year - year));
        }
    }
    slopes.sort_unstable_by(f64::total_cmp);
    let mut values: Vec<f64> = yearly.iter().map(|(_, value)| *value).collect();
    let count = slopes.len() as f64;
    let reach = NORMAL_975 * Ranks::new(&values).score_variance().sqrt();
    let ranked = |rank: f64| slopes[rank.clamp(1.0, count) as usize - 1];
    let interval_95_per_year = [
        ranked(((count - reach) / 2.0).round_ties_even()),
        ranked(((count + reach) / 2.0).round_ties_even() + 1.0),
    ];
    let years: Vec<f64> = yearly.iter().map(|(year, _)| f64::from(*year)).collect();
    values.sort_unstable_by(f64::total_cmp);
    Some(TheilSen {
        slope_per_year: median(&slopes),
        interval_95_per_year,
        median_year: median(&years),
        median_value: median(&values),
    })
}

/// Median of values in order; there is at least one.
fn median(sorted: &[f64]) -> f64 {
    let n = sorted.len();
    (sorted[(n - 1) / 2] + sorted[n / 2]) / 2.0
}

#[cfg(test)]
mod tests {
    use super::*;

    /// A line with two wild years: of 45 slopes 13 fall below 0.25 and 4 rise above it. The score's variance is 125, so
    /// the interval's ends are ranked (45 - 21.9)/2, the 12th slope, and (45 + 21.9)/2 + 1, the 34th, one of the 28 in
    /// between.
    #[test]
    fn two_wild_years_leave_the_slope() {
        let mut yearly: Vec<(i32, f64)> =
            (2001..=2010).map(|year| (year, 0.25 * f64::from(year - 2001))).collect();
        yearly[3].1 = 50.0;
        yearly[8].1 = -50.0;
        let found = theil_sen(&yearly).unwrap();
        assert_eq!(found.slope_per_year, 0.25);
        assert!(found.interval_95_per_year[0] < 0.25);
        assert_eq!(found.interval_95_per_year[1], 0.25);
        assert_eq!(theil_sen(&yearly[..7]), None);
    }

    #[test]
    fn a_constant_has_slope_zero() {
        let found = theil_sen(&(2001..=2010).map(|year| (year, 3.0)).collect::<Vec<_>>()).unwrap();
        assert_eq!((found.slope_per_year, found.interval_95_per_year), (0.0, [0.0, 0.0]));
        assert_eq!(found.at(1900.0), 3.0);
    }
}
