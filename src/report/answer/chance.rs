//! Chances in words, in the direction of a shift.

use super::super::numbers::fixed;
use super::super::reader::Reader;
use crate::findings::{Chance, Findings, LevelFindings};

/// How likely chance alone would hide a level's change.
pub(super) fn could_be_hidden(findings: &Findings, at: &LevelFindings, reader: Reader) -> Option<String> {
    let [beyond, year_beyond, back] = towards_shift(at)?;
    let side = if at.shift?.median.value < 0.0 { "below" } else { "above" };
    Some(format!(
        "At {}, an independent {}-year mean lies {side} a reference one with a chance of {}, a single year {side} a single \
         reference year with {}; {} of these realizations come back to the reference's median all the same.",
        reader.level(at.level_c),
        findings.years,
        chance(beyond),
        chance(year_beyond),
        chance(back)
    ))
}

/// The chances in the direction of the shift: that an independent period value, and a single year, lie on that side of a
/// reference one, and that a realization comes back to the reference's median all the same. Nothing where there is no
/// percentage to speak of, or no shift.
pub fn towards_shift(at: &LevelFindings) -> Option<[Chance; 3]> {
    at.percent_change?;
    let is_fall = at.shift?.median.value < 0.0;
    let chances = at.chances?;
    let found =
        [chances.period_below_reference?, chances.year_below_reference?, chances.reaches_reference_median?];
    Some(if is_fall { found } else { found.map(Chance::opposite) })
}

/// The same for a table: `97 ± 1 %`, `> 99 %`, `< 1 %`.
pub fn chance_in_table(found: Chance) -> String {
    match found.bound {
        Some(bound) if found.estimate.value > 0.5 => format!("> {} %", fixed(100.0 * (1.0 - bound), 0)),
        Some(bound) => format!("< {} %", fixed(100.0 * bound, 0)),
        None => chance(found),
    }
}

/// `97 ± 1 %`, or `above 99 %` and `below 1 %` where no realization counts for the other side.
pub fn chance(chance: Chance) -> String {
    let percent = 100.0 * chance.estimate.value;
    match chance.bound {
        Some(bound) if percent > 50.0 => {
            format!("100 % (95 % sure of more than {} %)", fixed(100.0 * (1.0 - bound), 0))
        }
        Some(bound) => format!("0 % (95 % sure of less than {} %)", fixed(100.0 * bound, 0)),
        None => {
            let error = chance.estimate.monte_carlo_error.map(|error| 100.0 * error);
            let decimals = match error {
                Some(error) if error < 0.05 => 2,
                Some(error) if error < 0.95 => 1,
                _ => 0,
            };
            let error = error.map_or(String::new(), |error| format!(" ± {}", fixed(error, decimals)));
            format!("{}{error} %", fixed(percent, decimals))
        }
    }
}
