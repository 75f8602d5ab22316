//! Where each year's panel stands.

use super::super::theme::{MARGIN_PX, WIDTH_PX};

/// No row has more panels.
const MOST_COLUMNS: usize = 5;
const GAP_PX: f64 = 14.0;
/// Height of a year's title above its panel, px.
const TITLE_PX: f64 = 20.0;
/// Space between a row's panels and the next row's titles, px.
const BELOW_PX: f64 = 12.0;
/// Height of the months' names below the last row, px.
const MONTHS_PX: f64 = 22.0;

/// Panels in rows.
pub(super) struct Grid {
    panels: usize,
    columns: usize,
    left: f64,
    top: f64,
    /// Width and height of a panel, px.
    size: [f64; 2],
}

/// A panel's edges, px, and what stands beside it.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Place {
    pub left: f64,
    pub top: f64,
    pub right: f64,
    pub bottom: f64,
    /// Whether amounts are written at its left.
    pub is_first_in_row: bool,
    /// Whether months are written below it.
    pub is_last_in_column: bool,
}

impl Grid {
    /// At least one panel; the grid reaches from `left` to the right margin and from `top` down.
    pub fn new(panels: usize, left: f64, top: f64) -> Self {
        let rows = panels.div_ceil(MOST_COLUMNS);
        let columns = panels.div_ceil(rows);
        let room = WIDTH_PX - MARGIN_PX - left - GAP_PX * (columns - 1) as f64;
        let width = room / columns as f64;
        let height = match columns {
            1 => 220.0,
            2 => 180.0,
            3 => 140.0,
            _ => 92.0,
        };
        Self { panels, columns, left, top, size: [width, height] }
    }

    /// The place of a panel, counted from 0.
    pub fn place(&self, at: usize) -> Place {
        let [width, height] = self.size;
        let (row, column) = (at / self.columns, at % self.columns);
        let left = self.left + column as f64 * (width + GAP_PX);
        let top = self.top + row as f64 * (TITLE_PX + height + BELOW_PX) + TITLE_PX;
        Place {
            left,
            top,
            right: left + width,
            bottom: top + height,
            is_first_in_row: column == 0,
            is_last_in_column: at + self.columns >= self.panels,
        }
    }

    /// Where the months below the last row end, px.
    pub fn bottom(&self) -> f64 {
        self.place(self.panels - 1).bottom + MONTHS_PX
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn rows_are_full_and_every_column_has_its_months() {
        for panels in 1..=40 {
            let grid = Grid::new(panels, 60.0, 100.0);
            let places: Vec<Place> = (0..panels).map(|at| grid.place(at)).collect();
            let months = places.iter().filter(|place| place.is_last_in_column).count();
            assert_eq!(months, grid.columns, "{panels}");
            let rightmost = places.iter().map(|place| place.right).fold(0.0, f64::max);
            assert!((rightmost - (WIDTH_PX - MARGIN_PX)).abs() < 1e-9, "{panels}");
        }
    }
}
