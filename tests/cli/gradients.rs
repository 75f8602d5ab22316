//! Gradients of temperature and precipitation against the ranges published for them.

use super::basin::Basin;

/// What `check` says is worth a second look, of the gradients.
fn second_looks(temperature: &str, precipitation: &str) -> [bool; 2] {
    let basin = Basin::new();
    basin.exchange(
        "temperature_gradient_c_per_km = -6.0",
        &format!("temperature_gradient_c_per_km = {temperature}"),
    );
    basin.exchange(
        "precipitation_gradient_pct_per_100m = 3",
        &format!("precipitation_gradient_pct_per_100m = {precipitation}"),
    );
    let ended = basin.run("check scenario.toml");
    assert_eq!(ended.status, 0, "{}", ended.stderr);
    ["basin.temperature_gradient_c_per_km: outside", "basin.precipitation_gradient_pct_per_100m: outside"]
        .map(|said| ended.stdout.contains(said))
}

/// LR-02: Minder, Mote & Lundquist (2010, JGR 115 D14122, abstract): 3.9 to 5.2 degC per km over the year, 2.5 to 3.5 at
/// the least in late summer, 6.5 to 7.5 at the most in spring: all pass, above 8 and below 2 have a second look. LR-06:
/// 0 to 10 % per 100 m are in general use (no number seen in print).
#[test]
fn published_gradients_pass_and_others_have_a_second_look() {
    for passing in ["-2.5", "-3.5", "-3.9", "-5.2", "-6.5", "-7.5"] {
        assert_eq!(second_looks(passing, "0"), [false, false], "{passing}");
    }
    for passing in ["1", "5", "10"] {
        assert_eq!(second_looks("-6", passing), [false, false], "{passing}");
    }
    assert_eq!(second_looks("-8.2", "10.5"), [true, true]);
    assert_eq!(second_looks("-1.9", "-0.5"), [true, true]);
    assert_eq!(
        second_looks("[-6, -6, -6, -6, -6, -6, -6, -1.5, -6, -6, -6, -6]", "3"),
        [true, false],
        "one month"
    );
}

const PLAIN: &str = "temperature_gradient_c_per_km = -6.0\n";

/// What `check` refuses with `keys` in place of the basin's temperature gradient.
fn refused(keys: &str) -> String {
    let basin = Basin::new();
    basin.exchange(PLAIN, keys);
    let ended = basin.run("check scenario.toml");
    assert_eq!(ended.status, 3, "{}", ended.stdout);
    ended.stderr.trim_end().trim_end_matches("1 fault; nothing was run").trim_end().to_owned()
}

