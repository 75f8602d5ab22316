//! Tipping levels: at which warming something that the user wants to hold begins to fail.

use super::crossing::{Crossing, CrossingRange, range_of};
use super::quantile::{quantile, sorted};
use super::resample::{Estimate, Ranked, Resamples};
use super::surface::{Change, SurfaceQuestions};
use super::surface_nodes::Nodes;
use ndarray::ArrayView3;
use serde::Serialize;

/// So many standard errors to either side hold 90 % of a normal distribution.
const OF_90_PCT: f64 = 1.645;

/// Something that is to hold, over the single years of all realizations.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Criterion {
    /// Its name.
    pub name: String,
    /// What is asked.
    #[serde(flatten)]
    pub asks: Asks,
}

/// What a criterion asks of SWE on the survey date.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
#[serde(rename_all = "snake_case", tag = "asks")]
pub enum Asks {
    /// In half of the years at least so much.
    MedianAtLeast {
        /// SWE as the mean over the basin, mm.
        swe_mm: f64,
        /// Where it was stated as a volume of water over the whole basin, hm3.
        volume_hm3: Option<f64>,
    },
    /// Low-snow years in at most this share.
    LowSnowYearsAtMost {
        /// 0 to 1.
        share: f64,
        /// Quantile of the reference's single years below which a year is low.
        below_quantile: f64,
    },
}

/// Where a criterion begins to fail.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct TippingLevel {
    /// The criterion.
    pub criterion: Criterion,
    /// What it asks about, at every level; empty where it cannot be asked.
    pub levels: Vec<CriterionLevel>,
    /// Whether it holds at the reference; nothing is said of where it fails if not. None where it cannot be asked: the limit of a
    /// low-snow year is bare ground, below which nothing lies.
    pub holds_at_reference: Option<bool>,
    /// Whether it lies so near its limit at the reference, within 1.645 Monte Carlo errors or one year in all, that these realizations
    /// cannot tell whether it holds there.
    pub too_near_at_reference: bool,
    /// The first warming at which it fails, scanning up from the reference, linear between levels.
    pub fails: Crossing,
    /// The Monte Carlo range of that warming: 5-95 % over resampled realizations; a resample that fails at the reference counts
    /// as the reference.
    pub fails_range: Option<CrossingRange>,
}

/// What a criterion asks about at a level.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct CriterionLevel {
    /// The level, degC.
    pub level_c: f64,
    /// The median of single years, mm, or the share of low-snow years, with its Monte Carlo error.
    pub value: Estimate,
    /// Whether the criterion holds.
    pub holds: bool,
}

/// Where on the surface's grid a criterion fails.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct FailureLine {
    /// The criterion's name.
    pub name: String,
    /// By how much it holds at each node of the grid, in the order of its nodes, below 0 where it fails: mm, or share of years.
    pub margins: Vec<f64>,
}

impl Asks {
    /// By how much a value holds; below 0 it fails.
    fn margin(self, value: f64) -> f64 {
        match self {
            Self::MedianAtLeast { swe_mm, .. } => value - swe_mm,
            Self::LowSnowYearsAtMost { share, .. } => share - value,
        }
    }

    /// What is asked about, of single years; `reference` are those of the reference. None where no year can be low.
    fn value(self, years: &[f64], reference: &[f64]) -> Option<f64> {
        match self {
            Self::MedianAtLeast { .. } => Some(quantile(&sorted(years.iter().copied()), 0.5)),
            Self::LowSnowYearsAtMost { below_quantile, .. } => {
                let low_mm = quantile(&sorted(reference.iter().copied()), below_quantile);
                let low = || years.iter().filter(|swe_mm| **swe_mm < low_mm).count();
                (low_mm > 0.0).then(|| low() as f64 / years.len() as f64)
            }
        }
    }

    /// The same in every resample of whole realizations.
    fn resampled(self, years: &Ranked, reference: &Ranked, resamples: &Resamples) -> Vec<Option<f64>> {
        resamples.each(|weights| match self {
            Self::MedianAtLeast { .. } => years.quantiles(weights, [0.5]).map(|[median]| median),
            Self::LowSnowYearsAtMost { below_quantile, .. } => {
                let [low_mm] = reference.quantiles(weights, [below_quantile])?;
                if low_mm <= 0.0 {
                    return None;
                }
                let count = |of: &mut dyn Iterator<Item = &(f64, usize)>| {
                    of.map(|(_, realization)| f64::from(weights[*realization])).sum::<f64>()
                };
                let low = count(&mut years.values().iter().take_while(|(swe_mm, _)| *swe_mm < low_mm));
                Some(low / count(&mut years.values().iter()))
            }
        })
    }
}

