//! What the rules say, in words.

use super::super::super::numbers::{counted, fixed};
use super::super::super::reader::Reader;
use super::{ends_in_words, range_of_changes};
use crate::figures::{rule_in_words, sentence};
use crate::findings::{Judged, LevelOverRules, MeasureByRule, RangeOverRules, RulePanel, Weight};

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
    let mut said: Vec<String> = asked.outweighs_from().into_iter().collect();
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
    fn outweighs_from(&self) -> Option<String> {
        let outweighs = &self.measure.outweighs;
        let up_to = self.reader.level(self.measure.levels.last()?.level_c);
        let title = format!("the shift of {}", self.measure.measure.title);
        let mut said: Vec<String> = Vec::new();
        if let Some(range) = &outweighs.range_c {
            let under = self.under(&self.all_but(&range.without));
            said.push(format!(
                "{under}, {title} outweighs the precipitation spread from {} of warming on{}",
                self.warming(range),
                self.of_own()
            ));
        }
        let subject = |said: &[String]| if said.is_empty() { title.clone() } else { "it".to_owned() };
        if !outweighs.does_not.is_empty() {
            let spread = if said.is_empty() { " outweigh the precipitation spread" } else { "" };
            let under = self.names_or_all(&outweighs.does_not, "any of these rules");
            said.push(format!("{} does not{spread} up to {up_to} under {under}", subject(&said)));
        }
        if !outweighs.cannot_tell.is_empty() {
            let under = self.names_or_all(&outweighs.cannot_tell, "any of these rules");
            let whether = if said.is_empty() {
                format!("whether {title} outweighs the precipitation spread")
            } else {
                "whether it does".to_owned()
            };
            said.push(format!("{whether} up to {up_to}, these realizations cannot tell under {under}"));
        }
        if said.is_empty() {
            return None;
        }
        if !outweighs.unknown.is_empty() {
            said.push(format!("it cannot be asked under {}", self.names(&outweighs.unknown)));
        }
        let falls_back: Vec<usize> = self
            .in_use()
            .filter(|at| {
                matches!(self.measure.rules[*at].judged(), Judged::Outweighs { until_c: Some(_), .. })
            })
            .collect();
        let falls_back = if falls_back.is_empty() {
            String::new()
        } else {
            format!(" At a higher level it no longer does under {}.", self.names(&falls_back))
        };
        Some(format!("{}.{falls_back}", sentence(&said.join("; "))))
    }

    /// Places of the rules that were tuned, the study's own first.
    fn in_use(&self) -> impl Iterator<Item = usize> {
        (0..self.panel.rules.len()).filter(|at| self.panel.rules[*at].tuned.is_tuned)
    }

    fn all_but(&self, without: &[usize]) -> Vec<usize> {
        self.in_use().filter(|at| !without.contains(at)).collect()
    }

    /// `Under each of these rules`, `Under 5 of 6 rules`, `Under 1 of 6 rules (gradient −5 °C per km)`.
    fn under(&self, of: &[usize]) -> String {
        match (of.len(), self.rules()) {
            (some, all) if some == all => "Under each of these rules".to_owned(),
            (some, all) if 2 * some <= all => format!("Under {some} of {all} rules ({})", self.names(of)),
            // The fewer others are named behind.
            (some, all) => format!("Under {some} of {all} rules"),
        }
    }

    fn names_or_all(&self, of: &[usize], all: &str) -> String {
        if of.len() == self.rules() { all.to_owned() } else { self.names(of) }
    }

    /// `about +1.4 °C`, `+1.2 to +1.4 °C`.
    fn warming(&self, range: &RangeOverRules) -> String {
        let [low, high] = [range.lowest, range.highest].map(|at_c| self.reader.between_levels_bare(at_c));
        let word = self.reader.units.warming().word;
        if low == high { format!("about {low} {word}") } else { format!("{low} to {high} {word}") }
    }

    /// ` (+1.3 °C under the study's own rules, by chance +1.2 to +1.4)`.
    fn of_own(&self) -> String {
        let own = &self.measure.rules[0];
        let Judged::Outweighs { level_c, .. } = own.judged() else { return String::new() };
        let range = ends_in_words(own, self.reader);
        let range = range.map_or(String::new(), |range| format!(", Monte Carlo range {range}"));
        format!(" ({}{range}, under the study's own rules)", self.reader.between_levels(level_c))
    }

    /// Which levels all rules answer alike, and of every other which rule says what.
    fn by_level(&self) -> String {
        let levels = &self.measure.levels;
        let whether =
            format!("whether the shift of {} outweighs the precipitation spread", self.measure.measure.title);
        let alike = |weight: Weight| -> Vec<&LevelOverRules> {
            levels.iter().filter(|level| level.saying(weight).len() == self.rules()).collect()
        };
        let [no, yes] = [Weight::DoesNotOutweigh, Weight::Outweighs].map(alike);
        let open: Vec<&LevelOverRules> = levels
            .iter()
            .filter(|level| !no.iter().chain(&yes).any(|alike| alike.level_c == level.level_c))
            .collect();
        let told: Vec<String> = [(&no, "it does not"), (&yes, "it does")]
            .into_iter()
            .filter(|(levels, _)| !levels.is_empty())
            .map(|(levels, does)| format!("at {} ({does})", self.levels_in_words(levels)))
            .collect();
        let mut said = vec![match (told.is_empty(), open.is_empty()) {
            (true, _) => format!("At no level do these rules answer alike {whether}."),
            (false, true) => {
                format!("These rules answer alike at every level {whether}: {}.", told.join(", "))
            }
            (false, false) => format!("These rules answer alike {whether} {}.", told.join(" and ")),
        }];
        // Levels of which the same is to be said are told together.
        let is_same = |a: &&LevelOverRules, b: &&LevelOverRules| {
            WEIGHTS.iter().all(|weight| a.saying(*weight) == b.saying(*weight))
        };
        said.extend(open.chunk_by(is_same).map(|levels| self.level(levels)));
        let has = |weight: Weight| open.iter().any(|level| !level.saying(weight).is_empty());
        if has(Weight::CannotTell) {
            said.push(
                "Too near to call: the 90 % Monte Carlo interval of the shift over the half spread lies on both sides of 1."
                    .to_owned(),
            );
        }
        if has(Weight::NoRatio) {
            said.push(
                "Cannot be asked: realizations without a value, a reference that does not spread, or too few realizations to know how sure the \
                 answer is."
                    .to_owned(),
            );
        }
        said.join(" ")
    }

    /// `+1 °C, +2 °C and +3 °C`.
    fn levels_in_words(&self, of: &[&LevelOverRules]) -> String {
        let names: Vec<String> = of.iter().map(|level| self.reader.level(level.level_c)).collect();
        match names.split_last() {
            Some((last, others)) if !others.is_empty() => format!("{} and {last}", others.join(", ")),
            Some((last, _)) => last.clone(),
            None => String::new(),
        }
    }

    /// `At +3 °C the answer hangs on the rule: it outweighs under A; it does not under the others.`
    fn level(&self, levels: &[&LevelOverRules]) -> String {
        let Some(level) = levels.first() else { return String::new() };
        let mut groups: Vec<(Weight, &[usize])> = WEIGHTS.map(|weight| (weight, level.saying(weight))).into();
        groups.retain(|(_, of)| !of.is_empty());
        // The largest is told last, as the others; where it is small, too, names are plainer.
        let largest = (0..groups.len()).max_by_key(|at| groups[*at].1.len());
        let largest = largest.filter(|at| groups[*at].1.len() > 2);
        if let Some(largest) = largest {
            let group = groups.remove(largest);
            groups.push(group);
        }
        let count = groups.len();
        let told: Vec<String> = groups
            .iter()
            .enumerate()
            .map(|(at, (weight, of))| {
                let under = match (count, largest) {
                    (1, _) => "each of these rules".to_owned(),
                    (_, Some(_)) if at + 1 == count => "the others".to_owned(),
                    _ => self.names(of),
                };
                let does = match weight {
                    Weight::Outweighs => "outweighs",
                    Weight::DoesNotOutweigh => "does not",
                    Weight::CannotTell => "is too near to call",
                    Weight::NoRatio => "cannot be asked",
                };
                format!("it {does} under {under}")
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
        format!("At {} {how}{}.", self.levels_in_words(levels), told.join("; "))
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
