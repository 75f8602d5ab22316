//! One place day by day: what fell on it and melted, the snow that lay, and what was observed of it.

use super::site::observed_days;
use super::year::DayPair;
use crate::basin::Band;
use crate::observed::{Kind, Observations};
use crate::snow::{Engine, Lanes, OpenLedger, YearBlock};
use crate::weather::Series;
use chrono::NaiveDate;

/// A place of a basin.
#[derive(Debug, Clone, PartialEq)]
pub enum Place {
    /// The basin mean.
    Basin,
    /// A band, by its number from the lowest, 1.
    Band {
        /// Its number.
        number: usize,
        /// The band.
        band: Band,
    },
    /// A site with observed snow.
    Site {
        /// Its name.
        name: String,
        /// Its elevation, m.
        elevation_m: f64,
    },
}

/// The site whose observed snow stands beside the model's.
#[derive(Debug, Clone, PartialEq)]
pub struct ObservedAt {
    /// Its name.
    pub site: String,
    /// Its elevation, m.
    pub elevation_m: f64,
    /// How it is observed.
    pub kind: Kind,
}

/// A water year of a place.
#[derive(Debug, Clone, PartialEq)]
pub struct PlaceYear {
    /// The water year.
    pub water_year: i32,
    /// Its first day.
    pub first: NaiveDate,
    /// Rain of each day, mm.
    pub rain_mm: Vec<f64>,
    /// Snowfall of each day, mm.
    pub snow_mm: Vec<f64>,
    /// Melt of each day before refreezing, mm.
    pub melt_mm: Vec<f64>,
    /// SWE as each day begins, observed and modelled.
    pub swe: Vec<DayPair>,
}

/// Some water years of a place.
#[derive(Debug, Clone, PartialEq)]
pub struct PlaceDays {
    /// The place.
    pub place: Place,
    /// Where the observed snow beside the model's was measured, if any is.
    pub observed: Option<ObservedAt>,
    /// The years, in the order of the record.
    pub years: Vec<PlaceYear>,
}

/// Runs the record and takes the stated water years of a place. `lanes` holds one group: the bands, or a site alone,
/// which is then its first place. Years after a gap start bare.
///
/// # Errors
/// A ledger that does not close.
pub fn place_years(
    lanes: &Lanes,
    place: &Place,
    weather: &Series,
    is_taken: impl Fn(i32) -> bool,
    observations: Option<&Observations>,
) -> Result<Vec<PlaceYear>, OpenLedger> {
    let of_row = |row: &[f64]| match place {
        Place::Basin => lanes.mix(0, row),
        Place::Band { number, .. } => lanes.of_place(0, number - 1, row),
        Place::Site { .. } => lanes.of_place(0, 0, row),
    };
    let mut years = Vec::new();
    Engine::new(lanes, true).years(weather, |span, block| {
        if is_taken(span.water_year) {
            let observed = observed_days(observations, span.first, block.days);
            years.push(year_of(span.water_year, block, observed, of_row));
        }
        Ok::<(), OpenLedger>(())
    })?;
    Ok(years)
}

fn year_of(
    water_year: i32,
    block: &YearBlock,
    observed: Vec<Option<f64>>,
    of_row: impl Fn(&[f64]) -> f64,
) -> PlaceYear {
    let of_columns =
        |table: &[f64]| -> Vec<f64> { (0..block.days).map(|day| of_row(block.row(table, day))).collect() };
    let melt_mm = block
        .detail
        .iter()
        .flat_map(|detail| detail.melt_mm.chunks_exact(detail.width).take(block.days).map(&of_row));
    let swe = of_columns(&block.swe_mm).into_iter().zip(observed);
    PlaceYear {
        water_year,
        first: block.first,
        rain_mm: of_columns(&block.rain_mm),
        snow_mm: of_columns(&block.snow_mm),
        melt_mm: melt_mm.collect(),
        swe: swe.map(|(modelled_mm, observed_mm)| DayPair { observed_mm, modelled_mm }).collect(),
    }
}
