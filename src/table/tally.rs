//! Faults of a data file: the first few of each column whole, the others counted.

use crate::fault::{Fault, Place};
use std::collections::BTreeMap;

/// How many faults of one column are shown whole; the rest are counted.
const SHOWN_PER_COLUMN: usize = 3;

/// Faults of a data file.
#[derive(Default)]
pub struct Tally {
    faults: Vec<Fault>,
    by_column: BTreeMap<String, Column>,
}

#[derive(Default)]
struct Column {
    count: usize,
    last: usize,
}

impl Tally {
    /// Adds a fault.
    pub fn push(&mut self, fault: Fault) {
        let column = self.by_column.entry(column_of(&fault).to_owned()).or_default();
        column.count += 1;
        if column.count <= SHOWN_PER_COLUMN {
            column.last = self.faults.len();
            self.faults.push(fault);
        }
    }

    /// What was read, or nothing where a fault took its place.
    pub fn keep<T>(&mut self, read: Result<T, Fault>) -> Option<T> {
        read.map_err(|fault| self.push(fault)).ok()
    }

    /// Whether nothing has been added.
    pub fn is_empty(&self) -> bool {
        self.faults.is_empty()
    }

    /// Lets `say` tell of every fault of a column how to mend it, once the whole file is known.
    pub fn mend(&mut self, column: &str, say: impl FnMut(&mut Fault)) {
        self.faults
            .iter_mut()
            .filter(|fault| fault.mend.is_empty() && column_of(fault) == column)
            .for_each(say);
    }

    /// All faults, with a word on those that were only counted.
    pub fn into_faults(mut self) -> Vec<Fault> {
        for column in self.by_column.into_values() {
            if column.count > SHOWN_PER_COLUMN {
                let more = column.count - SHOWN_PER_COLUMN;
                let plural = if more == 1 { "" } else { "s" };
                let last = &mut self.faults[column.last];
                let whose = if column_of(last).is_empty() { "of this kind" } else { "in this column" };
                last.found += &format!(" (and {more} more fault{plural} {whose})");
            }
        }
        self.faults
    }
}

/// The column that a fault lies in; empty where it is a whole line or file.
fn column_of(fault: &Fault) -> &str {
    match &fault.place {
        Place::Cell { column, .. } => column,
        _ => "",
    }
}
