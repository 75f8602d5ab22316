//! How well the snow of the survey date alone foretells the inflow of the window, level by level.
//!
//! Operators go by a line through past years. With warming more of the inflow has come before the survey date, or comes as rain
//! after it: the line fits less well, and the old line, drawn at the reference, misses.

use super::super::ranged::Ranged;
use super::super::resample::Resamples;
use super::super::yardstick::Levels;
use crate::season::Measure;
use ndarray::{ArrayView2, ArrayView3, Axis};
use serde::Serialize;

/// What snow foretells.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Outlook {
    /// What foretells.
    pub snow: Measure,
    /// What is foretold.
    pub inflow: Measure,
    /// One entry a level.
    pub levels: Vec<OutlookLevel>,
}

/// The same at one level, over all years of all realizations.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct OutlookLevel {
    /// The level, degC.
    pub level_c: f64,
    /// Pearson's correlation; none where one of the two does not vary.
    pub correlation: Option<Ranged>,
    /// Spearman's, of ranks, those of ties averaged.
    pub rank_correlation: Option<Ranged>,
    /// Width of the interval that holds 9 of 10 years about the level's own least-squares line, hm3: 2 * 1.645 standard deviations
    /// about it, as if normal, the line taken as known.
    pub interval_hm3: Option<Ranged>,
    /// The same over the mean volume, percent.
    pub interval_pct: Option<Ranged>,
    /// What the reference's line foretells less what comes, the mean over years, hm3.
    pub old_line_off_hm3: Option<Ranged>,
    /// The same over the mean volume, percent.
    pub old_line_off_pct: Option<Ranged>,
}

/// Nine of ten of a normal distribution lie within so many standard deviations.
const NINE_IN_TEN: f64 = 1.644_853_626_951_472_7;
/// What varies by less, of its own size, does not vary.
const LEAST_VARIATION: f64 = 1e-9;

/// Sums of a realization's years about fixed centres, of which all else is made.
#[derive(Debug, Clone, Copy, Default)]
struct Sums {
    n: f64,
    x: f64,
    y: f64,
    xx: f64,
    yy: f64,
    xy: f64,
}

/// A straight line and what lies about it.
#[derive(Debug, Clone, Copy)]
struct Line {
    slope: f64,
    intercept: f64,
    correlation: f64,
    deviation: f64,
}

impl Outlook {
    /// Asks it of single years, `[level][realization][year]`: of snow, and of the volume.
    pub(super) fn of(
        [snow, inflow]: [&Measure; 2],
        [swe, volumes]: [ArrayView3<'_, f64>; 2],
        levels: Levels<'_>,
        resamples: &Resamples,
    ) -> Option<Self> {
        if !swe.iter().chain(volumes).all(|value| value.is_finite()) {
            return None;
        }
        let once = vec![1; swe.dim().1];
        let of = |level: usize| {
            let [swe, volumes] = [&swe, &volumes].map(|of| of.index_axis(Axis(0), level));
            (sums(&swe, &volumes), ranks(&swe), ranks(&volumes))
        };
        let reference = of(levels.reference).0;
        let of_level = |(level, level_c): (usize, &f64)| {
            let (own, snow_ranks, volume_ranks) = of(level);
            let of_ranks = sums(&snow_ranks.view(), &volume_ranks.view());
            let ranged = |number: &dyn Fn(&[u32]) -> Option<f64>| {
                Some(Ranged::new(number(&once)?, resamples.each(number)))
            };
            let line = |weights: &[u32]| all(&own, weights).line();
            let mean = |weights: &[u32]| all(&own, weights).mean_y();
            let width = |weights: &[u32]| Some(2.0 * NINE_IN_TEN * line(weights)?.deviation);
            let old_line = |weights: &[u32]| {
                let line = all(&reference, weights).line()?;
                let own = all(&own, weights);
                Some(line.intercept + line.slope * own.mean_x() - own.mean_y())
            };
            let pct = |of: Option<f64>, weights: &[u32]| {
                let mean = mean(weights);
                of.filter(|_| mean > 0.0).map(|of| 100.0 * of / mean)
            };
            OutlookLevel {
                level_c: *level_c,
                correlation: ranged(&|weights| Some(line(weights)?.correlation)),
                rank_correlation: ranged(&|weights| Some(all(&of_ranks, weights).line()?.correlation)),
                interval_hm3: ranged(&width),
                interval_pct: ranged(&|weights| pct(width(weights), weights)),
                old_line_off_hm3: ranged(&old_line),
                old_line_off_pct: ranged(&|weights| pct(old_line(weights), weights)),
            }
        };
        let levels = levels.levels_c.iter().enumerate().map(of_level).collect();
        Some(Self { snow: snow.clone(), inflow: inflow.clone(), levels })
    }
}

fn sums(x: &ArrayView2<'_, f64>, y: &ArrayView2<'_, f64>) -> Vec<Sums> {
    let of_realization = |(x, y): (ndarray::ArrayView1<'_, f64>, ndarray::ArrayView1<'_, f64>)| {
        x.iter().zip(y).fold(Sums::default(), |sums, (x, y)| Sums {
            n: sums.n + 1.0,
            x: sums.x + x,
            y: sums.y + y,
            xx: sums.xx + x * x,
            yy: sums.yy + y * y,
            xy: sums.xy + x * y,
        })
    };
    x.rows().into_iter().zip(y.rows()).map(of_realization).collect()
}

fn all(of: &[Sums], weights: &[u32]) -> Sums {
    of.iter().zip(weights).fold(Sums::default(), |all, (sums, weight)| {
        let weight = f64::from(*weight);
        Sums {
            n: all.n + weight * sums.n,
            x: all.x + weight * sums.x,
            y: all.y + weight * sums.y,
            xx: all.xx + weight * sums.xx,
            yy: all.yy + weight * sums.yy,
            xy: all.xy + weight * sums.xy,
        }
    })
}

impl Sums {
    fn mean_x(&self) -> f64 {
        self.x / self.n
    }

