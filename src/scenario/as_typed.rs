//! Faults of volumes and flows, said of the keys and numbers that were typed, whatever their unit.

use super::section::Section;
use super::volumes::Stated;
use crate::fault::{Fault, Place};

/// A number that the room below knows by another key, in hm3 or hm3 a day.
pub(super) struct Typed {
    /// The room's key, within the table.
    of: String,
    /// The key that was typed, within the table.
    key: String,
    /// What was typed, in the unit of the key that was typed, and the same in the room's.
    typed: f64,
    value: f64,
}

impl Typed {
    /// A number under a key of its own.
    pub fn one(of: &str, stated: &Stated<f64>) -> Self {
        Self { of: of.to_owned(), key: stated.key.to_owned(), typed: stated.typed, value: stated.value }
    }

    /// The same in a table inside the table.
    pub fn below(mut self, path: &str) -> Self {
        self.key.insert_str(0, path);
        self
    }

    /// The months of a flow: elements of a list where twelve were typed, and one number where one was.
    pub fn monthly(section: &Section<'_>, of: &str, stated: &Stated<[f64; 12]>) -> Vec<Self> {
        let months = if section.is_list(stated.key) { 12 } else { 1 };
        let month = |at: usize| Self {
            of: format!("{of}[{at}]"),
            key: if months == 1 { stated.key.to_owned() } else { format!("{}[{at}]", stated.key) },
            typed: stated.typed[at],
            value: stated.value[at],
        };
        (0..months).map(month).collect()
    }

    /// What was found there, beside what that is in hm3 where something in hm3 is expected.
    fn words(&self, expected: &str) -> String {
        if self.typed == self.value || !expected.contains("hm3") {
            return self.typed.to_string();
        }
        // Only volumes are looked up by a key with their unit.
        let unit = if self.of.ends_with("_hm3") { "hm3" } else { "hm3 a day" };
        format!("{}, which is {:.5} {unit}", self.typed, self.value)
    }
}

/// Notes the faults that a room found, under the keys that were typed; of an even flow one month's alone.
pub(super) fn note_as_typed(section: &Section<'_>, faults: Vec<Fault>, typed: &[Typed]) {
    for mut fault in faults {
        if let Place::Key(key) = &mut fault.place {
            let of = typed.iter().find(|typed| section.path_of(&typed.of) == *key);
            match of {
                Some(of) => {
                    *key = section.path_of(&of.key);
                    fault.found = of.words(&fault.expected);
                }
                None if key.ends_with(']') => continue,
                None => {}
            }
        }
        section.fault(fault);
    }
}
