//! Detection: from which warming on the change stands out from what chance does, in means over so many years.
//!
//! Studies of emergence hold the mean change against one standard deviation. Unpaired, of the reference's own periods, it
//! says what an observer would see; paired, of the changes of the same weather, why a model sees small warming.

use super::crossing::{Crossing, CrossingRange, crossing, range_of};
use super::ranged::Ranged;
use super::resample::Resamples;
use ndarray::ArrayView2;
use serde::Serialize;

/// Averaging periods, years.
const PERIODS: [usize; 3] = [1, 10, 30];
/// A smaller variance is rounding.
const LEAST_VARIANCE: f64 = 1e-18;

/// A rate of warming that the user states: what turns a level into a year.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct WarmingRate {
    /// Warming a decade, degC.
    pub c_per_decade: f64,
    /// The year in which the climate is the reference's.
    pub from_year: f64,
}

/// The change against the spread, for means over several lengths.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Detection {
    /// The user's rate of warming, if one is stated.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub warming_rate: Option<WarmingRate>,
    /// One entry a length that a realization holds, ascending.
    pub periods: Vec<DetectionPeriod>,
}

/// The change against the spread of means over so many years.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct DetectionPeriod {
    /// Years of a mean.
    pub years: usize,
    /// Means, over all realizations.
    pub means: usize,
    /// One entry a level but the reference.
    pub levels: Vec<DetectionLevel>,
    /// From which warming on the change leaves one standard deviation of the reference's means.
    pub leaves_spread: Crossing,
    /// Range of that warming over resampled realizations.
    pub leaves_spread_range: Option<CrossingRange>,
    /// The calendar year of that warming by the user's rate; none without a rate, or where it is not reached.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub calendar_year: Option<Ranged>,
}

/// One level's change against two spreads.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct DetectionLevel {
    /// The level, degC.
    pub level_c: f64,
    /// Mean change, without its sign, over one standard deviation of the reference's means; none where they do not vary.
    pub unpaired: Option<Ranged>,
    /// The same over one standard deviation of the paired changes.
    pub paired: Option<Ranged>,
}

/// Sums of one realization over its means: of the reference and of the change, themselves and squared about a centre.
type Sums = [[f64; 2]; 2];

