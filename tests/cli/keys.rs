//! Scenario keys that change what is run, against the same study said another way.

use super::basin::{Basin, weather};
use serde_json::Value;

fn json(text: &str) -> Value {
    serde_json::from_str(text).unwrap()
}

fn numbers(value: &Value) -> Vec<f64> {
    value.as_array().unwrap().iter().map(|number| number.as_f64().unwrap()).collect()
}

/// Median period values of the headline by level.
fn medians(basin: &Basin) -> Vec<f64> {
    let ended = basin.run("study scenario.toml --quiet");
    assert_eq!(ended.status, 0, "{}", ended.stderr);
    let summary = json(&basin.read("output/scenario/summary.json"));
    let levels = summary["findings"]["basin"][0]["levels"].as_array().unwrap();
    levels.iter().map(|level| level["periods"]["q50"].as_f64().unwrap()).collect()
}

fn same(a: &[f64], b: &[f64]) {
    assert_eq!(a.len(), b.len());
    for (a, b) in a.iter().zip(b) {
        assert!((a - b).abs() <= 1e-9 * b.abs().max(1.0), "{a} and {b}; only rounding may part them");
    }
}

/// 1.0 local degrees per global one and 1.2 degC in the record: levels of 1.2, 2.2 and 3.2 global are 0, 1 and 2 local.
#[test]
fn global_levels_are_the_local_ones_they_stand_for() {
    let basin = Basin::new();
    basin.exchange("levels_c = [0, 2]", "levels_c = [0, 1, 2]");
    let local = medians(&basin);
    basin.exchange(
        "levels_c = [0, 1, 2]",
        "global = { levels_c = [3.2, 2.2, 1.2], local_per_global = 1.0, already_in_record_global_c = 1.2 }",
    );
    same(&medians(&basin), &local);
    let checked = basin.run("check scenario.toml").stdout;
    assert!(checked.contains("+2 °C here is +3.2 °C of global warming"), "{checked}");
    basin.exchange("local_per_global = 1.0", "local_per_global = 1.5");
    let levels = json(&basin.run("check scenario.toml --json").stdout)["levels_c"].clone();
    // By hand: 1.5 times 0, 1.0 and 2.0.
    same(&numbers(&levels), &[0.0, 1.5, 3.0]);
}

/// (1 + 5/100)^2 is 1.1025: 5 % per degC at +2 degC is 10.25 % at that level, however it is written.
#[test]
fn precipitation_stated_by_level_by_month_and_per_degree() {
    let basin = Basin::new();
    let none = medians(&basin);
    basin.exchange("levels_c = [0, 2]", "levels_c = [0, 2]\nprecipitation_change_pct_per_c = 5");
    let per_degree = medians(&basin);
    assert!(per_degree[0] == none[0] && per_degree[1] > none[1]);
    let twelve = |pct: &str| format!("[{}]", [pct; 12].join(", "));
    let mut typed = "precipitation_change_pct_per_c = 5".to_owned();
    let forms = [
        "precipitation_change_pct = 10.25".to_owned(),
        "precipitation_change_pct = [0, 10.25]".to_owned(),
        format!("precipitation_change_pct = {}", twelve("10.25")),
        format!("precipitation_change_pct = [[0], {}]", twelve("10.25")),
        format!("precipitation_change_pct_per_c = {}", twelve("5")),
    ];
    for form in forms {
        basin.exchange(&typed, &form);
        same(&medians(&basin), &per_degree);
        typed = form;
    }
    // Snow falls in the cool half of the year alone, so more precipitation in July leaves 1 April as it was.
    basin.exchange(&typed, "precipitation_change_pct = [0, 0, 0, 0, 0, 0, 50, 0, 0, 0, 0, 0]");
    same(&medians(&basin), &none);
    basin.exchange("0, 50, 0", "0, 50");
    let ended = basin.run("check scenario.toml");
    assert!(ended.status == 3 && ended.stderr.contains("12 (one a month)"), "{}", ended.stderr);
}

