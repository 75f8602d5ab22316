//! One level's panel: its range over years and its median, the reference's behind them.

use super::super::sheet::{Drawn, HPos, Plot, Px, Sheet, Stroke, VPos};
use super::super::theme::{BAND, EDGE, INK, NAME, NOTE, tint};
use super::super::thin::{TOLERANCE_PX, thinned};
use crate::findings::LevelThroughYear;
use crate::units::Unit;
use plotters::style::RGBColor;

/// The reference's median.
pub(super) const REFERENCE: Stroke = Stroke { ink: INK, width_px: 1.6, dash_px: Some([6, 4]) };
/// The edges of the reference's range.
pub(super) const REFERENCE_EDGE: Stroke = Stroke { ink: EDGE, width_px: 1.1, dash_px: Some([2, 2]) };

/// A level's median.
pub(super) const fn median(ink: RGBColor) -> Stroke {
    Stroke::solid(ink, 2.6)
}

/// The edges of a level's range.
pub(super) const fn edge(ink: RGBColor) -> Stroke {
    Stroke::solid(ink, 1.0)
}

/// SWE of every day at one level, in the reader's unit: 10 %, median, 90 %.
pub(super) struct Course {
    quantiles: [Vec<f64>; 3],
}

impl Course {
    pub fn of(level: &LevelThroughYear, depth: Unit) -> Self {
        let quantiles = [&level.q10_mm, &level.q50_mm, &level.q90_mm];
        Self { quantiles: quantiles.map(|days| days.iter().map(|swe_mm| depth.of(*swe_mm)).collect()) }
    }

    /// The highest value that is drawn.
    pub fn highest(&self) -> f64 {
        self.quantiles[2].iter().copied().fold(0.0, f64::max)
    }

    /// The highest in a part of the year, as shares of it.
    pub fn highest_within(&self, [from, to]: [f64; 2]) -> f64 {
        let days = self.quantiles[2].len() as f64;
        let within = |day: usize| (from * days..=to * days).contains(&(day as f64));
        let values = self.quantiles[2].iter().enumerate().filter(|(day, _)| within(*day));
        values.map(|(_, value)| *value).fold(0.0, f64::max)
    }

    fn places(&self, plot: &Plot) -> [Vec<Px>; 3] {
        let place = |(day, swe): (u32, &f64)| plot.at(f64::from(day), *swe);
        self.quantiles
            .each_ref()
            .map(|days| thinned(&(1..).zip(days).map(place).collect::<Vec<_>>(), TOLERANCE_PX))
    }
}

/// A level, or the reference alone.
pub(super) struct Panel {
    /// Its level, and its highest median.
    pub name: [String; 2],
    pub level: Option<Course>,
    pub ink: RGBColor,
}

impl Panel {
    /// Draws it into a plot; its name stands above the plot's upper left corner.
    pub fn draw(&self, sheet: &Sheet, plot: &Plot, (left, top): Px, reference: &Course) -> Drawn {
        let [name, highest] = &self.name;
        sheet.write(name, (left, top - 8.0), NAME, HPos::Left, VPos::Bottom)?;
        let beside = left + NAME.width(name) + 9.0;
        sheet.write(highest, (beside, top - 8.0), NOTE, HPos::Left, VPos::Bottom)?;
        let behind = reference.places(plot);
        let level = self.level.as_ref().map(|level| level.places(plot));
        range(sheet, &behind, BAND)?;
        if let Some(level) = &level {
            range(sheet, level, tint(self.ink))?;
        }
        let [low, middle, high] = behind;
        for (line, stroke) in [(low, REFERENCE_EDGE), (high, REFERENCE_EDGE), (middle, REFERENCE)] {
            sheet.line(&line, stroke)?;
        }
        if let Some([low, middle, high]) = level {
            for (line, stroke) in [(low, edge(self.ink)), (high, edge(self.ink)), (middle, median(self.ink))]
            {
                sheet.line(&line, stroke)?;
            }
        }
        Ok(())
    }
}

/// The area between the 10 and the 90 % line.
fn range(sheet: &Sheet, [low, _, high]: &[Vec<Px>; 3], ink: RGBColor) -> Drawn {
    let around: Vec<Px> = low.iter().chain(high.iter().rev()).copied().collect();
    sheet.shape(&around, ink)
}
