//! Bands and curves that are no basin.

use super::{Basin, accepted_files, refused, refused_files, small};
use std::fmt::Write;

#[test]
fn bands_that_are_none() {
    let table = |rows: &str| format!("lower_m,upper_m,area_km2\n{rows}");
    let many = |count: usize| {
        (0..count).fold(String::new(), |mut rows, band| {
            writeln!(rows, "{},{},1", 1500 + band, 1501 + band).unwrap();
            rows
        })
    };
    let said = refused_files(
        "bands.csv",
        [
            ("no area", table("1900,2200,0\n2200,2500,25\n")),
            ("negative area", table("1900,2200,-40\n2200,2500,25\n")),
            ("NaN", table("1900,NaN,40\n2200,2500,25\n")),
            ("an empty cell", table("1900,2200,\n2200,2500,25\n")),
            ("overlap", table("1900,2300,40\n2200,2500,25\n")),
            ("the same edges twice", table("1900,2200,40\n1900,2200,25\n")),
            ("upside down", table("2200,1900,40\n2200,2500,25\n")),
            ("feet beside metres", "lower_m,lower_ft,upper_m,area_km2\n1900,6234,2200,40\n".to_owned()),
            ("a mean outside", "lower_m,upper_m,area_km2,mean_m\n1900,2200,40,1800\n".to_owned()),
            ("other columns", "from,to,area\n1900,2200,40\n".to_owned()),
            ("semicolons", table("1900,2200,40\n").replace(',', ";")),
            ("no header", "1900,2200,40\n2200,2500,25\n".to_owned()),
            ("empty", String::new()),
            ("header only", table("")),
            ("1001 bands", table(&many(1001))),
        ],
    );
    insta::assert_snapshot!(said, @r#"
## no area
error: area_km2: '0'
 --> bands.csv:2:11
  |
2 | 1900,2200,0
  |           ^ expected an area above 0
  |
  = help: leave out bands without area

## negative area
error: area_km2: '-40'
 --> bands.csv:2:11
  |
2 | 1900,2200,-40
  |           ^^^ expected an area above 0
  |
  = help: leave out bands without area

## NaN
error: upper_m: 'NaN'
 --> bands.csv:2:6
  |
2 | 1900,NaN,40
  |      ^^^ expected a number
  |
  = help: fill it in, or take the line out

## an empty cell
error: area_km2: ''
 --> bands.csv:2:11
  |
2 | 1900,2200,
  |           ^ expected a number
  |
  = help: fill it in, or take the line out

## overlap
error: lower_m: '2200'
 --> bands.csv:3:1
  |
3 | 2200,2500,25
  | ^^^^ expected a lower edge not below the upper edge of the band on line 2
  |
  = help: let each band start where the one below ends

## the same edges twice
error: lower_m: '1900'
 --> bands.csv:3:1
  |
3 | 1900,2200,25
  | ^^^^ expected a lower edge not below the upper edge of the band on line 2
  |
  = help: let each band start where the one below ends; edges may repeat where slope, aspect, canopy or variation (slope_deg, aspect_deg, canopy_fraction, accumulation_cv) differ

## upside down
error: upper_m: '1900'
 --> bands.csv:2:6
  |
2 | 2200,1900,40
  |      ^^^^ expected an upper edge above the lower
  |
  = help: check the two edges

## feet beside metres
error: the columns 'lower_m' and 'lower_ft' beside each other
 --> bands.csv:1:1
  |
1 | lower_m,lower_ft,upper_m,area_km2
  | ^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^ expected each quantity in one unit
  |
  = help: take all but one of them out

## a mean outside
error: mean_m: '1800'
 --> bands.csv:2:14
  |
2 | 1900,2200,40,1800
  |              ^^^^ expected a mean within the band
  |
  = help: check it against the edges

## other columns
error: no column called 'lower_m' or 'lower_ft', 'upper_m' or 'upper_ft', 'area_km2' or 'area_mi2' or 'area_ha' or 'area_acre'
 --> bands.csv:1:1
  |
1 | from,to,area
  | ^ expected columns of these names
  |
  = help: if the file has other names, name them:
            bands = { file = "...", lower = { column = "...", unit = "m" }, upper = { column = "...", unit = "m" }, area = { column = "area", unit = "km2" } }
          The file's columns are:
            from
            to
            area

## semicolons
error: no column called 'lower_m' or 'lower_ft', 'upper_m' or 'upper_ft', 'area_km2' or 'area_mi2' or 'area_ha' or 'area_acre'
 --> bands.csv:1:1
  |
1 | lower_m;upper_m;area_km2
  | ^ expected columns of these names
  |
  = help: the names stand apart by another sign: state separator = ";" where the scenario names the file

## no header
error: values where the column names should stand
 --> bands.csv:1:1
  |
1 | 1900,2200,40
  | ^^^^^^^^^^^^ expected 3 names
  |
  = help: add a line of names above it, with ',' between them, and name them where the scenario names the file; if the names stand on a line of their own, state header_line

## empty
error: bands.csv: no header line
 |
 = note: expected a line of column names, then one line a row
 = help: check that the file was saved whole; remarks above the header must start with the 'comment' sign

## header only
error: bands.csv: no bands
 |
 = note: expected at least one row
 = help: add a row for each band

## 1001 bands
error: bands.csv: more than 1000 bands
 |
 = note: expected bands some 50 to 300 m high
 = help: join bands: the result changes little once they are 100 m high
"#);
    let said = accepted_files(
        "bands.csv",
        [
            ("a hole", table("1900,2100,40\n2300,2500,25\n")),
            ("one band", table("1900,2100,40\n")),
            ("500 bands", table(&many(500))),
            ("from the highest down", table("2200,2500,25\n1900,2200,40\n")),
        ],
    );
    insta::assert_snapshot!(said, @r"
## a hole
second look: weather.file: only 3 water years are in use: the spread of realizations hardly holds what chance can do
second look: basin.bands: the bands leave a hole from 2100 to 2300 m

## one band
second look: weather.file: only 3 water years are in use: the spread of realizations hardly holds what chance can do

## 500 bands
second look: weather.file: only 3 water years are in use: the spread of realizations hardly holds what chance can do

## from the highest down
second look: weather.file: only 3 water years are in use: the spread of realizations hardly holds what chance can do
");
}

fn with_curve(rows: &str) -> Basin {
    let basin = small();
    basin.exchange(
        "bands = \"bands.csv\"",
        "area_elevation_curve = { file = \"curve.csv\", band_thickness_m = 100 }",
    );
    basin.write_bytes("curve.csv", format!("elevation_m,area_below_km2\n{rows}"));
    basin
}

#[test]
fn curves_that_are_none() {
    let said = [
        ("falling", "1900,0\n2200,40\n2500,25\n"),
        ("not from 0", "1900,5\n2200,40\n"),
        ("one point", "1900,0\n"),
        ("no point", ""),
        ("an elevation twice", "1900,0\n2200,30\n2200,40\n"),
        ("flat", "1900,0\n2200,0\n"),
        ("in feet by the size of it", "1900,0\n820000,40\n"),
    ]
    .map(|(what, rows)| format!("## {what}\n{}\n", refused(&with_curve(rows))));
    insta::assert_snapshot!(said.join("\n"), @r"
## falling
error: area_below_km2: '25'
 --> curve.csv:4:6
  |
4 | 2500,25
  |      ^^ expected an area not smaller than on line 3, which lies lower
  |
  = help: the column holds the area BELOW each elevation

## not from 0
error: area_below_km2: '5'
 --> curve.csv:2:6
  |
2 | 1900,5
  |      ^ expected 0 below the lowest elevation
  |
  = help: give the basin's lowest elevation a line of its own, with area 0

## one point
error: curve.csv: 1 point
 |
 = note: expected a curve of at least two points
 = help: give the lowest elevation with area 0, the highest with the basin's whole area, and some between

## no point
error: curve.csv: no points
 |
 = note: expected a curve of at least two points
 = help: give the lowest elevation with area 0, the highest with the basin's whole area, and some between

## an elevation twice
error: elevation_m: '2200'
 --> curve.csv:4:1
  |
4 | 2200,40
  | ^^^^ expected an elevation that line 3 does not have already
  |
  = help: keep one line an elevation

## flat
error: area_below_km2: '0'
 --> curve.csv:3:6
  |
3 | 2200,0
  |      ^ expected the basin's whole area at its highest elevation
  |
  = help: check the areas

## in feet by the size of it
error: curve.csv: 8181 bands of 100 m
 |
 = note: expected bands some 50 to 300 m high
 = help: state a larger band_thickness_m, and check the unit of the elevations
");
}
