//! Ranks: all that the tests see of values.

/// Values closer than this are the same but for rounding, degC or mm. Means and sums of the same days, added up over
/// 365 or 366 of them, must tie, and not be ordered by their last bits.
const SAME: f64 = 1e-9;

/// Ranks of a series, from 1, tied values sharing the mean of theirs.
pub(super) struct Ranks {
    /// In the order of the series.
    pub of: Vec<f64>,
    /// Sizes of the groups of tied values, groups of one left out.
    ties: Vec<f64>,
}

impl Ranks {
    pub fn new(values: &[f64]) -> Self {
        let mut order: Vec<usize> = (0..values.len()).collect();
        order.sort_by(|a, b| values[*a].total_cmp(&values[*b]));
        let mut ranks = Self { of: vec![0.0; values.len()], ties: Vec::new() };
        let mut below = 0;
        for group in order.chunk_by(|a, b| values[*b] - values[*a] <= SAME) {
            let shared = below as f64 + (group.len() as f64 + 1.0) / 2.0;
            for at in group {
                ranks.of[*at] = shared;
            }
            if group.len() > 1 {
                ranks.ties.push(group.len() as f64);
            }
            below += group.len();
        }
        ranks
    }

    pub fn n(&self) -> f64 {
        self.of.len() as f64
    }

    /// Whether all values are the same.
    pub fn are_constant(&self) -> bool {
        self.ties.first().is_some_and(|size| *size == self.n())
    }

    /// Pairs of tied values.
    pub fn tied_pairs(&self) -> f64 {
        self.ties.iter().map(|size| size * (size - 1.0) / 2.0).sum()
    }

    /// Variance of Kendall's score without a trend, `(n(n-1)(2n+5) - sum over ties of t(t-1)(2t+5))/18` (Kendall 1975).
    pub fn score_variance(&self) -> f64 {
        let term = |size: f64| size * (size - 1.0) * (2.0 * size + 5.0);
        let ties: f64 = self.ties.iter().map(|size| term(*size)).sum();
        (term(self.n()) - ties) / 18.0
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn tied_values_share_their_ranks_even_where_rounding_parts_them() {
        let ranks = Ranks::new(&[3.0, 0.1 + 0.2, 7.0, 0.3]);
        assert_eq!(ranks.of, [3.0, 1.5, 4.0, 1.5]);
        assert_eq!(ranks.tied_pairs(), 1.0);
        assert!(!ranks.are_constant());
        assert!(Ranks::new(&[0.1 + 0.2, 0.3]).are_constant());
    }
}
