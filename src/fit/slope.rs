//! A straight line through pairs by least squares, and how well its slope is known.

use serde::Serialize;

/// Slope of a line and its standard error.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Slope {
    /// Pairs.
    pub pairs: usize,
    /// Change of y by 1 of x.
    pub slope: f64,
    /// Standard error of the slope: `sqrt(sum(residual^2) / (n - 2) / sum((x - mean x)^2))`, pairs taken as independent.
    pub standard_error: f64,
}

impl Slope {
    /// Of pairs `(x, y)`; none of fewer than three, or where all x are the same.
    pub fn of(pairs: &[(f64, f64)]) -> Option<Self> {
        let n = pairs.len() as f64;
        let (mean_x, mean_y) =
            (pairs.iter().map(|(x, _)| x).sum::<f64>() / n, pairs.iter().map(|(_, y)| y).sum::<f64>() / n);
        let squares: f64 = pairs.iter().map(|(x, _)| (x - mean_x) * (x - mean_x)).sum();
        if pairs.len() < 3 || squares <= 0.0 {
            return None;
        }
        let slope = pairs.iter().map(|(x, y)| (x - mean_x) * (y - mean_y)).sum::<f64>() / squares;
        let residual = |(x, y): &(f64, f64)| y - mean_y - slope * (x - mean_x);
        let residuals: f64 = pairs.iter().map(|pair| residual(pair) * residual(pair)).sum();
        let standard_error = (residuals / (n - 2.0) / squares).sqrt();
        Some(Self { pairs: pairs.len(), slope, standard_error })
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    /// By hand: x 0..3, y 0, 1, 1, 3: slope 4.5/5 = 0.9; residuals 0.1, 0.2, -0.7, 0.4, their squares 0.70; standard error
    /// sqrt(0.70/2/5) = 0.264575. Rounding only.
    #[test]
    fn a_line_through_four_points() {
        let slope = Slope::of(&[(0.0, 0.0), (1.0, 1.0), (2.0, 1.0), (3.0, 3.0)]);
        let slope = slope.expect("four points have a slope");
        assert!((slope.slope - 0.9).abs() < 1e-12);
        assert!((slope.standard_error - 0.07_f64.sqrt()).abs() < 1e-12);
    }

    #[test]
    fn too_few_points_have_no_slope() {
        assert_eq!(Slope::of(&[(0.0, 0.0), (1.0, 1.0)]), None);
        assert_eq!(Slope::of(&[(1.0, 0.0), (1.0, 1.0), (1.0, 2.0)]), None);
    }
}
