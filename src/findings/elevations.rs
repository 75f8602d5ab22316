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

/// The 5-95 % range of a line; none where an end lies outside the bands.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct LineRange {
    /// 5 % quantile, m.
    pub q05_m: Option<f64>,
    /// 95 % quantile, m.
    pub q95_m: Option<f64>,
}

impl LineRange {
    pub(super) fn of(lines: impl Iterator<Item = Line>) -> Self {
        let lines = sorted(lines.map(|line| match line {
            Line::At { elevation_m } => elevation_m,
            Line::BelowLowestBand => f64::NEG_INFINITY,
            Line::AboveHighestBand => f64::INFINITY,
        }));
        let end = |p| Some(quantile(&lines, p)).filter(|elevation_m| elevation_m.is_finite());
        Self { q05_m: end(0.05), q95_m: end(0.95) }
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
}
