//! Where a year's SWE and its three strips of bars stand.

use super::super::theme::{LABEL, MARGIN_PX, WIDTH_PX};
use super::panel::STRIPS;

/// Height of a year's title above its SWE, px.
const TITLE_PX: f64 = 20.0;
/// Space between SWE and the first strip, px: the amounts of both are written there.
const TO_STRIPS_PX: f64 = 18.0;
const BETWEEN_STRIPS_PX: f64 = 9.0;
/// Height of the months' names below a year, px.
const MONTHS_PX: f64 = 22.0;
/// Space below a year, px.
const BELOW_PX: f64 = 14.0;
/// From a strip to its name, px.
pub(super) const TO_NAME_PX: f64 = 8.0;

/// Years below each other.
pub(super) struct Layout {
    years: usize,
    left: f64,
    right: f64,
    top: f64,
    swe_px: f64,
    strip_px: f64,
}

/// Edges of a year's parts, px.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Place {
    pub left: f64,
    pub right: f64,
    /// Top and bottom of SWE.
    pub swe: [f64; 2],
    /// Top and bottom of each strip.
    pub strips: [[f64; 2]; STRIPS.len()],
}

impl Place {
    /// Where the lowest strip ends.
    pub fn bottom(&self) -> f64 {
        self.strips[STRIPS.len() - 1][1]
    }
}

impl Layout {
    /// At least one year; they reach from `left` to the strips' names at the right margin, and from `top` down.
    pub fn new(years: usize, left: f64, top: f64) -> Self {
        let [swe_px, strip_px] = match years {
            1 => [180.0, 56.0],
            2 | 3 => [124.0, 42.0],
            _ => [96.0, 34.0],
        };
        let names = STRIPS.iter().map(|strip| LABEL.width(strip.name)).fold(0.0, f64::max);
        Self { years, left, right: WIDTH_PX - MARGIN_PX - names - TO_NAME_PX, top, swe_px, strip_px }
    }

    /// The place of a year, counted from 0.
    pub fn place(&self, at: usize) -> Place {
        let swe_top = self.top + at as f64 * (self.year_px() + BELOW_PX) + TITLE_PX;
        let swe_bottom = swe_top + self.swe_px;
        let strip = |at: usize| {
            let top = swe_bottom + TO_STRIPS_PX + at as f64 * (self.strip_px + BETWEEN_STRIPS_PX);
            [top, top + self.strip_px]
        };
        Place {
            left: self.left,
            right: self.right,
            swe: [swe_top, swe_bottom],
            strips: std::array::from_fn(strip),
        }
    }

    /// Where the months below the last year end, px.
    pub fn bottom(&self) -> f64 {
        self.place(self.years - 1).bottom() + MONTHS_PX
    }

    fn year_px(&self) -> f64 {
        let strips = STRIPS.len() as f64;
        let bars = strips * self.strip_px + (strips - 1.0) * BETWEEN_STRIPS_PX;
        TITLE_PX + self.swe_px + TO_STRIPS_PX + bars + MONTHS_PX
    }
}
