use super::{LagOne, Matrix, product, transposed};
use rand::rngs::ChaCha8Rng;
use rand::{RngExt, SeedableRng};
use rand_distr::{Distribution, StandardNormal};

/// WG-06: Richardson's (1981, 1982) matrices for maximum and minimum temperature and radiation, from covariances by Matalas
/// (1967). All of it is quoted from memory; all but the last row of A agree with the print as recalled to 0.001. The
/// inputs are rounded to three digits, hence 0.003.
#[test]
fn richardsons_matrices() {
    let m0 = [[1.0, 0.633, 0.186], [0.633, 1.0, -0.193], [0.186, -0.193, 1.0]];
    let m1 = [[0.621, 0.445, 0.087], [0.563, 0.674, -0.100], [0.015, -0.091, 0.251]];
    let found = LagOne::of(&m0, &m0, &m1);
    let a = [[0.567, 0.086, -0.002], [0.253, 0.504, -0.050], [-0.004, -0.041, 0.244]];
    let b = [[0.781, 0.0, 0.0], [0.328, 0.637, 0.0], [0.238, -0.340, 0.874]];
    for (found, expected) in [(found.a, a), (found.b, b)] {
        for (found, expected) in found.iter().flatten().zip(expected.iter().flatten()) {
            assert!((found - expected).abs() < 0.003, "{found} for {expected}");
        }
    }
}

/// WG-07: AR(1) with 0.7 and variance 1 has an innovation of 0.714143 (1e-5, the digits given), and means over 30 days of
/// variance 0.171605, here from 100 000 stretches: four standard errors of `sqrt(2/n)`, 1.8 %.
#[test]
fn one_variable() {
    let found = LagOne::of(&[[1.0]], &[[1.0]], &[[0.7]]);
    assert!((found.a[0][0] - 0.7).abs() < 1e-12 && (found.b[0][0] - 0.714_143).abs() < 1e-5);
    let mut random = ChaCha8Rng::seed_from_u64(1);
    let mut value = [0.0];
    let means: Vec<f64> = (0..100_000)
        .map(|_| {
            let day = |_| {
                value = found.next(&value, &[StandardNormal.sample(&mut random)]);
                value[0]
            };
            (0..30).map(day).sum::<f64>() / 30.0
        })
        .collect();
    let variance = means.iter().map(|mean| mean * mean).sum::<f64>() / means.len() as f64;
    assert!((variance / 0.171_605 - 1.0).abs() < 0.018, "{variance}");
}

/// Covariances of random vectors: what `next` makes has them again (`A M0_before A' + B B' = M0`, `A M0_before = M1`, to
/// rounding), and `innovation` gives back what `next` was given.
#[test]
fn covariances_and_innovations_come_back() {
    let mut random = ChaCha8Rng::seed_from_u64(2);
    for _ in 0..200 {
        // Sixteen vectors of eight make a covariance of four now with four before that can be.
        let mut all = [[0.0; 8]; 8];
        for _ in 0..16 {
            let vector: [f64; 8] = std::array::from_fn(|_| 2.0 * random.random::<f64>() - 1.0);
            for row in 0..8 {
                for column in 0..8 {
                    all[row][column] += vector[row] * vector[column];
                }
            }
        }
        let corner = |row: usize, column: usize| -> Matrix<4> {
            std::array::from_fn(|at| std::array::from_fn(|of| all[row + at][column + of]))
        };
        let (m0, before, m1) = (corner(0, 0), corner(4, 4), corner(0, 4));
        let found = LagOne::of(&m0, &before, &m1);
        let with_before = product(&found.a, &before);
        let explained = product(&with_before, &transposed(&found.a));
        let new = product(&found.b, &transposed(&found.b));
        for row in 0..4 {
            for column in 0..4 {
                assert!((with_before[row][column] - m1[row][column]).abs() < 1e-8);
                assert!((explained[row][column] + new[row][column] - m0[row][column]).abs() < 1e-8);
            }
        }
        let vector =
            |random: &mut ChaCha8Rng| -> [f64; 4] { std::array::from_fn(|_| random.random::<f64>() - 0.5) };
        let (last, innovation) = (vector(&mut random), vector(&mut random));
        let back = found.innovation(&last, &found.next(&last, &innovation));
        for (back, given) in back.iter().zip(innovation) {
            assert!((back - given).abs() < 1e-7, "{back} for {given}");
        }
    }
}

/// Covariances that cannot be, as estimates from few years may be: everything stays finite, what is new has some share in
/// every variable that varies, and no variance grows without end.
#[test]
fn contradictory_covariances() {
    let one: Matrix<2> = [[1.0, 0.0], [0.0, 1.0]];
    let same: Matrix<2> = [[1.0, 1.0], [1.0, 1.0]];
    let beyond: Matrix<2> = [[1.0, 1.2], [1.2, 1.0]];
    let mut random = ChaCha8Rng::seed_from_u64(3);
    for m0 in [one, same, beyond] {
        for before in [one, same, beyond] {
            for m1 in [[[0.99; 2]; 2], [[-0.9, 0.9], [0.9, 0.9]], [[3.0, 0.0], [0.0, 3.0]], one] {
                let found = LagOne::of(&m0, &before, &m1);
                let mut value = [0.0; 2];
                let mut largest = 0.0_f64;
                for _ in 0..2000 {
                    let innovation = [0, 1].map(|_| StandardNormal.sample(&mut random));
                    value = found.next(&value, &innovation);
                    largest = value.iter().fold(largest, |largest, value| largest.max(value.abs()));
                }
                assert!(largest.is_finite() && largest > 0.1, "{m0:?} {before:?} {m1:?} give {found:?}");
                let bounded = largest < 1e3;
                assert!(bounded, "{m0:?} {before:?} {m1:?} grow to {largest}: {found:?}");
            }
        }
    }
}

/// A variable that never varies stays 0, and the other is as it would be alone.
#[test]
fn a_variable_without_variance() {
    let found = LagOne::of(&[[1.0, 0.0], [0.0, 0.0]], &[[1.0, 0.0], [0.0, 0.0]], &[[0.5, 0.0], [0.0, 0.0]]);
    assert_eq!(found.next(&[2.0, 0.0], &[0.0, 9.0]), [1.0, 0.0]);
    assert_eq!(found.innovation(&[2.0, 0.0], &[1.0, 7.0]), [0.0, 0.0]);
}
