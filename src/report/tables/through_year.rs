//! SWE of the basin on every day of the water year.

use super::super::reader::Reader;
use super::cells::{finish, write};
use crate::calendar::date_of;
use crate::findings::SweThroughYear;
use csv::Writer;

/// No water year that ends in it holds a leap day.
const YEAR_OF_365_DAYS: i32 = 2002;

/// One row a level and day: the date is the day's in a year of 365 days, SWE is that with which the day begins.
pub(super) fn through_year(found: &SweThroughYear, reader: Reader) -> Vec<u8> {
    let (depth, warming) = (reader.units.depth(), reader.units.warming());
    let mut writer = Writer::from_writer(Vec::new());
    let mut header = vec![
        "day_of_water_year".to_owned(),
        "date_in_365_day_year".to_owned(),
        format!("level_{}", warming.suffix),
    ];
    header.extend(["q10", "q50", "q90", "bin_width"].map(|number| format!("swe_{number}_{}", depth.suffix)));
    header.push("years".to_owned());
    write(&mut writer, &header);
    let first = reader.starts.first_day(YEAR_OF_365_DAYS);
    for level in &found.levels {
        let days = level.q10_mm.iter().zip(&level.q50_mm).zip(&level.q90_mm);
        for (day, ((q10_mm, q50_mm), q90_mm)) in (1..).zip(days) {
            let mut row = vec![
                day.to_string(),
                date_of(first, day).format("%m-%d").to_string(),
                warming.of(level.level_c).to_string(),
            ];
            row.extend([*q10_mm, *q50_mm, *q90_mm, found.bin_mm].map(|mm| depth.of(mm).to_string()));
            row.push(found.years.to_string());
            write(&mut writer, &row);
        }
    }
    finish(writer)
}