/// What `check` says of each band, against sums of the daily table that `daily` writes.
#[test]
fn the_bands_climate_is_that_of_the_daily_table() {
    let basin = Basin::new();
    let checked = json(&basin.run("check scenario.toml --json").stdout);
    let daily = basin.run("daily scenario.toml").stdout;
    let rows: Vec<Vec<&str>> = daily.lines().skip(1).map(|line| line.split(',').collect()).collect();
    for (at, band) in checked["bands"].as_array().unwrap().iter().enumerate() {
        let of_band: Vec<&Vec<&str>> = rows.iter().filter(|row| row[1] == (at + 1).to_string()).collect();
        let sum = |column: usize| of_band.iter().map(|row| row[column].parse::<f64>().unwrap()).sum::<f64>();
        let winter: Vec<f64> = of_band
            .iter()
            .filter(|row| ["12", "01", "02"].contains(&&row[0][5..7]))
            .map(|row| row[2].parse().unwrap())
            .collect();
        let freezing = winter.iter().filter(|mean_c| **mean_c < 0.0).count() as f64 / winter.len() as f64;
        let found = |name: &str| band[name].as_f64().unwrap();
        same(
            &["winter_mean_c", "winter_freezing_share", "precipitation_mm", "snowfall_mm", "snow_fraction"]
                .map(found),
            &[
                winter.iter().sum::<f64>() / winter.len() as f64,
                freezing,
                (sum(3) + sum(4)) / 3.0,
                sum(4) / 3.0,
                sum(4) / (sum(3) + sum(4)),
            ],
        );
        assert_eq!(band["seasonal_years"], 3);
    }
    // Bands of 40 km2 from 1900 to 2200 m and 25 km2 above; the station at 2000 m has a third of the lower band below it.
    let beyond = &checked["area_beyond_stations"];
    same(
        &["share_below", "share_above"].map(|name| beyond[name].as_f64().unwrap()),
        &[40.0 / 3.0 / 65.0, (40.0 * 2.0 / 3.0 + 25.0) / 65.0],
    );
}

/// Years that warm by half a degree each: detrended to the last, realizations are those of a record that was that warm in
/// every year; the record itself, and its daily table, stay as observed.
#[test]
fn detrending_reaches_realizations_and_nothing_else() {
    let year_of = |line: &str| -> f64 {
        let (year, month) = (line[..4].parse::<f64>().unwrap(), line[5..7].parse::<u32>().unwrap());
        if month >= 10 { year + 1.0 } else { year }
    };
    let warmed = |by: fn(f64) -> f64| -> String {
        let text = weather(9);
        let mut lines = text.lines();
        let mut warmed = format!("{}\n", lines.next().unwrap());
        for line in lines {
            let cells: Vec<&str> = line.split(',').collect();
            let [low, high] = [1, 2].map(|at| cells[at].parse::<f64>().unwrap() + by(year_of(line)));
            warmed += &format!("{},{low:.2},{high:.2},{}\n", cells[0], cells[3]);
        }
        warmed
    };
    let basin = Basin::new();
    basin.write("weather.csv", &warmed(|_| 4.0));
    let level = medians(&basin);
    basin.write("weather.csv", &warmed(|year| 0.5 * (year - 2001.0)));
    let observed = basin.run("daily scenario.toml").stdout;
    let trending = medians(&basin);
    assert!((trending[0] - level[0]).abs() > 10.0, "{trending:?} {level:?}");
    basin.exchange("station_elevation_m = 2000", "station_elevation_m = 2000\ndetrend_to = 2009");
    let detrended = medians(&basin);
    // The seasons of the made-up years differ by some hundredths of a degree, since the cosine is not a whole year long.
    assert!((detrended[0] - level[0]).abs() < 3.0, "{detrended:?} {level:?}");
    assert_eq!(basin.run("daily scenario.toml").stdout, observed);
    let summary = json(&basin.read("output/scenario/summary.json"));
    let slope = summary["record"]["detrended"]["cool"]["slope_per_year"].as_f64().unwrap();
    assert!((slope - 0.5).abs() < 0.02, "{slope}");
    basin.write("weather.csv", &weather(3));
    let short = basin.run("study scenario.toml");
    assert!(short.status == 3 && short.stderr.contains("weather.detrend_to"), "{}", short.stderr);
}

