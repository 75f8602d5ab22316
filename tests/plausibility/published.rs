//! A published number with its source, as a band that a plausible model falls into.

/// A band. Where nothing else is said, the source's abstract was read.
#[derive(Debug, Clone, Copy)]
pub struct Published<'a> {
    /// The row, and what it is about.
    pub row: &'a str,
    pub band: [f64; 2],
    pub source: &'a str,
}

impl Published<'_> {
    /// Fails where a number lies outside the band.
    pub fn assert_holds(&self, found: f64) {
        let [low, high] = self.band;
        assert!(
            (low..=high).contains(&found),
            "{}: {found}, not {low} to {high} ({})",
            self.row,
            self.source
        );
    }
}

/// From half to twice a published number, of either sign.
pub const fn factor_two(number: f64) -> [f64; 2] {
    if number < 0.0 { [2.0 * number, number / 2.0] } else { [number / 2.0, 2.0 * number] }
}
