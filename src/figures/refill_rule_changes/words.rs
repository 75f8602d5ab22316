//! What the figure says.

use super::super::ensemble;
use super::super::labels::{counted, grouped, level, sentence};
use super::super::rule_change_words::{
    ALL_BROUGHT_BACK, LEAST_BROUGHT_BACK, RELIABILITY, brought_back, change_in_words, changed,
};
use super::super::shown::{Shown, name};
use super::signed_size;
use crate::findings::{Findings, Operations, Ranged};
use crate::units::UnitSystem;

/// Every text of the figure but names and numbers beside marks.
pub(super) struct Words {
    pub title: String,
    pub ensemble: String,
    pub key: String,
    pub caption: String,
    pub kind_of_drawing: String,
    pub description: String,
    /// The level of which it is told what is brought back, and the heading of that column; none where there is no other level.
    pub back: Option<(usize, String)>,
}

impl Words {
    pub fn of(
        findings: &Findings,
        operations: &Operations,
        shown: &Shown,
        units: UnitSystem,
    ) -> Option<Self> {
        let which = shown.in_words(findings, units);
        let told = shown.told(findings);
        let place = |at: usize| findings.levels_c.get(at).map_or_else(String::new, |c| level(units, *c));
        let described = operations.rule_changes.iter().map(|of| {
            let levels = shown.all().into_iter().filter_map(|at| {
                let share = changed(of, RELIABILITY, at)?.periods.q50.value()?;
                Some(format!("{} {} %", name(findings, at, units), tenths(share)))
            });
            format!("{}: {}", change_in_words(of.change), levels.collect::<Vec<_>>().join(", "))
        });
        let back = told.map(|at| (at, format!("of what {} takes", place(at))));
        let column = back.as_ref().map_or_else(String::new, |(at, _)| {
            format!(
                " Brought back: the median gain in reliability by volume at {0} over the median loss from the reference to {0}; – where \
                 that is next to nothing.",
                place(*at)
            )
        });
        Some(Self {
            title: title(findings, operations, told, units)?,
            ensemble: format!("{}.{which}", ensemble(findings)),
            key: format!(
                "Mark: median over realizations; line: 5–95 %, precipitation's chance, not day-to-day variation.{column}"
            ),
            caption: format!(
                "Reliability by volume (the share of what is demanded that is supplied) and spill a year, under the rules as stated and \
                 under others, at each warming level: medians and 5–95 % ranges over {}, chance of precipitation, not day-to-day \
                 variation.{which}{column} Refill moved: where the flood-space rule rises, it rises so many days sooner or later; what \
                 that means for floods is not looked at here. It is a what-if for planning, no guide to the operation of a dam.",
                ensemble(findings),
            ),
            kind_of_drawing: format!(
                "Two panels that share a list of {} beside the rules as stated, a mark a level.",
                counted(operations.rule_changes.len() - 1, "change")
            ),
            description: format!(
                "Median reliability by volume. {}.",
                sentence(&described.collect::<Vec<_>>().join("; "))
            ),
            back,
        })
    }
}

/// `98.6`: a share in percent, to a tenth.
fn tenths(share: f64) -> String {
    grouped(100.0 * share, 1)
}

/// `At +2 °C, reliability by volume falls from 98.6 to 98.0 %; refill 30 days earlier brings back 57 % of that (5–95 %: 47–67)`.
fn title(
    findings: &Findings,
    operations: &Operations,
    told: Option<usize>,
    units: UnitSystem,
) -> Option<String> {
    let as_stated = operations.rule_changes.first()?;
    let median = |at: usize| changed(as_stated, RELIABILITY, at)?.periods.q50.value();
    let Some(reference) = median(findings.reference) else {
        return Some("Nothing is demanded of the reservoir, so that nothing can fall short".to_owned());
    };
    let Some((at, warmed)) = told.and_then(|at| Some((at, median(at)?))) else {
        return Some(format!(
            "Reliability by volume is {} % at the reference; no other level was run",
            tenths(reference)
        ));
    };
    let place = findings.levels_c.get(at).map_or_else(String::new, |c| level(units, *c));
    let Some((change, found)) = brought_back(operations, [findings.reference, at]) else {
        return Some(format!(
            "At {place}, warming takes next to nothing of the reservoir's reliability by volume ({} %, {} % at the reference): \
             there is nothing to bring back",
            tenths(warmed),
            tenths(reference)
        ));
    };
    let falls =
        format!("At {place}, reliability by volume falls from {} to {} %", tenths(reference), tenths(warmed));
    let rule = change_in_words(change);
    let brings = |what: &str| format!("{falls}; {rule} brings back {what}{}", range(found));
    Some(match found.value {
        ..LEAST_BROUGHT_BACK => format!("{falls}; none of the changes tried brings any of that back"),
        ALL_BROUGHT_BACK.. => brings("all of that"),
        value => brings(&format!("{} % of that", signed_size(100.0 * value))),
    })
}

/// ` (5–95 %: 47 to 67 %)`.
fn range(found: Ranged) -> String {
    match (found.q05, found.q95) {
        (Some(low), Some(high)) => {
            format!(" (5–95 %: {} to {} %)", signed_size(100.0 * low), signed_size(100.0 * high))
        }
        _ => String::new(),
    }
}
