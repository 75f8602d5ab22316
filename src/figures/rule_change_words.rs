//! How a change of a reservoir's rules is called, and which of them brings back how much.

use super::labels::{counted, grouped};
use crate::findings::{ChangedLevel, ChangedMeasure, Operations, Ranged, RuleChange};
use crate::operation::Change;

/// What is told of rules: the measure that stands in titles and sentences.
pub const RELIABILITY: &str = "reliability_volume_share";

/// A smaller share of what is taken is nothing: half a percent.
pub const LEAST_BROUGHT_BACK: f64 = 0.005;

/// From this share on all is brought back, as it is told.
pub const ALL_BROUGHT_BACK: f64 = 0.995;

/// `as stated`, `refill 30 days earlier`, `flood space × 0.5`, `demand × 0.9`.
pub fn change_in_words(change: Change) -> String {
    let factor = |factor: f64| {
        let decimals = (0..4).find(|decimals| {
            let power = libm::pow(10.0, f64::from(*decimals));
            ((factor * power).round() / power - factor).abs() < 1e-9
        });
        grouped(factor, decimals.unwrap_or(4) as usize)
    };
    match change {
        Change::AsStated => "as stated".to_owned(),
        Change::RefillMovedDays(days) => {
            let direction = if days < 0 { "earlier" } else { "later" };
            format!("refill {} {direction}", counted(days.unsigned_abs() as usize, "day"))
        }
        Change::FloodSpaceTimes(times) => format!("flood space × {}", factor(times)),
        Change::DemandTimes(times) => format!("demand × {}", factor(times)),
    }
}

/// What a change costs in room for floods, in words: ` Storage would then stand above the stated flood-space rule on 67 days a year,
/// 0.5 under the stated rules.` Nothing where it costs less than a tenth of a day.
pub fn cost_in_days_above(operations: &Operations, change: Change, at: usize) -> Option<String> {
    let days = |of: &RuleChange| changed(of, "flood_space_encroached_days", at)?.periods.q50.value();
    let before = days(operations.rule_changes.first()?)?;
    let after = days(operations.rule_changes.iter().find(|of| of.change == change)?)?;
    let told = |days: f64| grouped(days, usize::from(days < 9.95));
    (after - before >= 0.1).then(|| {
        format!(
            " Storage would then stand above the stated flood-space rule on {} days a year, {} under the stated rules.",
            told(after),
            told(before)
        )
    })
}

/// The measure of that name under a change.
pub(super) fn measure<'a>(of: &'a RuleChange, name: &str) -> Option<&'a ChangedMeasure> {
    of.measures.iter().find(|found| found.measure.name == name)
}

/// What a change comes to in a measure, at a level.
pub(super) fn changed<'a>(of: &'a RuleChange, name: &str, at: usize) -> Option<&'a ChangedLevel> {
    measure(of, name)?.levels.get(at)
}

/// The change that brings back most of what warming takes of reliability by volume at a level, and how much: of those that move the
/// refill, or, where none of them brings back anything, of those that keep the demand as it is: less demand is met more easily, which
/// brings no water back. Nothing where warming takes next to nothing, or where the medians, as they are told to a tenth of a
/// percent, do not fall.
pub fn brought_back(operations: &Operations, [reference, at]: [usize; 2]) -> Option<(Change, Ranged)> {
    let as_stated = operations.rule_changes.first()?;
    let told = |at: usize| Some((1000.0 * changed(as_stated, RELIABILITY, at)?.periods.q50.value()?).round());
    if told(at)? >= told(reference)? {
        return None;
    }
    let found = |of: &RuleChange| Some((of.change, changed(of, RELIABILITY, at)?.brought_back?));
    let most = |moves_refill: bool| {
        let asked = operations
            .rule_changes
            .iter()
            .filter(|of| !matches!(of.change, Change::DemandTimes(_)))
            .filter(|of| !moves_refill || matches!(of.change, Change::RefillMovedDays(_)));
        asked.filter_map(found).max_by(|a, b| a.1.value.total_cmp(&b.1.value))
    };
    most(true).filter(|(_, back)| back.value >= LEAST_BROUGHT_BACK).or_else(|| most(false))
}
