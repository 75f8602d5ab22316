//! Heights in feet and levels in degF: taken in place of metres and degC, never beside them.

use super::{Basin, accepted, refused, small};

const STATION: &str = "station_elevation_m = 2000";
const LEVELS: &str = "levels_c = [0, 2]";

fn with(changes: &[(&str, &str)]) -> Basin {
    let basin = small();
    for (from, to) in changes {
        basin.exchange(from, to);
    }
    basin
}

fn checked(basin: &Basin) -> serde_json::Value {
    serde_json::from_str(&basin.run("check scenario.toml --json").stdout).unwrap()
}

/// 0.3048 m a foot, by definition: 5000 ft are 1524 m exactly.
#[test]
fn a_station_in_feet_is_the_same_in_metres() {
    let [feet, metres] = ["station_elevation_ft = 5000", "station_elevation_m = 1524"]
        .map(|typed| with(&[(STATION, typed)]).run("daily scenario.toml"));
    assert_eq!((feet.status, metres.status), (0, 0));
    assert_eq!(feet.stdout, metres.stdout);
}

#[test]
fn bands_cut_in_feet_are_the_same_in_metres() {
    let [feet, metres] = ["band_thickness_ft = 500", "band_thickness_m = 152.4"].map(|typed| {
        let curve = format!("area_elevation_curve = {{ file = \"curve.csv\", {typed} }}");
        let basin = with(&[("bands = \"bands.csv\"", &curve)]);
        basin.write("curve.csv", "elevation_m,area_below_km2\n1900,0\n2200,40\n2500,65\n");
        basin.run("daily scenario.toml")
    });
    assert_eq!((feet.status, metres.status), (0, 0));
    assert_eq!(feet.stdout, metres.stdout);
}

#[test]
fn a_site_in_feet_is_the_same_in_metres() {
    let [feet, metres] = ["elevation_ft = 7000", "elevation_m = 2133.6"].map(|typed| {
        let site = format!(
            "[realizations]\ncount = 6\n\n[[observed_swe]]\nfile = \"site.csv\"\n{typed}\n\
             swe = {{ column = \"swe_mm\", unit = \"mm\" }}\n\n[season]\n"
        );
        let basin = with(&[("[realizations]\ncount = 6\nyears = 3\n", &site)]);
        basin.write("site.csv", "date,swe_mm\n2001-04-01,300\n2002-04-01,310\n");
        basin.run("daily scenario.toml --into days")
    });
    assert_eq!((feet.status, metres.status), (0, 0), "{}", feet.stderr);
    assert_eq!(feet.stderr, metres.stderr);
}

