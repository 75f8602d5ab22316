//! Coincidence: how often dry and warm years fall together at each level, and what that does to the snow (method, section 10).

use super::cells::Cells;
use super::chance::Chance;
use super::counts::{Counts, share};
use super::reference_years::{Limits, YearValues};
use super::resample::{Estimate, Resamples};
use serde::Serialize;

/// A number lies apart from 1 where it does by so many of its Monte Carlo errors.
const ERRORS_APART: f64 = 2.0;

/// Dry and warm years of the realizations. A year is dry where its cool-season precipitation over the basin is at or below the
/// median of the reference's single years, cool where its cool-season mean temperature at the station is at or below theirs, and
/// low in snow where its headline SWE lies below their stated quantile. These thresholds stay for all levels and resamples.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Coincidence {
    /// Median cool-season precipitation at the reference, mm.
    pub median_precipitation_mm: f64,
    /// Median cool-season mean temperature at the reference, degC.
    pub median_temperature_c: f64,
    /// SWE below which a year is low in snow, mm.
    pub low_snow_below_mm: f64,
    /// Its quantile among the reference's single years.
    pub low_snow_below_quantile: f64,
    /// One entry a level.
    pub levels: Vec<CoincidenceLevel>,
}

/// One level.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct CoincidenceLevel {
    /// The level, degC.
    pub level_c: f64,
    /// Single years of all realizations.
    pub years: Cells,
    /// Chance of a dry and warm year.
    pub dry_warm: Option<Chance>,
    /// Chance of a dry and cool year.
    pub dry_cool: Option<Chance>,
    /// Chance of a wet and warm year.
    pub wet_warm: Option<Chance>,
    /// Chance of a wet and cool year.
    pub wet_cool: Option<Chance>,
    /// `P(dry and warm)/(P(dry)*P(warm))`; none where no year is dry or none is warm.
    pub dependence: Option<Estimate>,
    /// The same of the level's own medians.
    pub own_medians: OwnMedians,
    /// Low snow in dry years.
    pub low_snow_given_dry: LowSnowGivenDry,
}

/// Whether dry and warm come together, about a level's own medians: only there is warming itself no answer.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct OwnMedians {
    /// Single years about the level's own medians.
    pub years: Cells,
    /// `P(dry and warm)/(P(dry)*P(warm))`.
    pub dependence: Option<Estimate>,
    /// Whether that lies apart from 1.
    pub depends: Depends,
}

/// Whether dry years are warm more or less often than others.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
#[serde(rename_all = "snake_case")]
pub enum Depends {
    /// The dependence factor lies two Monte Carlo errors above 1.
    MoreOften,
    /// Two below.
    LessOften,
    /// Within two, or there is no error.
    CannotTell,
}

/// The chance of low snow in dry years that are warm and in those that are cool; none where there are no such years.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct LowSnowGivenDry {
    /// Where they are warm.
    pub warm: Option<Chance>,
    /// Where they are cool.
    pub cool: Option<Chance>,
    /// Warm over cool; none also where no cool one is low.
    pub ratio: Option<Estimate>,
}

impl Coincidence {
    pub(super) fn of(
        values: &YearValues<'_>,
        low_snow_below_quantile: f64,
        levels_c: &[f64],
        reference: usize,
        resamples: &Resamples,
    ) -> Option<Self> {
        let limits = Limits::of(&values.at(reference), low_snow_below_quantile)?;
        let levels = levels_c.iter().enumerate().map(|(level, level_c)| {
            let at = values.at(level);
            // The four cells without low snow, and the same four with it.
            let counts = at.counted::<8>(|[swe_mm, precipitation_mm, mean_c]| {
                let cell = Cells::place(precipitation_mm <= limits.precipitation_mm, mean_c <= limits.mean_c);
                Some(cell + 4 * usize::from(swe_mm < limits.low_snow_mm))
            });
            let mut level = level_of(
                *level_c,
                &counts,
                own_medians(&at.counted(about(at.medians())), resamples),
                resamples,
            );
            if !limits.has_snow() {
                level.low_snow_given_dry = LowSnowGivenDry { warm: None, cool: None, ratio: None };
            }
            level
        });
        Some(Self {
            median_precipitation_mm: limits.precipitation_mm,
            median_temperature_c: limits.mean_c,
            low_snow_below_mm: limits.low_snow_mm,
            low_snow_below_quantile,
            levels: levels.collect(),
        })
    }
}

