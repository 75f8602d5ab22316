//! How sure the answer is: Monte Carlo error and the record's own uncertainty, kept apart, and what chance could hide.

use super::super::numbers::{counted, signed};
use super::super::reader::Reader;
use super::{chance, telling_level};
use crate::findings::{CrossingRange, Findings, MeasureFindings, Range};

/// The sentences; none where nothing is known of it.
pub(super) fn how_sure(findings: &Findings, headline: &MeasureFindings, reader: Reader) -> Vec<String> {
    let mut words = Vec::new();
    if let Some(range) = headline.outweighs_range {
        words.push(format!(
            "Other realizations of the same kind would put the warming from which it outweighs {} (Monte Carlo, 5–95 %).",
            between(findings, range, reader)
        ));
    }
    let Some(at) = telling_level(findings) else {
        return words;
    };
    if let Some(record) = headline.record_range.as_ref().filter(|record| record.is_telling()) {
        let level = &record.levels[at];
        let mut parts = Vec::new();
        if let Some(range) = level.percent_change {
            parts.push(format!("the change at {} {}", reader.level(level.level_c), percent(range)));
        }
        if let Some(range) = record.outweighs {
            parts.push(format!("the warming from which it outweighs {}", between(findings, range, reader)));
        }
        if !parts.is_empty() {
            words.push(format!(
                "Another record of the same kind would put {} (5–95 % of {} records resampled by years, {} realizations of \
                 each): that comes mostly of having only this record, which more realizations would not mend.",
                parts.join(", and "),
                record.records,
                record.realizations
            ));
        }
    }
    if let Some(record) = headline.record_range.as_ref().filter(|record| !record.is_telling()) {
        words.push(format!(
            "What another record of the same kind would say is not told: of {} years and {} of each resampled record it would \
             mostly be noise.",
            record.record_years,
            counted(record.realizations, "realization")
        ));
    }
    words.extend(chance::could_be_hidden(findings, &headline.levels[at], reader));
    words
}

fn percent(range: Range) -> String {
    let [low, high] = [range.q05, range.q95].map(|percent| signed(percent, 0));
    if low == high { format!("at {low} %") } else { format!("between {low} and {high} %") }
}

/// `between +1.3 and +1.5 °C`, `between +3.4 and above +4 °C`, `above +4 °C`.
fn between(findings: &Findings, range: CrossingRange, reader: Reader) -> String {
    let highest_c = findings.levels_c.last().copied().unwrap_or_default();
    let words = |end: Option<f64>| match end {
        Some(level_c) => reader.between_levels_bare(level_c),
        None => format!("above {}", reader.between_levels_bare(highest_c)),
    };
    let [low, high] = [range.q05_c, range.q95_c].map(words);
    let unit = reader.units.warming().word;
    match (low == high, range.q05_c) {
        (true, Some(_)) => format!("at {low} {unit}"),
        (true, None) => format!("{low} {unit}"),
        (false, _) => format!("between {low} and {high} {unit}"),
    }
}
