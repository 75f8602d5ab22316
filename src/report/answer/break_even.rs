//! How much more precipitation would make up for a warming, and whether so much was ever there.

use super::super::numbers::{counted, fixed, signed};
use super::super::reader::Reader;
use super::period_name;
use crate::findings::{BREAK_EVEN_BRACKET_PCT, BreakEven, BreakEvenLevel, Findings, MeasureFindings, Stays};
use crate::season::LEAST_REFERENCE_MM;

/// A sentence a warmer level, and how wet periods have been; none where there is hardly any snow to regain. `on_top` says where
/// the study states a change with its levels, to which that which makes up for it is added.
pub(super) fn break_even(
    findings: &Findings,
    headline: &MeasureFindings,
    on_top: &str,
    reader: Reader,
) -> Vec<String> {
    let Some(found) = &findings.break_even else {
        return Vec::new();
    };
    let reference_c = findings.levels_c[findings.reference];
    let warmer: Vec<&BreakEvenLevel> = found.levels.iter().filter(|at| at.level_c > reference_c).collect();
    if found.reference_median < LEAST_REFERENCE_MM || warmer.is_empty() {
        return Vec::new();
    }
    let name = period_name(findings, headline);
    let mut words: Vec<String> =
        warmer.into_iter().filter_map(|at| of_level(found, at, [&name, on_top], reader)).collect();
    let reached = &found.reached;
    let of = if reached.is_of_whole_years { "Precipitation" } else { "Cool-season precipitation" };
    let years = counted(reached.years, "year");
    let record = match reached.record_wettest_pct {
        Some(pct) => format!(
            "the wettest run of {} in use brought {} % against the record's mean",
            counted(reached.years, "year"),
            signed(pct, 0)
        ),
        None => format!("the record has fewer than {} in use", counted(reached.years, "year")),
    };
    words.push(format!(
        "{of} over {years}: {record}; the wettest of {} brought {} %.",
        counted(reached.realizations, "realization"),
        signed(reached.realizations_wettest_pct, 0)
    ));
    words
}

/// The sentence of one level.
pub(super) fn at(
    findings: &Findings,
    headline: &MeasureFindings,
    at: usize,
    on_top: &str,
    reader: Reader,
) -> Option<String> {
    let found = findings.break_even.as_ref().filter(|found| found.reference_median >= LEAST_REFERENCE_MM)?;
    let at = found.levels.iter().find(|level| level.level_c == findings.levels_c[at])?;
    of_level(found, at, [&period_name(findings, headline), on_top], reader)
}

fn of_level(
    found: &BreakEven,
    at: &BreakEvenLevel,
    [name, on_top]: [&str; 2],
    reader: Reader,
) -> Option<String> {
    let level = reader.level(at.level_c);
    let [least, most] = BREAK_EVEN_BRACKET_PCT;
    let Some(pct) = at.precipitation_change_pct else {
        return Some(match at.stays? {
            Stays::Below => {
                format!(
                    "At {level}, no increase of precipitation up to {} %{on_top} restores the {name}.",
                    signed(most, 0)
                )
            }
            Stays::Above => format!(
                "At {level}, the {name} stays above the reference's median even with {} % less precipitation{on_top}.",
                fixed(-least, 0)
            ),
        });
    };
    let size = fixed(pct.abs(), usize::from(pct.abs() < 9.95));
    if size == "0.0" {
        return Some(format!(
            "At {level}, the {name} stands at the reference's median: there is nothing to be made up for."
        ));
    }
    if pct <= 0.0 {
        return Some(format!(
            "At {level}, the {name} would stand at the reference's median with {size} % less precipitation{on_top}: there is nothing to \
             be made up for."
        ));
    }
    let reached = &found.reached;
    let season = if reached.is_of_whole_years { "" } else { " in the cool season" };
    let so_wet = match (at.realizations_that_reached, reached.realizations) {
        (0, 1) => "the one realization did not come".to_owned(),
        (_, 1) => "the one realization came".to_owned(),
        (0, all) => format!("none of {} came", counted(all, "realization")),
        (count, all) => format!("{} of {} came", fixed(count as f64, 0), counted(all, "realization")),
    };
    Some(format!(
        "At {level}, {size} % more precipitation on every wet day{on_top} would bring the {name} back to the reference's median; {so_wet} \
         to so much{season} by chance and assumption."
    ))
}
