//! Faults of the data files: file, line and column, from both files in one go.

use super::basin::{Basin, weather};

/// Cells that are no numbers, a date twice, a negative amount and a band upside down, all at once.
#[test]
fn cells_are_named_by_line_and_column() {
    let basin = Basin::new();
    let broken = weather(3)
        .replace("2000-10-03,", "2000-10-02,")
        .replace("2000-12-24,", "24.12.2000,")
        .replacen("9.0\n", "-9.0\n", 1)
        .replacen("0.0\n", "trace\n", 1);
    basin.write("weather.csv", &broken);
    basin.write("bands.csv", "lower_m,upper_m,area_km2\n2200,1800,40\n2200,2800,NaN\n");
    let ended = basin.run("check scenario.toml");
    assert_eq!(ended.status, 3);
    insta::assert_snapshot!(ended.stderr, @r#"
error: upper_m: '1800'
 --> bands.csv:2:6
  |
2 | 2200,1800,40
  |      ^^^^ expected an upper edge above the lower
  |
  = help: check the two edges

error: area_km2: 'NaN'
 --> bands.csv:3:11
  |
3 | 2200,2800,NaN
  |           ^^^ expected a number
  |
  = help: fill it in, or take the line out

error: precip_mm: 'trace'
 --> weather.csv:3:21
  |
3 | 2000-10-02,0.3,10.5,trace
  |                     ^^^^^ expected a number or a mark for 'not measured'
  |
  = help: if it is such a mark, add it to 'missing' where the scenario names the file

error: date: '2000-10-02'
 --> weather.csv:4:1
  |
4 | 2000-10-02,0.2,10.2,0.0
  | ^^^^^^^^^^ expected a date that line 3 does not have already
  |
  = help: keep one line a day; of hourly values make daily ones first

error: date: '24.12.2000'
  --> weather.csv:86:1
   |
86 | 24.12.2000,-12.3,-2.3,6.0
   | ^^^^^^^^^^ expected a date written as %Y-%m-%d
   |
   = help: write it as the 1094 dates that read well are written

error: precip_mm: '-9.0'
   --> weather.csv:370:21
    |
370 | 2001-10-04,0.1,10.1,-9.0
    |                     ^^^^ expected a daily amount of 0 or more
    |
    = help: if the gauge accumulates, say so with gauge = "accumulating"; else add the mark to 'missing'

6 faults; nothing was run
"#);
}

/// A column that is not there is answered with those that are.
#[test]
fn a_missing_column_names_the_header() {
    let basin = Basin::new();
    basin.exchange("\"precip_mm\"", "\"rain\"");
    let ended = basin.run("check scenario.toml");
    assert_eq!(ended.status, 3);
    assert!(ended.stderr.contains("no column called 'rain'"), "{}", ended.stderr);
    let names = "\n            date\n            tmin_c\n            tmax_c\n            precip_mm\n";
    assert!(ended.stderr.contains(names), "{}", ended.stderr);
}

/// Files that are no tables of weather end with status 3 and a message, never a panic.
#[test]
fn hostile_files_are_refused() {
    let header = "date,tmin_c,tmax_c,precip_mm\n";
    let year = weather(1);
    let files = [
        ("empty", String::new()),
        ("header only", header.to_owned()),
        ("one day", format!("{header}2000-10-01,1,2,3\n")),
        ("a web page", "<!doctype html><html><body>Not found</body></html>".to_owned()),
        ("huge values", year.replace(",6.0\n", ",1e308\n").replace(",0.0\n", ",1e309\n")),
        ("NaN", year.replace(",0.0\n", ",NaN\n")),
        ("NUL bytes", year.replace("2000-10-05", "2000\0-10-05")),
        ("ragged", year.replace("2000-10-05,", "")),
        ("a far date", format!("{year}9999-01-01,1,2,3\n")),
        ("all missing", year.lines().map(|line| format!("{},,,\n", &line[..line.len().min(10)])).collect()),
    ];
    for (name, text) in files {
        let basin = Basin::new();
        basin.write("weather.csv", &text);
        let ended = basin.run("study scenario.toml");
        assert_eq!(ended.status, 3, "{name}: {}", ended.stderr);
        assert!(ended.stderr.contains("weather.csv"), "{name}: {}", ended.stderr);
        assert!(!basin.path().join("output").exists(), "{name}: something was written");
    }
}

/// 29 February where there is none is a date that cannot be read.
#[test]
fn the_29th_of_february_2003() {
    let basin = Basin::new();
    basin.write("weather.csv", &weather(3).replace("2003-03-01,", "2003-02-29,"));
    let ended = basin.run("check scenario.toml");
    assert_eq!(ended.status, 3);
    assert!(ended.stderr.contains("'2003-02-29'"), "{}", ended.stderr);
}

/// A byte-order mark, CRLF line ends, remarks, quotes and blank cells are read as what they are.
#[test]
fn the_same_record_in_other_clothes() {
    let basin = Basin::new();
    let plain = basin.run("daily scenario.toml");
    let dressed = weather(3).replace("date,tmin_c", "# remark\n\"date\",tmin_c").replace('\n', "\r\n");
    basin.write("weather.csv", &format!("\u{feff}{dressed}"));
    let other = basin.run("daily scenario.toml");
    assert_eq!((plain.status, other.status), (0, 0), "{}", other.stderr);
    assert!(plain.stdout == other.stdout, "the daily tables differ");
}

/// The same weather in degF and inches from an accumulating start-of-day gauge with semicolons gives the same snow, to
/// what the printed digits can carry (0.0001 in and 0.0001 degF, summed over a winter: 0.5 mm).
#[test]
fn the_same_record_in_other_units() {
    let basin = Basin::new();
    let plain = basin.run("study scenario.toml --json");
    let mut gauge_in = 0.0;
    let mut text = String::from("date;tmin;tmax;gauge\n");
    for line in weather(3).lines().skip(1) {
        let cells: Vec<&str> = line.split(',').collect();
        let number = |at: usize| cells[at].parse::<f64>().unwrap();
        if cells[0].ends_with("-10-01") {
            gauge_in = 0.0;
        }
        let (low, high) = (number(1) * 1.8 + 32.0, number(2) * 1.8 + 32.0);
        text += &format!("{};{low:.4};{high:.4};{gauge_in:.4}\n", cells[0]);
        gauge_in += number(3) / 25.4;
    }
    basin.write("agency.csv", &text);
    basin.exchange("file = \"weather.csv\"", "file = \"agency.csv\"\nseparator = \";\"");
    basin.exchange("\"tmin_c\", unit = \"degC\"", "\"tmin\", unit = \"degF\"");
    basin.exchange("\"tmax_c\", unit = \"degC\"", "\"tmax\", unit = \"degF\"");
    basin.exchange(
        "\"precip_mm\", unit = \"mm\"",
        "\"gauge\", unit = \"in\", gauge = \"accumulating\", reading = \"start-of-day\"",
    );
    let other = basin.run("study scenario.toml --json --into other");
    assert_eq!((plain.status, other.status), (0, 0), "{}{}", plain.stderr, other.stderr);
    let median = |file: &str| {
        let summary: serde_json::Value = serde_json::from_str(&basin.read(file)).unwrap();
        summary["findings"]["basin"][0]["levels"][0]["periods"]["q50"].as_f64().unwrap()
    };
    let (a, b) = (median("output/scenario/summary.json"), median("other/summary.json"));
    assert!(a > 50.0 && (a - b).abs() < 0.5, "{a} mm against {b} mm");
}

/// A column cannot be two quantities at once.
#[test]
fn one_column_for_two_quantities() {
    for (from, to) in
        [("\"tmax_c\"", "\"tmin_c\""), ("\"tmax_c\"", "\"precip_mm\""), ("\"precip_mm\"", "\"date\"")]
    {
        let basin = Basin::new();
        basin.exchange(from, to);
        let ended = basin.run("check scenario.toml");
        assert_eq!(ended.status, 3, "{from} as {to}");
        assert!(ended.stderr.contains("one column named for two quantities"), "{}", ended.stderr);
    }
}

/// Values that no station has measured are taken as missing, counted and said; the study runs on what is left.
#[test]
fn impossible_values_are_missing_and_said() {
    let basin = Basin::new();
    let plain = basin.run("daily scenario.toml");
    let broken =
        weather(3).replacen(",6.0\n", ",1e300\n", 1).replace("2001-05-06,", "2001-05-06,-999,999,0.0\n#");
    basin.write("weather.csv", &broken);
    let ended = basin.run("study scenario.toml");
    assert_eq!(ended.status, 0, "{}", ended.stderr);
    for (column, value) in [("tmin", "-999.0 degC"), ("tmax", "999.0 degC"), ("precipitation", "1e300 mm")] {
        let said =
            ended.stderr.lines().find(|line| line.starts_with(&format!("second look: weather.{column}: 1 ")));
        assert!(
            said.is_some_and(|line| line.contains("taken as missing") && line.ends_with(value)),
            "{}",
            ended.stderr
        );
    }
    let daily = basin.run("daily scenario.toml");
    assert_eq!(daily.stdout.lines().count(), plain.stdout.lines().count());
    assert_ne!(daily.stdout, plain.stdout);
}

/// Ten thousand bands, or a scenario of nothing but faults, are answered at once.
#[test]
fn too_much_of_everything() {
    let basin = Basin::new();
    let bands: String = (0..10_000).map(|band| format!("{},{},1\n", band, band + 1)).collect();
    basin.write("bands.csv", &format!("lower_m,upper_m,area_km2\n{bands}"));
    let ended = basin.run("check scenario.toml");
    assert_eq!(ended.status, 3);
    assert!(ended.stderr.contains("more than 1000 bands"), "{}", ended.stderr);
    let keys: String = (0..20_000).map(|key| format!("k{key} = 1\n")).collect();
    basin.write("scenario.toml", &keys);
    let ended = basin.run("check scenario.toml");
    assert_eq!(ended.status, 3);
    assert!(ended.stderr.contains("20003 faults") && ended.stderr.len() < 50_000, "{}", ended.stderr.len());
}
