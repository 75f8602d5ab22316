//! The driest and the wettest year of a realization beside the mean of its years.

use super::cells::{Told, finish, name, write};
use crate::findings::Findings;
use crate::units::UnitSystem;
use csv::Writer;

/// One row a measure and level, of the basin's measures whose driest and wettest years are told.
pub(super) fn driest_and_wettest(findings: &Findings, units: UnitSystem) -> Vec<u8> {
    let mut writer = Writer::from_writer(Vec::new());
    let mut header = vec!["measure".to_owned(), format!("level_{}", units.warming().suffix)];
    let depth = units.depth().suffix;
    for year in ["driest_year", "mean", "wettest_year"] {
        header.extend(
            ["median", "median_monte_carlo_error", "q05", "q95"].map(|end| format!("{year}_{end}_{depth}")),
        );
    }
    write(&mut writer, &header);
    for found in &findings.basin {
        let told = Told { units, kind: found.measure.kind };
        for level in &found.levels {
            let Some(years) = level.driest_and_wettest else { continue };
            let mut row = vec![name(&found.measure, units), units.warming().of(level.level_c).to_string()];
            for over in [years.driest, years.mean, years.wettest] {
                let median = [Some(over.median.value), over.median.monte_carlo_error];
                row.extend(
                    median
                        .into_iter()
                        .chain([Some(over.q05), Some(over.q95)])
                        .map(|number| told.change(number)),
                );
            }
            write(&mut writer, &row);
        }
    }
    finish(writer)
}
