//! Weather that is drawn day by day, and the weather table.

use super::basin::{Basin, weather};

/// Six water years, and the generator that draws days.
fn basin() -> Basin {
    let basin = Basin::new();
    basin.write("weather.csv", &weather(6));
    basin.exchange("[realizations]\n", "[realizations]\ngenerator = \"markov-gamma\"\n");
    basin
}

fn rows(table: &str) -> Vec<Vec<String>> {
    let mut reader = csv::Reader::from_reader(table.as_bytes());
    reader.records().map(|row| row.unwrap().iter().map(str::to_owned).collect()).collect()
}

/// The same bytes on any number of threads, generators of resampled records included.
#[test]
fn threads_do_not_show_in_a_study() {
    let basin = basin();
    for (threads, into) in [(1, "one"), (3, "three")] {
        let ended = basin.run(&format!("study scenario.toml --quiet --threads {threads} --into {into}"));
        assert_eq!((ended.status, ended.stderr.as_str()), (0, ""), "{threads} threads");
    }
    for file in ["summary.json", "briefing.html", "tables/generator-sheet.csv", "tables/record-range.csv"] {
        assert!(basin.read(&format!("one/{file}")) == basin.read(&format!("three/{file}")), "{file}");
    }
    let page = basin.read("one/briefing.html");
    assert!(
        page.contains("weather drawn day by day")
            && page.contains("Fitted to the record: whether a day is wet")
    );
    let manifest: serde_json::Value = serde_json::from_str(&basin.read("one/run.json")).unwrap();
    assert_eq!(manifest["parameters"]["realizations"]["generator"], "markov-gamma");
    assert!(manifest["parameters"]["realizations"]["mean_run_years"].is_null());
}

/// Five years of 365 days, a maximum above its minimum on each of them, and the mean between both.
#[test]
fn a_realization_as_a_table() {
    let basin = basin();
    let ended = basin.run("weather scenario.toml --realization 12");
    assert_eq!((ended.status, ended.stderr.as_str()), (0, ""));
    let table = rows(&ended.stdout);
    assert_eq!(table.len(), 5 * 365);
    assert_eq!(table[0][..5], ["1", "1", "10", "1", ""]);
    assert_eq!(table[1824][..5], ["5", "365", "9", "30", ""]);
    for row in &table {
        let [tmin, tmax, mean, rain]: [f64; 4] = std::array::from_fn(|at| row[5 + at].parse().unwrap());
        assert!(tmin < tmax && rain >= 0.0, "{row:?}");
        assert!(((tmin + tmax) / 2.0 - mean).abs() < 1e-9, "{row:?}");
    }
    assert_ne!(basin.run("weather scenario.toml --realization 11").stdout, ended.stdout);
    assert_eq!(basin.run("weather scenario.toml --realization 12 --into made --quiet").status, 0);
    assert_eq!(basin.read("made/weather.csv"), ended.stdout);
    let command: serde_json::Value = serde_json::from_str(&basin.read("made/run.json")).unwrap();
    assert_eq!(command["command"], "thawline weather --realization 12 scenario.toml");
}

/// Without a number it is the record, leap days and all, corrected for catch; a realization of whole years is made of it.
#[test]
fn the_record_as_a_table() {
    let basin = Basin::new();
    let record = rows(&basin.run("weather scenario.toml").stdout);
    assert_eq!(record.len(), 3 * 365);
    assert_eq!(record[0][..5], ["1", "1", "10", "1", "2001"]);
    let number = |at: usize| record[0][at].parse::<f64>().unwrap();
    // As the station's file has it: 0.6 and 10.6 degC, 6 mm.
    assert!(
        (number(5) - 0.6).abs() < 1e-9 && (number(6) - 10.6).abs() < 1e-9 && number(8) == 6.0,
        "{:?}",
        record[0]
    );
    let made = rows(&basin.run("weather scenario.toml --realization 1").stdout);
    for row in &made {
        let from = record.iter().find(|of| (&of[1], &of[4]) == (&row[1], &row[4])).unwrap();
        assert_eq!(row[5..], from[5..]);
    }
}

#[test]
fn what_cannot_be() {
    let basin = basin();
    let beyond = basin.run("weather scenario.toml --realization 13");
    assert_eq!((beyond.status, beyond.stdout.as_str()), (2, ""));
    assert!(beyond.stderr.contains("the scenario has realizations 1 to 12"), "{}", beyond.stderr);
    assert_eq!(basin.run("weather scenario.toml --json").status, 2);
    basin.write("weather.csv", &weather(3));
    basin.exchange("years = 5", "years = 5\nmean_run_years = 3");
    let typed = basin.run("check scenario.toml");
    assert_eq!((typed.status, typed.stdout.as_str()), (3, ""));
    assert!(typed.stderr.contains("mean_run_years beside generator"), "{}", typed.stderr);
    basin.exchange("\nmean_run_years = 3", "");
    let few = basin.run("check scenario.toml");
    assert_eq!((few.status, few.stdout.as_str()), (3, ""));
    insta::assert_snapshot!(few.stderr, @r#"
    error: realizations.generator: "markov-gamma" asked of 3 usable water years
      --> scenario.toml:21:13
       |
    21 | generator = "markov-gamma"
       |             ^^^^^^^^^^^^^^ expected at least 4 years, and better 15 and more
       |
       = help: take generator = "year-blocks", which draws the record's own years

    1 fault; nothing was run
    "#);
}

/// Six years are few, and said; the generator stands for them all the same.
#[test]
fn few_years_are_worth_a_second_look() {
    let ended = basin().run("check scenario.toml");
    let words = ended.stdout.split_whitespace().collect::<Vec<_>>().join(" ");
    assert!(
        words.contains("realizations.generator: \"markov-gamma\" is fitted month by month to 6 water years"),
        "{words}"
    );
}
