//! Low-snow odds: how often a year has as little snow as few of the reference's have.

use super::ranged::{Ranged, bound_of_certain};
use super::resample::{Ranked, Resamples};
use crate::baseline::{RiskRatio, risk_ratio, wilson};
use serde::Serialize;

/// A low-snow year lies below this quantile of the reference's single years, where a study states no other.
pub const LOW_SNOW_BELOW_QUANTILE: f64 = 0.2;
/// Years that differ by less are the same, mm.
const ROUNDING_MM: f64 = 1e-6;

/// Chances of a low-snow year.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct LowSnow {
    /// Quantile of the reference's single years below which a year is low.
    pub below_quantile: f64,
    /// The SWE there, mm; in every resample it is the resample's own.
    pub below_mm: Ranged,
    /// Single years of a level.
    pub years: usize,
    /// Years of the reference that stand at the limit itself, and so are not low: more than one or two only where values repeat.
    pub years_at_limit: usize,
    /// Whether the reference's own share of low years differs from the quantile by more than rounding, since values repeat there.
    pub share_differs_from_quantile: bool,
    /// One entry a level.
    pub levels: Vec<LowSnowLevel>,
    /// The level of 0 degC, the climate of the record, against levels colder than it: the warming so far taken away.
    #[serde(skip_serializing_if = "Vec::is_empty")]
    pub without_warming: Vec<WithoutWarming>,
    /// The record's own years.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub record: Option<RecordLowSnow>,
}

/// Chance at one level.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct LowSnowLevel {
    /// The level, degC.
    pub level_c: f64,
    /// Low years of all simulated ones.
    pub low_years: usize,
    /// Their share.
    pub chance: Ranged,
    /// Where none is low, the one-sided 95 % bound on the chance from above, `1 - 0.05^(1/n)` of n realizations; where all are, from
    /// below, `0.05^(1/n)`.
    pub bound: Option<f64>,
    /// Over the reference's chance; 1 at the reference.
    pub chance_ratio: Ranged,
}

/// The climate of the record over one without so much warming.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct WithoutWarming {
    /// The colder level, degC.
    pub level_c: f64,
    /// The chance at 0 degC over that at the colder level; none where no year of that is low.
    pub chance_ratio: Option<Ranged>,
    /// The share of the low years at 0 degC that come on top of those at the colder level, `1 - p0/p1`, 0 to 1: the fraction
    /// attributable (Stone & Allen 2005, from memory), here of the model's sensitivity and no attribution. An end of its range
    /// below 0 cannot tell the sign. None where no year of the colder level is low, or as many as at 0 degC or more.
    pub attributable_fraction: Option<Ranged>,
}

/// The record's own years below the same SWE, one entry a level.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct RecordLowSnow {
    /// Years in use.
    pub years: usize,
    /// One entry a level.
    pub levels: Vec<RecordLowSnowLevel>,
}

/// The record at one level.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct RecordLowSnowLevel {
    /// The level, degC.
    pub level_c: f64,
    /// Low years.
    pub low_years: usize,
    /// Wilson's 95 % interval of their share.
    pub wilson_95: [f64; 2],
    /// Over the reference's share, after Katz et al. (1978): the same years at both levels are taken for independent, which
    /// makes the interval wider than it is. None at the reference, or where a count is zero.
    pub chance_ratio: Option<RiskRatio>,
}

/// What the odds are taken of.
pub(super) struct LowSnowQuestions<'a> {
    pub levels_c: &'a [f64],
    pub reference: usize,
    pub below_quantile: f64,
    pub realizations: usize,
    /// SWE of the record's years `[level][year]`, mm; may be empty.
    pub record_mm: &'a [Vec<f64>],
}

/// Of one set of realizations: the limit, mm, and the chance at every level.
type Drawn = (f64, Vec<f64>);

