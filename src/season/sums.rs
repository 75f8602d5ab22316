//! Sums of a day's flux over parts of the year: each table is read once, however many parts are asked for.

use super::rows;

/// A table of the year block, summed between the days on which a part begins or ends.
///
/// Nothing is subtracted: a part in which nothing flowed is 0 and not what rounding leaves.
pub(super) struct Sums {
    /// Days of the year counted from 0, ascending, each once; the first is 0, the last the number of days.
    cuts: Vec<usize>,
    /// `[piece][column]`.
    pieces: Vec<f64>,
    width: usize,
}

impl Sums {
    /// Sums the year's rows of a table between `edges`, days counted from 0 in any order.
    pub fn of(rows_of_year: &[f64], width: usize, edges: impl IntoIterator<Item = usize>) -> Self {
        let mut cuts: Vec<usize> = edges.into_iter().chain([0, rows_of_year.len() / width]).collect();
        cuts.sort_unstable();
        cuts.dedup();
        let mut pieces = vec![0.0; (cuts.len() - 1) * width];
        for (piece, ends) in pieces.chunks_exact_mut(width).zip(cuts.windows(2)) {
            rows::add(&rows_of_year[ends[0] * width..ends[1] * width], piece);
        }
        Self { cuts, pieces, width }
    }

    /// Adds the sum over the days `from..to` to `into`; both are edges, or the year's ends.
    pub fn add(&self, from: usize, to: usize, into: &mut [f64]) {
        for (piece, ends) in self.pieces.chunks_exact(self.width).zip(self.cuts.windows(2)) {
            if from <= ends[0] && ends[1] <= to {
                rows::add(piece, into);
            }
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    /// By hand: two columns over five days.
    #[test]
    fn parts_of_a_year() {
        let table = [1.0, 10.0, 2.0, 20.0, 3.0, 30.0, 4.0, 40.0, 5.0, 50.0];
        let sums = Sums::of(&table, 2, [3, 1, 3]);
        let part = |from, to| {
            let mut sum = [0.0; 2];
            sums.add(from, to, &mut sum);
            sum
        };
        assert_eq!(part(0, 5), [15.0, 150.0]);
        assert_eq!([part(0, 1), part(1, 3), part(3, 5)], [[1.0, 10.0], [5.0, 50.0], [9.0, 90.0]]);
        assert_eq!(part(0, 0), [0.0; 2], "no day");
    }
}
