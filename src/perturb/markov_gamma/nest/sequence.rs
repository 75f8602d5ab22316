//! The parts of years one after another: what they are like, and what they remember of each other.

use super::super::lag_one::Matrix;
use super::super::scores::{Normal, mean_product};

/// Precipitation roots and temperatures of the parts of years, one part after another.
pub(super) struct Sequence {
    pub normal: Vec<[Normal; 2]>,
    /// Correlation within each part.
    pub m0: Vec<Matrix<2>>,
    /// Correlation of each part with the one before it.
    pub m1: Vec<Matrix<2>>,
}

impl Sequence {
    /// Of values `[year][part]`; `follows` tells which years follow on the one before.
    pub fn of(values: &[Vec<[f64; 2]>], follows: &[bool]) -> Self {
        let count = values.first().map_or(0, Vec::len);
        let normal_of = |at: usize| -> [Normal; 2] {
            std::array::from_fn(|variable| {
                Normal::of(&values.iter().map(|year| year[at][variable]).collect::<Vec<_>>())
            })
        };
        let normal: Vec<[Normal; 2]> = (0..count).map(normal_of).collect();
        let scored = |year: &Vec<[f64; 2]>| -> Vec<[f64; 2]> {
            let of_part = |(at, values): (usize, &[f64; 2])| {
                std::array::from_fn(|variable| normal[at][variable].score(values[variable]))
            };
            year.iter().enumerate().map(of_part).collect()
        };
        let scores: Vec<Vec<[f64; 2]>> = values.iter().map(scored).collect();
        let matrix = |pairs: &[([f64; 2], [f64; 2])]| -> Matrix<2> {
            std::array::from_fn(|row| {
                std::array::from_fn(|column| mean_product(pairs.iter().map(|(a, b)| (a[row], b[column]))))
            })
        };
        let m0 = |at: usize| matrix(&scores.iter().map(|year| (year[at], year[at])).collect::<Vec<_>>());
        let m1 = |at: usize| {
            let pairs: Vec<([f64; 2], [f64; 2])> = if at > 0 {
                scores.iter().map(|year| (year[at], year[at - 1])).collect()
            } else {
                let linked = scores.windows(2).zip(&follows[1..]).filter(|(_, follows)| **follows);
                linked.map(|(years, _)| (years[1][0], years[0][count - 1])).collect()
            };
            matrix(&pairs)
        };
        Self { m0: (0..count).map(m0).collect(), m1: (0..count).map(m1).collect(), normal }
    }

    /// The correlations of a short record, those with the part before steadied: the same all year.
    pub fn steadied(self) -> Self {
        let count = self.m0.len();
        let m1 = mean_of(self.m1.iter().map(|m1| (m1, 1.0 / count as f64)));
        Self { m1: vec![m1; count], ..self }
    }
}

fn mean_of<'m>(weighted: impl Iterator<Item = (&'m Matrix<2>, f64)>) -> Matrix<2> {
    let mut mean = [[0.0; 2]; 2];
    for (matrix, weight) in weighted {
        for (mean, value) in mean.iter_mut().flatten().zip(matrix.iter().flatten()) {
            *mean += weight * value;
        }
    }
    mean
}