/// A day that no season explains is said; asked for, it is taken as missing and its neighbours fill it.
#[test]
fn a_failing_sensor_is_said_and_left_out_where_asked() {
    let basin = Basin::new();
    let sound = weather(6);
    basin.write("weather.csv", &sound);
    let plain = basin.run("daily scenario.toml").stdout;
    let line = sound.lines().find(|line| line.starts_with("2003-01-15,")).unwrap();
    let cells: Vec<&str> = line.split(',').collect();
    basin
        .write("weather.csv", &sound.replace(line, &format!("{},-51.0,{},{}", cells[0], cells[2], cells[3])));
    let checked = basin.run("check scenario.toml").stdout.split_whitespace().collect::<Vec<_>>().join(" ");
    assert!(
        checked.contains("weather.tmin: 1 value more than 25 degC from the median of their time of year; the first on 2003-01-15"),
        "{checked}"
    );
    let failing = basin.run("daily scenario.toml").stdout;
    assert_ne!(failing, plain);
    basin.exchange("station_elevation_m = 2000", "station_elevation_m = 2000\ntemperature_departure_c = 25");
    let mended = basin.run("daily scenario.toml").stdout;
    let mean = |text: &str, band: &str| -> f64 {
        let row = text.lines().find(|line| line.starts_with(&format!("2003-01-15,{band},"))).unwrap();
        row.split(',').nth(2).unwrap().parse().unwrap()
    };
    // Between two neighbours of a smooth year, rounded to a tenth: within 0.2 degC of what the sensor should have read.
    assert!((mean(&mended, "1") - mean(&plain, "1")).abs() < 0.2);
    let record = json(&basin.run("check scenario.toml --json").stdout)["record"].clone();
    assert_eq!(
        (record["far_temperature_cells"].as_u64(), record["interpolated_days"].as_u64()),
        (Some(1), Some(1))
    );
}

/// Twenty days at one temperature are said; asked for, they are missing, and cost their year.
#[test]
fn a_stuck_sensor_is_said_and_left_out_where_asked() {
    let basin = Basin::new();
    let stuck = |line: &str| -> String {
        if line.starts_with("2003-03-1") || line.starts_with("2003-03-2") {
            let cells: Vec<&str> = line.split(',').collect();
            format!("{},0.0,0.0,{}\n", cells[0], cells[3])
        } else {
            format!("{line}\n")
        }
    };
    basin.write("weather.csv", &weather(4).lines().map(stuck).collect::<String>());
    let checked = basin.run("check scenario.toml").stdout.split_whitespace().collect::<Vec<_>>().join(" ");
    for column in ["tmin", "tmax"] {
        let said = format!(
            "weather.{column}: 20 values in runs of 10 or more days on which it did not change; the first on 2003-03-10"
        );
        assert!(checked.contains(&said), "{checked}");
    }
    basin.exchange("station_elevation_m = 2000", "station_elevation_m = 2000\nstuck_temperature_days = 10");
    let document = json(&basin.run("check scenario.toml --json").stdout);
    assert_eq!(document["record"]["stuck_temperature_cells"], 40);
    assert_eq!(document["water_years_in_use"], serde_json::json!([2001, 2002, 2004]));
}

/// The same record in another agency's dress: dates in three columns, semicolons, decimal commas, prose above the header,
/// the newest day first, a mark for traces.
#[test]
fn another_agencys_file_is_the_same_record() {
    let basin = Basin::new();
    let plain = basin.run("daily scenario.toml").stdout;
    let text = weather(3);
    let mut rows: Vec<String> = text
        .lines()
        .skip(1)
        .map(|line| {
            let cells: Vec<&str> = line.split(',').collect();
            let [low, high] = [1, 2].map(|at| cells[at].replace('.', ","));
            let amount = if cells[3] == "0.0" { "T".to_owned() } else { cells[3].replace('.', ",") };
            let [year, month, day] = [&line[..4], &line[5..7], &line[8..10]];
            format!("{day};{month};{year};\"{high}\";{low};{amount};ok;")
        })
        .collect();
    rows.reverse();
    let head = "Export of the day; all rights reserved\nStation Höhe; 2000 m\n\nTag;Monat;Jahr;Max °C;Min °C;Niederschlag;Güte;\n";
    let latin1: Vec<u8> = format!("{head}{}\n", rows.join("\n")).chars().map(|letter| letter as u8).collect();
    std::fs::write(basin.path().join("weather.csv"), latin1).unwrap();
    basin.exchange(
        "tmin = { column = \"tmin_c\", unit = \"degC\" }",
        "date = { columns = [\"Jahr\", \"Monat\", \"Tag\"] }\nseparator = \";\"\ndecimal = \",\"\nencoding = \"latin-1\"\n\
         header_line = 4\ntmin = { column = \"Min °C\", unit = \"degC\" }",
    );
    basin.exchange("column = \"tmax_c\"", "column = \"Max °C\"");
    basin.exchange(
        "column = \"precip_mm\", unit = \"mm\"",
        "column = \"Niederschlag\", unit = \"mm\", trace = [\"T\"]",
    );
    let ended = basin.run("daily scenario.toml");
    assert_eq!(ended.status, 0, "{}", ended.stderr);
    assert_eq!(ended.stdout, plain);
}

/// Words of `check`, on one line.
fn checked(basin: &Basin, flags: &str) -> String {
    let ended = basin.run(&format!("check scenario.toml {flags}"));
    assert_eq!(ended.status, 0, "{}", ended.stderr);
    ended.stdout.split_whitespace().collect::<Vec<_>>().join(" ")
}

