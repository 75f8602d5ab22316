//! Puts every question to an ensemble, measure by measure, for the basin and for each band.

use super::chance::Chances;
use super::crossing::{Crossing, CrossingRange, crossing, crossing_range};
use super::distribution::Distribution;
use super::quantile::{quantile, sorted};
use super::record::RecordFindings;
use super::resample::{Estimate, Ranked, Resamples};
use super::shift::{Shift, percent_change};
use super::spread::{SignalToNoise, Spread, signal_to_noise, signal_to_spread};
use super::variance::{TwoWay, VarianceShares};
use crate::basin::Band;
use crate::ensemble::{Halt, Seasons, Watch};
use crate::fit::Comparison;
use crate::season::{Kind, Measure, Place};
use ndarray::{ArrayView2, Axis};
use rayon::prelude::*;
use serde::Serialize;

/// What the findings need to know beside the seasons.
#[derive(Debug, Clone)]
pub struct Questions<'a> {
    /// Warming levels, ascending, degC.
    pub levels_c: &'a [f64],
    /// Which of them is the reference.
    pub reference: usize,
    /// The bands, from the lowest.
    pub bands: &'a [Band],
    /// Seed of the study, for the Monte Carlo error.
    pub seed: u64,
}

/// Everything that is found.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Findings {
    /// Warming levels, ascending, degC.
    pub levels_c: Vec<f64>,
    /// Which of them is the reference.
    pub reference: usize,
    /// Realizations.
    pub realizations: usize,
    /// Water years of a realization.
    pub years: usize,
    /// Of the basin mean, one entry a measure, the headline's first.
    pub basin: Vec<MeasureFindings>,
    /// Of each band, from the lowest.
    pub bands: Vec<BandFindings>,
    /// The model against observed snow, one entry a site. No ensemble is asked for it: whoever has it adds it.
    #[serde(skip_serializing_if = "Vec::is_empty")]
    pub comparisons: Vec<Comparison>,
    /// The record's own years. No ensemble is asked for them either.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub record: Option<RecordFindings>,
}

/// Findings of one band.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct BandFindings {
    /// The band.
    #[serde(flatten)]
    pub band: Band,
    /// One entry a measure.
    pub measures: Vec<MeasureFindings>,
}

/// Findings about one measure in one place.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct MeasureFindings {
    /// The measure.
    pub measure: Measure,
    /// Spread of the period value over realizations at the reference, with its own temperatures.
    pub precipitation_spread: Option<Spread>,
    /// Spread over single years at the reference; for the basin alone.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub weather_spread: Option<Spread>,
    /// From which warming on the shift outweighs the precipitation spread.
    pub outweighs: Crossing,
    /// Monte Carlo range of that warming.
    pub outweighs_range: Option<CrossingRange>,
    /// One entry a level, in the order of the levels.
    pub levels: Vec<LevelFindings>,
}

/// Findings about one measure in one place at one level.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct LevelFindings {
    /// The level, degC.
    pub level_c: f64,
    /// Period values over realizations.
    pub periods: Distribution,
    /// Single years of all realizations; for the basin alone.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub single_years: Option<Distribution>,
    /// Years with none and years whose snow never went, over all realizations.
    pub years_undefined: [usize; 2],
    /// Paired change from the reference.
    pub shift: Option<Shift>,
    /// The median change as a percentage of the reference's median; of amounts.
    pub percent_change: Option<f64>,
    /// Shift over the half of the reference's 5-95 % precipitation spread that it points to.
    pub signal_to_spread: Option<Estimate>,
    /// Against one standard deviation.
    pub signal_to_noise: Option<SignalToNoise>,
    /// Shares of the period values' sums of squares over reference and level, two-way without replication; not the
    /// partition of single years.
    pub period_variance_shares: Option<VarianceShares>,
    /// Unpaired chances; for the basin alone.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub chances: Option<Chances>,
}

/// Period values `[level][realization]` of one measure in one place, and the single years where they are kept.
struct Asked<'a> {
    measure: &'a Measure,
    periods: ArrayView2<'a, f64>,
    years: Option<ndarray::ArrayView3<'a, f64>>,
    undefined: Vec<[usize; 2]>,
}

/// Answers every question about every measure; `watch` is asked before each whether to stop.
///
/// # Errors
/// `watch` wanting to stop.
pub fn answer(seasons: &Seasons, questions: &Questions<'_>, watch: &dyn Watch) -> Result<Findings, Halt> {
    let (_, _, realizations, years) = seasons.basin_years.dim();
    let resamples = Resamples::new(questions.seed, realizations);
    let in_basin: Vec<Asked<'_>> =
        seasons.measures.iter().enumerate().map(|(at, _)| of_basin(seasons, at)).collect();
    let in_bands: Vec<Asked<'_>> = (0..questions.bands.len())
        .flat_map(|band| {
            let everywhere = |(_, measure): &(usize, &Measure)| measure.place == Place::BandsAndBasin;
            seasons
                .measures
                .iter()
                .enumerate()
                .filter(everywhere)
                .map(move |(at, _)| of_band(seasons, band, at))
        })
        .collect();
    let find = |asked: &Asked<'_>| {
        if watch.wants_stop() { Err(Halt::Stopped) } else { Ok(asked.find(questions, &resamples)) }
    };
    let basin = in_basin.par_iter().map(find).collect::<Result<Vec<MeasureFindings>, Halt>>()?;
    let mut of_bands = in_bands.par_iter().map(find).collect::<Result<Vec<_>, Halt>>()?.into_iter();
    let measures_of_a_band = in_bands.len() / questions.bands.len();
    Ok(Findings {
        levels_c: questions.levels_c.to_vec(),
        reference: questions.reference,
        realizations,
        years,
        basin,
        bands: questions
            .bands
            .iter()
            .map(|band| BandFindings {
                band: *band,
                measures: of_bands.by_ref().take(measures_of_a_band).collect(),
            })
            .collect(),
        comparisons: Vec::new(),
        record: None,
    })
}

