//! Yardsticks: the same shift held against other spreads. A verdict that hangs on its yardstick has to say so.
//!
//! The spread of a mean over N years shrinks with N, that of an assumed change of mean precipitation does not; half a
//! 5-95 % range is longer than one standard deviation. So the study's shift is held against spreads of several N, with the
//! assumption taken away, halved and doubled, and against both measures of spread.

use super::crossing::{Crossing, crossing};
use super::resample::{Estimate, Ranked, Resamples};
use super::spread::{Spread, signal_to_spread};
use crate::season::{Kind, period_value};
use ndarray::ArrayView2;
use serde::Serialize;

/// Lengths of a period that are told beside the study's own, years.
const PERIODS: [usize; 3] = [1, 10, 30];
/// Assumed changes of mean precipitation that are run beside the study's own, as multiples of it: none, halved, doubled.
pub const TIMES_ASSUMED: [f64; 3] = [0.0, 0.5, 2.0];

/// A measure's shifts against one spread of the reference.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Yardstick {
    /// Years of a period: realizations are cut into pieces of so many.
    pub years: usize,
    /// Pieces, over all realizations.
    pub periods: usize,
    /// Standard deviation of the change of mean precipitation that is assumed, percent.
    pub mean_change_sd_pct: f64,
    /// How many times the study's own assumption that is; 1 where the study assumes none.
    pub times_assumed: f64,
    /// The reference's spread over the pieces.
    pub spread: Option<Spread>,
    /// One entry a level with a shift.
    pub levels: Vec<YardstickLevel>,
    /// From which warming on the study's shift outweighs the half of the 5-95 % range that it points to.
    pub outweighs: Crossing,
    /// From which warming on it outweighs one standard deviation.
    pub outweighs_standard_deviation: Crossing,
}

/// A level's shift against one spread.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct YardstickLevel {
    /// The level, degC.
    pub level_c: f64,
    /// The study's median shift over the half of the 5-95 % range that it points to.
    pub signal_to_spread: Option<Estimate>,
    /// The study's mean shift over one standard deviation.
    pub signal_to_standard_deviation: Option<f64>,
}

/// The reference's single years under one assumption, `[realization][year]`.
#[derive(Debug, Clone, Copy)]
pub(super) struct Assumed<'a> {
    pub years: ArrayView2<'a, f64>,
    pub mean_change_sd_pct: f64,
    pub times_assumed: f64,
}

/// The levels and which of them is the reference.
#[derive(Debug, Clone, Copy)]
pub(super) struct Levels<'a> {
    pub levels_c: &'a [f64],
    pub reference: usize,
}

/// The study's shift at one level.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct LevelShift {
    pub level_c: f64,
    /// Median paired change.
    pub median: f64,
    /// The same in every resample.
    pub resampled: Vec<Option<f64>>,
    /// Mean paired change.
    pub mean: f64,
}

impl Levels<'_> {
    /// The crossing of a ratio over the levels above the reference; a level without one makes it unknown.
    pub fn crossing(&self, ratio: impl Fn(f64) -> Option<f64>) -> Crossing {
        let warmer = self.levels_c[self.reference + 1..].iter().map(|level_c| (*level_c, ratio(*level_c)));
        crossing(self.levels_c[self.reference], &warmer.collect::<Vec<_>>())
    }
}

/// The yardsticks of a measure under one assumption, one for every length of a period that its realizations hold.
pub(super) fn yardsticks(
    kind: Kind,
    assumed: Assumed<'_>,
    shifts: &[LevelShift],
    levels: Levels<'_>,
    resamples: &Resamples,
) -> Vec<Yardstick> {
    let own = assumed.years.ncols();
    let shorter = PERIODS.into_iter().filter(|years| *years < own);
    shorter.chain([own]).map(|years| yardstick(kind, assumed, shifts, levels, years, resamples)).collect()
}

