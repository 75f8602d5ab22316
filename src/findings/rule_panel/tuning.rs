//! Brings another rule to the study's own snow of the record, so that what is left between them is no worse fit.

use crate::season::Outcome;
use serde::Serialize;

/// A rule whose mean peak is farther from the target than that is not tuned, percent.
pub const PEAK_TOLERANCE_PCT: f64 = 1.0;
/// The same of the median melt-out, days.
pub const MELT_OUT_TOLERANCE_DAYS: f64 = 1.0;
/// Least and greatest factor that is looked at.
pub const FACTOR_BOUNDS: [f64; 2] = [0.25, 4.0];
/// The search for the catch ends so near to the target, a share of it.
const NEAR_PEAK: f64 = 1e-4;
/// That for the melt ends so near, days: medians of whole days step by halves.
const NEAR_MELT_OUT_DAYS: f64 = 0.25;
const MOST_STEPS: usize = 14;
/// A factor so near to a bound stands at it, a share of the bound: a bisection never quite comes there.
const AT_BOUND: f64 = 0.01;

/// Whether a search ended at one of its bounds.
pub fn is_at_bound(factor: f64) -> bool {
    FACTOR_BOUNDS.iter().any(|bound| (factor / bound - 1.0).abs() <= AT_BOUND)
}

/// What the record's own years come to at the reference.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Fit {
    /// Mean of the years' peak SWE, mm.
    pub mean_peak_swe_mm: f64,
    /// Median of the years' melt-out, day of the water year.
    pub median_melt_out_day: Outcome,
}

/// Where a search ended.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Tuned {
    /// By which the gauge multiplier of snow was multiplied.
    pub catch_factor: f64,
    /// By which every melt factor was multiplied.
    pub melt_factor: f64,
    /// What the record's own years then come to.
    pub fit: Fit,
    /// Whether both are within the tolerances.
    pub is_tuned: bool,
}

impl Fit {
    /// Whether both numbers are within the tolerances; a melt-out that neither has is no difference.
    pub fn is_near(&self, target: &Self) -> bool {
        let of_peak = (self.mean_peak_swe_mm / target.mean_peak_swe_mm - 1.0).abs();
        let is_same_day = match (self.median_melt_out_day, target.median_melt_out_day) {
            (Outcome::Value(day), Outcome::Value(target)) => (day - target).abs() <= MELT_OUT_TOLERANCE_DAYS,
            (day, target) => day == target,
        };
        100.0 * of_peak <= PEAK_TOLERANCE_PCT && is_same_day
    }

    /// Snow that never goes is too late, and too little snow to go too early, by any number of days; none where the target has no day.
    fn days_late(&self, target: &Self) -> Option<f64> {
        let target = target.median_melt_out_day.value()?;
        Some(match self.median_melt_out_day {
            Outcome::Value(day) => day - target,
            Outcome::None => f64::NEG_INFINITY,
            Outcome::NotGone | Outcome::NotReached => f64::INFINITY,
        })
    }
}

/// Looks for the factors of `[catch, melt]` that bring `run` to the target: the catch by secants, inside a bisection of the melt factor's
/// logarithm, which later snow raises. The nearest that was met is given.
///
/// # Errors
/// Those of `run`.
pub fn tune<E>(target: &Fit, mut run: impl FnMut([f64; 2]) -> Result<Fit, E>) -> Result<Tuned, E> {
    let first = at(1.0, 1.0, target, &mut run)?;
    let mut best = first;
    let Some(late) = first.fit.days_late(target) else { return Ok(best) };
    if late.abs() <= NEAR_MELT_OUT_DAYS {
        return Ok(best);
    }
    let [mut least, mut most] = if late > 0.0 { [1.0, FACTOR_BOUNDS[1]] } else { [FACTOR_BOUNDS[0], 1.0] };
    let mut catch = first.catch_factor;
    for _ in 0..MOST_STEPS {
        let melt = (least * most).sqrt();
        let tried = at(catch, melt, target, &mut run)?;
        let Some(late) = tried.fit.days_late(target) else { break };
        catch = tried.catch_factor;
        if is_nearer(&tried, &best, target) {
            best = tried;
        }
        if late.abs() <= NEAR_MELT_OUT_DAYS {
            break;
        }
        if late > 0.0 { least = melt } else { most = melt }
    }
    Ok(best)
}

fn is_nearer(tried: &Tuned, best: &Tuned, target: &Fit) -> bool {
    let late = |of: &Tuned| of.fit.days_late(target).map_or(f64::INFINITY, f64::abs);
    if tried.is_tuned == best.is_tuned { late(tried) < late(best) } else { tried.is_tuned }
}

