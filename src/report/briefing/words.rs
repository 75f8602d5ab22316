//! The words that a part of the page uses first, with what they mean, where they are used.

use maud::{Markup, html};

/// The glossary, and what of it has been explained further up the page.
pub(super) struct Words<'a> {
    terms: &'a [(&'static str, String)],
    is_explained: Vec<bool>,
}

impl<'a> Words<'a> {
    /// Nothing has been explained yet.
    pub fn new(terms: &'a [(&'static str, String)]) -> Self {
        Self { terms, is_explained: vec![false; terms.len()] }
    }

    /// A fold with the terms that stand in this content and nowhere before it; nothing where there is none.
    pub fn first_used_in(&mut self, content: &Markup) -> Markup {
        let text = text_of(&content.0);
        let mut new = Vec::new();
        for ((name, meaning), is_explained) in self.terms.iter().zip(&mut self.is_explained) {
            if !*is_explained && spellings(name).any(|spelling| stands_in(&text, &spelling)) {
                *is_explained = true;
                new.push((*name, meaning));
            }
        }
        html! { @if !new.is_empty() { details.words {
            summary { "Words used here: " @for (at, (name, _)) in new.iter().enumerate() { @if at > 0 { "; " } (name) } }
            dl { @for (name, meaning) in &new { dt { (name) } dd { (meaning) } } }
        } } }
    }
}

/// `Snow water equivalent (SWE)` may stand as the one or the other, `Wet day, spell` too.
fn spellings(name: &str) -> impl Iterator<Item = String> + '_ {
    name.split([',', '(']).map(|part| part.trim().trim_end_matches(')').to_lowercase())
}

/// Whether a term stands there as words of their own, one or several of it.
fn stands_in(text: &str, term: &str) -> bool {
    let is_letter = |letter: Option<char>| letter.is_some_and(char::is_alphanumeric);
    text.match_indices(term).any(|(at, _)| {
        let after = &text[at + term.len()..];
        let after = after.strip_prefix('s').unwrap_or(after);
        !is_letter(text[..at].chars().next_back()) && !is_letter(after.chars().next())
    })
}

/// The text between the tags, in lower case; drawings say themselves what they show.
fn text_of(markup: &str) -> String {
    let mut text = String::new();
    let mut rest = markup;
    while let Some((before, after)) = rest.split_once('<') {
        text.push_str(before);
        let after = ["svg", "script"]
            .iter()
            .find(|name| after.starts_with(**name))
            .map_or(after, |name| after.split_once(&format!("</{name}")).map_or("", |(_, after)| after));
        rest = after.split_once('>').map_or("", |(_, after)| after);
    }
    text.push_str(rest);
    text.to_lowercase()
}

#[cfg(test)]
mod tests {
    use super::*;

    /// By hand: once, where it first stands; a part of another word, a tag and a drawing are not its use.
    #[test]
    fn terms_are_explained_once() {
        let terms = [
            ("Snow water equivalent (SWE)", "depth".to_owned()),
            ("Wet day, spell", "rain".to_owned()),
            ("Melt-out", "gone".to_owned()),
        ];
        let mut words = Words::new(&terms);
        let mut said = |content: &str| words.first_used_in(&maud::PreEscaped(content.to_owned())).0;
        assert_eq!(said("<p class=\"melt-out\">sweep</p><svg><text>Melt-out</text></svg>"), "");
        let first = said("<p>1 April SWE, and <b>spells</b></p>");
        assert!(first.contains("Words used here: Snow water equivalent (SWE); Wet day, spell<"), "{first}");
        assert!(first.contains("<dd>rain</dd>") && !first.contains("gone"), "{first}");
        assert_eq!(said("<p>SWE</p>"), "");
        assert!(said("<p>Melt-out.</p>").contains("<dd>gone</dd>"));
    }
}
