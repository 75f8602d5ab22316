//! Spreads side by side, by hand.

use super::super::measure::Asked;
use super::super::resample::Resamples;
use super::*;
use crate::calendar::{MonthDay, WaterYearStart};
use crate::season::{Measures, SeasonSettings};
use ndarray::Array2;

const LEVELS_C: [f64; 2] = [0.0, 2.0];
const REALIZATIONS: usize = 5;

fn measures() -> Vec<Measure> {
    let day = |month, day| MonthDay::new(month, day).expect("a day of every year");
    let settings = SeasonSettings {
        water_year_starts: WaterYearStart(day(10, 1)),
        survey_dates: vec![day(4, 1)],
        volume_windows: Vec::new(),
        outflow_before: Vec::new(),
        melt_shares_before: Vec::new(),
        arrival_volume_hm3: None,
    };
    Measures::of_snow(settings, 1.0).list()[..1].to_vec()
}

/// Realizations 10 mm apart about a median, and warmed by a loss.
fn periods(median: f64, loss: f64) -> Array2<f64> {
    Array2::from_shape_fn((2, REALIZATIONS), |(level, realization)| {
        median + 10.0 * (realization as f64 - 2.0) - if level == 1 { loss } else { 0.0 }
    })
}

/// A study with a median of 300 mm that loses so much, beside sets with these medians and losses.
fn spread(loss: f64, sets: &[(f64, f64)]) -> Option<ParameterSpread> {
    let measures = measures();
    let own = periods(300.0, loss);
    let asked = Asked {
        measure: &measures[0],
        periods: own.view(),
        undefined: vec![[0, 0]; 2],
        held: None,
        years: None,
    };
    let levels = Levels { levels_c: &LEVELS_C, reference: 0 };
    let study = [asked.find(levels, &Resamples::new(1, REALIZATIONS)).findings];
    let of_set = |(median, loss): &(f64, f64)| periods(*median, *loss).insert_axis(Axis(1));
    let own = own.insert_axis(Axis(1));
    let runs =
        SetRuns { measures, periods: sets.iter().map(of_set).collect(), headline_years: Vec::new(), own };
    ParameterSpread::of(&runs, &study, &LEVELS_C, 0)
}

/// By hand: of sets at 120, 280 and 500 mm the lowest lies 180 mm below the study's own 300 mm, wherever the others lie; a warming that
/// takes 60 mm points down, and its 60 mm are a third of these 180. Of five realizations 10 mm apart the 5 % quantile is the lowest, 20 mm below the
/// median. So parameters outweigh warming, and warming precipitation.
#[test]
fn parameters_may_outweigh_warming() {
    let found = spread(60.0, &[(500.0, 70.0), (120.0, 60.0), (280.0, 50.0)]).expect("three sets");
    assert_eq!((found.sets, found.realizations, found.measures.len()), (3, REALIZATIONS, 1));
    let measure = &found.measures[0];
    let found = [measure.own_reference, measure.reference.lowest, measure.reference.highest];
    assert_eq!(found, [300.0, 120.0, 500.0]);
    let level = &measure.levels[0];
    assert_eq!([level.level_c, level.shift.lowest, level.shift.highest], [2.0, -70.0, -50.0]);
    let weighed = level.weighed.expect("a shift");
    assert_eq!([weighed.warming, weighed.precipitation, weighed.parameters], [60.0, 20.0, 180.0]);
    assert!((weighed.warming_over_parameters.expect("sets differ") - 1.0 / 3.0).abs() < 1e-12);
    assert_eq!(weighed.largest, Mover::Parameters);
    let percent = level.percent_change.expect("an amount");
    assert_eq!([percent.lowest, percent.highest], [-50.0, -14.0]);
    let shares = level.variance_shares.expect("they vary");
    assert!(shares.set > 0.9 && shares.level > shares.realization, "{shares:?}");
}

/// The other two, each the largest by hand; sets that are alike leave nothing to hold warming against.
#[test]
fn the_largest_is_told() {
    let largest = |loss, sets: &[(f64, f64)]| {
        let found = spread(loss, sets).expect("sets");
        let weighed = found.measures[0].levels[0].weighed.expect("a shift");
        (weighed.largest, weighed.warming_over_parameters)
    };
    assert_eq!(largest(90.0, &[(300.0, 90.0), (285.0, 90.0)]), (Mover::Warming, Some(6.0)));
    assert_eq!(largest(5.0, &[(300.0, 5.0), (295.0, 5.0)]), (Mover::Precipitation, Some(1.0)));
    assert_eq!(largest(90.0, &[(310.0, 90.0), (330.0, 90.0)]), (Mover::Warming, None), "none below");
    assert_eq!(largest(90.0, &[(300.0, 90.0); 2]), (Mover::Warming, None));
    assert_eq!(spread(90.0, &[]), None);
}