/// The catch that brings the peak to the target with a melt factor, from a first one on.
fn at<E>(
    first: f64,
    melt: f64,
    target: &Fit,
    run: &mut impl FnMut([f64; 2]) -> Result<Fit, E>,
) -> Result<Tuned, E> {
    let [least, most] = FACTOR_BOUNDS;
    let goal = target.mean_peak_swe_mm;
    let (mut catch, mut before) = (first, None::<[f64; 2]>);
    let mut best = None::<(f64, Fit)>;
    for _ in 0..MOST_STEPS {
        let fit = run([catch, melt])?;
        let peak = fit.mean_peak_swe_mm;
        let apart = |fit: &Fit| (fit.mean_peak_swe_mm - goal).abs();
        if best.is_none_or(|(_, best)| apart(&fit) < apart(&best)) {
            best = Some((catch, fit));
        }
        if (peak - goal).abs() <= NEAR_PEAK * goal || peak <= 0.0 {
            break;
        }
        let slope = match before {
            Some([catch_before, peak_before]) if catch_before != catch => {
                (peak - peak_before) / (catch - catch_before)
            }
            _ => peak / catch,
        };
        before = Some([catch, peak]);
        let next = (catch + (goal - peak) / slope).clamp(least, most);
        if !next.is_finite() || next == catch {
            break;
        }
        catch = next;
    }
    let (catch_factor, fit) = match best {
        Some(best) => best,
        None => (first, run([first, melt])?),
    };
    Ok(Tuned { catch_factor, melt_factor: melt, is_tuned: fit.is_near(target), fit })
}

#[cfg(test)]
mod tests {
    use super::*;
    use std::convert::Infallible;

    fn found(target: Fit, model: impl Fn([f64; 2]) -> (f64, Outcome)) -> Tuned {
        let run = |at| {
            let (peak, day) = model(at);
            Ok::<_, Infallible>(Fit { mean_peak_swe_mm: peak, median_melt_out_day: day })
        };
        match tune(&target, run) {
            Ok(tuned) => tuned,
        }
    }

    const TARGET: Fit = Fit { mean_peak_swe_mm: 400.0, median_melt_out_day: Outcome::Value(230.0) };

    /// By hand: peaks of 500 catch - 100 melt are 400 mm, and days of 200 + 60 catch / melt are 230, where catch = melt / 2, so that 150
    /// melt = 400: at melt 8/3 and catch 4/3.
    #[test]
    fn both_factors_are_found() {
        let tuned = found(TARGET, |[catch, melt]| {
            (500.0 * catch - 100.0 * melt, Outcome::Value(200.0 + 60.0 * catch / melt))
        });
        assert!(tuned.is_tuned, "{tuned:?}");
        assert!((tuned.melt_factor - 8.0 / 3.0).abs() < 0.05, "{tuned:?}");
        assert!((tuned.catch_factor - 4.0 / 3.0).abs() < 0.02, "{tuned:?}");
    }

    /// What meets the target stays what it is, to the bit.
    #[test]
    fn what_is_there_is_left() {
        let tuned = found(TARGET, |[catch, melt]| (400.0 * catch, Outcome::Value(240.0 - 10.0 * melt)));
        assert_eq!([tuned.catch_factor, tuned.melt_factor], [1.0, 1.0]);
        assert!(tuned.is_tuned);
    }

    /// Where the target never goes, the peak is tuned to and the melt factors stay; a rule under which the snow goes is not tuned.
    #[test]
    fn without_a_melt_out_the_peak_alone_is_tuned_to() {
        let target = Fit { median_melt_out_day: Outcome::NotGone, ..TARGET };
        let tuned = found(target, |[catch, _]| (320.0 * catch, Outcome::NotGone));
        assert!(tuned.is_tuned && (tuned.catch_factor - 1.25).abs() < 1e-3, "{tuned:?}");
        assert_eq!(tuned.melt_factor, 1.0);
        assert!(!found(target, |[catch, _]| (320.0 * catch, Outcome::Value(300.0))).is_tuned);
    }

    /// By hand: 4 mm of catch for each of its factor and 300 mm besides come to 316 at most, at the greatest factor.
    #[test]
    fn a_search_that_ends_at_a_bound_is_known() {
        let tuned = found(TARGET, |[catch, _]| (300.0 + 4.0 * catch, Outcome::Value(230.0)));
        assert!(!tuned.is_tuned && tuned.catch_factor == 4.0 && is_at_bound(tuned.catch_factor), "{tuned:?}");
        assert_eq!([0.25, 0.26, 1.0, 3.9, 3.99].map(is_at_bound), [true, false, false, false, true]);
    }

    /// Snow that goes a month early whatever its factors, and a peak that stays a tenth of the target's.
    #[test]
    fn what_cannot_be_tuned_is_said() {
        assert!(!found(TARGET, |[catch, _]| (400.0 * catch, Outcome::Value(200.0))).is_tuned);
        assert!(!found(TARGET, |[_, melt]| (40.0, Outcome::Value(231.0 - melt))).is_tuned);
    }

    /// Snow that stays all year at half the melt, and goes on day 230 at 0.8 of it: what never goes is too late, and no end of the search.
    #[test]
    fn snow_that_never_goes_is_too_late() {
        let day = |melt: f64| if melt < 0.7 { Outcome::NotGone } else { Outcome::Value(250.0 - 25.0 * melt) };
        let tuned = found(TARGET, |[catch, melt]| (400.0 * catch, day(melt)));
        assert!(tuned.is_tuned && (tuned.melt_factor - 0.8).abs() < 0.05, "{tuned:?}");
        let stays =
            |melt: f64| if melt < 1.5 { Outcome::NotGone } else { Outcome::Value(262.0 - 16.0 * melt) };
        let tuned = found(TARGET, |[catch, melt]| (400.0 * catch, stays(melt)));
        assert!(tuned.is_tuned && (tuned.melt_factor - 2.0).abs() < 0.1, "{tuned:?}");
    }
}
