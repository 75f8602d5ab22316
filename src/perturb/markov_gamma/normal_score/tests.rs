use super::{Shape, normal_scores, quantile};

/// `norm.ppf((rankdata(v) - 1/3)/(len(v) + 1/3))`, scipy 1.17.1, with values that share their mean rank.
#[test]
fn scores_by_rank() {
    let found = normal_scores(&[3.1, 0.2, 5.0, 3.1, -4.0, 0.2, 0.2, 7.7]);
    let expected = [
        0.305_480_788_099_397_4,
        -0.467_698_799_114_508_4,
        0.841_621_233_572_914,
        0.305_480_788_099_397_4,
        -1.405_071_560_309_632_9,
        -0.467_698_799_114_508_4,
        -0.467_698_799_114_508_4,
        1.405_071_560_309_632_2,
    ];
    for (found, expected) in found.iter().zip(expected) {
        assert!((found - expected).abs() < 1e-9, "{found} for {expected}");
    }
    assert!(normal_scores(&[]).is_empty());
    assert!(
        normal_scores(&[4.0; 7]).iter().all(|score| score.abs() < 1e-12),
        "all alike are all in the middle"
    );
}

/// WG-11, type 8 of Hyndman & Fan (1996, Amer. Stat. 50:361), computed with `numpy.quantile(method="median_unbiased")`.
#[test]
fn quantiles_of_type_8() {
    let sorted = [2.0, 4.0, 7.0, 8.0, 10.0, 15.0, 20.0, 30.0, 40.0, 50.0];
    let expected = [(0.1, 2.733_333), (0.25, 6.75), (0.5, 12.5), (0.75, 30.833_333), (0.9, 46.333_333)];
    for (share, expected) in expected {
        let found = quantile(&sorted, share);
        assert!((found - expected).abs() < 1e-6, "{found} for {expected}");
    }
    assert_eq!((quantile(&sorted, 1e-9), quantile(&sorted, 1.0)), (2.0, 50.0));
    assert_eq!(quantile(&[3.0], 0.9), 3.0);
}

/// `score` is the way back from `value`, over all scores that the shape keeps and of a form that is anything but normal
/// (cubes of a uniform), to rounding; beyond the outermost score both stop. Without values the shape is that of a
/// standard normal, and of values that are all the same it is that value.
#[test]
fn there_and_back() {
    let cubes = Shape::of((0..5000).map(|at| {
        let x = f64::from(at) / 2500.0 - 1.0;
        10.0 * x * x * x
    }));
    for step in -300..=300 {
        let score = f64::from(step) / 100.0;
        assert!((cubes.score(cubes.value(score)) - score).abs() < 1e-9, "at {score}");
        assert!((Shape::of(std::iter::empty()).value(score) - score).abs() < 1e-12);
    }
    assert_eq!((cubes.value(9.0), cubes.score(1e9)), (cubes.value(3.0), 3.0));
    assert_eq!((cubes.value(-9.0), cubes.score(-1e9)), (cubes.value(-3.0), -3.0));
    let same = Shape::of([4.0; 9].into_iter());
    assert_eq!((same.value(-2.0), same.value(1.3)), (4.0, 4.0));
    assert!(same.score(4.0).is_finite());
}
