//! Percent of median: the record's years on a survey date against the median of its baseline years, at every level.
//!
//! The normal is fixed: medians of the baseline years at the reference, band by band, which every level is held against.
//! Beside it stands the moved normal, the same medians at the level itself: what becomes of the percentage when a normal is
//! computed anew in a warmer climate.

#[cfg(test)]
mod tests;

use super::quantile::{quantile, sorted};
use crate::baseline::BaselineYears;
use crate::basin::Band;
use crate::calendar::MonthDay;
use crate::ensemble::RecordYear;
use ndarray::Axis;
use serde::Serialize;

/// Percentages are unstable where the median lies below this share of the highest that it reaches in the year.
pub const UNSTABLE_BELOW_SHARE: f64 = 0.1;
/// Limits of the classes in which years are counted, percent of median; a year on a limit belongs to the class above it.
pub const CLASS_LIMITS_PCT: [f64; 4] = [60.0, 80.0, 120.0, 140.0];

/// A median of the baseline years at the reference.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct MedianSwe {
    /// On the survey date, mm.
    pub median_mm: f64,
    /// The highest that the median of a date reaches in the year, mm.
    pub highest_median_mm: f64,
    /// Whether the former is under 10 % of the latter, so that percentages of it swing with little snow.
    pub is_unstable: bool,
}

/// The record's years on one survey date.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct PercentOfMedian {
    /// The survey date.
    pub survey: MonthDay,
    /// The fixed normal of the basin: its bands' medians weighted by area.
    pub basin: MedianSwe,
    /// The fixed normal of each band, from the lowest.
    pub bands: Vec<MedianSwe>,
    /// One entry a level, in the order of the levels.
    pub levels: Vec<LevelPercents>,
}

/// The record's years on one survey date at one level. Lists are in the order of the record's years in use.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct LevelPercents {
    /// The level, degC.
    pub level_c: f64,
    /// SWE of the basin, mm.
    pub swe_mm: Vec<f64>,
    /// Percent of the fixed normal; none where that is 0.
    pub percent: Vec<Option<f64>>,
    /// Percent of the first survey date's fixed normal; on the other dates alone.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub percent_of_first_survey: Option<Vec<Option<f64>>>,
    /// The basin's normal if it is computed anew at this level, mm.
    pub moved_median_mm: f64,
    /// Percent of it; none where it is 0.
    pub percent_of_moved: Vec<Option<f64>>,
    /// Median over the baseline years of the percent of the fixed normal.
    pub median_percent: Option<f64>,
    /// Median over the baseline years of the percent of the moved normal.
    pub median_percent_of_moved: Option<f64>,
    /// Baseline years by their percent of the fixed normal: below the first of [`CLASS_LIMITS_PCT`], from each limit up to
    /// the next, from the last on. They add up to the baseline years, or to 0 where the fixed normal is 0.
    pub baseline_years_by_class: [usize; 5],
}

/// What the record's years are held against, and for whom.
#[derive(Clone, Copy)]
pub struct NormalQuestions<'a> {
    /// The record's years in use, run at every level; at least one of them a baseline year.
    pub years: &'a [RecordYear],
    /// Baseline years.
    pub baseline: &'a BaselineYears,
    /// The bands, from the lowest.
    pub bands: &'a [Band],
    /// Warming levels, degC.
    pub levels_c: &'a [f64],
    /// Which of them is the reference.
    pub reference: usize,
    /// Survey dates.
    pub surveys: &'a [MonthDay],
}

/// Holds every year at every level against both normals, a survey date each.
pub fn percent_of_median(questions: &NormalQuestions<'_>) -> Vec<PercentOfMedian> {
    let highest = questions.highest_medians();
    let mut found: Vec<PercentOfMedian> = Vec::with_capacity(questions.surveys.len());
    for (at, survey) in questions.surveys.iter().enumerate() {
        let first_mm = found.first().map(|first| first.basin.median_mm);
        found.push(questions.on(at, *survey, first_mm, &highest));
    }
    found
}

/// The highest median of any date: of each band, and of their area-weighted mean.
struct Highest {
    bands_mm: Vec<f64>,
    basin_mm: f64,
}

