//! Change by band, with its sign: which elevations lose, which gain, and which most.

use super::answer::BandFindings;
use super::record_range::Range;
use super::resample::Estimate;
use crate::units::cubic_hectometres;
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
    /// The same range as percentages.
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
    /// Every level but the reference.
    pub(super) fn all(bands: &[BandFindings], levels_c: &[f64], reference: usize) -> Vec<Self> {
        let others = levels_c.iter().enumerate().filter(|(level, _)| *level != reference);
        others.map(|(level, level_c)| Self::at(bands, level, *level_c, reference)).collect()
    }

    fn at(bands: &[BandFindings], level: usize, level_c: f64, reference: usize) -> Self {
        let changes: Vec<Option<BandChange>> =
            bands.iter().map(|band| BandChange::of(band, level, reference)).collect();
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
    fn of(of_band: &BandFindings, level: usize, reference: usize) -> Option<Self> {
        let headline = of_band.measures.first()?;
        let found = headline.levels.get(level)?;
        let shift = found.shift?;
        let median_mm = headline.levels.get(reference)?.periods.q50.value();
        let volume = |mm: f64| cubic_hectometres(mm, of_band.band.area_km2);
        let range_mm = Range { q05: shift.q05, q95: shift.q95 };
        let percent_of = median_mm.filter(|_| found.percent_change.is_some());
        let range_pct = percent_of.map(|of| range_mm.map(|mm| 100.0 * mm / of));
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
    fn of(range: Range) -> Self {
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
