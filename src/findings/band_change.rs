//! Change by band, with its sign: which elevations lose, which gain, and which most.

use super::answer::BandFindings;
use super::quantile::{quantile, sorted};
use super::record_range::Range;
use super::resample::Estimate;
use crate::units::cubic_hectometres;
use ndarray::{ArrayView2, ArrayView3, Axis};
use serde::Serialize;

/// What every band does at one level.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct BandChangeLevel {
    /// The level, degC.
    pub level_c: f64,
    /// One entry a band, from the lowest; none where no realization has both values.
    pub bands: Vec<Option<BandChange>>,
    /// The band that loses most depth, from the lowest, 0; none where none loses.
    pub loses_most_mm: Option<usize>,
    /// The band that loses most of its own, among those with a percentage.
    pub loses_most_pct: Option<usize>,
    /// The band that loses most volume.
    pub loses_most_hm3: Option<usize>,
}

/// The paired change of a band's headline SWE from the reference.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct BandChange {
    /// Median over realizations, mm.
    pub median_mm: Estimate,
    /// 5-95 % over realizations, mm.
    pub range_mm: Range,
    /// The median as a percentage of the reference's median; none where that is small.
    pub percent: Option<f64>,
    /// 5-95 % of each realization's change as a percentage of its own reference; none where one has no snow there, or the median has
    /// no percentage.
    pub range_pct: Option<Range>,
    /// The median as a volume, hm3.
    pub median_hm3: f64,
    /// The range as a volume, hm3.
    pub range_hm3: Range,
    /// Whether the band loses or gains.
    pub sign: Sign,
}

/// Whether a band loses or gains.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
#[serde(rename_all = "snake_case")]
pub enum Sign {
    /// The whole range lies below 0.
    Loses,
    /// The whole range lies above 0.
    Gains,
    /// The range holds 0.
    CannotTell,
}

impl BandChangeLevel {
    /// Every level but the reference; `swe_mm` are period values of the headline measure, `[level][band][realization]`.
    pub(super) fn all(
        bands: &[BandFindings],
        swe_mm: &ArrayView3<'_, f64>,
        levels_c: &[f64],
        reference: usize,
    ) -> Vec<Self> {
        let others = levels_c.iter().enumerate().filter(|(level, _)| *level != reference);
        others.map(|(level, level_c)| Self::at(bands, swe_mm, level, *level_c, reference)).collect()
    }

    fn at(
        bands: &[BandFindings],
        swe_mm: &ArrayView3<'_, f64>,
        level: usize,
        level_c: f64,
        reference: usize,
    ) -> Self {
        let changes: Vec<Option<BandChange>> = bands
            .iter()
            .enumerate()
            .map(|(at, band)| BandChange::of(band, &swe_mm.index_axis(Axis(1), at), level, reference))
            .collect();
        let loses_most = |of: fn(&BandChange) -> Option<f64>| {
            let losses =
                changes.iter().enumerate().filter_map(|(band, change)| Some((band, of(change.as_ref()?)?)));
            let most = losses.filter(|(_, change)| *change < 0.0).min_by(|a, b| a.1.total_cmp(&b.1));
            most.map(|(band, _)| band)
        };
        Self {
            level_c,
            loses_most_mm: loses_most(|change| Some(change.median_mm.value)),
            loses_most_pct: loses_most(|change| change.percent),
            loses_most_hm3: loses_most(|change| Some(change.median_hm3)),
            bands: changes,
        }
    }

    /// The bands of a sign, from the lowest.
    pub fn of_sign(&self, sign: Sign) -> Vec<usize> {
        let bands = self.bands.iter().enumerate();
        bands.filter_map(|(band, change)| (change.as_ref()?.sign == sign).then_some(band)).collect()
    }
}

impl BandChange {
    fn of(
        of_band: &BandFindings,
        swe_mm: &ArrayView2<'_, f64>,
        level: usize,
        reference: usize,
    ) -> Option<Self> {
        let headline = of_band.measures.first()?;
        let found = headline.levels.get(level)?;
        let shift = found.shift?;
        let volume = |mm: f64| cubic_hectometres(mm, of_band.band.area_km2);
        let range_mm = Range { q05: shift.q05, q95: shift.q95 };
        let own_pct =
            |(before, after): (&f64, &f64)| (*before > 0.0).then(|| 100.0 * (after - before) / before);
        let (before, after) = (swe_mm.row(reference), swe_mm.row(level));
        let all_pct: Option<Vec<f64>> = before.iter().zip(after.iter()).map(own_pct).collect();
        let range_pct = all_pct.filter(|_| found.percent_change.is_some()).map(|all_pct| {
            let all_pct = sorted(all_pct);
            Range { q05: quantile(&all_pct, 0.05), q95: quantile(&all_pct, 0.95) }
        });
        Some(Self {
            median_mm: shift.median,
            range_mm,
            percent: found.percent_change,
            range_pct,
            median_hm3: volume(shift.median.value),
            range_hm3: range_mm.map(volume),
            sign: Sign::of(range_mm),
        })
    }
}

impl Sign {
    /// `loses`, `gains`, `cannot tell`.
    pub fn word(self) -> &'static str {
        match self {
            Self::Loses => "loses",
            Self::Gains => "gains",
            Self::CannotTell => "cannot tell",
        }
    }

    /// That of the 5-95 % range of a band's paired changes.
    pub fn of(range: Range) -> Self {
        if range.q95 < 0.0 {
            Self::Loses
        } else if range.q05 > 0.0 {
            Self::Gains
        } else {
            Self::CannotTell
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_range_that_holds_nothing_cannot_tell() {
        let of = |q05, q95| Sign::of(Range { q05, q95 });
        assert_eq!(of(-5.0, -1.0), Sign::Loses);
        assert_eq!(of(1.0, 5.0), Sign::Gains);
        assert_eq!(of(-1.0, 5.0), Sign::CannotTell);
        assert_eq!(of(-1.0, 0.0), Sign::CannotTell);
    }
}
