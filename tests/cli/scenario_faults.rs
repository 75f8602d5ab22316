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
    insta::assert_snapshot!(ended.stderr, @r#"
error: basin.latitude_deg: no 'latitude_deg'
 --> scenario.toml:4:2
  |
4 | [basin]
  |  ^^^^^ expected a number
  |
  = help: add it: degrees, negative in the southern hemisphere

error: 'basin.latitud_deg', which is not a key of a scenario
 --> scenario.toml:5:1
  |
5 | latitud_deg = 40
  | ^^^^^^^^^^^ expected 'latitude_deg'?
  |
  = help: write 'latitude_deg', or take the key out

error: basin.temperature_gradient_c_per_km: 6.5
 --> scenario.toml:7:33
  |
7 | temperature_gradient_c_per_km = 6.5
  |                                 ^^^ expected a negative number, since it is colder higher up
  |
  = help: did you mean -6.5?

error: weather.file: wether.csv: there is no such file
  --> scenario.toml:11:8
   |
11 | file = "wether.csv"
   |        ^^^^^^^^^^^^ expected a file that can be read
   |
   = help: the path is relative to the scenario's folder

error: weather.precipitation.unit: "inches"
  --> scenario.toml:15:48
   |
15 | precipitation = { column = "precip_mm", unit = "inches" }
   |                                                ^^^^^^^^ expected "mm" or "cm" or "in"
   |
   = help: did you mean "in"?

error: warming.levels_c[2]: 2 a second time
  --> scenario.toml:18:19
   |
18 | levels_c = [0, 2, 2]
   |                   ^ expected each level once
   |
   = help: take one of them out

6 faults; nothing was run
"#);
}

/// Syntax faults are all shown too, and nothing else is guessed from a text that could not be read whole.
#[test]
fn syntax_faults_are_shown_together() {
    let basin = Basin::new();
    basin.exchange("seed = 5", "seed = = 5");
    basin.exchange("levels_c = [0, 2]", "levels_c = [0, 2");
    let ended = basin.run("check scenario.toml");
    assert_eq!(ended.status, 3);
    insta::assert_snapshot!(ended.stderr, @r#"
error: extra `=`, expected nothing
 --> scenario.toml:2:8
  |
2 | seed = = 5
  |        ^ expected TOML: key = value, one a line, under [table] lines
  |
  = help: quote texts, write lists in [ ], and name each key once

error: unexpected key or value, expected newline, `#`
 --> scenario.toml:2:10
  |
2 | seed = = 5
  |          ^ expected TOML: key = value, one a line, under [table] lines
  |
  = help: quote texts, write lists in [ ], and name each key once

error: a list that is not closed before this
  --> scenario.toml:20:1
   |
20 | [realizations]
   | ^ expected TOML: key = value, one a line, under [table] lines
   |
   = help: end the list above with ]

3 faults; nothing was run
"#);
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
