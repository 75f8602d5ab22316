//! A case: where its values come from, and how they are compared.

use serde::Deserialize;
use serde::de::DeserializeOwned;
use std::cell::RefCell;
use std::collections::BTreeSet;

/// One case of a file of vectors.
#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
pub struct Case {
    /// Its name, and in what it differs from others of the same source.
    pub id: String,
    /// Where the expected values come from.
    pub source: String,
    /// How the source was had: read, computed, or quoted from memory.
    pub standing: Standing,
    /// By how much the values may differ.
    pub tolerance: f64,
    /// Whether the tolerance is a share of the expected value.
    #[serde(default)]
    pub is_relative: bool,
    /// Why this tolerance, and what the case is for.
    pub why: String,
    /// Which runner it goes through.
    pub run: String,
    input: toml::Table,
    expected: toml::Table,
    #[serde(skip)]
    asked: RefCell<BTreeSet<String>>,
}

/// How far the source itself can be trusted.
#[derive(Deserialize, Debug, PartialEq)]
#[serde(rename_all = "kebab-case")]
pub enum Standing {
    /// Follows from a stated formula or definition and was recomputed outside the program.
    Computed,
    /// Computed; the publication named beside it was quoted from memory and not looked at.
    ComputedCitationFromMemory,
    /// The value stands in the source or in a text that quotes it, and was read there.
    Read,
    /// The value itself was quoted from memory; it agrees with the formula beside it.
    FromMemory,
}

#[derive(Deserialize)]
struct File {
    case: Vec<Case>,
}

/// Reads a file of vectors.
pub fn read(text: &str) -> Vec<Case> {
    let file: File = toml::from_str(text).expect("a file of vectors");
    for case in &file.case {
        let words = [&case.id, &case.source, &case.why];
        assert!(words.iter().all(|text| !text.is_empty()), "{}: no source or reason", case.id);
    }
    file.case
}

impl Case {
    /// An input by its name.
    pub fn input<T: DeserializeOwned>(&self, name: &str) -> T {
        self.input_or_none(name).unwrap_or_else(|| panic!("{}: no input '{name}'", self.id))
    }

    /// An input that may be left out.
    pub fn input_or_none<T: DeserializeOwned>(&self, name: &str) -> Option<T> {
        let value = self.input.get(name)?.clone();
        Some(value.try_into().unwrap_or_else(|error| panic!("{}: '{name}': {error}", self.id)))
    }

    /// Compares what the program gave with the values expected under a name, if any are.
    pub fn check(&self, name: &str, found: &[f64]) {
        let Some(expected) = self.expected.get(name) else {
            return;
        };
        self.asked.borrow_mut().insert(name.to_owned());
        let expected: Vec<f64> =
            expected.clone().try_into().unwrap_or_else(|error| panic!("{name}: {error}"));
        assert_eq!(found.len(), expected.len(), "{}: {name}: {found:?} for {expected:?}", self.id);
        for (found, expected) in found.iter().zip(&expected) {
            let allowed = self.tolerance * if self.is_relative { expected.abs() } else { 1.0 };
            assert!(
                (found - expected).abs() <= allowed,
                "{}: {name}: {found} for {expected}, which may differ by {allowed} ({}; {}; {:?})",
                self.id,
                self.why,
                self.source,
                self.standing,
            );
        }
    }

    /// Fails where something is expected that the runner does not give.
    pub fn assert_all_asked(&self) {
        let asked = self.asked.borrow();
        let forgotten: Vec<&String> = self.expected.keys().filter(|name| !asked.contains(*name)).collect();
        assert!(forgotten.is_empty(), "{}: '{}' does not give {forgotten:?}", self.id, self.run);
        assert!(!asked.is_empty(), "{}: expects nothing", self.id);
    }
}