/// What a setting has settled needs no second look, and a year that the user leaves out is named.
#[test]
fn years_and_values_that_the_user_takes_out() {
    let basin = Basin::new();
    let sound = weather(6);
    let (_, after) = sound.split_once("2003-01-15,").unwrap();
    let low = after.split(',').next().unwrap();
    basin.write("weather.csv", &sound.replace(&format!("2003-01-15,{low}"), "2003-01-15,-51.0"));
    assert!(checked(&basin, "").contains("from the median of their time of year; the first on 2003-01-15"));
    basin.exchange(
        "station_elevation_m = 2000",
        "station_elevation_m = 2000\ntemperature_departure_c = 25\nleave_out_water_years = [2002]",
    );
    let said = checked(&basin, "");
    assert!(
        said.contains("left out 2002: as the scenario asks") && said.contains("5 of 6, from 2001"),
        "{said}"
    );
    assert!(!said.contains("median of their time of year"), "{said}");
    basin.exchange("[2002]", "[2002.5]");
    assert!(
        basin
            .run("check scenario.toml")
            .stderr
            .contains("water years, each named for the year in which it ends")
    );
}

/// Changes that even out over the months are none of 'the same'; shapes are said, and one too many is a fault.
#[test]
fn what_levels_do_by_month_is_said() {
    let basin = Basin::new();
    assert!(checked(&basin, "").contains("precipitation the same at every level"));
    let months = |value: &str| format!("[{}]", [value, "-50"].repeat(6).join(", "));
    basin.exchange(
        "levels_c = [0, 2]",
        &format!("levels_c = [0, 2]\nprecipitation_change_pct = {}", months("50")),
    );
    assert!(checked(&basin, "").contains("−50.0 to +50.0 % at +2 °C"));
    let two = format!("[{}]", ["2"; 12].join(", "));
    basin.exchange("levels_c = [0, 2]", &format!("levels_c = [0, 2]\ntmin_monthly_shape = {two}"));
    let said = checked(&basin, "");
    // Minima warm by 2 and maxima by 1 for each degree of the level: the mean by 1.5.
    assert!(said.contains("averages 1.500") && said.contains("warming.tmax_monthly_shape = [1, 1"), "{said}");
    basin.exchange(
        "tmin_monthly",
        &format!("monthly_shape = {two}\ntmax_monthly_shape = {two}\ntmin_monthly"),
    );
    assert!(
        basin.run("check scenario.toml").stderr.contains("monthly_shape beside those of minima and maxima")
    );
}

/// A seed on the command line leaves no default in force; a global level may not become an absurd one of the basin's own;
/// a water year that cuts the usual window has none.
#[test]
fn defaults_and_ranges_that_hang_on_other_keys() {
    let basin = Basin::new();
    basin.exchange("seed = 5\n", "");
    assert!(
        checked(&basin, "").contains(" seed = 1 ") && !checked(&basin, "--seed 7").contains(" seed = 1 ")
    );
    basin.exchange("years = 5\n", "years = 5\n[season]\nwater_year_starts = \"07-01\"\n");
    assert!(checked(&basin, "").contains("season.volume_windows = []"));
    let global = "global = { levels_c = [15], local_per_global = 5, already_in_record_global_c = -1 }";
    basin.exchange("levels_c = [0, 2]", global);
    let refused = basin.run("check scenario.toml");
    assert!(
        refused.status == 3 && refused.stderr.contains("a level that is 80.0 degC of the basin's own"),
        "{}",
        refused.stderr
    );
}

/// Minima and maxima exchanged: no year is left, and the advice gives the record back.
#[test]
fn exchanged_columns_are_recognised() {
    let basin = Basin::new();
    let plain = basin.run("daily scenario.toml").stdout;
    basin.write("weather.csv", &weather(3).replacen("tmin_c,tmax_c", "tmax_c,tmin_c", 1));
    let refused = basin.run("daily scenario.toml");
    assert!(
        refused.status == 3 && refused.stderr.contains("exchange the columns of tmin and tmax"),
        "{}",
        refused.stderr
    );
    let text = basin.read("scenario.toml");
    let [low, high] = ["column = \"tmin_c\"", "column = \"tmax_c\""];
    basin.write(
        "scenario.toml",
        &text.replace(low, "column = \"?\"").replace(high, low).replace("column = \"?\"", high),
    );
    assert_eq!(basin.run("daily scenario.toml").stdout, plain);
}
