//! What the figure says beside its title.

use super::super::ensemble;
use super::super::labels::{day_of_month, level, sentence};
use crate::calendar::WaterYearStart;
use crate::findings::{Findings, MeasureFindings};
use crate::season::Outcome;

/// Every text of the figure but its title and the rows' labels.
pub(super) struct Words {
    pub ensemble: String,
    pub key: String,
    pub caption: String,
    pub kind_of_drawing: String,
    pub description: String,
}

impl Words {
    pub fn of(findings: &Findings, measures: &[&MeasureFindings], starts: WaterYearStart) -> Self {
        let ensemble = ensemble(findings);
        let names: Vec<&str> = measures
            .iter()
            .map(|found| found.measure.title.as_str())
            .collect();
        let names = sentence(&names.join(" and "));
        let years = if findings.years == 1 {
            "one year".to_owned()
        } else {
            format!("median of {} years", findings.years)
        };
        let with_spread = measures.iter().any(|found| found.precipitation_spread.is_some());
        let (spread_key, band) = if with_spread {
            (
                "The spread: from the reference median (dashed) to the edge of the grey band that the shift points to; \
                 the band holds 9 in 10 realizations at the reference. ",
                "The grey band holds 5–95 % of the realizations at the reference: the precipitation spread with its own \
                 temperatures; \u{201c}× the spread\u{201d} is the median shift over the half of it that the shift points \
                 to, and above 1 the shift outweighs the spread. ",
            )
        } else {
            ("", "The reference has no precipitation spread to draw. ")
        };
        Self {
            key: format!(
                "Marker: median; thick line: middle half (25–75 %); thin line: 5–95 %. {spread_key}Lines and band are \
                 chance between realizations, not day-to-day variation."
            ),
            caption: format!(
                "{names}, basin mean, {years}, at each warming level over {ensemble}. Marker: median; thick line: 25–75 %; \
                 thin line: 5–95 %; an arrow: the interval goes on where snow is not gone by the end of the water year, or \
                 where there is nothing to time. Shifts are medians of paired shifts from the reference. {band}Band and \
                 lines show uncertainty from chance between realizations, not day-to-day variation and not single years. \
                 Dates are those of a year without 29 February."
            ),
            kind_of_drawing: format!(
                "Point-intervals of {} levels on a calendar.",
                findings.levels_c.len()
            ),
            description: measures
                .iter()
                .map(|found| described(findings, found, starts))
                .collect::<Vec<_>>()
                .join(" "),
            ensemble: format!("{ensemble}; precipitation spread with its own temperatures"),
        }
    }
}

fn described(findings: &Findings, measure: &MeasureFindings, starts: WaterYearStart) -> String {
    let levels = measure.levels.iter().enumerate().map(|(at, found)| {
        let label = if at == findings.reference {
            "reference".to_owned()
        } else {
            level(found.level_c)
        };
        let values = [found.periods.q50, found.periods.q05, found.periods.q95].map(Outcome::value);
        match values {
            [Some(median), Some(early), Some(late)] => {
                let [median, early, late] = [median, early, late].map(|day| day_of_month(starts, day));
                format!("{label}: median {median}, 5–95 % {early} to {late}")
            }
            [Some(median), ..] => format!("{label}: median {}", day_of_month(starts, median)),
            _ => format!("{label}: no median date"),
        }
    });
    format!(
        "{}: {}.",
        sentence(&measure.measure.title),
        levels.collect::<Vec<_>>().join("; ")
    )
}
