//! Whole studies of a record whose every year is one cosine of temperature: their answers have closed forms.

use super::basin::{Basin, SCENARIO};
use serde_json::Value;
use std::fmt::Write;

/// The year's first day, 17 July, lies so many days before the coldest instant, 0 h of 16 January; 1 April is 75 days after.
const DAYS_BEFORE_COLDEST: usize = 183;
const DAYS: usize = 365;
/// Melt by rain per mm and degC (USACE, Snow Hydrology 1956).
const RAIN_MELT_PER_MM_C: f64 = 0.0125;
const PRECIPITATION_MM: f64 = 3.0;
const LEVELS: &str = "levels_c = [0, 1, 1.5]";

/// A uniform area from 1000 to 3000 m in 50 bands, a mean of 8.5 degC and a swing of 10 at its foot, -6.5 degC per km, one
/// threshold of 0 degC, a factor of 4 mm per degC and day. The closed forms know no melt by rain; rain falls at the same rate
/// on every warm day, so that its melt is a fixed part of the factor, and is taken off it. Water years from 17 July hold no
/// leap day from 2005 to 2007.
fn basin(precipitation_of_years_mm: [f64; 3]) -> Basin {
    let basin = Basin::new();
    let factor = 4.0 - RAIN_MELT_PER_MM_C * PRECIPITATION_MM;
    let snow = format!(
        "[season]\nwater_year_starts = \"07-17\"\nsurvey_dates = [\"04-01\"]\n\n[snow]\n\
         rain_snow = {{ rule = \"step\", half_snow_at_c = 0.0 }}\ndegree_rule = \"mean\"\n\
         degree_day_factor_mm_per_c_day = {{ lowest = {factor}, highest = {factor} }}\nmelt_base_c = 0.0\n\
         liquid_holding_fraction = 0.0\nrefreeze_fraction = 0.0\n\n[warming]"
    );
    let scenario = SCENARIO
        .replace("gradient_c_per_km = -6.0", "gradient_c_per_km = -6.5")
        .replace("pct_per_100m = 3", "pct_per_100m = 0")
        .replace("elevation_m = 2000", "elevation_m = 1000\ngauge_multiplier = { rain = 1.0, snow = 1.0 }")
        .replace("[warming]", &snow)
        .replace("levels_c = [0, 2]", LEVELS)
        .replace("count = 12\nyears = 5", "count = 6\nyears = 3");
    basin.write("scenario.toml", &scenario);
    let mut bands = String::from("lower_m,upper_m,area_km2\n");
    for lower_m in (1000..3000).step_by(40) {
        writeln!(bands, "{lower_m},{},2", lower_m + 40).unwrap();
    }
    basin.write("bands.csv", &bands);
    let first = chrono::NaiveDate::from_ymd_opt(2004, 7, 17).unwrap();
    let mut weather = String::from("date,tmin_c,tmax_c,precip_mm\n");
    for (at, date) in first.iter_days().take(3 * DAYS).enumerate() {
        let days_after_coldest = (at % DAYS) as f64 + 0.5 - DAYS_BEFORE_COLDEST as f64;
        let mean_c = 8.5 - 10.0 * libm::cos(std::f64::consts::TAU * days_after_coldest / DAYS as f64);
        writeln!(weather, "{date},{mean_c},{mean_c},{}", precipitation_of_years_mm[at / DAYS]).unwrap();
    }
    basin.write("weather.csv", &weather);
    basin
}

fn study(basin: &Basin) -> Value {
    let ended = basin.run("study scenario.toml --into out --quiet");
    assert_eq!(ended.status, 0, "{}", ended.stderr);
    serde_json::from_str(&basin.read("out/summary.json")).unwrap()
}

fn measure<'a>(measures: &'a Value, name: &str) -> &'a Value {
    let measures = measures.as_array().unwrap();
    measures.iter().find(|found| found["measure"]["name"] == name).unwrap()
}

/// Medians over realizations, level by level.
fn medians(found: &Value) -> Vec<f64> {
    let levels = found["levels"].as_array().unwrap();
    levels.iter().map(|level| level["periods"]["q50"].as_f64().unwrap()).collect()
}

fn near(found: &[f64], expected: &[f64], allowed: impl Fn(f64) -> f64) {
    assert_eq!(found.len(), expected.len());
    for (found, expected) in found.iter().zip(expected) {
        assert!((found - expected).abs() <= allowed(*expected), "{found} for {expected}");
    }
}

