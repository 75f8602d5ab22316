//! Keys and values of a scenario that are none, two for one thing, and syntax that is none.

use super::super::basin::SCENARIO;
use super::{Basin, refused, refused_files, small};

/// Exchanges in the sound scenario, each on its own, and what is said.
fn exchanged(cases: &[(&str, &str)]) -> String {
    let said = cases.iter().map(|(from, to)| {
        let basin: Basin = small();
        basin.exchange(from, to);
        refused(&basin)
    });
    said.collect::<Vec<_>>().join("\n\n")
}

#[test]
fn keys_that_are_not_known() {
    let said = exchanged(&[
        ("title = ", "titel = "),
        ("seed = 5", "sede = 5"),
        ("station_elevation_m", "station_elevation"),
        ("[warming]", "[warning]"),
        ("count = 6", "count = 6\nflavour = \"plain\""),
        ("unit = \"mm\"", "units = \"mm\""),
        ("[warming]", "[snow.wet_bulb]\nmelt_base_c = 1\npressure = 80\n\n[warming]"),
        ("[warming]", "[snow.cold_content]\ndaily_shares = 0.3\nstart_bare_each_year = true\n\n[warming]"),
    ]);
    insta::assert_snapshot!(said, @r#"
error: scenario.toml: no 'title'
 |
 = note: expected a name for the study
 = help: add title = "..." at the top

error: 'titel', which is not a key of a scenario
 --> scenario.toml:1:1
  |
1 | titel = "Test fork"
  | ^^^^^ expected 'title'?
  |
  = help: write 'title', or take the key out

2 faults; nothing was run

error: 'sede', which is not a key of a scenario
 --> scenario.toml:2:1
  |
2 | sede = 5
  | ^^^^ expected 'seed'?
  |
  = help: write 'seed', or take the key out

error: weather.station_elevation_m: no 'station_elevation_m'
  --> scenario.toml:10:2
   |
10 | [weather]
   |  ^^^^^^^ expected a number
   |
   = help: add it, in metres above the sea; or station_elevation_ft, in feet

error: 'weather.station_elevation', which is not a key of a scenario
  --> scenario.toml:12:1
   |
12 | station_elevation = 2000
   | ^^^^^^^^^^^^^^^^^ expected 'station_elevation_m'?
   |
   = help: write 'station_elevation_m', or take the key out

2 faults; nothing was run

error: 'warning', which is not a key of a scenario
  --> scenario.toml:17:2
   |
17 | [warning]
   |  ^^^^^^^ expected 'warming'?
   |
   = help: write 'warming', or take the key out

error: 'realizations.flavour', which is not a key of a scenario
  --> scenario.toml:22:1
   |
22 | flavour = "plain"
   | ^^^^^^^ expected one of: generator, mean_run_years, wet_day_mm, count, years, mean_change_sd_pct
   |
   = help: take it out, or check its table

error: weather.precipitation.unit: no 'unit'
  --> scenario.toml:15:1
   |
15 | precipitation = { column = "precip_mm", units = "mm" }
   | ^^^^^^^^^^^^^ expected "mm" or "cm" or "in"
   |
   = help: add unit = "mm"

error: 'weather.precipitation.units', which is not a key of a scenario
  --> scenario.toml:15:41
   |
15 | precipitation = { column = "precip_mm", units = "mm" }
   |                                         ^^^^^ expected 'unit'?
   |
   = help: write 'unit', or take the key out

2 faults; nothing was run

error: 'snow.wet_bulb.melt_base_c', which is not a key of a scenario
  --> scenario.toml:18:1
   |
18 | melt_base_c = 1
   | ^^^^^^^^^^^ expected 'melt_base_c' in [snow]
   |
   = help: write it above the line [snow.wet_bulb], among the keys of [snow]

error: 'snow.wet_bulb.pressure', which is not a key of a scenario
  --> scenario.toml:19:1
   |
19 | pressure = 80
   | ^^^^^^^^ expected no key: [snow.wet_bulb] has none
   |
   = help: take it out, or check its table

2 faults; nothing was run

error: 'snow.cold_content.daily_shares', which is not a key of a scenario
  --> scenario.toml:18:1
   |
18 | daily_shares = 0.3
   | ^^^^^^^^^^^^ expected 'daily_share'?
   |
   = help: write 'daily_share', or take the key out

error: 'snow.cold_content.start_bare_each_year', which is not a key of a scenario
  --> scenario.toml:19:1
   |
19 | start_bare_each_year = true
   | ^^^^^^^^^^^^^^^^^^^^ expected 'start_bare_each_year' in [snow]
   |
   = help: write it above the line [snow.cold_content], among the keys of [snow]

2 faults; nothing was run
"#);
}

#[test]
fn values_of_another_kind() {
    let said = exchanged(&[
        ("title = \"Test fork\"", "title = 5"),
        ("seed = 5", "seed = 5.5"),
        ("latitude_deg = 40", "latitude_deg = \"40 N\""),
        ("temperature_gradient_c_per_km = -6.0", "temperature_gradient_c_per_km = [-6, -6]"),
        ("temperature_gradient_c_per_km = -6.0", "temperature_gradient_c_per_km = \"-6\""),
        ("\"bands.csv\"", "[\"bands.csv\"]"),
        ("{ column = \"tmin_c\", unit = \"degC\" }", "\"tmin_c\""),
        ("levels_c = [0, 2]", "levels_c = 2"),
        ("levels_c = [0, 2]", "levels_c = [0, \"two\"]"),
        ("[warming]", "[season]\nsurvey_dates = \"04-01\"\n\n[warming]"),
        ("[warming]", "[season]\nwater_year_starts = 10-01\n\n[warming]"),
        ("[warming]", "[season]\nvolume_windows = [\"04-01\", \"07-31\"]\n\n[warming]"),
        ("station_elevation_m = 2000", "station_elevation_m = 2000\nmissing = \"M\""),
        ("station_elevation_m = 2000", "station_elevation_m = 2000\nseparator = \"::\""),
        ("station_elevation_m = 2000", "station_elevation_m = 2000\nencoding = \"ascii\""),
        ("station_elevation_m = 2000", "station_elevation_m = 2000\ndate = \"date\""),
        ("station_elevation_m = 2000", "station_elevation_m = 2000\ndate = { format = \"%Q\" }"),
        ("count = 6", "count = -6"),
        ("[basin]", "[[basin]]"),
    ]);
    insta::assert_snapshot!(said, @r#"
error: title: 5
 --> scenario.toml:1:9
  |
1 | title = 5
  |         ^ expected a text in quotes
  |
  = help: write title = "..."

error: seed: 5.5
 --> scenario.toml:2:8
  |
2 | seed = 5.5
  |        ^^^ expected a whole number from 0 to 9223372036854775807
  |
  = help: for example 1

error: basin.latitude_deg: the text "40 N"
 --> scenario.toml:5:16
  |
5 | latitude_deg = "40 N"
  |                ^^^^^^ expected a number
  |
  = help: write a number alone, without quotes and unit: latitude_deg = ...

error: basin.temperature_gradient_c_per_km: 2 numbers
 --> scenario.toml:7:33
  |
7 | temperature_gradient_c_per_km = [-6, -6]
  |                                 ^^^^^^^^ expected one number, or twelve, January first
  |
  = help: give one a month, or one alone; minima and maxima of their own: tmin_temperature_gradient_c_per_km and tmax_temperature_gradient_c_per_km

error: basin.temperature_gradient_c_per_km: the text "-6"
 --> scenario.toml:7:33
  |
7 | temperature_gradient_c_per_km = "-6"
  |                                 ^^^^ expected one number, or twelve, January first
  |
  = help: take the quotes away: temperature_gradient_c_per_km = -6

error: basin.bands: a list
 --> scenario.toml:6:9
  |
6 | bands = ["bands.csv"]
  |         ^^^^^^^^^^^^^ expected a text in quotes
  |
  = help: write bands = "..."

error: weather.tmin: the text "tmin_c"
  --> scenario.toml:13:8
   |
13 | tmin = "tmin_c"
   |        ^^^^^^^^ expected a table
   |
   = help: write tmin = { ... }

error: warming.levels_c: 2
  --> scenario.toml:18:12
   |
18 | levels_c = 2
   |            ^ expected a list of numbers
   |
   = help: write levels_c = [0, 1, 2]

error: warming.levels_c[1]: the text "two"
  --> scenario.toml:18:16
   |
18 | levels_c = [0, "two"]
   |                ^^^^^ expected a number
   |
   = help: write levels_c as a list of such values, as in the demo scenarios

error: season.survey_dates: the text "04-01"
  --> scenario.toml:18:16
   |
18 | survey_dates = "04-01"
   |                ^^^^^^^ expected a list of texts in quotes
   |
   = help: write survey_dates = ["..."]

error: invalid date, expected `-` (MM-DD)
  --> scenario.toml:18:21
   |
18 | water_year_starts = 10-01
   |                     ^^^^^ expected TOML: key = value, one a line, under [table] lines
   |
   = help: quote texts, write lists in [ ], and name each key once

error: season.volume_windows[0]: the text "04-01"
  --> scenario.toml:18:19
   |
18 | volume_windows = ["04-01", "07-31"]
   |                   ^^^^^^^ expected pairs of days, [["04-01", "07-31"]]
   |
   = help: write volume_windows as a list of such values, as in the demo scenarios

error: season.volume_windows[1]: the text "07-31"
  --> scenario.toml:18:28
   |
18 | volume_windows = ["04-01", "07-31"]
   |                            ^^^^^^^ expected pairs of days, [["04-01", "07-31"]]
   |
   = help: write volume_windows as a list of such values, as in the demo scenarios

2 faults; nothing was run

error: weather.missing: the text "M"
  --> scenario.toml:13:11
   |
13 | missing = "M"
   |           ^^^ expected a list of texts in quotes
   |
   = help: write missing = ["..."]

error: weather.separator: "::"
  --> scenario.toml:13:13
   |
13 | separator = "::"
   |             ^^^^ expected one plain character
   |
   = help: for example "," or ";" or "\t"

error: weather.encoding: "ascii"
  --> scenario.toml:13:12
   |
13 | encoding = "ascii"
   |            ^^^^^^^ expected "utf-8" or "latin-1" or "utf-16"
   |
   = help: take one of these

error: weather.date: the text "date"
  --> scenario.toml:13:8
   |
13 | date = "date"
   |        ^^^^^^ expected a table
   |
   = help: write date = { ... }

error: weather.date.format: "%Q"
  --> scenario.toml:13:19
   |
13 | date = { format = "%Q" }
   |                   ^^^^ expected a date format in the signs of strftime
   |
   = help: for example "%Y-%m-%d" or "%m/%d/%Y"

error: realizations.count: -6
  --> scenario.toml:21:9
   |
21 | count = -6
   |         ^^ expected a whole number from 1 to 100000
   |
   = help: for example 300

error: basin: a list
 --> scenario.toml:4:1
  |
4 | [[basin]]
  | ^^^^^^^^^ expected a table
  |
  = help: write [basin] once, with single brackets
"#);
}

#[test]
fn two_keys_for_one_thing() {
    let said = exchanged(&[
        (
            "bands = \"bands.csv\"",
            "bands = \"bands.csv\"\narea_elevation_curve = { file = \"bands.csv\", band_thickness_m = 100 }",
        ),
        ("levels_c = [0, 2]", "levels_c = [0, 2]\nglobal = { levels_c = [0, 2], local_per_global = 1.3 }"),
        (
            "levels_c = [0, 2]",
            "levels_c = [0, 2]\nprecipitation_change_pct = [0, 5]\nprecipitation_change_pct_per_c = 2",
        ),
        ("tmin = {", "tmean = { column = \"tmin_c\", unit = \"degC\" }\ntmin = {"),
    ]);
    insta::assert_snapshot!(said, @r#"
error: basin.area_elevation_curve: area_elevation_curve beside bands
 --> scenario.toml:7:24
  |
7 | area_elevation_curve = { file = "bands.csv", band_thickness_m = 100 }
  |                        ^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^ expected one of the two
  |
  = help: take one of them out

error: no column called 'elevation_m' or 'elevation_ft', 'area_below_km2' or 'area_below_mi2' or 'area_below_ha' or 'area_below_acre'
 --> bands.csv:1:1
  |
1 | lower_m,upper_m,area_km2
  | ^ expected columns of these names
  |
  = help: if the file has other names, name them:
            area_elevation_curve = { file = "...", elevation = { column = "...", unit = "m" }, area_below = { column = "area_km2", unit = "km2" } }
          The file's columns are:
            lower_m
            upper_m
            area_km2

2 faults; nothing was run

error: warming.levels_c: levels_c beside [warming.global]
  --> scenario.toml:18:12
   |
18 | levels_c = [0, 2]
   |            ^^^^^^ expected one of the two
   |
   = help: levels of the basin's own warming, or of global warming: take one out

error: warming.global.already_in_record_global_c: no 'already_in_record_global_c'
  --> scenario.toml:19:1
   |
19 | global = { levels_c = [0, 2], local_per_global = 1.3 }
   | ^^^^^^ expected a number
   |
   = help: add it: global warming above 1850-1900 that the record already holds, at its mid-year: 1.09 for 2011-2020 (IPCC AR6)

2 faults; nothing was run

error: warming.precipitation_change_pct: precipitation_change_pct beside precipitation_change_pct_per_c
  --> scenario.toml:19:28
   |
19 | precipitation_change_pct = [0, 5]
   |                            ^^^^^^ expected one of the two
   |
   = help: state the change of each level, or percent per degC

error: weather.tmean: tmean beside tmin and tmax
  --> scenario.toml:13:9
   |
13 | tmean = { column = "tmin_c", unit = "degC" }
   |         ^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^ expected tmin and tmax, or tmean alone
   |
   = help: take tmean out; the daily mean is (tmin + tmax)/2
"#);
}

#[test]
fn syntax_that_is_none() {
    let said = exchanged(&[
        ("title = \"Test fork\"", "title = \"Test\u{7} fork\""),
        ("title = \"Test fork\"", "title = \"Test\\u0007 fork\""),
        ("title = \"Test fork\"", "title = \"Test fork"),
        ("[weather]", "[weather"),
        ("seed = 5", "seed = 5\nseed = 6"),
        ("seed = 5", "seed : 5"),
        ("levels_c = [0, 2]", "levels_c = [0; 2]"),
    ]);
    insta::assert_snapshot!(said, @r#"
error: invalid basic string, expected non-double-quote visible characters, `\`
 --> scenario.toml:1:14
  |
1 | title = "Test␇ fork"
  |              ^ expected TOML: key = value, one a line, under [table] lines
  |
  = help: quote texts, write lists in [ ], and name each key once

error: title: a title with line breaks or control signs, or a very long one
 --> scenario.toml:1:9
  |
1 | title = "Test\u0007 fork"
  |         ^^^^^^^^^^^^^^^^^ expected one line of at most 1000 characters
  |
  = help: shorten it

error: invalid basic string, expected `"`
 --> scenario.toml:1:19
  |
1 | title = "Test fork
  |                   ^ expected TOML: key = value, one a line, under [table] lines
  |
  = help: quote texts, write lists in [ ], and name each key once

error: unclosed table, expected `]`
  --> scenario.toml:10:9
   |
10 | [weather
   |         ^ expected TOML: key = value, one a line, under [table] lines
   |
   = help: quote texts, write lists in [ ], and name each key once

error: duplicate key
 --> scenario.toml:3:1
  |
3 | seed = 6
  | ^^^^ expected TOML: key = value, one a line, under [table] lines
  |
  = help: quote texts, write lists in [ ], and name each key once

error: key with no value, expected `=`
 --> scenario.toml:2:6
  |
2 | seed : 5
  |      ^ expected TOML: key = value, one a line, under [table] lines
  |
  = help: quote texts, write lists in [ ], and name each key once

error: string values must be quoted, expected literal string
  --> scenario.toml:18:13
   |
18 | levels_c = [0; 2]
   |             ^^^^ expected TOML: key = value, one a line, under [table] lines
   |
   = help: quote texts, write lists in [ ], and name each key once
"#);
    let many =
        SCENARIO.replace("seed = 5", "seed = = 5").replace("[0, 2]", "[0, 2").replace("= 40", "= 40 degrees");
    insta::assert_snapshot!(refused_files("scenario.toml", [("several at once", many)]), @r"
## several at once
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

error: string values must be quoted, expected literal string
 --> scenario.toml:5:16
  |
5 | latitude_deg = 40 degrees
  |                ^^^^^^^^^^ expected TOML: key = value, one a line, under [table] lines
  |
  = help: quote texts, write lists in [ ], and name each key once

error: a list that is not closed before this
  --> scenario.toml:20:1
   |
20 | [realizations]
   | ^ expected TOML: key = value, one a line, under [table] lines
   |
   = help: end the list above with ]

4 faults; nothing was run
");
}
