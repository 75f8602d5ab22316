//! The levels' names above the upper ends of their lines, moved apart.

use super::super::apart::moved_apart;
use super::super::sheet::{Drawn, HPos, Sheet, Stroke, VPos};
use super::super::theme::NAME;
use plotters::style::RGBColor;

const BETWEEN_PX: f64 = 12.0;

/// Names and where their lines end.
pub(super) struct LevelNames {
    names: Vec<(f64, String, RGBColor)>,
    within: [f64; 2],
}

impl LevelNames {
    /// No names yet; they will stand between two edges.
    pub fn new(within: [f64; 2]) -> Self {
        Self { names: Vec::new(), within }
    }

    pub fn add(&mut self, end: f64, name: String, ink: RGBColor) {
        self.names.push((end, name, ink));
    }

    /// Writes the names from left to right as the lines end, each joined to its line's end at `top`.
    pub fn write(mut self, sheet: &Sheet, top: f64) -> Drawn {
        self.names.sort_by(|a, b| a.0.total_cmp(&b.0));
        let wanted: Vec<[f64; 2]> =
            self.names.iter().map(|(end, name, _)| [*end, NAME.width(name)]).collect();
        for ((end, name, ink), middle) in self.names.iter().zip(moved_apart(&wanted, BETWEEN_PX, self.within))
        {
            sheet.line(&[(middle, top - 17.0), (*end, top - 4.0)], Stroke::solid(*ink, 1.0))?;
            sheet.write(name, (middle, top - 21.0), NAME, HPos::Center, VPos::Bottom)?;
        }
        Ok(())
    }
}
