//! Published ranges: the defaults against them, and what is worth a second look beyond them.

use super::case::Case;
use thawline::fault::Unlikely;
use thawline::snow::{DegreeRule, GaugeMultiplier, PhaseRule, RawSnow, SnowParams, degree_day_factor};

/// Both sets of defaults, that of the mean rule first.
fn defaults() -> [SnowParams; 2] {
    [DegreeRule::Mean, DegreeRule::Diurnal].map(|rule| SnowParams::defaults(rule, false))
}

/// The defaults of either degree rule.
pub fn defaults_in_range(case: &Case) {
    let of_both = |value: fn(&SnowParams) -> f64| defaults().map(|snow| value(&snow));
    case.check("factor_highest", &of_both(|snow| snow.degree_day_factor_highest));
    case.check("refreeze_fraction_of_mean", &[defaults()[0].refreeze_fraction]);
    case.check(
        "liquid_of_wet_mass_pct",
        &of_both(|snow| 100.0 * snow.liquid_holding_fraction / (1.0 + snow.liquid_holding_fraction)),
    );
    case.check("half_snow_at_c", &of_both(|snow| half_snow_at_c(snow.rain_snow)));
    if let PhaseRule::Step { half_snow_at_c } = PhaseRule::STEP {
        case.check("step_half_snow_at_c", &[half_snow_at_c]);
    }
    for (name, day) in [("factor_mid_april", 105), ("factor_mid_may", 135), ("factor_mid_june", 166)] {
        case.check(name, &defaults().map(|snow| degree_day_factor(&snow, day)));
    }
}

/// Where a rule turns from more snow to more rain, by halving a range that holds it.
fn half_snow_at_c(rule: PhaseRule) -> f64 {
    let (mut snow_c, mut rain_c) = (-20.0, 20.0);
    for _ in 0..60 {
        let middle_c = (snow_c + rain_c) / 2.0;
        if rule.snow_fraction(middle_c) >= 0.5 {
            snow_c = middle_c;
        } else {
            rain_c = middle_c;
        }
    }
    snow_c
}

/// How many of the values typed for one key are worth a second look: 1 for each that is, 0 for each that is not.
pub fn second_looks(case: &Case) {
    let key: String = case.input("key");
    let values: Vec<f64> = case.input("values");
    let looks = values.iter().map(|value| {
        let unlikely = looked_at(&key, *value);
        assert!(unlikely.iter().all(|it| it.about.contains(&key)), "{}: {unlikely:?}", case.id);
        unlikely.len() as f64
    });
    case.check("second_looks", &looks.collect::<Vec<_>>());
}

fn looked_at(key: &str, value: f64) -> Vec<Unlikely> {
    let mut raw = RawSnow { factor_lowest: Some(0.0), ..RawSnow::default() };
    match key {
        "degree_day_factor_mm_per_c_day.highest" => raw.factor_highest = Some(value),
        "rain_snow" => raw.rain_snow = Some(PhaseRule::Step { half_snow_at_c: value }),
        "liquid_holding_fraction" => raw.liquid_holding_fraction = Some(value),
        "refreeze_fraction" => raw.refreeze_fraction = Some(value),
        "gauge_multiplier.snow" => {
            return GaugeMultiplier { rain: 1.0, snow: value }.check().expect("a multiplier that is allowed");
        }
        _ => panic!("no key '{key}' is tried"),
    }
    SnowParams::check(&raw, true, false).expect("values that are allowed").1
}
