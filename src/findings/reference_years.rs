//! Single years of the basin, and what of the reference's holds for every level: what coincidences and snow droughts share.

use super::counts::Counts;
use super::quantile::{quantile, sorted};
use ndarray::{ArrayView2, ArrayView3, Axis};

/// Single years of the basin, `[level][realization][year]`.
pub(super) struct YearValues<'a> {
    /// The headline SWE, mm.
    pub swe_mm: ArrayView3<'a, f64>,
    /// Precipitation over the basin before its date, mm.
    pub precipitation_mm: ArrayView3<'a, f64>,
    /// Mean temperature at the station before its date, degC.
    pub mean_c: ArrayView3<'a, f64>,
}

/// The same at one level, `[realization][year]`.
pub(super) struct LevelYears<'a> {
    pub swe_mm: ArrayView2<'a, f64>,
    pub precipitation_mm: ArrayView2<'a, f64>,
    pub mean_c: ArrayView2<'a, f64>,
}

/// Limits between kinds of years, of the reference's single years; they stay for all levels and resamples.
pub(super) struct Limits {
    /// Median precipitation, mm.
    pub precipitation_mm: f64,
    /// Median temperature, degC.
    pub mean_c: f64,
    /// The asked quantile of SWE, mm.
    pub low_snow_mm: f64,
}

impl Limits {
    /// Nothing where one of them is no number.
    pub fn of(reference: &LevelYears<'_>, low_snow_quantile: f64) -> Option<Self> {
        let [precipitation_mm, mean_c] = reference.medians();
        let low_snow_mm = quantile(&sorted(reference.years().map(|[swe_mm, ..]| swe_mm)), low_snow_quantile);
        let are_numbers = [precipitation_mm, mean_c, low_snow_mm].iter().all(|limit| limit.is_finite());
        are_numbers.then_some(Self { precipitation_mm, mean_c, low_snow_mm })
    }

    /// Whether little snow can be told from none: of years that are mostly bare no share is low.
    pub fn has_snow(&self) -> bool {
        self.low_snow_mm > 0.0
    }
}

impl YearValues<'_> {
    pub fn at(&self, level: usize) -> LevelYears<'_> {
        LevelYears {
            swe_mm: self.swe_mm.index_axis(Axis(0), level),
            precipitation_mm: self.precipitation_mm.index_axis(Axis(0), level),
            mean_c: self.mean_c.index_axis(Axis(0), level),
        }
    }
}

impl LevelYears<'_> {
    /// SWE, precipitation and temperature of every year.
    pub fn years(&self) -> impl Iterator<Item = [f64; 3]> {
        let both = self.precipitation_mm.iter().zip(self.mean_c.iter());
        self.swe_mm
            .iter()
            .zip(both)
            .map(|(swe_mm, (precipitation_mm, mean_c))| [*swe_mm, *precipitation_mm, *mean_c])
    }

    /// Medians of precipitation and temperature.
    pub fn medians(&self) -> [f64; 2] {
        [1, 2].map(|at| quantile(&sorted(self.years().map(|year| year[at])), 0.5))
    }

    /// Years by kind, realization by realization.
    pub fn counted<const K: usize>(&self, kind: impl Fn([f64; 3]) -> Option<usize>) -> Counts<K> {
        let (realizations, years) = self.swe_mm.dim();
        let mut counts = vec![[0; K]; realizations];
        for (at, year) in self.years().enumerate() {
            if let Some(kind) = kind(year) {
                counts[at / years][kind] += 1;
            }
        }
        Counts(counts)
    }
}
