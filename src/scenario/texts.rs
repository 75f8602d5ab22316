//! Texts of a scenario's table: alone, in lists, or one of several words.

use super::nearest::nearest;
use super::section::Section;
use crate::fault::Fault;
use toml::de::DeValue;

impl<'d> Section<'d> {
    /// A text, if one was typed.
    pub fn text(&mut self, key: &'static str) -> Option<&'d str> {
        let value = self.value(key)?;
        let text = value.as_str();
        if text.is_none() {
            self.wrong_type(key, value, "a text in quotes");
        }
        text
    }

    /// A text that must be there and not be empty.
    pub fn required_text(&mut self, key: &'static str, expected: &str, mend: &str) -> Option<String> {
        if !self.has(key) {
            self.value(key);
            self.missing(key, expected, mend);
            return None;
        }
        let text = self.text(key)?;
        if text.trim().is_empty() {
            self.fault(Fault::key(self.path_of(key), "an empty text", expected, mend));
            return None;
        }
        Some(text.to_owned())
    }

    /// A text, or its default.
    pub fn text_or(&mut self, key: &'static str, default: &str) -> String {
        if !self.has(key) {
            self.value(key);
            self.default(key, format!("{default:?}"));
            return default.to_owned();
        }
        self.text(key).unwrap_or(default).to_owned()
    }

    /// A list of texts, if one was typed.
    pub fn texts(&mut self, key: &'static str) -> Option<Vec<String>> {
        let value = self.value(key)?;
        let texts: Option<Vec<String>> = match value {
            DeValue::Array(array) => {
                array.iter().map(|element| element.get_ref().as_str().map(str::to_owned)).collect()
            }
            _ => None,
        };
        if texts.is_none() {
            self.wrong_type(key, value, "a list of texts in quotes");
        }
        texts
    }

    /// One of several words, if one was typed.
    pub fn choice<T: Copy>(&mut self, key: &'static str, choices: &[(&'static str, T)]) -> Option<T> {
        let typed = self.text(key)?;
        if let Some((_, choice)) = choices.iter().find(|(word, _)| *word == typed) {
            return Some(*choice);
        }
        let words: Vec<String> = choices.iter().map(|(word, _)| format!("{word:?}")).collect();
        let mend = match nearest(typed, choices.iter().map(|(word, _)| *word)) {
            Some(word) => format!("did you mean {word:?}?"),
            None => "take one of these".to_owned(),
        };
        self.fault(Fault::key(self.path_of(key), format!("{typed:?}"), words.join(" or "), mend));
        None
    }

    /// One of several words, or the default, which is one of them.
    pub fn choice_or<T: Copy>(
        &mut self,
        key: &'static str,
        choices: &[(&'static str, T)],
        default: &str,
    ) -> Option<T> {
        if self.has(key) {
            return self.choice(key, choices);
        }
        self.text_or(key, default);
        choices.iter().find(|(word, _)| *word == default).map(|(_, choice)| *choice)
    }

    /// One of several words that must be there.
    pub fn required_choice<T: Copy>(
        &mut self,
        key: &'static str,
        choices: &[(&'static str, T)],
    ) -> Option<T> {
        if self.has(key) {
            return self.choice(key, choices);
        }
        self.knows(key);
        let words: Vec<String> = choices.iter().map(|(word, _)| format!("{word:?}")).collect();
        let mend = format!("add {key} = {}", words.first().map_or("", String::as_str));
        self.missing(key, &words.join(" or "), &mend);
        None
    }
}
