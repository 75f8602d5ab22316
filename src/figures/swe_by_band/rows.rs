//! Where elevations stand on the sheet, and which bands there is room to label.

use super::super::labels::elevation;
use super::super::sheet::{Drawn, HPos, Sheet, Stroke, VPos};
use super::super::theme::{EDGE, LABEL};
use super::Found;
use crate::units::UnitSystem;

/// Height that a band should have, px, and that of all together.
const BAND_PX: f64 = 26.0;
const HEIGHT_PX: [f64; 2] = [150.0, 430.0];
/// The most that they take where bands share a range, so that there is room to label each, px.
const HEIGHT_OF_PARTS_PX: f64 = 900.0;
/// Least distance of two labels above each other, px.
const APART_PX: f64 = 17.0;

/// Bands above each other, as high as their edges are apart. Bands of one range share its height.
pub(super) struct Rows {
    pub top: f64,
    pub bottom: f64,
    lowest_m: f64,
    highest_m: f64,
    /// Lower and upper edge of each, m.
    edges_m: Vec<[f64; 2]>,
    /// The same as they are drawn.
    drawn_m: Vec<[f64; 2]>,
}

impl Rows {
    /// Bands from the lowest, drawn from `top` down.
    pub fn of(bands: &[Found<'_>], top: f64) -> Self {
        let edges_m: Vec<[f64; 2]> =
            bands.iter().map(|found| [found.band.lower_m, found.band.upper_m]).collect();
        let drawn_m: Vec<[f64; 2]> =
            edges_m.chunk_by(|below, above| below == above).flat_map(parts_of).collect();
        let lowest_m = edges_m.iter().map(|[lower_m, _]| *lower_m).fold(f64::INFINITY, f64::min);
        let highest_m = edges_m.iter().map(|[_, upper_m]| *upper_m).fold(f64::NEG_INFINITY, f64::max);
        let [least, most] = HEIGHT_PX;
        let height = (BAND_PX * bands.len() as f64).clamp(least, most);
        let thinnest_m =
            drawn_m.iter().map(|[lower_m, upper_m]| upper_m - lower_m).fold(f64::INFINITY, f64::min);
        let height = if bands.iter().any(|found| found.apart.is_some()) {
            (APART_PX * (highest_m - lowest_m) / thinnest_m + 1.0).clamp(height, HEIGHT_OF_PARTS_PX)
        } else {
            height
        };
        Self { top, bottom: top + height, lowest_m, highest_m, edges_m, drawn_m }
    }

    /// Where an elevation stands, px.
    pub fn height(&self, elevation_m: f64) -> f64 {
        let share = (elevation_m - self.lowest_m) / (self.highest_m - self.lowest_m);
        self.bottom - share * (self.bottom - self.top)
    }

    /// Where a band's middle stands, px.
    pub fn middle(&self, at: usize) -> f64 {
        self.drawn_m.get(at).map_or(self.top, |[lower_m, upper_m]| self.height((lower_m + upper_m) / 2.0))
    }

    /// Where a band's lower and upper edge stand, px.
    pub fn edges_of(&self, at: usize) -> [f64; 2] {
        self.drawn_m.get(at).map_or([self.bottom, self.top], |edges| edges.map(|edge_m| self.height(edge_m)))
    }

    /// Where a band's marker stands, px: at the elevation at which the band is run, or amid its part of a range.
    pub fn of_marker(&self, at: usize, found: &Found<'_>) -> f64 {
        if found.apart.is_some() { self.middle(at) } else { self.height(found.band.elevation_m) }
    }

    /// Space between a bar and its band's edges, px.
    pub fn gap(&self) -> f64 {
        let heights =
            self.drawn_m.iter().map(|[lower_m, upper_m]| self.height(*lower_m) - self.height(*upper_m));
        (heights.fold(f64::INFINITY, f64::min) * 0.1).min(1.5)
    }

    /// The bands whose labels keep apart, from the highest.
    pub fn labelled(&self) -> Vec<usize> {
        let bands = (0..self.drawn_m.len()).rev().map(|at| (at, self.middle(at)));
        apart(bands)
    }

    /// The edges whose labels keep apart, from the highest, m.
    fn edges(&self) -> Vec<f64> {
        let mut edges: Vec<f64> = self.edges_m.iter().flatten().copied().collect();
        edges.sort_by(|a, b| b.total_cmp(a));
        edges.dedup();
        apart(edges.into_iter().map(|edge_m| (edge_m, self.height(edge_m))))
    }

    /// Width of the widest edge's label, px.
    pub fn edges_width(&self, units: UnitSystem) -> f64 {
        self.edges().iter().map(|edge_m| LABEL.width(&elevation(units, *edge_m))).fold(0.0, f64::max)
    }

    /// The line at the left with a tick at each labelled edge.
    pub fn axis(&self, sheet: &Sheet, left: f64, units: UnitSystem) -> Drawn {
        let line = Stroke::solid(EDGE, 1.0);
        sheet.line(&[(left, self.top), (left, self.bottom)], line)?;
        for edge_m in self.edges() {
            let y = self.height(edge_m);
            sheet.line(&[(left - 5.0, y), (left, y)], line)?;
            let label = elevation(units, edge_m);
            sheet.write(&label, (left - 9.0, y), LABEL, HPos::Right, VPos::Center)?;
        }
        Ok(())
    }
}

/// The parts of a range, one a band with these edges, equally high and above each other.
fn parts_of(range: &[[f64; 2]]) -> Vec<[f64; 2]> {
    let [lower_m, upper_m] = range[0];
    let height_m = (upper_m - lower_m) / range.len() as f64;
    let edge = |part: usize| if part == range.len() { upper_m } else { lower_m + height_m * part as f64 };
    (0..range.len()).map(|part| [edge(part), edge(part + 1)]).collect()
}

/// Of things with their heights, downwards, those that keep apart.
fn apart<T>(things: impl Iterator<Item = (T, f64)>) -> Vec<T> {
    let mut last = f64::NEG_INFINITY;
    let kept = things.filter(|(_, height)| {
        let is_kept = *height - last >= APART_PX;
        if is_kept {
            last = *height;
        }
        is_kept
    });
    kept.map(|(thing, _)| thing).collect()
}
