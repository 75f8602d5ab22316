//! Units, gauges and hemispheres that are not what the scenario says: the notice tells what they would be instead.

use super::{Basin, accepted, column, refused, small};

const DEGREES: [usize; 2] = [1, 2];

/// A basin whose record has both temperatures changed.
fn temperatures(change: fn(f64) -> f64) -> Basin {
    let basin = small();
    let text = super::rows(|_, cells| {
        let [low, high] = DEGREES.map(|at| change(cells[at].parse().unwrap()));
        format!("{},{low:.1},{high:.1},{}", cells[0], cells[3])
    });
    basin.write_bytes("weather.csv", text);
    basin
}

fn precipitation(change: impl Fn(usize, f64) -> String) -> Basin {
    let basin = small();
    basin.write_bytes("weather.csv", column(3, change));
    basin
}

/// The sum of amounts since 1 October of the first year, as a gauge that nobody empties shows it.
fn accumulating() -> Basin {
    let sum = std::cell::Cell::new(0.0);
    precipitation(move |_, amount| {
        sum.set(sum.get() + amount);
        format!("{:.1}", sum.get())
    })
}

#[test]
fn units_that_leave_no_year() {
    let kelvin = refused(&temperatures(|value| value + 273.15));
    insta::assert_snapshot!(kelvin, @r"
error: weather.csv: no water year that can be used; 2001: temperature or precipitation missing on 365 days, no temperatures for 1095 days from 2000-10-01; 2002: temperature or precipitation missing on 365 days, no temperatures for 1095 days from 2000-10-01; 2003: temperature or precipitation missing on 365 days, no tem...
 |
 = note: expected at least one whole water year of temperature and precipitation
 = help: check weather.tmin.unit: the column's mean is 271.0 degC, 281.9 degC in its warmest month; read as K it would be -2.1 degC; check weather.tmax.unit: the column's mean is 281.1 degC, 292.0 degC in its warmest month; read as K it would be 8.0 degC
");
    let fahrenheit = refused(&temperatures(|value| value * 1.8 + 32.0));
    insta::assert_snapshot!(fahrenheit, @r"
error: weather.csv: no water year that can be used; 2001: temperature or precipitation missing on 95 days, no temperatures for 95 days from 2001-05-30; 2002: temperature or precipitation missing on 96 days, no temperatures for 96 days from 2002-05-29; 2003: temperature or precipitation missing on 95 days, no temperatur...
 |
 = note: expected at least one whole water year of temperature and precipitation
 = help: check weather.tmin.unit: the column's mean is 28.2 degC, 47.9 degC in its warmest month; read as degF it would be -2.1 degC; check weather.tmax.unit: the column's mean is 46.4 degC, 66.1 degC in its warmest month; read as degF it would be 8.0 degC
");
}

#[test]
fn units_that_leave_a_record() {
    let cool = temperatures(|value| (value - 8.0) * 1.8 + 32.0);
    insta::assert_snapshot!(accepted(&cool), @r"
second look: weather.tmin.unit: the column's mean is 13.8 degC, 33.5 degC in its warmest month; read as degF it would be -10.1 degC
second look: weather.tmax.unit: the column's mean is 32.0 degC, 51.7 degC in its warmest month; read as degF it would be 0.0 degC
second look: weather.file: only 3 water years are in use: the spread of realizations hardly holds what chance can do
second look: weather.tmax: 299 values beyond -55 to 45 degC; the first on 2001-05-28 (line 241): 45.5 degC
");
    let celsius = small();
    celsius.exchange("\"tmin_c\", unit = \"degC\"", "\"tmin_c\", unit = \"degF\"");
    celsius.exchange("\"tmax_c\", unit = \"degC\"", "\"tmax_c\", unit = \"degF\"");
    insta::assert_snapshot!(accepted(&celsius), @r"
second look: weather.tmin.unit: the column's mean is -18.9 degC, -12.9 degC in its warmest month; read as degC it would be -2.1 degC
second look: weather.tmax.unit: the column's mean is -13.3 degC, -7.3 degC in its warmest month; read as degC it would be 8.0 degC
second look: weather.file: only 3 water years are in use: the spread of realizations hardly holds what chance can do
second look: snow.start_bare_each_year: in most of the record's years the snow never goes from 2 bands with 100 % of the basin's area; it is carried into the next year and piles up, and the model makes no ice of it: with snow.start_bare_each_year = true it is taken away as each year ends
");
    let inches = precipitation(|_, amount| format!("{:.2}", amount / 25.4));
    insta::assert_snapshot!(accepted(&inches), @r"
second look: weather.precipitation.unit: 32 mm a year; read as cm it would be 323 mm, read as in it would be 819 mm
second look: weather.file: only 3 water years are in use: the spread of realizations hardly holds what chance can do
");
    let millimetres = small();
    millimetres.exchange("unit = \"mm\"", "unit = \"in\"");
    insta::assert_snapshot!(accepted(&millimetres), @r"
second look: weather.precipitation.unit: 20868 mm a year; read as mm it would be 822 mm
second look: weather.file: only 3 water years are in use: the spread of realizations hardly holds what chance can do
second look: snow.start_bare_each_year: in most of the record's years the snow never goes from 2 bands with 100 % of the basin's area; it is carried into the next year and piles up, and the model makes no ice of it: with snow.start_bare_each_year = true it is taken away as each year ends
");
}

#[test]
fn gauges_that_are_not_what_is_said() {
    insta::assert_snapshot!(accepted(&accumulating()), @r#"
second look: weather.precipitation.gauge: the column rises on 273 days and falls on 0, as an accumulating gauge does; read so it would be 820 mm a year: gauge = "accumulating"?
second look: weather.file: only 2 water years are in use: the spread of realizations hardly holds what chance can do
second look: weather.precipitation: 155 amounts above 2000 mm in a day, which no station has measured, taken as missing; the first on 2003-04-29 (line 942): 2007.0 mm
second look: weather.precipitation: 608 amounts above 500 mm in a day; the first on 2001-08-29 (line 334): 504.0 mm
second look: snow.start_bare_each_year: in most of the record's years the snow never goes from 2 bands with 100 % of the basin's area; it is carried into the next year and piles up, and the model makes no ice of it: with snow.start_bare_each_year = true it is taken away as each year ends
"#);
    let daily = small();
    daily.exchange("unit = \"mm\"", "unit = \"mm\", gauge = \"accumulating\", reading = \"end-of-day\"");
    insta::assert_snapshot!(accepted(&daily), @r#"
second look: weather.precipitation.gauge: the column falls on 274 days and rises on 273, as daily amounts do; read so it would be 822 mm a year: gauge = "daily"?
second look: weather.file: only 3 water years are in use: the spread of realizations hardly holds what chance can do
second look: weather.precipitation: 2463 mm of small falls taken for noise: does the gauge accumulate, and in this unit?
second look: weather.precipitation: 91 falls of the gauge to nearly nothing; the first on 2002-10-04 (line 735): from 12.0 mm to 0.0 mm. Was it emptied? They are less than reset_tolerance_mm = 50, so taken for noise; state a smaller one
"#);
}

#[test]
fn a_hemisphere_that_is_not_the_stations() {
    let basin = small();
    basin.exchange("latitude_deg = 40", "latitude_deg = -40");
    insta::assert_snapshot!(accepted(&basin), @r"
second look: weather.file: only 2 water years are in use: the spread of realizations hardly holds what chance can do
second look: basin.latitude_deg: January is the coldest month: is the sign of the latitude right?
second look: snow.start_bare_each_year: in most of the record's years the snow never goes from 2 bands with 100 % of the basin's area; it is carried into the next year and piles up, and the model makes no ice of it: with snow.start_bare_each_year = true it is taken away as each year ends
");
}

/// A sound record in any unit, declared as it is, raises none of these.
#[test]
fn units_that_are_right_are_not_complained_of() {
    for (unit, change) in [
        ("degC", (|value| value) as fn(f64) -> f64),
        ("degF", |value| value * 1.8 + 32.0),
        ("K", |value| value + 273.15),
    ] {
        let basin = temperatures(change);
        basin.exchange("degC", unit);
        assert_eq!(accepted(&basin).lines().count(), 1, "{unit}: nothing but that there are few years");
    }
}
