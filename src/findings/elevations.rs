//! Bands by elevation: those of one elevation taken together, and lines between them.

use super::quantile::{quantile, sorted};
use crate::basin::Band;
use serde::Serialize;

/// Bands run at one elevation.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Row {
    pub elevation_m: f64,
    /// Bands, and each one's share of their area.
    pub parts: Vec<(usize, f64)>,
}

impl Row {
    /// The bands' elevations, from the lowest.
    pub fn all(bands: &[Band]) -> Vec<Self> {
        let mut order: Vec<usize> = (0..bands.len()).collect();
        order.sort_by(|a, b| bands[*a].elevation_m.total_cmp(&bands[*b].elevation_m));
        let mut rows: Vec<Self> = Vec::new();
        for band in order {
            let elevation_m = bands[band].elevation_m;
            match rows.last_mut().filter(|row| row.elevation_m == elevation_m) {
                Some(row) => row.parts.push((band, bands[band].area_km2)),
                None => rows.push(Self { elevation_m, parts: vec![(band, bands[band].area_km2)] }),
            }
        }
        for row in &mut rows {
            let area_km2: f64 = row.parts.iter().map(|(_, area_km2)| area_km2).sum();
            row.parts.iter_mut().for_each(|(_, share)| *share /= area_km2);
        }
        rows
    }

    /// The area-weighted mean of its bands.
    pub fn mean(&self, of_band: impl Fn(usize) -> f64) -> f64 {
        self.parts.iter().map(|(band, share)| share * of_band(*band)).sum()
    }
}

/// Where a line lies.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
#[serde(rename_all = "snake_case", tag = "line")]
pub enum Line {
    /// At this elevation, linear between bands.
    At {
        /// The elevation, m.
        elevation_m: f64,
    },
    /// At the lowest band or below it.
    BelowLowestBand,
    /// Above the highest band.
    AboveHighestBand,
}

impl Line {
    /// The lowest elevation at which values reach a threshold, scanning `(elevation, value)` up from the lowest; of no values, above
    /// all.
    pub(super) fn reaching(threshold: f64, upwards: impl IntoIterator<Item = (f64, f64)>) -> Self {
        let mut below: Option<(f64, f64)> = None;
        for (elevation_m, value) in upwards {
            if value >= threshold {
                return below.map_or(Self::BelowLowestBand, |(from_m, from)| {
                    let share = (threshold - from) / (value - from);
                    Self::At { elevation_m: from_m + share * (elevation_m - from_m) }
                });
            }
            below = Some((elevation_m, value));
        }
        Self::AboveHighestBand
    }

    /// The elevation, if it has one among the bands.
    pub fn elevation_m(self) -> Option<f64> {
        match self {
            Self::At { elevation_m } => Some(elevation_m),
            Self::BelowLowestBand | Self::AboveHighestBand => None,
        }
    }
}

/// The 5-95 % range of a line.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct LineRange {
    /// 5 % quantile, m; none where it lies outside the bands.
    pub q05_m: Option<f64>,
    /// 95 % quantile, m; none where it lies outside the bands.
    pub q95_m: Option<f64>,
    /// Whether the 5 % quantile lies at the lowest band or below it.
    pub reaches_below_lowest_band: bool,
    /// Whether the 95 % quantile lies above the highest band.
    pub reaches_above_highest_band: bool,
}

impl LineRange {
    /// Nothing of no lines.
    pub(super) fn of(lines: impl IntoIterator<Item = Line>) -> Option<Self> {
        let lines = sorted(lines.into_iter().map(|line| match line {
            Line::At { elevation_m } => elevation_m,
            Line::BelowLowestBand => f64::NEG_INFINITY,
            Line::AboveHighestBand => f64::INFINITY,
        }));
        if lines.is_empty() {
            return None;
        }
        let [low_m, high_m] = [0.05, 0.95].map(|share| quantile(&lines, share));
        Some(Self {
            q05_m: Some(low_m).filter(|end_m| end_m.is_finite()),
            q95_m: Some(high_m).filter(|end_m| end_m.is_finite()),
            reaches_below_lowest_band: low_m == f64::NEG_INFINITY,
            reaches_above_highest_band: high_m == f64::INFINITY,
        })
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    /// By hand: 100 lies a quarter of the way from 80 at 1000 m to 160 at 1400 m.
    #[test]
    fn lines_between_bands() {
        let of = |values: &[(f64, f64)]| Line::reaching(100.0, values.iter().copied());
        assert_eq!(of(&[(1000.0, 80.0), (1400.0, 160.0), (1800.0, 90.0)]), Line::At { elevation_m: 1100.0 });
        assert_eq!(of(&[(1000.0, 100.0), (1400.0, 160.0)]), Line::BelowLowestBand);
        assert_eq!(of(&[(1000.0, 10.0), (1400.0, 99.0)]), Line::AboveHighestBand);
        assert_eq!(of(&[]), Line::AboveHighestBand);
    }

    /// By hand: of ten lines type 8 holds both quantiles at the ends (positions 0.85 and 10.15).
    #[test]
    fn ranges_say_on_which_side_they_leave_the_bands() {
        let inside: Vec<Line> = (0..9).map(|at| Line::At { elevation_m: 1000.0 + f64::from(at) }).collect();
        let with = |line| LineRange::of(inside.iter().copied().chain([line])).expect("ten lines");
        let low = with(Line::BelowLowestBand);
        assert_eq!((low.q05_m, low.q95_m), (None, Some(1008.0)));
        assert_eq!((low.reaches_below_lowest_band, low.reaches_above_highest_band), (true, false));
        let high = with(Line::AboveHighestBand);
        assert_eq!((high.q05_m, high.q95_m), (Some(1000.0), None));
        assert_eq!((high.reaches_below_lowest_band, high.reaches_above_highest_band), (false, true));
        assert_eq!(LineRange::of([]), None);
    }
}
