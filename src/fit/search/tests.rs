//! Searches of the standard test functions, whose minima are 0.

use super::*;
use std::convert::Infallible;
use std::f64::consts::{E, TAU};

type Function = fn(&[f64]) -> f64;

fn sphere(x: &[f64]) -> f64 {
    x.iter().map(|x| x * x).sum()
}

fn rosenbrock(x: &[f64]) -> f64 {
    let pairs = x.iter().zip(&x[1..]);
    pairs.map(|(a, b)| 100.0 * (b - a * a) * (b - a * a) + (1.0 - a) * (1.0 - a)).sum()
}

fn griewank(x: &[f64]) -> f64 {
    let product: f64 = (1..).zip(x).map(|(i, x)| libm::cos(x / f64::from(i).sqrt())).product();
    sphere(x) / 4000.0 - product + 1.0
}

fn rastrigin(x: &[f64]) -> f64 {
    x.iter().map(|x| x * x - 10.0 * libm::cos(TAU * x) + 10.0).sum()
}

fn ackley(x: &[f64]) -> f64 {
    let n = x.len() as f64;
    let cosines: f64 = x.iter().map(|x| libm::cos(TAU * x)).sum();
    20.0 + E - 20.0 * libm::exp(-0.2 * (sphere(x) / n).sqrt()) - libm::exp(cosines / n)
}

/// The functions at known points, worked out from their published forms (1e-6: the digits given).
#[test]
fn test_functions_are_the_published_ones() {
    let one_to_ten: Vec<f64> = (1..=10).map(f64::from).collect();
    let (ones, zeros) = (vec![1.0; 10], vec![0.0; 10]);
    let cases: [(Function, &[f64], f64); 6] = [
        (sphere, &one_to_ten, 385.0),
        (rosenbrock, &[-1.2, 1.0], 24.2),
        (rosenbrock, &zeros, 9.0),
        (griewank, &ones, 0.806759),
        (rastrigin, &ones, 10.0),
        (ackley, &ones, 3.625385),
    ];
    for (function, point, expected) in cases {
        assert!((function(point) - expected).abs() < 1e-6, "{} and {expected}", function(point));
    }
}

/// Median over 30 searchers of the lowest value found in 10 dimensions, each from -`reach` to `reach`.
fn median_found(function: Function, reach: f64, evaluations: usize) -> f64 {
    let plan = Search { seed: 11, starts: vec![None; 30], dimensions: 10, evaluations };
    let found = search(&plan, |asked| {
        let value = |asked: &Asked| {
            let point: Vec<f64> = asked.point.iter().map(|share| (2.0 * share - 1.0) * reach).collect();
            -function(&point)
        };
        Ok::<_, Infallible>(asked.iter().map(value).collect())
    });
    let mut lowest: Vec<f64> = found.unwrap_or_default().iter().map(|found| -found.value).collect();
    lowest.sort_by(f64::total_cmp);
    f64::midpoint(lowest[14], lowest[15])
}

/// Medians of 30 searches by an implementation of ours in another language, of the published method (Tolson & Shoemaker
/// 2007) and with random numbers of its own: within a factor of 2. Bounds are the customary ones.
#[test]
fn searches_find_what_the_method_finds() {
    let cases: [(&str, Function, f64, [f64; 2]); 4] = [
        ("sphere", sphere, 5.12, [0.087, 0.0049]),
        ("Rosenbrock", rosenbrock, 2.048, [9.5, 7.5]),
        ("Griewank", griewank, 600.0, [1.30, 0.98]),
        ("Ackley", ackley, 32.768, [4.23, 1.32]),
    ];
    for (name, function, reach, medians) in cases {
        for (evaluations, expected) in [500, 2000].into_iter().zip(medians) {
            let found = median_found(function, reach, evaluations);
            assert!(
                (expected / 2.0..expected * 2.0).contains(&found),
                "{name}, {evaluations} evaluations: {found} and {expected}"
            );
        }
    }
}

/// Expected number of parameters changed in a step of 1000 in 10 dimensions: `10 * (1 - ln(i)/ln(1000))`, by hand, and one
/// where none would be: in step 500 each changes with a chance of 0.10034, so that none would with 0.3473. Counted over 4000
/// draws, whose standard error is at most 0.025: 0.1 is four of them.
#[test]
fn fewer_parameters_change_as_it_goes_on() {
    let mut random = search_stream(3, 0);
    let start = vec![0.5; 10];
    for (step, expected) in [(1, 10.0), (10, 6.667), (100, 3.333), (500, 1.0034 + 0.3473)] {
        let chance = chance_of_change(step, 1000);
        let mut changes = 0;
        for _ in 0..4000 {
            changes += changed(&start, chance, &mut random).iter().filter(|value| **value != 0.5).count();
        }
        let mean = changes as f64 / 4000.0;
        assert!((mean - expected).abs() < 0.1, "step {step}: {mean} and {expected}");
    }
}

/// By the method: -0.2 turns back to 0.2, 1.3 to 0.7; what then passes the other bound stays at the first.
#[test]
fn bounds_turn_back() {
    for (value, expected) in [(-0.2, 0.2), (1.3, 0.7), (-1.5, 0.0), (2.5, 1.0), (0.4, 0.4)] {
        assert!((turned_back(value) - expected).abs() < 1e-12, "{value}");
    }
}
