//! Observed snow beside the model: as read, scored, drawn and told.

use super::basin::Basin;
use chrono::{Days, NaiveDate};
use serde_json::Value;

const SITE: &str = r#"
[[observed_swe]]
name = "Heron Meadow"
file = "snow.csv"
elevation_m = 2050
swe = { column = "swe_mm", unit = "mm" }
"#;

/// The basin with sites, and SWE at the end of each day of the lower band, 2050 m, as the daily table has it.
fn basin(sites: &str) -> (Basin, Vec<(NaiveDate, f64)>) {
    let basin = Basin::new();
    let daily = basin.run("daily scenario.toml").stdout;
    let states = daily.lines().skip(1).filter_map(|line| {
        let cells: Vec<&str> = line.split(',').collect();
        (cells[1] == "1").then(|| (cells[0].parse().unwrap(), cells[11].parse().unwrap()))
    });
    let states = states.collect();
    basin.write("scenario.toml", &(basin.read("scenario.toml") + sites));
    (basin, states)
}

fn table(states: impl IntoIterator<Item = (NaiveDate, f64)>) -> String {
    let rows = states.into_iter().map(|(date, swe_mm)| format!("{date},{swe_mm}\n"));
    std::iter::once("date,swe_mm\n".to_owned()).chain(rows).collect()
}

/// A text without its line breaks.
fn unbroken(text: &str) -> String {
    text.split_whitespace().collect::<Vec<_>>().join(" ")
}

fn comparison(basin: &Basin, into: &str) -> Value {
    let ended = basin.run(&format!("daily scenario.toml --into {into}"));
    assert_eq!(ended.status, 0, "{}", ended.stderr);
    let document: Value = serde_json::from_str(&basin.read(&format!("{into}/comparison.json"))).unwrap();
    document["comparisons"][0].clone()
}

/// Identity: held against its own daily table, the model scores 1 and has no error, to the bit.
#[test]
fn the_model_agrees_with_itself() {
    let (basin, states) = basin(&SITE.replace("elevation_m", "reading = \"end-of-day\"\nelevation_m"));
    basin.write("snow.csv", &table(states));
    let found = comparison(&basin, "days");
    assert_eq!((&found["kind"], &found["nash_sutcliffe"]), (&Value::from("pillow"), &Value::from(1.0)));
    assert_eq!(found["kling_gupta"]["efficiency"], 1.0);
    assert_eq!(
        (&found["peak"]["bias_pct"], &found["surveys"][0]["bias_pct"]),
        (&Value::from(0.0), &Value::from(0.0))
    );
    assert_eq!(
        (&found["melt_out"]["mean_size_days"], &found["melt_out"]["years"]),
        (&Value::from(0.0), &Value::from(3))
    );
    assert_eq!(
        found["readings_compared"],
        3 * 365 - 1,
        "the last reading is the state of a day after the record"
    );
    assert!(found["peak"]["observed_mm"].as_f64().unwrap() > 50.0, "{found}");
}

/// Identity: a start-of-day series and the same dated one day earlier as end-of-day readings score alike, in any order of
/// lines.
#[test]
fn readings_are_states_at_the_start_of_a_day() {
    let (basin, mut states) = basin(SITE);
    for (at, (_, swe_mm)) in states.iter_mut().enumerate() {
        *swe_mm = (*swe_mm * 0.8 + (at % 7) as f64).round();
    }
    basin.write("snow.csv", &table(states.iter().map(|(date, swe_mm)| (*date + Days::new(1), *swe_mm))));
    let mut start = comparison(&basin, "start");
    basin.exchange("[[observed_swe]]", "[[observed_swe]]\nreading = \"end-of-day\"");
    basin.write("snow.csv", &table(states.into_iter().rev()));
    let mut end = comparison(&basin, "end");
    assert_ne!(start["file"].take(), end["file"].take(), "dates as the files have them");
    assert_eq!(start, end);
    assert!(start["nash_sutcliffe"].as_f64().unwrap() < 1.0);
}

