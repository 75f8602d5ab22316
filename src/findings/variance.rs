//! Partition of variance between level and realization, for two levels at a time or any table.

use serde::Serialize;

/// Two-way analysis of variance without replication: levels by shared realizations.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct TwoWay {
    /// Sum of squares of the levels.
    pub level: f64,
    /// Sum of squares of the realizations.
    pub realization: f64,
    /// What is left: how differently realizations take the warming.
    pub residual: f64,
    /// Ratio of the levels' mean square to the residual's.
    pub f_ratio: f64,
}

/// Shares of the total sum of squares; they add up to 1.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct VarianceShares {
    /// Of the warming level.
    pub level: f64,
    /// Of the realization.
    pub realization: f64,
    /// Of level and realization together.
    pub residual: f64,
}

impl TwoWay {
    /// Takes the sums of squares of a table, one row a level, the same realizations in the same order in each. Nothing
    /// for fewer than two rows or columns, rows of different lengths, or values that are no numbers.
    ///
    /// ```
    /// use thawline::findings::TwoWay;
    /// let table = TwoWay::of(&[&[400.0, 300.0, 520.0, 380.0], &[350.0, 240.0, 470.0, 340.0],
    ///     &[280.0, 190.0, 400.0, 290.0]]).unwrap();
    /// assert!((table.f_ratio - 182.0).abs() < 1e-9);
    /// ```
    pub fn of(table: &[&[f64]]) -> Option<Self> {
        let (rows, columns) = (table.len(), table.first()?.len());
        let is_whole =
            table.iter().all(|row| row.len() == columns && row.iter().all(|value| value.is_finite()));
        if rows < 2 || columns < 2 || !is_whole {
            return None;
        }
        let (r, c) = (rows as f64, columns as f64);
        let row_means: Vec<f64> = table.iter().map(|row| row.iter().sum::<f64>() / c).collect();
        let column_means: Vec<f64> =
            (0..columns).map(|column| table.iter().map(|row| row[column]).sum::<f64>() / r).collect();
        let mean = row_means.iter().sum::<f64>() / r;
        let squares =
            |values: &[f64]| values.iter().map(|value| (value - mean) * (value - mean)).sum::<f64>();
        let level = c * squares(&row_means);
        let realization = r * squares(&column_means);
        let mut residual = 0.0;
        for (row, row_mean) in table.iter().zip(&row_means) {
            for (value, column_mean) in row.iter().zip(&column_means) {
                let left = value - row_mean - column_mean + mean;
                residual += left * left;
            }
        }
        let f_ratio = (level / (r - 1.0)) / (residual / ((r - 1.0) * (c - 1.0)));
        Some(Self { level, realization, residual, f_ratio })
    }

    /// Shares of the total; nothing where nothing varies.
    pub fn shares(&self) -> Option<VarianceShares> {
        let total = self.level + self.realization + self.residual;
        (total > 0.0).then(|| VarianceShares {
            level: self.level / total,
            realization: self.realization / total,
            residual: self.residual / total,
        })
    }
}
