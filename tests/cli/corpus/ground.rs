//! Bands whose ground cannot be, or does not tell them apart.

use super::refused_files;

const HEADER: &str = "lower_m,upper_m,area_km2,slope_deg,aspect_deg,canopy_fraction,accumulation_cv\n";

#[test]
fn ground_that_is_none() {
    let table = |rows: &str| format!("{HEADER}{rows}");
    let said = refused_files(
        "bands.csv",
        [
            ("a slope without its aspect", table("1900,2200,40,25,,0,\n2200,2500,25,0,,0,\n")),
            (
                "slopes without aspects",
                "lower_m,upper_m,area_km2,slope_deg\n1900,2200,40,25\n2200,2500,25,0\n".to_owned(),
            ),
            ("aspects without slopes", "lower_m,upper_m,area_km2,aspect_deg\n1900,2200,40,180\n".to_owned()),
            ("a slope in percent", table("1900,2200,40,110,180,0,\n2200,2500,25,-5,0,0,\n")),
            (
                "aspects by name and beyond the circle",
                table("1900,2200,40,25,S,0,\n2200,2500,25,20,361,0,\n"),
            ),
            ("an empty slope", table("1900,2200,40,,,0,\n2200,2500,25,0,,0,\n")),
            ("flat ground by other signs", table("1900,2200,40,0,N,0,\n2200,2500,25,0,-1,0,\n")),
            ("canopy in percent", table("1900,2200,40,25,180,45,\n2200,2500,25,20,0,-0.1,\n")),
            ("a canopy that is not there", table("1900,2200,40,25,180,,\n2200,2500,25,20,0,0,\n")),
            ("an accumulation in percent", table("1900,2200,40,25,180,0,50\n2200,2500,25,20,0,0,\n")),
            (
                "canopy twice",
                "lower_m,upper_m,area_km2,canopy_fraction,canopy_pct\n1900,2200,40,0.4,40\n".to_owned(),
            ),
        ],
    );
    insta::assert_snapshot!(said, @r"
## a slope without its aspect
error: aspect_deg: ''
 --> bands.csv:2:17
  |
2 | 1900,2200,40,25,,0,
  |                 ^ expected the way that the slope faces
  |
  = help: degrees clockwise from north, the way that water runs down: 90 faces east, 180 south; flat ground is slope 0 with an empty aspect

## slopes without aspects
error: slope_deg: '25'
 --> bands.csv:2:14
  |
2 | 1900,2200,40,25
  |              ^^ expected a slope whose aspect is known
  |
  = help: add a column aspect_deg, degrees clockwise from north

## aspects without slopes
error: no column called 'slope_deg'
 --> bands.csv:1:1
  |
1 | lower_m,upper_m,area_km2,aspect_deg
  | ^ expected a column of this name
  |
  = help: an aspect says nothing without a slope: add it
          The file's columns are:
            lower_m
            upper_m
            area_km2
            aspect_deg

## a slope in percent
error: slope_deg: '110'
 --> bands.csv:2:14
  |
2 | 1900,2200,40,110,180,0,
  |              ^^^ expected a number from 0 to 90
  |
  = help: a slope is degrees from the horizontal, 45 degrees are 100 percent; flat ground is slope 0 with an empty aspect

error: slope_deg: '-5'
 --> bands.csv:3:14
  |
3 | 2200,2500,25,-5,0,0,
  |              ^^ expected a number from 0 to 90
  |
  = help: a slope is degrees from the horizontal, 45 degrees are 100 percent; flat ground is slope 0 with an empty aspect

2 faults; nothing was run

## aspects by name and beyond the circle
error: aspect_deg: 'S'
 --> bands.csv:2:17
  |
2 | 1900,2200,40,25,S,0,
  |                 ^ expected a number
  |
  = help: degrees clockwise from north, the way that water runs down: 90 faces east, 180 south; flat ground is slope 0 with an empty aspect

error: aspect_deg: '361'
 --> bands.csv:3:17
  |
3 | 2200,2500,25,20,361,0,
  |                 ^^^ expected a number from 0 to 360
  |
  = help: degrees clockwise from north, the way that water runs down: 90 faces east, 180 south; flat ground is slope 0 with an empty aspect

2 faults; nothing was run

## an empty slope
error: slope_deg: ''
 --> bands.csv:2:14
  |
2 | 1900,2200,40,,,0,
  |              ^ expected a number
  |
  = help: a slope is degrees from the horizontal, 45 degrees are 100 percent; flat ground is slope 0 with an empty aspect

## flat ground by other signs
error: aspect_deg: 'N'
 --> bands.csv:2:16
  |
2 | 1900,2200,40,0,N,0,
  |                ^ expected a number
  |
  = help: degrees clockwise from north, the way that water runs down: 90 faces east, 180 south; flat ground is slope 0 with an empty aspect

error: aspect_deg: '-1'
 --> bands.csv:3:16
  |
3 | 2200,2500,25,0,-1,0,
  |                ^^ expected a number from 0 to 360
  |
  = help: degrees clockwise from north, the way that water runs down: 90 faces east, 180 south; flat ground is slope 0 with an empty aspect

2 faults; nothing was run

## canopy in percent
error: canopy_fraction: '45'
 --> bands.csv:2:21
  |
2 | 1900,2200,40,25,180,45,
  |                     ^^ expected a number from 0 to 1
  |
  = help: write a fraction, 0.45 for 45 percent, or call the column canopy_pct

error: canopy_fraction: '-0.1'
 --> bands.csv:3:19
  |
3 | 2200,2500,25,20,0,-0.1,
  |                   ^^^^ expected a number from 0 to 1
  |
  = help: the share of the band's area that lies under trees; open ground has 0

2 faults; nothing was run

## a canopy that is not there
error: canopy_fraction: ''
 --> bands.csv:2:21
  |
2 | 1900,2200,40,25,180,,
  |                     ^ expected a number
  |
  = help: the share of the band's area that lies under trees; open ground has 0

## an accumulation in percent
error: accumulation_cv: '50'
 --> bands.csv:2:23
  |
2 | 1900,2200,40,25,180,0,50
  |                       ^^ expected a number from 0 to 3
  |
  = help: standard deviation over mean of the snow within the band: 0.5 for 50 percent

## canopy twice
error: the columns 'canopy_fraction' and 'canopy_pct' beside each other
 --> bands.csv:1:1
  |
1 | lower_m,upper_m,area_km2,canopy_fraction,canopy_pct
  | ^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^^ expected each quantity in one unit
  |
  = help: take all but one of them out
");
}

#[test]
fn parts_of_a_range_that_are_none() {
    let table = |rows: &str| format!("{HEADER}{rows}");
    let said = refused_files(
        "bands.csv",
        [
            (
                "the same ground twice",
                table(
                    "1900,2200,40,25,180,0,\n1900,2200,20,25,0,0,\n1900,2200,10,25,180,0,\n2200,2500,25,0,,0,\n",
                ),
            ),
            ("level ground twice", table("1900,2200,40,0,90,0,\n1900,2200,20,0,270,0,\n")),
            ("parts of other edges", table("1900,2200,40,25,180,0,\n1900,2300,20,25,0,0,\n")),
        ],
    );
    insta::assert_snapshot!(said, @r"
## the same ground twice
error: lower_m: '1900'
 --> bands.csv:4:1
  |
4 | 1900,2200,10,25,180,0,
  | ^^^^ expected ground that tells it from the band on line 2, with the same edges
  |
  = help: let them differ in slope, aspect, canopy or accumulation_cv, or join them

## level ground twice
error: lower_m: '1900'
 --> bands.csv:3:1
  |
3 | 1900,2200,20,0,270,0,
  | ^^^^ expected ground that tells it from the band on line 2, with the same edges
  |
  = help: let them differ in slope, aspect, canopy or accumulation_cv, or join them

## parts of other edges
error: lower_m: '1900'
 --> bands.csv:3:1
  |
3 | 1900,2300,20,25,0,0,
  | ^^^^ expected a lower edge not below the upper edge of the band on line 2
  |
  = help: let each band start where the one below ends
");
}
