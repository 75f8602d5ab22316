//! The demo: two invented places with their daily weather, bands and scenarios, written by the program itself.
//!
//! `alder_fork` and `frostbell_creek` say what the two places are like, in the plain numbers of `place` and `swing`;
//! `weather` draws forty water years of days from them; `station` and `bands` write the files a user would bring.
//! Nothing here is measured anywhere; every file says so at its head.

mod alder_fork;
mod bands;
mod frostbell_creek;
mod place;
mod station;
mod swing;
mod weather;

/// Every file of the demo: its path below the folder the demo is written to, and its content.
///
/// The same bytes on every machine: transcendental functions come from `libm` and numbers are written to one decimal.
///
/// ```
/// let files = thawline::demo::files();
/// assert!(files.iter().any(|(path, _)| *path == "scenarios/alder-fork.toml"));
/// ```
pub fn files() -> Vec<(&'static str, String)> {
    vec![
        ("scenarios/alder-fork.toml", include_str!("../../scenarios/alder-fork.toml").to_owned()),
        ("scenarios/frostbell-creek.toml", include_str!("../../scenarios/frostbell-creek.toml").to_owned()),
        ("demo-data/alder-fork/README.md", include_str!("../../demo-data/alder-fork/README.md").to_owned()),
        ("demo-data/alder-fork/bands.csv", bands::table(&alder_fork::PLACE)),
        ("demo-data/alder-fork/weather.csv", station::table(&alder_fork::PLACE)),
        (
            "demo-data/frostbell-creek/README.md",
            include_str!("../../demo-data/frostbell-creek/README.md").to_owned(),
        ),
        ("demo-data/frostbell-creek/bands.csv", bands::table(&frostbell_creek::PLACE)),
        ("demo-data/frostbell-creek/weather.csv", station::table(&frostbell_creek::PLACE)),
    ]
}

#[cfg(test)]
mod tests;
