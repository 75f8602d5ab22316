//! Snow at risk: snow of bands whose winter is cold enough at the reference and no more at a level (after Nolin & Daly 2006).

use super::quantile::{quantile, sorted};
use super::ranged::Ranged;
use super::record_range::Range;
use super::resample::{Ranked, Resamples};
use crate::basin::Band;
use crate::units::cubic_hectometres;
use ndarray::{ArrayView2, Axis};
use serde::Serialize;

/// Snow at risk by level.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct AtRisk {
    /// One entry a level warmer than the reference.
    pub levels: Vec<AtRiskLevel>,
}

/// One level.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct AtRiskLevel {
    /// The level, degC.
    pub level_c: f64,
    /// The bands whose winter mean is 0 degC or below at the reference and above it here, from the lowest, 0. Winter means are those
    /// of the record's years: which bands these are rests on no realization.
    pub bands: Vec<usize>,
    /// Their area, km2.
    pub area_km2: f64,
    /// Their share of the basin's area.
    pub area_share: f64,
    /// Volume of their headline SWE at the reference, median over realizations of the period value, hm3.
    pub volume_hm3: f64,
    /// 5-95 % of that median over resampled realizations, hm3; none of a single realization.
    pub volume_resampled_hm3: Option<Range>,
    /// 5-95 % of the volume over realizations, hm3: how far precipitation spreads it.
    pub volume_range_hm3: Range,
    /// Median over realizations of their share of the basin's; none where a realization has no snow.
    pub volume_share: Option<f64>,
    /// 5-95 % of that median over resampled realizations.
    pub volume_share_resampled: Option<Range>,
}

impl AtRisk {
    /// `swe_mm` is the headline measure's period value at the reference, `[band][realization]`.
    pub(super) fn of(
        bands: &[Band],
        swe_mm: &ArrayView2<'_, f64>,
        winter_mean_c: &[Vec<f64>],
        levels_c: &[f64],
        reference: usize,
        resamples: &Resamples,
    ) -> Option<Self> {
        let now_c = winter_mean_c.get(reference)?;
        let basin_km2: f64 = bands.iter().map(|band| band.area_km2).sum();
        let volume = |band: usize, realization: usize| {
            cubic_hectometres(swe_mm[[band, realization]], bands[band].area_km2)
        };
        let realizations = swe_mm.len_of(Axis(1));
        let warmer = levels_c.iter().zip(winter_mean_c).skip(reference + 1);
        let levels = warmer.map(|(level_c, then_c)| {
            let is_at_risk = |band: &usize| now_c[*band] <= 0.0 && then_c[*band] > 0.0;
            let at_risk: Vec<usize> = (0..bands.len()).filter(is_at_risk).collect();
            // A sum of nothing is -0 in floating point.
            let of =
                |realization: usize| at_risk.iter().map(|band| volume(*band, realization)).sum::<f64>() + 0.0;
            let share = |realization: usize| {
                let all: f64 = (0..bands.len()).map(|band| volume(band, realization)).sum();
                (all > 0.0).then(|| of(realization) / all)
            };
            let shares: Option<Vec<f64>> = (0..realizations).map(share).collect();
            let volumes: Vec<f64> = (0..realizations).map(of).collect();
            let volume_hm3 = resampled_median(&volumes, resamples);
            let volume_share = shares.map(|shares| resampled_median(&shares, resamples));
            let volumes = sorted(volumes);
            let area_km2 = at_risk.iter().map(|band| bands[*band].area_km2).sum::<f64>() + 0.0;
            AtRiskLevel {
                level_c: *level_c,
                area_km2,
                area_share: area_km2 / basin_km2,
                volume_hm3: volume_hm3.value,
                volume_resampled_hm3: volume_hm3.range(),
                volume_range_hm3: Range { q05: quantile(&volumes, 0.05), q95: quantile(&volumes, 0.95) },
                volume_share: volume_share.map(|share| share.value),
                volume_share_resampled: volume_share.and_then(Ranged::range),
                bands: at_risk,
            }
        });
        Some(Self { levels: levels.collect() })
    }
}

fn resampled_median(of_realizations: &[f64], resamples: &Resamples) -> Ranged {
    let ranked = Ranked::new(of_realizations.iter().copied().zip(0..));
    let median = |weights: &[u32]| ranked.quantiles(weights, [0.5]).map(|[median]| median);
    Ranged::new(quantile(&sorted(of_realizations.iter().copied()), 0.5), resamples.each(median))
}

#[cfg(test)]
mod tests {
    use super::super::places::tests::bands_at;
    use super::*;
    use ndarray::array;

    /// By hand: bands of 10 km2 with winters at +1, -1 and -3 degC. With +2 degC the second is at risk, with +4 the second and the
    /// third; +1 warms the second to 0 degC, which is not above. 100 mm on 10 km2 are 1 hm3.
    #[test]
    fn bands_at_risk_by_hand() {
        let bands = bands_at(&[1000.0, 1300.0, 1600.0]);
        let swe_mm = array![[0.0, 0.0], [100.0, 120.0], [300.0, 280.0]];
        let levels_c = [0.0, 1.0, 2.0, 4.0];
        let winter: Vec<Vec<f64>> = levels_c.iter().map(|c| vec![1.0 + c, -1.0 + c, -3.0 + c]).collect();
        let found = AtRisk::of(&bands, &swe_mm.view(), &winter, &levels_c, 0, &Resamples::new(1, 2))
            .expect("winters");
        let bands: Vec<&[usize]> = found.levels.iter().map(|level| level.bands.as_slice()).collect();
        assert_eq!(bands, [&[][..], &[1], &[1, 2]]);
        let two = &found.levels[1];
        // Medians of two are their means: 110 mm, and of shares of 0.25 and 0.3; resamples of two hold one of them twice in half of
        // the cases, a quarter each, so that both ends of the range are these.
        assert!((two.area_km2 - 10.0).abs() < 1e-12 && (two.volume_hm3 - 1.1).abs() < 1e-12);
        assert!((two.volume_share.expect("snow") - 0.275).abs() < 1e-12);
        let near = |range: Option<Range>, low: f64, high: f64| {
            let range = range.expect("resamples");
            (range.q05 - low).abs() < 1e-12 && (range.q95 - high).abs() < 1e-12
        };
        assert!(near(two.volume_resampled_hm3, 1.0, 1.2), "{two:?}");
        assert!(near(two.volume_share_resampled, 0.25, 0.3), "{two:?}");
        assert_eq!(found.levels[0].volume_hm3, 0.0);
    }
}
