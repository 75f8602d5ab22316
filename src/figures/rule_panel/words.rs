//! What the figure says.

use super::super::labels::{between_levels, counted, level, sentence, signed};
use super::FIGURE;
use crate::findings::{Judged, MeasureByRule, OfRule, PanelRule, Rule, RulePanel};
use crate::units::UnitSystem;

/// Every text of the figure but names of levels.
pub(super) struct Words {
    pub title: String,
    pub sample: String,
    pub axis: String,
    /// Of each rule the lines of its name.
    pub rules: Vec<Vec<String>>,
    pub key: String,
    pub caption: String,
    pub alt: String,
    pub description: String,
}

/// What the words are of: the panel's first measure, and the place of the level farthest from the reference of those that are drawn.
#[derive(Clone, Copy)]
pub(super) struct Subject<'a> {
    pub panel: &'a RulePanel,
    pub measure: &'a MeasureByRule,
    pub farthest: usize,
    /// Whether every 5-95 % range is of pairs enough to be one.
    pub has_ranges: bool,
    /// Water years of a realization.
    pub years: usize,
    pub units: UnitSystem,
}

/// `half snow at −0.4 °C`, `gradient −5 °C per km`.
pub fn rule_in_words(rule: Rule, units: UnitSystem) -> String {
    match rule {
        Rule::StudysOwn => "the study's own rules".to_owned(),
        Rule::HalfSnowAt { temperature_c, is_wet_bulb, replaces_tanh } => {
            let unit = units.temperature();
            let of = if is_wet_bulb { " wet bulb" } else { "" };
            let replaced = if replaces_tanh { " (linear in place of tanh)" } else { "" };
            format!("half snow at {} {}{of}{replaced}", number(unit.of(temperature_c)), unit.word)
        }
        Rule::ConstantFactor => "degree-day factor without season".to_owned(),
        Rule::SeasonalFactor => "degree-day factor with a season".to_owned(),
        Rule::TemperatureGradient { c_per_km } => {
            let unit = units.temperature_gradient();
            format!("gradient {} {}", number(unit.of(c_per_km)), unit.word)
        }
    }
}

/// To a hundredth at most, with a true minus.
fn number(value: f64) -> String {
    let size = (value.abs() * 100.0).round() / 100.0;
    if value < 0.0 && size > 0.0 { format!("\u{2212}{size}") } else { size.to_string() }
}

impl Words {
    pub fn of(of: Subject<'_>, shown: &str) -> Option<Self> {
        let Subject { panel, measure, units, years, .. } = of;
        let title = title(of)?;
        let depth = units.depth().word;
        let lines = |(rule, found): (&PanelRule, &OfRule)| lines(rule, found, units);
        let at_farthest = |(rule, found): (&PanelRule, &OfRule)| {
            let level_of = found.levels.get(of.farthest).filter(|_| rule.tuned.is_tuned)?;
            let shift = level_of.shift?.median.value;
            let name = rule_in_words(rule.rule, units);
            Some(format!("{name}: {} {depth} at {}", signed(units, shift), level(units, level_of.level_c)))
        };
        let description: Vec<String> =
            panel.rules.iter().zip(&measure.rules).filter_map(at_farthest).collect();
        let runs = match (panel.realizations, panel.realizations_of_study) {
            (some, of_study) if some < of_study => {
                format!("the study's first {some} of {}", counted(of_study, "realization"))
            }
            (all, _) => counted(all, "realization"),
        };
        let runs = format!("{runs} of {}", counted(years, "year"));
        let chance = if of.has_ranges {
            "The 5–95 % range shows chance between realizations, not day-to-day variation; "
        } else {
            "Realizations are too few for a 5–95 % range; "
        };
        Some(Self {
            sample: sentence(&format!("{runs}, the same under every rule and level")),
            axis: format!("Change of {} from the reference, {depth}", measure.measure.title),
            rules: panel.rules.iter().zip(&measure.rules).map(lines).collect(),
            key: key(of),
            caption: format!(
                "{} Each row holds the change of {} under one rule in place of the study's own, over {runs}, the same at each warming level.{shown} \
                 {chance}the distance between rows shows what the choice of the rule does. Numbers stand in tables/rule-panel.csv.",
                FIGURE.question, measure.measure.title,
            ),
            alt: format!("{title}. A row of marks for each rule."),
            description: format!("{}.", description.join("; ")),
            title,
        })
    }
}

