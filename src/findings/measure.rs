//! What is found of one measure in one place.

use super::chance::Chances;
use super::crossing::{Crossing, CrossingRange, crossing_range};
use super::distribution::Distribution;
use super::driest_and_wettest::DriestAndWettest;
use super::exceedance::{Exceeded, add_changes, exceeded, volumes_exceeded};
use super::quantile::{quantile, sorted};
use super::record_range::{Range, RecordRange, range};
use super::resample::{Estimate, Ranked, Resamples};
use super::shift::{Shift, percent_change};
use super::spread::{SignalToNoise, Spread, signal_to_noise, signal_to_spread};
use super::temperature_held::TemperatureHeldSpread;
use super::variance::{TwoWay, VarianceShares};
use super::yardstick::{LevelShift, Levels, Yardstick};
use crate::season::{Kind, Measure};
use ndarray::{ArrayView1, ArrayView2, ArrayView3, Axis};
use serde::Serialize;

/// Findings about one measure in one place.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct MeasureFindings {
    /// The measure.
    pub measure: Measure,
    /// Spread of the period value over realizations at the reference, with its own temperatures.
    pub precipitation_spread: Option<Spread>,
    /// The same with every month's mean temperature held at the record's.
    pub temperature_held: Option<TemperatureHeldSpread>,
    /// Spread over single years at the reference; for the basin alone.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub weather_spread: Option<Spread>,
    /// From which warming on the shift outweighs the precipitation spread.
    pub outweighs: Crossing,
    /// Monte Carlo range of that warming.
    pub outweighs_range: Option<CrossingRange>,
    /// The same shift against other spreads; for the basin alone.
    #[serde(skip_serializing_if = "Vec::is_empty")]
    pub yardsticks: Vec<Yardstick>,
    /// The range of the answers over resampled records; for the basin alone.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub record_range: Option<RecordRange>,
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
    /// What 90, 70, 50, 30 and 10 % of single years bring at least; of the basin's volumes.
    #[serde(skip_serializing_if = "Vec::is_empty")]
    pub exceeded: Vec<Exceeded>,
    /// The driest and the wettest year of a realization beside the mean; of the basin's headline measure, and of the
    /// precipitation before its date.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub driest_and_wettest: Option<DriestAndWettest>,
    /// Years with none, and years whose snow never went or whose volume never came, over all realizations.
    pub years_undefined: [usize; 2],
    /// Paired change from the reference.
    pub shift: Option<Shift>,
    /// The median change as a percentage of the reference's median; of amounts.
    pub percent_change: Option<f64>,
    /// Shift over the half of the reference's 5-95 % precipitation spread that it points to.
    pub signal_to_spread: Option<Estimate>,
    /// Its 5 and 95 % quantiles over resampled realizations; none where a resample has no ratio.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub signal_to_spread_range: Option<Range>,
    /// Against one standard deviation.
    pub signal_to_noise: Option<SignalToNoise>,
    /// Shares of the period values' sums of squares over reference and level, two-way without replication; not the
    /// partition of single years.
    pub period_variance_shares: Option<VarianceShares>,
    /// Unpaired chances; for the basin alone.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub chances: Option<Chances>,
}

