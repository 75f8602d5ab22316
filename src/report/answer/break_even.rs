//! How much more precipitation would make up for a warming, and whether so much was ever there.

use super::super::numbers::{fixed, signed};
use super::super::reader::Reader;
use super::period_name;
use crate::findings::{BREAK_EVEN_BRACKET_PCT, BreakEven, BreakEvenLevel, Findings, MeasureFindings};
use crate::season::LEAST_REFERENCE_MM;

/// A sentence a warmer level, and how wet periods have been; none where there is hardly any snow to regain.
pub(super) fn break_even(findings: &Findings, headline: &MeasureFindings, reader: Reader) -> Vec<String> {
    let Some(found) = &findings.break_even else {
        return Vec::new();
    };
    let reference_c = findings.levels_c[findings.reference];
    let warmer: Vec<&BreakEvenLevel> = found.levels.iter().filter(|at| at.level_c > reference_c).collect();
    if found.reference_median < LEAST_REFERENCE_MM || warmer.is_empty() {
        return Vec::new();
    }
    let name = period_name(findings, headline);
    let mut words: Vec<String> = warmer.into_iter().map(|at| of_level(found, at, &name, reader)).collect();
    let reached = &found.reached;
    let record = match reached.record_wettest_pct {
        Some(pct) => format!(
            "the wettest run of {} usable years in the record brought {} % against its mean",
            reached.years,
            signed(pct, 0)
        ),
        None => format!("the record has fewer than {} usable years", reached.years),
    };
    words.push(format!(
        "Cool-season precipitation over {} years: {record}; the wettest of {} realizations brought {} %.",
        reached.years,
        fixed(reached.realizations as f64, 0),
        signed(reached.realizations_wettest_pct, 0)
    ));
    words
}

/// The sentence of one level.
pub(super) fn at(
    findings: &Findings,
    headline: &MeasureFindings,
    at: usize,
    reader: Reader,
) -> Option<String> {
    let found = findings.break_even.as_ref().filter(|found| found.reference_median >= LEAST_REFERENCE_MM)?;
    let at = found.levels.iter().find(|level| level.level_c == findings.levels_c[at])?;
    Some(of_level(found, at, &period_name(findings, headline), reader))
}

fn of_level(found: &BreakEven, at: &BreakEvenLevel, name: &str, reader: Reader) -> String {
    let level = reader.level(at.level_c);
    let Some(pct) = at.precipitation_change_pct else {
        let [_, most] = BREAK_EVEN_BRACKET_PCT;
        return format!(
            "At {level}, no increase of precipitation up to {} % restores the {name}.",
            signed(most, 0)
        );
    };
    if pct <= 0.0 {
        return format!(
            "At {level}, the {name} stands at the reference's median with {} % of precipitation: the warming costs nothing \
             that would have to be made up.",
            signed(pct, 0)
        );
    }
    let so_wet = match at.realizations_that_reached {
        0 => "none of the".to_owned(),
        count => format!("{} of the", fixed(count as f64, 0)),
    };
    format!(
        "At {level}, {} % more precipitation on every wet day would bring the {name} back to the reference's median; {so_wet} \
         {} realizations came to so much in the cool season by chance and assumption.",
        fixed(pct, 0),
        fixed(found.reached.realizations as f64, 0)
    )
}
