//! Where each level's panel stands: two in a row, or one alone.

use super::super::axes::AmountTicks;
use super::super::scales;
use super::super::theme::{MARGIN_PX, WIDTH_PX};

/// Between two panels in a row, px.
const GAP_PX: f64 = 22.0;
/// Height of a panel's name above it, and of the months below it, px.
const NAME_PX: f64 = 24.0;
const MONTHS_PX: f64 = 40.0;

/// Panels in rows.
pub(super) struct Grid {
    panels: usize,
    columns: usize,
    left: f64,
    /// Width and height of a panel, px.
    pub size: [f64; 2],
}

/// A panel's edges, px, and whether amounts are written at its left.
#[derive(Debug, Clone, Copy)]
pub(super) struct Place {
    pub left: f64,
    pub top: f64,
    pub right: f64,
    pub bottom: f64,
    pub is_first_in_row: bool,
}

impl Grid {
    /// As wide as the amounts at the left allow.
    pub fn new(panels: usize, ticks: &AmountTicks) -> Self {
        let columns = panels.clamp(1, 2);
        let left = MARGIN_PX + scales::width(ticks) + 14.0;
        let gaps = GAP_PX * (columns - 1) as f64;
        let width = (WIDTH_PX - MARGIN_PX - left - gaps) / columns as f64;
        Self { panels, columns, left, size: [width, if columns == 1 { 270.0 } else { 200.0 }] }
    }

    /// The place of a panel, counted from 0, in a grid that begins at `top`.
    pub fn place(&self, at: usize, top: f64) -> Place {
        let [width, height] = self.size;
        let (row, column) = (at / self.columns, at % self.columns);
        let left = self.left + column as f64 * (width + GAP_PX);
        let top = top + row as f64 * self.row_px() + NAME_PX;
        Place { left, top, right: left + width, bottom: top + height, is_first_in_row: column == 0 }
    }

    /// Height of all panels, px.
    pub fn height(&self) -> f64 {
        self.row_px() * self.panels.div_ceil(self.columns) as f64
    }

    fn row_px(&self) -> f64 {
        NAME_PX + self.size[1] + MONTHS_PX
    }
}
