//! What becomes of the water: every measure of inflow, storage and whole realizations, by level.

use super::cells::{Told, crossing_range, estimate, finish, name, optional, outweighs, unit_names, write};
use crate::findings::{LevelFindings, MeasureFindings, Operations};
use crate::season::Kind;
use crate::units::UnitSystem;
use csv::Writer;

/// The tables, each with its name; those that would have no row are left out.
pub(super) fn operations(found: &Operations, units: UnitSystem) -> Vec<(&'static str, Vec<u8>)> {
    let lists = [
        ("inflow", &found.inflow),
        ("storage", &found.storage),
        ("reservoir-performance", &found.performance),
    ];
    let told = lists.into_iter().filter(|(_, list)| !list.is_empty());
    told.map(|(name, list)| (name, measures(list, units))).collect()
}

/// One row a measure and level. Measures differ in their units, which stand in columns.
fn measures(list: &[MeasureFindings], units: UnitSystem) -> Vec<u8> {
    let warming = units.warming().suffix;
    let mut header = ["measure", "unit", "unit_of_shift"].map(str::to_owned).to_vec();
    header.push(format!("level_{warming}"));
    header.extend(["realizations", "realizations_none", "realizations_not_reached"].map(str::to_owned));
    header.extend(["q05", "q25", "q50", "q75", "q95"].map(str::to_owned));
    header.extend(["shift", "shift_monte_carlo_error", "shift_q05", "shift_q95"].map(str::to_owned));
    header.extend(["shift_pairs", "shift_pairs_without_value", "change_pct"].map(str::to_owned));
    header.extend(["signal_to_half_spread", "signal_to_half_spread_monte_carlo_error"].map(str::to_owned));
    header.push("outweighs".to_owned());
    header.extend(["from", "until", "from_q05", "from_q95"].map(|end| format!("outweighs_{end}_{warming}")));
    header.extend(["years_none", "years_not_reached"].map(str::to_owned));
    header.extend(["q05", "q25", "q50", "q75", "q95"].map(|q| format!("single_year_{q}")));
    let mut writer = Writer::from_writer(Vec::new());
    write(&mut writer, &header);
    for found in list {
        for level in &found.levels {
            write(&mut writer, &row(found, level, units));
        }
    }
    finish(writer)
}

fn row(found: &MeasureFindings, level: &LevelFindings, units: UnitSystem) -> Vec<String> {
    let kind = found.measure.kind;
    let told = Told { units, kind };
    let mut row = vec![name(&found.measure, units)];
    row.extend(unit_names(kind, units).map(str::to_owned));
    row.push(units.warming().of(level.level_c).to_string());
    let periods = &level.periods;
    row.extend([periods.count, periods.none, periods.not_reached].map(|count| count.to_string()));
    row.extend(told.quantiles(periods));
    let shift = level.shift;
    let median = shift.map(|shift| shift.median);
    let of_shift = [
        median.map(|median| median.value),
        median.and_then(|median| median.monte_carlo_error),
        shift.map(|shift| shift.q05),
        shift.map(|shift| shift.q95),
    ];
    row.extend(of_shift.map(|number| told.change(number)));
    let counts = [shift.map(|shift| shift.pairs), shift.map(|shift| shift.pairs_without_value)];
    row.extend(counts.map(|count| count.map_or(String::new(), |count| count.to_string())));
    row.push(optional(level.percent_change));
    row.extend(estimate(level.signal_to_spread));
    row.extend(outweighs(found.outweighs, units));
    row.extend(crossing_range(found.outweighs_range, units));
    let [none, never] = level.years_undefined;
    let not_reached = if kind == Kind::ArrivalDay { never } else { 0 };
    match &level.single_years {
        Some(single_years) => {
            row.extend([none, not_reached].map(|count| count.to_string()));
            row.extend(told.quantiles(single_years));
        }
        // What is told of a whole realization has no years.
        None => row.extend(std::iter::repeat_n(String::new(), 7)),
    }
    row
}