    fn mean_y(&self) -> f64 {
        self.y / self.n
    }

    /// The least-squares line; nothing of fewer than three years, or where one of the two does not vary.
    fn line(&self) -> Option<Line> {
        let (xx, yy) = (self.xx - self.x * self.mean_x(), self.yy - self.y * self.mean_y());
        let xy = self.xy - self.x * self.mean_y();
        let varies = |squares: f64, all: f64| squares > LEAST_VARIATION * all;
        if self.n < 3.0 || !varies(xx, self.xx) || !varies(yy, self.yy) {
            return None;
        }
        let slope = xy / xx;
        let about = (yy - slope * xy).max(0.0);
        Some(Line {
            slope,
            intercept: self.mean_y() - slope * self.mean_x(),
            correlation: xy / (xx * yy).sqrt(),
            deviation: (about / (self.n - 2.0)).sqrt(),
        })
    }
}

/// Ranks of all years, from 1, those of ties averaged.
fn ranks(of: &ArrayView2<'_, f64>) -> ndarray::Array2<f64> {
    let mut order: Vec<((usize, usize), f64)> = of.indexed_iter().map(|(at, value)| (at, *value)).collect();
    order.sort_by(|a, b| a.1.total_cmp(&b.1));
    let mut ranks = ndarray::Array2::zeros(of.raw_dim());
    let mut first = 0;
    for tie in order.chunk_by(|a, b| a.1 == b.1) {
        // The mean of first + 1 to first + n.
        let rank = first as f64 + (tie.len() + 1) as f64 / 2.0;
        for (at, _) in tie {
            ranks[*at] = rank;
        }
        first += tie.len();
    }
    ranks
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::season::Kind;
    use ndarray::array;

    fn outlook(swe: &ndarray::Array3<f64>, volumes: &ndarray::Array3<f64>) -> Outlook {
        let (snow, inflow) = (Measure::april_swe(), Measure::new(Kind::VolumeHm3, "v_hm3", "v"));
        let levels = Levels { levels_c: &[0.0, 1.0], reference: 0 };
        let resamples = Resamples::new(1, swe.dim().1);
        Outlook::of([&snow, &inflow], [swe.view(), volumes.view()], levels, &resamples).unwrap()
    }

    /// By hand, the textbook way: x = 1 2 3 4 5, y = 2 1 4 3 5 have r = 8/10 = 0.8, which is Spearman's, too, the values being
    /// ranks; the line is y = 0.6 + 0.8 x with a sum of squares about it of 10 - 6.4 = 3.6, so a deviation of sqrt(3.6/3).
    /// The same line on the second level, y one less throughout, foretells 1 too much of a mean of 2.
    #[test]
    fn the_line_by_hand() {
        let x = array![[[1.0, 2.0, 3.0, 4.0, 5.0]], [[1.0, 2.0, 3.0, 4.0, 5.0]]];
        let y = array![[[2.0, 1.0, 4.0, 3.0, 5.0]], [[1.0, 0.0, 3.0, 2.0, 4.0]]];
        let found = outlook(&x, &y);
        let is = |of: &Option<Ranged>, expected: f64| {
            let value = of.unwrap().value;
            assert!((value - expected).abs() < 1e-9, "{value} and not {expected}");
        };
        is(&found.levels[0].correlation, 0.8);
        is(&found.levels[0].rank_correlation, 0.8);
        is(&found.levels[0].interval_hm3, 2.0 * NINE_IN_TEN * 1.2_f64.sqrt());
        is(&found.levels[0].old_line_off_hm3, 0.0);
        is(&found.levels[1].old_line_off_hm3, 1.0);
        is(&found.levels[1].old_line_off_pct, 50.0);
    }

    /// By hand: 10 20 20 30 have the ranks 1, 2.5, 2.5, 4.
    #[test]
    fn ties_share_their_rank() {
        assert_eq!(ranks(&array![[10.0, 20.0], [20.0, 30.0]].view()), array![[1.0, 2.5], [2.5, 4.0]]);
    }

    /// Where there is no snow at all, it foretells nothing; the volume's line of the reference cannot be applied either.
    #[test]
    fn snow_that_does_not_vary_foretells_nothing() {
        let swe = array![[[0.0, 0.0, 0.0]], [[0.0, 0.0, 0.0]]];
        let found = outlook(&swe, &array![[[1.0, 2.0, 3.0]], [[1.0, 2.0, 3.0]]]);
        assert_eq!(found.levels[0].correlation, None);
        assert_eq!(found.levels[1].old_line_off_hm3, None);
    }
}
