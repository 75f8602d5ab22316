//! Beside the elevations, what tells bands of one range apart: a column for each part of their ground that is stated.

use super::super::sheet::{Drawn, HPos, Sheet, VPos};
use super::super::theme::NOTE;
use super::Found;
use super::rows::Rows;
use crate::basin::{Ground, GroundStated};

/// Between two columns, px.
const GAP_PX: f64 = 9.0;
/// Between the last one and the elevations, px.
const BESIDE_PX: f64 = 16.0;

/// The columns, from the left.
pub(super) struct GroundColumns(Vec<Column>);

struct Column {
    head: &'static str,
    /// A band's each, from the lowest.
    cells: Vec<String>,
}

impl Column {
    fn width(&self) -> f64 {
        self.cells.iter().map(|cell| NOTE.width(cell)).fold(NOTE.width(self.head), f64::max)
    }
}

/// Whether a column is told, its head, and how its cells are written.
type Told = (bool, &'static str, fn(&Ground) -> String);

impl GroundColumns {
    /// None where every band has a range of its own.
    pub fn of(bands: &[Found<'_>]) -> Self {
        if bands.iter().all(|found| found.apart.is_none()) {
            return Self(Vec::new());
        }
        let stated = GroundStated::of(bands.iter().map(|found| found.band));
        let columns: [Told; 4] = [
            (stated.slope, "Facing", |ground| match ground.slope_deg {
                0.0 => "–".to_owned(),
                _ => format!("{:.0}°", ground.aspect_deg),
            }),
            (stated.slope, "Slope", |ground| format!("{:.0}°", ground.slope_deg)),
            (stated.canopy, "Canopy", |ground| format!("{:.0} %", 100.0 * ground.canopy_fraction)),
            (stated.variation, "CV", |ground| {
                ground
                    .accumulation_variation
                    .map_or_else(|| "–".to_owned(), |variation| format!("{variation:.2}"))
            }),
        ];
        let told = columns.into_iter().filter(|(is_told, ..)| *is_told);
        let column = |(_, head, cell): Told| Column {
            head,
            cells: bands.iter().map(|found| cell(&found.band.ground)).collect(),
        };
        Self(told.map(column).collect())
    }

    /// Width of all columns and of the space beside them, px; 0 where there are none.
    pub fn width(&self) -> f64 {
        let Self(columns) = self;
        let widths: f64 = columns.iter().map(Column::width).sum();
        match columns.len() {
            0 => 0.0,
            count => widths + GAP_PX * (count - 1) as f64 + BESIDE_PX,
        }
    }

    /// Writes them from `left` on, their heads at a height of their own, and the cells of bands there is room to label.
    pub fn write(&self, sheet: &Sheet, left: f64, heads: f64, rows: &Rows) -> Drawn {
        let Self(columns) = self;
        let mut right = left;
        for column in columns {
            right += column.width();
            sheet.write(column.head, (right, heads), NOTE, HPos::Right, VPos::Bottom)?;
            for (at, cell) in rows.labelled().into_iter().filter_map(|at| Some((at, column.cells.get(at)?))) {
                sheet.write(cell, (right, rows.middle(at)), NOTE, HPos::Right, VPos::Center)?;
            }
            right += GAP_PX;
        }
        Ok(())
    }
}
