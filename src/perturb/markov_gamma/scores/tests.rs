use super::{Normal, mean_product, squared};

/// The root's square has the total's mean and standard deviation: `m^2 + s^2 = M`, `4 m^2 s^2 + 2 s^4 = V` (moments of
/// the square of a normal), to rounding. Beyond `V = 2 M^2`, which is the square of a normal about 0, the mean is kept.
#[test]
fn the_root_of_a_total() {
    for (mean, spread) in [(240.0, 69.8216), (900.0, 150.0), (12.0, 11.0), (3.0, 4.2), (50.0, 0.0)] {
        let root = Normal::root_of(Normal { mean, spread });
        let (m2, s2) = (root.mean * root.mean, root.spread * root.spread);
        assert!((m2 + s2 - mean).abs() < 1e-9 * mean);
        assert!((4.0 * m2 * s2 + 2.0 * s2 * s2 - spread * spread).abs() < 1e-9 * mean * mean);
    }
    let wild = Normal::root_of(Normal { mean: 10.0, spread: 40.0 });
    assert!(wild.mean == 0.0 && (wild.spread * wild.spread - 10.0).abs() < 1e-12);
    assert_eq!(Normal::root_of(Normal::default()), Normal::default());
}

/// Mean and standard deviation of 2 4 4 4 5 5 7 9, by hand: 5 and `sqrt(32/7)`; scores and values undo each other; one
/// value, or eight alike, do not vary.
#[test]
fn means_and_spreads() {
    let found = Normal::of(&[2.0, 4.0, 4.0, 4.0, 5.0, 5.0, 7.0, 9.0]);
    assert!(found.mean == 5.0 && (found.spread - libm::sqrt(32.0 / 7.0)).abs() < 1e-12);
    assert!((found.value(found.score(7.3)) - 7.3).abs() < 1e-12);
    assert_eq!((Normal::of(&[3.0]).spread, Normal::of(&[3.0]).score(8.0)), (0.0, 0.0));
    assert_eq!((squared(-2.0), squared(3.0)), (0.0, 9.0));
    assert_eq!(
        (mean_product([(1.0, 2.0), (3.0, 4.0)].into_iter()), mean_product([].into_iter())),
        (7.0, 0.0)
    );
}
