//! What the figure says beside its title.

use super::super::labels::{day_of_month, level, sentence};
use super::super::reading::Reading;
use super::super::{Setting, ensemble};
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
    pub fn of(findings: &Findings, measures: &[&MeasureFindings], setting: &Setting<'_>) -> Self {
        let ensemble = ensemble(findings);
        let names: Vec<&str> = measures.iter().map(|found| found.measure.title.as_str()).collect();
        let names = sentence(&names.join(" and "));
        let years = if findings.years == 1 {
            "one year".to_owned()
        } else {
            format!("median of {} years", findings.years)
        };
        let reading = Reading::of(findings, measures, "shift", false);
        Self {
            key: reading.key(),
            caption: format!(
                "{names}, basin mean, {years}, at each warming level over {ensemble}. {} An arrow: the interval goes on \
                 where snow is not gone by the end of the water year, or where there is nothing to time. Dates are those \
                 of a year without 29 February.",
                reading.caption()
            ),
            kind_of_drawing: format!("Point-intervals of {} levels on a calendar.", findings.levels_c.len()),
            description: measures
                .iter()
                .map(|found| described(findings, found, setting))
                .collect::<Vec<_>>()
                .join(" "),
            ensemble: reading.ensemble(findings),
        }
    }
}

fn described(findings: &Findings, measure: &MeasureFindings, setting: &Setting<'_>) -> String {
    let starts = setting.water_year_starts;
    let levels = measure.levels.iter().enumerate().map(|(at, found)| {
        let label = if at == findings.reference {
            "reference".to_owned()
        } else {
            level(setting.units, found.level_c)
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
    format!("{}: {}.", sentence(&measure.measure.title), levels.collect::<Vec<_>>().join("; "))
}
