//! The demo: three invented places with their daily weather, bands, snow and scenarios, written by the program itself.
//!
//! `alder_fork`, `frostbell_creek` and `tamsin_river` say what the places are like, in the plain numbers of `place`,
//! `swing`, `snow_site` and `river`; `weather` draws forty water years of days from them, `snow_site` and `river` run the
//! engine on those, and `errors` says how far readings lie from what is there; `station`, `bands`, `observed` and `river` write
//! the files a user would bring, in the looks of `layout`.
//! Nothing here is measured anywhere; every file says so at its head.

mod alder_fork;
mod bands;
mod errors;
mod frostbell_creek;
mod layout;
mod observed;
mod place;
mod river;
mod snow_site;
mod station;
mod swing;
mod tamsin_river;
mod weather;

use crate::snow::OpenLedger;

/// Every file of the demo: its path below the folder the demo is written to, and its content.
///
/// The same bytes on every machine: transcendental functions come from `libm` and numbers are rounded to few decimals.
///
/// # Errors
/// A ledger of the engine that does not close, in the run that the observed snow is made of.
///
/// ```
/// let files = thawline::demo::files()?;
/// assert!(files.iter().any(|(path, _)| *path == "scenarios/alder-fork.toml"));
/// # Ok::<(), thawline::snow::OpenLedger>(())
/// ```
pub fn files() -> Result<Vec<(&'static str, String)>, OpenLedger> {
    Ok(vec![
        ("scenarios/alder-fork.toml", include_str!("../../scenarios/alder-fork.toml").to_owned()),
        ("scenarios/frostbell-creek.toml", include_str!("../../scenarios/frostbell-creek.toml").to_owned()),
        ("scenarios/tamsin-river.toml", include_str!("../../scenarios/tamsin-river.toml").to_owned()),
        ("demo-data/alder-fork/README.md", include_str!("../../demo-data/alder-fork/README.md").to_owned()),
        ("demo-data/alder-fork/bands.csv", bands::table(&alder_fork::PLACE)),
        ("demo-data/alder-fork/weather.csv", station::table(&alder_fork::PLACE)),
        (
            "demo-data/alder-fork/heron-meadow.csv",
            observed::table(&alder_fork::PLACE, &alder_fork::SNOW_SITE)?,
        ),
        (
            "demo-data/frostbell-creek/README.md",
            include_str!("../../demo-data/frostbell-creek/README.md").to_owned(),
        ),
        ("demo-data/frostbell-creek/bands.csv", bands::table(&frostbell_creek::PLACE)),
        ("demo-data/frostbell-creek/weather.csv", station::table(&frostbell_creek::PLACE)),
        (
            "demo-data/tamsin-river/README.md",
            include_str!("../../demo-data/tamsin-river/README.md").to_owned(),
        ),
        ("demo-data/tamsin-river/bands.csv", bands::table(&tamsin_river::PLACE)),
        ("demo-data/tamsin-river/weather.csv", station::table(&tamsin_river::PLACE)),
        (
            "demo-data/tamsin-river/lapwing-flat.csv",
            observed::table(&tamsin_river::PLACE, &tamsin_river::SNOW_SITE)?,
        ),
        (
            "demo-data/tamsin-river/quillback-inflow.csv",
            river::table(&tamsin_river::PLACE, &tamsin_river::RIVER)?,
        ),
    ])
}

#[cfg(test)]
mod tests;