/// Values of one measure in one place.
pub(super) struct Asked<'a> {
    pub measure: &'a Measure,
    /// Period values `[level][realization]`.
    pub periods: ArrayView2<'a, f64>,
    /// Years without a value and years whose snow never went, a level each.
    pub undefined: Vec<[usize; 2]>,
    /// Period values at the reference with temperatures held.
    pub held: Option<ArrayView1<'a, f64>>,
    /// Single years `[level][realization][year]`, where they are kept, and the area they are of, km2.
    pub years: Option<(ArrayView3<'a, f64>, f64)>,
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

/// A measure's findings, and its shifts for the spreads that stand beside.
pub(super) struct Found {
    pub findings: MeasureFindings,
    pub shifts: Vec<LevelShift>,
}

impl Asked<'_> {
    /// Everything that the study's own runs say.
    pub fn find(&self, levels: Levels<'_>, resamples: &Resamples) -> Found {
        let periods: Vec<f64> = self.periods.row(levels.reference).to_vec();
        let reference = Reference {
            median: quantile(&sorted(periods.iter().copied()), 0.5),
            spread: Spread::of(&periods),
            spreads: Spread::resampled(&Ranked::new(periods.iter().copied().zip(0..)), resamples),
            years: self.ranked_years(levels.reference),
            periods,
        };
        let mut of_levels = Vec::with_capacity(levels.levels_c.len());
        let mut shifts = Vec::with_capacity(levels.levels_c.len());
        let mut ratios_above = Vec::new();
        for (level, level_c) in levels.levels_c.iter().enumerate() {
            let mut found = self.find_level(level, *level_c, resamples);
            if level != levels.reference {
                let warmed: Vec<f64> = self.periods.row(level).to_vec();
                found.chances = self.chances(level, &warmed, &reference, resamples);
                let compared = self.compare(&mut found, &warmed, &reference, resamples);
                let (shift, ratios) = compared.unzip();
                shifts.extend(shift);
                if level > levels.reference {
                    ratios_above.push((*level_c, ratios.unwrap_or_default()));
                }
            }
            of_levels.push(found);
        }
        let reference_exceeded = of_levels[levels.reference].exceeded.clone();
        let (colder, warmer) = of_levels.split_at_mut(levels.reference);
        for level in colder.iter_mut().chain(&mut warmer[1..]) {
            add_changes(&mut level.exceeded, &reference_exceeded);
        }
        let ratio = |level_c: f64| {
            let level = of_levels.iter().find(|level| level.level_c == level_c);
            level.and_then(|level| level.signal_to_spread).map(|ratio| ratio.value)
        };
        let single_years = reference.years.as_ref();
        let findings = MeasureFindings {
            measure: self.measure.clone(),
            precipitation_spread: reference.spread,
            temperature_held: self
                .held
                .map(|held| TemperatureHeldSpread::of(&held.to_vec(), &shifts, levels, resamples)),
            weather_spread: single_years.and_then(|years| {
                Spread::of(&years.values().iter().map(|(value, _)| *value).collect::<Vec<_>>())
            }),
            outweighs: levels.crossing(ratio),
            outweighs_range: crossing_range(levels.levels_c[levels.reference], &ratios_above),
            yardsticks: Vec::new(),
            record_range: None,
            levels: of_levels,
        };
        Found { findings, shifts }
    }

    fn ranked_years(&self, level: usize) -> Option<Ranked> {
        let years = self.years?.0.index_axis_move(Axis(0), level);
        Some(Ranked::new(years.indexed_iter().map(|((realization, _), value)| (*value, realization))))
    }

    /// What a level is by itself.
    fn find_level(&self, level: usize, level_c: f64, resamples: &Resamples) -> LevelFindings {
        let kind = self.measure.kind;
        let periods = self.periods.row(level);
        let periods = periods.iter().copied();
        let volumes = self.years.filter(|_| self.measure.is_volume).zip(self.ranked_years(level));
        LevelFindings {
            level_c,
            periods: if self.years.is_some() {
                Distribution::with_dots(kind, periods)
            } else {
                Distribution::of(kind, periods)
            },
            single_years: self
                .years
                .map(|(years, _)| Distribution::of(kind, years.index_axis(Axis(0), level).iter().copied())),
            exceeded: volumes.map_or(Vec::new(), |((_, area_km2), years)| match kind {
                Kind::VolumeHm3 => volumes_exceeded(&years, area_km2, &resamples.few()),
                _ => exceeded(&years, area_km2, &resamples.few()),
            }),
            driest_and_wettest: self.years.filter(|_| self.measure.has_extremes_told).and_then(
                |(years, _)| DriestAndWettest::of(&years.index_axis_move(Axis(0), level), resamples),
            ),
            years_undefined: self.undefined[level],
            shift: None,
            percent_change: None,
            signal_to_spread: None,
            signal_to_spread_range: None,
            signal_to_noise: None,
            period_variance_shares: None,
            chances: None,
        }
    }

    fn chances(
        &self,
        level: usize,
        warmed: &[f64],
        reference: &Reference,
        resamples: &Resamples,
    ) -> Option<Chances> {
        let (reference_years, warmed_years) = (reference.years.as_ref()?, self.ranked_years(level)?);
        Some(Chances::of(&reference.periods, warmed, reference_years, &warmed_years, resamples))
    }

    /// Adds what a level is against the reference; gives its shift, and its signal to spread in every resample.
    fn compare(
        &self,
        found: &mut LevelFindings,
        warmed: &[f64],
        reference: &Reference,
        resamples: &Resamples,
    ) -> Option<(LevelShift, Vec<Option<f64>>)> {
        let (shift, resampled) = Shift::of(&reference.periods, warmed, resamples)?;
        let median = shift.median.value;
        let ratio = reference
            .spread
            .and_then(|spread| signal_to_spread(median, &spread, &resampled, &reference.spreads));
        found.shift = Some(shift);
        found.percent_change = percent_change(self.measure.kind, median, reference.median);
        found.signal_to_spread = ratio.as_ref().map(|(ratio, _)| *ratio);
        found.signal_to_spread_range =
            ratio.as_ref().filter(|(_, of)| !of.is_empty()).and_then(|(_, of)| range(of.iter().copied()));
        found.signal_to_noise = Some(signal_to_noise(&reference.periods, warmed));
        found.period_variance_shares =
            TwoWay::of(&[&reference.periods, warmed]).and_then(|table| table.shares());
        let level_shift = LevelShift { level_c: found.level_c, median, resampled, mean: shift.mean };
        Some((level_shift, ratio.map_or(Vec::new(), |(_, ratios)| ratios)))
    }
}
