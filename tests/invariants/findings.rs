//! What is found of amounts, written again from the single years of a run as plainly as the method states it.

use super::cases;
use super::ensemble::Study;
use super::scenario::scenarios;
use ndarray::{ArrayView2, Axis};
use proptest::prelude::*;
use thawline::ensemble::Silent;
use thawline::findings::{
    Crossing, Distribution, EXCEEDANCE_PCT, Findings, LevelFindings, MeasureFindings, Questions, Runs,
    Spread, answer,
};
use thawline::perturb::{MeanChange, YearBlocks};
use thawline::season::Kind;
use thawline::snow::Path;

const LEVELS_C: [f64; 6] = [0.0, 1.0, 2.0, 3.0, 4.0, 5.0];
const REALIZATIONS: u32 = 7;
const YEARS: usize = 12;

/// Type 8 of Hyndman & Fan (1996) in their own form: the plotting position of the k-th of n values is (k - 1/3)/(n + 1/3), and
/// a quantile lies on the line through these points.
fn type_8(values: &[f64], p: f64) -> f64 {
    let mut values = values.to_vec();
    values.sort_by(f64::total_cmp);
    let n = values.len() as f64;
    let position = |k: usize| (k as f64 - 1.0 / 3.0) / (n + 1.0 / 3.0);
    let above = (1..=values.len()).find(|k| position(*k) >= p);
    match above {
        Some(1) => values[0],
        None => values[values.len() - 1],
        Some(k) => {
            let share = (p - position(k - 1)) / (position(k) - position(k - 1));
            values[k - 2] * (1.0 - share) + values[k - 1] * share
        }
    }
}

fn mean(values: &[f64]) -> f64 {
    values.iter().sum::<f64>() / values.len() as f64
}

fn deviation(values: &[f64]) -> f64 {
    let about = mean(values);
    let squares = values.iter().map(|value| (value - about) * (value - about)).sum::<f64>();
    (squares / (values.len() as f64 - 1.0)).sqrt()
}

/// Means over pieces of so many years of each realization.
fn pieces(of: &ArrayView2<'_, f64>, years: usize) -> Vec<f64> {
    let mut means = Vec::new();
    for row in of.rows() {
        let row = row.to_vec();
        means.extend(row.chunks(years).filter(|piece| piece.len() == years).map(mean));
    }
    means
}

/// 1e-9 of what is compared is rounding.
fn same(found: f64, expected: f64, scale: f64) -> bool {
    (found - expected).abs() <= 1e-9 * scale.abs().max(1.0)
}

fn holds_distribution(found: &Distribution, values: &[f64]) -> bool {
    let quantiles =
        [(found.q05, 0.05), (found.q25, 0.25), (found.q50, 0.5), (found.q75, 0.75), (found.q95, 0.95)];
    found.count == values.len()
        && quantiles.iter().all(|(quantile, p)| {
            let expected = type_8(values, *p);
            same(quantile.value().expect("an amount"), expected, expected)
        })
}

fn holds_spread(found: Option<Spread>, values: &[f64]) -> bool {
    let found = found.expect("a spread of amounts");
    let median = type_8(values, 0.5);
    same(found.q05, type_8(values, 0.05), median)
        && same(found.q50, median, median)
        && same(found.q95, type_8(values, 0.95), median)
        && same(found.standard_deviation, deviation(values), median)
}

/// The size of a shift over the half of the spread that it points to; a half below 1e-6 is too near to rounding to compare.
fn ratio(shift: f64, spread: &[f64]) -> Option<f64> {
    let [low, median, high] = [0.05, 0.5, 0.95].map(|p| type_8(spread, p));
    let half = if shift < 0.0 { median - low } else { high - median };
    (half > 1e-6).then(|| shift.abs() / half)
}

/// Where a line through the ratios first passes 1.
fn first_crossing(levels_c: &[f64], ratios: &[f64]) -> Option<f64> {
    let mut points = vec![(levels_c[0], 0.0)];
    points.extend(levels_c[1..].iter().copied().zip(ratios.iter().copied()));
    points.windows(2).find(|ends| ends[1].1 > 1.0).map(|ends| {
        let [(from_c, below), (to_c, above)] = [ends[0], ends[1]];
        from_c + (to_c - from_c) * (1.0 - below) / (above - below)
    })
}

/// Driest and wettest years, straight from the years.
fn holds_extremes(found: &MeasureFindings, of: &LevelFindings, years: &ArrayView2<'_, f64>) {
    let name = &found.measure.name;
    assert_eq!(of.driest_and_wettest.is_some(), found.measure.has_extremes_told, "{name}");
    let Some(told) = of.driest_and_wettest else { return };
    let each =
        |of: fn(&[f64]) -> f64| years.rows().into_iter().map(|row| of(&row.to_vec())).collect::<Vec<f64>>();
    for (told, expected) in [
        (told.driest, each(|years| years.iter().copied().fold(f64::INFINITY, f64::min))),
        (told.mean, each(mean)),
        (told.wettest, each(|years| years.iter().copied().fold(f64::NEG_INFINITY, f64::max))),
    ] {
        for (told, p) in [(told.q05, 0.05), (told.median.value, 0.5), (told.q95, 0.95)] {
            let expected = type_8(&expected, p);
            assert!(same(told, expected, expected), "{name}: {told} for {expected}");
        }
    }
}