/// By hand, from the daily table: a course of two surveys, 20 % and 40 % above the model on 30 March 2001 and 3 April 2002,
/// is 30 % too low in the mean where both years weigh the same.
#[test]
fn a_course_is_held_against_the_model_on_its_own_days() {
    let (basin, states) = basin(SITE);
    let at = |text: &str| {
        let date: NaiveDate = text.parse().unwrap();
        let state = states.iter().find(|(day, _)| *day + Days::new(1) == date);
        (date, state.unwrap().1)
    };
    let [first, second] = [at("2001-03-30"), at("2002-04-03")];
    let observed = [1.2 * first.1, 1.4 * second.1];
    basin.write("snow.csv", &table([(first.0, observed[0]), (second.0, observed[1])]));
    let found = comparison(&basin, "days");
    assert_eq!((&found["kind"], &found["readings_compared"]), (&Value::from("course"), &Value::from(2)));
    assert_eq!((&found["peak"], &found["melt_out"]), (&Value::Null, &Value::Null));
    let expected = 100.0 * ((first.1 + second.1) / (observed[0] + observed[1]) - 1.0);
    let bias = found["surveys"][0]["bias_pct"].as_f64().unwrap();
    // 1e-9 percent is rounding.
    assert!((bias - expected).abs() < 1e-9, "{bias} for {expected}");
    let by_year = basin.read("days/tables/observed-by-year.csv");
    let row = by_year.lines().nth(1).unwrap();
    assert!(row.starts_with("Heron Meadow,2001,1,,no,,,none,none,2001-03-30,"), "{row}");
}

/// The daily table on standard output stays as it is; the comparison goes to standard error, unless --quiet.
#[test]
fn the_comparison_is_told_beside_the_table() {
    let plain = Basin::new().run("daily scenario.toml");
    let (basin, states) = basin(SITE);
    basin.write("snow.csv", &table(states));
    let told = basin.run("daily scenario.toml");
    assert_eq!(told.stdout, plain.stdout);
    for said in [
        "Heron Meadow: snow pillow, 2050 m",
        "NSE",
        "KGE (2009)",
        "peak SWE",
        "1 April SWE",
        "melt-out",
        "2003",
    ] {
        assert!(told.stderr.contains(said), "{said}: {}", told.stderr);
    }
    let quiet = basin.run("daily scenario.toml --quiet");
    assert_eq!((quiet.stdout, quiet.stderr.as_str()), (plain.stdout, ""));
}

/// A study tells, draws and lists every site, of whatever kind; `check` says what their files hold.
#[test]
fn a_study_with_a_pillow_and_a_course() {
    let course = SITE.replace("Heron Meadow", "Lantern course").replace("snow.csv", "course.csv");
    let (basin, states) = basin(&format!("{SITE}{course}"));
    basin.write(
        "course.csv",
        "# surveys\ndate,swe_mm\n2001-04-02,60\n2001-03-01,NA\n2002-03-29,99999\n2003-04-01,80\n",
    );
    basin.write("snow.csv", &table(states));
    let checked = basin.run("check scenario.toml");
    assert_eq!(checked.status, 0, "{}", checked.stderr);
    for said in [
        "Observed snow Heron Meadow: snow pillow, 2050 m, 1095 readings from 2000-10-01 to 2003-09-30 Lantern course: \
         snow course, 2050 m, 2 readings from 2001-04-02 to 2003-04-01; 2 lines without one, of them 1 impossible",
        "observed_swe[1].swe: 1 reading above 12 000 mm, which no snowpack has held, taken as missing; the first on \
         2002-03-29 (line 5): 99999.0 mm",
        "observed_swe[1].reading = \"start-of-day\"",
    ] {
        assert!(unbroken(&checked.stdout).contains(said), "{said}: {}", checked.stdout);
    }
    assert_eq!(basin.run("study scenario.toml --into out").status, 0);
    let manifest: Value = serde_json::from_str(&basin.read("out/run.json")).unwrap();
    let files: Vec<&str> = manifest["files"].as_array().unwrap().iter().filter_map(Value::as_str).collect();
    for file in [
        "figures/observed-swe-1.svg",
        "figures/observed-swe-2.svg",
        "tables/observed-by-year.csv",
        "tables/observed-daily.csv",
    ] {
        assert!(files.contains(&file) && !basin.read(&format!("out/{file}")).is_empty(), "{file}");
    }
    let inputs: Vec<&Value> =
        manifest["inputs"].as_array().unwrap().iter().map(|input| &input["path"]).collect();
    assert_eq!(inputs, ["scenario.toml", "bands.csv", "weather.csv", "snow.csv", "course.csv"]);
    let page = basin.read("out/briefing.html");
    for said in [
        "<summary><h3>Observed snow</h3></summary><div class=\"inside\" id=\"observed-snow\">",
        "not fitted to these observations",
        "href=\"#observed-snow\"",
        "Lantern course",
    ] {
        assert!(page.contains(said), "{said}");
    }
    let summary: Value = serde_json::from_str(&basin.read("out/summary.json")).unwrap();
    assert_eq!(summary["findings"]["comparisons"].as_array().map(Vec::len), Some(2));
}