fn yardstick(
    kind: Kind,
    assumed: Assumed<'_>,
    shifts: &[LevelShift],
    levels: Levels<'_>,
    years: usize,
    resamples: &Resamples,
) -> Yardstick {
    let pieces = pieces(kind, &assumed.years, years);
    let spread = Spread::of(&pieces.iter().map(|(value, _)| *value).collect::<Vec<_>>());
    let periods = pieces.len();
    let spreads = Spread::resampled(&Ranked::new(pieces), resamples);
    let found: Vec<YardstickLevel> = shifts
        .iter()
        .map(|shift| YardstickLevel {
            level_c: shift.level_c,
            signal_to_spread: spread
                .and_then(|spread| signal_to_spread(shift.median, &spread, &shift.resampled, &spreads))
                .map(|(ratio, _)| ratio),
            signal_to_standard_deviation: spread.and_then(|spread| spread.deviations(shift.mean)),
        })
        .collect();
    let at = |level_c: f64| found.iter().find(|level| level.level_c == level_c);
    Yardstick {
        years,
        periods,
        mean_change_sd_pct: assumed.mean_change_sd_pct,
        times_assumed: assumed.times_assumed,
        spread,
        outweighs: levels
            .crossing(|level_c| at(level_c).and_then(|at| at.signal_to_spread).map(|ratio| ratio.value)),
        outweighs_standard_deviation: levels
            .crossing(|level_c| at(level_c).and_then(|at| at.signal_to_standard_deviation)),
        levels: found,
    }
}

/// The period values of pieces of so many years, each with its realization; years beyond the last whole piece are left
/// out.
fn pieces(kind: Kind, of: &ArrayView2<'_, f64>, years: usize) -> Vec<(f64, usize)> {
    let mut pieces = Vec::with_capacity(of.len() / years.max(1));
    let mut one = Vec::with_capacity(years);
    for (realization, row) in of.rows().into_iter().enumerate() {
        for piece in row.exact_chunks(years) {
            one.clear();
            one.extend(piece);
            pieces.push((period_value(kind, &mut one), realization));
        }
    }
    pieces
}

#[cfg(test)]
mod tests {
    use super::*;
    use ndarray::array;

    /// Two realizations of five years in pieces of two: by hand, the fifth year of each is left over.
    #[test]
    fn pieces_are_means_of_their_years() {
        let years = array![[1.0, 3.0, 5.0, 9.0, 100.0], [2.0, 2.0, 4.0, 0.0, 100.0]];
        let found = pieces(Kind::AmountMm, &years.view(), 2);
        assert_eq!(found, [(2.0, 0), (7.0, 0), (2.0, 1), (2.0, 1)]);
    }

    /// Years drawn independently with a standard deviation of 10: means over N years spread as 10/sqrt(N), so that the
    /// same shift measures sqrt(10) times as much for N = 10 as for N = 1 (R2 of the method: sampling theory). 9000 years
    /// know a standard deviation to 1 %, 900 means to 2.4 %: 8 % is three times that.
    #[test]
    fn spread_of_means_shrinks_with_the_root_of_their_length() {
        use rand_distr::{Distribution, StandardNormal};
        let mut random = crate::perturb::stream(5, 0);
        let years = ndarray::Array2::from_shape_simple_fn((300, 30), || {
            let normal: f64 = StandardNormal.sample(&mut random);
            100.0 + 10.0 * normal
        });
        let assumed = Assumed { years: years.view(), mean_change_sd_pct: 0.0, times_assumed: 1.0 };
        let shift = LevelShift { level_c: 1.0, median: -5.0, resampled: vec![Some(-5.0)], mean: -5.0 };
        let levels = Levels { levels_c: &[0.0, 1.0], reference: 0 };
        let found = yardsticks(Kind::AmountMm, assumed, &[shift], levels, &Resamples::new(1, 300).few());
        let ratio = |at: usize| found[at].levels[0].signal_to_standard_deviation.unwrap();
        assert_eq!(
            found.iter().map(|of| (of.years, of.periods)).collect::<Vec<_>>(),
            [(1, 9000), (10, 900), (30, 300)]
        );
        for (at, times) in [(1, 10.0_f64), (2, 30.0)] {
            assert!(
                (ratio(at) / ratio(0) / times.sqrt() - 1.0).abs() < 0.08 * f64::from(at as u32),
                "{found:?}"
            );
        }
        assert!((ratio(0) - 0.5).abs() < 0.02 * 0.5 * 2.0);
    }
}
