//! Columns of levels and what is written below each.

use super::super::labels::{level, signed, signed_percent, size, times};
use super::super::sheet::{Drawn, HPos, Sheet, VPos};
use super::super::theme::{LABEL, Lettering, NAME, NOTE};
use crate::findings::{Findings, LevelFindings, MeasureFindings};
use crate::units::UnitSystem;

/// Where the levels stand: as far apart as they are, or evenly where that would be too tight.
pub(super) struct Columns {
    centres: Vec<f64>,
    width: f64,
}

/// Lines below a column; an empty one keeps the lines of all columns level.
pub(super) struct Labels {
    columns: Vec<Vec<(String, Lettering)>>,
    /// Words at the right of a line, where columns hold bare numbers.
    beside: Vec<(usize, String)>,
}

/// From a point to the first of its dots, px.
pub(super) const BESIDE_POINT_PX: f64 = 11.0;
/// Share of an even column that the tightest must have for levels to stand in proportion.
const LEAST_SHARE: f64 = 0.8;

/// Whether these levels stand as far apart as they are.
pub(super) fn is_to_scale(levels_c: &[f64]) -> bool {
    let (Some(first), Some(last)) = (levels_c.first(), levels_c.last()) else {
        return false;
    };
    let share = tightest(levels_c) / (last - first + tightest(levels_c));
    share * levels_c.len() as f64 >= LEAST_SHARE
}

fn tightest(levels_c: &[f64]) -> f64 {
    levels_c.windows(2).map(|pair| pair[1] - pair[0]).fold(f64::INFINITY, f64::min)
}

impl Columns {
    /// Places ascending levels between two edges.
    pub fn new(levels_c: &[f64], left: f64, right: f64) -> Self {
        let count = levels_c.len().max(1) as f64;
        let even = (right - left) / count;
        let evenly = || (0..levels_c.len()).map(|at| left + even * (at as f64 + 0.5)).collect();
        let (true, Some(first), Some(last)) = (is_to_scale(levels_c), levels_c.first(), levels_c.last())
        else {
            return Self { centres: evenly(), width: even };
        };
        // The outer columns need half a tightest column beside them.
        let tightest = tightest(levels_c);
        let width = (right - left) * tightest / (last - first + tightest);
        let per_degree = width / tightest;
        Self {
            centres: levels_c.iter().map(|at| left + width / 2.0 + (at - first) * per_degree).collect(),
            width,
        }
    }

    /// Middle of a column.
    pub fn centre(&self, at: usize) -> f64 {
        self.centres.get(at).copied().unwrap_or(0.0)
    }

    /// Room for dots beside a point, the two of them in the middle of a column.
    pub fn room(&self) -> f64 {
        (self.width - BESIDE_POINT_PX - 14.0).max(0.0)
    }

    /// What is written below the columns: in words where they fit, else as bare numbers with the words at the right.
    pub fn labels(&self, findings: &Findings, measure: &MeasureFindings, units: UnitSystem) -> Labels {
        let in_words = Labels::new(findings, measure, units, true);
        if in_words.width() + 8.0 <= self.width {
            in_words
        } else {
            Labels::new(findings, measure, units, false)
        }
    }
}

impl Labels {
    fn new(findings: &Findings, measure: &MeasureFindings, units: UnitSystem, in_words: bool) -> Self {
        let unit = units.depth().word;
        let has_percent = measure.levels.iter().any(|level| level.percent_change.is_some());
        let has_ratio = measure.levels.iter().any(|level| level.signal_to_spread.is_some());
        let with_unit = |number: String| if in_words { format!("{number} {unit}") } else { number };
        let the_spread = if in_words { " half spread" } else { "" };
        let of_reference = |found: &LevelFindings| {
            let value = match found.periods.q50.value() {
                Some(median) => vec![(with_unit(size(units, median)), LABEL), ("median".to_owned(), NOTE)],
                None => vec![("no value".to_owned(), NOTE)],
            };
            let place = (found.level_c != 0.0).then(|| (format!("at {}", level(units, found.level_c)), NOTE));
            let name = ("reference".to_owned(), NAME);
            std::iter::once(name).chain(value).chain(place).collect()
        };
        let of_level = |found: &LevelFindings| {
            let mut lines = vec![(level(units, found.level_c), NAME)];
            let Some(shift) = found.shift else {
                lines.push(("no value".to_owned(), NOTE));
                return lines;
            };
            lines.push((with_unit(signed(units, shift.median.value)), LABEL));
            if has_percent {
                lines.push((found.percent_change.map_or_else(String::new, signed_percent), LABEL));
            }
            match found.signal_to_spread {
                Some(ratio) => lines.push((format!("{}{the_spread}", times(ratio.value)), LABEL)),
                None if has_ratio => lines.push(("no ratio".to_owned(), NOTE)),
                None => {}
            }
            lines
        };
        let levels = measure.levels.iter().enumerate();
        let columns = levels
            .map(|(at, found)| if at == findings.reference { of_reference(found) } else { of_level(found) });
        let mut beside = Vec::new();
        if !in_words {
            beside.push((1, format!("{unit}, median change")));
            if has_ratio {
                beside.push((if has_percent { 3 } else { 2 }, "half spread".to_owned()));
            }
        }
        Self { columns: columns.collect(), beside }
    }

    fn width(&self) -> f64 {
        let lines = self.columns.iter().flatten();
        lines.map(|(text, lettering)| lettering.width(text)).fold(0.0, f64::max)
    }

    /// Height of the tallest column of lines, px.
    pub fn height(&self) -> f64 {
        let most = self.columns.iter().map(Vec::len).max().unwrap_or(0);
        most as f64 * LABEL.leading()
    }

    /// Writes the lines, centred below their columns.
    pub fn write(&self, sheet: &Sheet, columns: &Columns, top_px: f64) -> Drawn {
        let right_edge = columns.centres.last().map_or(0.0, |centre| centre + columns.width / 2.0);
        for (line, text) in &self.beside {
            let place = (right_edge + 17.0, top_px + LABEL.leading() * (*line as f64 + 0.5));
            sheet.write(text, place, NOTE, HPos::Left, VPos::Center)?;
        }
        // Where not even bare numbers fit side by side, only every so many columns are written below.
        let step = libm::ceil((self.width() + 8.0) / columns.width).max(1.0) as usize;
        for (at, lines) in self.columns.iter().enumerate().step_by(step) {
            for (line, (text, lettering)) in lines.iter().enumerate() {
                if !text.is_empty() {
                    let place = (columns.centre(at), top_px + LABEL.leading() * (line as f64 + 0.5));
                    sheet.write(text, place, *lettering, HPos::Center, VPos::Center)?;
                }
            }
        }
        Ok(())
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn levels_stand_in_proportion_unless_too_tight() {
        let even = Columns::new(&[0.0, 1.0, 2.0, 3.0], 0.0, 400.0);
        assert_eq!(even.centres, [50.0, 150.0, 250.0, 350.0]);
        let tight = Columns::new(&[0.0, 0.1, 4.0], 0.0, 300.0);
        assert_eq!(tight.centres, [50.0, 150.0, 250.0]);
        let proportional = Columns::new(&[0.0, 1.0, 2.2], 0.0, 320.0);
        assert_eq!(proportional.centres, [50.0, 150.0, 270.0]);
        assert_eq!(Columns::new(&[0.0], 0.0, 100.0).centres, [50.0]);
    }
}
