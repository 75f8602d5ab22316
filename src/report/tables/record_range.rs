//! What other records of the same kind would have answered: ranges over resampled records.

use super::cells::{Told, crossing_range, finish, name, range, unit_names, write};
use crate::findings::Findings;
use crate::units::UnitSystem;
use csv::Writer;

/// One row a basin measure and level but the reference. Shifts are in the measure's own unit, which stands in a column.
pub(super) fn record_range(findings: &Findings, units: UnitSystem) -> Vec<u8> {
    let mut writer = Writer::from_writer(Vec::new());
    let mut header = ["measure", "unit_of_shift", "records", "years_of_each", "realizations_of_each"]
        .map(str::to_owned)
        .to_vec();
    header.push(format!("level_{}", units.warming().suffix));
    for number in [
        "shift",
        "change_pct",
        "signal_to_half_spread",
        "chance_period_below_reference",
        "chance_reaches_reference_median",
    ] {
        header.extend(["q05", "q95"].map(|end| format!("{number}_{end}")));
    }
    header.extend(["q05", "q95"].map(|end| format!("outweighs_from_{end}_{}", units.warming().suffix)));
    write(&mut writer, &header);
    for found in &findings.basin {
        let Some(of_records) = &found.record_range else { continue };
        let told = Told { units, kind: found.measure.kind };
        let [_, unit] = unit_names(found.measure.kind, units);
        let warmed = of_records.levels.iter().enumerate().filter(|(at, _)| *at != findings.reference);
        for (_, level) in warmed {
            let mut row = vec![
                name(&found.measure, units),
                unit.to_owned(),
                of_records.records.to_string(),
                of_records.record_years.to_string(),
                of_records.realizations.to_string(),
                units.warming().of(level.level_c).to_string(),
            ];
            row.extend(range(level.shift, |shift| told.in_units(shift)));
            for plain in [
                level.percent_change,
                level.signal_to_spread,
                level.period_below_reference,
                level.reaches_reference_median,
            ] {
                row.extend(range(plain, |number| number));
            }
            row.extend(crossing_range(of_records.outweighs, units));
            write(&mut writer, &row);
        }
    }
    finish(writer)
}
