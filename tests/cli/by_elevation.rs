//! What changes with elevation beside temperature: the form of the precipitation gradient, and the warming itself.

use super::basin::{Basin, SCENARIO};
use serde_json::Value;

const GRADIENT: &str = "precipitation_gradient_pct_per_100m = 3\n";

/// The sound basin with more keys in `[basin]` and in `[warming]`.
fn with(of_basin: &str, of_warming: &str) -> Basin {
    let basin = Basin::new();
    basin.exchange(GRADIENT, &format!("{GRADIENT}{of_basin}"));
    basin.exchange("levels_c = [0, 2]", &format!("levels_c = [0, 2]\n{of_warming}"));
    basin
}

/// Words of `check`, on one line.
fn checked(basin: &Basin) -> String {
    let ended = basin.run("check scenario.toml");
    assert_eq!(ended.status, 0, "{}", ended.stderr);
    ended.stdout.split_whitespace().collect::<Vec<_>>().join(" ")
}

fn document(basin: &Basin) -> Value {
    serde_json::from_str(&basin.run("check scenario.toml --json").stdout).unwrap()
}

/// By hand: the bands of 40 and 25 km2 are run at 2050 and 2350 m, 50 and 350 m above the station. 3 % of the station's are
/// 1.5 and 10.5 %; compounded 1.03^0.5 and 1.03^3.5.
#[test]
fn the_form_of_the_gradient_decides_about_the_basin() {
    let compounded = [0.5, 3.5].map(|hundreds| libm::pow(1.03, hundreds));
    let forms = [
        ("", [1.015, 1.105], "linear in the station's precipitation"),
        (
            "precipitation_gradient_form = \"linear\"\n",
            [1.015, 1.105],
            "linear in the station's precipitation",
        ),
        ("precipitation_gradient_form = \"compound\"\n", compounded, "compounded"),
    ];
    for (key, [lower, upper], words) in forms {
        let basin = with(key, "");
        let found = document(&basin);
        let mm = |name: &str| found[name].as_f64().unwrap();
        let ratio = mm("basin_precipitation_mm_per_year") / mm("station_precipitation_mm_per_year");
        let by_hand = (40.0 * lower + 25.0 * upper) / 65.0;
        assert!(
            (ratio / by_hand - 1.0).abs() < 1e-12,
            "{key}: {ratio} for {by_hand}; only rounding may part them"
        );
        let said = format!("precipitation gradient +3 % per 100 m, {words} snow fraction");
        assert!(checked(&basin).contains(&said), "{key}: {}", checked(&basin));
        let is_default = key.is_empty();
        let default = "basin.precipitation_gradient_form = \"linear\"";
        assert_eq!(checked(&basin).contains(default), is_default, "{key}");
        let ended = basin.run("study scenario.toml --into out --quiet");
        assert_eq!(ended.status, 0, "{}", ended.stderr);
        let run: Value = serde_json::from_str(&basin.read("out/run.json")).unwrap();
        let form = if words == "compounded" { "compound" } else { "linear" };
        assert_eq!(run["parameters"]["precipitation_gradient"]["form"], form);
        let page = basin.read("out/briefing.html");
        assert!(page.contains(&format!(", precipitation by +3 % per 100 m, {words};")));
    }
}

/// By hand: the bands' mean elevation is (40*2050 + 25*2350)/65 = 2165.38 m. 25 % a kilometre are 1 - 0.25*0.11538 = 0.97 there
/// and 1 + 0.25*0.18462 = 1.05 above.
#[test]
fn a_warming_that_changes_with_elevation_is_said() {
    let basin = with("", "level_change_pct_per_1000m = 25");
    let said = checked(&basin);
    let line = "change with elevation +25 % per 1000 m above the basin's mean elevation of 2165 m: times 0.97 in the lowest \
                band, 1.05 in the highest";
    assert!(said.contains(line), "{said}");
    assert!(!said.contains("warming.level_change_pct_per_1000m"), "{said}");
    assert_eq!(document(&basin)["warming"]["level_change_pct_per_1000m"], 25.0);
    basin.exchange("[realizations]", "[report]\nunits = \"us\"\n\n[realizations]");
    // 25 % per 1000 m are 7.62 % per 304.8 m; 2165.38 m are 7104.3 ft.
    let line = "change with elevation +7.62 % per 1000 ft above the basin's mean elevation of 7104 ft";
    assert!(checked(&basin).contains(line), "{}", checked(&basin));
    let ended = basin.run("study scenario.toml --into out --quiet");
    assert_eq!(ended.status, 0, "{}", ended.stderr);
    let page = basin.read("out/briefing.html");
    assert!(page.contains("a level is the basin's, and changes with elevation by +7.62 % per 1000 ft above"));
    assert!(page.contains("changes with elevation as stated (the evidence for such a change is mixed)"));
    let run: Value = serde_json::from_str(&basin.read("out/run.json")).unwrap();
    assert_eq!(run["parameters"]["warming"]["level_change_pct_per_1000m"], 25.0);
    let summary: Value = serde_json::from_str(&basin.read("out/summary.json")).unwrap();
    let mean_m = summary["basin"]["mean_elevation_of_warming_m"].as_f64().unwrap();
    assert!((mean_m - 2_165.384_615_384_615).abs() < 1e-9, "{mean_m}");

    let even = with("", "");
    assert!(checked(&even).contains("warming.level_change_pct_per_1000m = 0"), "a default in force");
    assert!(!checked(&even).contains("change with elevation"));
    let much = with("", "level_change_pct_per_1000m = -31");
    let second_look = "warming.level_change_pct_per_1000m: outside -30 to 30 percent per 1000 m; evidence for warming that \
                       changes with elevation is mixed";
    assert!(checked(&much).contains(second_look), "{}", checked(&much));
    // By hand: bands about 2050 and 5050 m have their mean at 3203.8 m; 1 + 1*(-1.1538) = -0.154 in the lower.
    let tall = with("", "level_change_pct_per_1000m = 100");
    tall.write("bands.csv", "lower_m,upper_m,area_km2\n1900,2200,40\n4900,5200,25\n");
    let second_look = "warming.level_change_pct_per_1000m: warms one of the bands by -0.15 times the level";
    assert!(checked(&tall).contains(second_look), "{}", checked(&tall));
}

#[test]
fn keys_that_cannot_be() {
    let refused = |of_basin: &str, of_warming: &str| {
        let ended = with(of_basin, of_warming).run("check scenario.toml");
        assert_eq!(ended.status, 3);
        ended.stderr
    };
    assert!(SCENARIO.contains(GRADIENT));
    insta::assert_snapshot!(refused("precipitation_gradient_form = \"compouned\"\n", ""), @r#"
error: basin.precipitation_gradient_form: "compouned"
 --> scenario.toml:9:31
  |
9 | precipitation_gradient_form = "compouned"
  |                               ^^^^^^^^^^^ expected "linear" or "compound"
  |
  = help: did you mean "compound"?

1 fault; nothing was run
"#);
    insta::assert_snapshot!(refused("", "level_change_pct_per_1000m = 250"), @r"
error: warming.level_change_pct_per_1000m: 250
  --> scenario.toml:19:30
   |
19 | level_change_pct_per_1000m = 250
   |                              ^^^ expected a number from -100 to 100
   |
   = help: percent of the level that 1000 m more of elevation add to it; 0 warms every elevation alike

1 fault; nothing was run
");
}
