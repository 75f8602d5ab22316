use super::super::mixed_exponential::MixedExponential;
use super::super::truncated_gamma::TruncatedGamma;
use super::Law;
use rand::SeedableRng;
use rand::rngs::ChaCha8Rng;

/// `k ln n - 2 ln L` with the log-likelihoods that scipy 1.17.1 reached (see the tests of both laws): ten amounts, gamma
/// 67.1672 (-31.2810) against mixed exponential 69.3434 (-31.2178), whose higher likelihood is not worth its third
/// parameter; thirty amounts above 0.25 mm, 181.8091 against 180.6053; 39 of two kinds of days, 239.5227 against 238.9201.
#[test]
fn the_lower_criterion() {
    let ten = [0.5, 1.2, 2.0, 3.1, 4.4, 6.0, 8.3, 11.5, 17.0, 30.0];
    assert!(matches!(Law::of(&ten, 0.0), Law::Gamma(_)));
    let thirty = [
        11.3, 3.5, 2.5, 18.8, 2.1, 6.5, 4.0, 6.5, 0.8, 3.3, 0.7, 11.3, 0.4, 2.6, 0.9, 11.0, 1.9, 2.2, 4.0,
        8.5, 6.7, 0.8, 5.5, 10.9, 2.1, 2.0, 5.0, 61.3, 11.5, 7.5,
    ];
    assert!(matches!(Law::of(&thirty, 0.25), Law::MixedExponential(_)));
    let two_kinds = [
        0.31, 4.11, 11.15, 1.39, 1.08, 1.48, 0.8, 1.58, 24.7, 0.31, 34.48, 19.25, 3.22, 0.81, 32.05, 6.65,
        13.72, 4.89, 26.33, 12.12, 0.75, 43.66, 1.32, 0.55, 10.66, 2.17, 15.32, 5.86, 0.88, 41.51, 0.32,
        0.38, 30.49, 1.22, 4.56, 12.66, 0.56, 1.82, 0.95,
    ];
    assert!(matches!(Law::of(&two_kinds, 0.25), Law::MixedExponential(_)));
}

/// A strong mixture speaks for itself (WG-09: Wilks 1999 found it clearly better than gamma at all his sites), and so does a
/// gamma that is no mixture of exponentials. With 600 amounts, thirty years of a wet month, both are chosen in every one of
/// twenty samples; a gamma below shape 1 can hardly be told from a mixture and is not asked for.
#[test]
fn each_law_is_known_by_its_draws() {
    let mixed = Law::MixedExponential(MixedExponential {
        smaller_share: 0.5,
        smaller_mean_mm: 1.0,
        larger_mean_mm: 15.0,
        above_mm: 0.25,
    });
    let gamma = Law::Gamma(TruncatedGamma { shape: 1.6, scale_mm: 5.0, above_mm: 0.25 });
    let mut random = ChaCha8Rng::seed_from_u64(8);
    for _ in 0..20 {
        let mut drawn = |law: Law| -> Vec<f64> { (0..600).map(|_| law.draw(&mut random)).collect() };
        assert!(matches!(Law::of(&drawn(mixed), 0.25), Law::MixedExponential(_)));
        assert!(matches!(Law::of(&drawn(gamma), 0.25), Law::Gamma(_)));
    }
}
