//! The straight line of least squares through a fit's winters, and how well it is known.

use super::Point;
use crate::fit::Slope;

/// A line and its standard error.
#[derive(Debug, Clone, Copy)]
pub(super) struct Line {
    pairs: f64,
    mean_c: f64,
    mean_mm: f64,
    /// Sum of the squares of the distances from the mean temperature.
    squares: f64,
    slope: Slope,
    /// Lowest and highest temperature of the points, degC.
    pub range_c: [f64; 2],
}

impl Line {
    /// The line through points whose slope this is.
    pub fn through(points: &[Point], slope: Slope) -> Self {
        let pairs = points.len() as f64;
        let mean = |of: fn(&Point) -> f64| points.iter().map(of).sum::<f64>() / pairs;
        let (mean_c, mean_mm) = (mean(|point| point.mean_c), mean(|point| point.error_mm));
        let squares = points.iter().map(|point| (point.mean_c - mean_c) * (point.mean_c - mean_c)).sum();
        let range_c = super::span(points.iter().map(|point| point.mean_c));
        Self { pairs, mean_c, mean_mm, squares, slope, range_c }
    }

    /// Error on the line, mm.
    pub fn at(&self, mean_c: f64) -> f64 {
        self.mean_mm + self.slope.slope * (mean_c - self.mean_c)
    }

    /// Standard error of the line at a temperature, mm: that of the slope times `sqrt(squares / n + (x - mean x)^2)`.
    pub fn standard_error(&self, mean_c: f64) -> f64 {
        let from_mean = mean_c - self.mean_c;
        self.slope.standard_error * (self.squares / self.pairs + from_mean * from_mean).sqrt()
    }

    /// The band's edges at both ends, mm.
    pub fn ends_mm(&self) -> [f64; 4] {
        let [from, to] = self.range_c.map(|mean_c| {
            let (line, error) = (self.at(mean_c), self.standard_error(mean_c));
            [line - error, line + error]
        });
        [from[0], from[1], to[0], to[1]]
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    /// By hand, with the slope of `fit/slope.rs`: x 0..3, y 0, 1, 1, 3 have the line -0.1 + 0.9 x; s^2 = 0.70/2, so its
    /// standard error at 3 is sqrt(0.35 * (1/4 + 2.25/5)) = sqrt(0.245), at the mean sqrt(0.35/4). Rounding only.
    #[test]
    fn a_line_and_its_error() {
        let point = |mean_c, error_mm| Point { water_year: 2001, mean_c, error_mm, is_seen: true };
        let points = [point(0.0, 0.0), point(1.0, 1.0), point(2.0, 1.0), point(3.0, 3.0)];
        let pairs: Vec<(f64, f64)> = points.iter().map(|point| (point.mean_c, point.error_mm)).collect();
        let line = Line::through(&points, Slope::of(&pairs).unwrap());
        assert!((line.at(0.0) + 0.1).abs() < 1e-12 && (line.at(3.0) - 2.6).abs() < 1e-12);
        assert!((line.standard_error(3.0) - 0.245_f64.sqrt()).abs() < 1e-12);
        assert!((line.standard_error(1.5) - 0.0875_f64.sqrt()).abs() < 1e-12);
        assert_eq!(line.range_c, [0.0, 3.0]);
    }
}
