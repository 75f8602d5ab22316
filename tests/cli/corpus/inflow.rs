//! Slips in `[inflow]`, and files of observed inflow that are none.

use super::super::basin::Basin;
use super::small;
use thawline::inflow::{FlowColumn, FlowColumns, read};
use thawline::table::{DateColumn, Format};
use thawline::units::FlowUnit;

/// Sound tables of what becomes of the water.
pub const OPERATIONS: &str = r#"
[inflow]
runoff_fraction = 0.6
recession_days = 4
year_class_limits_hm3 = [10, 20]
[inflow.slow]
share = 0.3
recession_days = 60

[reservoir]
name = "Lantern Reservoir"
capacity_hm3 = 40
dead_storage_hm3 = 5
starting_storage_hm3 = 20
release_capacity_m3_per_s = 20
minimum_release_m3_per_s = 0.2
demand_hm3_per_month = [1, 1, 1, 2, 5, 7, 8, 7, 4, 2, 1, 1]
evaporation_hm3_per_month = 0.1
storage_dates = ["04-01"]
full_share = 0.98
[[reservoir.flood_space]]
on = "11-01"
storage_not_above_hm3 = 30
[[reservoir.flood_space]]
on = "06-01"
storage_not_above_hm3 = 40
[reservoir.changes]
refill_moved_days = [-20, 10]
flood_space_times = [0.5]
demand_times = [0.9]
"#;

/// Every fault on two lines: what it is about, then what the caret stands under, what is expected there and how to mend it.
pub fn told(stderr: &str) -> String {
    let faults = stderr.split("error: ").skip(1).map(|fault| {
        let lines: Vec<&str> = fault.lines().collect();
        let (mut at, mut expected, mut mend) = ("the file", "", "");
        for (above, line) in lines.iter().zip(&lines[1..]) {
            let after_bar = line.split_once("| ").filter(|(before, _)| before.trim().is_empty());
            if let Some((_, marked)) = after_bar
                && marked.trim_start().starts_with('^')
            {
                let indent = marked.len() - marked.trim_start().len();
                let carets = marked.trim_start().chars().take_while(|sign| *sign == '^').count();
                let source = above.split_once("| ").unwrap().1;
                (at, expected) = (&source[indent..indent + carets], marked[indent + carets..].trim());
            }
            expected = line.trim().strip_prefix("= note: ").unwrap_or(expected);
            mend = line.trim().strip_prefix("= help: ").unwrap_or(mend);
        }
        format!("{}\n  at {at}: {expected}; {mend}\n", lines[0])
    });
    faults.collect()
}

/// What is said of the tables with one text after another exchanged.
pub fn slips(cases: &[(&str, &str)]) -> String {
    let said = cases.iter().map(|(from, to)| {
        let basin = small();
        assert!(OPERATIONS.contains(from), "no {from:?}");
        basin.append(&OPERATIONS.replacen(from, to, 1));
        basin.write("inflow.csv", "date,inflow\n2001-04-01,3.5\n2001-04-02,3.6\n");
        let ended = basin.run("check scenario.toml");
        assert_eq!((ended.status, ended.stdout.as_str()), (3, ""), "{from:?} as {to:?}");
        told(&ended.stderr)
    });
    said.collect::<Vec<_>>().join("\n")
}