impl TippingLevel {
    /// Asks a criterion of single years `[level][realization][year]`, mm.
    pub fn of(
        criterion: &Criterion,
        years: &ArrayView3<'_, f64>,
        (levels_c, reference): (&[f64], usize),
        resamples: &Resamples,
    ) -> Self {
        let asks = criterion.asks;
        let of_level = |level: usize| years.index_axis(ndarray::Axis(0), level);
        let plain = |level: usize| of_level(level).iter().copied().collect::<Vec<f64>>();
        let ranked = |level: usize| {
            Ranked::new(of_level(level).indexed_iter().map(|((realization, _), swe)| (*swe, realization)))
        };
        let (reference_years, reference_ranked) = (plain(reference), ranked(reference));
        let resampled: Vec<Vec<Option<f64>>> = (0..levels_c.len())
            .map(|level| asks.resampled(&ranked(level), &reference_ranked, resamples))
            .collect();
        let of_each: Option<Vec<CriterionLevel>> = (0..levels_c.len())
            .map(|level| {
                let value = asks.value(&plain(level), &reference_years)?;
                Some(CriterionLevel {
                    level_c: levels_c[level],
                    value: Estimate::new(value, resampled[level].iter().copied()),
                    holds: asks.margin(value) >= 0.0,
                })
            })
            .collect();
        let levels = of_each.unwrap_or_default();
        let warmer = || reference + 1..levels_c.len();
        let first_failure = |value: &dyn Fn(usize) -> Option<f64>| {
            let margin = |level: usize| value(level).map(|value| asks.margin(value));
            let margins: Option<Vec<f64>> = std::iter::once(reference).chain(warmer()).map(margin).collect();
            margins.map_or(Crossing::Unknown, |margins| failing(&levels_c[reference..], &margins))
        };
        let fails = first_failure(&|level| Some(levels.get(level)?.value.value));
        let of_resamples = (0..resampled[reference].len())
            .map(|resample| first_failure(&|level| resampled[level].get(resample).copied().flatten()));
        Self {
            criterion: criterion.clone(),
            too_near_at_reference: levels.get(reference).is_some_and(|level| {
                let one_year = match asks {
                    Asks::MedianAtLeast { .. } => 0.0,
                    Asks::LowSnowYearsAtMost { .. } => 1.0 / reference_years.len() as f64,
                };
                let error = level.value.monte_carlo_error.unwrap_or(0.0);
                asks.margin(level.value.value).abs() < (OF_90_PCT * error).max(one_year)
            }),
            holds_at_reference: levels.get(reference).map(|level| level.holds),
            fails,
            fails_range: range_of(of_resamples).filter(|_| !levels.is_empty()),
            levels,
        }
    }
}

/// Where a margin first falls below 0, scanning up from the reference, and where it is first back, linear between levels; at the
/// reference where it lies below there.
fn failing(levels_c: &[f64], margins: &[f64]) -> Crossing {
    let ([_, .., highest], [at_reference, ..]) = (levels_c, margins) else { return Crossing::Unknown };
    let passes = |fails: bool| {
        let ends = levels_c.windows(2).zip(margins.windows(2)).enumerate();
        let passing =
            move |(_, (_, of)): &(usize, (&[f64], &[f64]))| (of[0] < 0.0) != fails && (of[1] < 0.0) == fails;
        ends.filter(passing).map(|(at, (levels_c, of))| {
            (at, levels_c[0] + of[0] / (of[0] - of[1]) * (levels_c[1] - levels_c[0]))
        })
    };
    let first = if *at_reference < 0.0 { Some((0, levels_c[0])) } else { passes(true).next() };
    match first {
        None => Crossing::NotReached { up_to_c: *highest },
        Some((from, level_c)) => {
            let back = passes(false).find(|(at, _)| *at >= from).map(|(_, back_c)| back_c);
            Crossing::At { level_c, until_c: back }
        }
    }
}

