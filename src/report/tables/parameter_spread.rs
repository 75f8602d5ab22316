//! Spreads of parameters, precipitation and warming side by side.

use super::cells::{Told, finish, name, optional, unit_names, write};
use crate::findings::{Mover, OverSets, ParameterSpread};
use crate::units::UnitSystem;
use csv::Writer;

/// One row a measure and level but the reference; numbers in the measure's own unit, which stands in a column.
pub(super) fn parameter_spread(spread: &ParameterSpread, units: UnitSystem) -> Vec<u8> {
    let mut writer = Writer::from_writer(Vec::new());
    let mut header =
        ["measure", "unit", "unit_of_change", "sets", "realizations_of_each"].map(str::to_owned).to_vec();
    header.push(format!("level_{}", units.warming().suffix));
    header.push("reference_median_own".to_owned());
    for number in ["reference_median", "change", "change_pct"] {
        header.extend(["lowest", "highest"].map(|end| format!("{number}_{end}_of_sets")));
    }
    header.extend(
        [
            "warming",
            "precipitation_half_spread",
            "parameters_reach",
            "warming_over_parameters",
            "largest",
            "variance_share_level",
            "variance_share_realization",
            "variance_share_set",
            "variance_share_remainder",
        ]
        .map(str::to_owned),
    );
    write(&mut writer, &header);
    for found in &spread.measures {
        let told = Told { units, kind: found.measure.kind };
        let [unit, unit_of_change] = unit_names(found.measure.kind, units);
        for level in &found.levels {
            let mut row = vec![
                name(&found.measure, units),
                unit.to_owned(),
                unit_of_change.to_owned(),
                spread.sets.to_string(),
                spread.realizations.to_string(),
                units.warming().of(level.level_c).to_string(),
            ];
            row.push(optional(Some(told.in_units(found.own_reference))));
            row.extend(over_sets(Some(found.reference), |value| told.in_units(value)));
            row.extend(over_sets(Some(level.shift), |value| told.in_units(value)));
            row.extend(over_sets(level.percent_change, |percent| percent));
            let weighed = level.weighed;
            let sizes = weighed.map(|found| [found.warming, found.precipitation, found.parameters]);
            row.extend([0, 1, 2].map(|at| told.change(sizes.map(|sizes| sizes[at]))));
            row.push(optional(weighed.and_then(|found| found.warming_over_parameters)));
            row.push(weighed.map_or("", |found| word(found.largest)).to_owned());
            let shares = level.variance_shares;
            let shares =
                shares.map(|shares| [shares.level, shares.realization, shares.set, shares.remainder]);
            row.extend([0, 1, 2, 3].map(|at| optional(shares.map(|shares| shares[at]))));
            write(&mut writer, &row);
        }
    }
    finish(writer)
}

/// One row a level and averaging period: how level, chance, set and what they do only together share the variance.
pub(super) fn variance_with_parameters(spread: &ParameterSpread, units: UnitSystem) -> Vec<u8> {
    let mut writer = Writer::from_writer(Vec::new());
    let header = ["measure", "sets", "realizations_of_each", "averaged_years"].map(str::to_owned);
    let level = format!("level_{}", units.warming().suffix);
    let shares = ["share_level", "share_chance", "share_set", "share_together"].map(str::to_owned);
    write(&mut writer, &[header.as_slice(), &[level], shares.as_slice()].concat());
    for found in &spread.measures {
        for (level, of) in
            found.levels.iter().flat_map(|level| level.averaged_shares.iter().map(move |of| (level, of)))
        {
            let mut row = vec![
                name(&found.measure, units),
                spread.sets.to_string(),
                spread.realizations.to_string(),
                of.years.to_string(),
                units.warming().of(level.level_c).to_string(),
            ];
            let shares = of.shares;
            row.extend(
                [shares.level, shares.realization, shares.set, shares.remainder]
                    .map(|share| share.to_string()),
            );
            write(&mut writer, &row);
        }
    }
    finish(writer)
}

fn over_sets(found: Option<OverSets>, told: impl Fn(f64) -> f64) -> [String; 2] {
    let ends = found.map(|found| [found.lowest, found.highest].map(|end| optional(Some(told(end)))));
    ends.unwrap_or_default()
}

fn word(mover: Mover) -> &'static str {
    match mover {
        Mover::Warming => "warming",
        Mover::Precipitation => "precipitation",
        Mover::Parameters => "parameters",
    }
}
