//! A measure that is read off a reservoir's books.

use crate::season::{Kind, Measure};

/// One measure of some books, and how it is read off them.
pub(super) struct Entry<Books: 'static> {
    kind: Kind,
    name: &'static str,
    title: &'static str,
    of: fn(&Books) -> f64,
}

impl<Books> Entry<Books> {
    pub const fn new(kind: Kind, name: &'static str, title: &'static str, of: fn(&Books) -> f64) -> Self {
        Self { kind, name, title, of }
    }

    /// The measure.
    pub fn measure(&self) -> Measure {
        Measure::new(self.kind, self.name, self.title)
    }

    /// What the books say of it.
    pub fn read(&self, books: &Books) -> f64 {
        (self.of)(books)
    }
}
