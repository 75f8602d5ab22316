//! A column a chance, from what nearly every year brings to what only the wettest do.

use super::super::sheet::{Drawn, HPos, Sheet, VPos};
use super::super::theme::{LABEL, MARGIN_PX, NAME, NOTE};
use super::Line;

/// Levels stand so far apart in a column, px.
const BESIDE_PX: f64 = 11.0;

/// Columns between two edges.
pub(super) struct Columns {
    edges: [f64; 2],
    chances_pct: Vec<u32>,
    levels: usize,
}

impl Columns {
    pub fn new(lines: &[Line<'_>], edges: [f64; 2]) -> Self {
        let exceeded = lines.first().map_or([].as_slice(), |line| line.exceeded);
        Self {
            edges,
            chances_pct: exceeded.iter().map(|found| found.chance_pct).collect(),
            levels: lines.len(),
        }
    }

    /// The middle of a column.
    pub fn middle(&self, column: usize) -> f64 {
        let [left, right] = self.edges;
        left + (right - left) * (column as f64 + 0.5) / self.chances_pct.len().max(1) as f64
    }

    /// Where a level's mark stands in a column.
    pub fn place(&self, column: usize, level: usize) -> f64 {
        self.middle(column) + BESIDE_PX * (level as f64 - (self.levels as f64 - 1.0) / 2.0)
    }

    /// Height of what [`write`](Self::write) writes, px.
    pub fn heading_height(&self) -> f64 {
        12.0 + 3.0 * LABEL.leading() + 10.0
    }

    /// The chances below the plot, and which way they run.
    pub fn write(&self, sheet: &Sheet, bottom: f64) -> Drawn {
        let line = |at: f64| bottom + 12.0 + LABEL.leading() * (at + 0.5);
        for (column, chance_pct) in self.chances_pct.iter().enumerate() {
            let middle = self.middle(column);
            sheet.write(&in_years(*chance_pct), (middle, line(0.0)), NAME, HPos::Center, VPos::Center)?;
            let percent = format!("{chance_pct} %");
            sheet.write(&percent, (middle, line(1.0)), LABEL, HPos::Center, VPos::Center)?;
        }
        sheet.write("At least, in", (MARGIN_PX, line(0.0)), NAME, HPos::Left, VPos::Center)?;
        let [left, right] = self.edges;
        sheet.write("even dry years reach it", (left, line(2.0)), NOTE, HPos::Left, VPos::Center)?;
        sheet.write("only wet years reach it", (right, line(2.0)), NOTE, HPos::Right, VPos::Center)
    }
}

/// `9 of 10 years`.
pub(super) fn in_years(chance_pct: u32) -> String {
    format!("{} of 10 years", chance_pct / 10)
}
