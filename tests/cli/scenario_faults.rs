//! Faults of a scenario: all of them in one go, each in its place.

use super::basin::Basin;

/// A misspelt key, a wrong unit, a gradient of the wrong sign, a repeated level and a missing file are all shown, in
/// the order of their lines.
#[test]
fn all_faults_are_shown_in_their_places() {
    let basin = Basin::new();
    basin.exchange("latitude_deg = 40", "latitud_deg = 40");
    basin.exchange("= -6.0", "= 6.5");
    basin.exchange("unit = \"mm\"", "unit = \"inches\"");
    basin.exchange("[0, 2]", "[0, 2, 2]");
    basin.exchange("weather.csv", "wether.csv");
    let ended = basin.run("check scenario.toml");
    assert_eq!((ended.status, ended.stdout.as_str()), (3, ""));
    insta::assert_snapshot!(ended.stderr, @"");
}

/// Syntax faults are all shown too, and nothing else is guessed from a text that could not be read whole.
#[test]
fn syntax_faults_are_shown_together() {
    let basin = Basin::new();
    basin.exchange("seed = 5", "seed = = 5");
    basin.exchange("levels_c = [0, 2]", "levels_c = [0, 2");
    let ended = basin.run("check scenario.toml");
    assert_eq!(ended.status, 3);
    insta::assert_snapshot!(ended.stderr, @"");
}

/// Numbers that are no numbers never reach the model.
#[test]
fn not_a_number_is_a_fault() {
    for value in ["nan", "inf", "-inf", "1e400", "\"6\"", "true", "[1]"] {
        let basin = Basin::new();
        basin.exchange("station_elevation_m = 2000", &format!("station_elevation_m = {value}"));
        let ended = basin.run("check scenario.toml");
        assert_eq!(ended.status, 3, "{value}");
        assert!(ended.stderr.contains("scenario.toml:12:23"), "{value}: {}", ended.stderr);
    }
}

/// A scenario without its tables names each of them.
#[test]
fn an_empty_scenario_names_what_is_missing() {
    let basin = Basin::new();
    basin.write("scenario.toml", "");
    let ended = basin.run("check scenario.toml");
    assert_eq!(ended.status, 3);
    for missing in ["no 'title'", "no [basin]", "no [weather]"] {
        assert!(ended.stderr.contains(missing), "{missing}: {}", ended.stderr);
    }
}

/// Values outside their ranges are named by the room that owns them, at the line where they were typed.
#[test]
fn snow_parameters_outside_their_range() {
    let basin = Basin::new();
    basin.write(
        "scenario.toml",
        &format!(
            "{}\n[snow]\nmelt_base_c = 99\nrefreeze_fraction = -0.1\nrain_snow = {{ rule = \"linear\", \
             snow_only_below_c = 3, rain_only_above_c = 1 }}\n",
            super::basin::SCENARIO
        ),
    );
    let ended = basin.run("check scenario.toml");
    assert_eq!(ended.status, 3);
    for place in ["scenario.toml:25:15", "scenario.toml:26:21", "scenario.toml:27:75"] {
        assert!(ended.stderr.contains(place), "{place}: {}", ended.stderr);
    }
    assert!(ended.stderr.contains("3 faults"), "{}", ended.stderr);
}
