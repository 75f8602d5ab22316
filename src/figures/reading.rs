//! How to read the marks: the same words in every figure that draws a distribution over realizations.

use super::ensemble;
use crate::findings::{Findings, MeasureFindings};

/// What is drawn of a distribution.
#[derive(Debug, Clone, Copy)]
pub(super) struct Reading {
    realizations: usize,
    with_dots: bool,
    with_band: bool,
    /// What a level does: `change` or `shift`.
    change: &'static str,
}

impl Reading {
    /// Of these measures; `with_dots` where twenty dots are drawn.
    pub fn of(
        findings: &Findings,
        measures: &[&MeasureFindings],
        change: &'static str,
        with_dots: bool,
    ) -> Self {
        Self {
            realizations: findings.realizations,
            with_dots,
            with_band: measures.iter().any(|found| found.precipitation_spread.is_some()),
            change,
        }
    }

    /// `300 realizations of 30 years; precipitation spread with its own temperatures`.
    pub fn ensemble(&self, findings: &Findings) -> String {
        let spread = if self.with_band { "; precipitation spread with its own temperatures" } else { "" };
        format!("{}{spread}", ensemble(findings))
    }

    /// The key below the drawing.
    pub fn key(&self) -> String {
        if self.realizations == 1 {
            return "Marker: the one realization. How far chance would move it is not known.".to_owned();
        }
        let dots = if self.with_dots { "Each dot: 1 in 20 realizations. " } else { "" };
        let spread = if self.with_band {
            format!(
                "Half spread: from the reference median (dashed) to the edge of the grey band that the {} points to; the \
                 band holds 9 in 10 realizations at the reference. ",
                self.change
            )
        } else {
            String::new()
        };
        format!(
            "{dots}Marker: median; thick line: middle half (25–75 %); thin line: 5–95 %. {spread}{} chance between \
             realizations, not day-to-day variation.",
            self.chance()
        )
    }

    /// The same in a caption, with what the band is and is not.
    pub fn caption(&self) -> String {
        let change = self.change;
        if self.realizations == 1 {
            return "Marker: the one realization, which cannot show how far chance would move it: no interval level, and \
                    not day-to-day variation."
                .to_owned();
        }
        let dots = if self.with_dots { "Each dot stands for 1 in 20 of them. " } else { "" };
        let band = if self.with_band {
            format!(
                "The grey band holds 5–95 % of the realizations at the reference: the precipitation spread with its own \
                 temperatures. \u{201c}× half spread\u{201d} is the median {change} over the half of that band that it \
                 points to; above 1 the {change} outweighs the spread. "
            )
        } else {
            "The reference has no precipitation spread to draw. ".to_owned()
        };
        format!(
            "{dots}Marker: median; thick line: 25–75 %; thin line: 5–95 %. Each {change} is the median of paired {change}s \
             from the reference. {band}{} uncertainty from chance between realizations, not day-to-day variation and not \
             single years.",
            self.chance()
        )
    }

    fn chance(&self) -> &'static str {
        match (self.with_dots, self.with_band) {
            (true, true) => "Dots, lines and band show",
            (true, false) => "Dots and lines show",
            (false, true) => "Lines and band show",
            (false, false) => "Lines show",
        }
    }
}
