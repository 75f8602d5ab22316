//! The figure of rules, for panels of every kind.

use super::super::{Setting, Svg, rule_panel};
use super::assert_texts_apart;
use super::studies::{PLAIN, Study};
use crate::calendar::{MonthDay, WaterYearStart};
use crate::findings::{Findings, Fit, PanelRule, Rule, RulePanel, RuleRuns, Tuned};
use crate::season::Outcome;
use crate::units::UnitSystem;
use ndarray::Array3;

/// A rule of a made-up panel.
fn rule(rule: Rule, is_tuned: bool) -> PanelRule {
    let fit = Fit { mean_peak_swe_mm: 480.0, median_melt_out_day: Outcome::Value(250.0) };
    PanelRule {
        rule,
        tuned: Tuned { catch_factor: 1.1, melt_factor: 0.9, fit, is_tuned },
        gauge_multiplier_snow: 1.2,
        degree_day_factors: [0.5, 3.5],
        radiation_factor: None,
    }
}

/// Every kind of rule; each loses somewhat more than the one before it.
const RULES: [Rule; 5] = [
    Rule::StudysOwn,
    Rule::HalfSnowAt { temperature_c: -0.4, is_wet_bulb: true, replaces_tanh: true },
    Rule::ConstantFactor,
    Rule::SeasonalFactor,
    Rule::TemperatureGradient { c_per_km: -6.5 },
];

/// A panel whose rules change by `loss_mm` a degree, and by three tenths more from rule to rule.
pub fn panel(findings: &Findings, loss_mm: f64, is_tuned: bool) -> Option<RulePanel> {
    let levels_c = &findings.levels_c;
    let measure = findings.basin[0].measure.clone();
    let runs = RULES.iter().enumerate().map(|(at, of)| RuleRuns {
        rule: rule(*of, is_tuned || at == 0),
        periods: Array3::from_shape_fn(
            (levels_c.len(), 1, findings.realizations),
            |(level, _, realization)| {
                let warming = levels_c[level] - levels_c[findings.reference];
                let of_one = 1.0 + 0.3 * at as f64 + 0.002 * realization as f64;
                430.0 + 4.0 * realization as f64 + warming * loss_mm * of_one
            },
        ),
    });
    let runs: Vec<RuleRuns> = runs.collect();
    RulePanel::of(&[measure], &runs, (findings.realizations, 40), (levels_c, findings.reference), 7)
}

fn with_panel(study: &Study<'_>, loss_mm: f64, is_tuned: bool) -> Findings {
    let findings = study.findings();
    let rule_panel = panel(&findings, loss_mm, is_tuned);
    Findings { rule_panel, ..findings }
}

fn drawn(findings: &Findings, units: UnitSystem) -> Option<Svg> {
    let setting = Setting {
        study_title: "Alder Fork",
        units,
        water_year_starts: WaterYearStart(MonthDay::new(10, 1).unwrap()),
        is_fitted: false,
    };
    (rule_panel::FIGURE.draw)(findings, &setting)
}

#[test]
fn text_lies_inside_and_apart() {
    let nine = Study { levels_c: &[-2.0, -1.0, 0.0, 1.0, 2.0, 3.0, 4.0, 5.0, 6.0], reference: 2, ..PLAIN };
    for study in [PLAIN, nine, Study { levels_c: &[0.0, 2.0], ..PLAIN }] {
        for (loss_mm, is_tuned) in [(-50.0, true), (-50.0, false), (40.0, true), (0.0, true), (-4000.0, true)]
        {
            for units in [UnitSystem::Metric, UnitSystem::Us] {
                let svg = drawn(&with_panel(&study, loss_mm, is_tuned), units).unwrap();
                assert_texts_apart("rule-panel", &svg.text);
                assert!(
                    svg.caption.starts_with(rule_panel::FIGURE.question) && svg.alt.starts_with(&svg.title)
                );
                assert!(!svg.text.contains("NaN"), "{}", svg.title);
            }
        }
    }
}

/// By hand: the reference rises by 4 mm from one of 60 realizations to the next, so that by quantiles of type 8 its half spread is 27.15*4 = 109 mm.
/// 100 mm a degree are 106 mm in the median, and more under the others: all outweigh it, from 109/106 = 1.0 degC on, and the fifth rule,
/// of 106*2.26 a degree, from 0.5 on; at +1 degC the others are too near to tell, and none says that it does not. 17 mm a degree are 72 mm, 0.66 times, which do not, and 154 mm, 1.4 times, under the fifth rule, which
/// do: more than two Monte Carlo errors of about 0.12 from 1 either way.
#[test]
fn the_title_says_from_where_and_what_hangs_on_the_rule() {
    let title =
        |loss_mm, is_tuned| drawn(&with_panel(&PLAIN, loss_mm, is_tuned), UnitSystem::Metric).unwrap().title;
    let clear = title(-100.0, true);
    let expected = "it outweighs the precipitation spread from +0.5 °C to +1 °C on under every rule";
    assert!(clear.ends_with(expected), "{clear}");
    let turned = title(-17.0, true);
    assert!(
        turned.ends_with("whether it outweighs the precipitation spread hangs on the rule at +4 °C"),
        "{turned}"
    );
    let alone = title(-60.0, false);
    assert!(alone.ends_with("under the study's own rules; no other rule could be tuned"), "{alone}");
    let without = Findings { rule_panel: None, ..PLAIN.findings() };
    assert_eq!(drawn(&without, UnitSystem::Metric), None, "no panel, no figure");
}

/// A mark a rule and level; none of a rule that was not tuned. By hand, of levels about a reference of 2 degC, -1 degC is the farthest of
/// those that are drawn where all lie below.
#[test]
fn untuned_rules_are_not_drawn_and_the_farthest_level_is_told() {
    let rows = |is_tuned| {
        let svg = drawn(&with_panel(&PLAIN, -60.0, is_tuned), UnitSystem::Metric).unwrap().text;
        let rows: Vec<usize> =
            svg.split("class=\"rule\"").skip(1).map(|row| row.matches("stroke-width").count()).collect();
        (rows.len(), rows)
    };
    let (count, tuned) = rows(true);
    assert!(count == 5 && tuned.iter().all(|lines| *lines >= 4), "{tuned:?}");
    let (count, untuned) = rows(false);
    assert!(count == 5 && untuned[0] >= 4, "{untuned:?}");
    assert!(untuned[1..4].iter().all(|lines| *lines <= 1), "only the line below: {untuned:?}");
    let colder = Study { levels_c: &[-1.0, 1.0, 2.0], reference: 2, ..PLAIN };
    let title = drawn(&with_panel(&colder, -50.0, true), UnitSystem::Metric).unwrap().title;
    assert!(title.contains(" at −1 °C, by rule"), "{title}");
}

/// Six realizations have no 5-95 % range to draw or to name.
#[test]
fn few_realizations_have_no_line() {
    let said = |realizations| {
        let study = Study { realizations, ..PLAIN };
        drawn(&with_panel(&study, -50.0, true), UnitSystem::Metric).unwrap().text.contains("Line: 5–95 %")
    };
    assert!(said(60) && !said(6));
}
