//! A level's snow water from the lowest band to the highest, in steps.

use super::super::marks::{Marking, marker};
use super::super::sheet::{Drawn, Plot, Px, Sheet, Stroke};
use super::super::theme::{BAND, EDGE};
use super::Found;
use super::rows::Rows;
use crate::units::Unit;

/// What profiles are drawn from and where.
pub(super) struct Profile<'a> {
    pub plot: &'a Plot,
    pub rows: &'a Rows,
    pub bands: &'a [Found<'a>],
    pub depth: Unit,
}

impl Profile<'_> {
    /// The reference's 5-95 % over realizations.
    pub fn range(&self, sheet: &Sheet, reference: usize) -> Drawn {
        for run in self.steps(reference) {
            let [low, high] = [0, 2].map(|end| run.iter().map(|step| step[end]).collect::<Vec<Px>>());
            let around: Vec<Px> = low.iter().chain(high.iter().rev()).copied().collect();
            sheet.shape(&around, BAND)?;
            sheet.line(&low, Stroke::solid(EDGE, 1.0))?;
            sheet.line(&high, Stroke::solid(EDGE, 1.0))?;
        }
        Ok(())
    }

    /// The medians of a level, with a marker at each labelled band's own elevation.
    pub fn line(&self, sheet: &Sheet, level: usize, marking: Marking) -> Drawn {
        let stroke = if marking.is_hollow {
            Stroke { ink: marking.ink, width_px: 1.6, dash_px: Some([6, 4]) }
        } else {
            Stroke::solid(marking.ink, 2.0)
        };
        for run in self.steps(level) {
            let medians: Vec<Px> = run.iter().map(|step| step[1]).collect();
            sheet.line(&medians, stroke)?;
        }
        for (at, found) in self.rows.labelled().into_iter().filter_map(|at| Some((at, self.bands.get(at)?))) {
            if let Some([_, median_mm, _]) = found.range_mm(level) {
                let height = self.rows.of_marker(at, found);
                marker(sheet, (self.across(median_mm), height), marking)?;
            }
        }
        Ok(())
    }

    /// Where a level's line ends at the top, px; at 0 where the highest band has no value.
    pub fn upper_end(&self, level: usize) -> f64 {
        let highest = self.bands.last().and_then(|found| found.range_mm(level));
        self.across(highest.map_or(0.0, |[_, median_mm, _]| median_mm))
    }

    fn across(&self, amount_mm: f64) -> f64 {
        self.plot.at(self.depth.of(amount_mm), 0.0).0
    }

    /// Low end, median and high end at the lower and the upper edge of every band, in runs of bands that have them.
    fn steps(&self, level: usize) -> Vec<Vec<[Px; 3]>> {
        let ranges: Vec<_> =
            self.bands.iter().enumerate().map(|(at, found)| (at, found.range_mm(level))).collect();
        let runs = ranges.split(|(_, range)| range.is_none()).filter(|run| !run.is_empty());
        let steps = |run: &[_]| {
            let step = |(at, range): &(usize, Option<[f64; 3]>)| {
                let across = range.map(|range_mm| range_mm.map(|amount_mm| self.across(amount_mm)));
                let ends = |height: f64| across.map(|across| across.map(|x| (x, height)));
                self.rows.edges_of(*at).map(ends)
            };
            run.iter().flat_map(step).flatten().collect()
        };
        runs.map(steps).collect()
    }
}