/// Area means of a closed-form season over uniform elevations, 3*365/pi*[x*acos(x) - sqrt(1 - x^2)]/(x2 - x1) for the bands'
/// peaks, quadrature for storage on a date and the basin's peak; the idea is that of Woods 2009, Adv. Water Resour. 32:1465
/// (cited from memory), the values were computed. From 50 bands on they may miss 0.1 %. Percent changes: 0.1 % of each of two
/// values. The peak's day: daily steps, and an earlier day by one on either side.
#[test]
fn a_whole_study_of_the_closed_form_season() {
    let summary = study(&basin([PRECIPITATION_MM; 3]));
    let findings = &summary["findings"];
    let headline = &findings["basin"][0];
    assert_eq!(headline["measure"]["name"], "swe_04_01_mm");
    let one_in_a_thousand = |expected: f64| 0.001 * expected;
    near(&medians(headline), &[382.917, 339.032, 317.630], one_in_a_thousand);
    let percent =
        |level: usize| headline["levels"][level]["percent_change"].as_f64().expect("a percent change");
    near(&[percent(1), percent(2)], &[-11.46, -17.05], |_| 0.15);

    let bands = findings["bands"].as_array().unwrap();
    let mut means = vec![0.0; 3];
    for band in bands {
        for (mean, peak_mm) in means.iter_mut().zip(medians(measure(&band["measures"], "peak_swe_mm"))) {
            *mean += peak_mm / bands.len() as f64;
        }
    }
    near(&means, &[470.471, 429.282, 406.619], one_in_a_thousand);
    near(&medians(measure(&findings["basin"], "peak_swe_mm"))[..2], &[391.450, 350.554], one_in_a_thousand);
    let peak_days = medians(measure(&findings["basin"], "peak_day"));
    near(&[peak_days[0] - 1.0 - DAYS_BEFORE_COLDEST as f64], &[63.0], |_| 1.0);
    near(&[peak_days[0] - peak_days[1]], &[2.0], |_| 1.0);
}

/// By how much all precipitation must grow until the quadrature of the same closed form is back at its value without warming:
/// 11.853 and 18.667 %, with the melt by the added rain. 0.15 percentage points of storage, as above, are 0.17 of
/// precipitation, since 11.85 make up for 11.46; and the root is known to 0.01.
#[test]
fn break_even_of_the_closed_form_season() {
    let summary = study(&basin([PRECIPITATION_MM; 3]));
    let levels = summary["findings"]["break_even"]["levels"].as_array().unwrap();
    let found: Vec<f64> =
        levels.iter().map(|level| level["precipitation_change_pct"].as_f64().unwrap()).collect();
    near(&found, &[11.853, 18.667], |_| 0.18);
}

/// Years that are all alike make realizations that are all alike: nothing spreads, no other record would answer otherwise,
/// and what cannot be said is not said. 1e-9 mm is rounding.
#[test]
fn years_that_are_all_alike() {
    let summary = study(&basin([PRECIPITATION_MM; 3]));
    let (headline, answer) = (&summary["findings"]["basin"][0], &summary["answer"]);
    for spread in [
        &headline["precipitation_spread"],
        &headline["temperature_held"]["spread"],
        &headline["weather_spread"],
    ] {
        let [q05, q95] = ["q05", "q95"].map(|name| spread[name].as_f64().unwrap());
        assert!(q95 - q05 < 1e-9 && spread["standard_deviation"].as_f64().unwrap() < 1e-9, "{spread}");
    }
    let verdict = answer["verdict"].as_str().unwrap();
    assert!(verdict.contains("cannot be said"), "{verdict}");
    assert_eq!(
        (&headline["outweighs"]["crossing"], &headline["outweighs_range"]),
        (&"unknown".into(), &Value::Null)
    );
    assert_eq!(headline["levels"][1]["signal_to_spread"], Value::Null);
    // Of single years and their kinds, and of what decides at an elevation, it is said that it cannot be told, which is so.
    let mut answer = answer.clone();
    for so in ["years", "dry_and_warm", "elevations"] {
        answer[so].take();
    }
    for word in ["outweighs above", "cannot be told", "outweighs from"] {
        assert!(!answer.to_string().contains(word), "{word}: {answer:#}");
    }
    let ranges = headline["record_range"]["levels"].as_array().unwrap();
    for range in &ranges[1..] {
        for number in ["shift", "percent_change", "period_below_reference", "reaches_reference_median"] {
            let [q05, q95] = ["q05", "q95"].map(|end| range[number][end].as_f64().unwrap());
            assert!((q95 - q05).abs() < 1e-9, "{number}: {range}");
        }
        assert_eq!(range["signal_to_spread"], Value::Null);
    }
}

