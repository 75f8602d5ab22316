//! The weather record: from the cells of a station's file to whole, screened water years of daily weather.
//!
//! `columns` says which column holds what, `days` reads the cells, `declared` asks what they would be in another unit, `sift`
//! takes out what cannot be weather, `gauge` turns an accumulating gauge's readings into daily amounts, `humidity` fills
//! days without it, `gaps` fills short temperature gaps, `years` decides which water years can be used, `record` ties them together, and `series` is what
//! the engine and the generators read.

mod columns;
mod days;
mod declared;
mod gaps;
mod gauge;
mod humidity;
mod plausible;
mod record;
mod series;
mod sift;
mod suspicious;
mod time_of_year;
mod years;

pub use columns::{
    Columns, Gauge, HumidityColumn, PrecipitationColumn, Reading, TemperatureColumn, TemperatureColumns,
};
pub use gauge::GaugeCount;
pub use humidity::{HumidityCount, relative_humidity_pct, saturation_vapour_pressure_kpa};
pub use plausible::Means;
pub use record::{Counts, Record, read};
pub use series::{Series, YearSpan, YearView};
pub use suspicious::{FirstPlace, Suspicion};
pub use years::{Limits, SkippedYear, Why, in_groups};
