//! What the figure says.

use super::super::ensemble;
use super::super::labels::{days_in_words, level, percent_size, sentence};
use super::super::shown::{Shown, name};
use super::{Month, median_pct};
use crate::findings::{Findings, Operations};
use crate::units::UnitSystem;

/// A month whose share moves by less stands still, points.
const LEAST_POINTS: f64 = 0.05;

/// Every text of the figure but names and numbers beside marks.
pub(super) struct Words {
    pub title: String,
    pub ensemble: String,
    pub axis: String,
    pub row: String,
    pub key: String,
    pub caption: String,
    pub kind_of_drawing: String,
    pub description: String,
}

impl Words {
    pub fn of(
        findings: &Findings,
        operations: &Operations,
        months: &[Month<'_>],
        shown: &Shown,
        units: UnitSystem,
    ) -> Option<Self> {
        let word = &operations.word;
        let which = shown.in_words(findings, units);
        let up_to = level(units, *findings.levels_c.last()?);
        let described = shown.all().into_iter().map(|at| {
            let shares = months.iter().filter_map(|month| {
                Some(format!("{}: {} %", month.name, percent_size(median_pct(month, at)?)))
            });
            format!("{}, {}", name(findings, at, units), shares.collect::<Vec<_>>().join(", "))
        });
        let observed = if operations.inflow_is_observed {
            ""
        } else {
            " No inflow was observed, so that nothing shows how near this comes to it."
        };
        Some(Self {
            title: title(findings, operations, months, shown, units),
            ensemble: format!("{}.{which}", ensemble(findings)),
            axis: format!("Share of the year's {word} (%)"),
            row: format!(
                "Warming from which on the shift of a month's share outweighs the spread, {}",
                units.warming().word
            ),
            key: format!(
                "Mark: median share of a month over realizations; band: 5–95 % of the reference's, precipitation's chance with its \
                 own temperatures, not day-to-day variation. Below: no: not up to {up_to}; ?: these realizations cannot tell.",
            ),
            caption: format!(
                "Share of the year's {} that comes in each month, the mean over the years of a realization, at each warming \
                 level: median over {}.{which} The grey band is the 5–95 % range over realizations at the reference: chance of \
                 precipitation, not day-to-day variation. The title adds up by how much months gain or lose, and takes half of it. It \
                 is a what-if, no forecast of any year.{observed}",
                inside(word),
                ensemble(findings),
            ),
            kind_of_drawing: format!(
                "Marks of {}, joined, month by month, and the reference's band.",
                super::super::labels::counted(shown.all().len(), "level")
            ),
            description: format!(
                "Share of the year's {} by month. {}.",
                inside(word),
                sentence(&described.collect::<Vec<_>>().join("; "))
            ),
        })
    }
}

/// `At +2 °C, 13 % of the year's inflow comes in November–April instead of May–August; the centroid comes 16 days earlier`.
fn title(
    findings: &Findings,
    operations: &Operations,
    months: &[Month<'_>],
    shown: &Shown,
    units: UnitSystem,
) -> String {
    let word = inside(&operations.word);
    let Some(at) = shown.told(findings) else {
        let highest = months
            .iter()
            .filter_map(|month| Some((month.name, median_pct(month, findings.reference)?)))
            .max_by(|a, b| a.1.total_cmp(&b.1));
        return match highest {
            Some((month, pct)) => format!(
                "{month} brings most of the year's {}: {} % at the reference; no other level was run",
                operations.word,
                percent_size(pct)
            ),
            None => "No year has water at the reference; no other level was run".to_owned(),
        };
    };
    let place = findings.levels_c.get(at).map_or_else(String::new, |c| level(units, *c));
    let points: Vec<f64> = months
        .iter()
        .map(|month| {
            let shift = month.found.levels.get(at).and_then(|found| found.shift);
            shift.map_or(0.0, |shift| 100.0 * shift.median.value)
        })
        .collect();
    let moved = points.iter().map(|points| points.abs()).sum::<f64>() / 2.0;
    let [more, less] = [1.0, -1.0].map(|sign| runs(months, &points, sign));
    let centroid = operations
        .measure("inflow_centroid_day")
        .and_then(|found| found.levels.get(at)?.shift)
        .map_or_else(String::new, |shift| {
            format!("; the centroid comes {}", days_in_words(shift.median.value))
        });
    if moved < LEAST_POINTS || more.is_empty() || less.is_empty() {
        return format!("At {place}, the year's {word} keeps its months{centroid}");
    }
    format!(
        "At {place}, {} % of the year's {word} comes in {more} instead of {less}{centroid}",
        percent_size(moved)
    )
}

/// A word inside a sentence: `water input, routed` is closed by another comma.
fn inside(word: &str) -> String {
    if word.contains(',') { format!("{word},") } else { word.to_owned() }
}

/// `November–April`, `March and June–August`: the months that gain, or lose.
fn runs(months: &[Month<'_>], points: &[f64], sign: f64) -> String {
    let mut runs: Vec<[usize; 2]> = Vec::new();
    for (at, points) in points.iter().enumerate() {
        if sign * points < LEAST_POINTS {
            continue;
        }
        match runs.last_mut() {
            Some(run) if run[1] + 1 == at => run[1] = at,
            _ => runs.push([at, at]),
        }
    }
    // A run across the year's end is one.
    let wraps = runs.len() > 1
        && runs.first().is_some_and(|run| run[0] == 0)
        && runs.last().is_some_and(|run| run[1] + 1 == months.len());
    if wraps && let Some(last) = runs.pop() {
        runs[0][0] = last[0];
    }
    let said: Vec<String> = runs
        .into_iter()
        .map(|[from, to]| match from == to {
            true => months[from].name.to_owned(),
            false => format!("{}–{}", months[from].name, months[to].name),
        })
        .collect();
    match said.split_last() {
        Some((last, others)) if !others.is_empty() => format!("{} and {last}", others.join(", ")),
        _ => said.concat(),
    }
}
