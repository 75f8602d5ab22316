//! What single years say of a study: variance by averaging period, low-snow odds, worst years, runs, tails, detection.

use super::detection::{Detection, WarmingRate};
use super::low_runs::LowRuns;
use super::low_snow::{LowSnow, LowSnowQuestions};
use super::partition::Partition;
use super::ranged::RANGE_METHOD;
use super::resample::{Ranked, Resamples};
use super::tails::{Tails, tails};
use super::worst_years::{WorstYear, worst_years};
use super::year_types::{YearTypes, year_types};
use crate::basin::Band;
use crate::ensemble::{BasinSeasons, RecordYear};
use crate::season::{Kind, Measure};
use ndarray::{ArrayView2, Axis};
use serde::Serialize;

/// What is asked of the years of a study's realizations.
#[derive(Debug, Clone, Copy)]
pub struct ByYearQuestions<'a> {
    /// Warming levels, ascending, degC.
    pub levels_c: &'a [f64],
    /// Which of them is the reference.
    pub reference: usize,
    /// Seed of the study, for the resamples.
    pub seed: u64,
    /// A low-snow year lies below this quantile of the reference's.
    pub low_snow_below_quantile: f64,
    /// The user's rate of warming, if one is stated.
    pub warming_rate: Option<WarmingRate>,
    /// Whether realizations are the record's own years in another order.
    pub redraws_years: bool,
    /// Whether the mean precipitation of realizations changes at random.
    pub changes_mean: bool,
    /// Whether the levels, or some of them, come with a stated change of precipitation.
    pub levels_change_precipitation: bool,
    /// The record's own years, run at every level; may be empty.
    pub record: &'a [RecordYear],
    /// The bands, from the lowest.
    pub bands: &'a [Band],
}

/// What single years say.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct ByYear {
    /// How the ranges are made.
    pub method: &'static str,
    /// Single years of a level, over all realizations.
    pub simulated_years: usize,
    /// Whether realizations are the record's own years in another order: how often its lowest come back at the reference then
    /// rests on these very years.
    pub redraws_years: bool,
    /// Whether the mean precipitation of realizations changes at random, and theirs with it.
    pub changes_mean: bool,
    /// Whether what a level does is that of warming with a stated change of precipitation.
    pub levels_change_precipitation: bool,
    /// Of the headline measure, and of the first volume.
    pub measures: Vec<MeasureByYear>,
    /// Low-snow odds of the headline measure; none where few of the reference's years have snow.
    pub low_snow: Option<LowSnow>,
    /// The record's years with least of the headline measure.
    #[serde(skip_serializing_if = "Vec::is_empty")]
    pub worst_years: Vec<WorstYear>,
    /// Low years in a row, of the headline measure.
    pub low_runs: Option<LowRuns>,
}

/// Of one measure; amounts in its unit.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct MeasureByYear {
    /// The measure.
    pub measure: Measure,
    /// Variance by averaging period, one entry a level but the reference; none where nothing varies.
    pub partitions: Vec<Partition>,
    /// Years by the fifths of the reference, one entry a level; none where these cannot be told apart.
    pub types: Vec<YearTypes>,
    /// Low years, high ones and variability, one entry a level.
    pub tails: Vec<Tails>,
    /// The change against the spread; none for a single level.
    pub detection: Option<Detection>,
}

impl ByYear {
    /// Puts every question; nothing where nothing was measured or a headline year has no number.
    pub fn of(basin: &BasinSeasons, asked: &ByYearQuestions<'_>) -> Option<Self> {
        let (levels, _, realizations, length) = basin.years.dim();
        let resamples = Resamples::new(asked.seed, realizations);
        let years = |measure: usize| -> Vec<ArrayView2<'_, f64>> {
            let of_measure = basin.years.index_axis(Axis(1), measure);
            (0..levels).map(|level| of_measure.index_axis_move(Axis(0), level)).collect()
        };
        let headline = years(0);
        let headline_measure = basin.measures.first().filter(|measure| measure.kind == Kind::AmountMm)?;
        if realizations == 0 || headline.iter().any(|of| of.iter().any(|value| !value.is_finite())) {
            return None;
        }
        let ranked: Vec<Ranked> = headline.iter().map(ranked).collect();
        let first_volume = basin.measures.iter().enumerate().find(|(_, measure)| measure.is_volume);
        let told = [(0, headline_measure)].into_iter().chain(first_volume);
        let record_mm = record_mm(asked);
        let of_record: Vec<(i32, f64)> = asked
            .record
            .iter()
            .map(|year| (year.water_year, year.values.first().copied().unwrap_or(f64::NAN)))
            .collect();
        let low_snow = LowSnowQuestions {
            levels_c: asked.levels_c,
            reference: asked.reference,
            below_quantile: asked.low_snow_below_quantile,
            realizations,
            record_mm: &record_mm,
        };
        Some(Self {
            method: RANGE_METHOD,
            simulated_years: realizations * length,
            redraws_years: asked.redraws_years,
            changes_mean: asked.changes_mean,
            levels_change_precipitation: asked.levels_change_precipitation,
            measures: told
                .filter_map(|(at, measure)| MeasureByYear::of(measure, &years(at), asked, &resamples))
                .collect(),
            low_snow: LowSnow::of(&ranked, &low_snow, &resamples),
            worst_years: worst_years(&of_record, &ranked, asked.levels_c, realizations, &resamples),
            low_runs: LowRuns::of(&headline, asked.levels_c, &ranked[asked.reference], &resamples),
        })
    }
}

impl MeasureByYear {
    /// Nothing where a year has no number.
    fn of(
        measure: &Measure,
        years: &[ArrayView2<'_, f64>],
        asked: &ByYearQuestions<'_>,
        resamples: &Resamples,
    ) -> Option<Self> {
        let ByYearQuestions { levels_c, reference, warming_rate, .. } = *asked;
        let all: Vec<Ranked> = years.iter().map(ranked).collect();
        let types =
            year_types(&all, levels_c, reference, years[reference].nrows(), resamples).unwrap_or_default();
        let tails = tails(&all, levels_c, reference, years[reference].nrows(), resamples)?;
        let others = levels_c.iter().enumerate().filter(|(level, _)| *level != reference);
        let partition = |(level, level_c): (usize, &f64)| {
            Partition::of(*level_c, &years[reference], &years[level], resamples)
        };
        Some(Self {
            measure: measure.clone(),
            partitions: others.filter_map(partition).collect(),
            types,
            tails,
            detection: Detection::of(years, levels_c, reference, warming_rate, resamples),
        })
    }
}

fn ranked(years: &ArrayView2<'_, f64>) -> Ranked {
    Ranked::new(years.indexed_iter().map(|((realization, _), value)| (*value, realization)))
}

/// Headline SWE of the record's years at every level, `[level][year]`: bands weighed by their area.
fn record_mm(asked: &ByYearQuestions<'_>) -> Vec<Vec<f64>> {
    let area_km2: f64 = asked.bands.iter().map(|band| band.area_km2).sum();
    let of_level = |level: usize| {
        let of_year = |year: &RecordYear| {
            let surveys = year.survey_swe_mm.axis_iter(Axis(0)).next()?;
            let of_bands = surveys.row(level).into_iter().zip(asked.bands);
            Some(of_bands.map(|(mm, band)| mm * band.area_km2).sum::<f64>() / area_km2)
        };
        asked.record.iter().filter_map(of_year).collect()
    };
    (0..asked.levels_c.len()).map(of_level).collect()
}