impl Detection {
    /// Of single years `[realization][year]`, a table a level; nothing for a single level or values that are no numbers.
    pub(super) fn of(
        years: &[ArrayView2<'_, f64>],
        levels_c: &[f64],
        reference: usize,
        warming_rate: Option<WarmingRate>,
        resamples: &Resamples,
    ) -> Option<Self> {
        let is_whole = years.iter().all(|of| of.iter().all(|value| value.is_finite()));
        if years.len() < 2 || !is_whole {
            return None;
        }
        let held = PERIODS.into_iter().filter(|length| *length <= years[reference].ncols());
        let periods = held
            .map(|length| DetectionPeriod::of(length, years, levels_c, reference, warming_rate, resamples));
        Some(Self { warming_rate, periods: periods.collect() })
    }
}

impl DetectionPeriod {
    fn of(
        length: usize,
        years: &[ArrayView2<'_, f64>],
        levels_c: &[f64],
        reference: usize,
        warming_rate: Option<WarmingRate>,
        resamples: &Resamples,
    ) -> Self {
        let (realizations, all_years) = years[reference].dim();
        let per_realization = all_years / length;
        let once = vec![1; realizations];
        let mut levels = Vec::new();
        let (mut above, mut above_resampled) = (Vec::new(), Vec::new());
        for (level, level_c) in levels_c.iter().enumerate().filter(|(level, _)| *level != reference) {
            let sums = sums(&years[reference], &years[level], length);
            let found = ratios(&sums, per_realization, &once);
            let resampled = resamples.each(|weights| ratios(&sums, per_realization, weights));
            let of = |at: usize| Some(Ranged::new(found[at]?, resampled.iter().map(|ratios| ratios[at])));
            levels.push(DetectionLevel { level_c: *level_c, unpaired: of(0), paired: of(1) });
            if level > reference {
                above.push((*level_c, found[0]));
                above_resampled.push(resampled.iter().map(|ratios| ratios[0]).collect::<Vec<_>>());
            }
        }
        let reference_c = levels_c[reference];
        let leaves_spread = crossing(reference_c, &above);
        let crossings = (0..above_resampled.first().map_or(0, Vec::len)).map(|resample| {
            let one = above.iter().zip(&above_resampled).map(|((level_c, _), of)| (*level_c, of[resample]));
            crossing(reference_c, &one.collect::<Vec<_>>())
        });
        let leaves_spread_range = range_of(crossings);
        let calendar_year = warming_rate.zip(at(leaves_spread)).map(|(rate, level_c)| {
            let year = |level_c: f64| rate.year(level_c - reference_c);
            let range = leaves_spread_range;
            Ranged {
                value: year(level_c),
                q05: range.and_then(|range| range.q05_c).map(year),
                q95: range.and_then(|range| range.q95_c).map(year),
            }
        });
        Self {
            years: length,
            means: realizations * per_realization,
            levels,
            leaves_spread,
            leaves_spread_range,
            calendar_year,
        }
    }
}

impl WarmingRate {
    /// The calendar year in which the climate has warmed by so much since the reference's.
    fn year(self, warming_c: f64) -> f64 {
        self.from_year + 10.0 * warming_c / self.c_per_decade
    }
}

fn at(crossing: Crossing) -> Option<f64> {
    match crossing {
        Crossing::At { level_c, .. } => Some(level_c),
        Crossing::NotReached { .. } | Crossing::Unknown => None,
    }
}

/// Squares are taken about the mean over all realizations, so that they do not lose digits.
fn sums(reference: &ArrayView2<'_, f64>, level: &ArrayView2<'_, f64>, length: usize) -> Vec<Sums> {
    let mean = |piece: ndarray::ArrayView1<'_, f64>| piece.iter().sum::<f64>() / length as f64;
    let pairs: Vec<Vec<[f64; 2]>> = reference
        .rows()
        .into_iter()
        .zip(level.rows())
        .map(|(before, after)| {
            let pairs = before.exact_chunks(length).into_iter().zip(after.exact_chunks(length));
            pairs.map(|(before, after)| (mean(before), mean(after))).map(|(b, a)| [b, a - b]).collect()
        })
        .collect();
    let count = pairs.iter().map(Vec::len).sum::<usize>() as f64;
    let centre = [0, 1].map(|at| pairs.iter().flatten().map(|pair| pair[at]).sum::<f64>() / count);
    let of = |pairs: &Vec<[f64; 2]>| {
        [0, 1].map(|at| {
            let apart = |pair: &[f64; 2]| pair[at] - centre[at];
            let whole = if at == 0 { 0.0 } else { centre[at] * pairs.len() as f64 };
            let sum: f64 = pairs.iter().map(apart).sum();
            // The first is the plain sum of changes; the spread needs it about the centre alone.
            [sum + whole, pairs.iter().map(|pair| apart(pair) * apart(pair)).sum::<f64>()]
        })
    };
    pairs.iter().map(of).collect()
}

/// Mean change over the standard deviation of the reference, and over that of the changes.
fn ratios(of: &[Sums], per_realization: usize, weights: &[u32]) -> [Option<f64>; 2] {
    let weighed = |number: &dyn Fn(&Sums) -> f64| -> f64 {
        of.iter().zip(weights).map(|(sums, weight)| f64::from(*weight) * number(sums)).sum()
    };
    let drawn: f64 = weights.iter().map(|weight| f64::from(*weight)).sum();
    let count = drawn * per_realization as f64;
    let centre = of.iter().map(|sums| sums[1][0]).sum::<f64>() / (of.len() * per_realization) as f64;
    let change = weighed(&|sums| sums[1][0]) / count;
    let about = [weighed(&|sums| sums[0][0]) / count, change - centre];
    [0, 1].map(|at| {
        let squares = weighed(&|sums| sums[at][1]) - count * about[at] * about[at];
        let variance = squares / (count - 1.0);
        (variance > LEAST_VARIANCE).then(|| change.abs() / variance.sqrt())
    })
}

#[cfg(test)]
mod tests {
    use super::*;
    use ndarray::array;