impl FailureLine {
    /// Asks a criterion at every node of the grid; nothing where a node is missing, or it cannot be asked.
    pub(super) fn of(criterion: &Criterion, nodes: &Nodes, questions: &SurfaceQuestions<'_>) -> Option<Self> {
        let at = |warming_c, precipitation_change_pct| {
            nodes.single_years(Change { warming_c, precipitation_change_pct })
        };
        let reference = at(questions.reference_c, 0.0)?;
        let mut margins = Vec::new();
        for warming_c in &questions.warmings_c {
            for pct in &questions.precipitation_changes_pct {
                margins
                    .push(criterion.asks.margin(criterion.asks.value(&at(*warming_c, *pct)?, &reference)?));
            }
        }
        Some(Self { name: criterion.name.clone(), margins })
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use ndarray::Array3;

    fn asked(asks: Asks, levels: &[[f64; 4]]) -> TippingLevel {
        // Two realizations of two years.
        let years = Array3::from_shape_fn((levels.len(), 2, 2), |(level, r, y)| levels[level][2 * r + y]);
        let levels_c: Vec<f64> = (0..levels.len()).map(|level| level as f64).collect();
        let criterion = Criterion { name: "refill".to_owned(), asks };
        TippingLevel::of(&criterion, &years.view(), (&levels_c, 0), &Resamples::new(1, 2))
    }

    const LEVELS: [[f64; 4]; 3] = [[200.0; 4], [160.0; 4], [80.0; 4]];

    /// By hand: medians 200, 160, 80. 120 lies half-way from 160 to 80; all realizations are alike, so the range is that point.
    #[test]
    fn a_criterion_fails_where_the_line_between_levels_meets_it() {
        let at_least = |swe_mm: f64| asked(Asks::MedianAtLeast { swe_mm, volume_hm3: None }, &LEVELS);
        let found = at_least(120.0);
        assert_eq!(found.fails, Crossing::At { level_c: 1.5, until_c: None });
        let range = CrossingRange { q05_c: Some(1.5), q95_c: Some(1.5), falls_back_share: 0.0 };
        assert_eq!(found.fails_range, Some(range));
        assert_eq!(found.levels.iter().map(|level| level.holds).collect::<Vec<_>>(), [true, true, false]);
        assert_eq!(
            at_least(80.0).fails,
            Crossing::NotReached { up_to_c: 2.0 },
            "as much as is asked is enough"
        );
        assert!(!found.too_near_at_reference);
        let near = asked(
            Asks::MedianAtLeast { swe_mm: 198.0, volume_hm3: None },
            &[[190.0, 190.0, 210.0, 210.0], [80.0; 4]],
        );
        assert!(near.too_near_at_reference, "two realizations 20 mm apart know their median to some 7 mm");
        let already = at_least(201.0);
        assert_eq!(already.holds_at_reference, Some(false));
        assert_eq!(already.fails, Crossing::At { level_c: 0.0, until_c: None });
        // Back at 120 half-way from 80 to 160.
        let back = asked(
            Asks::MedianAtLeast { swe_mm: 120.0, volume_hm3: None },
            &[[200.0; 4], [160.0; 4], [80.0; 4], [160.0; 4]],
        );
        assert_eq!(back.fails, Crossing::At { level_c: 1.5, until_c: Some(2.5) });
        let alone = asked(Asks::MedianAtLeast { swe_mm: 1.0, volume_hm3: None }, &LEVELS[..1]);
        assert_eq!(alone.fails, Crossing::Unknown);
    }

    /// By hand: the reference's 20 % quantile of 10, 20, 30, 40 (type 8) stands at place 0.8 + 0.4 = 1.2, so at 12: below it
    /// lie 1 of 4 years, then 2 of 4 and 4 of 4. At most 3 of 8 fails half-way from 1/4 to 2/4.
    #[test]
    fn low_snow_years_are_counted_against_the_reference() {
        let levels = [[10.0, 20.0, 30.0, 40.0], [5.0, 11.0, 30.0, 40.0], [1.0, 2.0, 3.0, 4.0]];
        let at_most = |share, below_quantile| Asks::LowSnowYearsAtMost { share, below_quantile };
        let found = asked(at_most(0.375, 0.2), &levels);
        let shares: Vec<f64> = found.levels.iter().map(|level| level.value.value).collect();
        assert_eq!(shares, [0.25, 0.5, 1.0]);
        assert_eq!(found.fails, Crossing::At { level_c: 0.5, until_c: None });
        // Its median, 25: half of the years lie below, then half, then all.
        let shares = asked(at_most(0.6, 0.5), &levels).levels.into_iter().map(|level| level.value.value);
        assert_eq!(shares.collect::<Vec<_>>(), [0.5, 0.5, 1.0]);
    }

    /// An identity: where the limit is bare ground nothing lies below it, so that no share of low years says that anything holds.
    #[test]
    fn low_snow_years_of_bare_ground_cannot_be_asked_for() {
        let levels = [[0.0, 0.0, 0.0, 40.0], [0.0; 4]];
        let found = asked(Asks::LowSnowYearsAtMost { share: 0.3, below_quantile: 0.2 }, &levels);
        assert_eq!((found.holds_at_reference, found.fails), (None, Crossing::Unknown));
        assert!(found.levels.is_empty() && found.fails_range.is_none());
    }
}