/// A rule's name, what it takes the place of, and from which warming on its shift outweighs its spread.
fn lines(rule: &PanelRule, found: &OfRule, units: UnitSystem) -> Vec<String> {
    let name = sentence(&rule_in_words(rule.rule, units));
    let mut lines: Vec<String> = match name.split_once(" (") {
        Some((name, replaced)) => vec![name.to_owned(), replaced.trim_end_matches(')').to_owned()],
        None => vec![name],
    };
    match found.judged() {
        _ if !rule.tuned.is_tuned => lines.push("could not be tuned: not shown".to_owned()),
        Judged::Outweighs { level_c, .. } => {
            lines.push(format!("outweighs from {} on", between_levels(units, level_c)));
        }
        Judged::DoesNot { up_to_c } => {
            lines.push(format!("does not outweigh up to {}", level(units, up_to_c)));
        }
        Judged::CannotTell { crosses_at_c: Some(at_c), .. } => {
            lines.push(format!("from {}, cannot tell", between_levels(units, at_c)));
        }
        Judged::CannotTell { crosses_at_c: None, .. } => lines.push("cannot tell".to_owned()),
        Judged::Unknown => {}
    }
    lines
}

fn key(of: Subject<'_>) -> String {
    let panel = of.panel;
    let line = if of.has_ranges { " Line: 5–95 % of them." } else { "" };
    let to = if panel.is_tuned_to_peak_alone {
        "mean peak SWE alone (its snow has no median melt-out)"
    } else {
        "mean peak SWE and median melt-out"
    };
    let factors = if panel.is_tuned_to_peak_alone {
        "the catch of snow"
    } else {
        "the catch of snow and the melt factors"
    };
    format!(
        "Mark: median over realizations, each against itself.{line} Band: the half of the rule's own 5–95 % precipitation spread at the reference; a \
         mark beyond it outweighs the spread. Every other rule is first tuned, by {factors}, to the study's own {to} in {} of the record.",
        counted(panel.years_of_record, "year")
    )
}

/// By how much, over rules, and what becomes of the verdict.
fn title(of: Subject<'_>) -> Option<String> {
    let Subject { panel, measure, units, .. } = of;
    let farthest = measure.levels.get(of.farthest)?;
    let range = farthest.shift.as_ref()?;
    let [low, high] = [range.lowest, range.highest].map(|mm| signed(units, mm));
    let by = if low == high { low } else { format!("{low} to {high}") };
    let whose = if panel.alternatives_tuned == 0 { " under the study's own rules" } else { ", by rule" };
    Some(sentence(&format!(
        "{} changes by {by} {} at {}{whose}; {}",
        measure.measure.title,
        units.depth().word,
        level(units, farthest.level_c),
        verdict(panel, measure, units)
    )))
}

fn verdict(panel: &RulePanel, measure: &MeasureByRule, units: UnitSystem) -> String {
    let rules = panel.alternatives_tuned + 1;
    if rules == 1 {
        return "no other rule could be tuned".to_owned();
    }
    let hanging: Vec<String> =
        measure.levels.iter().filter(|of| of.hangs_on_rule).map(|of| level(units, of.level_c)).collect();
    if !hanging.is_empty() {
        return format!(
            "whether it outweighs the precipitation spread hangs on the rule at {}",
            hanging.join(", ")
        );
    }
    let outweighs = &measure.outweighs;
    match &outweighs.range_c {
        Some(range) => {
            let [low, high] = [range.lowest, range.highest].map(|at_c| between_levels(units, at_c));
            let from = if low == high { low } else { format!("{low} to {high}") };
            let under = match range.without.len() {
                0 => "every rule".to_owned(),
                without => format!("{} of {rules} rules", rules - without),
            };
            format!("it outweighs the precipitation spread from {from} on under {under}")
        }
        None if outweighs.does_not.len() == rules => {
            format!("it outweighs the precipitation spread under none of {rules} rules")
        }
        None if outweighs.does_not.is_empty() => {
            "whether it outweighs the precipitation spread these realizations cannot tell under any rule"
                .to_owned()
        }
        None => "no two rules say the opposite of each other".to_owned(),
    }
}
