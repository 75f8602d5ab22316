//! Years of the record at every level.

use super::cells::{Told, finish, optional, write};
use crate::findings::ReplayedYears;
use crate::season::{Kind, Measure};
use crate::units::UnitSystem;
use csv::Writer;

/// One row a year and level; the headline SWE under its own name.
pub(super) fn replayed_years(found: &ReplayedYears, headline: &Measure, units: UnitSystem) -> Vec<u8> {
    let mut writer = Writer::from_writer(Vec::new());
    let depth = units.depth();
    write(
        &mut writer,
        &[
            "water_year".to_owned(),
            "rank_from_least".to_owned(),
            format!("level_{}", units.warming().suffix),
            super::cells::name(headline, units),
            "percent_of_normal".to_owned(),
            format!("peak_swe_{}", depth.suffix),
            "melt_out_day".to_owned(),
        ],
    );
    let day = Told { units, kind: Kind::DayOfWaterYear };
    for year in &found.years {
        for level in &year.levels {
            let row = [
                year.water_year.to_string(),
                year.rank_from_least.to_string(),
                units.warming().of(level.level_c).to_string(),
                depth.of(level.headline_mm).to_string(),
                optional(level.percent_of_normal),
                depth.of(level.peak_swe_mm).to_string(),
                day.outcome(level.melt_out_day),
            ];
            write(&mut writer, &row);
        }
    }
    finish(writer)
}
