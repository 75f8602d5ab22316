//! Snow that lies unevenly: each class's mean of a lognormal, integrated over the class, whose ends are found by halving.

use super::quadrature::integral;
use std::f64::consts::PI;

/// What each of `classes` equal areas gets of the band's snowfall, from the least to the most.
pub fn multipliers(variation: f64, classes: usize) -> Vec<f64> {
    // Beyond these scores there is nothing that a number could hold.
    let outermost = 12.0;
    let spread = libm::sqrt(libm::log(1.0 + variation * variation));
    let mut ends = vec![-outermost];
    for class in 1..classes {
        ends.push(score_below_which(class as f64 / classes as f64));
    }
    ends.push(outermost);
    let amount_and_share = |score: f64| {
        libm::exp(spread * score - spread * spread / 2.0) * libm::exp(-score * score / 2.0)
            / libm::sqrt(2.0 * PI)
    };
    let mean = |class: usize| classes as f64 * integral(amount_and_share, ends[class], ends[class + 1], 64);
    (0..classes).map(mean).collect()
}

/// The score of a standard normal below which a share lies.
fn score_below_which(share: f64) -> f64 {
    let (mut low, mut high) = (-12.0, 12.0);
    for _ in 0..80 {
        let middle = (low + high) / 2.0;
        if libm::erfc(-middle / libm::sqrt(2.0)) / 2.0 < share {
            low = middle;
        } else {
            high = middle;
        }
    }
    (low + high) / 2.0
}
