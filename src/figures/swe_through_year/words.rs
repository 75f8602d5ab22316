//! What the figure says.

use super::super::labels::{day_of_month, grouped, is_nothing, level, sentence, size_and_unit};
use super::super::shown::{Shown, name};
use super::super::{Setting, ensemble};
use crate::findings::{Findings, LevelThroughYear, SweThroughYear};
use crate::units::UnitSystem;

/// Every text of the figure but the first panel's key.
pub(super) struct Words {
    pub title: String,
    pub ensemble: String,
    pub axis: String,
    /// A panel's level and its highest median, each.
    pub panels: Vec<[String; 2]>,
    pub key: String,
    pub caption: String,
    pub kind_of_drawing: String,
    pub description: String,
}

impl Words {
    /// Nothing where a level that is shown has no days.
    pub fn of(findings: &Findings, shown: &Shown, setting: &Setting<'_>) -> Option<Self> {
        let (units, days) = (setting.units, &findings.swe_through_year);
        let reference = days.levels.get(findings.reference)?;
        let others: Option<Vec<&LevelThroughYear>> =
            shown.others.iter().map(|at| days.levels.get(*at)).collect();
        let others = others?;
        let up_to = |found: &LevelThroughYear| format!("median up to {}", highest(found, setting));
        let of_reference = [name(findings, findings.reference, units), up_to(reference)];
        let of_others: Vec<[String; 2]> =
            others.iter().map(|found| [level(units, found.level_c), up_to(found)]).collect();
        let farthest = shown.farthest().and_then(|at| days.levels.get(at));
        let which = shown.in_words(findings, units);
        let counted = format!("{} single years a level", grouped(days.years as f64, 0));
        let described: Vec<String> =
            [&of_reference].into_iter().chain(&of_others).map(|words| words.join(": ")).collect();
        let behind = if of_others.is_empty() { "" } else { ", which stands behind every level" };
        let panels = if of_others.is_empty() { vec![of_reference] } else { of_others };
        Some(Self {
            title: title(reference, farthest, setting),
            ensemble: format!("{}: {counted}.{which}", ensemble(findings)),
            axis: format!("Basin SWE as the day begins ({})", units.depth().word),
            key: format!(
                "Line: the median of each day, dashed at the reference{behind}; band: 10–90 %, 8 in 10 years. It is the range \
                 over years on each day, not day-to-day variation, not the course of one year, and no forecast.",
            ),
            caption: format!(
                "SWE of the basin, mean over its area, as each day of the water year begins, over {counted}, those of {}.{which} \
                 The line is the median of each day, the band holds 10–90 % of the years on that day; behind them in every \
                 panel the reference. The band is the range over years on each day: not day-to-day variation, not the course \
                 that one year takes, and no forecast. {}{} Days are counted from \
                 the water year's first; the 366th of leap years is left out.",
                ensemble(findings),
                accuracy(days, units),
                above(days),
            ),
            kind_of_drawing: format!(
                "Median and range over years through the water year, a panel a level ({}), on one scale.",
                panels.len()
            ),
            description: format!("{}.", sentence(&described.join("; "))),
            panels,
        })
    }
}

/// `Median basin SWE is highest at 412 mm on 3 April at the reference, at 260 mm on 12 March at +4 °C`.
fn title(reference: &LevelThroughYear, other: Option<&LevelThroughYear>, setting: &Setting<'_>) -> String {
    let at_reference = match reference.highest_median_day {
        Some(_) => format!("highest at {}", highest(reference, setting)),
        None => format!("{} all year", highest(reference, setting)),
    };
    let Some(other) = other else {
        return format!("Median basin SWE is {at_reference} at the reference; no other level was run");
    };
    let place = level(setting.units, other.level_c);
    let at_other = match (reference.highest_median_day, other.highest_median_day) {
        (Some(_), Some(_)) => format!("at {}", highest(other, setting)),
        (None, Some(_)) => format!("highest at {}", highest(other, setting)),
        (_, None) => format!("{} all year", highest(other, setting)),
    };
    format!("Median basin SWE is {at_reference} at the reference, {at_other} at {place}")
}

/// `412 mm on 3 April`; `0 mm` where there is no such day.
fn highest(found: &LevelThroughYear, setting: &Setting<'_>) -> String {
    let amount = size_and_unit(setting.units, found.highest_median_mm);
    match found.highest_median_day {
        Some(day) => format!("{amount} on {}", day_of_month(setting.water_year_starts, day as f64)),
        None => amount,
    }
}

/// How exact the counts are.
fn accuracy(days: &SweThroughYear, units: UnitSystem) -> String {
    let width = |width_mm: f64| {
        if is_nothing(units, width_mm) {
            format!("less than 0.01 {}", units.depth().word)
        } else {
            size_and_unit(units, width_mm)
        }
    };
    format!("SWE is kept in steps of {}, so a value is off by half of that at most.", width(days.bin_mm))
}

fn above(days: &SweThroughYear) -> String {
    match days.days_above_highest_bin {
        0 => String::new(),
        1 => " 1 day lay above the highest step and stands as that.".to_owned(),
        days => format!(" {} days lay above the highest step and stand as that.", grouped(days as f64, 0)),
    }
}
