//! Break-even precipitation, and how wet periods have been.

use super::cells::{finish, optional, write, yes_or_no};
use crate::findings::BreakEven;
use crate::units::UnitSystem;
use csv::Writer;

/// One row a level but the reference; empty where nothing within the bracket makes up for the level, and where the record
/// has no period as long as a realization.
pub(super) fn break_even(found: &BreakEven, units: UnitSystem) -> Vec<u8> {
    let mut writer = Writer::from_writer(Vec::new());
    let mut header = vec![format!("level_{}", units.warming().suffix)];
    header.extend(
        [
            "precipitation_change_pct",
            "realizations_run",
            "realizations_that_reached",
            "realizations",
            "realizations_wettest_pct",
            "years_of_a_period",
            "record_reached",
            "record_wettest_pct",
        ]
        .map(str::to_owned),
    );
    write(&mut writer, &header);
    let reached = &found.reached;
    for level in &found.levels {
        let row = [
            units.warming().of(level.level_c).to_string(),
            optional(level.precipitation_change_pct),
            found.realizations.to_string(),
            level.realizations_that_reached.to_string(),
            reached.realizations.to_string(),
            reached.realizations_wettest_pct.to_string(),
            reached.years.to_string(),
            level.record_reached.map(yes_or_no).unwrap_or_default(),
            optional(reached.record_wettest_pct),
        ];
        write(&mut writer, &row);
    }
    finish(writer)
}
