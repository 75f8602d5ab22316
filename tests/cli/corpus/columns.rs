//! Columns under other names than the scenario's, and in tables that are parted by another sign.

use super::super::basin::weather;
use super::{Basin, accepted, refused, small};

const AGENCY: &str = "Date,Quill Valley (688) Air Temperature Minimum (degC),\
                      Quill Valley (688) Air Temperature Maximum (degC),Quill Valley (688) Precipitation (mm)";

/// The sound record under an agency's long names.
fn agency(basin: &Basin) {
    basin.write("weather.csv", &weather(3).replacen("date,tmin_c,tmax_c,precip_mm", AGENCY, 1));
    for (from, to) in [
        ("\"tmin_c\"", "\"Air Temperature Minimum (degC)\""),
        ("\"tmax_c\"", "\"air temperature maximum\""),
        ("\"precip_mm\"", "\"Quill Valley (688) Precipitation (mm)\""),
        ("station_elevation_m = 2000", "station_elevation_m = 2000\ndate = { column = \"Day\" }"),
    ] {
        basin.exchange(from, to);
    }
}

#[test]
fn part_of_a_name_finds_the_whole() {
    let basin = small();
    agency(&basin);
    insta::assert_snapshot!(refused(&basin), @r#"
error: no column called 'Day'
 --> weather.csv:1:1
  |
1 | Date,Quill Valley (688) Air Temperature Minimum (degC),Quill Valley (688) Air Temperature Maximum (degC),Quill Valley (688) Precipita...
  | ^ expected a column of this name
  |
  = help: name one of the columns that stand there, letter for letter:
            Date
            Quill Valley (688) Air Temperature Minimum (degC)
            Quill Valley (688) Air Temperature Maximum (degC)
            Quill Valley (688) Precipitation (mm)

error: no column called 'Air Temperature Minimum (degC)'
 --> weather.csv:1:1
  |
1 | Date,Quill Valley (688) Air Temperature Minimum (degC),Quill Valley (688) Air Temperature Maximum (degC),Quill Valley (688) Precipita...
  | ^ expected a column of this name
  |
  = help: did you mean 'Quill Valley (688) Air Temperature Minimum (degC)'? Names are compared letter for letter

error: no column called 'air temperature maximum'
 --> weather.csv:1:1
  |
1 | Date,Quill Valley (688) Air Temperature Minimum (degC),Quill Valley (688) Air Temperature Maximum (degC),Quill Valley (688) Precipita...
  | ^ expected a column of this name
  |
  = help: did you mean 'Quill Valley (688) Air Temperature Maximum (degC)'? Names are compared letter for letter

3 faults; nothing was run
"#);
    for (from, to) in [
        ("\"Air Temperature Minimum (degC)\"", "\"Quill Valley (688) Air Temperature Minimum (degC)\""),
        ("\"air temperature maximum\"", "\"Quill Valley (688) Air Temperature Maximum (degC)\""),
        ("\"Day\"", "\"Date\""),
    ] {
        basin.exchange(from, to);
    }
    accepted(&basin);
}

/// What two names hold is no hint, so the names are listed.
#[test]
fn part_of_several_names_finds_none() {
    let basin = small();
    agency(&basin);
    basin.exchange("\"Air Temperature Minimum (degC)\"", "\"Air Temperature\"");
    assert!(!refused(&basin).contains("Minimum (degC)'?"));
}

/// Where some columns are missing, the cells of the others are read all the same.
#[test]
fn the_other_columns_are_checked_beside_a_missing_one() {
    let basin = small();
    basin.exchange("\"tmin_c\"", "\"low\"");
    let text = weather(3).replacen(",6.0\n", ",-6.0\n", 1).replacen("2000-10-05,", "2000-10-35,", 1);
    basin.write("weather.csv", &text);
    insta::assert_snapshot!(refused(&basin), @r#"
error: no column called 'low'
 --> weather.csv:1:1
  |
1 | date,tmin_c,tmax_c,precip_mm
  | ^ expected a column of this name
  |
  = help: name one of the columns that stand there, letter for letter:
            date
            tmin_c
            tmax_c
            precip_mm

error: precip_mm: '-6.0'
 --> weather.csv:2:21
  |
2 | 2000-10-01,0.6,10.6,-6.0
  |                     ^^^^ expected a daily amount of 0 or more
  |
  = help: if the gauge accumulates, say so with gauge = "accumulating"; else add the mark to 'missing'

error: date: '2000-10-35'
 --> weather.csv:6:1
  |
6 | 2000-10-35,-0.2,9.8,6.0
  | ^^^^^^^^^^ expected a day that the calendar has
  |
  = help: mend the date, or take the line out

3 faults; nothing was run
"#);
}

#[test]
fn elevations_under_other_names() {
    let bands = small();
    bands.write("bands.csv", "From (ft),Upper (ft),Area (mi2)\n6000,7200,15\n7200,8400,9\n");
    let bands_parted = small();
    bands_parted.write("bands.csv", "from;to;area\n1900;2200;40\n2200;2500;25\n");
    let curve = small();
    let table = "area_elevation_curve = { file = \"curve.csv\", band_thickness_m = 100 }";
    curve.exchange("bands = \"bands.csv\"", table);
    curve.write("curve.csv", "Elevation (ft),Area below (mi2)\n6000,0\n7200,15\n8400,24\n");
    insta::assert_snapshot!([&bands, &bands_parted, &curve].map(refused).join("\n\n"), @r#"
error: no column called 'lower_m' or 'lower_ft', 'upper_m' or 'upper_ft', 'area_km2' or 'area_mi2' or 'area_ha' or 'area_acre'
 --> bands.csv:1:1
  |
1 | From (ft),Upper (ft),Area (mi2)
  | ^ expected columns of these names
  |
  = help: if the file has other names, name them:
            bands = { file = "...", lower = { column = "...", unit = "m" }, upper = { column = "Upper (ft)", unit = "ft" }, area = { column = "Area (mi2)", unit = "mi2" } }
          The file's columns are:
            From (ft)
            Upper (ft)
            Area (mi2)

error: no column called 'lower_m' or 'lower_ft', 'upper_m' or 'upper_ft', 'area_km2' or 'area_mi2' or 'area_ha' or 'area_acre'
 --> bands.csv:1:1
  |
1 | from;to;area
  | ^ expected columns of these names
  |
  = help: the names stand apart by another sign: state separator = ";" where the scenario names the file

error: no column called 'elevation_m' or 'elevation_ft', 'area_below_km2' or 'area_below_mi2' or 'area_below_ha' or 'area_below_acre'
 --> curve.csv:1:1
  |
1 | Elevation (ft),Area below (mi2)
  | ^ expected columns of these names
  |
  = help: if the file has other names, name them:
            area_elevation_curve = { file = "...", elevation = { column = "Elevation (ft)", unit = "ft" }, area_below = { column = "Area below (mi2)", unit = "mi2" } }
          The file's columns are:
            Elevation (ft)
            Area below (mi2)
"#);
    curve.exchange(
        table,
        "area_elevation_curve = { file = \"curve.csv\", band_thickness_m = 100, \
         elevation = { column = \"Elevation (ft)\", unit = \"ft\" }, \
         area_below = { column = \"Area below (mi2)\", unit = \"mi2\" } }",
    );
    accepted(&curve);
}