impl LowSnow {
    /// The odds of single years, a ranked list a level; nothing where the reference's quantile is bare ground, below which
    /// nothing lies.
    pub(super) fn of(years: &[Ranked], asked: &LowSnowQuestions<'_>, resamples: &Resamples) -> Option<Self> {
        let LowSnowQuestions { levels_c, reference, below_quantile, realizations, .. } = *asked;
        let count = years[reference].values().len();
        let draw = |weights: &[u32]| -> Option<Drawn> {
            let [limit] = years[reference].quantiles(weights, [below_quantile])?;
            // Every resample draws as many realizations, of as many years.
            let chance = |level: &Ranked| {
                let low = level.values().iter().take_while(|(mm, _)| *mm < limit);
                // A sum of counts: one of no numbers would be a zero below zero.
                low.map(|(_, realization)| weights[*realization] as usize).sum::<usize>() as f64
                    / count as f64
            };
            Some((limit, years.iter().map(chance).collect()))
        };
        let (below_mm, chances) = draw(&vec![1; realizations])?;
        if !(below_mm > 0.0 && below_mm.is_finite()) || chances[reference] <= 0.0 {
            return None;
        }
        let resampled = resamples.each(draw);
        let of = |number: &dyn Fn(&Drawn) -> Option<f64>| {
            resampled.iter().map(|drawn| drawn.as_ref().and_then(number)).collect::<Vec<_>>()
        };
        let over = |above: usize, below: usize| {
            let ratio =
                move |chances: &[f64]| (chances[below] > 0.0).then(|| chances[above] / chances[below]);
            Some(Ranged::new(ratio(&chances)?, of(&|(_, chances)| ratio(chances))))
        };
        let attributable = |now: usize, before: usize| {
            let fraction =
                move |chances: &[f64]| (chances[now] > 0.0).then(|| 1.0 - chances[before] / chances[now]);
            let value = fraction(&chances).filter(|fraction| *fraction > 0.0 && *fraction < 1.0)?;
            Some(Ranged::new(value, of(&|(_, chances)| fraction(chances))))
        };
        let levels = levels_c.iter().enumerate().map(|(level, level_c)| {
            Some(LowSnowLevel {
                level_c: *level_c,
                low_years: years[level].values().iter().take_while(|(mm, _)| *mm < below_mm).count(),
                chance: Ranged::new(chances[level], of(&|(_, chances)| Some(chances[level]))),
                bound: bound_of_certain(chances[level], realizations),
                chance_ratio: over(level, reference)?,
            })
        });
        let as_observed = levels_c.iter().position(|level_c| *level_c == 0.0);
        let colder = |now: usize| {
            let one = move |level: usize| WithoutWarming {
                level_c: levels_c[level],
                chance_ratio: over(now, level),
                attributable_fraction: attributable(now, level),
            };
            (0..now).map(one).collect()
        };
        let levels: Vec<LowSnowLevel> = levels.collect::<Option<_>>()?;
        let is_at_limit = |(mm, _): &&(f64, usize)| (*mm - below_mm).abs() <= ROUNDING_MM;
        let years_at_limit = years[reference].values().iter().filter(is_at_limit).count();
        Some(Self {
            below_quantile,
            below_mm: Ranged::new(below_mm, of(&|(limit, _)| Some(*limit))),
            years: count,
            years_at_limit,
            share_differs_from_quantile: years_at_limit > 1
                && differs(levels[reference].chance, below_quantile, count),
            levels,
            without_warming: as_observed.map_or_else(Vec::new, colder),
            record: RecordLowSnow::of(asked, below_mm),
        })
    }
}

/// By more than half a year of so many, and by more than the Monte Carlo range, where that is known.
fn differs(share: Ranged, quantile: f64, years: usize) -> bool {
    let is_rounding = (share.value - quantile).abs() <= 0.5 / years as f64;
    let is_chance =
        share.q05.is_some_and(|low| low <= quantile) && share.q95.is_some_and(|high| high >= quantile);
    !is_rounding && !is_chance
}