fn about([precipitation_mm, mean_c]: [f64; 2]) -> impl Fn([f64; 3]) -> Option<usize> {
    move |[_, precipitation, mean]| Some(Cells::place(precipitation <= precipitation_mm, mean <= mean_c))
}

/// The cells, whatever the snow.
fn cells(counts: [u64; 8]) -> [u64; 4] {
    std::array::from_fn(|cell| counts[cell] + counts[cell + 4])
}

fn level_of(
    level_c: f64,
    counts: &Counts<8>,
    own_medians: OwnMedians,
    resamples: &Resamples,
) -> CoincidenceLevel {
    let of_cell =
        |cell: usize| counts.chance(|years| share(cells(years)[cell], years.iter().sum()), resamples);
    let low = |years: [u64; 8], cell: usize| share(years[cell + 4], cells(years)[cell]);
    let ratio = |years| Some(low(years, 0)? / low(years, 1).filter(|chance| *chance > 0.0)?);
    CoincidenceLevel {
        level_c,
        years: Cells::of(cells(counts.all())),
        dry_warm: of_cell(0),
        dry_cool: of_cell(1),
        wet_warm: of_cell(2),
        wet_cool: of_cell(3),
        dependence: counts.estimate(|years| Cells::of(cells(years)).dependence(), resamples),
        own_medians,
        low_snow_given_dry: LowSnowGivenDry {
            warm: counts.chance(|years| low(years, 0), resamples),
            cool: counts.chance(|years| low(years, 1), resamples),
            ratio: counts.estimate(ratio, resamples),
        },
    }
}

fn own_medians(counts: &Counts<4>, resamples: &Resamples) -> OwnMedians {
    let dependence = counts.estimate(|years| Cells::of(years).dependence(), resamples);
    OwnMedians { years: Cells::of(counts.all()), dependence, depends: Depends::of(dependence) }
}

