//! The weather table: the record or a realization at the station, day by day, as every warming level begins from it.

use crate::calendar::date_of;
use crate::weather::Series;
use chrono::Datelike;
use std::io::{self, Write};

/// Column names, in order; one more where there is humidity. `year` counts the years from 1; `water_year` is the record's year that the
/// weather was taken from, and empty where it was drawn.
const HEADER: &str = "year,day_of_water_year,month,day,water_year,tmin_c,tmax_c,tmean_c,precipitation_mm";
const HUMIDITY: &str = "relative_humidity_pct";

/// Writes weather; `are_record_years` tells whether its years are the record's. Numbers are written in the shortest
/// form that reads back exactly.
///
/// # Errors
/// What `into` says.
pub fn weather_csv(weather: &Series, are_record_years: bool, into: &mut impl Write) -> io::Result<()> {
    let has_humidity = !weather.relative_humidity_pct.is_empty();
    let humidity = if has_humidity { format!(",{HUMIDITY}") } else { String::new() };
    writeln!(into, "{HEADER}{humidity}")?;
    for (number, span) in (1..).zip(&weather.years) {
        let view = weather.view(span);
        let water_year = if are_record_years { span.water_year.to_string() } else { String::new() };
        for day in 0..span.days {
            let date = date_of(span.first, day + 1);
            let (mean_c, half_range_c) = (view.mean_c[day], view.half_range_c[day]);
            let humidity = view.relative_humidity_pct.get(day);
            let humidity = humidity.map_or_else(String::new, |pct| format!(",{pct}"));
            writeln!(
                into,
                "{number},{},{},{},{water_year},{},{},{mean_c},{}{humidity}",
                day + 1,
                date.month(),
                date.day(),
                mean_c - half_range_c,
                mean_c + half_range_c,
                view.precipitation_mm[day]
            )?;
        }
    }
    Ok(())
}
