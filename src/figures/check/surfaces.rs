//! Made-up response surfaces, and tests of how they are drawn.

use super::super::response_surface::FIGURE;
use super::studies::PLAIN;
use super::{Setting, assert_texts_apart, texts};
use crate::calendar::{MonthDay, WaterYearStart};
use crate::findings::{
    Change, ChangeOrigin, CurvePoint, Estimate, FailureLine, Findings, NamedNode, NodeMeasure, Realized,
    ResponseSurface, Stays, SurfaceNode,
};
use crate::season::{Kind, Measure, Outcome};
use crate::units::UnitSystem;

/// A surface of SWE that goes linearly with warming and with precipitation, over the default grid.
pub fn made(measure: &Measure, [middle, change]: [f64; 2], reference_c: f64) -> ResponseSurface {
    let warmings_c: Vec<f64> = (-2..=6).map(f64::from).collect();
    let changes: Vec<f64> = (-4..=4).map(|step| 10.0 * f64::from(step)).collect();
    let swe = |at: Change| {
        (middle + change * (at.warming_c - reference_c)).max(0.0)
            * (1.0 + at.precipitation_change_pct / 100.0)
    };
    let node = |at: Change| {
        let known = |value: f64| Estimate { value, monte_carlo_error: Some(0.1) };
        let swe_mm = swe(at);
        SurfaceNode {
            change: at,
            measures: vec![NodeMeasure {
                median: Outcome::Value(swe_mm),
                change: Some(known(swe_mm - middle)),
                change_pct: (middle >= 10.0).then(|| known(100.0 * (swe_mm / middle - 1.0))),
            }],
            band_swe_mm: Vec::new(),
        }
    };
    let at = |warming_c: f64, precipitation_change_pct: f64| Change { warming_c, precipitation_change_pct };
    let grid: Vec<Change> =
        warmings_c.iter().flat_map(|warming_c| changes.iter().map(|pct| at(*warming_c, *pct))).collect();
    let curve = |warming_c: &f64| {
        let needed = 100.0 * (middle / swe(at(*warming_c, 0.0)) - 1.0);
        let found = Some(needed).filter(|needed| *needed <= 100.0);
        CurvePoint {
            warming_c: *warming_c,
            precipitation_change_pct: found,
            stays: found.is_none().then_some(Stays::Below),
            range_pct: None,
        }
    };
    let named = |name: &str, origin, change| NamedNode { name: name.to_owned(), origin, node: node(change) };
    ResponseSurface {
        realizations: 60,
        levels_warm_alone: true,
        reference_median_mm: middle,
        measures: vec![measure.clone()],
        nodes: grid.iter().copied().map(node).collect(),
        named: vec![
            named("Hot and dry", ChangeOrigin::Case, at(4.0, -10.0)),
            named("Warm & wet", ChangeOrigin::Case, at(1.5, 10.0)),
            named("Beyond the grid", ChangeOrigin::Case, at(9.0, 90.0)),
            named("Model one", ChangeOrigin::Projection, at(2.0, 3.0)),
        ],
        break_even: warmings_c.iter().map(curve).collect(),
        offset: None,
        failure_lines: vec![FailureLine {
            name: "Refill".to_owned(),
            margins: grid.iter().map(|at| swe(*at) - 0.8 * middle).collect(),
        }],
        slopes: Vec::new(),
        realized: (0..60)
            .map(|at| Realized {
                warmer_c: 0.02 * f64::from(at % 7) - 0.06,
                wetter_pct: f64::from(at) - 30.0,
            })
            .collect(),
        warmings_c,
        precipitation_changes_pct: changes,
    }
}

fn drawn(findings: &Findings, units: UnitSystem) -> Option<crate::figures::Svg> {
    let water_year_starts = WaterYearStart(MonthDay::new(10, 1).unwrap());
    (FIGURE.draw)(
        findings,
        &Setting { study_title: "Alder Fork", units, water_year_starts, is_fitted: false },
    )
}

fn with(middle: f64, change: f64) -> Findings {
    let measure = Measure { kind: Kind::AmountMm, ..PLAIN.findings().basin[0].measure.clone() };
    Findings { surface: Some(made(&measure, [middle, change], 0.0)), ..PLAIN.findings() }
}

/// By hand: 500 mm that lose 50 a degree have 400 at +2, and need 25 % more; those that lose 150 a degree have 200, and no 100 %
/// restore them; those that gain 50 have 600, and would hold with 16.7 % less.
#[test]
fn the_title_turns_with_the_curve() {
    for (change, said) in [
        (-50.0, "At +2 °C it takes +25 % precipitation to hold the 1 April SWE"),
        (-150.0, "At +2 °C no more precipitation, up to +100 %, holds the 1 April SWE"),
        (50.0, "At +2 °C the 1 April SWE would hold with −17 % precipitation"),
    ] {
        assert_eq!(drawn(&with(500.0, change), UnitSystem::Metric).unwrap().title, said);
    }
    assert!(drawn(&with(5.0, -1.0), UnitSystem::Metric).is_none(), "no percentage of so little");
}

/// The limits that leave the grid are named at its edge, cases below it with what they come to: 500 - 4*50 = 300, less 10 % 270,
/// 46 % less than 500.
#[test]
fn limits_and_cases_are_named() {
    for units in [UnitSystem::Metric, UnitSystem::Us] {
        let svg = drawn(&with(500.0, -50.0), units).unwrap();
        assert_texts_apart("surface", &svg.text);
        let words: Vec<String> = texts(&svg.text).into_iter().map(|(_, words)| words).collect();
        for said in
            ["−50 %", "−25 %", "+25 %", "Warm & wet", "Hot and dry", "−46 %", "1 projection", "Refill"]
        {
            assert!(words.iter().any(|word| word.contains(said)), "{said}: {words:?}");
        }
    }
}
