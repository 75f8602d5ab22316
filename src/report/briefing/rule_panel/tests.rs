//! The words of a made-up panel, whose numbers are known by hand.

use super::answers::answers;
use super::*;
use crate::calendar::{MonthDay, WaterYearStart};
use crate::findings::{Fit, Rule, RuleRuns, Tuned};
use crate::season::{Measure, Outcome};
use crate::units::UnitSystem;
use ndarray::Array3;

fn reader() -> Reader {
    Reader { units: UnitSystem::Metric, starts: WaterYearStart(MonthDay::new(10, 1).unwrap()) }
}

const HALF_SNOW: Rule = Rule::HalfSnowAt { temperature_c: -0.4, is_wet_bulb: false, replaces_tanh: false };
const GRADIENT: Rule = Rule::TemperatureGradient { c_per_km: -5.0 };

/// A rule that loses so much at +1 degC in every realization, whose reference rises by 4 mm from one to the next. By quantiles of type 8, half
/// of the spread of 60 of them is 27.15 steps, 108.6 mm.
fn runs(rule: Rule, loss_mm: f64, catch_factor: f64, day: Outcome, realizations: usize) -> RuleRuns {
    let fit = Fit { mean_peak_swe_mm: 480.0, median_melt_out_day: day };
    let tuned = Tuned { catch_factor, melt_factor: 1.0, fit, is_tuned: catch_factor < 4.0 };
    let (gauge_multiplier_snow, degree_day_factors, radiation_factor) = (1.2, [0.5, 3.5], None);
    RuleRuns {
        rule: PanelRule { rule, tuned, gauge_multiplier_snow, degree_day_factors, radiation_factor },
        periods: Array3::from_shape_fn((2, 1, realizations), |(level, _, realization)| {
            430.0 + 4.0 * realization as f64 - loss_mm * level as f64
        }),
    }
}

fn panel(runs: &[RuleRuns], of_study: usize) -> RulePanel {
    let measure = Measure::april_swe();
    RulePanel::of(&[measure], runs, (of_study, 40), (&[0.0, 1.0], 0), 7).unwrap()
}

const DAY: Outcome = Outcome::Value(250.0);

/// The study's own loses 110 mm, 1.01 times; half snow 60 mm, 0.55 times; no season 230 mm, 2.12 times; a gradient was not tuned.
fn three(realizations: usize) -> RulePanel {
    panel(
        &[
            runs(Rule::StudysOwn, 110.0, 1.0, DAY, realizations),
            runs(HALF_SNOW, 60.0, 1.1, DAY, realizations),
            runs(Rule::ConstantFactor, 230.0, 1.2, DAY, realizations),
            runs(GRADIENT, 900.0, 4.0, DAY, realizations),
        ],
        100,
    )
}

/// By hand: 110/108.6 crosses 1 at 0.99 degC, which other realizations would have beyond the only level, and 230/108.6 at 0.47; a ratio's error is about 0.14 of it, so that 1.01 is too near 1 to tell and
/// 0.55 and 2.12 are not.
#[test]
fn rules_that_differ_are_told_though_the_studys_own_cannot_tell() {
    let panel = three(60);
    let said = answers(&panel, &panel.measures[0], Some(1.0), reader());
    assert_eq!(said.len(), 3, "{said:?}");
    assert!(
        said[0].starts_with(
            "Under 1 of 3 rules (degree-day factor without season), the shift of 1 April SWE outweighs the precipitation \
             spread from about +0.5 °C of warming on; it does not up to +1 °C under half snow at −0.4 °C; "
        ),
        "{}",
        said[0]
    );
    assert!(
        said[0].ends_with(
            "whether it does up to +1 °C, these realizations cannot tell under the study's own rules."
        ),
        "{}",
        said[0]
    );
    assert!(
        said[1].contains(
            "At +1 °C the answer hangs on the rule: it outweighs under degree-day factor without season; it does not under half snow at −0.4 °C; \
             it is too near to call under the study's own rules. Too near to call: "
        ),
        "{}",
        said[1]
    );
    assert_eq!(
        said[2],
        "1 April SWE changes by −230 to −60 mm at +1 °C under these 3 rules, 0.55 to 2.12 times the half precipitation spread of the rule. \
         Beside that, 90 % of 60 realizations change by −110 mm under the study's own rules, each against itself."
    );
    let run = what_was_run(&panel, reader());
    assert!(
        run.starts_with(
            "3 other rules beside the study's own, by the study's first 60 of 100 realizations, "
        )
    );
    assert!(run.contains("between × 0.25 and × 4") && run.contains("found for 2 of 3. Not found"), "{run}");
    assert!(
        run.contains("alone: gradient −5 °C per km. Where the snow's catch stands at its bound"),
        "{run}"
    );
}

/// Six pairs are told by their median alone, one realization without any answer, and neither as too near to call.
#[test]
fn few_realizations_have_no_range_and_one_no_ratio() {
    let said = |realizations| {
        let panel = three(realizations);
        answers(&panel, &panel.measures[0], Some(1.0), reader()).join(" ")
    };
    let of_six = said(6);
    assert!(of_six.contains("changes by −230 to −60 mm") && !of_six.contains("Beside that"), "{of_six}");
    let of_one = said(1);
    assert!(of_one.contains("At +1 °C it cannot be asked under each of these rules."), "{of_one}");
    assert!(!of_one.contains("too near") && !of_one.contains("outweighs from"), "{of_one}");
}

/// Where the study's own snow never goes, the peak alone is tuned to, and no melt-out is told of.
#[test]
fn without_a_melt_out_rules_are_tuned_to_the_peak_alone() {
    let own = runs(Rule::StudysOwn, 110.0, 1.0, Outcome::NotGone, 60);
    let mut panel = panel(&[own, runs(HALF_SNOW, 60.0, 1.1, Outcome::NotGone, 60)], 60);
    let mut of_melt_out = panel.measures[0].clone();
    MELT_OUT_DAY.clone_into(&mut of_melt_out.measure.name);
    panel.measures.push(of_melt_out);
    assert_eq!(told(&panel).count(), 1);
    let run = what_was_run(&panel, reader());
    assert!(run.contains("by all 60 realizations of the study") && run.contains("tuned to the peak alone"));
    assert!(!run.contains("melt-out within"), "{run}");
    let table = grids::tuning(&panel, reader()).into_string();
    assert!(table.contains("to the peak alone") && table.contains("what others are tuned to"), "{table}");
}
