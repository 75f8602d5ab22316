//! What the figure says.

use super::super::labels::{counted, day_of_month, level, sentence, volume};
use super::super::shown::{Shown, name};
use super::super::{Setting, ensemble};
use super::OnDay;
use crate::calendar::COMMON_DATES;
use crate::findings::{Findings, PoolShown};

/// Storage that moves by less of the capacity stands still.
const LEAST_SHARE: f64 = 0.001;

/// Every text of the figure but names of lines.
pub(super) struct Words {
    pub title: String,
    pub ensemble: String,
    pub axis: String,
    pub key: String,
    pub caption: String,
    pub kind_of_drawing: String,
    pub description: String,
}

impl Words {
    pub fn of(
        findings: &Findings,
        pool: &PoolShown,
        days: &[OnDay<'_>],
        shown: &Shown,
        setting: &Setting<'_>,
    ) -> Option<Self> {
        let units = setting.units;
        let unit = units.volume().word;
        let said = |hm3: f64| volume(units, hm3);
        let which = shown.in_words(findings, units);
        let described = shown.all().into_iter().map(|at| {
            let on_days = days.iter().filter_map(|on| {
                let hm3 = on.found.levels.get(at)?.periods.q50.value()?;
                Some(format!("{}: {}", date(on, setting), said(hm3)))
            });
            format!("{}, {}", name(findings, at, units), on_days.collect::<Vec<_>>().join(", "))
        });
        let rule = if pool.not_above_hm3.is_empty() {
            "No space is kept for floods."
        } else {
            "The broken line is the flood-space rule: what storage is not to exceed on a day."
        };
        Some(Self {
            title: title(findings, pool, days, shown, setting)?,
            ensemble: format!("{}.{which}", ensemble(findings)),
            axis: format!("Storage as the day begins ({unit})"),
            key: format!(
                "Mark: median over realizations of the mean on that date; band: 5–95 % of the reference's, precipitation's chance, not \
                 day-to-day variation, and not the range of single years. {rule}"
            ),
            caption: format!(
                "Storage on the first of each month and as the water year ends, the mean over the years of a realization, at \
                 each warming level: median over {}.{which} Between the marks lines are straight. The grey band is the 5–95 % range over \
                 realizations at the reference: chance of precipitation, not day-to-day variation; single years lie wider. Capacity is {} \
                 {unit}, dead storage {} {unit}. {rule} The rules stand as stated at every level. It is a what-if for planning, no guide to \
                 the operation of a dam.",
                ensemble(findings),
                said(pool.capacity_hm3),
                said(pool.dead_hm3),
            ),
            kind_of_drawing: format!(
                "Marks of {}, joined, through the water year, with the reference's band and what the reservoir can hold.",
                counted(shown.all().len(), "level")
            ),
            description: format!(
                "Median storage, {unit}. {}.",
                sentence(&described.collect::<Vec<_>>().join("; "))
            ),
        })
    }
}

/// `1 September`; `at the year's end`.
fn date(on: &OnDay<'_>, setting: &Setting<'_>) -> String {
    if on.day > COMMON_DATES as f64 {
        "at the year's end".to_owned()
    } else {
        format!("on {}", day_of_month(setting.water_year_starts, on.day))
    }
}

/// `At +2 °C, median storage is up to 22.2 hm³ lower (on 1 September) and up to 16.4 hm³ higher (on 1 April); warming outweighs
/// precipitation in that on 2 of 13 dates`.
fn title(
    findings: &Findings,
    pool: &PoolShown,
    days: &[OnDay<'_>],
    shown: &Shown,
    setting: &Setting<'_>,
) -> Option<String> {
    let units = setting.units;
    let amount = |hm3: f64| format!("{} {}", volume(units, hm3.abs()), units.volume().word);
    let Some(at) = shown.told(findings) else {
        let median = |on: &&OnDay<'_>| on.found.levels.get(findings.reference)?.periods.q50.value();
        let highest =
            days.iter().filter_map(|on| Some((on, median(&on)?))).max_by(|a, b| a.1.total_cmp(&b.1));
        let (on, hm3) = highest?;
        let (amount, date) = (amount(hm3), date(on, setting));
        return Some(format!(
            "Median storage is highest at {amount} ({date}) at the reference; no other level was run"
        ));
    };
    let place = findings.levels_c.get(at).map_or_else(String::new, |c| level(units, *c));
    let shift = |on: &OnDay<'_>| Some(on.found.levels.get(at)?.shift?.median.value);
    let shifts: Vec<(&OnDay<'_>, f64)> = days.iter().filter_map(|on| Some((on, shift(on)?))).collect();
    let least = LEAST_SHARE * pool.capacity_hm3;
    let lowest = shifts.iter().min_by(|a, b| a.1.total_cmp(&b.1)).filter(|(_, hm3)| *hm3 <= -least);
    let highest = shifts.iter().max_by(|a, b| a.1.total_cmp(&b.1)).filter(|(_, hm3)| *hm3 >= least);
    let told = |of: &(&OnDay<'_>, f64), direction: &str| {
        format!("up to {} {direction} ({})", amount(of.1), date(of.0, setting))
    };
    let what = match (lowest, highest) {
        (Some(low), Some(high)) => {
            format!("{} and {}", told(low, "lower"), told(high, "higher"))
        }
        (Some(low), None) => told(low, "lower"),
        (None, Some(high)) => told(high, "higher"),
        (None, None) => return Some(format!("At {place}, median storage stays what it is at the reference")),
    };
    // Told only where both ends of the ratio's range say the same.
    let ranges = days.iter().map(|on| on.found.levels.get(at)?.signal_to_spread_range);
    let (mut outweighs, mut does_not) = (0, 0);
    for range in ranges.flatten() {
        outweighs += usize::from(range.q05 > 1.0);
        does_not += usize::from(range.q95 < 1.0);
    }
    let all = days.len();
    let against = match (outweighs, does_not) {
        (0, 0) => String::new(),
        (0, _) if does_not == all => format!("; precipitation outweighs that on all {all} dates"),
        (0, _) => format!("; precipitation outweighs that on {does_not} of {all} dates"),
        _ if outweighs == all => format!("; that outweighs precipitation on all {all} dates"),
        _ => format!("; that outweighs precipitation on {outweighs} of {all} dates"),
    };
    Some(format!("At {place}, median storage is {what}{against}"))
}
