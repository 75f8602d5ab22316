//! A small basin in a folder of its own, and commands run in it.

use assert_cmd::Command;
use std::fmt::Write;
use std::fs;
use std::path::Path;
use tempfile::TempDir;

/// A scenario, two bands and three water years of made-up weather in a temporary folder.
pub struct Basin {
    folder: TempDir,
}

/// What a command left.
pub struct Ended {
    pub status: i32,
    pub stdout: String,
    pub stderr: String,
}

/// A fit that takes little time, for the end of a scenario with observed snow.
pub const SMALL_FIT: &str = r#"
[fit]
parameters = ["snow.degree_day_factor_mm_per_c_day.highest", "snow.melt_base_c"]
starts = 1
evaluations = 10
parameter_sets = 2
"#;

pub const SCENARIO: &str = r#"title = "Test fork"
seed = 5

[basin]
latitude_deg = 40
bands = "bands.csv"
temperature_gradient_c_per_km = -6.0
precipitation_gradient_pct_per_100m = 3

[weather]
file = "weather.csv"
station_elevation_m = 2000
tmin = { column = "tmin_c", unit = "degC" }
tmax = { column = "tmax_c", unit = "degC" }
precipitation = { column = "precip_mm", unit = "mm" }

[warming]
levels_c = [0, 2]

[realizations]
count = 12
years = 5
"#;

impl Basin {
    /// The basin as it stands above, sound.
    pub fn new() -> Self {
        let basin = Self { folder: TempDir::new().unwrap() };
        basin.write("scenario.toml", SCENARIO);
        basin.write("bands.csv", "lower_m,upper_m,area_km2\n1900,2200,40\n2200,2500,25\n");
        basin.write("weather.csv", &weather(3));
        basin
    }

    /// The demo of this name, as the program writes it, in a folder of its own; and its scenario with so many realizations of so
    /// many years, for a file at the folder's top.
    pub fn of_demo(name: &str, [count, years]: [u32; 2]) -> (Self, String) {
        let basin = Self::new();
        let ended = basin.run("start .");
        assert_eq!(ended.status, 0, "{}", ended.stderr);
        let scenario = basin.read(&format!("scenarios/{name}.toml")).replace("../demo-data", "demo-data");
        let few = format!("[realizations]\ncount = {count}\nyears = {years}\n");
        let scenario = scenario.replacen("[realizations]\n", &few, 1);
        (basin, scenario)
    }

    pub fn path(&self) -> &Path {
        self.folder.path()
    }

    pub fn write(&self, name: &str, text: &str) {
        fs::write(self.path().join(name), text).unwrap();
    }

    pub fn write_bytes(&self, name: &str, bytes: impl AsRef<[u8]>) {
        fs::write(self.path().join(name), bytes).unwrap();
    }

    pub fn read_bytes(&self, name: &str) -> Vec<u8> {
        fs::read(self.path().join(name)).unwrap()
    }

    /// A text; no-break spaces of a page read as spaces.
    pub fn read(&self, name: &str) -> String {
        let text = fs::read_to_string(self.path().join(name)).unwrap();
        if name.ends_with(".html") { text.replace('\u{a0}', " ") } else { text }
    }

    /// The sound scenario with a piece of its text exchanged, which must be there.
    pub fn exchange(&self, from: &str, to: &str) {
        let text = self.read("scenario.toml");
        assert!(text.contains(from), "the scenario has no {from:?}");
        self.write("scenario.toml", &text.replace(from, to));
    }

    /// The scenario with more text at its end.
    pub fn append(&self, more: &str) {
        self.write("scenario.toml", &format!("{}{more}", self.read("scenario.toml")));
    }

    pub fn command(&self, words: &str) -> Command {
        let mut command = Command::new(env!("CARGO_BIN_EXE_thawline"));
        command.current_dir(self.path()).args(words.split_whitespace());
        command
    }

    pub fn run(&self, words: &str) -> Ended {
        ended(&mut self.command(words))
    }
}

pub fn ended(command: &mut Command) -> Ended {
    let output = command.output().unwrap();
    let text = |bytes: Vec<u8>| String::from_utf8(bytes).unwrap();
    let status = output.status.code().unwrap_or(-1);
    Ended { status, stdout: text(output.stdout), stderr: text(output.stderr) }
}

/// Whole water years from 1 October 2000: a cosine of temperature, snow enough in winter, and years that differ.
pub fn weather(years: i64) -> String {
    let first = chrono::NaiveDate::from_ymd_opt(2000, 10, 1).unwrap();
    let end = chrono::NaiveDate::from_ymd_opt(2000 + i32::try_from(years).unwrap(), 10, 1).unwrap();
    let mut text = String::from("date,tmin_c,tmax_c,precip_mm\n");
    for (day, date) in first.iter_days().take_while(|date| *date < end).enumerate() {
        let angle = 2.0 * std::f64::consts::PI * (day as f64 - 105.0) / 365.25;
        let mean = 3.0 - 11.0 * libm::cos(angle);
        let wet = if day % 4 == 0 { 6.0 + 3.0 * (day / 365) as f64 } else { 0.0 };
        let half_range = 5.0 + 0.1 * (day % 2) as f64;
        writeln!(text, "{date},{:.1},{:.1},{wet:.1}", mean - half_range, mean + half_range).unwrap();
    }
    text
}
