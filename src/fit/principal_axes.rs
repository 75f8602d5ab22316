//! The principal axes of a symmetric matrix.

/// Turns through the matrix at most; a handful is enough.
const MOST_SWEEPS: usize = 30;

/// Eigenvalues and eigenvectors of a symmetric matrix, `axes[i]` that of `values[i]`, by Jacobi's rotations in a fixed order
/// (Golub & Van Loan, section 8.5, from memory): to rounding of the largest eigenvalue.
pub(super) struct PrincipalAxes {
    pub values: Vec<f64>,
    pub axes: Vec<Vec<f64>>,
}

impl PrincipalAxes {
    /// Of a matrix, row by row; what lies below its diagonal is taken as what lies above it.
    pub fn of(matrix: &[Vec<f64>]) -> Self {
        let n = matrix.len();
        let at = |i: usize, j: usize| matrix[i.min(j)][i.max(j)];
        let mut a: Vec<Vec<f64>> = (0..n).map(|i| (0..n).map(|j| at(i, j)).collect()).collect();
        let mut axes: Vec<Vec<f64>> =
            (0..n).map(|i| (0..n).map(|j| if i == j { 1.0 } else { 0.0 }).collect()).collect();
        for _ in 0..MOST_SWEEPS {
            let mut is_turned = false;
            for p in 0..n {
                for q in p + 1..n {
                    if a[p][q].abs() <= 1e-16 * (a[p][p].abs() + a[q][q].abs()) {
                        continue;
                    }
                    is_turned = true;
                    let half = (a[q][q] - a[p][p]) / (2.0 * a[p][q]);
                    let tangent = half.signum() / (half.abs() + (half * half + 1.0).sqrt());
                    let cosine = 1.0 / (tangent * tangent + 1.0).sqrt();
                    let sine = tangent * cosine;
                    for row in &mut a {
                        (row[p], row[q]) = (cosine * row[p] - sine * row[q], sine * row[p] + cosine * row[q]);
                    }
                    turn(&mut a, [p, q], [cosine, sine]);
                    turn(&mut axes, [p, q], [cosine, sine]);
                }
            }
            if !is_turned {
                break;
            }
        }
        Self { values: (0..n).map(|i| a[i][i]).collect(), axes }
    }
}

/// Turns two rows into each other.
fn turn(rows: &mut [Vec<f64>], [p, q]: [usize; 2], [cosine, sine]: [f64; 2]) {
    for column in 0..rows[p].len() {
        let (of_p, of_q) = (rows[p][column], rows[q][column]);
        rows[p][column] = cosine * of_p - sine * of_q;
        rows[q][column] = sine * of_p + cosine * of_q;
    }
}

#[cfg(test)]
mod tests {
    use super::PrincipalAxes;

    /// By hand: the second differences of three points have the eigenvalues 2 - sqrt(2), 2 and 2 + sqrt(2); rounding only.
    /// Identity: the matrix times an axis is the axis times its value.
    #[test]
    fn axes_are_those_of_the_matrix() {
        let matrix = [[2.0, -1.0, 0.0], [-1.0, 2.0, -1.0], [0.0, -1.0, 2.0]];
        let found = PrincipalAxes::of(&matrix.map(|row| row.to_vec()));
        for (value, axis) in found.values.iter().zip(&found.axes) {
            for (row, of_axis) in matrix.iter().zip(axis) {
                let times: f64 = row.iter().zip(axis).map(|(a, b)| a * b).sum();
                assert!((times - value * of_axis).abs() < 1e-12);
            }
        }
        let mut values = found.values;
        values.sort_by(f64::total_cmp);
        let root = 2.0_f64.sqrt();
        for (value, expected) in values.iter().zip([2.0 - root, 2.0, 2.0 + root]) {
            assert!((value - expected).abs() < 1e-12, "{value} and {expected}");
        }
    }
}
