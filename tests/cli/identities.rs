//! What must hold between the numbers of a study, whatever they are.

use super::basin::Basin;
use serde_json::Value;

fn study(basin: &Basin, into: &str) -> Value {
    let ended = basin.run(&format!("study scenario.toml --into {into} --quiet"));
    assert_eq!(ended.status, 0, "{}", ended.stderr);
    let summary: Value = serde_json::from_str(&basin.read(&format!("{into}/summary.json"))).unwrap();
    summary["findings"].clone()
}

/// The test basin with 40 realizations of 10 years.
fn basin(mean_change: &str) -> Basin {
    let basin = Basin::new();
    basin.exchange("count = 12\nyears = 5", &format!("count = 40\nyears = 10\n{mean_change}"));
    basin
}

fn list(value: &Value) -> &[Value] {
    value.as_array().map_or(&[], Vec::as_slice)
}

fn number(value: &Value) -> f64 {
    value.as_f64().unwrap_or_else(|| panic!("no number: {value}"))
}

/// The study's own periods under its own assumption are its headline yardstick, for every measure and level; the mean shift
/// over their standard deviation is the signal to noise against the reference where every realization has a value. 1e-9 is
/// rounding.
#[test]
fn the_own_yardstick_is_the_headlines() {
    let findings = study(&basin("mean_change_sd_pct = 8"), "out");
    let mut held = 0;
    for found in list(&findings["basin"]) {
        let own =
            list(&found["yardsticks"]).iter().find(|of| of["years"] == 10 && of["times_assumed"] == 1.0);
        let own = own.expect("a yardstick of the study's own");
        assert_eq!((&own["spread"], &own["periods"]), (&found["precipitation_spread"], &40.into()));
        assert_eq!(own["outweighs"], found["outweighs"]);
        for at in list(&own["levels"]) {
            let level =
                list(&found["levels"]).iter().find(|level| level["level_c"] == at["level_c"]).unwrap();
            assert_eq!(at["signal_to_spread"]["value"], level["signal_to_spread"]["value"]);
            let over_deviation = at["signal_to_standard_deviation"].as_f64();
            let is_whole = level["shift"]["pairs"] == 40;
            if let Some(over_deviation) = over_deviation.filter(|_| is_whole) {
                let noise = number(&level["signal_to_noise"]["against_reference"]);
                assert!((over_deviation - noise).abs() <= 1e-9 * noise, "{over_deviation} and {noise}");
                held += 1;
            }
        }
    }
    assert!(held > 20, "{held}");
}

/// Without an assumed change of mean precipitation there is none to take away or to double; with one, more of it never makes
/// the spread of the snow and of the melt season's water narrower here.
#[test]
fn yardsticks_follow_the_assumption() {
    let without = study(&basin(""), "out");
    for found in list(&without["basin"]) {
        let times: Vec<f64> =
            list(&found["yardsticks"]).iter().map(|of| number(&of["times_assumed"])).collect();
        assert_eq!(times, [1.0; 2], "periods of 1 and 10 years");
        assert!(list(&found["yardsticks"]).iter().all(|of| of["mean_change_sd_pct"] == 0.0));
    }
    let with = study(&basin("mean_change_sd_pct = 8"), "out-with");
    for name in ["swe_04_01_mm", "peak_swe_mm", "water_input_04_01_to_07_31_mm"] {
        let found = list(&with["basin"]).iter().find(|found| found["measure"]["name"] == name).unwrap();
        for years in [1, 10] {
            let mut of: Vec<&Value> =
                list(&found["yardsticks"]).iter().filter(|of| of["years"] == years).collect();
            of.sort_by(|a, b| number(&a["times_assumed"]).total_cmp(&number(&b["times_assumed"])));
            let deviations: Vec<f64> =
                of.iter().map(|of| number(&of["spread"]["standard_deviation"])).collect();
            assert_eq!(deviations.len(), 4);
            assert!(deviations.is_sorted(), "{name}, {years} years: {deviations:?}");
            let assumed = of.iter().map(|of| number(&of["mean_change_sd_pct"])).collect::<Vec<_>>();
            assert_eq!(assumed, [0.0, 4.0, 8.0, 16.0]);
        }
    }
}

/// A volume is its depth over the basin's 65 km2, in millions of m3, its error likewise; rarer chances bring more. 1e-12 is
/// rounding.
#[test]
fn volumes_are_depths_times_the_area() {
    let findings = study(&basin(""), "out");
    let volumes = list(&findings["basin"]).iter().filter(|found| found["measure"]["is_volume"] == true);
    let mut count = 0;
    for level in volumes.flat_map(|found| list(&found["levels"])) {
        let exceeded = list(&level["exceeded"]);
        assert_eq!(
            exceeded.iter().map(|of| number(&of["chance_pct"])).collect::<Vec<_>>(),
            [90., 70., 50., 30., 10.]
        );
        for of in exceeded {
            for part in ["value", "monte_carlo_error"] {
                let [mm, hm3] = ["amount_mm", "volume_hm3"].map(|key| number(&of[key][part]));
                assert!((hm3 - mm * 65.0 / 1000.0).abs() <= 1e-12 * hm3, "{of}");
            }
        }
        assert!(exceeded.is_sorted_by_key(|of| number(&of["amount_mm"]["value"])));
        // Half of the years bring at least their median.
        assert_eq!(exceeded[2]["amount_mm"]["value"], level["single_years"]["q50"]);
        count += 1;
    }
    assert!(count >= 4, "{count}");
}

/// A hundredth of a degree needs next to no precipitation; and a study that states the break-even change for its level has
/// the reference's median there again. The root is known to 0.01 % of precipitation, which costs as much of the snow, since
/// 9.8 % of it make up for 9.7 % here; 1.5 times that leaves room.
#[test]
fn break_even_closes() {
    let basin = basin("");
    basin.exchange("levels_c = [0, 2]", "levels_c = [0, 0.01, 2]");
    let findings = study(&basin, "before");
    let found = &findings["break_even"];
    let pct = |level: usize| number(&found["levels"][level]["precipitation_change_pct"]);
    assert!((0.0..0.1).contains(&pct(0)) && pct(1) > 5.0, "{found}");
    let reference_mm = number(&found["reference_median"]);
    assert_eq!(found["reference_median"], findings["basin"][0]["levels"][0]["periods"]["q50"]);

    basin.exchange("0.01, 2]", &format!("0.01, 2]\nprecipitation_change_pct = [0, {}, {}]", pct(0), pct(1)));
    let after = study(&basin, "after");
    for level in [1, 2] {
        let median_mm = number(&after["basin"][0]["levels"][level]["periods"]["q50"]);
        assert!((median_mm / reference_mm - 1.0).abs() < 1.5e-4, "{median_mm} for {reference_mm}");
    }
    for level in list(&after["break_even"]["levels"]) {
        assert!(
            number(&level["precipitation_change_pct"]).abs() <= 0.02,
            "nothing is left to make up: {level}"
        );
    }
}
