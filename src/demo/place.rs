//! What an invented place is made of: plain numbers, and nothing that would need measuring.

use super::layout::Layout;
use super::swing::Swing;
use chrono::NaiveDate;

/// Calendar year in which every record begins, with the place's water year.
pub const FIRST_YEAR: i32 = 1984;
/// Calendar year in which it ends, on the eve of a water year: forty of them.
pub const LAST_YEAR: i32 = 2024;

/// A basin, its station and the holes in the records of the station, of a snow site and of a river.
#[derive(Debug)]
pub struct Place {
    /// Name of the basin.
    pub basin: &'static str,
    /// Latitude of the basin, degrees, positive north.
    pub latitude_deg: f64,
    /// Month and day on which its water years start.
    pub water_year_starts: (u32, u32),
    /// How its agency writes files.
    pub layout: Layout,
    /// Name of the station.
    pub station: &'static str,
    /// Elevation of the station, m.
    pub station_m: f64,
    /// Lower edge of the lowest band, in the layout's unit of elevation.
    pub lowest: u32,
    /// Height of every band, in the same unit.
    pub band_height: u32,
    /// Area of each band from the lowest up, in the layout's unit of area.
    pub band_areas: &'static [f64],
    /// The station's weather.
    pub climate: Climate,
    /// What was not measured.
    pub gaps: &'static [Gap],
}

impl Place {
    /// First day of the water year that starts in a calendar year.
    pub fn start_in(&self, calendar_year: i32) -> NaiveDate {
        let (month, day) = self.water_year_starts;
        date((calendar_year, month, day))
    }

    /// Every day of the record.
    pub fn dates(&self) -> impl Iterator<Item = NaiveDate> {
        let end = self.start_in(LAST_YEAR);
        self.start_in(FIRST_YEAR).iter_days().take_while(move |date| *date < end)
    }

    /// Whether one of these holes was cut on a day.
    pub fn is_lost(&self, day: NaiveDate, holes: &[Hole]) -> bool {
        self.gaps.iter().any(|gap| {
            let age = (day - date(gap.from)).num_days();
            holes.contains(&gap.hole) && (0..gap.days).contains(&age)
        })
    }
}

/// The dates of the demo all exist; one that does not would show as the calendar's first day.
fn date((year, month, day): (i32, u32, u32)) -> NaiveDate {
    NaiveDate::from_ymd_opt(year, month, day).unwrap_or(NaiveDate::MIN)
}

/// The weather of a station, before what makes one year differ from another. Monthly tables start with January.
#[derive(Debug)]
pub struct Climate {
    /// Seed of all its draws.
    pub seed: u64,
    /// Day of the year on which the winter values of its swings are reached.
    pub midwinter_day: f64,
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

/// Cells of a file that were not measured.
#[derive(Debug)]
pub struct Gap {
    /// First day: year, month, day.
    pub from: (i32, u32, u32),
    /// Length, days.
    pub days: i64,
    /// What is missing.
    pub hole: Hole,
}

/// Which cells of a day are lost.
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
    /// The station's whole day.
    All,
    /// The water in the snow at the snow site.
    SnowWater,
    /// The flow of the river.
    Flow,
}

/// A hole of `days` days from the day `from`.
pub const fn gap(from: (i32, u32, u32), days: i64, hole: Hole) -> Gap {
    Gap { from, days, hole }
}
