//! Break-even precipitation by root finding on runs, and how wet periods have been.

use super::level_groups::LevelGroups;
use super::ready::Ready;
use crate::baseline::Seasons as SeasonsOf;
use crate::ensemble::{BasinSeasons, Halt, LevelGroup, Plan, Watch, run_records};
use crate::findings::{BreakEven, BreakEvenLevel, Reached, Root, break_even_pct, quantile, sorted};
use crate::perturb::{Generator, Kept, MeanChange, MonthlyChange};
use crate::season::Measures;
use crate::weather::Series;

/// Realizations that are run for it at most, the first of the study.
const BREAK_EVEN_REALIZATIONS: u32 = 100;

/// Finds the break-even precipitation of the headline measure at every level: the same realizations, no change of mean
/// precipitation assumed in them, under each level with one more factor on all precipitation.
///
/// # Errors
/// Those of a run.
pub(super) fn break_even(
    ready: &Ready,
    plan: &Plan<'_>,
    groups: &LevelGroups<'_>,
    made: &dyn Generator,
    watch: &dyn Watch,
) -> Result<BreakEven, Halt> {
    let all = plan.realizations;
    let changes = &groups.changes;
    let realizations = plan.realizations.min(BREAK_EVEN_REALIZATIONS);
    // Every step towards the root runs them again.
    let kept = Kept::of(made, realizations, plan.years);
    let weather = groups.weather(&kept);
    let measures = Measures::of_snow(plan.measures.settings().clone(), ready.basin.area_km2());
    let plan = Plan { realizations, measures: &measures, ..*plan };
    let medians = |pct: &[f64]| {
        let mut scaled: Vec<MonthlyChange> =
            changes.iter().zip(pct).map(|(change, pct)| change.with_precipitation(*pct)).collect();
        // The reference stays: it is what is to be regained, and decides about perennial snow.
        scaled[plan.reference] = changes[plan.reference].clone();
        let lanes = groups.lanes(&scaled);
        let of_groups: Vec<LevelGroup<'_>> =
            lanes.iter().zip(&weather).map(|(lanes, generator)| LevelGroup { lanes, generator }).collect();
        let plan = Plan { groups: &of_groups, ..plan };
        let unchanged: Vec<&dyn Generator> = weather.iter().map(|of_group| of_group as _).collect();
        let seasons: Vec<BasinSeasons> = run_records(&plan, &[unchanged], watch)?.collect();
        let of = |level: usize| {
            let periods = seasons[0].periods.index_axis(ndarray::Axis(0), level);
            quantile(&sorted(periods.row(0).iter().copied()), 0.5)
        };
        Ok::<_, Halt>((0..changes.len()).map(of).collect::<Vec<f64>>())
    };
    let no_change = vec![0.0; changes.len()];
    let unchanged_medians = medians(&no_change)?;
    let reference_median = unchanged_medians[plan.reference];
    let roots = break_even_pct(changes.len(), |pct| {
        let medians = if pct == no_change { unchanged_medians.clone() } else { medians(pct)? };
        Ok::<_, Halt>(medians.into_iter().map(|median| median - reference_median).collect())
    })?;
    let survey = ready.scenario.season.survey_dates[0];
    let generator = MeanChange {
        generator: made,
        seed: ready.scenario.seed,
        standard_deviation_pct: ready.scenario.realizations.mean_change_sd_pct.unwrap_or(0.0),
    };
    let wetness = Wetness::of(&ready.drawn_from, &generator, [all as usize, plan.years], survey, watch)?;
    let levels_c = &ready.scenario.warming.levels_c;
    let levels = levels_c.iter().zip(roots).enumerate().filter(|(level, _)| *level != plan.reference);
    Ok(BreakEven {
        realizations: plan.realizations as usize,
        reference_median,
        levels: levels.map(|(_, (level_c, root))| wetness.level(*level_c, root)).collect(),
        reached: wetness.reached(plan.years),
    })
}

/// Mean precipitation of the record's and the realizations' periods, percent above the record's mean: of the cool season,
/// or of whole years where the first survey date leaves no season before it.
struct Wetness {
    is_of_whole_years: bool,
    realizations_pct: Vec<f64>,
    record_wettest_pct: Option<f64>,
}

impl Wetness {
    fn of(
        record: &Series,
        generator: &dyn Generator,
        [realizations, years]: [usize; 2],
        survey: crate::calendar::MonthDay,
        watch: &dyn Watch,
    ) -> Result<Self, Halt> {
        let mean = |values: &[(i32, f64)]| values.iter().map(|(_, mm)| mm).sum::<f64>() / values.len() as f64;
        let is_of_whole_years = SeasonsOf::of(record, survey).cool.precipitation_mm.is_empty();
        let of = |series: &Series| {
            let seasons = SeasonsOf::of(series, survey);
            if is_of_whole_years { seasons.warm.precipitation_mm } else { seasons.cool.precipitation_mm }
        };
        let record = of(record);
        let record_mm = mean(&record);
        let above = |values: &[(i32, f64)]| 100.0 * (mean(values) / record_mm - 1.0);
        let mut series = Series::default();
        let mut realizations_pct = Vec::with_capacity(realizations);
        for number in 0..realizations as u32 {
            if watch.wants_stop() {
                return Err(Halt::Stopped);
            }
            generator.fill(number, years, &mut series);
            realizations_pct.push(above(&of(&series)));
        }
        let record_wettest_pct = record.windows(years).map(above).max_by(f64::total_cmp);
        Ok(Self { is_of_whole_years, realizations_pct, record_wettest_pct })
    }

    fn level(&self, level_c: f64, root: Root) -> BreakEvenLevel {
        let (precipitation_change_pct, stays) = match root {
            Root::At(pct) => (Some(pct), None),
            Root::Stays(stays) => (None, Some(stays)),
            Root::Unknown => (None, None),
        };
        let reached = |pct: f64| self.realizations_pct.iter().filter(|wetness| **wetness >= pct).count();
        BreakEvenLevel {
            level_c,
            precipitation_change_pct,
            stays,
            realizations_that_reached: precipitation_change_pct.map_or(0, reached),
            record_reached: self
                .record_wettest_pct
                .map(|wettest| precipitation_change_pct.is_some_and(|needed| wettest >= needed)),
        }
    }

    fn reached(&self, years: usize) -> Reached {
        Reached {
            years,
            is_of_whole_years: self.is_of_whole_years,
            record_wettest_pct: self.record_wettest_pct,
            realizations_wettest_pct: self.realizations_pct.iter().copied().fold(f64::NEG_INFINITY, f64::max),
            realizations: self.realizations_pct.len(),
        }
    }
}