impl RecordLowSnow {
    fn of(asked: &LowSnowQuestions<'_>, below_mm: f64) -> Option<Self> {
        let years = asked.record_mm.get(asked.reference).map(Vec::len).filter(|years| *years > 0)?;
        let low = |level: &Vec<f64>| level.iter().filter(|mm| **mm < below_mm).count();
        let at_reference = low(&asked.record_mm[asked.reference]);
        let of_level = |(level, level_c): (usize, &f64)| {
            let low_years = low(asked.record_mm.get(level)?);
            let is_other = level != asked.reference;
            Some(RecordLowSnowLevel {
                level_c: *level_c,
                low_years,
                wilson_95: wilson(low_years, years)?,
                chance_ratio: is_other
                    .then(|| risk_ratio([low_years, years], [at_reference, years]))
                    .flatten(),
            })
        };
        let levels = asked.levels_c.iter().enumerate().map(of_level).collect::<Option<_>>()?;
        Some(Self { years, levels })
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn ranked(values: impl Iterator<Item = f64>) -> Ranked {
        Ranked::new(values.enumerate().map(|(at, value)| (value, at % 20)))
    }

    /// By hand: 1 to 100 mm, below the 20 % quantile of type 8 (rank 20.4) lie 20 years; 15 mm less put 35 below it, a
    /// ratio of 1.75; 25 mm more leave none, of which 20 realizations are sure to 1 - 0.05^(1/20) = 0.1391.
    #[test]
    fn odds_by_hand() {
        let years = [25.0, 0.0, -15.0].map(|more| ranked((1..=100).map(|mm| f64::from(mm) + more)));
        let record_mm = [25.0, 0.0, -15.0].map(|more| [5.0, 30.0, 40.0].map(|mm| mm + more).to_vec());
        let asked = LowSnowQuestions {
            levels_c: &[-1.0, 0.0, 1.0],
            reference: 1,
            below_quantile: LOW_SNOW_BELOW_QUANTILE,
            realizations: 20,
            record_mm: &record_mm,
        };
        let found = LowSnow::of(&years, &asked, &Resamples::new(1, 20)).unwrap();
        assert_eq!(found.levels.iter().map(|at| at.low_years).collect::<Vec<_>>(), [0, 20, 35]);
        assert!((found.below_mm.value - 20.4).abs() < 1e-9, "{found:?}");
        let [colder, reference, warmer] = &found.levels[..] else { panic!("{found:?}") };
        assert_eq!(reference.chance_ratio.value, 1.0, "an identity");
        assert!((warmer.chance_ratio.value - 1.75).abs() < 1e-12);
        assert!(warmer.chance.q05.unwrap() < 0.35 && warmer.chance.q95.unwrap() > 0.35);
        assert!((colder.bound.unwrap() - 0.1391).abs() < 1e-4);
        assert_eq!(found.without_warming[0].chance_ratio, None, "no year there is low");
        assert_eq!(
            found.without_warming[0].attributable_fraction, None,
            "all of a count of none is not told"
        );
        assert!(
            !found.share_differs_from_quantile && found.years_at_limit == 0,
            "20.4 mm is between two years"
        );
        // 1 of 3 at the reference, 2 of 3 at the warmer level (15 and 25 less 15 mm: -10 and 15).
        let record = found.record.unwrap();
        assert_eq!(record.levels.iter().map(|at| at.low_years).collect::<Vec<_>>(), [0, 1, 2]);
        assert_eq!(record.levels[2].chance_ratio.unwrap().ratio, 2.0);
    }

    /// By hand: 33 winters of 1 to 33 mm come back 20 times each, once in every realization, so that resamples have them as
    /// often. Of 660 years the 20 % quantile of type 8 stands at rank 660*0.2 + 0.4, among the copies of the seventh winter
    /// (ranks 121 to 140): 6 winters of 33 lie below it, 18.2 % and not 20 %, and 20 years stand at it. Of 660 years that all
    /// differ 132 lie below it.
    #[test]
    fn winters_that_come_back_leave_their_own_share() {
        let asked = LowSnowQuestions {
            levels_c: &[0.0],
            reference: 0,
            below_quantile: LOW_SNOW_BELOW_QUANTILE,
            realizations: 20,
            record_mm: &[],
        };
        let repeated = [ranked((0..660).map(|at| f64::from(at / 20 + 1)))];
        let found = LowSnow::of(&repeated, &asked, &Resamples::new(1, 20)).unwrap();
        assert!((found.levels[0].chance.value - 6.0 / 33.0).abs() < 1e-12, "{found:?}");
        assert_eq!((found.below_mm.value, found.years_at_limit), (7.0, 20));
        assert!(found.share_differs_from_quantile, "{found:?}");
        let all_differ = [ranked((1..=660).map(f64::from))];
        let found = LowSnow::of(&all_differ, &asked, &Resamples::new(1, 20)).unwrap();
        assert!((found.levels[0].chance.value - 0.2).abs() < 1e-12 && !found.share_differs_from_quantile);
    }

    /// By hand, of 660 years: half a year is 0.00076. Rounding and a range that holds the quantile are no difference.
    #[test]
    fn rounding_and_chance_are_no_difference() {
        let share = |value: f64, low: f64, high: f64| Ranged { value, q05: Some(low), q95: Some(high) };
        assert!(!differs(share(0.2005, 0.2004, 0.2006), 0.2, 660), "a third of a year");
        assert!(!differs(share(0.18, 0.17, 0.21), 0.2, 660), "the range holds it");
        assert!(differs(share(0.18, 0.17, 0.19), 0.2, 660) && differs(share(0.22, 0.21, 0.23), 0.2, 660));
        let unknown = Ranged { value: 0.18, q05: None, q95: None };
        assert!(differs(unknown, 0.2, 660), "of a single realization no range is known");
    }

    /// By hand: 20 years below the limit at 0 degC and 10 with 10 mm more make 1 - 10/20 = 0.5; the ratio is 2, and 1 - 1/2 the
    /// same. With 5 mm less, 25 are low, which a level without warming cannot take away: none.
    #[test]
    fn half_of_the_low_years_come_on_top() {
        let years = [10.0, -5.0, 0.0].map(|more| ranked((1..=100).map(|mm| f64::from(mm) + more)));
        let asked = LowSnowQuestions {
            levels_c: &[-2.0, -1.0, 0.0],
            reference: 2,
            below_quantile: LOW_SNOW_BELOW_QUANTILE,
            realizations: 20,
            record_mm: &[],
        };
        let found = LowSnow::of(&years, &asked, &Resamples::new(1, 20)).unwrap();
        let [with_more, with_less] = &found.without_warming[..] else { panic!("{found:?}") };
        let fraction = with_more.attributable_fraction.unwrap();
        assert!((fraction.value - 0.5).abs() < 1e-12, "{found:?}");
        assert!(fraction.q05.unwrap() < 0.5 && fraction.q95.unwrap() > 0.5 && fraction.q95.unwrap() <= 1.0);
        assert!((with_less.chance_ratio.unwrap().value - 20.0 / 25.0).abs() < 1e-12);
        assert_eq!(with_less.attributable_fraction, None);
    }

    /// Where a fifth of the reference's years lie bare, nothing lies below: that is no chance of 0.
    #[test]
    fn bare_ground_has_no_low_years() {
        let years = [ranked((0..100).map(|at| if at < 30 { 0.0 } else { 5.0 }))];
        let asked = LowSnowQuestions {
            levels_c: &[0.0],
            reference: 0,
            below_quantile: LOW_SNOW_BELOW_QUANTILE,
            realizations: 20,
            record_mm: &[],
        };
        assert_eq!(LowSnow::of(&years, &asked, &Resamples::new(1, 20)), None);
    }
}
