//! How much snow: amounts, shares and counts by level; and when it lies and goes.

use super::super::answer::Answer;
use super::super::study::Study;
use super::{Figures, levels};
use crate::figures::Part;
use maud::{Markup, html};

/// Amounts, shares and counts.
pub(super) fn section(study: &Study<'_>, answer: &Answer) -> Markup {
    html! {
        ul { @for sentence in &answer.amounts { li { (sentence) } } }
        (levels::table(study, |of| !of.measure.kind.is_date() && !of.measure.is_volume))
        h4 { "The driest and the wettest years" }
        (levels::driest_and_wettest(study))
        p { "All of it, band by band, with ranges and Monte Carlo errors, stands in " code { "tables/" } " and " code { "summary.json" } "." }
    }
}

/// Dates.
pub(super) fn timing(study: &Study<'_>, figures: &Figures<'_>) -> Markup {
    html! {
        (figures.of(Part::Timing))
        (levels::table(study, |of| of.measure.kind.is_date()))
    }
}