#[test]
fn heights_that_are_none() {
    let curve = |typed: &str| format!("area_elevation_curve = {{ file = \"curve.csv\"{typed} }}");
    let said = [
        ("feet under metres", STATION, "station_elevation_m = 9029".to_owned()),
        ("both", STATION, format!("{STATION}\nstation_elevation_ft = 6562")),
        ("neither", STATION, String::new()),
        ("beyond both", STATION, "station_elevation_m = 90290".to_owned()),
        ("too many feet", STATION, "station_elevation_ft = 90290".to_owned()),
        ("thick bands", "bands = \"bands.csv\"", curve(", band_thickness_ft = 8000")),
        ("thin bands", "bands = \"bands.csv\"", curve(", band_thickness_ft = 1")),
        ("bands of no thickness", "bands = \"bands.csv\"", curve("")),
    ]
    .map(|(what, from, to)| {
        let basin = with(&[(from, &to)]);
        basin.write("curve.csv", "elevation_m,area_below_km2\n1900,0\n2200,40\n2500,65\n");
        format!("## {what}\n{}\n", refused(&basin))
    });
    insta::assert_snapshot!(said.join("\n"), @r#"
## feet under metres
error: weather.station_elevation_m: 9029
  --> scenario.toml:12:23
   |
12 | station_elevation_m = 9029
   |                       ^^^^ expected a number from -500 to 9000
   |
   = help: in metres above the sea: 9029 ft is 2752 m, or write station_elevation_ft = 9029

## both
error: weather.station_elevation_ft: station_elevation_ft beside station_elevation_m
  --> scenario.toml:13:24
   |
13 | station_elevation_ft = 6562
   |                        ^^^^ expected one of the two
   |
   = help: take one of them out

## neither
error: weather.station_elevation_m: no 'station_elevation_m'
  --> scenario.toml:10:2
   |
10 | [weather]
   |  ^^^^^^^ expected a number
   |
   = help: add it, in metres above the sea; or station_elevation_ft, in feet

## beyond both
error: weather.station_elevation_m: 90290
  --> scenario.toml:12:23
   |
12 | station_elevation_m = 90290
   |                       ^^^^^ expected a number from -500 to 9000
   |
   = help: in metres above the sea

## too many feet
error: weather.station_elevation_ft: 90290
  --> scenario.toml:12:24
   |
12 | station_elevation_ft = 90290
   |                        ^^^^^ expected a number from -1640 to 29528
   |
   = help: in feet above the sea

## thick bands
error: basin.area_elevation_curve.band_thickness_ft: 8000
 --> scenario.toml:6:66
  |
6 | area_elevation_curve = { file = "curve.csv", band_thickness_ft = 8000 }
  |                                                                  ^^^^ expected a number from 3 to 6562
  |
  = help: in feet from edge to edge; 100 m is usual

## thin bands
error: basin.area_elevation_curve.band_thickness_ft: 1
 --> scenario.toml:6:66
  |
6 | area_elevation_curve = { file = "curve.csv", band_thickness_ft = 1 }
  |                                                                  ^ expected a number from 3 to 6562
  |
  = help: in feet from edge to edge; if it is in metres, write band_thickness_m = 1

## bands of no thickness
error: basin.area_elevation_curve.band_thickness_m: no 'band_thickness_m'
 --> scenario.toml:6:1
  |
6 | area_elevation_curve = { file = "curve.csv" }
  | ^^^^^^^^^^^^^^^^^^^^ expected a number
  |
  = help: add it, in metres from edge to edge; 100 m is usual; or band_thickness_ft, in feet
"#);
}

#[test]
fn levels_in_fahrenheit_are_told_as_typed() {
    let basin = with(&[
        (LEVELS, "levels_f = [0, 2, 3, 5, 7, 9]"),
        ("[warming]", "[report]\nunits = \"us\"\n\n[warming]"),
    ]);
    let said = basin.run("check scenario.toml").stdout;
    for level in ["+2 °F", "+3 °F", "+5 °F", "+7 °F", "+9 °F"] {
        assert!(said.contains(level), "{level}: {said}");
    }
    accepted(&basin);
    // By definition a difference of 9 degF is one of 5 degC.
    let levels_c = checked(&basin)["levels_c"].clone();
    assert_eq!((levels_c[0].as_f64(), levels_c[5].as_f64()), (Some(0.0), Some(5.0)));
}

#[test]
fn levels_that_are_none() {
    let said = [
        ("both", format!("{LEVELS}\nlevels_f = [0, 2]")),
        (
            "beside global ones",
            "levels_f = [2]\nglobal = { levels_c = [2], local_per_global = 1.4, already_in_record_global_c = 1 }".to_owned(),
        ),
        ("temperatures", "levels_f = [0, 34]".to_owned()),
        ("too much", "levels_c = [0, 20]".to_owned()),
        ("none", "levels_f = []".to_owned()),
        ("twice", "levels_f = [2, 2]".to_owned()),
    ]
    .map(|(what, to)| format!("## {what}\n{}\n", refused(&with(&[(LEVELS, &to)]))));
    insta::assert_snapshot!(said.join("\n"), @r#"
## both
error: warming.levels_f: levels_f beside levels_c
  --> scenario.toml:19:12
   |
19 | levels_f = [0, 2]
   |            ^^^^^^ expected one of the two
   |
   = help: take one of them out

## beside global ones
error: warming.levels_f: levels_f beside [warming.global]
  --> scenario.toml:18:12
   |
18 | levels_f = [2]
   |            ^^^ expected one of the two
   |
   = help: levels of the basin's own warming, or of global warming: take one out

## temperatures
error: warming.levels_f[1]: 34
  --> scenario.toml:18:16
   |
18 | levels_f = [0, 34]
   |                ^^ expected a warming from -18 to 27 degF
   |
   = help: it is degF that are added, not a temperature or percent

## too much
error: warming.levels_c[1]: 20
  --> scenario.toml:18:16
   |
18 | levels_c = [0, 20]
   |                ^^ expected a warming from -10 to 15 degC
   |
   = help: it is degC, not percent; levels_f = [...] takes degF

## none
error: warming.levels_f: 0 levels
  --> scenario.toml:18:12
   |
18 | levels_f = []
   |            ^^ expected 1 to 40 levels
   |
   = help: for example levels_f = [0, 1, 2, 3]

## twice
error: warming.levels_f[1]: 2 a second time
  --> scenario.toml:18:16
   |
18 | levels_f = [2, 2]
   |                ^ expected each level once
   |
   = help: take one of them out
"#);
}
