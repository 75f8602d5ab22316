//! Broken files as users bring them: every message whole, the same from every command, and advice that works when followed.

mod advice;
mod bands;
mod columns;
mod dates;
mod faults_at_once;
mod feet;
mod ground;
mod humidity;
mod inflow;
mod keys;
mod mutations;
mod never_silent;
mod reservoir;
mod scenarios;
mod tables;
mod units;
mod values;

use super::basin::{Basin, weather};

const COMMANDS: [&str; 3] =
    ["check scenario.toml", "daily scenario.toml --into days", "study scenario.toml --into out"];

/// A sound basin whose study is small.
fn small() -> Basin {
    let basin = Basin::new();
    basin.exchange("count = 12\nyears = 5", "count = 6\nyears = 3");
    basin
}

/// What every command says about a basin that none of them takes: the same, with status 3, and nothing is written.
fn refused(basin: &Basin) -> String {
    let said = COMMANDS.map(|command| {
        let ended = basin.run(command);
        assert_eq!((ended.status, ended.stdout.as_str()), (3, ""), "{command}: {}", ended.stderr);
        ended.stderr
    });
    assert!(said.iter().all(|other| *other == said[0]), "{said:#?}");
    assert!(
        !basin.path().join("days").exists() && !basin.path().join("out").exists(),
        "something was written"
    );
    said[0].trim_end().trim_end_matches("1 fault; nothing was run").trim_end().to_owned()
}

/// The notices of a basin that every command takes.
fn accepted(basin: &Basin) -> String {
    let said = COMMANDS.map(|command| {
        let ended = basin.run(command);
        assert_eq!(ended.status, 0, "{command}: {}", ended.stderr);
        ended.stderr
    });
    for left in ["days", "out"] {
        std::fs::remove_dir_all(basin.path().join(left)).unwrap();
    }
    said[2].lines().filter(|line| line.starts_with("second look: ")).collect::<Vec<_>>().join("\n")
}

/// What is said about one file after another in the place of `name`, none of which is taken.
fn refused_files<B: AsRef<[u8]>>(name: &str, files: impl IntoIterator<Item = (&'static str, B)>) -> String {
    let basin = small();
    let said = files.into_iter().map(|(what, bytes)| {
        basin.write_bytes(name, bytes);
        format!("## {what}\n{}\n", refused(&basin))
    });
    said.collect::<Vec<_>>().join("\n")
}

/// What is said about one file after another in the place of `name`, all of which are taken.
fn accepted_files(name: &str, files: impl IntoIterator<Item = (&'static str, String)>) -> String {
    let basin = small();
    let said = files.into_iter().map(|(what, text)| {
        basin.write_bytes(name, text);
        format!("## {what}\n{}\n", accepted(&basin))
    });
    said.collect::<Vec<_>>().join("\n")
}

/// The sound record with every row's cells changed.
fn rows(change: impl Fn(usize, &[&str]) -> String) -> String {
    let sound = weather(3);
    let (header, rows) = sound.split_once('\n').unwrap();
    let rows = rows.lines().enumerate().map(|(number, row)| {
        let cells: Vec<&str> = row.split(',').collect();
        change(number, &cells) + "\n"
    });
    format!("{header}\n{}", rows.collect::<String>())
}

/// The sound record with one of its columns of numbers changed: 1 for minima, 2 for maxima, 3 for precipitation.
fn column(at: usize, change: impl Fn(usize, f64) -> String) -> String {
    rows(|number, cells| {
        let mut cells: Vec<String> = cells.iter().map(|cell| (*cell).to_owned()).collect();
        cells[at] = change(number, cells[at].parse().unwrap());
        cells.join(",")
    })
}
