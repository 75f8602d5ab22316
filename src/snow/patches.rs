//! Snow lies unevenly within a band: classes of equal area that get more or less of its snowfall.

use crate::normal::{below, score_of};

/// What each of `classes` equal areas gets of the band's snowfall, as a multiple, from the least to the most.
///
/// Accumulation is taken as lognormal within the band, with mean 1 and the stated coefficient of variation. A class has
/// the mean of its share of that distribution, `K*(Phi(s - z[k-1]) - Phi(s - z[k]))`, with `s^2 = ln(1 + CV^2)` and z the
/// scores below which k/K of a standard normal lies. The classes' mean is 1 to rounding; their own variation is somewhat
/// less than the stated one, since within a class all is one: of 0.4 ten classes keep 0.38. Without variation all are 1.
///
/// ```
/// use thawline::snow::class_multipliers;
/// assert_eq!(class_multipliers(0.0, 3), [1.0, 1.0, 1.0]);
/// ```
pub fn class_multipliers(variation: f64, classes: usize) -> Vec<f64> {
    if variation == 0.0 {
        return vec![1.0; classes];
    }
    let spread = libm::sqrt(libm::log1p(variation * variation));
    // The share of the snowfall that lies on the area above a share of the area.
    let share_above = |class: usize| match class {
        0 => 1.0,
        class if class == classes => 0.0,
        class => below(spread - score_of(class as f64 / classes as f64)),
    };
    (1..=classes).map(|class| classes as f64 * (share_above(class - 1) - share_above(class))).collect()
}

#[cfg(test)]
mod tests;