/// A gradient of minima alone leaves maxima without one, and the other way round; all three leave the plain one without
/// effect. `--json` says the same.
#[test]
fn minima_and_maxima_have_one_gradient_each() {
    insta::assert_snapshot!(refused("tmin_temperature_gradient_c_per_km = -5.0\n"), @r#"
error: basin.tmax_temperature_gradient_c_per_km: no 'tmax_temperature_gradient_c_per_km'
 --> scenario.toml:4:2
  |
4 | [basin]
  |  ^^^^^ expected a gradient of maxima, too, beside tmin_temperature_gradient_c_per_km
  |
  = help: add tmax_temperature_gradient_c_per_km, or temperature_gradient_c_per_km, which holds for those that have none of their own
"#);
    insta::assert_snapshot!(refused("tmax_temperature_gradient_c_per_km = -5.0\n"), @r#"
error: basin.tmin_temperature_gradient_c_per_km: no 'tmin_temperature_gradient_c_per_km'
 --> scenario.toml:4:2
  |
4 | [basin]
  |  ^^^^^ expected a gradient of minima, too, beside tmax_temperature_gradient_c_per_km
  |
  = help: add tmin_temperature_gradient_c_per_km, or temperature_gradient_c_per_km, which holds for those that have none of their own
"#);
    insta::assert_snapshot!(refused(""), @r#"
error: basin.temperature_gradient_c_per_km: no 'temperature_gradient_c_per_km'
 --> scenario.toml:4:2
  |
4 | [basin]
  |  ^^^^^ expected one number, or twelve
  |
  = help: add it: negative, since it is colder higher up; -6 where you know nothing better (the standard atmosphere has -6.5). Twelve numbers give one a month, January first; tmin_temperature_gradient_c_per_km and tmax_temperature_gradient_c_per_km part minima from maxima
"#);
    let three = "temperature_gradient_c_per_km = -12\ntmin_temperature_gradient_c_per_km = -5.0\ntmax_temperature_gradient_c_per_km = -6\n";
    insta::assert_snapshot!(refused(three), @r#"
error: basin.temperature_gradient_c_per_km: temperature_gradient_c_per_km beside tmin_temperature_gradient_c_per_km and tmax_temperature_gradient_c_per_km
 --> scenario.toml:7:33
  |
7 | temperature_gradient_c_per_km = -12
  |                                 ^^^ expected one for both, or one for each
  |
  = help: take temperature_gradient_c_per_km out: the other two stand for all
"#);
    insta::assert_snapshot!(refused("temperature_gradient_c_per_km = { tmin = -5, tmax = -6 }\n"), @r#"
error: basin.temperature_gradient_c_per_km: a table
 --> scenario.toml:7:33
  |
7 | temperature_gradient_c_per_km = { tmin = -5, tmax = -6 }
  |                                 ^^^^^^^^^^^^^^^^^^^^^^^^ expected one number, or twelve, January first
  |
  = help: write temperature_gradient_c_per_km = ..., or twelve numbers in [ ]; minima and maxima of their own: tmin_temperature_gradient_c_per_km and tmax_temperature_gradient_c_per_km
"#);
    let basin = Basin::new();
    basin.exchange(PLAIN, "tmin_temperature_gradient_c_per_km = -5.0\n");
    let ended = basin.run("check scenario.toml --json");
    assert_eq!(ended.status, 3);
    let said: serde_json::Value = serde_json::from_str(&ended.stdout).unwrap();
    assert!(ended.stdout.contains("no 'tmax_temperature_gradient_c_per_km'"), "{said}");
}

/// A gradient of its own for one of them stands beside the plain one, which holds for the other.
#[test]
fn the_plain_gradient_holds_for_those_that_have_none_of_their_own() {
    let swe = |keys: &str| {
        let basin = Basin::new();
        basin.exchange(PLAIN, keys);
        let ended = basin.run("daily scenario.toml");
        assert_eq!(ended.status, 0, "{}", ended.stderr);
        ended.stdout
    };
    let [tmin, tmax] = ["tmin", "tmax"].map(|of| format!("{of}_temperature_gradient_c_per_km = "));
    let apart = swe(&format!("{tmin}-4\n{tmax}-7\n"));
    assert_eq!(swe(&format!("{PLAIN}{tmin}-4\n").replace("-6.0", "-7")), apart);
    assert_eq!(swe(&format!("{PLAIN}{tmax}-7\n").replace("-6.0", "-4")), apart);
    assert_ne!(swe(&format!("{tmin}-7\n{tmax}-4\n")), apart);
}

/// `check` and the page tell the temperature gradient, in the units of the reader: -6 degC per km are -10.8 degF per
/// 3280.84 ft, by hand -3.29 per 1000 ft.
#[test]
fn the_temperature_gradient_is_told() {
    let apart = "tmin_temperature_gradient_c_per_km = -5\ntmax_temperature_gradient_c_per_km = -6\n";
    let (of_minima, of_maxima) = ("−2.74 °F per 1000 ft for minima", "−3.29 °F per 1000 ft for maxima");
    let us = "\n[report]\nunits = \"us\"\n";
    for (keys, units, words) in [
        (PLAIN, "", "−6 °C per km".to_owned()),
        (PLAIN, us, "−3.29 °F per 1000 ft".to_owned()),
        (apart, us, format!("{of_minima}, {of_maxima}")),
    ] {
        let basin = Basin::new();
        basin.exchange(PLAIN, keys);
        basin.exchange("count = 12\nyears = 5\n", &format!("count = 6\nyears = 3\n{units}"));
        let checked = basin.run("check scenario.toml").stdout;
        let line = checked.lines().find(|line| line.contains("temperature gradient")).unwrap_or_default();
        assert!(line.ends_with(&format!(" {words}")), "{line}");
        let ended = basin.run("study scenario.toml --into out --quiet");
        assert_eq!(ended.status, 0, "{}", ended.stderr);
        assert!(
            basin.read("out/briefing.html").contains(&format!("by {words}, precipitation by ")),
            "{words}"
        );
    }
}
