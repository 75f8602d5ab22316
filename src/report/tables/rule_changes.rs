//! What other rules of a reservoir would change, by level.

use super::cells::{Told, finish, name, optional, unit_names, write};
use crate::findings::RuleChange;
use crate::operation::Change;
use crate::units::UnitSystem;
use csv::Writer;

/// One row a change, measure and level, the rules as stated first.
pub(super) fn rule_changes(changes: &[RuleChange], units: UnitSystem) -> Vec<u8> {
    let mut header = ["change", "change_by", "measure", "unit"].map(str::to_owned).to_vec();
    header.push(format!("level_{}", units.warming().suffix));
    header.extend(["realizations", "q05", "q25", "q50", "q75", "q95"].map(str::to_owned));
    header.extend(
        ["shift", "shift_monte_carlo_error", "shift_q05", "shift_q95"]
            .map(|end| format!("{end}_from_stated_rules")),
    );
    header.extend(["", "_q05", "_q95"].map(|end| format!("share_brought_back{end}")));
    let mut writer = Writer::from_writer(Vec::new());
    write(&mut writer, &header);
    for of in changes {
        let (what, by) = match of.change {
            Change::AsStated => ("as stated", None),
            Change::RefillMovedDays(days) => ("refill moved, days", Some(f64::from(days))),
            Change::FloodSpaceTimes(factor) => ("flood space, times", Some(factor)),
            Change::DemandTimes(factor) => ("demand, times", Some(factor)),
        };
        for measure in &of.measures {
            let told = Told { units, kind: measure.measure.kind };
            let [unit, _] = unit_names(measure.measure.kind, units);
            for level in &measure.levels {
                let mut row =
                    vec![what.to_owned(), optional(by), name(&measure.measure, units), unit.to_owned()];
                row.push(units.warming().of(level.level_c).to_string());
                row.push(level.periods.count.to_string());
                row.extend(told.quantiles(&level.periods));
                let shift = level.shift;
                let of_shift = [
                    shift.map(|shift| shift.median.value),
                    shift.and_then(|shift| shift.median.monte_carlo_error),
                    shift.map(|shift| shift.q05),
                    shift.map(|shift| shift.q95),
                ];
                row.extend(of_shift.map(|number| told.change(number)));
                let back = level.brought_back;
                row.extend(
                    [back.map(|b| b.value), back.and_then(|b| b.q05), back.and_then(|b| b.q95)].map(optional),
                );
                write(&mut writer, &row);
            }
        }
    }
    finish(writer)
}