/// Years that differ in precipitation alone have the same temperature in every month, so that holding it changes nothing:
/// the spread, and every level against it. 1e-9 mm is the rounding of a monthly mean.
#[test]
fn held_temperatures_that_were_all_alike() {
    let basin = basin([2.0, 3.0, 4.5]);
    basin.exchange("count = 6", "count = 40");
    let summary = study(&basin);
    let headline = &summary["findings"]["basin"][0];
    let (free, held) = (&headline["precipitation_spread"], &headline["temperature_held"]);
    assert!(free["standard_deviation"].as_f64().unwrap() > 10.0, "precipitation differs: {free}");
    for name in ["q05", "q50", "q95", "standard_deviation"] {
        let [free, held] = [free, &held["spread"]].map(|spread| spread[name].as_f64().unwrap());
        assert!((free - held).abs() < 1e-9, "{name}: {free} and {held}");
    }
    let levels = headline["levels"].as_array().unwrap();
    for (free, held) in levels[1..].iter().zip(held["levels"].as_array().unwrap()) {
        let [free, held] = [free, held].map(|at| at["signal_to_spread"]["value"].as_f64().unwrap());
        assert!((free - held).abs() < 1e-9, "{free} and {held}");
    }
}

/// The same closed form by quadrature, 4 - 0.0375 + 0.0375*(1 + x/100) mm per degC and day where all precipitation is changed by
/// x %: storage at nodes, what a degree and a percent do about the reference and +1, and what +1 and +10 % do together beyond
/// their sum. 0.1 % of each of two values for percents of storage, as above; an elasticity is a difference over 10 %, so 0.01;
/// the interaction is a small difference of four values, 4.39 mm, of which their common errors are a few percent.
#[test]
fn surface_and_elasticities_of_the_closed_form_season() {
    let summary = study(&basin([PRECIPITATION_MM; 3]));
    let surface = &summary["findings"]["surface"];
    let node = |warming_c: f64, pct: f64| {
        let nodes = surface["nodes"].as_array().unwrap();
        let is_it = |node: &&Value| {
            node["warming_c"].as_f64() == Some(warming_c)
                && node["precipitation_change_pct"].as_f64() == Some(pct)
        };
        nodes.iter().find(is_it).unwrap()["measures"][0].clone()
    };
    for (warming_c, pct, swe_mm, change_pct) in
        [(2.0, 20.0, 362.353, -5.370), (-1.0, -10.0, 382.682, -0.061), (4.0, -40.0, 120.588, -68.508)]
    {
        let found = node(warming_c, pct);
        near(&[found["median"].as_f64().unwrap()], &[swe_mm], |expected| 0.0015 * expected);
        near(&[found["change_pct"]["value"].as_f64().unwrap()], &[change_pct], |_| 0.2);
    }
    let slopes = surface["slopes"].as_array().unwrap();
    let value = |at: &Value, name: &str| at[name]["value"].as_f64().unwrap();
    for (at, degree, percent) in [(0, -11.007, 1.0770), (1, -11.963, 1.0870)] {
        near(&[value(&slopes[at]["basin"], "per_degree_pct")], &[degree], |_| 0.2);
        near(&[value(&slopes[at]["basin"], "per_percent_pct")], &[percent], |_| 0.01);
    }
    assert_eq!(slopes[0]["interaction_mm"], Value::Null, "the reference is not warmed");
    near(&[value(&slopes[1], "interaction_mm")], &[-4.388], |_| 0.3);
    let curve = surface["break_even"].as_array().unwrap();
    let at = |warming_c: f64| {
        let point = curve.iter().find(|point| point["warming_c"].as_f64() == Some(warming_c)).unwrap();
        point["precipitation_change_pct"].as_f64().unwrap()
    };
    near(&[-2.0, -1.0, 0.0, 1.0, 2.0, 3.0].map(at), &[-18.162, -9.948, 0.0, 11.853, 26.191, 43.839], |_| {
        0.25
    });
}