    /// SN-03: the table of SN-01, its last row against its first, each realization one year: unpaired 1.2098, paired 7.7782,
    /// to 1e-4 (computed from the definition).
    #[test]
    fn the_published_table() {
        let years = [array![[400.0], [300.0], [520.0], [380.0]], array![[280.0], [190.0], [400.0], [290.0]]];
        let views = [years[0].view(), years[1].view()];
        let rate = Some(WarmingRate { c_per_decade: 0.25, from_year: 2000.0 });
        let found = Detection::of(&views, &[0.0, 2.0], 0, rate, &Resamples::new(1, 4)).unwrap();
        let [period] = &found.periods[..] else { panic!("{found:?}") };
        let level = period.levels[0];
        assert!((level.unpaired.unwrap().value - 1.2098).abs() < 1e-4, "{level:?}");
        assert!((level.paired.unwrap().value - 7.7782).abs() < 1e-4, "{level:?}");
        // By hand: the ratio passes 1 at 2/1.2098 degC, 1.6532, which 0.25 degC a decade reach after 66.13 years.
        let Crossing::At { level_c, .. } = period.leaves_spread else { panic!("{period:?}") };
        assert!((level_c - 1.6532).abs() < 1e-3);
        assert!((period.calendar_year.unwrap().value - 2066.13).abs() < 0.02, "{period:?}");
        let no_rate = Detection::of(&views, &[0.0, 2.0], 0, None, &Resamples::new(1, 4)).unwrap();
        assert_eq!(no_rate.periods[0].calendar_year, None);
    }

    /// Sampling theory: the standard deviation of means over 10 independent years is 1/sqrt(10) of the years', so the same
    /// change is 3.16 times as many of them; 2000 means know theirs to 1.6 %, so 6 %.
    #[test]
    fn longer_means_show_smaller_changes() {
        use rand_distr::{Distribution, StandardNormal};
        let mut random = crate::perturb::stream(23, 0);
        let years = ndarray::Array2::from_shape_simple_fn((1000, 20), || {
            let drawn: f64 = StandardNormal.sample(&mut random);
            100.0 + 10.0 * drawn
        });
        let warmer = &years - 5.0;
        let few = Resamples::new(1, 1000).few();
        let found = Detection::of(&[years.view(), warmer.view()], &[0.0, 1.0], 0, None, &few).unwrap();
        let [one, ten] = [0, 1].map(|at| found.periods[at].levels[0].unpaired.unwrap());
        assert!((one.value - 0.5).abs() < 0.01 && (ten.value / one.value / 10_f64.sqrt() - 1.0).abs() < 0.06);
        assert!(one.q05.unwrap() < one.value && one.value < one.q95.unwrap());
        assert_eq!(found.periods[0].levels[0].paired, None, "the changes are all alike");
        assert_eq!(found.periods[0].leaves_spread, Crossing::NotReached { up_to_c: 1.0 });
        assert_eq!(found.periods.len(), 2, "no realization of 20 years holds 30");
    }

    /// SN-10: emergence is where signal over noise passes 1 (after Hawkins & Sutton 2012, from memory). Years that vary by 10 about a
    /// mean that falls by 2 a degree emerge at 5 degC; means over 10 and 30 years, whose noise is sqrt(10) and sqrt(30) smaller,
    /// at 1.581 and 0.913 degC, and at 0.2 degC a decade from 2000 on in 2250, 2079 and 2046. Of 24 000, 2400 and 800 means the
    /// noise is known to 0.5, 1.4 and 2.5 %: three times that.
    #[test]
    fn longer_means_emerge_at_smaller_warming() {
        use rand_distr::{Distribution, StandardNormal};
        let mut random = crate::perturb::stream(29, 0);
        let reference = ndarray::Array2::from_shape_simple_fn((800, 30), || {
            let drawn: f64 = StandardNormal.sample(&mut random);
            300.0 + 10.0 * drawn
        });
        let levels_c = [0.0, 1.0, 2.0, 4.0, 6.0];
        let years = levels_c.map(|level_c| &reference - 2.0 * level_c);
        let views: Vec<_> = years.iter().map(|of| of.view()).collect();
        let rate = Some(WarmingRate { c_per_decade: 0.2, from_year: 2000.0 });
        let few = Resamples::new(1, 800).few();
        let found = Detection::of(&views, &levels_c, 0, rate, &few).unwrap();
        let expected = [(5.0, 0.015), (1.581, 0.042), (0.913, 0.075)];
        for (period, (expected_c, share)) in found.periods.iter().zip(expected) {
            let at_c = at(period.leaves_spread).unwrap();
            assert!((at_c / expected_c - 1.0).abs() < share, "{at_c} in {} years", period.years);
            let year = period.calendar_year.unwrap().value;
            assert!((year - (2000.0 + 50.0 * expected_c)).abs() < 50.0 * expected_c * share, "{year}");
        }
        assert_eq!(found.periods.len(), 3);
    }
}
