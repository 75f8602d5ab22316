//! Low-snow odds and low years in a row over resampled records.

use super::cells::{finish, range, write};
use crate::findings::RecordOdds;
use crate::units::UnitSystem;
use csv::Writer;

/// One row a level.
pub(super) fn record_odds(found: &RecordOdds, units: UnitSystem) -> Vec<u8> {
    let mut writer = Writer::from_writer(Vec::new());
    let mut header = vec![
        format!("level_{}", units.warming().suffix),
        "records".to_owned(),
        "years_of_each".to_owned(),
        "realizations_of_each".to_owned(),
    ];
    let runs = found.levels.first().map(|level| level.runs.as_slice()).unwrap_or_default();
    let of_runs = runs.iter().map(|run| format!("chance_{}_low_years_in_a_row", run.years));
    let numbers = ["chance_low_snow", "chance_ratio"].map(str::to_owned).into_iter().chain(of_runs);
    header.extend(numbers.flat_map(|number| ["q05", "q95"].map(|end| format!("{number}_{end}"))));
    write(&mut writer, &header);
    for level in &found.levels {
        let mut row = vec![
            units.warming().of(level.level_c).to_string(),
            found.records.to_string(),
            found.record_years.to_string(),
            found.realizations.to_string(),
        ];
        let of_runs = level.runs.iter().map(|run| Some(run.chance));
        for number in [Some(level.low_chance), level.chance_ratio].into_iter().chain(of_runs) {
            row.extend(range(number, |number| number));
        }
        write(&mut writer, &row);
    }
    finish(writer)
}
