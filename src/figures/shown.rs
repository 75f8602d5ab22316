//! Which levels a figure shows where there are more than it has room or forms for, and how it says so.

use super::labels::level;
use crate::findings::Findings;
use crate::units::UnitSystem;

/// Levels beside the reference that are drawn at most.
const MOST: usize = 4;

/// The reference and what is drawn beside it, as places among the study's levels.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Shown {
    reference: usize,
    levels: usize,
    /// The warmer levels, ascending; the colder ones where none is warmer; of more than four, four spread over them, with
    /// the first and the last.
    pub others: Vec<usize>,
}

impl Shown {
    pub fn of(findings: &Findings) -> Self {
        let (reference, levels) = (findings.reference, findings.levels_c.len());
        let warmer: Vec<usize> = (reference + 1..levels).collect();
        let all = if warmer.is_empty() { (0..reference).collect() } else { warmer };
        let others = if all.len() <= MOST {
            all
        } else {
            let place = |at: usize| (at * (all.len() - 1) + (MOST - 1) / 2) / (MOST - 1);
            (0..MOST).filter_map(|at| all.get(place(at)).copied()).collect()
        };
        Self { reference, levels, others }
    }

    /// The reference and the others, ascending.
    pub fn all(&self) -> Vec<usize> {
        let mut all = self.others.clone();
        all.push(self.reference);
        all.sort_unstable();
        all
    }

    /// The level farthest from the reference: the warmest, or the coldest where none is warmer.
    pub fn farthest(&self) -> Option<usize> {
        let last = self.others.last().copied().filter(|last| *last > self.reference);
        last.or(self.others.first().copied())
    }

    /// The warmer level nearest to 2 degC above the reference, of which a sentence is told where one level must do; where none is warmer,
    /// the farthest.
    pub fn told(&self, findings: &Findings) -> Option<usize> {
        let c = |at: usize| findings.levels_c.get(at).copied().unwrap_or_default();
        let distance = |at: &usize| (c(*at) - c(self.reference) - 2.0).abs();
        let warmer = self.others.iter().copied().filter(|at| *at > self.reference);
        warmer.min_by(|a, b| distance(a).total_cmp(&distance(b))).or_else(|| self.farthest())
    }

    /// ` Of 9 levels, the reference, +1 °C, +3 °C, +4 °C and +6 °C are shown.`; nothing where all are.
    pub fn in_words(&self, findings: &Findings, units: UnitSystem) -> String {
        if self.others.len() + 1 == self.levels {
            return String::new();
        }
        let names: Vec<String> = self
            .others
            .iter()
            .filter_map(|at| findings.levels_c.get(*at))
            .map(|c| level(units, *c))
            .collect();
        let (last, others) = names.split_last().map_or(("", [].as_slice()), |(last, others)| (last, others));
        let others: String = others.iter().map(|name| format!(", {name}")).collect();
        format!(" Of {} levels, the reference{others} and {last} are shown.", self.levels)
    }
}

/// `reference`, `reference (+0.5 °C)`, `+2 °C`.
pub(super) fn name(findings: &Findings, at: usize, units: UnitSystem) -> String {
    let level_c = findings.levels_c.get(at).copied().unwrap_or_default();
    match (at == findings.reference, level_c == 0.0) {
        (true, true) => "reference".to_owned(),
        (true, false) => format!("reference ({})", level(units, level_c)),
        (false, _) => level(units, level_c),
    }
}
