//! What the odds would be had the record been another of the same kind.

use super::super::numbers::fixed;
use super::super::reader::Reader;
use super::telling_level;
use crate::findings::{Findings, Range};

/// A sentence; nothing where the record or its realizations are too few to tell.
pub(super) fn record_odds(findings: &Findings, reader: Reader) -> Option<String> {
    let found = findings.record_odds.as_ref().filter(|found| found.is_telling())?;
    let level = &found.levels[telling_level(findings)?];
    let percent = |range: Range| {
        let [low, high] = [range.q05, range.q95].map(|share| fixed(100.0 * share, 0));
        if low == high { format!("{low} %") } else { format!("{low} to {high} %") }
    };
    let times = level.chance_ratio.map_or(String::new(), |ratio| {
        format!(", {} to {} times that record's reference", fixed(ratio.q05, 1), fixed(ratio.q95, 1))
    });
    let years = findings.years;
    let runs = level.runs.first().map_or(String::new(), |run| {
        format!(
            "; that a {years}-year realization holds {} years in a row at or below the 30 % quantile, at {}",
            run.years,
            percent(run.chance)
        )
    });
    let snowless = match found.records_run - found.records {
        0 => String::new(),
        count => format!("; {count} more had no snow to be low in"),
    };
    Some(format!(
        "Another record of the same kind would put low-snow years at {} at {} of all{times}{runs} (5–95 % of {} resampled records, {} \
         realizations of each, each with its own limits, moved about this study's own numbers{snowless}): the range of having only this record, which more realizations would not \
         narrow.",
        reader.level(level.level_c),
        percent(level.low_chance),
        found.records,
        found.realizations
    ))
}
