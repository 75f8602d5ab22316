//! What the figure says beside its title.

use super::super::ensemble;
use super::super::labels::{level, sentence, size};
use super::super::theme::{LABEL, Lettering, NAME};
use crate::findings::{DOTS, Findings, MeasureFindings, Spread};
use crate::season::Outcome;

/// Every text of the figure but its title and the levels' labels.
pub(super) struct Words {
    pub ensemble: String,
    pub axis: String,
    pub key: String,
    pub caption: String,
    pub kind_of_drawing: String,
    pub description: String,
}

impl Words {
    pub fn of(findings: &Findings, measure: &MeasureFindings) -> Self {
        let ensemble = ensemble(findings);
        let name = sentence(&measure.measure.title);
        let years = if findings.years == 1 {
            "1 year".to_owned()
        } else {
            format!("{}-year mean", findings.years)
        };
        let dots = findings.realizations >= DOTS;
        let dot_key = if dots {
            "Each dot: 1 in 20 realizations. "
        } else {
            ""
        };
        let with_spread = measure.precipitation_spread.is_some();
        let spread_key = if with_spread {
            "The spread: from the reference median (dashed) to the edge of the grey band that the change points to. "
        } else {
            ""
        };
        let key = format!(
            "{dot_key}Marker: median; thick line: middle half (25–75 %); thin line: 5–95 %. {spread_key}Dots, lines and \
             band are chance between realizations, not day-to-day variation."
        );
        let band = if with_spread {
            "The grey band holds 5–95 % of the realizations at the reference: the precipitation spread with its own \
             temperatures. \u{201c}× the spread\u{201d} is the median change over the half of that band that it points \
             to; above 1 the change outweighs the spread. "
        } else {
            "The reference has no precipitation spread to draw. "
        };
        let dot_caption = if dots {
            " Each dot stands for 1 in 20 of them."
        } else {
            ""
        };
        let caption = format!(
            "{name}, basin mean, {years}, at each warming level over {ensemble}.{dot_caption} Marker: median; thick line: \
             25–75 %; thin line: 5–95 %. Changes are medians of paired changes from the reference. {band}Band, lines and \
             dots show uncertainty from chance between realizations, not day-to-day variation and not single years."
        );
        let described = measure.levels.iter().enumerate().map(|(at, found)| {
            let label = if at == findings.reference {
                "reference".to_owned()
            } else {
                level(found.level_c)
            };
            let values = [found.periods.q50, found.periods.q05, found.periods.q95].map(Outcome::value);
            match values {
                [Some(median), Some(low), Some(high)] => {
                    format!(
                        "{label}: median {} mm, 5–95 % {} to {} mm",
                        size(median),
                        size(low),
                        size(high)
                    )
                }
                _ => format!("{label}: no value"),
            }
        });
        Self {
            axis: format!("{name}, basin mean, {years} (mm)"),
            kind_of_drawing: format!(
                "Point-intervals{} of {} levels against the band of the reference.",
                if dots { " and dots" } else { "" },
                measure.levels.len()
            ),
            description: format!(
                "{name}, {ensemble}. {}.",
                described.collect::<Vec<_>>().join("; ")
            ),
            ensemble: format!("{ensemble}; precipitation spread with its own temperatures"),
            key,
            caption,
        }
    }
}

/// The lines beside the band.
pub(super) fn of_band(spread: &Spread) -> [(String, Lettering); 3] {
    [
        ("9 in 10 realizations".to_owned(), NAME),
        ("at the reference:".to_owned(), LABEL),
        (format!("{}–{} mm", size(spread.q05), size(spread.q95)), LABEL),
    ]
}
