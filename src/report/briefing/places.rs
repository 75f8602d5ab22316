//! Kinds of years, and where snow lies, is at risk and is decided: the answer's sentences about their figure.

use super::super::answer::Answer;
use super::Figures;
use crate::figures::Part;
use maud::{Markup, html};

/// The section on kinds of years; nothing where there is no cool season.
pub(super) fn years(answer: &Answer, figures: &Figures<'_>) -> Markup {
    html! { @if let Some((first, others)) = answer.dry_and_warm.split_first() {
        p { (first) }
        (figures.of(Part::DryAndWarm))
        @for sentence in others { p { (sentence) } }
    } }
}

/// The paragraphs on elevations; nothing where nothing was found.
pub(super) fn elevations(answer: &Answer) -> Markup {
    html! { @for sentence in &answer.elevations { p { (sentence) } } }
}
