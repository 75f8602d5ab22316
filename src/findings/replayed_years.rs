//! Years of the record, as they were, at every level: what a remembered year would be in a warmer climate, in this model.

use super::normal::PercentOfMedian;
use crate::ensemble::RecordYear;
use crate::season::{MELT_OUT_DAY, Measure, Outcome};
use serde::Serialize;

/// Years of least snow that are replayed where none are named.
const DRIEST: usize = 3;
/// The measure of the year's highest SWE.
const PEAK: &str = "peak_swe_mm";

/// Replayed years.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct ReplayedYears {
    /// Whether the scenario names them; otherwise they are those of least snow and the one of most.
    pub are_named: bool,
    /// In order.
    pub years: Vec<ReplayedYear>,
}

/// A year's weather at every level.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct ReplayedYear {
    /// The water year.
    pub water_year: i32,
    /// Its rank by the headline SWE at the reference among the years in use, 1 for the least.
    pub rank_from_least: usize,
    /// One entry a level, in the order of the levels.
    pub levels: Vec<ReplayedLevel>,
}

/// A year's weather at one level: numbers of the basin mean.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct ReplayedLevel {
    /// The level, degC.
    pub level_c: f64,
    /// The headline SWE, mm.
    pub headline_mm: f64,
    /// Percent of the normal: the baseline years' median at the reference; none where that is 0.
    pub percent_of_normal: Option<f64>,
    /// The year's highest SWE, mm.
    pub peak_swe_mm: f64,
    /// Melt-out, day of the water year.
    pub melt_out_day: Outcome,
}

impl ReplayedYears {
    /// The named years, or without names those of least snow at the reference and the one of most. `at_levels` are the record's years
    /// run at each level, in the order of the levels and of the record; `normal` is the headline's.
    pub fn of(
        named: Option<&[i32]>,
        at_levels: &[Vec<RecordYear>],
        normal: &PercentOfMedian,
        measures: &[Measure],
        reference: usize,
    ) -> Option<Self> {
        let find = |name: &str| measures.iter().position(|measure| measure.name == name);
        let (peak, melt_out) = (find(PEAK)?, find(MELT_OUT_DAY)?);
        let own = at_levels.get(reference)?;
        let mut ranked: Vec<usize> = (0..own.len()).collect();
        ranked.sort_by(|a, b| own[*a].values[0].total_cmp(&own[*b].values[0]).then(a.cmp(b)));
        let mut chosen: Vec<usize> = match named {
            Some(named) => (0..own.len()).filter(|at| named.contains(&own[*at].water_year)).collect(),
            None => ranked.iter().take(DRIEST).chain(ranked.last()).copied().collect(),
        };
        chosen.sort_unstable();
        chosen.dedup();
        let level = |year: usize, at: usize| {
            let values = &at_levels[at].get(year)?.values;
            let of_normal = normal.levels.get(at)?;
            Some(ReplayedLevel {
                level_c: of_normal.level_c,
                headline_mm: *values.first()?,
                percent_of_normal: of_normal.percent.get(year).copied().flatten(),
                peak_swe_mm: values[peak],
                melt_out_day: measures[melt_out].kind.outcome(values[melt_out]),
            })
        };
        let of_year = |year: usize| {
            Some(ReplayedYear {
                water_year: own[year].water_year,
                rank_from_least: ranked.iter().position(|at| *at == year)? + 1,
                levels: (0..at_levels.len()).map(|at| level(year, at)).collect::<Option<_>>()?,
            })
        };
        let years: Vec<ReplayedYear> = chosen.into_iter().map(of_year).collect::<Option<_>>()?;
        (!years.is_empty()).then_some(Self { are_named: named.is_some(), years })
    }
}