/// Tables, words and figures are told in the reader's units; the document stays metric.
#[test]
fn us_readers_get_inches() {
    let (basin, states) = basin(&format!("{SITE}\n[report]\nunits = \"us\"\n"));
    basin.write("snow.csv", &table(states));
    let ended = basin.run("daily scenario.toml --into days");
    assert!(ended.stderr.contains("Heron Meadow: snow pillow, 6726 ft"), "{}", ended.stderr);
    let header = |name: &str| basin.read(&format!("days/tables/{name}")).lines().next().unwrap().to_owned();
    assert_eq!(header("observed-daily.csv"), "site,date,observed_in,modelled_in");
    assert!(header("observed-by-year.csv").contains(",observed_swe_04_01_in,modelled_swe_04_01_in,"));
    let figure = basin.read("days/figures/observed-swe-1.svg");
    assert!(figure.contains("SWE as the day begins, in<") && !figure.contains(" mm"), "{figure}");
    let document: Value = serde_json::from_str(&basin.read("days/comparison.json")).unwrap();
    assert!(document["comparisons"][0]["peak"]["observed_mm"].is_number());
}

/// A site far from bands and station, and one whose readings all lie outside the record, are said to be so.
#[test]
fn unlikely_sites_are_said() {
    let (basin, _) = basin(&SITE.replace("2050", "3301"));
    basin.write("snow.csv", "date,swe_mm\n1990-04-01,600\n");
    let ended = basin.run("check scenario.toml");
    for said in ["far outside the bands", "more than 1000 m above or below", "lies in a water year in use"] {
        assert!(unbroken(&ended.stdout).contains(said), "{said}: {}", ended.stdout);
    }
    let told = basin.run("study scenario.toml --into out");
    assert_eq!(told.status, 0, "{}", told.stderr);
    assert!(!basin.path().join("out/figures/observed-swe-1.svg").exists());
}

