//! What an invented place is made of: plain numbers, and nothing that would need measuring.

use super::swing::Swing;

/// A basin, its station and the holes in the station's record.
#[derive(Debug)]
pub struct Place {
    /// Name of the basin.
    pub basin: &'static str,
    /// Name of the station.
    pub station: &'static str,
    /// Elevation of the station, m.
    pub station_m: u32,
    /// Lower edge of the lowest band, m.
    pub lowest_m: u32,
    /// Height of every band, m.
    pub band_height_m: u32,
    /// Area of each band from the lowest up, km2.
    pub band_areas_km2: &'static [f64],
    /// The station's weather.
    pub climate: Climate,
    /// What was not measured.
    pub gaps: &'static [Gap],
}

/// The weather of a station, before what makes one year differ from another. Monthly tables start with January.
#[derive(Debug)]
pub struct Climate {
    /// Seed of all its draws.
    pub seed: u64,
    /// Daily mean temperature, degC.
    pub mean_c: Swing,
    /// Standard deviation of a day's mean temperature about it, degC.
    pub residual_sd_c: Swing,
    /// Correlation of that departure with the day before's.
    pub residual_lag1: f64,
    /// Mean temperature of wet days less that of dry days, degC: clouds keep winter days warm and summer days cool.
    pub wet_less_dry_c: Swing,
    /// Median daily range of dry days, degC.
    pub dry_range_c: Swing,
    /// Daily range of wet days over that of dry days.
    pub wet_range_share: f64,
    /// Standard deviation of the logarithm of the daily range.
    pub range_log_sd: Swing,
    /// Chance that a wet day follows a dry one.
    pub wet_after_dry: [f64; 12],
    /// Chance that a wet day follows a wet one.
    pub wet_after_wet: [f64; 12],
    /// Mean amount of a wet day, mm.
    pub wet_day_mm: [f64; 12],
    /// Weibull shape of the amounts; 1 would be exponential, below it large amounts are more frequent.
    pub amount_shape: f64,
    /// What makes years differ.
    pub year_to_year: YearToYear,
}

/// What makes one water year wetter or warmer than the next.
#[derive(Debug)]
pub struct YearToYear {
    /// Correlation of a year's wetness, a standard normal, with the year before's.
    pub wetness_lag1: f64,
    /// How much of the year's wetness is felt, by season.
    pub wetness_weight: Swing,
    /// Logarithm of the factor on the odds of a wet day, per standard deviation of wetness.
    pub wet_day_log_odds: f64,
    /// Logarithm of the factor on wet-day amounts, per standard deviation of wetness.
    pub amount_log_sd: f64,
    /// Standard deviation of a year's warmth, degC, besides what its days' own draws add up to.
    pub warmth_sd_c: f64,
}

/// Cells of a station's file that were not measured.
#[derive(Debug)]
pub struct Gap {
    /// First day: year, month, day.
    pub from: (i32, u32, u32),
    /// Length, days.
    pub days: i64,
    /// What is missing.
    pub hole: Hole,
}

/// Which cells of a day are empty.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Hole {
    /// The minimum alone.
    Minimum,
    /// The maximum alone.
    Maximum,
    /// Both temperatures.
    Temperatures,
    /// Precipitation.
    Precipitation,
    /// The whole day.
    All,
}

/// A hole of `days` days from the day `from`.
pub const fn gap(from: (i32, u32, u32), days: i64, hole: Hole) -> Gap {
    Gap { from, days, hole }
}
