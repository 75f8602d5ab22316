//! What the figure says.

use super::super::labels::{counted, level, sentence, signed};
use super::FIGURE;
use crate::findings::{LevelOverRules, MeasureByRule, Rule, RulePanel};
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

/// `half snow at −0.4 °C`, `temperature gradient −5 °C per km`.
pub fn rule_in_words(rule: Rule, units: UnitSystem) -> String {
    match rule {
        Rule::StudysOwn => "the study's own rules".to_owned(),
        Rule::HalfSnowAt { temperature_c, is_wet_bulb } => {
            let unit = units.temperature();
            let of = if is_wet_bulb { " wet bulb" } else { "" };
            format!("half snow at {} {}{of}", number(unit.of(temperature_c)), unit.word)
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
    pub fn of(
        panel: &RulePanel,
        measure: &MeasureByRule,
        shown: &str,
        years: usize,
        units: UnitSystem,
    ) -> Option<Self> {
        let farthest = measure.levels.last()?;
        let title = title(panel, measure, farthest, units)?;
        let depth = units.depth().word;
        let rules = panel.rules.iter().map(|rule| {
            let mut lines = vec![sentence(&rule_in_words(rule.rule, units))];
            if rule.rule == Rule::StudysOwn {
                lines.push("as in the rest of this report".to_owned());
            } else if !rule.tuned.is_tuned {
                lines.push("could not be tuned: in no range".to_owned());
            }
            lines
        });
        let description: Vec<String> = panel
            .rules
            .iter()
            .zip(&measure.rules)
            .filter_map(|(rule, found)| {
                let last = found.levels.last()?;
                let shift = last.shift?.median.value;
                let of = rule_in_words(rule.rule, units);
                Some(format!("{of}: {} {depth} at {}", signed(units, shift), level(units, last.level_c)))
            })
            .collect();
        Some(Self {
            sample: format!(
                "{} of {}, the same under every rule and level",
                counted(panel.realizations, "realization"),
                counted(years, "year")
            ),
            axis: format!("Change of {} from the reference, {depth}", measure.measure.title),
            rules: rules.collect(),
            key: format!(
                "Mark: median over realizations, each against itself. Line: 5–95 % of them. Grey row: the study's own rules. Hollow: a rule that could \
                 not be tuned. Every other rule is first tuned, by the catch of snow and the melt factors, to the study's own mean peak SWE and \
                 median melt-out in {} of the record.",
                counted(panel.years_of_record, "year")
            ),
            caption: format!(
                "{} Each row holds the change of {} under one rule in place of the study's own, over {} of {}, the same at each warming level.{shown} \
                 The 5–95 % range shows chance between realizations, not day-to-day variation; the distance between rows shows what the choice of \
                 the rule does. Numbers stand in tables/rule-panel.csv.",
                FIGURE.question,
                measure.measure.title,
                counted(panel.realizations, "realization"),
                counted(years, "year")
            ),
            alt: format!("{title}. A row of marks for each rule."),
            description: format!("{}.", description.join("; ")),
            title,
        })
    }
}

/// By how much, over rules, and how many say the opposite.
fn title(
    panel: &RulePanel,
    measure: &MeasureByRule,
    farthest: &LevelOverRules,
    units: UnitSystem,
) -> Option<String> {
    let at = level(units, farthest.level_c);
    let range = farthest.shift?;
    let [low, high] = [range.lowest, range.highest].map(|mm| signed(units, mm));
    let of = if low == high { low } else { format!("{low} to {high}") };
    let rules = panel.alternatives_tuned;
    let mut against: Vec<usize> =
        measure.levels.iter().flat_map(|level| level.against.iter().copied()).collect();
    against.sort_unstable();
    against.dedup();
    let is_open = measure.levels.iter().any(|level| !level.cannot_tell.is_empty());
    let near = if is_open { ", some levels too near to call" } else { "" };
    let verdict = match (rules, against.len()) {
        (0, _) => "no other rule could be tuned".to_owned(),
        (_, 0) => format!("none of {} turns the verdict{near}", counted(rules, "other rule")),
        (_, turned) => format!(
            "{turned} of {} {} the verdict at a level",
            counted(rules, "other rule"),
            if turned == 1 { "turns" } else { "turn" }
        ),
    };
    let title = format!(
        "{} changes by {of} {} at {at}, by rule; {verdict}",
        measure.measure.title,
        units.depth().word
    );
    Some(sentence(&title))
}
