//! Files and paths that are no scenario, and names that only look odd.

use super::{accepted, refused, refused_files, small};

#[test]
fn files_that_are_no_scenario() {
    let said = refused_files(
        "scenario.toml",
        [
            ("empty", Vec::new()),
            ("binary", (0..=255).collect()),
            ("a workbook", b"PK\x03\x04\x14".to_vec()),
            ("a data file", super::weather(3).into_bytes()),
            ("a web page", b"<html></html>".to_vec()),
            ("Latin-1", b"title = \"caf\xe9\"\n".to_vec()),
        ],
    );
    insta::assert_snapshot!(said, @r#"
## empty
error: scenario.toml: no 'title'
 |
 = note: expected a name for the study
 = help: add title = "..." at the top

error: scenario.toml: no [basin]
 |
 = note: expected a table 'basin'
 = help: add a line [basin] and its keys below it

error: scenario.toml: no [weather]
 |
 = note: expected a table 'weather'
 = help: add a line [weather] and its keys below it

3 faults; nothing was run

## binary
error: scenario.toml: line 2 is not UTF-8: it holds the byte 0x80
 |
 = note: expected a scenario: a TOML file in UTF-8
 = help: save the scenario as plain text in UTF-8

## a workbook
error: scenario.toml: a workbook or another packed file, not a text table
 |
 = note: expected a scenario: a TOML file in UTF-8
 = help: save the scenario as plain text in UTF-8

## a data file
error: no line of this file is key = value, so it is no scenario
 --> scenario.toml:1:5
  |
1 | date,tmin_c,tmax_c,precip_mm
  |     ^ expected a scenario in TOML: key = value, one a line, under [table] lines
  |
  = help: name a scenario here; a data file is named within one, by weather.file or basin.bands

## a web page
error: scenario.toml: a web page, not a text table
 |
 = note: expected a scenario: a TOML file in UTF-8
 = help: save the scenario as plain text in UTF-8

## Latin-1
error: scenario.toml: line 1 is not UTF-8: it holds the byte 0xe9
 |
 = note: expected a scenario: a TOML file in UTF-8
 = help: save the scenario as plain text in UTF-8
"#);
}

/// Folders and paths that lead nowhere.
#[test]
fn paths_that_are_no_files() {
    let basin = small();
    std::fs::create_dir(basin.path().join("folder")).unwrap();
    let mut said =
        ["folder", "nowhere/scenario.toml"].map(|path| basin.run(&format!("check {path}")).stderr).concat();
    basin.exchange("\"weather.csv\"", "\"folder\"");
    basin.exchange("\"bands.csv\"", "\"\"");
    said += &refused(&basin);
    insta::assert_snapshot!(said, @r#"
error: folder: it is a folder, not a file
 |
 = note: expected a scenario: a TOML file in UTF-8
 = help: check the path; `thawline help` shows examples

1 fault; nothing was run
error: nowhere/scenario.toml: there is no such file
 |
 = note: expected a scenario: a TOML file in UTF-8
 = help: check the path; `thawline help` shows examples

1 fault; nothing was run
error: basin.bands: an empty text
 --> scenario.toml:6:9
  |
6 | bands = ""
  |         ^^ expected the path of a CSV file with lower_m, upper_m, area_km2 (or lower_ft, upper_ft, area_mi2)
  |
  = help: add bands = "bands.csv", or area_elevation_curve = { ... }

error: weather.file: folder: it is a folder, not a file
  --> scenario.toml:11:8
   |
11 | file = "folder"
   |        ^^^^^^^^ expected a file that can be read
   |
   = help: the path is relative to the scenario's folder

2 faults; nothing was run
"#);
}

#[test]
fn file_names_with_blanks_quotes_and_letters() {
    let basin = small();
    let name = "Höhe \"A\" d'été.csv";
    std::fs::rename(basin.path().join("weather.csv"), basin.path().join(name)).unwrap();
    basin.exchange("file = \"weather.csv\"", &format!("file = \"\"\"{name}\"\"\""));
    assert_eq!(accepted(&basin).lines().count(), 1);
    basin.write_bytes(name, "date;tmin_c;tmax_c;precip_mm\n");
    insta::assert_snapshot!(refused(&basin), @r#"
error: no column called 'date', 'tmin_c', 'tmax_c', 'precip_mm'
 --> Höhe "A" d'été.csv:1:1
  |
1 | date;tmin_c;tmax_c;precip_mm
  | ^ expected columns of these names
  |
  = help: the names stand apart by another sign: state separator = ";" where the scenario names the file
"#);
}