fn of_basin(seasons: &Seasons, at: usize) -> Asked<'_> {
    let years = seasons.basin_years.index_axis(Axis(1), at);
    let count = |level: usize, what: f64| {
        years.index_axis(Axis(0), level).iter().filter(|value| **value == what).count()
    };
    let levels = years.len_of(Axis(0));
    Asked {
        measure: &seasons.measures[at],
        periods: seasons.basin_periods.index_axis(Axis(1), at),
        undefined: (0..levels)
            .map(|level| [count(level, crate::season::NONE), count(level, crate::season::NOT_GONE)])
            .collect(),
        years: Some(years),
    }
}

fn of_band(seasons: &Seasons, band: usize, at: usize) -> Asked<'_> {
    let undefined = seasons.band_undefined.index_axis(Axis(1), band);
    Asked {
        measure: &seasons.measures[at],
        periods: seasons.band_periods.view().index_axis_move(Axis(1), band).index_axis_move(Axis(1), at),
        undefined: undefined.index_axis(Axis(1), at).iter().map(|count| count.map(|n| n as usize)).collect(),
        years: None,
    }
}

/// The reference as every level is held against it.
struct Reference {
    periods: Vec<f64>,
    median: f64,
    spread: Option<Spread>,
    /// The spread's quantiles in every resample.
    spreads: Vec<Option<[f64; 3]>>,
    years: Option<Ranked>,
}

impl Asked<'_> {
    fn find(&self, questions: &Questions<'_>, resamples: &Resamples) -> MeasureFindings {
        let periods: Vec<f64> = self.periods.row(questions.reference).to_vec();
        let reference = Reference {
            median: quantile(&sorted(periods.iter().copied()), 0.5),
            spread: Spread::of(&periods),
            spreads: Spread::resampled(&periods, resamples),
            years: self.ranked_years(questions.reference),
            periods,
        };
        let mut levels = Vec::with_capacity(questions.levels_c.len());
        let mut ratios_above = Vec::new();
        for (level, level_c) in questions.levels_c.iter().enumerate() {
            let found = self.find_level(level, *level_c);
            if level == questions.reference {
                levels.push(found);
                continue;
            }
            let (found, ratios) = self.compare(found, level, &reference, resamples);
            levels.push(found);
            if level > questions.reference {
                ratios_above.push((*level_c, ratios));
            }
        }
        let warmer: Vec<(f64, Option<f64>)> = levels[questions.reference + 1..]
            .iter()
            .map(|level| (level.level_c, level.signal_to_spread.map(|ratio| ratio.value)))
            .collect();
        let reference_c = questions.levels_c[questions.reference];
        let single_years = reference.years.as_ref();
        MeasureFindings {
            measure: self.measure.clone(),
            precipitation_spread: reference.spread,
            weather_spread: single_years.and_then(|years| {
                Spread::of(&years.values().iter().map(|(value, _)| *value).collect::<Vec<_>>())
            }),
            outweighs: crossing(reference_c, &warmer),
            outweighs_range: crossing_range(reference_c, &ratios_above),
            levels,
        }
    }

    fn ranked_years(&self, level: usize) -> Option<Ranked> {
        let years = self.years?.index_axis_move(Axis(0), level);
        Some(Ranked::new(years.indexed_iter().map(|((realization, _), value)| (*value, realization))))
    }

    /// What a level is by itself.
    fn find_level(&self, level: usize, level_c: f64) -> LevelFindings {
        LevelFindings {
            level_c,
            periods: if self.years.is_some() {
                Distribution::with_dots(self.periods.row(level).iter().copied())
            } else {
                Distribution::of(self.periods.row(level).iter().copied())
            },
            single_years: self
                .years
                .map(|years| Distribution::of(years.index_axis(Axis(0), level).iter().copied())),
            years_undefined: self.undefined[level],
            shift: None,
            percent_change: None,
            signal_to_spread: None,
            signal_to_noise: None,
            period_variance_shares: None,
            chances: None,
        }
    }

    /// What a level is against the reference, and its signal to spread in every resample.
    fn compare(
        &self,
        found: LevelFindings,
        level: usize,
        reference: &Reference,
        resamples: &Resamples,
    ) -> (LevelFindings, Vec<Option<f64>>) {
        let warmed: Vec<f64> = self.periods.row(level).to_vec();
        let chances =
            reference.years.as_ref().zip(self.ranked_years(level)).map(|(reference_years, warmed_years)| {
                Chances::of(&reference.periods, &warmed, reference_years, &warmed_years, resamples)
            });
        let Some((shift, shifts)) = Shift::of(&reference.periods, &warmed, resamples) else {
            return (LevelFindings { chances, ..found }, Vec::new());
        };
        let median = shift.median.value;
        let ratio = reference
            .spread
            .and_then(|spread| signal_to_spread(median, &spread, &shifts, &reference.spreads));
        let found = LevelFindings {
            shift: Some(shift),
            percent_change: match self.measure.kind {
                Kind::AmountMm => percent_change(median, reference.median),
                Kind::DayOfWaterYear => None,
            },
            signal_to_spread: ratio.as_ref().map(|(ratio, _)| *ratio),
            signal_to_noise: Some(signal_to_noise(&reference.periods, &warmed)),
            period_variance_shares: TwoWay::of(&[&reference.periods, &warmed])
                .and_then(|table| table.shares()),
            chances,
            ..found
        };
        (found, ratio.map_or(Vec::new(), |(_, ratios)| ratios))
    }
}
