//! What the rules say, in words.

use super::super::super::numbers::{counted, fixed};
use super::super::super::reader::Reader;
use super::range_of_changes;
use crate::figures::{rule_in_words, sentence};
use crate::findings::{Crossing, LevelOverRules, MeasureByRule, RulePanel, Weight};

/// What a rule can say at a level.
const WEIGHTS: [Weight; 4] =
    [Weight::Outweighs, Weight::DoesNotOutweigh, Weight::CannotTell, Weight::NoRatio];

/// From which warming on the verdict turns, at which levels rules differ, and how wide their range is beside that of the realizations.
pub(super) fn answers(
    panel: &RulePanel,
    measure: &MeasureByRule,
    told_c: Option<f64>,
    reader: Reader,
) -> Vec<String> {
    let asked = Panel { panel, measure, reader };
    let mut said: Vec<String> = asked.from_where().into_iter().collect();
    said.push(asked.by_level());
    let level = measure.levels.iter().enumerate().find(|(_, level)| Some(level.level_c) == told_c);
    said.extend(level.and_then(|(at, level)| asked.beside_chance(at, level)));
    said
}

struct Panel<'a> {
    panel: &'a RulePanel,
    measure: &'a MeasureByRule,
    reader: Reader,
}

impl Panel<'_> {
    fn names(&self, of: &[usize]) -> String {
        let rules = of.iter().filter_map(|at| self.panel.rules.get(*at));
        let names: Vec<String> = rules.map(|rule| rule_in_words(rule.rule, self.reader.units)).collect();
        names.join(", ")
    }

    /// Rules in use, the study's own among them.
    fn rules(&self) -> usize {
        self.panel.alternatives_tuned + 1
    }

    /// The headline of the study, rule by rule; nothing where no rule can be asked.
    fn from_where(&self) -> Option<String> {
        let title = &self.measure.measure.title;
        let outweighs = &self.measure.outweighs;
        let own = self.measure.rules.first()?.outweighs;
        let up_to_c = self.measure.levels.last()?.level_c;
        let up_to = self.reader.level(up_to_c);
        let Some(range) = &outweighs.range_c else {
            let none = &outweighs.not_reached;
            return match (none.len(), outweighs.unknown.len()) {
                (0, _) => None,
                (_, 0) => Some(format!(
                    "Under none of these rules does the shift of {title} outweigh the precipitation spread up to {up_to}."
                )),
                _ => Some(format!(
                    "The shift of {title} does not outweigh the precipitation spread up to {up_to} under {}; it cannot be asked under {}.",
                    self.names(none),
                    self.names(&outweighs.unknown)
                )),
            };
        };
        let [low, high] = [range.lowest, range.highest].map(|at_c| self.reader.between_levels_bare(at_c));
        let word = self.reader.units.warming().word;
        let from =
            if low == high { format!("about {low} {word}") } else { format!("{low} to {high} {word}") };
        let of_own = match own {
            Crossing::At { level_c, .. } => {
                format!(" ({} under the study's own rules)", self.reader.between_levels(level_c))
            }
            Crossing::NotReached { .. } | Crossing::Unknown => String::new(),
        };
        let reached = self.rules() - range.without.len();
        let under = if range.without.is_empty() {
            "each of these rules".to_owned()
        } else {
            format!("{reached} of {} rules", self.rules())
        };
        let mut said = format!(
            "Under {under} the shift of {title} outweighs the precipitation spread from {from} of warming on{of_own}"
        );
        if !outweighs.not_reached.is_empty() {
            said += &format!("; it does not up to {up_to} under {}", self.names(&outweighs.not_reached));
        }
        if !outweighs.unknown.is_empty() {
            said += &format!("; it cannot be asked under {}", self.names(&outweighs.unknown));
        }
        said += ".";
        let falls_back: Vec<usize> = self
            .measure
            .rules
            .iter()
            .enumerate()
            .filter(|(at, rule)| {
                self.panel.rules[*at].tuned.is_tuned
                    && matches!(rule.outweighs, Crossing::At { until_c: Some(_), .. })
            })
            .map(|(at, _)| at)
            .collect();
        if !falls_back.is_empty() {
            said += &format!(" At a higher level it no longer does under {}.", self.names(&falls_back));
        }
        Some(said)
    }

    /// Which levels all rules answer alike, and of every other which rule says what.
    fn by_level(&self) -> String {
        let levels = &self.measure.levels;
        let title = &self.measure.measure.title;
        let alike = |weight: Weight| -> Vec<&LevelOverRules> {
            levels.iter().filter(|level| level.saying(weight).len() == self.rules()).collect()
        };
        let named = |of: &[&LevelOverRules]| -> String {
            let names: Vec<String> = of.iter().map(|level| self.reader.level(level.level_c)).collect();
            match names.split_last() {
                Some((last, [])) => last.clone(),
                Some((last, others)) => format!("{} and {last}", others.join(", ")),
                None => String::new(),
            }
        };
        let firm =
            [(Weight::DoesNotOutweigh, "it does not outweigh it"), (Weight::Outweighs, "it outweighs it")];
        let firm = firm.map(|(weight, does)| (alike(weight), does));
        let told: Vec<String> = firm
            .iter()
            .filter(|(levels, _)| !levels.is_empty())
            .map(|(levels, does)| format!("at {} {does}", named(levels)))
            .collect();
        let mut said = Vec::new();
        let is_open = |level: &&LevelOverRules| {
            !firm.iter().any(|(alike, _)| alike.iter().any(|of| of.level_c == level.level_c))
        };
        let open: Vec<&LevelOverRules> = levels.iter().filter(is_open).collect();
        if !told.is_empty() {
            let all = if open.is_empty() { " at every level" } else { "" };
            said.push(format!(
                "Whether the shift of {title} outweighs the precipitation spread is answered alike under each of these rules{all}: {}.",
                told.join(", and ")
            ));
        }
        said.extend(open.iter().map(|level| self.level(level)));
        let has = |weight: Weight| open.iter().any(|level| !level.saying(weight).is_empty());
        if has(Weight::CannotTell) {
            said.push(
                "Too near to call: the 90 % Monte Carlo interval of the ratio lies on both sides of 1."
                    .to_owned(),
            );
        }
        if has(Weight::NoRatio) {
            said.push(
                "Not to be asked: realizations without a value, a reference that does not spread, or too few realizations to know how sure the \
                 ratio is."
                    .to_owned(),
            );
        }
        said.join(" ")
    }

    /// `At +3 °C the answer hangs on the rule: the shift of 1 April SWE outweighs the precipitation spread under ...`.
    fn level(&self, level: &LevelOverRules) -> String {
        let title = &self.measure.measure.title;
        let mut groups: Vec<(Weight, &[usize])> = WEIGHTS
            .map(|weight| (weight, level.saying(weight)))
            .into_iter()
            .filter(|(_, of)| !of.is_empty())
            .collect();
        // The largest is told last, as the others; of a few rules the names are shorter.
        let largest =
            (0..groups.len()).rev().max_by_key(|at| groups[*at].1.len()).filter(|at| groups[*at].1.len() > 2);
        if let Some(largest) = largest {
            let group = groups.remove(largest);
            groups.push(group);
        }
        let told: Vec<String> = groups
            .iter()
            .enumerate()
            .map(|(at, (weight, of))| {
                let is_last = at + 1 == groups.len() && largest.is_some();
                let under = match (is_last, groups.len()) {
                    (true, 1) => "each of these rules".to_owned(),
                    (true, _) => "the others".to_owned(),
                    (false, _) => self.names(of),
                };
                let what = if at == 0 { format!("the shift of {title}") } else { "it".to_owned() };
                let object = if at == 0 { "the precipitation spread" } else { "it" };
                match weight {
                    Weight::Outweighs => format!("{what} outweighs {object} under {under}"),
                    Weight::DoesNotOutweigh => format!("{what} does not outweigh {object} under {under}"),
                    Weight::CannotTell => {
                        format!("{what} against {object} is too near to call under {under}")
                    }
                    Weight::NoRatio => format!("{what} against {object} is not to be asked under {under}"),
                }
            })
            .collect();
        let own_is_open = level.cannot_tell.contains(&0) || level.no_ratio.contains(&0);
        let others_tell = level.outweighs.len() + level.does_not_outweigh.len() > 0;
        let how = if level.hangs_on_rule {
            "the answer hangs on the rule: "
        } else if own_is_open && others_tell {
            "the study's own rules cannot tell where others can: "
        } else {
            ""
        };
        format!("At {} {how}{}.", self.reader.level(level.level_c), told.join("; "))
    }

    fn beside_chance(&self, at: usize, level: &LevelOverRules) -> Option<String> {
        let (reader, kind) = (self.reader, self.measure.measure.kind);
        let own = self.measure.rules.first()?.levels.get(at)?.shift?;
        let range = level.shift.as_ref()?;
        let ratio = level.signal_to_spread.as_ref().map_or(String::new(), |ratio| {
            let [low, high] = [ratio.lowest, ratio.highest].map(|ratio| fixed(ratio, 2));
            let of = if low == high { low } else { format!("{low} to {high}") };
            format!(", {of} times the half precipitation spread of the rule")
        });
        let without = if range.without.is_empty() {
            String::new()
        } else {
            format!(" (no value under {})", self.names(&range.without))
        };
        let beside = if own.has_range() {
            format!(
                " Beside that, 90 % of {} change by {} under the study's own rules, each against itself.",
                counted(own.pairs, "realization"),
                range_of_changes(kind, own.q05, own.q95, reader)
            )
        } else {
            String::new()
        };
        Some(format!(
            "{} changes by {} at {} under these {}{without}{ratio}.{beside}",
            sentence(&self.measure.measure.title),
            range_of_changes(kind, range.lowest, range.highest, reader),
            reader.level(level.level_c),
            counted(self.rules() - range.without.len(), "rule"),
        ))
    }
}
