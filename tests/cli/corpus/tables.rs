//! Files that are no table, or another one than the scenario declares.

use super::super::basin::weather;
use super::{accepted_files, refused_files, rows};

#[test]
fn files_that_are_no_table() {
    let said = refused_files(
        "weather.csv",
        [
            ("a web page", b"<!DOCTYPE html>\n<html><body>Please log in</body></html>\n".to_vec()),
            ("a workbook", b"PK\x03\x04\x14\x00\x06\x00".to_vec()),
            ("a PDF", b"%PDF-1.7\n%\xe2\xe3\xcf\xd3\n".to_vec()),
            ("JSON", b"[\n  {\"date\": \"2000-10-01\", \"tmin_c\": -3.1}\n]\n".to_vec()),
            ("NUL bytes", weather(1).replace("2000-10-05", "2000\0-10-05").into_bytes()),
            ("a scenario", b"title = \"Test fork\"\nseed = 5\n".to_vec()),
            ("empty", Vec::new()),
            ("blank", b"\n  \n\n".to_vec()),
            ("header only", b"date,tmin_c,tmax_c,precip_mm\n".to_vec()),
            ("a line without end", vec![b'a'; 70_000]),
        ],
    );
    insta::assert_snapshot!(said, @r#"
## a web page
error: weather.file: weather.csv: a web page, not a text table
  --> scenario.toml:11:8
   |
11 | file = "weather.csv"
   |        ^^^^^^^^^^^^^ expected a text table
   |
   = help: the download failed or needs a login: open the file in a browser to see what it says, and download the data again

## a workbook
error: weather.file: weather.csv: a workbook or another packed file, not a text table
  --> scenario.toml:11:8
   |
11 | file = "weather.csv"
   |        ^^^^^^^^^^^^^ expected a text table
   |
   = help: open it and save the sheet as CSV

## a PDF
error: weather.file: weather.csv: a PDF document, not a text table
  --> scenario.toml:11:8
   |
11 | file = "weather.csv"
   |        ^^^^^^^^^^^^^ expected a text table
   |
   = help: ask for the table as CSV

## JSON
error: weather.file: weather.csv: a JSON document, not a text table
  --> scenario.toml:11:8
   |
11 | file = "weather.csv"
   |        ^^^^^^^^^^^^^ expected a text table
   |
   = help: ask for the table as CSV

## NUL bytes
error: weather.file: weather.csv: a NUL byte on line 6, so it is no plain text
  --> scenario.toml:11:8
   |
11 | file = "weather.csv"
   |        ^^^^^^^^^^^^^ expected a text table
   |
   = help: if it is UTF-16, two bytes a letter, state encoding = "utf-16" where the scenario names the file; else export the table again as CSV

## a scenario
error: no column called 'date', 'tmin_c', 'tmax_c', 'precip_mm'
 --> weather.csv:1:1
  |
1 | title = "Test fork"
  | ^ expected columns of these names
  |
  = help: that looks like a line of a scenario: name the data file here

## empty
error: weather.csv: no header line
 |
 = note: expected a line of column names, then one line a row
 = help: check that the file was saved whole; remarks above the header must start with the 'comment' sign

## blank
error: weather.csv: no header line
 |
 = note: expected a line of column names, then one line a row
 = help: check that the file was saved whole; remarks above the header must start with the 'comment' sign

## header only
error: weather.csv: no rows below the header
 |
 = note: expected one line a day
 = help: check that the file was saved or downloaded whole

## a line without end
error: weather.file: weather.csv: line 1 is longer than 65536 bytes
  --> scenario.toml:11:8
   |
11 | file = "weather.csv"
   |        ^^^^^^^^^^^^^ expected a text table
   |
   = help: check that it is a table of one line a row
"#);
}

#[test]
fn letters_other_than_declared() {
    let wide = weather(3).encode_utf16().flat_map(u16::to_le_bytes).collect::<Vec<u8>>();
    let latin: Vec<u8> = weather(3)
        .replace("tmin_c", "Tmin (?C)")
        .bytes()
        .map(|byte| if byte == b'?' { 0xb0 } else { byte })
        .collect();
    let said = refused_files(
        "weather.csv",
        [
            ("UTF-16 with a mark", [b"\xff\xfe".to_vec(), wide.clone()].concat()),
            ("UTF-16 without one", wide),
            ("Latin-1", latin),
        ],
    );
    insta::assert_snapshot!(said, @r#"
## UTF-16 with a mark
error: weather.file: weather.csv: UTF-16, two bytes a letter
  --> scenario.toml:11:8
   |
11 | file = "weather.csv"
   |        ^^^^^^^^^^^^^ expected a text table
   |
   = help: state encoding = "utf-16" where the scenario names the file, or save it as UTF-8

## UTF-16 without one
error: weather.file: weather.csv: a NUL byte on line 1, so it is no plain text
  --> scenario.toml:11:8
   |
11 | file = "weather.csv"
   |        ^^^^^^^^^^^^^ expected a text table
   |
   = help: if it is UTF-16, two bytes a letter, state encoding = "utf-16" where the scenario names the file; else export the table again as CSV

## Latin-1
error: weather.file: weather.csv: line 1 is not UTF-8: it holds the byte 0xb0
  --> scenario.toml:11:8
   |
11 | file = "weather.csv"
   |        ^^^^^^^^^^^^^ expected a text table
   |
   = help: if '°' is meant, as western Windows programs write it, state encoding = "latin-1" where the scenario names the file; else save it as UTF-8
"#);
}

#[test]
fn signs_other_than_declared() {
    let comma = rows(|_, cells| cells.join(";").replace('.', ",")).replacen(",", ";", 3);
    let said = refused_files(
        "weather.csv",
        [
            ("semicolons", weather(3).replace(',', ";")),
            ("tabs", weather(3).replace(',', "\t")),
            ("decimal commas between commas", rows(|_, cells| cells.join(",").replace('.', ","))),
            ("semicolons and decimal commas", comma),
        ],
    );
    insta::assert_snapshot!(said, @r#"
## semicolons
error: no column called 'date', 'tmin_c', 'tmax_c', 'precip_mm'
 --> weather.csv:1:1
  |
1 | date;tmin_c;tmax_c;precip_mm
  | ^ expected columns of these names
  |
  = help: the names stand apart by another sign: state separator = ";" where the scenario names the file

## tabs
error: no column called 'date', 'tmin_c', 'tmax_c', 'precip_mm'
 --> weather.csv:1:1
  |
1 | date    tmin_c    tmax_c    precip_mm
  | ^ expected columns of these names
  |
  = help: the names stand apart by another sign: state separator = "\t" where the scenario names the file

## decimal commas between commas
error: 7 cells
 --> weather.csv:2:1
  |
2 | 2000-10-01,0,6,10,6,6,0
  | ^^^^^^^^^^^^^^^^^^^^^^^ expected 4 cells, as in the header
  |
  = help: if numbers have decimal commas, export the table with another separator, or with such numbers in quotes; else take out what is too many

error: 7 cells
 --> weather.csv:3:1
  |
3 | 2000-10-02,0,3,10,5,0,0
  | ^^^^^^^^^^^^^^^^^^^^^^^ expected 4 cells, as in the header
  |
  = help: if numbers have decimal commas, export the table with another separator, or with such numbers in quotes; else take out what is too many

error: 7 cells (and 1092 more faults of this kind)
 --> weather.csv:4:1
  |
4 | 2000-10-03,0,2,10,2,0,0
  | ^^^^^^^^^^^^^^^^^^^^^^^ expected 4 cells, as in the header
  |
  = help: if numbers have decimal commas, export the table with another separator, or with such numbers in quotes; else take out what is too many

3 faults; nothing was run

## semicolons and decimal commas
error: no column called 'date', 'tmin_c', 'tmax_c', 'precip_mm'
 --> weather.csv:1:1
  |
1 | date;tmin_c;tmax_c;precip_mm
  | ^ expected columns of these names
  |
  = help: the names stand apart by another sign: state separator = ";" where the scenario names the file
"#);
}

#[test]
fn headers_that_are_not_where_they_should_be() {
    let sound = weather(3);
    let said = refused_files(
        "weather.csv",
        [
            ("below two lines of words", format!("Station 7 of the north side\nDaily values\n{sound}")),
            ("none at all", sound.split_once('\n').unwrap().1.to_owned()),
            ("in capitals", sound.replacen("tmin_c,tmax_c", "TMIN_C,Tmax_c", 1)),
            ("a column twice", sound.replacen("tmax_c", "tmin_c", 1)),
            ("a name that a terminal would obey", sound.replacen("tmin_c", "tmin\u{1b}[31m_c", 1)),
        ],
    );
    insta::assert_snapshot!(said, @r"
## below two lines of words
error: no column called 'date', 'tmin_c', 'tmax_c', 'precip_mm'
 --> weather.csv:1:1
  |
1 | Station 7 of the north side
  | ^ expected columns of these names
  |
  = help: that name stands on line 3: state header_line = 3 where the scenario names the file, or the sign that the remarks above it start with as comment

## none at all
error: values where the column names should stand
 --> weather.csv:1:1
  |
1 | 2000-10-01,0.6,10.6,6.0
  | ^^^^^^^^^^^^^^^^^^^^^^^ expected 4 names
  |
  = help: add a line of names above it, with ',' between them, and name them where the scenario names the file; if the names stand on a line of their own, state header_line

## in capitals
error: no column called 'tmin_c'
 --> weather.csv:1:1
  |
1 | date,TMIN_C,Tmax_c,precip_mm
  | ^ expected a column of this name
  |
  = help: did you mean 'TMIN_C'? Names are compared letter for letter

error: no column called 'tmax_c'
 --> weather.csv:1:1
  |
1 | date,TMIN_C,Tmax_c,precip_mm
  | ^ expected a column of this name
  |
  = help: did you mean 'Tmax_c'? Names are compared letter for letter

2 faults; nothing was run

## a column twice
error: no column called 'tmax_c'
 --> weather.csv:1:1
  |
1 | date,tmin_c,tmin_c,precip_mm
  | ^ expected a column of this name
  |
  = help: name one of the columns that stand there, letter for letter:
            date
            tmin_c
            tmin_c
            precip_mm

error: more than one column called 'tmin_c'
 --> weather.csv:1:13
  |
1 | date,tmin_c,tmin_c,precip_mm
  |             ^^^^^^ expected each name once
  |
  = help: rename all but one of them

2 faults; nothing was run

## a name that a terminal would obey
error: no column called 'tmin_c'
 --> weather.csv:1:1
  |
1 | date,tmin␛[31m_c,tmax_c,precip_mm
  | ^ expected a column of this name
  |
  = help: name one of the columns that stand there, letter for letter:
            date
            tmin�[31m_c
            tmax_c
            precip_mm
");
}

#[test]
fn rows_that_are_broken() {
    let sound = weather(3);
    let cut = sound.trim_end().rsplit_once(',').unwrap().0.to_owned();
    let said = refused_files(
        "weather.csv",
        [
            ("cut off in its last line", cut),
            ("a row too long", sound.replacen("2000-10-03,", "2000-10-03,7,", 1)),
            ("a quote never closed", sound.replacen("2000-10-03", "\"2000-10-03", 1)),
            (
                "a quote closed rows later",
                sound.replacen("2000-10-03", "\"2000-10-03", 1).replacen("2000-10-05", "2000-10-05\"", 1),
            ),
        ],
    );
    insta::assert_snapshot!(said, @r#"
## cut off in its last line
error: 3 cells
    --> weather.csv:1096:1
     |
1096 | 2003-09-30,0.9,10.9
     | ^^^^^^^^^^^^^^^^^^^ expected 4 cells, as in the header
     |
     = help: check the quotes of this line, and that the file was saved whole

## a row too long
error: 5 cells
 --> weather.csv:4:1
  |
4 | 2000-10-03,7,0.2,10.2,0.0
  | ^^^^^^^^^^^^^^^^^^^^^^^^^ expected 4 cells, as in the header
  |
  = help: if numbers have decimal commas, export the table with another separator, or with such numbers in quotes; else take out what is too many

## a quote never closed
error: 1 cell
 --> weather.csv:4:1
  |
4 | "2000-10-03,0.2,10.2,0.0
  | ^^^^^^^^^^^^^^^^^^^^^^^^ expected 4 cells, as in the header
  |
  = help: a quote opens here and closes lines below, if at all: close it, or take it out

## a quote closed rows later
error: date: '2000-10-03,0.2,10.2,0.0\n2000-10-04,-0.1,10.1,0.0\n2000-10-05'
 --> weather.csv:4:1
  |
4 | "2000-10-03,0.2,10.2,0.0
  | ^^^^^^^^^^^^^^^^^^^^^^^^ expected a date written as %Y-%m-%d
  |
  = help: a quote opens here and closes lines below, if at all: close it, or take it out
"#);
}

/// Tables that look odd and are sound all the same: nothing is said but that there are few years.
#[test]
fn odd_tables_that_are_taken() {
    let said = accepted_files(
        "weather.csv",
        [
            ("separators at every end", weather(3).replace('\n', ",\n")),
            ("blank lines", weather(3).replace('\n', "\n\n")),
            ("blanks around cells", weather(3).replace(',', " , ")),
            ("no line end at the end", weather(3).trim_end().to_owned()),
            ("old line ends", weather(3).replace('\n', "\r")),
            (
                "a column more",
                rows(|_, cells| format!("{},good", cells.join(","))).replacen(
                    "precip_mm",
                    "precip_mm,quality",
                    1,
                ),
            ),
        ],
    );
    insta::assert_snapshot!(said, @r"
## separators at every end
second look: weather.file: only 3 water years are in use: the spread of realizations hardly holds what chance can do

## blank lines
second look: weather.file: only 3 water years are in use: the spread of realizations hardly holds what chance can do

## blanks around cells
second look: weather.file: only 3 water years are in use: the spread of realizations hardly holds what chance can do

## no line end at the end
second look: weather.file: only 3 water years are in use: the spread of realizations hardly holds what chance can do

## old line ends
second look: weather.file: only 3 water years are in use: the spread of realizations hardly holds what chance can do

## a column more
second look: weather.file: only 3 water years are in use: the spread of realizations hardly holds what chance can do
");
}