/// Faults of the tables and of their files are all shown, each in its place.
#[test]
fn faults_of_observed_snow() {
    let first = SITE.replace("elevation_m = 2050", "elevation = 2050");
    let second = SITE.replace("Heron Meadow", "Lantern course");
    let third = "\n[[observed_swe]]\nname = \"Lantern course\"\nfile = \"nowhere.csv\"\nelevation_m = 2100\n";
    let (basin, _) = basin(&format!("{first}{second}{third}"));
    basin.write(
        "snow.csv",
        "date,swe_mm\n2001-04-02,60\n2001-03-01,-0.2\n2001-04-02,61\n2001-02-30,55\n2001-02-01,deep\n",
    );
    let ended = basin.run("check scenario.toml");
    assert_eq!((ended.status, ended.stdout.as_str()), (3, ""));
    insta::assert_snapshot!(ended.stderr, @r#"
error: observed_swe[0].elevation_m: no 'elevation_m'
  --> scenario.toml:24:1
   |
24 | [[observed_swe]]
   | ^^^^^^^^^^^^^^^^ expected a number
   |
   = help: add it, in metres above the sea; or elevation_ft, in feet

error: 'observed_swe[0].elevation', which is not a key of a scenario
  --> scenario.toml:27:1
   |
27 | elevation = 2050
   | ^^^^^^^^^ expected 'elevation_m'?
   |
   = help: write 'elevation_m', or take the key out

error: observed_swe[2].swe: no 'swe'
  --> scenario.toml:36:1
   |
36 | [[observed_swe]]
   | ^^^^^^^^^^^^^^^^ expected a table 'swe'
   |
   = help: add swe = { column = "...", unit = "..." } in [[observed_swe]]

error: observed_swe[2].name: "Lantern course" a second time
  --> scenario.toml:37:8
   |
37 | name = "Lantern course"
   |        ^^^^^^^^^^^^^^^^ expected a name of its own for each site
   |
   = help: name = "Heron Meadow snow course", for example

error: observed_swe[2].file: nowhere.csv: there is no such file
  --> scenario.toml:38:8
   |
38 | file = "nowhere.csv"
   |        ^^^^^^^^^^^^^ expected a file that can be read
   |
   = help: the path is relative to the scenario's folder

error: date: '2001-04-02'
 --> snow.csv:4:1
  |
4 | 2001-04-02,61
  | ^^^^^^^^^^ expected a date that line 2 does not have already
  |
  = help: keep one reading a day

error: date: '2001-02-30'
 --> snow.csv:5:1
  |
5 | 2001-02-30,55
  | ^^^^^^^^^^ expected a day that the calendar has
  |
  = help: mend the date, or take the line out

error: swe_mm: 'deep'
 --> snow.csv:6:12
  |
6 | 2001-02-01,deep
  |            ^^^^ expected a number or a mark for 'not measured'
  |
  = help: if it is such a mark, add it to 'missing' where the scenario names the file

8 faults; nothing was run
"#);
}

/// One table in single brackets, and a site without its column in the file.
#[test]
fn slips_in_the_table_of_a_site() {
    let (basin, states) = basin(&SITE.replace("[[observed_swe]]", "[observed_swe]"));
    basin.write("snow.csv", &table(states));
    let ended = basin.run("check scenario.toml");
    assert!(ended.stderr.contains("begin each with a line [[observed_swe]]"), "{}", ended.stderr);
    basin.exchange("[observed_swe]", "[[observed_swe]]");
    basin.exchange("\"swe_mm\"", "\"swe\"");
    let ended = basin.run("check scenario.toml");
    assert!(ended.stderr.contains("no column called 'swe'"), "{}", ended.stderr);
    basin.exchange("\"swe\"", "\"date\"");
    let ended = basin.run("check scenario.toml");
    assert!(ended.stderr.contains("one column named for both date and SWE"), "{}", ended.stderr);
    basin.exchange("\"date\"", "\"swe_mm\"");
    basin.write("snow.csv", "date,swe_mm\n2001-04-01,NA\n");
    let ended = basin.run("check scenario.toml");
    assert!(ended.status == 3 && ended.stderr.contains("no reading"), "{}", ended.stderr);
}

/// Inches declared as mm: snow of a few millimetres where the year has hundreds of precipitation.
#[test]
fn a_unit_that_cannot_be_is_said_with_the_one_that_may_be() {
    let basin = Basin::new();
    let readings: String = (0..120)
        .map(|day| {
            let date = NaiveDate::from_ymd_opt(2001, 1, 1).unwrap() + Days::new(day);
            format!("{date},{:.1}\n", 2.0 + day as f64 / 12.0)
        })
        .collect();
    basin.write("snow.csv", &format!("date,swe\n{readings}"));
    let site = "\n[[observed_swe]]\nfile = \"snow.csv\"\nelevation_m = 2000\nswe = { column = \"swe\", unit = \"mm\" }\n";
    basin.exchange("years = 5\n", &format!("years = 5\n{site}"));
    let checked = |basin: &Basin| {
        basin.run("check scenario.toml").stdout.split_whitespace().collect::<Vec<_>>().join(" ")
    };
    let said = checked(&basin);
    assert!(said.contains("observed_swe[0].swe.unit") && said.contains("read as in they would be"), "{said}");
    basin.exchange("column = \"swe\", unit = \"mm\"", "column = \"swe\", unit = \"in\"");
    assert!(!checked(&basin).contains("swe.unit"));
}
