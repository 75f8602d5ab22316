//! The snow's parameters and the gauge's multipliers: what is refused, what is unlikely, and the defaults.
//!
//! What is refused lies outside the method's equations or far outside any snow there is. What is unlikely lies outside
//! published ranges: degree-day factors of 1.6 to 6.0 (National Engineering Handbook 630, chapter 11, from memory), half
//! snow at -0.4 to 2.4 degC (Jennings et al. 2018, abstract), undercatch of snow up to 70 % (Pierre et al. 2019, abstract);
//! the rest is common practice, as the notices say.

use thawline::calendar::MonthDay;
use thawline::fault::{Fault, Place, Unlikely};
use thawline::snow::{
    ColdContent, DegreeRule, GaugeMultiplier, Patchiness, PhaseRule, Radiation, RawSnow, SnowOptions,
    SnowParams, Sublimation,
};

/// A number among the parameters: its key, how it is typed, and the ends of a range.
type Ranged = (&'static str, fn(&mut RawSnow, f64), [f64; 2]);

/// Beyond an end by more than rounding.
const BEYOND: f64 = 1e-6;

const HIGHEST: &str = "snow.degree_day_factor_mm_per_c_day.highest";
const LOWEST: &str = "snow.degree_day_factor_mm_per_c_day.lowest";

fn check(set: fn(&mut RawSnow, f64), value: f64) -> Result<Vec<Unlikely>, Vec<Fault>> {
    let mut raw = RawSnow::default();
    set(&mut raw, value);
    SnowParams::check(&raw, true, false).map(|(_, unlikely)| unlikely)
}

/// The commented demo scenario says of every option and of the mean rule which defaults it changes, with the numbers in force.
#[test]
fn the_demo_scenario_says_what_each_option_changes() {
    let path = std::path::Path::new(env!("CARGO_MANIFEST_DIR")).join("scenarios/alder-fork.toml");
    let lines = std::fs::read_to_string(path).unwrap();
    let text: Vec<&str> = lines.split_whitespace().filter(|word| *word != "#").collect();
    let text = text.join(" ");
    let of = |set: fn(&mut RawSnow), has_daily_range: bool| {
        let mut raw = RawSnow::default();
        set(&mut raw);
        SnowParams::check(&raw, has_daily_range, false).unwrap().0
    };
    let mean = of(|_| (), false);
    let sunny = |raw: &mut RawSnow| radiation(raw, Radiation::FACTOR_MM_PER_C_DAY);
    let (sun, sun_by_mean) = (of(sunny, true), of(sunny, false));
    let cold = of(|raw| cold_content(raw, ColdContent::DAILY_SHARE), true);
    let PhaseRule::Linear { snow_only_below_c, rain_only_above_c } =
        of(|raw| raw.options.wet_bulb = true, true).rain_snow
    else {
        panic!("the wet bulb's rule is linear");
    };
    for said in [
        format!(
            "factors {:.2} to {:.1}, melt_base_c {:.1}, refreeze_fraction {:.2}",
            mean.degree_day_factor_lowest,
            mean.degree_day_factor_highest,
            mean.melt_base_c,
            mean.refreeze_fraction
        ),
        format!(
            "lowest and highest {:.2} (if stated, they must be the same); melt_base_c {:.1}, by the daily mean {:.1}; \
             refreeze_fraction {:.2}",
            sun.degree_day_factor_lowest, sun.melt_base_c, sun_by_mean.melt_base_c, sun.refreeze_fraction
        ),
        format!("changes: refreeze_fraction {:.2}, also beside radiation", cold.refreeze_fraction),
        format!("snow_only_below_c = {snow_only_below_c}, rain_only_above_c = {rain_only_above_c} }}"),
    ] {
        assert!(text.contains(&said), "'{said}' is not in {text}");
    }
}

/// What brings a default is named where, and only where, the default is not that of the plain model with daily minima and
/// maxima, for every choice of options and both rules.
#[test]
fn defaults_that_are_not_the_usual_ones_say_what_brings_them() {
    let plain = SnowParams::check(&RawSnow::default(), true, false).unwrap().0;
    let of = |snow: &SnowParams| {
        [
            ("rain_snow", format!("{:?}", snow.rain_snow)),
            ("degree_day_factor_mm_per_c_day.lowest", snow.degree_day_factor_lowest.to_string()),
            ("degree_day_factor_mm_per_c_day.highest", snow.degree_day_factor_highest.to_string()),
            ("degree_day_factor_mm_per_c_day.highest_on", format!("{:?}", snow.highest_on)),
            ("melt_base_c", snow.melt_base_c.to_string()),
            ("liquid_holding_fraction", snow.liquid_holding_fraction.to_string()),
            ("refreeze_fraction", snow.refreeze_fraction.to_string()),
        ]
    };
    for choice in 0..64_u32 {
        let is_on = |bit: u32| choice >> bit & 1 == 1;
        let mut raw = RawSnow::default();
        if is_on(0) {
            radiation(&mut raw, Radiation::FACTOR_MM_PER_C_DAY);
        }
        if is_on(1) {
            cold_content(&mut raw, ColdContent::DAILY_SHARE);
        }
        if is_on(2) {
            patchiness(&mut raw, 0.4);
        }
        raw.options.wet_bulb = is_on(3);
        raw.options.start_bare_each_year = is_on(4);
        let snow = SnowParams::check(&raw, !is_on(5), false).unwrap().0;
        for ((key, value), (_, usual)) in of(&snow).into_iter().zip(of(&plain)) {
            let with = snow.brings_default_of(key);
            assert_eq!(with.is_some(), value != usual, "{key} = {value} with {raw:?}");
            let is_on = |option: &str| match option {
                "[snow.radiation]" => raw.options.radiation.is_some(),
                "[snow.cold_content]" => raw.options.cold_content.is_some(),
                "[snow.wet_bulb]" => raw.options.wet_bulb,
                rule => rule == "degree_rule = \"mean\"" && snow.degree_rule == DegreeRule::Mean,
            };
            assert!(with.is_none_or(is_on), "{key} with {with:?}");
        }
    }
}

fn is_about(faults: &[Fault], key: &str) -> bool {
    faults.iter().any(|fault| fault.place == Place::Key(key.to_owned()))
}

fn linear(raw: &mut RawSnow, snow_only_below_c: f64, rain_only_above_c: f64) {
    raw.rain_snow = Some(PhaseRule::Linear { snow_only_below_c, rain_only_above_c });
}

fn step(raw: &mut RawSnow, half_snow_at_c: f64) {
    raw.rain_snow = Some(PhaseRule::Step { half_snow_at_c });
}

fn s_curve(raw: &mut RawSnow, half_snow_at_c: f64, mixed_range_c: f64) {
    raw.rain_snow = Some(PhaseRule::SCurve { half_snow_at_c, mixed_range_c });
}

fn radiation(raw: &mut RawSnow, factor_mm_per_c_day: f64) {
    raw.options.radiation = Some(Radiation { factor_mm_per_c_day });
}

fn patchiness(raw: &mut RawSnow, coefficient_of_variation: f64) {
    raw.options.patchiness = Some(Patchiness { coefficient_of_variation, classes: Patchiness::CLASSES });
}

fn cold_content(raw: &mut RawSnow, daily_share: f64) {
    raw.options.cold_content = Some(ColdContent { daily_share });
}

fn sublimation(raw: &mut RawSnow, july_mm: f64, snowfall_fraction: f64) {
    let mut mm_per_day = [0.1; 12];
    mm_per_day[6] = july_mm;
    raw.options.sublimation = Some(Sublimation { mm_per_day, snowfall_fraction });
}

#[test]
fn numbers_outside_their_ranges_are_refused() {
    let factor: fn(&mut RawSnow, f64) =
        |raw, mm| (raw.factor_lowest, raw.factor_highest) = (Some(mm), Some(mm));
    let all: [Ranged; 18] = [
        (HIGHEST, factor, [0.0, 50.0]),
        (LOWEST, factor, [0.0, 50.0]),
        // Not above the highest.
        (LOWEST, |raw, mm| (raw.factor_lowest, raw.factor_highest) = (Some(mm), Some(4.0)), [0.0, 4.0]),
        ("snow.melt_base_c", |raw, c| raw.melt_base_c = Some(c), [-20.0, 20.0]),
        ("snow.liquid_holding_fraction", |raw, share| raw.liquid_holding_fraction = Some(share), [0.0, 1.0]),
        ("snow.refreeze_fraction", |raw, share| raw.refreeze_fraction = Some(share), [0.0, 1.0]),
        ("snow.rain_snow.snow_only_below_c", |raw, c| linear(raw, c, 20.0), [-20.0, 20.0 - BEYOND / 2.0]),
        // Rain only from where there is snow only would leave no range for both.
        ("snow.rain_snow.rain_only_above_c", |raw, c| linear(raw, -20.0, c), [-20.0 + BEYOND / 2.0, 20.0]),
        ("snow.rain_snow.rain_only_above_c", |raw, c| linear(raw, 0.0, c), [BEYOND / 2.0, 20.0]),
        ("snow.rain_snow.half_snow_at_c", step, [-20.0, 20.0]),
        ("snow.rain_snow.half_snow_at_c", |raw, c| s_curve(raw, c, 10.0), [-20.0, 20.0]),
        ("snow.rain_snow.mixed_range_c", |raw, c| s_curve(raw, 1.0, c), [0.1, 40.0]),
        ("snow.radiation.factor_mm_per_c_day", radiation, [0.0, 50.0]),
        ("snow.patchiness.coefficient_of_variation", patchiness, [0.0, 3.0]),
        ("snow.cold_content.daily_share", cold_content, [0.0, 1.0]),
        ("snow.sublimation.mm_per_day", |raw, mm| sublimation(raw, mm, 0.0), [0.0, 10.0]),
        ("snow.sublimation.snowfall_fraction", |raw, share| sublimation(raw, 0.1, share), [0.0, 1.0]),
        ("snow.rain_snow.rain_only_above_c", |raw, c| linear(raw, c, c), [f64::NAN; 2]),
    ];
    for (key, set, [low, high]) in all {
        for inside in [low, (low + high) / 2.0, high].into_iter().filter(|inside| !inside.is_nan()) {
            let faults = check(set, inside).err().unwrap_or_default();
            assert!(faults.is_empty(), "{key}: {inside}: {faults:?}");
        }
        for outside in [low - BEYOND, high + BEYOND, f64::NAN, f64::INFINITY] {
            let faults = check(set, outside).expect_err("outside");
            assert!(is_about(&faults, key), "{key}: {outside}: {faults:?}");
        }
    }
}

/// At either end of a range nothing is said, and beyond it something, with the range's reason.
#[test]
fn numbers_outside_published_ranges_are_unlikely() {
    let highest: fn(&mut RawSnow, f64) =
        |raw, mm| (raw.factor_lowest, raw.factor_highest) = (Some(0.0), Some(mm));
    // Beside radiation the two factors count together.
    let beside_radiation: fn(&mut RawSnow, f64) = |raw, mm| {
        (raw.factor_lowest, raw.factor_highest) = (Some(1.0), Some(1.0));
        radiation(raw, mm);
    };
    let refreezing_beside_radiation: fn(&mut RawSnow, f64) = |raw, share| {
        raw.refreeze_fraction = Some(share);
        radiation(raw, Radiation::FACTOR_MM_PER_C_DAY);
    };
    let refreezing_beside_a_cold_store: fn(&mut RawSnow, f64) = |raw, share| {
        raw.refreeze_fraction = Some(share);
        cold_content(raw, ColdContent::DAILY_SHARE);
    };
    let of_the_wet_bulb: fn(&mut RawSnow, f64) = |raw, half_snow_at_c| {
        step(raw, half_snow_at_c);
        raw.options.wet_bulb = true;
    };
    let all: [(Ranged, &str); 16] = [
        ((HIGHEST, highest, [1.6, 6.0]), "National Engineering Handbook 630"),
        (
            ("snow.radiation.factor_mm_per_c_day", beside_radiation, [0.6 + BEYOND / 2.0, 5.0]),
            "National Engineering Handbook 630",
        ),
        (("snow.rain_snow", |raw, c| s_curve(raw, 1.0, c), [4.0, 20.0]), "8 to 16 is usual"),
        (("snow.rain_snow", of_the_wet_bulb, [0.0, 1.6 - BEYOND / 2.0]), "0 to 1.6 degC is usual"),
        (("snow.refreeze_fraction", refreezing_beside_a_cold_store, [0.0, 0.15]), "beside the cold store"),
        (("snow.rain_snow", |raw, c| linear(raw, c - 1.5, c + 1.5), [-0.4, 2.4]), "Jennings et al. 2018"),
        (("snow.rain_snow", step, [-0.4, 2.4]), "Jennings et al. 2018"),
        (("snow.rain_snow", |raw, c| s_curve(raw, c, 10.0), [-0.4, 2.4]), "Jennings et al. 2018"),
        (("snow.melt_base_c", |raw, c| raw.melt_base_c = Some(c), [-1.0, 2.0]), "-1 to 2 degC"),
        (
            (
                "snow.liquid_holding_fraction",
                |raw, share| raw.liquid_holding_fraction = Some(share),
                [0.0, 0.10],
            ),
            "Singh & Singh 2001, from memory",
        ),
        (
            ("snow.refreeze_fraction", |raw, share| raw.refreeze_fraction = Some(share), [0.0, 0.30]),
            "0.05 is common practice",
        ),
        (("snow.refreeze_fraction", refreezing_beside_radiation, [0.0, 0.60]), "beside radiation"),
        (("snow.patchiness.coefficient_of_variation", patchiness, [0.0, 0.9]), "Liston 2004, from memory"),
        (("snow.cold_content.daily_share", cold_content, [0.05, 0.5]), "as cold as the air of each day"),
        (("snow.sublimation.mm_per_day", |raw, mm| sublimation(raw, mm, 0.0), [0.0, 1.5]), "1.5 mm a day"),
        (
            ("snow.sublimation.snowfall_fraction", |raw, share| sublimation(raw, 0.1, share), [0.0, 0.35]),
            "a third of the snowfall",
        ),
    ];
    for ((key, set, [low, high]), reason) in all {
        let said = |value: f64| {
            let unlikely = check(set, value).expect("nothing that is refused").into_iter();
            unlikely.filter(|unlikely| unlikely.about == key).map(|unlikely| unlikely.why).collect::<Vec<_>>()
        };
        for inside in [low, (low + high) / 2.0, high] {
            assert!(said(inside).is_empty(), "{key}: {inside}: {:?}", said(inside));
        }
        // Below 0 most numbers are refused, and not unlikely.
        let below = (low != 0.0).then_some(low - BEYOND);
        for outside in below.into_iter().chain([high + BEYOND]) {
            let said = said(outside);
            assert!(said.len() == 1 && said[0].contains(reason), "{key}: {outside}: {said:?}");
        }
    }
    let binary = check(|raw, _| linear(raw, 0.4, 4.4), 0.0);
    assert_eq!(binary, Ok(Vec::new()), "2.4 degC, though the two numbers' middle is a bit above it");
    let smooth = check(|raw, _| raw.rain_snow = Some(PhaseRule::Tanh), 0.0);
    assert_eq!(smooth, Ok(Vec::new()), "its middle of 1.2 degC is a published one");
}

/// Gauges lose a few percent of rain and up to 70 % of snow, and hardly catch more than falls.
#[test]
fn multipliers_of_the_gauge() {
    let said = |rain: f64, snow: f64| -> Vec<String> {
        let unlikely = GaugeMultiplier { rain, snow }.check().expect("nothing that is refused");
        unlikely.into_iter().map(|unlikely| format!("{}: {}", unlikely.about, unlikely.why)).collect()
    };
    for (rain, snow) in [(1.0, 1.0), (1.2, 2.0), (1.1, 1.6)] {
        assert!(said(rain, snow).is_empty(), "{rain}, {snow}");
    }
    for (rain, snow, expected) in [
        (1.201, 1.0, "weather.gauge_multiplier.rain: 1.201 is above 1.2: gauges lose a few percent"),
        (1.0, 2.001, "weather.gauge_multiplier.snow: 2.001 is above 2: undercatch of snow is 20 to 70 %"),
        (0.999, 1.0, "weather.gauge_multiplier.rain: 0.999 is below 1"),
        (1.0, 0.999, "weather.gauge_multiplier.snow: 0.999 is below 1"),
    ] {
        let said = said(rain, snow);
        assert!(said.len() == 1 && said[0].starts_with(expected), "{said:?}");
    }
    let of_rain: fn(f64) -> GaugeMultiplier = |rain| GaugeMultiplier { rain, snow: 1.0 };
    let of_snow: fn(f64) -> GaugeMultiplier = |snow| GaugeMultiplier { rain: 1.0, snow };
    for (key, multiplier) in
        [("weather.gauge_multiplier.rain", of_rain), ("weather.gauge_multiplier.snow", of_snow)]
    {
        for inside in [0.1, 5.0] {
            assert!(multiplier(inside).check().is_ok(), "{key}: {inside}");
        }
        for outside in [0.1 - BEYOND, 5.0 + BEYOND, f64::NAN] {
            let faults = multiplier(outside).check().expect_err("outside");
            assert!(is_about(&faults, key), "{key}: {outside}: {faults:?}");
        }
    }
}

/// The defaults, as they are documented: of both degree rules, in both hemispheres, and those that options bring along.
#[test]
fn defaults_decide_headlines() {
    let of = |options: SnowOptions, has_daily_range, is_southern| {
        let raw = RawSnow { options, ..RawSnow::default() };
        let (snow, unlikely) = SnowParams::check(&raw, has_daily_range, is_southern).expect("defaults");
        assert_eq!(unlikely, Vec::new(), "a default is usual");
        snow
    };
    let numbers = |snow: SnowParams| {
        [
            snow.degree_day_factor_lowest,
            snow.degree_day_factor_highest,
            snow.melt_base_c,
            snow.refreeze_fraction,
            snow.liquid_holding_fraction,
        ]
    };
    let plain = SnowOptions::default();
    let [diurnal, mean] = [true, false].map(|has_daily_range| of(plain, has_daily_range, false));
    assert_eq!((diurnal.degree_rule, numbers(diurnal)), (DegreeRule::Diurnal, [0.5, 3.5, 1.0, 0.20, 0.10]));
    assert_eq!((mean.degree_rule, numbers(mean)), (DegreeRule::Mean, [0.25, 3.0, 0.0, 0.05, 0.10]));
    let between =
        |snow_only_below_c, rain_only_above_c| PhaseRule::Linear { snow_only_below_c, rain_only_above_c };
    assert_eq!(diurnal.rain_snow, between(-1.0, 3.0));
    let highest_on = [false, true].map(|is_southern| of(plain, true, is_southern).highest_on);
    assert_eq!(highest_on.map(Some), [MonthDay::new(6, 21), MonthDay::new(12, 21)]);

    let radiation = SnowOptions { radiation: Some(Radiation { factor_mm_per_c_day: 2.5 }), ..plain };
    assert_eq!(numbers(of(radiation, true, false)), [0.25, 0.25, 2.0, 0.5, 0.10]);
    assert_eq!(numbers(of(radiation, false, false)), [0.25, 0.25, 0.5, 0.5, 0.10]);
    let cold = SnowOptions { cold_content: Some(ColdContent { daily_share: 0.3 }), ..plain };
    assert_eq!(numbers(of(cold, true, false)), [0.5, 3.5, 1.0, 0.05, 0.10]);
    let wet_bulb = SnowOptions { wet_bulb: true, ..plain };
    assert_eq!(of(wet_bulb, true, false).rain_snow, between(-0.2, 1.8));
}

/// The season must not count twice, and a sine needs a daily range.
#[test]
fn numbers_that_do_not_go_together() {
    let mut raw = RawSnow { factor_lowest: Some(1.0), factor_highest: Some(1.5), ..RawSnow::default() };
    radiation(&mut raw, 2.0);
    let faults = SnowParams::check(&raw, true, false).expect_err("two seasons");
    assert!(faults.len() == 1 && is_about(&faults, LOWEST), "{faults:?}");
    assert!(faults[0].mend.contains("count twice"), "{faults:?}");
    raw.factor_lowest = Some(1.5);
    assert!(SnowParams::check(&raw, true, false).is_ok());
    // Without a season one number is both; that the lowest must not be the higher is no second fault.
    for (lowest, highest) in [(Some(3.0), None), (None, Some(3.0))] {
        (raw.factor_lowest, raw.factor_highest) = (lowest, highest);
        let (snow, _) = SnowParams::check(&raw, true, false).expect("one number");
        assert_eq!((snow.degree_day_factor_lowest, snow.degree_day_factor_highest), (3.0, 3.0));
    }
    (raw.factor_lowest, raw.factor_highest) = (Some(3.0), Some(1.0));
    assert_eq!(SnowParams::check(&raw, true, false).expect_err("two numbers").len(), 1);
    let mut loss = RawSnow::default();
    loss.options.sublimation = Some(Sublimation { mm_per_day: [-0.1; 12], snowfall_fraction: 0.0 });
    assert_eq!(SnowParams::check(&loss, true, false).expect_err("one number, typed once").len(), 1);
    let diurnal = RawSnow { degree_rule: Some(DegreeRule::Diurnal), ..RawSnow::default() };
    assert!(SnowParams::check(&diurnal, true, false).is_ok());
    let faults = SnowParams::check(&diurnal, false, false).expect_err("no range");
    assert!(faults.len() == 1 && is_about(&faults, "snow.degree_rule"), "{faults:?}");
    let mean = RawSnow { degree_rule: Some(DegreeRule::Mean), ..RawSnow::default() };
    let rule = SnowParams::check(&mean, true, false).map(|(snow, _)| snow.degree_rule);
    assert_eq!(rule, Ok(DegreeRule::Mean));
}