impl NormalQuestions<'_> {
    fn baseline_years(&self) -> impl Iterator<Item = (usize, &RecordYear)> {
        self.years.iter().enumerate().filter(|(_, year)| self.baseline.holds(year.water_year))
    }

    /// Area-weighted mean of the bands.
    fn basin(&self, of_bands: impl Iterator<Item = f64>) -> f64 {
        let (mut sum, mut area) = (0.0, 0.0);
        for (band, value) in self.bands.iter().zip(of_bands) {
            sum += band.area_km2 * value;
            area += band.area_km2;
        }
        sum / area
    }

    /// Median over the baseline years.
    fn median(&self, of_year: impl Fn(&RecordYear) -> f64) -> f64 {
        quantile(&sorted(self.baseline_years().map(|(_, year)| of_year(year))), 0.5)
    }

    fn highest_medians(&self) -> Highest {
        let mut highest = Highest { bands_mm: vec![0.0; self.bands.len()], basin_mm: 0.0 };
        let dates = self.years.first().map_or(0, |year| year.reference_swe_mm.len_of(Axis(0)));
        for date in 0..dates {
            let medians: Vec<f64> = (0..self.bands.len())
                .map(|band| self.median(|year| year.reference_swe_mm[[date, band]]))
                .collect();
            highest.basin_mm = highest.basin_mm.max(self.basin(medians.iter().copied()));
            for (highest, median) in highest.bands_mm.iter_mut().zip(medians) {
                *highest = highest.max(median);
            }
        }
        highest
    }

    fn medians_at(&self, survey: usize, level: usize) -> Vec<f64> {
        (0..self.bands.len())
            .map(|band| self.median(|year| year.survey_swe_mm[[survey, level, band]]))
            .collect()
    }

    fn on(&self, at: usize, survey: MonthDay, first_mm: Option<f64>, highest: &Highest) -> PercentOfMedian {
        let medians = self.medians_at(at, self.reference);
        let basin = MedianSwe::of(self.basin(medians.iter().copied()), highest.basin_mm);
        let levels = (0..self.levels_c.len()).map(|level| self.at(at, level, basin.median_mm, first_mm));
        PercentOfMedian {
            survey,
            basin,
            levels: levels.collect(),
            bands: medians
                .into_iter()
                .zip(&highest.bands_mm)
                .map(|(median_mm, highest_mm)| MedianSwe::of(median_mm, *highest_mm))
                .collect(),
        }
    }

    fn at(&self, survey: usize, level: usize, fixed_mm: f64, first_mm: Option<f64>) -> LevelPercents {
        let swe_mm: Vec<f64> = self
            .years
            .iter()
            .map(|year| {
                self.basin((0..self.bands.len()).map(|band| year.survey_swe_mm[[survey, level, band]]))
            })
            .collect();
        let moved_median_mm = self.basin(self.medians_at(survey, level).into_iter());
        let of = |normal_mm: f64| -> Vec<Option<f64>> {
            swe_mm.iter().map(|swe_mm| (normal_mm > 0.0).then(|| 100.0 * swe_mm / normal_mm)).collect()
        };
        let (percent, percent_of_moved) = (of(fixed_mm), of(moved_median_mm));
        let in_baseline = |percents: &[Option<f64>]| -> Vec<f64> {
            sorted(self.baseline_years().filter_map(|(year, _)| percents[year]))
        };
        let median = |percents: &[f64]| (!percents.is_empty()).then(|| quantile(percents, 0.5));
        let baseline_percents = in_baseline(&percent);
        let mut baseline_years_by_class = [0; CLASS_LIMITS_PCT.len() + 1];
        for percent in &baseline_percents {
            let class = CLASS_LIMITS_PCT.iter().filter(|limit| *percent >= **limit).count();
            baseline_years_by_class[class] += 1;
        }
        LevelPercents {
            level_c: self.levels_c[level],
            percent_of_first_survey: first_mm.map(of),
            moved_median_mm,
            median_percent: median(&baseline_percents),
            median_percent_of_moved: median(&in_baseline(&percent_of_moved)),
            baseline_years_by_class,
            percent,
            percent_of_moved,
            swe_mm,
        }
    }
}

impl MedianSwe {
    fn of(median_mm: f64, highest_median_mm: f64) -> Self {
        let is_unstable = median_mm < UNSTABLE_BELOW_SHARE * highest_median_mm;
        Self { median_mm, highest_median_mm, is_unstable }
    }
}
