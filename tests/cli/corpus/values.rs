//! Numbers that are none, or hardly weather.

use super::super::basin::weather;
use super::{accepted_files, column, refused_files, rows};

#[test]
fn cells_that_are_no_number() {
    let sound = weather(3);
    let said = refused_files(
        "weather.csv",
        [
            ("NaN", sound.replacen(",6.0\n", ",NaN\n", 1)),
            ("inf", sound.replacen(",6.0\n", ",inf\n", 1)),
            ("too large for a number", sound.replacen(",6.0\n", ",1e309\n", 1)),
            ("a mark of its own", sound.replace(",6.0\n", ",M\n")),
            ("a thousand with a comma", sound.replacen(",6.0\n", ",\"1,006.0\"\n", 1)),
            ("a negative amount", sound.replacen(",6.0\n", ",-6.0\n", 1)),
            ("all missing", rows(|_, cells| format!("{},,,", cells[0]))),
            ("precipitation missing", column(3, |_, _| "NA".to_owned())),
        ],
    );
    insta::assert_snapshot!(said, @r#"
## NaN
error: precip_mm: 'NaN'
 --> weather.csv:2:21
  |
2 | 2000-10-01,0.6,10.6,NaN
  |                     ^^^ expected a number or a mark for 'not measured'
  |
  = help: if it is such a mark, add it to 'missing' where the scenario names the file

## inf
error: precip_mm: 'inf'
 --> weather.csv:2:21
  |
2 | 2000-10-01,0.6,10.6,inf
  |                     ^^^ expected a number or a mark for 'not measured'
  |
  = help: if it is such a mark, add it to 'missing' where the scenario names the file

## too large for a number
error: precip_mm: '1e309'
 --> weather.csv:2:21
  |
2 | 2000-10-01,0.6,10.6,1e309
  |                     ^^^^^ expected a number or a mark for 'not measured'
  |
  = help: if it is such a mark, add it to 'missing' where the scenario names the file

## a mark of its own
error: precip_mm: 'M'
 --> weather.csv:2:21
  |
2 | 2000-10-01,0.6,10.6,M
  |                     ^ expected a number or a mark for 'not measured'
  |
  = help: if it is such a mark, add it to 'missing' where the scenario names the file

error: precip_mm: 'M'
 --> weather.csv:6:21
  |
6 | 2000-10-05,-0.2,9.8,M
  |                     ^ expected a number or a mark for 'not measured'
  |
  = help: if it is such a mark, add it to 'missing' where the scenario names the file

error: precip_mm: 'M' (and 89 more faults in this column)
  --> weather.csv:10:21
   |
10 | 2000-10-09,-0.9,9.1,M
   |                     ^ expected a number or a mark for 'not measured'
   |
   = help: if it is such a mark, add it to 'missing' where the scenario names the file

3 faults; nothing was run

## a thousand with a comma
error: precip_mm: '1,006.0'
 --> weather.csv:2:21
  |
2 | 2000-10-01,0.6,10.6,"1,006.0"
  |                     ^^^^^^^^^ expected a number or a mark for 'not measured'
  |
  = help: write it without a sign between thousands

## a negative amount
error: precip_mm: '-6.0'
 --> weather.csv:2:21
  |
2 | 2000-10-01,0.6,10.6,-6.0
  |                     ^^^^ expected a daily amount of 0 or more
  |
  = help: if the gauge accumulates, say so with gauge = "accumulating"; else add the mark to 'missing'

## all missing
error: weather.csv: no water year that can be used; 2001: temperature or precipitation missing on 365 days, no temperatures for 1095 days from 2000-10-01; 2002: temperature or precipitation missing on 365 days, no temperatures for 1095 days from 2000-10-01; 2003: temperature or precipitation missing on 365 days, no tem...
 |
 = note: expected at least one whole water year of temperature and precipitation
 = help: check units, missing marks and 'water_year_starts'; the limits temperature_gap_days and missing_days_allowed stand in [weather]

## precipitation missing
error: weather.csv: no water year that can be used; 2001: temperature or precipitation missing on 365 days; 2002: temperature or precipitation missing on 365 days; 2003: temperature or precipitation missing on 365 days
 |
 = note: expected at least one whole water year of temperature and precipitation
 = help: check units, missing marks and 'water_year_starts'; the limits temperature_gap_days and missing_days_allowed stand in [weather]
"#);
}

#[test]
fn values_that_are_hardly_weather() {
    let said = accepted_files(
        "weather.csv",
        [
            ("1e308 once", weather(3).replacen(",6.0\n", ",1e308\n", 1)),
            ("temperature that never changes", rows(|_, cells| format!("{},-3,3,{}", cells[0], cells[3]))),
            ("no precipitation at all", column(3, |_, _| "0".to_owned())),
        ],
    );
    insta::assert_snapshot!(said, @r"
## 1e308 once
second look: weather.file: only 3 water years are in use: the spread of realizations hardly holds what chance can do
second look: weather.precipitation: 1 amount above 2000 mm in a day, which no station has measured, taken as missing; the first on 2000-10-01 (line 2): 1e308 mm

## temperature that never changes
second look: weather.file: only 3 water years are in use: the spread of realizations hardly holds what chance can do
second look: weather.tmin: 1095 values, all of them the same; the first on 2000-10-01 (line 2): -3.0 degC. Is it the right column?
second look: weather.tmax: 1095 values, all of them the same; the first on 2000-10-01 (line 2): 3.0 degC. Is it the right column?
second look: snow.start_bare_each_year: in most of the record's years the snow never goes from 2 bands with 100 % of the basin's area; it is carried into the next year and piles up, and the model makes no ice of it: with snow.start_bare_each_year = true it is taken away as each year ends

## no precipitation at all
second look: weather.file: only 3 water years are in use: the spread of realizations hardly holds what chance can do
second look: weather.precipitation: 1095 days with an amount, all of them 0; the first on 2000-10-01 (line 2): 0.0 mm. Is it the right column?
");
}

/// What groups of three may be is said both ways, and what else a sign can be in one way.
#[test]
fn signs_between_thousands() {
    let with_point = ["8,500", "8,5", "1,234,567", "1,234.5"]
        .map(|cell| (cell, weather(3).replacen(",6.0\n", &format!(",\"{cell}\"\n"), 1)));
    let basin = super::small();
    let mut said: Vec<String> = Vec::new();
    for (cell, text) in with_point {
        basin.write("weather.csv", &text);
        said.push(super::refused(&basin));
        assert!(said.last().is_some_and(|last| last.contains(cell)));
    }
    basin.exchange(
        "station_elevation_m = 2000",
        "station_elevation_m = 2000\nseparator = \";\"\ndecimal = \",\"",
    );
    for cell in ["8.500", "8.5", "1.234.567", "1.234,5"] {
        let text =
            weather(3).replace(',', ";").replace('.', ",").replacen(";6,0\n", &format!(";{cell}\n"), 1);
        basin.write("weather.csv", &text);
        said.push(super::refused(&basin));
    }
    let helps = said
        .iter()
        .flat_map(|said| said.lines())
        .filter(|line| line.contains(": '") || line.contains("help:"));
    insta::assert_snapshot!(helps.collect::<Vec<_>>().join("\n"), @r#"
error: precip_mm: '8,500'
  = help: if the comma parts thousands, write 8500; if it is a decimal comma, state decimal = "," where the scenario names the file
error: precip_mm: '8,5'
  = help: if that is a decimal comma, state decimal = "," where the scenario names the file
error: precip_mm: '1,234,567'
  = help: write it without a sign between thousands: 1234567
error: precip_mm: '1,234.5'
  = help: write it without a sign between thousands
error: precip_mm: '8.500'
  = help: if the point parts thousands, write 8500; if it is a decimal point, take decimal = "," out where the scenario names the file
error: precip_mm: '8.5'
  = help: if that is a decimal point, take decimal = "," out where the scenario names the file
error: precip_mm: '1.234.567'
  = help: write it without a sign between thousands: 1234567
error: precip_mm: '1.234,5'
  = help: write it without a sign between thousands
"#);
}
