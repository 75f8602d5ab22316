//! What the user wants to hold, level by level, and from which warming on it fails.

use super::cells::{crossing_range, estimate, finish, optional, write, yes_or_no};
use crate::findings::{Asks, Crossing, TippingLevel};
use crate::units::UnitSystem;
use csv::Writer;

/// One row a criterion and level.
pub(super) fn criteria(found: &[TippingLevel], units: UnitSystem) -> Vec<u8> {
    let mut writer = Writer::from_writer(Vec::new());
    let degree = units.warming().suffix;
    let header = [
        "criterion".to_owned(),
        "asks".to_owned(),
        "unit".to_owned(),
        "limit".to_owned(),
        format!("level_{degree}"),
        "value".to_owned(),
        "value_monte_carlo_error".to_owned(),
        "holds".to_owned(),
        "fails".to_owned(),
        format!("fails_from_{degree}"),
        format!("fails_from_q05_{degree}"),
        format!("fails_from_q95_{degree}"),
    ];
    write(&mut writer, &header);
    for of in found {
        let (asks, unit, limit, factor) = match of.criterion.asks {
            Asks::MedianAtLeast { swe_mm, .. } => {
                let depth = units.depth();
                ("median at least", depth.suffix, depth.of(swe_mm), depth.of(1.0))
            }
            Asks::LowSnowYearsAtMost { share, .. } => ("low-snow years at most", "share", share, 1.0),
        };
        let (word, from_c) = match of.fails {
            _ if of.holds_at_reference == Some(false) => ("at the reference", None),
            Crossing::At { level_c, .. } => ("at", Some(level_c)),
            Crossing::NotReached { .. } => ("not reached", None),
            Crossing::Unknown => ("unknown", None),
        };
        let range = of.fails_range.filter(|_| of.holds_at_reference == Some(true));
        for level in &of.levels {
            let mut row =
                vec![of.criterion.name.clone(), asks.to_owned(), unit.to_owned(), limit.to_string()];
            row.push(units.warming().of(level.level_c).to_string());
            row.extend(estimate(Some(crate::findings::Estimate {
                value: level.value.value * factor,
                monte_carlo_error: level.value.monte_carlo_error.map(|error| error * factor),
            })));
            row.push(yes_or_no(level.holds));
            row.push(word.to_owned());
            row.push(optional(from_c.map(|from_c| units.warming().of(from_c))));
            row.extend(crossing_range(range, units));
            write(&mut writer, &row);
        }
    }
    finish(writer)
}
