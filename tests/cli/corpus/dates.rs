//! Dates that are wrong, mixed, repeated, missing, out of order or few.

use super::super::basin::weather;
use super::{accepted, accepted_files, refused, refused_files, rows, small};

/// A date in another form.
fn written(date: &str, form: &str) -> String {
    chrono::NaiveDate::parse_from_str(date, "%Y-%m-%d").unwrap().format(form).to_string()
}

fn with_dates(date: impl Fn(usize, &str) -> String) -> String {
    rows(|number, cells| format!("{},{}", date(number, cells[0]), cells[1..].join(",")))
}

#[test]
fn dates_that_do_not_read() {
    let forms = ["%Y-%m-%d", "%d.%m.%Y", "%m/%d/%Y"];
    let sound = weather(3);
    let hours = sound.lines().skip(1).take(300).flat_map(|row| {
        let (date, rest) = row.split_once(',').unwrap();
        [0, 6, 12, 18].map(|hour| format!("{date} {hour:02}:00,{rest}\n"))
    });
    let said = refused_files(
        "weather.csv",
        [
            ("three forms", with_dates(|number, date| written(date, forms[number % 3]))),
            ("all in another form", with_dates(|_, date| written(date, "%d.%m.%Y"))),
            ("days or months first", with_dates(|_, date| written(date, "%d/%m/%Y"))),
            ("in no usual form", with_dates(|_, date| written(date, "day %j of %Y"))),
            ("hours", format!("date,tmin_c,tmax_c,precip_mm\n{}", hours.collect::<String>())),
            ("29 February 2003", weather(3).replace("2003-03-01,", "2003-02-29,")),
            ("a day twice", weather(3).replace("2000-10-03,", "2000-10-02,")),
            ("a day too early", weather(3).replace("2001-10-03,", "2000-12-02,")),
            ("a century too late", format!("{}9999-01-01,1,2,3\n", weather(3))),
            ("blank", with_dates(|number, date| if number == 5 { String::new() } else { date.to_owned() })),
        ],
    );
    insta::assert_snapshot!(said, @r#"
## three forms
error: date: '02.10.2000'
 --> weather.csv:3:1
  |
3 | 02.10.2000,0.3,10.5,0.0
  | ^^^^^^^^^^ expected a date written as %Y-%m-%d
  |
  = help: the file mixes forms of dates: write it as the 365 that read well are written

error: date: '10/03/2000'
 --> weather.csv:4:1
  |
4 | 10/03/2000,0.2,10.2,0.0
  | ^^^^^^^^^^ expected a date written as %Y-%m-%d
  |
  = help: the file mixes forms of dates: write it as the 365 that read well are written

error: date: '05.10.2000' (and 727 more faults in this column)
 --> weather.csv:6:1
  |
6 | 05.10.2000,-0.2,9.8,6.0
  | ^^^^^^^^^^ expected a date written as %Y-%m-%d
  |
  = help: the file mixes forms of dates: write it as the 365 that read well are written

3 faults; nothing was run

## all in another form
error: date: '01.10.2000'
 --> weather.csv:2:1
  |
2 | 01.10.2000,0.6,10.6,6.0
  | ^^^^^^^^^^ expected a date written as %Y-%m-%d
  |
  = help: if the file writes dates so, state format = "%d.%m.%Y" in date

error: date: '02.10.2000'
 --> weather.csv:3:1
  |
3 | 02.10.2000,0.3,10.5,0.0
  | ^^^^^^^^^^ expected a date written as %Y-%m-%d
  |
  = help: if the file writes dates so, state format = "%d.%m.%Y" in date

error: date: '03.10.2000' (and 1092 more faults in this column)
 --> weather.csv:4:1
  |
4 | 03.10.2000,0.2,10.2,0.0
  | ^^^^^^^^^^ expected a date written as %Y-%m-%d
  |
  = help: if the file writes dates so, state format = "%d.%m.%Y" in date

3 faults; nothing was run

## days or months first
error: date: '01/10/2000'
 --> weather.csv:2:1
  |
2 | 01/10/2000,0.6,10.6,6.0
  | ^^^^^^^^^^ expected a date written as %Y-%m-%d
  |
  = help: if the file writes dates so, state format = "%d/%m/%Y" in date

error: date: '02/10/2000'
 --> weather.csv:3:1
  |
3 | 02/10/2000,0.3,10.5,0.0
  | ^^^^^^^^^^ expected a date written as %Y-%m-%d
  |
  = help: if the file writes dates so, state format = "%d/%m/%Y" in date

error: date: '03/10/2000' (and 1092 more faults in this column)
 --> weather.csv:4:1
  |
4 | 03/10/2000,0.2,10.2,0.0
  | ^^^^^^^^^^ expected a date written as %Y-%m-%d
  |
  = help: if the file writes dates so, state format = "%d/%m/%Y" in date

3 faults; nothing was run

## in no usual form
error: date: 'day 275 of 2000'
 --> weather.csv:2:1
  |
2 | day 275 of 2000,0.6,10.6,6.0
  | ^^^^^^^^^^^^^^^ expected a date written as %Y-%m-%d
  |
  = help: state the file's own form in date = { column, format }, in the signs of strftime

error: date: 'day 276 of 2000'
 --> weather.csv:3:1
  |
3 | day 276 of 2000,0.3,10.5,0.0
  | ^^^^^^^^^^^^^^^ expected a date written as %Y-%m-%d
  |
  = help: state the file's own form in date = { column, format }, in the signs of strftime

error: date: 'day 277 of 2000' (and 1092 more faults in this column)
 --> weather.csv:4:1
  |
4 | day 277 of 2000,0.2,10.2,0.0
  | ^^^^^^^^^^^^^^^ expected a date written as %Y-%m-%d
  |
  = help: state the file's own form in date = { column, format }, in the signs of strftime

3 faults; nothing was run

## hours
error: date: '2000-10-01 00:00'
 --> weather.csv:2:1
  |
2 | 2000-10-01 00:00,0.6,10.6,6.0
  | ^^^^^^^^^^^^^^^^ expected a date written as %Y-%m-%d
  |
  = help: if the file writes dates so, state format = "%Y-%m-%d %H:%M" in date; there may be one line a day: of hourly values make daily ones first

error: date: '2000-10-01 06:00'
 --> weather.csv:3:1
  |
3 | 2000-10-01 06:00,0.6,10.6,6.0
  | ^^^^^^^^^^^^^^^^ expected a date written as %Y-%m-%d
  |
  = help: if the file writes dates so, state format = "%Y-%m-%d %H:%M" in date; there may be one line a day: of hourly values make daily ones first

error: date: '2000-10-01 12:00' (and 1197 more faults in this column)
 --> weather.csv:4:1
  |
4 | 2000-10-01 12:00,0.6,10.6,6.0
  | ^^^^^^^^^^^^^^^^ expected a date written as %Y-%m-%d
  |
  = help: if the file writes dates so, state format = "%Y-%m-%d %H:%M" in date; there may be one line a day: of hourly values make daily ones first

3 faults; nothing was run

## 29 February 2003
error: date: '2003-02-29'
   --> weather.csv:883:1
    |
883 | 2003-02-29,-9.9,0.3,0.0
    | ^^^^^^^^^^ expected a day that the calendar has
    |
    = help: mend the date, or take the line out

## a day twice
error: date: '2000-10-02'
 --> weather.csv:4:1
  |
4 | 2000-10-02,0.2,10.2,0.0
  | ^^^^^^^^^^ expected a date that line 3 does not have already
  |
  = help: keep one line a day; of hourly values make daily ones first

## a day too early
error: date: '2000-12-02'
   --> weather.csv:369:1
    |
369 | 2000-12-02,0.1,10.3,0.0
    | ^^^^^^^^^^ expected a date after 2001-10-02, which stands on line 368
    |
    = help: sort the lines by date and keep one line a day

## a century too late
error: date: '9999-01-01'
    --> weather.csv:1097:1
     |
1097 | 9999-01-01,1,2,3
     | ^^^^^^^^^^ expected a date within 400 years of the first, 2000-10-01
     |
     = help: check the year

## blank
error: date: ''
 --> weather.csv:7:1
  |
7 | ,-0.5,9.7,0.0
  | ^ expected a date written as %Y-%m-%d
  |
  = help: fill the date in, or take the line out
"#);
}

/// A form that does not fit a sound file is what is wrong, not the calendar: the form that reads the whole file is named,
/// and followed to the letter it is the right one.
#[test]
fn a_wrong_form_with_a_sound_file() {
    let cases = [
        ("%m/%d/%Y", "%Y-%m-%d"),
        ("%m-%d-%Y", "%Y-%m-%d"),
        ("%Y-%d-%m", "%Y-%m-%d"),
        ("%d/%m/%Y", "%m/%d/%Y"),
        ("%m/%d/%Y", "%d/%m/%Y"),
    ];
    for (stated, true_form) in cases {
        let basin = small();
        basin.write_bytes("weather.csv", with_dates(|_, date| written(date, true_form)));
        let place = "station_elevation_m = 2000\n";
        let stating = |form: &str| format!("{place}date = {{ format = \"{form}\" }}\n");
        basin.exchange(place, &stating(stated));
        let said = refused(&basin);
        let advice = format!("if the file writes dates so, state format = \"{true_form}\" in date\n");
        assert_eq!(said.matches(&advice).count(), 3, "{stated} on {true_form}: {said}");
        assert!(!said.contains("calendar") && !said.contains("a date after"), "{said}");
        basin.exchange(&stating(stated), &stating(true_form));
        accepted(&basin);
    }
}

/// Of many days in a form that reads them, one that no year has.
#[test]
fn a_day_that_the_calendar_lacks() {
    for form in ["%Y-%m-%d", "%m/%d/%Y"] {
        let basin = small();
        let place = "station_elevation_m = 2000\n";
        basin.exchange(place, &format!("{place}date = {{ format = \"{form}\" }}\n"));
        let gone = written("2003-03-01", form);
        let text = with_dates(|_, date| written(date, form));
        let never = form.replace("%Y", "2003").replace("%m", "02").replace("%d", "29");
        basin.write_bytes("weather.csv", text.replace(&gone, &never));
        let said = refused(&basin);
        assert!(
            said.contains(&format!("'{never}'")) && said.contains("expected a day that the calendar has")
        );
        assert!(said.contains("help: mend the date, or take the line out"), "{said}");
    }
}

#[test]
fn records_that_are_too_short() {
    let said = refused_files(
        "weather.csv",
        [
            ("one row", weather(1).lines().take(2).collect::<Vec<_>>().join("\n")),
            ("half a year", weather(1).lines().take(180).collect::<Vec<_>>().join("\n")),
            (
                "from January to December",
                weather(2)
                    .lines()
                    .take(1)
                    .chain(weather(2).lines().filter(|row| row.starts_with("2001")))
                    .collect::<Vec<_>>()
                    .join("\n"),
            ),
        ],
    );
    insta::assert_snapshot!(said, @r"
## one row
error: weather.csv: no water year that can be used; 2001: the record begins or ends within it and lacks 364 days
 |
 = note: expected at least one whole water year of temperature and precipitation
 = help: bring a longer record, or set water_year_starts in [season] to the month and day it can start on

## half a year
error: weather.csv: no water year that can be used; 2001: the record begins or ends within it and lacks 186 days
 |
 = note: expected at least one whole water year of temperature and precipitation
 = help: bring a longer record, or set water_year_starts in [season] to the month and day it can start on

## from January to December
error: weather.csv: no water year that can be used; 2001: the record begins or ends within it and lacks 92 days; 2002: the record begins or ends within it and lacks 273 days
 |
 = note: expected at least one whole water year of temperature and precipitation
 = help: bring a longer record, or set water_year_starts in [season] to the month and day it can start on
");
}

#[test]
fn records_that_are_taken() {
    let newest_first = {
        let sound = weather(12);
        let (header, rows) = sound.split_once('\n').unwrap();
        let rows: Vec<&str> = rows.lines().rev().collect();
        format!("{header}\n{}\n", rows.join("\n"))
    };
    let without = |years: i64, gone: fn(&str) -> bool| -> String {
        weather(years).lines().filter(|row| !gone(row)).map(|row| format!("{row}\n")).collect()
    };
    // The made-up years grow wetter and wetter; here they must not.
    let centuries = weather(200)
        .lines()
        .enumerate()
        .map(|(number, row)| match number {
            0 => format!("{row}\n"),
            _ => format!("{},{}.0\n", row.rsplit_once(',').unwrap().0, number % 5),
        })
        .collect();
    let said = accepted_files(
        "weather.csv",
        [
            ("newest first", newest_first),
            ("no 29 February", without(12, |row| row[4..].starts_with("-02-29"))),
            ("one year", weather(1)),
            ("200 years", centuries),
            ("a year missing", without(12, |row| row.starts_with("2004-"))),
        ],
    );
    insta::assert_snapshot!(said, @r"
## newest first


## no 29 February
second look: weather.date: 3 times 29 February, which has no line in any leap year; the first on 2004-02-29. Years of 365 days? Temperatures are interpolated there, and precipitation counts as missing

## one year
second look: weather.file: one water year is in use, so every realization is that year over and over and chance has no spread

## 200 years


## a year missing
");
}

/// The year that is missing and the one it also reaches into are named where the record is described.
#[test]
fn a_missing_year_is_named() {
    let basin = small();
    let text: String =
        weather(12).lines().filter(|row| !row.starts_with("2004-")).map(|row| format!("{row}\n")).collect();
    basin.write_bytes("weather.csv", text);
    let ended = basin.run("check scenario.toml --json");
    let checked: serde_json::Value = serde_json::from_str(&ended.stdout).unwrap();
    let left_out = checked["water_years_left_out"].as_array().unwrap();
    let years: Vec<i64> = left_out.iter().map(|year| year["water_year"].as_i64().unwrap()).collect();
    assert_eq!(years, [2004, 2005], "the calendar year 2004 is part of both water years");
}
