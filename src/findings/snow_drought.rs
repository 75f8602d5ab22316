//! Kinds of snow drought: low snow with little precipitation, and low snow all the same (Harpold et al. 2017).

use super::chance::Chance;
use super::counts::share;
use super::reference_years::{Limits, YearValues};
use super::resample::Resamples;
use serde::Serialize;

/// Low snow is at or below this quantile of the reference's single years (method, section 10).
const DROUGHT_QUANTILE: f64 = 0.3;

/// Snow droughts of the realizations' single years, both thresholds fixed at the reference.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct SnowDroughts {
    /// Snow is low at or below this headline SWE, mm.
    pub low_at_mm: f64,
    /// Its quantile among the reference's single years.
    pub low_at_quantile: f64,
    /// Below this cool-season precipitation over the basin, the reference's median, a drought is dry, mm.
    pub median_precipitation_mm: f64,
    /// One entry a level.
    pub levels: Vec<SnowDroughtLevel>,
}

/// One level.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct SnowDroughtLevel {
    /// The level, degC.
    pub level_c: f64,
    /// Single years of all realizations.
    pub years: u64,
    /// Of these, dry droughts: little snow, precipitation below the median.
    pub dry_years: u64,
    /// Of these, warm droughts: little snow, precipitation at the median or above.
    pub warm_years: u64,
    /// Chance of a dry one in a year.
    pub dry: Option<Chance>,
    /// Chance of a warm one in a year.
    pub warm: Option<Chance>,
    /// Share of warm ones among droughts; none without any.
    pub warm_share: Option<Chance>,
}

impl SnowDroughts {
    pub(super) fn of(
        values: &YearValues<'_>,
        levels_c: &[f64],
        reference: usize,
        resamples: &Resamples,
    ) -> Option<Self> {
        let limits = Limits::of(&values.at(reference), DROUGHT_QUANTILE).filter(Limits::has_snow)?;
        let levels = levels_c.iter().enumerate().map(|(level, level_c)| {
            // No drought, a dry one, a warm one.
            let counts = values.at(level).counted::<3>(|[swe_mm, precipitation_mm, _]| {
                let is_low = swe_mm <= limits.low_snow_mm;
                Some(usize::from(is_low) * (1 + usize::from(precipitation_mm >= limits.precipitation_mm)))
            });
            let [_, dry_years, warm_years] = counts.all();
            let of = |kind: usize| counts.chance(|years| share(years[kind], years.iter().sum()), resamples);
            SnowDroughtLevel {
                level_c: *level_c,
                years: counts.all().iter().sum(),
                dry_years,
                warm_years,
                dry: of(1),
                warm: of(2),
                warm_share: counts.chance(|[_, dry, warm]| share(warm, dry + warm), resamples),
            }
        });
        Some(Self {
            low_at_mm: limits.low_snow_mm,
            low_at_quantile: DROUGHT_QUANTILE,
            median_precipitation_mm: limits.precipitation_mm,
            levels: levels.collect(),
        })
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use ndarray::Array3;

    /// By hand, ten years: SWE 1 to 10, so that type 8 puts 30 % at 10*0.3 + 1.3/3 = the 3.4333rd value, 3.4333: years 1 to 3 are
    /// low. Precipitation 2, 9 and 1 in them, median 5.5: dry, warm, dry. With 4 mm less snow, years 1 to 7 are low (SWE -3 to 3);
    /// precipitation of years 4 to 7 is 3, 4, 5 and 6: three dry, one warm.
    #[test]
    fn droughts_told_apart_by_hand() {
        let swe =
            Array3::from_shape_fn((2, 2, 10), |(level, _, year)| (year + 1) as f64 - 4.0 * level as f64);
        let of_years = [2.0, 9.0, 1.0, 3.0, 4.0, 5.0, 6.0, 7.0, 8.0, 10.0];
        let precipitation = Array3::from_shape_fn((2, 2, 10), |(.., year)| of_years[year]);
        let mean_c = Array3::zeros((2, 2, 10));
        let values =
            YearValues { swe_mm: swe.view(), precipitation_mm: precipitation.view(), mean_c: mean_c.view() };
        let found = SnowDroughts::of(&values, &[0.0, 2.0], 0, &Resamples::new(1, 2)).expect("values");
        assert!((found.low_at_mm - 3.433_333).abs() < 1e-6);
        let counts = |level: &SnowDroughtLevel| (level.years, level.dry_years, level.warm_years);
        assert_eq!(counts(&found.levels[0]), (20, 4, 2));
        assert_eq!(counts(&found.levels[1]), (20, 10, 4));
        let share = found.levels[1].warm_share.expect("droughts").estimate;
        assert!(
            (share.value - 2.0 / 7.0).abs() < 1e-12
                && share.monte_carlo_error.is_some_and(|error| error < 1e-12)
        );
    }
}
