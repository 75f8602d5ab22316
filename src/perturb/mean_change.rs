//! An assumed change of mean precipitation, one draw a realization (method, section 8).

use super::stream::stream;
use super::{Fitted, Generator};
use crate::weather::{Series, YearSpan};
use rand::rngs::ChaCha8Rng;
use rand_distr::{Distribution, StandardNormal};

/// Another generator's realizations, all precipitation of each times one factor of its own.
///
/// The draw is the first of the realization's stream, wanted or not: assuming a change does not change the weather
/// otherwise.
#[derive(Clone, Copy)]
pub struct MeanChange<'g> {
    /// Makes the weather whose precipitation changes.
    pub generator: &'g dyn Generator,
    /// Seed of the study.
    pub seed: u64,
    /// Assumed standard deviation of the change of mean precipitation, percent; 0 for none.
    pub standard_deviation_pct: f64,
}

impl Generator for MeanChange<'_> {
    fn fill(&self, realization: u32, years: usize, into: &mut Series) {
        self.generator.fill(realization, years, into);
        let (draw, _) = first_draw(self.seed, realization);
        let factor = mean_change_factor(self.standard_deviation_pct, draw);
        for precipitation in &mut into.precipitation_mm {
            *precipitation *= factor;
        }
    }

    fn drawn(&self, realization: u32, years: usize) -> Option<(&Series, Vec<YearSpan>)> {
        if self.standard_deviation_pct == 0.0 { self.generator.drawn(realization, years) } else { None }
    }

    fn fitted(&self) -> Option<Fitted> {
        self.generator.fitted()
    }

    fn keeps_names(&self) -> bool {
        self.generator.keeps_names()
    }
}

/// The factor on all precipitation of a realization: `max(0, 1 + s*z)`, with s the assumed standard deviation as a
/// percentage and z a standard normal draw.
pub fn mean_change_factor(standard_deviation_pct: f64, draw: f64) -> f64 {
    (1.0 + standard_deviation_pct / 100.0 * draw).max(0.0)
}

/// The stream of a realization as generators find it, behind the draw of the mean change.
pub(super) fn stream_after_mean_change(seed: u64, realization: u32) -> ChaCha8Rng {
    first_draw(seed, realization).1
}

fn first_draw(seed: u64, realization: u32) -> (f64, ChaCha8Rng) {
    let mut random = stream(seed, realization);
    let draw = StandardNormal.sample(&mut random);
    (draw, random)
}