fn check(found: &MeasureFindings, years: &[ArrayView2<'_, f64>], area_km2: f64, levels_c: &[f64]) {
    let name = &found.measure.name;
    let single = |level: usize| years[level].iter().copied().collect::<Vec<f64>>();
    let periods = |level: usize| pieces(&years[level], YEARS);
    let reference = periods(0);
    assert!(holds_spread(found.precipitation_spread, &reference), "{name}");
    assert!(holds_spread(found.weather_spread, &single(0)), "{name}");
    let mut ratios = Vec::new();
    for (level, of) in found.levels.iter().enumerate() {
        assert!(holds_distribution(&of.periods, &periods(level)), "{name}: {of:?}");
        assert!(
            holds_distribution(of.single_years.as_ref().expect("of the basin"), &single(level)),
            "{name}"
        );
        assert_eq!(of.exceeded.len(), if found.measure.is_volume { EXCEEDANCE_PCT.len() } else { 0 });
        for exceeded in &of.exceeded {
            let p = 1.0 - f64::from(exceeded.chance_pct) / 100.0;
            let [expected, before] = [level, 0].map(|level| type_8(&single(level), p));
            assert!(same(exceeded.amount_mm.value, expected, expected), "{name}: {exceeded:?}, {expected}");
            assert!(same(exceeded.volume_hm3.value, expected * area_km2 / 1000.0, expected));
            // A reference within rounding of 10 mm may fall to either side.
            if level > 0 && (before - 10.0).abs() > 1e-6 {
                let change = (before > 10.0).then(|| 100.0 * (expected - before) / before);
                assert_eq!(exceeded.change_pct.is_some(), change.is_some(), "{name}: {exceeded:?}");
                assert!(same(exceeded.change_pct.unwrap_or(0.0), change.unwrap_or(0.0), 100.0), "{name}");
            }
        }
        holds_extremes(found, of, &years[level]);
        if level == 0 {
            assert!(of.shift.is_none());
            continue;
        }
        let changes: Vec<f64> =
            reference.iter().zip(periods(level)).map(|(before, after)| after - before).collect();
        let (shift, median) = (type_8(&changes, 0.5), type_8(&reference, 0.5));
        let told = of.shift.expect("a shift of amounts");
        assert!(same(told.median.value, shift, median) && same(told.mean, mean(&changes), median), "{name}");
        assert!(
            same(told.q05, type_8(&changes, 0.05), median) && same(told.q95, type_8(&changes, 0.95), median)
        );
        if (median - 10.0).abs() > 1e-6 {
            let percent = (median > 10.0).then(|| 100.0 * shift / median);
            assert_eq!(of.percent_change.is_some(), percent.is_some(), "{name}: {median}");
            assert!(same(of.percent_change.unwrap_or(0.0), percent.unwrap_or(0.0), 100.0), "{name}");
        }
        if let Some(expected) = ratio(shift, &reference) {
            // A half spread of 1e-6 mm holds some 1e-3 of the rounding of sums of hundreds of mm.
            let value = of.signal_to_spread.expect("a ratio").value;
            assert!((value - expected).abs() <= 1e-6 * expected.max(1.0), "{name}: {value}, {expected}");
            ratios.push(expected);
        }
        for yardstick in &found.yardsticks {
            let pieces = pieces(&years[0], yardstick.years);
            assert!(yardstick.periods == pieces.len() && holds_spread(yardstick.spread, &pieces), "{name}");
            let at = yardstick.levels.iter().find(|at| at.level_c == of.level_c).expect("every level");
            if let Some(expected) = ratio(shift, &pieces) {
                let value = at.signal_to_spread.expect("a ratio").value;
                assert!((value - expected).abs() <= 1e-6 * expected.max(1.0), "{name}: {value}, {expected}");
            }
        }
    }
    assert_eq!(found.yardsticks.iter().map(|of| of.years).collect::<Vec<_>>(), [1, 10, YEARS]);
    if ratios.len() == levels_c.len() - 1 && ratios.iter().all(|ratio| (ratio - 1.0).abs() > 1e-5) {
        match (found.outweighs, first_crossing(levels_c, &ratios)) {
            (Crossing::At { level_c, .. }, Some(expected)) => {
                assert!((level_c - expected).abs() < 1e-5, "{name}");
            }
            (Crossing::NotReached { .. }, None) => assert!(levels_c.len() > 1, "{name}"),
            (Crossing::Unknown, None) => assert_eq!(levels_c.len(), 1, "{name}"),
            (found, expected) => panic!("{name}: {found:?} for {expected:?}"),
        }
    }
}

proptest! {
    #![proptest_config(cases(12))]

    /// Distributions, spreads, shifts, exceedance, ratios, yardsticks and crossings of every amount follow from its single years.
    #[test]
    fn amounts_are_found_from_their_single_years(scenario in scenarios()) {
        let changes = scenario.changes();
        let study = Study::of(&scenario, &changes);
        let blocks = YearBlocks { record: &study.record, seed: 4, mean_run_years: 2.0 };
        let generator = MeanChange { generator: &blocks, seed: 4, standard_deviation_pct: 9.0 };
        let seasons = study.run_from(&generator, 2, (REALIZATIONS, YEARS), Path::Widest);
        let levels_c = &LEVELS_C[..changes.len()];
        let bands = &scenario.basin.bands;
        let questions = Questions { levels_c, reference: 0, bands, mean_change_sd_pct: 9.0, criteria: &[], seed: 4 };
        let runs = Runs { study: &seasons, temperature_held: None, other_changes: &[], refits: &[] };
        let found: Findings = answer(&runs, &questions, &Silent).expect("findings");
        let area_km2 = bands.iter().map(|band| band.area_km2).sum();
        for (at, of) in found.basin.iter().enumerate().filter(|(_, of)| of.measure.kind == Kind::AmountMm) {
            let years: Vec<ArrayView2<'_, f64>> = (0..levels_c.len())
                .map(|level| seasons.basin.years.index_axis(Axis(0), level).index_axis_move(Axis(0), at))
                .collect();
            check(of, &years, area_km2, levels_c);
        }
    }
}
