//! A fault in one key keeps no other fault back: neither those of other keys nor those of the files.

use super::super::basin::weather;
use super::{refused, small};

#[test]
fn faults_of_files_beside_faults_of_keys() {
    let basin = small();
    for (from, to) in [
        ("station_elevation_m = 2000", "station_elevation_m = 9029\ngauge_multiplier = { snow = -1 }"),
        ("temperature_gradient_c_per_km = -6.0", "temperature_gradient_c_per_km = 6.0"),
    ] {
        basin.exchange(from, to);
    }
    basin.write("weather.csv", &weather(3).replacen(",6.0\n", ",M\n", 1));
    basin.write("bands.csv", "lower_m,upper_m,area_km2\n1900,2200,-40\n2200,2500,25\n");
    insta::assert_snapshot!(refused(&basin), @r#"
error: basin.temperature_gradient_c_per_km: 6
 --> scenario.toml:7:33
  |
7 | temperature_gradient_c_per_km = 6.0
  |                                 ^^^ expected a negative number, since it is colder higher up
  |
  = help: did you mean -6?

error: weather.station_elevation_m: 9029
  --> scenario.toml:12:23
   |
12 | station_elevation_m = 9029
   |                       ^^^^ expected a number from -500 to 9000
   |
   = help: in metres above the sea: 9029 ft is 2752 m, or write station_elevation_ft = 9029

error: weather.gauge_multiplier.snow: -1
  --> scenario.toml:13:29
   |
13 | gauge_multiplier = { snow = -1 }
   |                             ^^ expected a number from 0.1 to 5
   |
   = help: 1.1 says that 10 % more fell than was caught

error: area_km2: '-40'
 --> bands.csv:2:11
  |
2 | 1900,2200,-40
  |           ^^^ expected an area above 0
  |
  = help: leave out bands without area

error: precip_mm: 'M'
 --> weather.csv:2:21
  |
2 | 2000-10-01,0.6,10.6,M
  |                     ^ expected a number or a mark for 'not measured'
  |
  = help: if it is such a mark, add it to 'missing' where the scenario names the file

5 faults; nothing was run
"#);
}
