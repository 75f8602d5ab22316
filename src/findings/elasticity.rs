//! Elasticities: what one degree does, what one percent of precipitation does, and that the two do not add.

use super::quantile::{quantile, sorted};
use super::resample::{Estimate, Ranked, Resamples};
use super::surface::{Change, SurfaceQuestions};
use super::surface_nodes::Nodes;
use crate::season::LEAST_REFERENCE_MM;
use serde::Serialize;

/// Half the warming over which a slope is taken, degC.
pub const HALF_STEP_C: f64 = 0.5;
/// Half the change of precipitation over which a slope is taken, percent.
pub const HALF_STEP_PCT: f64 = 5.0;
/// Change of precipitation whose effect is compared with and without a warming, percent.
pub const INTERACTION_PCT: f64 = 10.0;

/// What degrees and percents do to the headline measure at a level.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Slopes {
    /// The level, degC.
    pub level_c: f64,
    /// Of the basin.
    pub basin: Slope,
    /// Of each band, from the lowest.
    pub bands: Vec<Slope>,
    /// Of the basin: what the warming up to the level and +10 % precipitation do together, less what each of them does alone,
    /// mm; none at the reference.
    pub interaction_mm: Option<Estimate>,
    /// The same as a percentage of the reference's median.
    pub interaction_pct: Option<Estimate>,
}

/// Slopes in one place, over one degree and over 10 % of precipitation about the level: `100*(S(w + 0.5)/S(w - 0.5) - 1)`, and
/// `ln(S(+5 %)/S(-5 %)) / ln(1.05/0.95)`, of medians S of the period value. The first is exact where a degree always takes the
/// same share, the second where SWE goes with a power of precipitation.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Slope {
    /// The median at the level, mm.
    pub median_mm: f64,
    /// Percent per degC of warming; none where the median at the level is below 10 mm.
    pub per_degree_pct: Option<Estimate>,
    /// Percent per percent of precipitation; likewise.
    pub per_percent_pct: Option<Estimate>,
}

/// The percentage that, taken so many times over, comes to `found`: of a degree, what a degree of another scale does, since a
/// slope is a share that compounds. The error goes with the derivative.
///
/// ```
/// use thawline::findings::{Estimate, compound_share_pct};
/// let per_celsius = Estimate { value: -19.0, monte_carlo_error: Some(1.0) };
/// let half = compound_share_pct(per_celsius, 2.0);
/// assert!((half.value + 10.0).abs() < 1e-12, "0.9 * 0.9 = 0.81");
/// assert!((half.monte_carlo_error.unwrap() - 0.5 / 0.9).abs() < 1e-12);
/// ```
pub fn compound_share_pct(found: Estimate, times: f64) -> Estimate {
    let left = libm::pow(1.0 + found.value / 100.0, 1.0 / times);
    let slope = left / (1.0 + found.value / 100.0) / times;
    Estimate {
        value: 100.0 * (left - 1.0),
        monte_carlo_error: found.monte_carlo_error.map(|error| error * slope),
    }
}

impl Slopes {
    /// The changes that have to be run for the slopes at a level, the level itself and those of the interaction with it.
    pub(super) fn changes(level_c: f64, reference_c: f64) -> [Change; 7] {
        let at = |warming_c, precipitation_change_pct| Change { warming_c, precipitation_change_pct };
        [
            at(level_c, 0.0),
            at(level_c - HALF_STEP_C, 0.0),
            at(level_c + HALF_STEP_C, 0.0),
            at(level_c, -HALF_STEP_PCT),
            at(level_c, HALF_STEP_PCT),
            at(level_c, INTERACTION_PCT),
            at(reference_c, INTERACTION_PCT),
        ]
    }

    pub(super) fn of(nodes: &Nodes, level_c: f64, questions: &SurfaceQuestions<'_>) -> Self {
        let changes = Self::changes(level_c, questions.reference_c);
        let reference = Change { warming_c: questions.reference_c, precipitation_change_pct: 0.0 };
        let basin = |change: Change| nodes.of_basin(change);
        let resamples = nodes.resamples();
        let few = resamples.few();
        let of_band = |band: usize| slope(&changes, |change| nodes.of_band(change, band), &few);
        let joint = [changes[5], changes[0], changes[6], reference].map(|change| Medians::of(basin(change)));
        let interaction = |medians: [f64; 4]| medians[0] - medians[1] - medians[2] + medians[3];
        let of_reference = |medians: [f64; 4]| {
            (medians[3] >= LEAST_REFERENCE_MM).then(|| 100.0 * interaction(medians) / medians[3])
        };
        let is_warmed = level_c != questions.reference_c;
        let warmed = |found: Option<Estimate>| found.filter(|_| is_warmed);
        Self {
            level_c,
            basin: slope(&changes, basin, resamples),
            bands: (0..questions.bands.len()).map(of_band).collect(),
            interaction_mm: warmed(estimate(&joint, |medians| Some(interaction(medians)), resamples)),
            interaction_pct: warmed(estimate(&joint, of_reference, resamples)),
        }
    }
}

/// Values of one change, ready for the median of any resample.
struct Medians {
    median: f64,
    ranked: Ranked,
}

impl Medians {
    fn of(values: Option<Vec<f64>>) -> Self {
        let values = values.unwrap_or_default();
        Self {
            median: quantile(&sorted(values.iter().copied()), 0.5),
            ranked: Ranked::new(values.into_iter().zip(0..)),
        }
    }
}

/// A number of several medians, with its Monte Carlo error: all medians move with the realizations together.
fn estimate<const N: usize>(
    medians: &[Medians; N],
    of: impl Fn([f64; N]) -> Option<f64>,
    resamples: &Resamples,
) -> Option<Estimate> {
    let value = of(std::array::from_fn(|at| medians[at].median)).filter(|value| value.is_finite())?;
    let resampled = resamples.each(|weights| {
        let mut all = [0.0; N];
        for (median, of) in all.iter_mut().zip(medians) {
            [*median] = of.ranked.quantiles(weights, [0.5])?;
        }
        of(all)
    });
    Some(Estimate::new(value, resampled))
}

fn slope(changes: &[Change; 7], of: impl Fn(Change) -> Option<Vec<f64>>, resamples: &Resamples) -> Slope {
    let median_mm = Medians::of(of(changes[0])).median;
    let per = |ends: [Change; 2], slope: fn(f64) -> f64| {
        let ends = ends.map(|change| Medians::of(of(change)));
        let ratio = |[below, above]: [f64; 2]| (below > 0.0 && above > 0.0).then(|| slope(above / below));
        if median_mm >= LEAST_REFERENCE_MM { estimate(&ends, ratio, resamples) } else { None }
    };
    let (less, more) = (1.0 - HALF_STEP_PCT / 100.0, 1.0 + HALF_STEP_PCT / 100.0);
    let widest = libm::log(more / less);
    let per_percent_pct = per([changes[3], changes[4]], libm::log);
    let over = |found: Estimate| found.map(|value| value / widest);
    Slope {
        median_mm,
        per_degree_pct: per([changes[1], changes[2]], |ratio| 100.0 * (ratio - 1.0)),
        per_percent_pct: per_percent_pct.map(over),
    }
}
