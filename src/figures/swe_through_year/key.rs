//! Which line and band is whose, beside them in the first panel.

use super::super::sheet::{Drawn, HPos, Px, Sheet, Stroke, VPos};
use super::super::theme::{BAND, NAME, tint};
use super::panel::{Course, REFERENCE, REFERENCE_EDGE, edge, median};
use plotters::style::RGBColor;

const SAMPLE_PX: [f64; 2] = [30.0, 14.0];
const TO_WORDS_PX: f64 = 8.0;
const LINE_PX: f64 = 21.0;
/// Free space around the key, px.
const PAD_PX: f64 = 10.0;

/// Names, each with a sample of its band and median.
pub(super) struct Key {
    lines: Vec<(String, Sample)>,
    /// Size of the panel, px.
    panel: [f64; 2],
}

/// A piece of band with its edges and its median.
#[derive(Debug, Clone, Copy)]
struct Sample {
    ground: RGBColor,
    edge: Stroke,
    median: Stroke,
}

/// The side of the panel at which the key stands.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum Side {
    Left,
    Right,
}

impl Key {
    /// Of the reference and, where there is one, the level of the first panel.
    pub fn of(reference: String, level: Option<(String, RGBColor)>, panel: [f64; 2]) -> Self {
        let behind = Sample { ground: BAND, edge: REFERENCE_EDGE, median: REFERENCE };
        let level = level
            .map(|(name, ink)| (name, Sample { ground: tint(ink), edge: edge(ink), median: median(ink) }));
        Self { lines: [(reference, behind)].into_iter().chain(level).collect(), panel }
    }

    fn width(&self) -> f64 {
        let words = self.lines.iter().map(|(words, _)| NAME.width(words)).fold(0.0, f64::max);
        SAMPLE_PX[0] + TO_WORDS_PX + words
    }

    fn height(&self) -> f64 {
        LINE_PX * self.lines.len() as f64
    }

    /// The side at which the curves are lower, and how high the scale must reach to keep them below the key.
    pub fn place(&self, courses: &[&Course]) -> (Side, f64) {
        let [width, height] = self.panel;
        let share = ((self.width() + 2.0 * PAD_PX) / width).min(1.0);
        let needed = |within: [f64; 2]| {
            let highest = courses.iter().map(|course| course.highest_within(within)).fold(0.0, f64::max);
            highest / (1.0 - (self.height() + PAD_PX) / height)
        };
        let (left, right) = (needed([0.0, share]), needed([1.0 - share, 1.0]));
        if left <= right { (Side::Left, left) } else { (Side::Right, right) }
    }

    /// Writes the key at the upper corner of a panel with these edges.
    pub fn write(&self, sheet: &Sheet, side: Side, [from, to]: [f64; 2], top: f64) -> Drawn {
        let left = match side {
            Side::Left => from + PAD_PX,
            Side::Right => to - self.width(),
        };
        let [width, height] = SAMPLE_PX;
        for (at, (words, sample)) in self.lines.iter().enumerate() {
            let y = top + LINE_PX * (at as f64 + 0.5);
            let across = |y: f64| -> [Px; 2] { [(left, y), (left + width, y)] };
            let [high, low] = [y - height / 2.0, y + height / 2.0];
            sheet.block((left, high), (left + width, low), sample.ground)?;
            sheet.line(&across(high), sample.edge)?;
            sheet.line(&across(low), sample.edge)?;
            sheet.line(&across(y), sample.median)?;
            let place = (left + width + TO_WORDS_PX, y);
            sheet.write(words, place, NAME, HPos::Left, VPos::Center)?;
        }
        Ok(())
    }
}
