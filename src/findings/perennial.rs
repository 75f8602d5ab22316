//! Bands that carry snow through the water year's end at the reference.

use super::Findings;
use crate::season::MELT_OUT_DAY;

/// A band whose snow did not go in some of the reference's years.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct PerennialBand {
    /// The band, from the lowest, 0.
    pub band: usize,
    /// Years in which it lay from its peak to the year's end.
    pub years_not_gone: usize,
    /// Years of all realizations.
    pub years: usize,
}

impl Findings {
    /// The bands that carry snow through the water year's end in any year of the reference, from the lowest up.
    pub fn perennial_bands(&self) -> Vec<PerennialBand> {
        let not_gone = |band: &super::BandFindings| {
            let melt_out = band.measures.iter().find(|measure| measure.measure.name == MELT_OUT_DAY)?;
            Some(melt_out.levels.get(self.reference)?.years_undefined[1])
        };
        let years = self.realizations * self.years;
        let bands = self.bands.iter().enumerate();
        let perennial = bands.filter_map(|(band, of_band)| {
            let years_not_gone = not_gone(of_band).filter(|years| *years > 0)?;
            Some(PerennialBand { band, years_not_gone, years })
        });
        perennial.collect()
    }
}
