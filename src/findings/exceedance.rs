//! Volumes by chance of exceedance: what single years bring at least.

use super::quantile::quantile;
use super::resample::{Estimate, Ranked, Resamples};
use crate::season::LEAST_REFERENCE_MM;
use crate::units::{cubic_hectometres, depth_mm};
use serde::Serialize;

/// The chances at which volumes are told, percent: in 90 of 100 years at least the first comes, in 10 the last.
pub const EXCEEDANCE_PCT: [u32; 5] = [90, 70, 50, 30, 10];
/// The quantiles they are, ascending: what 90 % of years exceed is the 10 % quantile.
const SHARES: [f64; EXCEEDANCE_PCT.len()] = [0.1, 0.3, 0.5, 0.7, 0.9];

/// What a share of single years brings at least.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Exceeded {
    /// Percent of years that bring at least as much.
    pub chance_pct: u32,
    /// As a depth over the basin, mm.
    pub amount_mm: Estimate,
    /// As a volume, hm3.
    pub volume_hm3: Estimate,
    /// Its change from the reference's, percent; nothing where that is below 10 mm, and at the reference.
    pub change_pct: Option<f64>,
}

/// The same of volumes, hm3, which are as much as a depth over the basin.
pub(super) fn volumes_exceeded(years: &Ranked, area_km2: f64, resamples: &Resamples) -> Vec<Exceeded> {
    let depths_mm = years.values().iter().map(|(hm3, realization)| (depth_mm(*hm3, area_km2), *realization));
    exceeded(&Ranked::new(depths_mm), area_km2, resamples)
}

/// The amounts that 90, 70, 50, 30 and 10 % of all years of all realizations bring at least, with their Monte Carlo
/// error over resampled realizations; nothing where a year has no value.
pub(super) fn exceeded(years: &Ranked, area_km2: f64, resamples: &Resamples) -> Vec<Exceeded> {
    let values: Vec<f64> = years.values().iter().map(|(value, _)| *value).collect();
    if values.is_empty() || !values.iter().all(|value| value.is_finite()) {
        return Vec::new();
    }
    let resampled = resamples.each(|weights| years.quantiles(weights, SHARES));
    let of = |at: usize| {
        let numbers = resampled.iter().map(|quantiles| quantiles.map(|quantiles| quantiles[at]));
        let amount_mm = Estimate::new(quantile(&values, SHARES[at]), numbers);
        Exceeded {
            chance_pct: EXCEEDANCE_PCT[at],
            amount_mm,
            volume_hm3: amount_mm.map(|mm| cubic_hectometres(mm, area_km2)),
            change_pct: None,
        }
    };
    (0..SHARES.len()).map(of).collect()
}

/// Adds the change from the reference's amounts.
pub(super) fn add_changes(exceeded: &mut [Exceeded], reference: &[Exceeded]) {
    for (at, before) in exceeded.iter_mut().zip(reference) {
        let before_mm = before.amount_mm.value;
        at.change_pct =
            (before_mm >= LEAST_REFERENCE_MM).then(|| 100.0 * (at.amount_mm.value / before_mm - 1.0));
    }
}

/// The amounts alone, mm; nothing where a year has no value.
pub(super) fn exceeded_mm(years: impl Iterator<Item = f64>) -> Option<[f64; EXCEEDANCE_PCT.len()]> {
    let values = super::quantile::sorted(years);
    let is_whole = !values.is_empty() && values.iter().all(|value| value.is_finite());
    is_whole.then(|| SHARES.map(|share| quantile(&values, share)))
}

#[cfg(test)]
mod tests {
    use super::*;

    /// Values of Hyndman & Fan's type 8 for this sample by numpy (see tests/vectors); 1e-4 is as printed. 450 mm on
    /// 250 km2 are 112.5 hm3.
    #[test]
    fn exceedance_reads_from_the_top() {
        let sample = [2.0, 4.0, 7.0, 8.0, 10.0, 15.0, 20.0, 30.0, 40.0, 50.0];
        let years = Ranked::new(sample.into_iter().zip(0..));
        let found = exceeded(&years, 250.0, &Resamples::new(3, sample.len()));
        let [nine_in_ten, .., one_in_ten] = found.as_slice() else { panic!("{found:?}") };
        assert!((nine_in_ten.amount_mm.value - 2.7333).abs() < 1e-4 && nine_in_ten.chance_pct == 90);
        assert!((one_in_ten.amount_mm.value - 46.3333).abs() < 1e-4 && one_in_ten.chance_pct == 10);
        assert_eq!(found[2].volume_hm3.value, 12.5 * 250.0 / 1000.0);
        assert!(exceeded(&Ranked::new([(f64::INFINITY, 0)]), 1.0, &Resamples::new(3, 1)).is_empty());
    }
}
