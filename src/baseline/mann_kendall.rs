//! Whether a yearly series has a trend: Mann (1945), Kendall (1975), with the lag-1 correction of Hamed & Rao (1998).

use super::ranks::Ranks;
use super::seasons::Yearly;
use super::theil_sen::theil_sen;
use super::{LEAST_YEARS, NORMAL_975, SIGNIFICANT_BELOW_P};
use serde::Serialize;

/// The Mann-Kendall test of a yearly series.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct MannKendall {
    /// Kendall's score: pairs of years with the later value higher, less those with it lower.
    pub score: f64,
    /// Kendall's tau-b, -1 to 1: the score over the most that ties allow.
    pub tau_b: f64,
    /// Variance of the score if years were independent, ties taken off.
    pub variance: f64,
    /// The test with that variance.
    pub plain: ScoreTest,
    /// Lag-1 autocorrelation of the ranks of the series without its trend; none where nothing but the trend is there, or
    /// where no two years follow on each other.
    pub lag1: Option<f64>,
    /// Corrected over plain variance: 1 where the lag-1 autocorrelation is not significant at 5 %.
    pub variance_ratio: f64,
    /// The test with the corrected variance; none where that is not positive, as a strong negative autocorrelation can
    /// make it.
    pub corrected: Option<ScoreTest>,
}

/// A score held against its variance.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct ScoreTest {
    /// Standard normal deviate, with continuity correction.
    pub z: f64,
    /// Two-sided chance of such a score without a trend.
    pub p: f64,
}

impl MannKendall {
    /// The p to judge by: the corrected one; where there is none, the plain one, which then errs on the careful side.
    pub fn p(&self) -> f64 {
        self.corrected.unwrap_or(self.plain).p
    }

    /// Whether the trend is significant at 5 %.
    pub fn is_significant(&self) -> bool {
        self.p() < SIGNIFICANT_BELOW_P
    }
}

impl ScoreTest {
    /// `z = (score -+ 1)/sqrt(variance)`, 0 for a score of 0; `p = erfc(|z|/sqrt(2))`.
    fn new(score: f64, variance: f64) -> Self {
        let z = if score == 0.0 { 0.0 } else { (score - score.signum()) / variance.sqrt() };
        Self { z, p: libm::erfc(z.abs() * std::f64::consts::FRAC_1_SQRT_2) }
    }
}

/// The test of a yearly series; none of fewer than [`LEAST_YEARS`] years, and none where all values are the same.
///
/// The correction multiplies the variance by `1 + 2(n-3)/n * lag1`, Hamed & Rao's with lag 1 alone, where `|lag1|` is
/// above `1.96/sqrt(n)`. The trend is taken off by its Theil-Sen slope over the years themselves. Only years that
/// follow on each other make a pair; where some are absent, the mean product of the pairs there are stands for all
/// `n-1`.
pub fn mann_kendall(yearly: &Yearly) -> Option<MannKendall> {
    let values: Vec<f64> = yearly.iter().map(|(_, value)| *value).collect();
    let ranks = Ranks::new(&values);
    if values.len() < LEAST_YEARS || ranks.are_constant() {
        return None;
    }
    let n = ranks.n();
    let pairs = n * (n - 1.0) / 2.0;
    let score = score(&ranks.of);
    let variance = ranks.score_variance();
    let lag1 = lag1(yearly, theil_sen(yearly)?.slope_per_year);
    let variance_ratio = match lag1 {
        Some(lag1) if lag1.abs() > NORMAL_975 / n.sqrt() => 1.0 + 2.0 * (n - 3.0) / n * lag1,
        _ => 1.0,
    };
    Some(MannKendall {
        score,
        tau_b: score / (pairs * (pairs - ranks.tied_pairs())).sqrt(),
        variance,
        plain: ScoreTest::new(score, variance),
        lag1,
        variance_ratio,
        corrected: (variance_ratio > 0.0).then(|| ScoreTest::new(score, variance * variance_ratio)),
    })
}

fn score(ranks: &[f64]) -> f64 {
    let mut score = 0.0;
    for (at, earlier) in ranks.iter().enumerate() {
        for later in &ranks[at + 1..] {
            score += f64::from(i8::from(later > earlier) - i8::from(later < earlier));
        }
    }
    score
}

/// Lag-1 autocorrelation of the ranks of what is left of a series without its trend, with sums over n as is usual for
/// autocorrelations.
fn lag1(yearly: &Yearly, slope_per_year: f64) -> Option<f64> {
    let (first, _) = yearly.first()?;
    let rest: Vec<f64> =
        yearly.iter().map(|(year, value)| value - slope_per_year * f64::from(year - first)).collect();
    let ranks = Ranks::new(&rest);
    let n = ranks.n();
    let departures: Vec<f64> = ranks.of.iter().map(|rank| rank - (n + 1.0) / 2.0).collect();
    let variance = departures.iter().map(|departure| departure * departure).sum::<f64>() / n;
    let (mut products, mut pairs) = (0.0, 0.0);
    for (years, neighbours) in yearly.windows(2).zip(departures.windows(2)) {
        if years[1].0 - years[0].0 == 1 {
            products += neighbours[0] * neighbours[1];
            pairs += 1.0;
        }
    }
    (pairs > 0.0 && variance > 0.0).then(|| products / pairs * (n - 1.0) / n / variance)
}

#[cfg(test)]
mod tests {
    use super::*;

    fn yearly(value: impl Fn(i32) -> f64, years: impl Iterator<Item = i32>) -> Vec<(i32, f64)> {
        years.map(|year| (year, value(year))).collect()
    }

    /// A straight line leaves nothing behind: 10 years, 45 pairs all rising, variance 10*9*25/18 = 125.
    #[test]
    fn a_trend_alone_has_no_autocorrelation() {
        let found = mann_kendall(&yearly(|year| 0.1 * f64::from(year), 2001..=2010)).unwrap();
        assert_eq!((found.score, found.tau_b, found.variance), (45.0, 1.0, 125.0));
        assert_eq!((found.lag1, found.variance_ratio), (None, 1.0));
        assert!(found.is_significant());
    }

    /// Ranks that alternate between two halves: every product is negative, 1 - 2*17/20*|lag1| below 0.
    #[test]
    fn a_variance_below_zero_is_none() {
        let alternating = |year: i32| f64::from(year % 2) * 5.0 + f64::from(year * year % 7) / 10.0;
        let found = mann_kendall(&yearly(alternating, 2001..=2020)).unwrap();
        assert!(found.lag1.unwrap() < -0.6, "{found:?}");
        assert!(found.variance_ratio < 0.0);
        assert_eq!(found.corrected, None);
        assert_eq!(found.p(), found.plain.p);
    }

    #[test]
    fn years_that_never_follow_on_each_other_have_no_lag() {
        let every_other = yearly(|year| f64::from(year * year % 11), (1990..2014).step_by(2));
        let found = mann_kendall(&every_other).unwrap();
        assert_eq!((found.lag1, found.corrected), (None, Some(found.plain)));
    }

    #[test]
    fn too_few_years_or_a_constant_have_no_test() {
        assert_eq!(mann_kendall(&yearly(f64::from, 2001..=2007)), None);
        assert!(mann_kendall(&yearly(f64::from, 2001..=2008)).is_some());
        assert_eq!(mann_kendall(&yearly(|_| 4.0, 2001..=2030)), None);
        assert_eq!(mann_kendall(&[]), None);
    }
}
