//! Scores from sums against the published ones.

use super::*;

fn sums(observed: &[f64], modelled: &[f64]) -> Sums {
    let mut sums = Sums::default();
    for (o, m) in observed.iter().zip(modelled) {
        sums += Sums {
            readings: 1.0,
            with_snow: if *o > 0.0 || *m > 0.0 { 1.0 } else { 0.0 },
            observed: *o,
            modelled: *m,
            observed_squares: o * o,
            modelled_squares: m * m,
            products: o * m,
            ..Sums::default()
        };
    }
    sums
}

/// From the formulas of Nash & Sutcliffe 1970 and Gupta et al. 2009 by hand, to the digits given (1e-6).
#[test]
fn scores_of_five_pairs() {
    let observed = [1.0, 2.0, 3.0, 4.0, 5.0];
    let cases: [([f64; 5], f64, f64); 3] = [
        ([1.1, 1.9, 3.2, 3.8, 5.3], 0.981, 0.956494),
        (observed.map(|value| 1.1 * value), 0.945, 0.858579),
        (observed.map(|value| value + 1.0), 0.5, 0.666667),
    ];
    for (modelled, nash_sutcliffe, kling_gupta) in cases {
        let sums = sums(&observed, &modelled);
        assert!((sums.nash_sutcliffe().unwrap_or(f64::NAN) - nash_sutcliffe).abs() < 1e-6);
        assert!((sums.kling_gupta().unwrap_or(f64::NAN) - kling_gupta).abs() < 1e-6);
    }
}

/// Days without snow in either count for the first score alone, as where a comparison takes its pairs: 0, 0 is added.
#[test]
fn bare_days_count_once() {
    let with = sums(&[0.0, 1.0, 2.0, 3.0], &[0.0, 1.5, 2.0, 2.0]);
    let without = sums(&[1.0, 2.0, 3.0], &[1.5, 2.0, 2.0]);
    assert_eq!(with.kling_gupta(), without.kling_gupta());
    assert_ne!(with.nash_sutcliffe(), without.nash_sutcliffe());
}

#[test]
fn what_cannot_be_scored_has_no_score() {
    assert_eq!(sums(&[], &[]).nash_sutcliffe(), None);
    assert_eq!(sums(&[2.0, 2.0], &[1.0, 2.0]).kling_gupta(), None);
    assert_eq!((Sums::default().peak_error(), Sums::default().melt_out_error_days()), (None, None));
}
