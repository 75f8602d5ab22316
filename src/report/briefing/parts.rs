//! The parts that a reader opens, in groups, and the list of what there is.
//!
//! Every part stands open in the page's text, so that it is read and printed without any script; the page's script folds them.

use super::words::Words;
use maud::{Markup, html};

/// Where all words are explained.
pub(super) const GLOSSARY: &str = "terms";

/// Where a link in the page leads, what is there, and its content.
pub(super) struct Part {
    address: &'static str,
    title: &'static str,
    content: Markup,
}

/// A part; it is left out where its content is empty.
pub(super) fn part(address: &'static str, title: &'static str, content: Markup) -> Part {
    Part { address, title, content }
}

/// Parts that answer the same kind of question.
pub(super) struct Group {
    title: &'static str,
    parts: Vec<Part>,
}

impl Group {
    /// The parts that have something to say.
    pub fn new(title: &'static str, parts: impl IntoIterator<Item = Part>) -> Self {
        Self { title, parts: parts.into_iter().filter(|part| !part.content.0.trim().is_empty()).collect() }
    }
}

/// The list of the parts, then the parts, each with the words that it uses first.
pub(super) fn detail(groups: &[Group], words: &mut Words<'_>) -> Markup {
    let groups = groups.iter().filter(|group| !group.parts.is_empty());
    html! {
        nav.contents aria-labelledby="contents" {
            h2 #contents { "In detail" }
            div.columns { @for group in groups.clone() { div {
                p { (group.title) }
                ul { @for part in &group.parts { li { a href=(format!("#{}", part.address)) { (part.title) } } } }
            } } }
        }
        @for group in groups {
            section {
                h2 { (group.title) }
                @for part in &group.parts { details.part open {
                    summary { h3 { (part.title) } }
                    div.inside id=(part.address) {
                        @if part.address != GLOSSARY { (words.first_used_in(&part.content)) }
                        (part.content)
                    }
                } }
            }
        }
    }
}
