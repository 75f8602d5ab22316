//! SWE of the basin through the water year: its median and 10-90 % range on every day, at every level.

use super::quantile::quantile_by;
use crate::ensemble::{COUNTED_DAYS, SweDays};
use serde::Serialize;

/// SWE of the basin on every day of the water year, over all years of all realizations.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct SweThroughYear {
    /// Every value is a multiple of this, mm: SWE is kept as counts of what rounds to it, so a value is off by at most
    /// half of it.
    pub bin_mm: f64,
    /// Years that are counted at each level.
    pub years: usize,
    /// Days counted, of all levels, on which SWE was above the highest bin and stands as that.
    pub days_above_highest_bin: usize,
    /// One entry a level.
    pub levels: Vec<LevelThroughYear>,
}

/// SWE through the year at one level. The first value is of the water year's first day, as it begins; there are 365.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct LevelThroughYear {
    /// The level, degC.
    pub level_c: f64,
    /// 10 % quantile of each day, mm.
    pub q10_mm: Vec<f64>,
    /// Median of each day, mm.
    pub q50_mm: Vec<f64>,
    /// 90 % quantile of each day, mm.
    pub q90_mm: Vec<f64>,
    /// Highest value of the median, mm.
    pub highest_median_mm: f64,
    /// Day of the water year, counted from 1, in the middle of those on which the median has it; none where it is 0.
    pub highest_median_day: Option<usize>,
}

impl SweThroughYear {
    /// Quantiles of the counts, type 8 as everywhere.
    pub(super) fn of(days: &SweDays, levels_c: &[f64]) -> Self {
        let bins = days.bins;
        let levels = levels_c.iter().enumerate().map(|(level, level_c)| {
            let ranked: Vec<[f64; 3]> = (0..COUNTED_DAYS)
                .map(|day| quantiles(days.day(level, day).iter().copied()).map(|bin| bin * bins.width_mm))
                .collect();
            let column = |at: usize| ranked.iter().map(|quantiles| quantiles[at]).collect::<Vec<f64>>();
            let q50_mm = column(1);
            let (highest_median_mm, highest_median_day) = highest(&q50_mm);
            LevelThroughYear {
                level_c: *level_c,
                q10_mm: column(0),
                q50_mm,
                q90_mm: column(2),
                highest_median_mm,
                highest_median_day,
            }
        });
        let highest = days.counts.index_axis(ndarray::Axis(2), bins.count - 1);
        Self {
            bin_mm: bins.width_mm,
            years: days.day(0, 0).iter().map(|count| *count as usize).sum(),
            days_above_highest_bin: highest.iter().map(|count| *count as usize).sum(),
            levels: levels.collect(),
        }
    }
}

/// The highest of a year's daily values and its day. Binned values stay the same for days about their highest, so the day is
/// the middle one of these.
fn highest(days_mm: &[f64]) -> (f64, Option<usize>) {
    let highest_mm = days_mm.iter().copied().fold(0.0, f64::max);
    let days: Vec<usize> =
        (1..).zip(days_mm).filter(|(_, mm)| **mm == highest_mm).map(|(day, _)| day).collect();
    let middle = days.get(days.len().saturating_sub(1) / 2).copied();
    (highest_mm, middle.filter(|_| highest_mm > 0.0))
}

/// The 10, 50 and 90 % quantiles of counts by bin, in bins.
fn quantiles(counts: impl Iterator<Item = u32>) -> [f64; 3] {
    let mut below = Vec::new();
    let mut sum = 0;
    for count in counts {
        sum += count as usize;
        below.push(sum);
    }
    [0.1, 0.5, 0.9].map(|p| quantile_by(sum, p, |rank| below.partition_point(|upto| *upto <= rank) as f64))
}

#[cfg(test)]
mod tests {
    use super::super::{quantile, sorted};
    use super::*;

    /// Of counts, the quantiles are those of the values written out.
    #[test]
    fn quantiles_of_counts_equal_those_of_values() {
        let counts = [3_u32, 0, 5, 1, 0, 0, 2];
        let values =
            counts.iter().enumerate().flat_map(|(bin, n)| std::iter::repeat_n(bin as f64, *n as usize));
        let values = sorted(values);
        assert_eq!(quantiles(counts.into_iter()), [0.1, 0.5, 0.9].map(|p| quantile(&values, p)));
    }

    /// By hand: 8 mm on the 4th to 6th day.
    #[test]
    fn the_highest_days_are_told_by_their_middle() {
        assert_eq!(highest(&[0.0, 2.0, 6.0, 8.0, 8.0, 8.0, 4.0]), (8.0, Some(5)));
        assert_eq!(highest(&[0.0, 2.0, 8.0, 8.0]), (8.0, Some(3)));
        assert_eq!(highest(&[0.0, 0.0]), (0.0, None));
        assert_eq!(highest(&[]), (0.0, None));
    }
}
