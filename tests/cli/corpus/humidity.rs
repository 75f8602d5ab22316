//! Humidity that is none.

use super::super::basin::weather;
use super::{Basin, accepted, refused, small};

/// The sound basin whose record has one more column, `rh`, with the same cell on every day but the first.
fn with(key: &str, first: &str, other: &str) -> Basin {
    let basin = small();
    let sound = weather(3);
    let lines = sound.lines().enumerate().map(|(line, row)| match line {
        0 => format!("{row},rh\n"),
        1 => format!("{row},{first}\n"),
        _ => format!("{row},{other}\n"),
    });
    basin.write("weather.csv", &lines.collect::<String>());
    basin.exchange(
        "precipitation = { column = \"precip_mm\", unit = \"mm\" }\n",
        &format!("precipitation = {{ column = \"precip_mm\", unit = \"mm\" }}\n{key}\n"),
    );
    basin
}

const PERCENT: &str = "relative_humidity = { column = \"rh\" }";

#[test]
fn humidity_that_is_none() {
    let both = format!("{PERCENT}\ndew_point = {{ column = \"rh\", unit = \"degC\" }}");
    let said = [
        ("a word", with(PERCENT, "damp", "70")),
        ("too little", with(PERCENT, "70", "NA")),
        (
            "percent as fractions",
            with("relative_humidity = { column = \"rh\", unit = \"fraction\" }", "70", "71"),
        ),
        ("another column", with("relative_humidity = { column = \"humid\" }", "70", "71")),
        ("another unit", with("relative_humidity = { column = \"rh\", unit = \"percent\" }", "70", "71")),
        ("a dew point without a unit", with("dew_point = { column = \"rh\" }", "1", "1")),
        ("both", with(&both, "70", "71")),
    ]
    .map(|(what, basin)| format!("## {what}\n{}\n", refused(&basin)));
    insta::assert_snapshot!(said.join("\n"), @r#"
## a word
error: rh: 'damp'
 --> weather.csv:2:25
  |
2 | 2000-10-01,0.6,10.6,6.0,damp
  |                         ^^^^ expected a number or a mark for 'not measured'
  |
  = help: if it is such a mark, add it to 'missing' where the scenario names the file

## too little
error: weather.csv: humidity on 1 of the 274 days with precipitation that are in use
 |
 = note: expected humidity on at least half of them: too little humidity to tell rain from snow by
 = help: check its column, its unit and the marks for 'not measured', or take relative_humidity or dew_point out of [weather]

## percent as fractions
error: weather.csv: humidity on 0 of the 274 days with precipitation that are in use
 |
 = note: expected humidity on at least half of them: too little humidity to tell rain from snow by
 = help: check its column, its unit and the marks for 'not measured', or take relative_humidity or dew_point out of [weather]

## another column
error: no column called 'humid'
 --> weather.csv:1:1
  |
1 | date,tmin_c,tmax_c,precip_mm,rh
  | ^ expected a column of this name
  |
  = help: name one of the columns that stand there, letter for letter:
            date
            tmin_c
            tmax_c
            precip_mm
            rh

## another unit
error: weather.relative_humidity.unit: "percent"
  --> scenario.toml:16:45
   |
16 | relative_humidity = { column = "rh", unit = "percent" }
   |                                             ^^^^^^^^^ expected "fraction" or "pct"
   |
   = help: take one of these

## a dew point without a unit
error: weather.dew_point.unit: no 'unit'
  --> scenario.toml:16:1
   |
16 | dew_point = { column = "rh" }
   | ^^^^^^^^^ expected "degC" or "degF" or "K"
   |
   = help: add unit = "degC"

## both
error: weather.dew_point: dew_point beside relative_humidity
  --> scenario.toml:17:13
   |
17 | dew_point = { column = "rh", unit = "degC" }
   |             ^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^ expected one of the two
   |
   = help: take one of them out
"#);
}

#[test]
fn humidity_that_hardly_is() {
    let said = [
        ("beyond what air has", with(PERCENT, "106", "70")),
        ("below nothing", with(PERCENT, "-1", "70")),
        ("a little above saturation", with(PERCENT, "104", "70")),
        ("fractions as percent, and a slip", with(PERCENT, "2", "0.7")),
        ("an impossible dew point", with("dew_point = { column = \"rh\", unit = \"degC\" }", "-99", "-30")),
    ]
    .map(|(what, basin)| format!("## {what}\n{}\n", accepted(&basin)));
    insta::assert_snapshot!(said.join("\n"), @r#"
## beyond what air has
second look: weather.file: only 3 water years are in use: the spread of realizations hardly holds what chance can do
second look: weather.relative_humidity: 1 value beyond 0 to 105 percent, which no air at a station has, taken as missing; the first on 2000-10-01 (line 2): 106.0 percent. Are its unit and the marks for 'not measured' the right ones?

## below nothing
second look: weather.file: only 3 water years are in use: the spread of realizations hardly holds what chance can do
second look: weather.relative_humidity: 1 value beyond 0 to 105 percent, which no air at a station has, taken as missing; the first on 2000-10-01 (line 2): -1.0 percent. Are its unit and the marks for 'not measured' the right ones?

## a little above saturation
second look: weather.file: only 3 water years are in use: the spread of realizations hardly holds what chance can do

## fractions as percent, and a slip
second look: weather.file: only 3 water years are in use: the spread of realizations hardly holds what chance can do
second look: weather.relative_humidity: 1094 values of at most 1.5 percent, and hardly one above; the first on 2000-10-02 (line 3): 0.7 percent. Are they fractions? Then state unit = "fraction"

## an impossible dew point
second look: weather.file: only 3 water years are in use: the spread of realizations hardly holds what chance can do
second look: weather.dew_point: 1 value beyond -90 to 60 degC, which no station has measured, taken as missing; the first on 2000-10-01 (line 2): -99.0 degC
"#);
}
