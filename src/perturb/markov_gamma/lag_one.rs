//! Vectors that remember the one before: the matrices of Matalas (1967).
#![allow(clippy::needless_range_loop, reason = "matrices are written by their indices, as in print")]

/// A square matrix.
pub type Matrix<const N: usize> = [[f64; N]; N];

/// `z = A z_before + B e`, e standard normal and independent: z has the covariance M0 and the covariance M1 with the vector
/// before it.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct LagOne<const N: usize> {
    /// `A = M1 M0_before^-1`.
    pub a: Matrix<N>,
    /// Lower triangular, `B B' = M0 - A M1'`.
    pub b: Matrix<N>,
}

/// Steps in which a covariance over time is made smaller until it can be.
const SMALLER: f64 = 0.9;
const MOST_STEPS: usize = 60;
/// A variance left below this part of the whole is none.
const LEAST_PART: f64 = 1e-9;

impl<const N: usize> LagOne<N> {
    /// Nothing remembered and nothing new.
    pub const NONE: Self = Self { a: [[0.0; N]; N], b: [[0.0; N]; N] };

    /// From the covariances of a vector, of the one before it, and between both (`m1[i][j]` of `z[i]` with `before[j]`).
    ///
    /// Variables without variance stay 0. Where the covariances contradict each other, as estimates from few years may, M1
    /// is made smaller step by step until they do not.
    pub fn of(m0: &Matrix<N>, before: &Matrix<N>, m1: &Matrix<N>) -> Self {
        let inverse = inverse(before);
        let mut factor = 1.0;
        for _ in 0..MOST_STEPS {
            let m1 = m1.map(|row| row.map(|value| factor * value));
            let a = product(&m1, &inverse);
            let explained = product(&a, &transposed(&m1));
            let mut rest = *m0;
            for (rest, explained) in rest.iter_mut().flatten().zip(explained.iter().flatten()) {
                *rest -= explained;
            }
            if let Some(b) = lower_root(&rest, m0) {
                return Self { a, b };
            }
            factor *= SMALLER;
        }
        let b = lower_root(&diagonal(m0), m0).unwrap_or([[0.0; N]; N]);
        Self { a: [[0.0; N]; N], b }
    }

    /// The next vector.
    #[inline(always)]
    pub fn next(&self, before: &[f64; N], innovation: &[f64; N]) -> [f64; N] {
        let mut next = [0.0; N];
        for row in 0..N {
            let mut sum = 0.0;
            for column in 0..N {
                sum += self.a[row][column] * before[column];
            }
            for column in 0..=row {
                sum += self.b[row][column] * innovation[column];
            }
            next[row] = sum;
        }
        next
    }

    /// The innovation that led from one vector to the next; 0 for variables without variance of their own.
    pub fn innovation(&self, before: &[f64; N], next: &[f64; N]) -> [f64; N] {
        let mut innovation = [0.0; N];
        for row in 0..N {
            let mut rest = next[row];
            for column in 0..N {
                rest -= self.a[row][column] * before[column];
            }
            for column in 0..row {
                rest -= self.b[row][column] * innovation[column];
            }
            innovation[row] = if self.b[row][row] > 0.0 { rest / self.b[row][row] } else { 0.0 };
        }
        innovation
    }
}

fn product<const N: usize>(a: &Matrix<N>, b: &Matrix<N>) -> Matrix<N> {
    let mut product = [[0.0; N]; N];
    for row in 0..N {
        for column in 0..N {
            for (at, b) in b.iter().enumerate() {
                product[row][column] += a[row][at] * b[column];
            }
        }
    }
    product
}

fn transposed<const N: usize>(a: &Matrix<N>) -> Matrix<N> {
    let mut transposed = [[0.0; N]; N];
    for (row, values) in a.iter().enumerate() {
        for (column, value) in values.iter().enumerate() {
            transposed[column][row] = *value;
        }
    }
    transposed
}

fn diagonal<const N: usize>(a: &Matrix<N>) -> Matrix<N> {
    let mut diagonal = [[0.0; N]; N];
    for at in 0..N {
        diagonal[at][at] = a[at][at];
    }
    diagonal
}

/// The lower triangular matrix whose product with its transpose is `a` (Cholesky); none where `a` is not positive. A
/// variable that has no variance in `whole` gets none.
fn lower_root<const N: usize>(a: &Matrix<N>, whole: &Matrix<N>) -> Option<Matrix<N>> {
    let mut root = [[0.0; N]; N];
    for row in 0..N {
        for column in 0..=row {
            let mut rest = a[row][column];
            for at in 0..column {
                rest -= root[row][at] * root[column][at];
            }
            if row != column {
                root[row][column] =
                    if root[column][column] > 0.0 { rest / root[column][column] } else { 0.0 };
            } else if whole[row][row] <= 0.0 {
                root[row][row] = 0.0;
            } else if rest > LEAST_PART * whole[row][row] {
                root[row][row] = libm::sqrt(rest);
            } else {
                return None;
            }
        }
    }
    Some(root)
}

/// The inverse of a covariance matrix; variables without variance, or that others determine, are left out of it.
fn inverse<const N: usize>(a: &Matrix<N>) -> Matrix<N> {
    let Some(root) = lower_root(a, a).or_else(|| lower_root(&diagonal(a), a)) else {
        return [[0.0; N]; N];
    };
    let mut inverse = [[0.0; N]; N];
    for column in 0..N {
        if root[column][column] == 0.0 {
            continue;
        }
        let mut solved = [0.0; N];
        for row in 0..N {
            let mut rest = if row == column { 1.0 } else { 0.0 };
            for at in 0..row {
                rest -= root[row][at] * solved[at];
            }
            solved[row] = if root[row][row] > 0.0 { rest / root[row][row] } else { 0.0 };
        }
        for row in (0..N).rev() {
            let mut rest = solved[row];
            for at in row + 1..N {
                rest -= root[at][row] * inverse[at][column];
            }
            inverse[row][column] = if root[row][row] > 0.0 { rest / root[row][row] } else { 0.0 };
        }
    }
    inverse
}

#[cfg(test)]
mod tests;