#[test]
fn slips_in_the_keys_of_inflow() {
    let said = slips(&[
        ("runoff_fraction = 0.6\nrecession_days = 4\n", ""),
        ("runoff_fraction = 0.6", "runoff_fraction = \"0.6\""),
        ("runoff_fraction = 0.6", "runoff_fraction = nan"),
        ("runoff_fraction = 0.6", "runoff_fraction = 1.5"),
        ("runoff_fraction = 0.6", "runoff_fraction = [0.5, 0.6]"),
        ("runoff_fraction = 0.6", "runoff_fraction = [1, 1, 1, 1, 1, 1, 1, 1, -0.5, 1, 1, 1]"),
        ("runoff_fraction", "runof_fraction"),
        ("recession_days = 4", "recession_days = \"four\""),
        ("recession_days = 4", "recession_days = -1"),
        ("recession_days = 4", "recession_days = 4\nlag_days = 1"),
        ("[10, 20]", "10"),
        ("[10, 20]", "[20, 10]"),
        ("[10, 20]", "[]"),
        ("[10, 20]", "[0, 10]"),
        ("[10, 20]", "[1, 2, 3, 4, 5, 6, 7, 8, 9, 10]"),
        ("[10, 20]", "[10, \"x\"]"),
        (
            "year_class_limits_hm3 = [10, 20]",
            "year_class_limits_hm3 = [10, 20]\nyear_class_limits_thousand_acre_feet = [8, 16]",
        ),
        ("year_class_limits_hm3 = [10, 20]", "year_class_limits_thousand_acre_feet = [20, 10]"),
        ("share = 0.3\nrecession_days = 60\n", ""),
        ("share = 0.3", "share = 3"),
        ("share = 0.3", "shares = 0.3"),
        ("recession_days = 60", "recession_days = 3"),
        ("recession_days = 60", "recession_days = 9999"),
        ("[inflow.slow]\nshare = 0.3\nrecession_days = 60\n", "slow = 0.3\n"),
    ]);
    insta::assert_snapshot!(said, @r##"
inflow.runoff_fraction: no 'runoff_fraction'
  at inflow: expected a share from 0 to 1, or twelve, January first; add runoff_fraction = 0.7 where seven tenths of the water that reaches the ground run off
inflow.recession_days: no 'recession_days'
  at inflow: expected a number of days; add recession_days = 5: without rain or melt the inflow falls to 1/e in so many

inflow.runoff_fraction: the text "0.6"
  at "0.6": expected one number, or twelve, January first; take the quotes away: runoff_fraction = 0.6

inflow.runoff_fraction: nan
  at nan: expected one number, or twelve, January first; write runoff_fraction = ..., or twelve numbers in [ ]; a share of the water that reaches the ground

inflow.runoff_fraction: 1.5
  at 1.5: expected a number from 0 to 1; a share of the water that reaches the ground

inflow.runoff_fraction: 2 numbers
  at [0.5, 0.6]: expected one number, or twelve, January first; give one a month, or one alone; a share of the water that reaches the ground

inflow.runoff_fraction[8]: -0.5
  at -0.5: expected a number from 0 to 1; a share of the water that reaches the ground

inflow.runoff_fraction: no 'runoff_fraction'
  at inflow: expected a share from 0 to 1, or twelve, January first; add runoff_fraction = 0.7 where seven tenths of the water that reaches the ground run off
'inflow.runof_fraction', which is not a key of a scenario
  at runof_fraction: expected 'runoff_fraction'?; write 'runoff_fraction', or take the key out

inflow.recession_days: the text "four"
  at "four": expected a number; write a number alone, without quotes and unit: recession_days = ...

inflow.recession_days: -1
  at -1: expected a number from 0 to 2000 days; days in which the outflow falls to 1/e, without rain or melt

'inflow.lag_days', which is not a key of a scenario
  at lag_days: expected one of: observed, runoff_fraction, recession_days, slow, year_class_limits_hm3, year_class_limits_thousand_acre_feet; take it out, or check its table

inflow.year_class_limits_hm3: 10
  at 10: expected a list of numbers; write year_class_limits_hm3 = [0, 1, 2]

inflow.year_class_limits_hm3[1]: 10
  at 10: expected one to 9 volumes above 0, each larger than the one before; the volumes of the first window at which one class of years ends and the next begins

inflow.year_class_limits_hm3: 0 volumes
  at []: expected one to 9 volumes above 0, each larger than the one before; the volumes of the first window at which one class of years ends and the next begins

inflow.year_class_limits_hm3[0]: 0
  at 0: expected one to 9 volumes above 0, each larger than the one before; the volumes of the first window at which one class of years ends and the next begins

inflow.year_class_limits_hm3: 10 volumes
  at [1, 2, 3, 4, 5, 6, 7, 8, 9, 10]: expected one to 9 volumes above 0, each larger than the one before; the volumes of the first window at which one class of years ends and the next begins

inflow.year_class_limits_hm3[1]: the text "x"
  at "x": expected a number; write year_class_limits_hm3 as a list of such values, as in the demo scenarios

inflow.year_class_limits_thousand_acre_feet: year_class_limits_thousand_acre_feet beside year_class_limits_hm3
  at [8, 16]: expected one of the two; take one of them out

inflow.year_class_limits_thousand_acre_feet[1]: 10
  at 10: expected one to 9 volumes above 0, each larger than the one before; the volumes of the first window at which one class of years ends and the next begins

inflow.slow.share: no 'share'
  at slow: expected a number; add it: a share of what runs off: share = 0.3
inflow.slow.recession_days: no 'recession_days'
  at slow: expected a number; add it: days, more than the quick store's: 60

inflow.slow.share: 3
  at 3: expected a number from 0 to 1; a share of what runs off: share = 0.3

inflow.slow.share: no 'share'
  at slow: expected a number; add it: a share of what runs off: share = 0.3
'inflow.slow.shares', which is not a key of a scenario
  at shares: expected 'share'?; write 'share', or take the key out

inflow.slow.recession_days: 3
  at 3: expected more than the quick store's 4 days; exchange the two, or take [inflow.slow] out

inflow.slow.recession_days: 9999
  at 9999: expected a number from 0 to 2000; days, more than the quick store's: 60

inflow.slow: 0.3
  at 0.3: expected a table; write slow = { ... }
"##);
}

#[test]
fn slips_in_the_keys_of_observed_inflow() {
    let said = slips(&[
        ("recession_days = 60\n", "recession_days = 60\n[inflow.observed]\n"),
        (
            "recession_days = 60\n",
            "recession_days = 60\n[inflow.observed]\nfile = 3\ndate = { column = \"date\" }\nflow = { column = \"inflow\", unit = \"m3/s\" }\nfit = false\n",
        ),
        (
            "recession_days = 60\n",
            "recession_days = 60\n[inflow.observed]\nfile = \"inflows.csv\"\ndate = { column = \"date\" }\nflow = { column = \"inflow\", unit = \"m3/s\" }\nfit = false\n",
        ),
        (
            "recession_days = 60\n",
            "recession_days = 60\n[inflow.observed]\nfile = \"inflow.csv\"\ndate = { column = \"date\" }\nflow = { column = \"inflow\", unit = \"m3\" }\nfit = false\n",
        ),
        (
            "recession_days = 60\n",
            "recession_days = 60\n[inflow.observed]\nfile = \"inflow.csv\"\ndate = { column = \"date\" }\nflow = { column = \"inflow\", unit = \"CFS\" }\nfit = false\n",
        ),
        (
            "recession_days = 60\n",
            "recession_days = 60\n[inflow.observed]\nfile = \"inflow.csv\"\ndate = { column = \"date\" }\nflow = { column = \"inflow\" }\nfit = false\n",
        ),
        (
            "recession_days = 60\n",
            "recession_days = 60\n[inflow.observed]\nfile = \"inflow.csv\"\ndate = { column = \"date\" }\nflow = { unit = \"m3/s\" }\nfit = false\n",
        ),
        (
            "recession_days = 60\n",
            "recession_days = 60\n[inflow.observed]\nfile = \"inflow.csv\"\ndate = { column = \"date\" }\nflow = \"inflow\"\nfit = false\n",
        ),
        (
            "recession_days = 60\n",
            "recession_days = 60\n[inflow.observed]\nfile = \"inflow.csv\"\ndate = { column = \"date\" }\nflow = { column = \"inflow\", unit = \"m3/s\", scale = 2 }\nfit = false\n",
        ),
        (
            "recession_days = 60\n",
            "recession_days = 60\n[inflow.observed]\nfile = \"inflow.csv\"\ndate = { column = \"date\" }\nflow = { column = \"flow\", unit = \"m3/s\" }\nfit = false\n",
        ),
        (
            "recession_days = 60\n",
            "recession_days = 60\n[inflow.observed]\nfile = \"inflow.csv\"\ndate = { column = \"date\" }\nflow = { column = \"date\", unit = \"m3/s\" }\nfit = false\n",
        ),
        (
            "recession_days = 60\n",
            "recession_days = 60\n[inflow.observed]\nfile = \"inflow.csv\"\ndate = { column = \"date\" }\nflow = { column = \"inflow\", unit = \"m3/s\" }\nfit = \"no\"\n",
        ),
        (
            "recession_days = 60\n",
            "recession_days = 60\n[inflow.observed]\nfile = \"inflow.csv\"\ndate = { column = \"date\" }\nflow = { column = \"inflow\", unit = \"m3/s\" }\nfits = false\n",
        ),
        (
            "recession_days = 60\n",
            "recession_days = 60\n[inflow.observed]\nfile = \"inflow.csv\"\ndate = { column = \"date\" }\nflow = { column = \"inflow\", unit = \"m3/s\" }\nmissing = 3\n",
        ),
    ]);
    insta::assert_snapshot!(said, @r##"
inflow.observed.file: no 'file'
  at observed: expected the path of a CSV file with observed inflow; add file = "inflow.csv"
inflow.observed.flow: no 'flow'
  at observed: expected a table 'flow'; add flow = { column = "...", unit = "..." } in [inflow.observed]

inflow.observed.file: 3
  at 3: expected a text in quotes; write file = "..."

inflow.observed.file: inflows.csv: there is no such file
  at "inflows.csv": expected a file that can be read; the path is relative to the scenario's folder

inflow.observed.flow.unit: "m3"
  at "m3": expected "m3/s" or "cfs" or "hm3/day" or "acre-feet/day"; did you mean "m3/s"?

inflow.observed.flow.unit: "CFS"
  at "CFS": expected "m3/s" or "cfs" or "hm3/day" or "acre-feet/day"; did you mean "cfs"?

inflow.observed.flow.unit: no 'unit'
  at flow: expected "m3/s", "cfs", "hm3/day" or "acre-feet/day"; add unit = "m3/s"

inflow.observed.flow.column: no 'column'
  at flow: expected the column's name in the header; add column = "..."

inflow.observed.flow: the text "inflow"
  at "inflow": expected a table; write flow = { ... }

'inflow.observed.flow.scale', which is not a key of a scenario
  at scale: expected one of: column, unit; take it out, or check its table

no column called 'flow'
  at d: expected a column of this name; did you mean 'inflow'? Names are compared letter for letter

inflow.csv: one column named for both date and flow
  at the file: expected a column of its own for each; name the columns in [inflow.observed]

inflow.observed.fit: the text "no"
  at "no": expected true or false; write fit = true or false

'inflow.observed.fits', which is not a key of a scenario
  at fits: expected 'fit'?; write 'fit', or take the key out

inflow.observed.missing: 3
  at 3: expected a list of texts in quotes; write missing = ["..."]
"##);
}

fn with_observed() -> Basin {
    let basin = small();
    basin.append(
        "\n[inflow]\nrunoff_fraction = 0.6\nrecession_days = 4\n[inflow.observed]\nfile = \"inflow.csv\"\n\
         flow = { column = \"inflow\", unit = \"m3/s\" }\n",
    );
    basin
}

#[test]
fn files_that_are_no_inflow() {
    let said = [
        ("empty", ""),
        ("header alone", "date,inflow\n"),
        ("nothing but marks", "date,inflow\n2001-04-01,\n2001-04-02,NA\n"),
        ("another column", "date,flow\n2001-04-01,3.5\n"),
        ("no numbers", "date,inflow\n2001-04-01,NaN\n2001-04-02,ice\n2001-04-03,inf\n"),
        ("twice", "date,inflow\n2001-04-01,3.5\n2001-04-02,3.5\n2001-04-01,3.6\n"),
        ("beyond any river", "date,inflow\n2001-04-01,3.5\n2001-04-02,999999\n2001-04-03,-999999\n"),
        ("decimal commas", "date,inflow\n2001-04-01,3,5\n"),
        ("another separator", "date;inflow\n2001-04-01;3,5\n"),
        ("thousands", "date,inflow\n2001-04-01,\"1,250.5\"\n"),
        ("dates", "date,inflow\n2001-04-01,3\n04/02/2001,3\n2001-04-31,3\n"),
        ("a cell too few", "date,inflow\n2001-04-01\n2001-04-02,3\n"),
    ]
    .map(|(what, text)| {
        let basin = with_observed();
        basin.write("inflow.csv", text);
        let ended = basin.run("check scenario.toml");
        assert_eq!((ended.status, ended.stdout.as_str()), (3, ""), "{what}");
        format!("## {what}\n{}", told(&ended.stderr))
    });
    insta::assert_snapshot!(said.join("\n"), @r##"
## empty
inflow.csv: no header line
  at the file: expected a line of column names, then one line a row; check that the file was saved whole; remarks above the header must start with the 'comment' sign

## header alone
inflow.csv: no reading
  at the file: expected at least one day of inflow; check that the column and its unit are the right ones, and what 'missing' says

## nothing but marks
inflow.csv: no reading
  at the file: expected at least one day of inflow; check that the column and its unit are the right ones, and what 'missing' says

## another column
no column called 'inflow'
  at d: expected a column of this name; name one of the columns that stand there, letter for letter:

## no numbers
inflow: 'NaN'
  at NaN: expected a number or a mark for 'not measured'; if it is such a mark, add it to 'missing' where the scenario names the file
inflow: 'ice'
  at ice: expected a number or a mark for 'not measured'; if it is such a mark, add it to 'missing' where the scenario names the file
inflow: 'inf'
  at inf: expected a number or a mark for 'not measured'; if it is such a mark, add it to 'missing' where the scenario names the file

## twice
date: '2001-04-01'
  at 2001-04-01: expected a date that line 2 does not have already; keep one flow a day

## beyond any river
inflow: '999999'
  at 999999: expected at most 30000 hm3 a day, more than any river brings; check the unit, and what 'missing' says
inflow: '-999999'
  at -999999: expected at most 30000 hm3 a day, more than any river brings; check the unit, and what 'missing' says

## decimal commas
3 cells
  at 2001-04-01,3,5: expected 2 cells, as in the header; if numbers have decimal commas, export the table with another separator, or with such numbers in quotes; else take out what is too many

## another separator
no column called 'date'
  at d: expected a column of this name; the names stand apart by another sign: state separator = ";" where the scenario names the file
no column called 'inflow'
  at d: expected a column of this name; the names stand apart by another sign: state separator = ";" where the scenario names the file

## thousands
inflow: '1,250.5'
  at "1,250.5": expected a number or a mark for 'not measured'; write it without a sign between thousands

## dates
date: '04/02/2001'
  at 04/02/2001: expected a date written as %Y-%m-%d; the file mixes forms of dates: write it as the 1 that read well are written
date: '2001-04-31'
  at 2001-04-31: expected a date written as %Y-%m-%d; the file mixes forms of dates: write it as the 1 that read well are written

## a cell too few
1 cell
  at 2001-04-01: expected 2 cells, as in the header; check the quotes of this line, and that the file was saved whole
"##);
}

fn columns(unit: FlowUnit) -> FlowColumns {
    FlowColumns {
        date: DateColumn { columns: vec!["date".to_owned()], format: "%Y-%m-%d".to_owned() },
        flow: FlowColumn { column: "inflow".to_owned(), unit },
        format: Format::default(),
    }
}

/// By definition: 1 m3/s is 86,400 m3 a day; lines stand in any order, and marks are days without a reading.
#[test]
fn readings_are_volumes_of_a_day() {
    let text = "date,inflow\n2001-04-03,2\n2001-04-01,1\n2001-04-02,NA\n2001-04-04,-0.5\n";
    let found = read("inflow.csv", text, &columns(FlowUnit::CubicMetrePerSecond)).unwrap();
    let readings: Vec<(String, f64)> =
        found.hm3_a_day.iter().map(|(date, hm3)| (date.to_string(), *hm3)).collect();
    let expected = [("2001-04-01", 0.0864), ("2001-04-03", 0.1728), ("2001-04-04", -0.0432)];
    assert_eq!(readings.len(), expected.len());
    for ((date, hm3), (on, volume)) in readings.iter().zip(expected) {
        assert!(date == on && (hm3 - volume).abs() < 1e-15, "{date}: {hm3}");
    }
    assert_eq!(found.negative, 1);
}

/// By hand: 1 hm3 on each of 365 days is 365.25 in a mean year, more than 1.2 times 300 and less than 1.2 times 310 hm3 of precipitation.
#[test]
fn more_inflow_than_precipitation_is_said() {
    let first = chrono::NaiveDate::from_ymd_opt(2001, 1, 1).unwrap();
    let rows = first.iter_days().take(365).map(|date| format!("{date},1\n"));
    let text = format!("date,inflow\n{}", rows.collect::<String>());
    let found = read("inflow.csv", &text, &columns(FlowUnit::CubicHectometrePerDay)).unwrap();
    let said = found.unlikely(300.0);
    assert_eq!(said.len(), 1);
    assert!(
        said[0].why.contains("365 hm3 flow in, more than the 300 hm3 of rain and snow"),
        "{}",
        said[0].why
    );
    assert!(found.unlikely(310.0).is_empty());
}
