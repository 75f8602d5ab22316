//! Unpaired odds: pairs of different realizations, as if the future drew its own weather.

use super::resample::Ranked;

/// Odds that a value of one realization lies below a reference value of *another* one.
pub(super) struct Odds {
    reference: Ranked,
    warmed: Ranked,
    /// For each realization, its score against itself: pairs below, ties half.
    own_score: Vec<f64>,
    /// For each realization, how many values each side has.
    own_counts: Vec<(f64, f64)>,
}

impl Odds {
    /// `reference` and `warmed` are `(value, realization)`. Values that are none rank before every other and `not gone`
    /// after.
    pub fn new(reference: Ranked, warmed: Ranked, realizations: usize) -> Self {
        let mut sides = vec![(Vec::new(), Vec::new()); realizations];
        for (value, realization) in reference.values() {
            sides[*realization].0.push(*value);
        }
        for (value, realization) in warmed.values() {
            sides[*realization].1.push(*value);
        }
        let own_score = sides
            .iter()
            .map(|(reference, warmed)| score(reference, warmed))
            .collect();
        let own_counts = sides
            .iter()
            .map(|(reference, warmed)| (reference.len() as f64, warmed.len() as f64))
            .collect();
        Self {
            reference,
            warmed,
            own_score,
            own_counts,
        }
    }

    /// The chance, each realization counted as often as its weight says. Pairs of a realization with itself are left
    /// out, also where it was drawn more than once. Nothing where no pair is left.
    pub fn chance(&self, weights: &[u32]) -> Option<f64> {
        let weight = |realization: usize| f64::from(weights[realization]);
        let mut above: f64 = self
            .reference
            .values()
            .iter()
            .map(|(_, realization)| weight(*realization))
            .sum();
        let reference_total = above;
        let (mut wins, mut warmed_total, mut at) = (0.0, 0.0, 0);
        let reference = self.reference.values();
        let warmed = self.warmed.values();
        let mut next = 0;
        while next < warmed.len() {
            let value = warmed[next].0;
            while at < reference.len() && reference[at].0 < value {
                above -= weight(reference[at].1);
                at += 1;
            }
            let (mut ties, mut ahead) = (0.0, at);
            while ahead < reference.len() && reference[ahead].0 == value {
                ties += weight(reference[ahead].1);
                ahead += 1;
            }
            while next < warmed.len() && warmed[next].0 == value {
                let weight = weight(warmed[next].1);
                wins += weight * (above - ties / 2.0);
                warmed_total += weight;
                next += 1;
            }
        }
        let (mut own_wins, mut own_pairs) = (0.0, 0.0);
        for (realization, (score, (reference, warmed))) in
            self.own_score.iter().zip(&self.own_counts).enumerate()
        {
            let square = weight(realization) * weight(realization);
            own_wins += square * score;
            own_pairs += square * reference * warmed;
        }
        let pairs = reference_total * warmed_total - own_pairs;
        (pairs > 0.0).then(|| (wins - own_wins) / pairs)
    }
}

/// Pairs in which `warmed` lies below `reference`, ties half.
fn score(reference: &[f64], warmed: &[f64]) -> f64 {
    let mut score = 0.0;
    for after in warmed {
        for before in reference {
            score += if after < before {
                1.0
            } else if after == before {
                0.5
            } else {
                0.0
            };
        }
    }
    score
}

/// The chance that a warmed value lies below a reference value of another realization, ties half. Both hold one value a
/// realization, in the same order.
///
/// ```
/// use thawline::findings::unpaired_chance;
/// // Only pairs of different realizations count: 0 < 3 does, 2 > 1 does not.
/// assert_eq!(unpaired_chance(&[1.0, 3.0], &[0.0, 2.0]), Some(0.5));
/// ```
pub fn unpaired_chance(reference: &[f64], warmed: &[f64]) -> Option<f64> {
    let ranked = |values: &[f64]| Ranked::new(values.iter().copied().zip(0..));
    Odds::new(ranked(reference), ranked(warmed), reference.len()).chance(&vec![1; reference.len()])
}
