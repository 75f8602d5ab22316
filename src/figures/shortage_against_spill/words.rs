//! What the figure says.

use super::super::ensemble;
use super::super::labels::{counted, grouped, level, sentence, volume};
use super::super::rule_change_words::{change_in_words, changed};
use super::super::shown::{Shown, name};
use super::{Across, SHORTAGE};
use crate::findings::{Findings, Operations, RuleChange};
use crate::operation::Change;
use crate::units::UnitSystem;

/// Every text of the figure but names and numbers beside marks.
pub(super) struct Words {
    pub title: String,
    pub ensemble: String,
    pub up: String,
    pub right: String,
    pub key: String,
    pub caption: String,
    pub kind_of_drawing: String,
    pub description: String,
    /// The levels whose marks have the numbers of the rules beside them.
    pub numbered: Vec<usize>,
}

impl Words {
    pub fn of(
        findings: &Findings,
        operations: &Operations,
        across: Across,
        shown: &Shown,
        units: UnitSystem,
    ) -> Option<Self> {
        let unit = units.volume().word;
        let which = shown.in_words(findings, units);
        let rules: Vec<String> = (1..)
            .zip(&operations.rule_changes)
            .map(|(number, of)| format!("{number} {}", change_in_words(of.change)))
            .collect();
        let rules = rules.join("; ");
        let right = match across {
            Across::Spill => format!("Spill a year ({unit})"),
            Across::Encroached => "Days a year above the stated flood-space rule".to_owned(),
        };
        let why = match across {
            Across::Spill => "",
            Across::Encroached => {
                " Hardly any of these rules spills, so that days above the stated flood-space rule, whichever rule is run, stand for what it costs."
            }
        };
        let described = operations.rule_changes.iter().map(|of| {
            let levels = shown.all().into_iter().filter_map(|at| {
                let (short, cost) = both(of, across, at)?;
                Some(format!(
                    "{} {} and {}",
                    name(findings, at, units),
                    volume(units, short),
                    amount(across, cost, units)
                ))
            });
            format!("{}: {}", change_in_words(of.change), levels.collect::<Vec<_>>().join(", "))
        });
        let numbered: Vec<usize> =
            [Some(findings.reference), shown.farthest()].into_iter().flatten().collect();
        Some(Self {
            title: title(findings, operations, across, shown, units)?,
            ensemble: format!("{}.{which}", ensemble(findings)),
            up: format!("Shortage a year ({unit})"),
            key: format!(
                "Mark: medians over realizations; line: the date of refill moved, at one level; less of both is better. Rules, numbered at the \
                 reference and the farthest level: {rules}."
            ),
            caption: format!(
                "Shortage against {} under the rules as stated and under others, at each warming level: medians over {}, whose 5–95 % \
                 ranges stand in the table; they are chance of precipitation, not day-to-day variation.{which} Rules: {rules}.{why} It is \
                 a what-if for planning, no guide to the operation of a dam.",
                match across {
                    Across::Spill => "spill",
                    Across::Encroached => "days above the stated flood-space rule",
                },
                ensemble(findings),
            ),
            kind_of_drawing: format!(
                "A line for each of {}, a mark for each set of rules.",
                counted(shown.all().len(), "level")
            ),
            description: format!(
                "Median shortage a year, {unit}, and {}. {}.",
                right.to_lowercase(),
                sentence(&described.collect::<Vec<_>>().join("; "))
            ),
            right,
            numbered,
        })
    }
}

/// Shortage, and what it is held against.
fn both(of: &RuleChange, across: Across, at: usize) -> Option<(f64, f64)> {
    let median = |name: &str| changed(of, name, at)?.periods.q50.value();
    Some((median(SHORTAGE)?, median(across.measure())?))
}

/// `0.24 hm³`, `0.5 days`.
fn amount(across: Across, value: f64, units: UnitSystem) -> String {
    match across {
        Across::Spill => format!("{} {}", volume(units, value), units.volume().word),
        Across::Encroached => {
            let days = grouped(value, 1);
            format!("{days} {}", if days == "1.0" { "day" } else { "days" })
        }
    }
}

/// `At +2 °C, refill 45 days earlier takes shortage from 5.29 to 4.21 hm³ a year, and spill from 0 to 0.24 hm³ a year`.
fn title(
    findings: &Findings,
    operations: &Operations,
    across: Across,
    shown: &Shown,
    units: UnitSystem,
) -> Option<String> {
    let at = shown.told(findings).unwrap_or(findings.reference);
    let place = match shown.told(findings) {
        Some(at) => {
            format!("At {}", findings.levels_c.get(at).map_or_else(String::new, |c| level(units, *c)))
        }
        None => "At the reference".to_owned(),
    };
    let (as_stated, others) = operations.rule_changes.split_first()?;
    let (short, cost) = both(as_stated, across, at)?;
    // Of the dates of refill, or, where none was tried, of all rules, the one with least shortage.
    let least = |moves_refill: bool| {
        let asked =
            others.iter().filter(|of| !moves_refill || matches!(of.change, Change::RefillMovedDays(_)));
        let found = asked.filter_map(|of| Some((of.change, both(of, across, at)?)));
        found.min_by(|a, b| a.1.0.total_cmp(&b.1.0))
    };
    let (change, (other_short, other_cost)) = least(true).or_else(|| least(false))?;
    let rule = change_in_words(change);
    let cost_name = match across {
        Across::Spill => "spill",
        Across::Encroached => "days above the stated flood-space rule",
    };
    let unit = units.volume().word;
    let [before, after] = [short, other_short].map(|hm3| volume(units, hm3));
    if before == after || other_short >= short {
        return Some(format!(
            "{place}, no {} makes shortage less than the {before} {unit} a year of the rules as stated",
            if matches!(change, Change::RefillMovedDays(_)) {
                "date of refill that was tried"
            } else {
                "rule that was tried"
            }
        ));
    }
    let [cost_before, cost_after] = [cost, other_cost].map(|value| match across {
        Across::Spill => volume(units, value),
        Across::Encroached => grouped(value, 1),
    });
    let cost_unit = if across == Across::Spill { format!(" {unit}") } else { String::new() };
    let of_cost = if cost_before == cost_after {
        let stay = if across == Across::Spill { "stays" } else { "stay" };
        format!("; {cost_name} {stay} at {cost_after}")
    } else {
        format!(" and {cost_name} from {cost_before} to {cost_after}")
    };
    Some(format!(
        "{place}, {rule} takes shortage from {before} to {after} {unit} a year{of_cost}{cost_unit} a year"
    ))
}