impl Depends {
    fn of(dependence: Option<Estimate>) -> Self {
        let known = dependence.and_then(|factor| Some((factor.value - 1.0, factor.monte_carlo_error?)));
        match known {
            Some((above, error)) if above > ERRORS_APART * error => Self::MoreOften,
            Some((above, error)) if above < -ERRORS_APART * error => Self::LessOften,
            _ => Self::CannotTell,
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::perturb::stream;
    use ndarray::Array3;
    use rand_distr::{Distribution, StandardNormal};

    /// By hand, eight years: precipitation 1 to 8, so that 1 to 4 are dry; temperature is such that years 1 and 2 are warm, 3 and 4
    /// cool; SWE is lowest in year 1 alone (type 8's 20 % of 8 values lies at 2.0: between the second value and the third by 0.0).
    /// With two degrees more all years are warm. Low snow given dry and warm: 1 of 2, given dry and cool 0 of 2: no ratio.
    fn found(low_snow_below_quantile: f64) -> Coincidence {
        let one = |values: [f64; 8], warming: f64| {
            Array3::from_shape_fn((2, 2, 8), |(level, _, year)| values[year] + warming * level as f64)
        };
        let precipitation = one([1.0, 2.0, 3.0, 4.0, 5.0, 6.0, 7.0, 8.0], 0.0);
        let mean_c = one([1.0, 1.0, -1.0, -1.0, 1.0, -1.0, 1.0, -1.0], 2.5);
        let swe = one([10.0, 20.0, 30.0, 40.0, 50.0, 60.0, 70.0, 80.0], 0.0);
        let values =
            YearValues { swe_mm: swe.view(), precipitation_mm: precipitation.view(), mean_c: mean_c.view() };
        Coincidence::of(&values, low_snow_below_quantile, &[0.0, 2.0], 0, &Resamples::new(1, 2))
            .expect("values in every year")
    }

    #[test]
    fn a_table_counted_by_hand() {
        let found = found(0.2);
        let cells = |dry_warm, dry_cool, wet_warm, wet_cool| Cells { dry_warm, dry_cool, wet_warm, wet_cool };
        assert_eq!(found.levels[0].years, cells(4, 4, 4, 4));
        assert_eq!(found.levels[1].years, cells(8, 0, 8, 0));
        assert_eq!(found.levels[0].dependence.expect("dry and warm years").value, 1.0);
        assert_eq!(found.levels[1].own_medians.years, cells(4, 4, 4, 4), "warming is no coincidence");
        let chance = |chance: Option<Chance>| chance.map(|chance| chance.estimate.value);
        assert_eq!(
            chance(found.levels[0].dry_warm),
            Some(0.25),
            "independent halves coincide in a quarter of years"
        );
        let given = found.levels[0].low_snow_given_dry;
        assert_eq!((chance(given.warm), chance(given.cool)), (Some(0.5), Some(0.0)));
        assert!(given.ratio.is_none(), "nothing over no low year");
        let warmed = found.levels[1].low_snow_given_dry;
        assert_eq!((chance(warmed.warm), chance(warmed.cool)), (Some(0.25), None), "an empty cell is none");
    }

    /// By hand, of the same years twice: type 8's 40 % of 16 values lies at 16*0.4 + 1.4/3 = rank 6.867, between the third year's SWE,
    /// 30 mm, twice, and the fourth's: at 30 + 0.867*(40 - 30) = 38.667 mm with ranks 6 and 7. Years 1 to 3 are low: of the dry and warm
    /// both, of the dry and cool one of two, twice as often.
    #[test]
    fn low_snow_is_what_the_user_says() {
        let found = found(0.4);
        assert_eq!(found.low_snow_below_quantile, 0.4);
        assert!((found.low_snow_below_mm - (30.0 + 10.0 * (6.4 + 1.4 / 3.0 - 6.0))).abs() < 1e-9);
        let given = found.levels[0].low_snow_given_dry;
        let chance = |chance: Option<Chance>| chance.map(|chance| chance.estimate.value);
        assert_eq!((chance(given.warm), chance(given.cool)), (Some(1.0), Some(0.5)));
        assert_eq!(given.ratio.expect("low years of both").value, 2.0);
    }

    /// Two errors are 0.2: 1.21 and 0.79 lie apart from 1, 1.19 and 0.81 do not; without an error nobody can tell.
    #[test]
    fn within_two_errors_nobody_can_tell() {
        let of = |value, monte_carlo_error| Depends::of(Some(Estimate { value, monte_carlo_error }));
        assert_eq!(of(1.21, Some(0.1)), Depends::MoreOften);
        assert_eq!(of(0.79, Some(0.1)), Depends::LessOften);
        assert_eq!(of(1.19, Some(0.1)), Depends::CannotTell);
        assert_eq!(of(0.81, Some(0.1)), Depends::CannotTell);
        assert_eq!(of(2.0, None), Depends::CannotTell);
        assert_eq!(Depends::of(None), Depends::CannotTell);
    }

    /// Halves that know nothing of each other coincide in a quarter of years: of 2000 the share's standard deviation about medians is
    /// 0.25/sqrt(2000) = 0.0056 (hypergeometric), the factor's four times that; four of them are allowed.
    #[test]
    fn independent_halves_coincide_in_a_quarter_of_years() {
        let mut random = stream(6000, 0);
        let mut normal = |_: (usize, usize, usize)| -> f64 { StandardNormal.sample(&mut random) };
        let [mm, mean_c] = [(); 2].map(|()| Array3::from_shape_fn((1, 100, 20), &mut normal));
        let values = YearValues { swe_mm: mm.view(), precipitation_mm: mm.view(), mean_c: mean_c.view() };
        let found =
            Coincidence::of(&values, 0.2, &[0.0], 0, &Resamples::new(1, 100)).expect("values in every year");
        let level = &found.levels[0];
        assert!((level.dry_warm.expect("years").estimate.value - 0.25).abs() < 4.0 * 0.0056);
        assert!((level.dependence.expect("dry years").value - 1.0).abs() < 16.0 * 0.0056);
    }

    /// Chances of 54 and 25 % make a ratio of 2.16.
    #[test]
    fn a_ratio_of_chances() {
        let counts = Counts(vec![[46, 75, 100, 100, 54, 25, 0, 0]]);
        let own = own_medians(&Counts(vec![[1; 4]]), &Resamples::new(1, 1));
        let given = level_of(0.0, &counts, own, &Resamples::new(1, 1)).low_snow_given_dry;
        let ratio = given.ratio.expect("low years of both");
        assert!((ratio.value - 2.16).abs() < 1e-12, "{ratio:?}");
        assert_eq!(ratio.monte_carlo_error, None, "of a single realization");
    }
}
