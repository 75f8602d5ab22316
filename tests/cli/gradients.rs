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
