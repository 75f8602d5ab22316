use super::class_multipliers;

/// Means of a lognormal over its quantile intervals by quadrature: `K*d.expect(lambda x: x, lb=d.ppf(k/K),
/// ub=d.ppf((k+1)/K))` with `d = scipy.stats.lognorm(s, scale=exp(-s*s/2))`, `s = sqrt(log1p(CV^2))`, scipy 1.17.1. 1e-10 is
/// what the quadrature is worth.
#[test]
fn means_of_quantile_intervals() {
    let cases: [(f64, &[f64]); 3] = [
        (0.4, &[0.621_766_959_183, 0.932_638_947_537, 1.445_594_093_279]),
        (0.2, &[0.746_240_736_43, 0.883_031_741_53, 0.980_988_631_149, 1.090_117_765_982, 1.299_621_124_908]),
        (
            1.0,
            &[0.235_240_113_248, 0.458_566_082_754, 0.712_316_717_458, 1.111_962_133_872, 2.481_914_952_667],
        ),
    ];
    for (variation, expected) in cases {
        let found = class_multipliers(variation, expected.len());
        assert_eq!(found.len(), expected.len());
        for (found, expected) in found.iter().zip(expected) {
            assert!((found - expected).abs() < 1e-10, "CV {variation}: {found} for {expected}");
        }
    }
}

/// The snowfall of the band stays what it is, to 1e-12; classes stand from the least to the most; none is negative.
#[test]
fn the_mean_is_one() {
    for variation in [0.0, 1e-9, 0.05, 0.4, 1.0, 3.0] {
        for classes in [1, 2, 3, 5, 10, 50, 1000] {
            let found = class_multipliers(variation, classes);
            let mean = found.iter().sum::<f64>() / classes as f64;
            assert!((mean - 1.0).abs() < 1e-12, "CV {variation}, {classes} classes: {mean}");
            assert!(found[0] >= 0.0 && found.windows(2).all(|pair| pair[0] <= pair[1] + 1e-12));
        }
    }
    assert_eq!(class_multipliers(0.0, 7), [1.0; 7]);
    assert_eq!(class_multipliers(0.8, 1), [1.0]);
}

/// The more classes, the nearer their own coefficient of variation comes to the stated one, from below: of 0.4, `std` of
/// the classes by `scipy.stats.norm`, scipy 1.17.1: 0.2999, 0.3664, 0.3840, 0.3984 and 0.3998.
#[test]
fn more_classes_keep_more_of_the_variation() {
    let cases = [
        (2, 0.299_950_146),
        (5, 0.366_391_502),
        (10, 0.383_999_979),
        (100, 0.398_352_965),
        (1000, 0.399_811_042),
    ];
    for (classes, expected) in cases {
        let squares: f64 = class_multipliers(0.4, classes).iter().map(|m| (m - 1.0) * (m - 1.0)).sum();
        let found = (squares / classes as f64).sqrt();
        assert!((found - expected).abs() < 1e-8, "{classes} classes: {found} for {expected}");
        assert!(found < 0.4);
    }
}
