//! Sums over readings and years from which every score of a trial is made.

use super::held_against::ObservedYear;
use crate::season::{BARE_MM, LEAST_PEAK_MM, SAME_SWE_MM};
use crate::snow::YearBlock;
use std::ops::AddAssign;

/// Sums of one trial at one site. Means that are compared are of the same years or readings.
#[derive(Debug, Clone, Copy, Default, PartialEq)]
pub(super) struct Sums {
    readings: f64,
    /// Of them, those on which snow was observed or modelled.
    with_snow: f64,
    observed: f64,
    modelled: f64,
    observed_squares: f64,
    modelled_squares: f64,
    products: f64,
    observed_peaks_mm: f64,
    modelled_peaks_mm: f64,
    observed_surveys_mm: f64,
    modelled_surveys_mm: f64,
    melt_outs: f64,
    melt_out_errors_days: f64,
}

impl AddAssign for Sums {
    fn add_assign(&mut self, more: Self) {
        self.readings += more.readings;
        self.with_snow += more.with_snow;
        self.observed += more.observed;
        self.modelled += more.modelled;
        self.observed_squares += more.observed_squares;
        self.modelled_squares += more.modelled_squares;
        self.products += more.products;
        self.observed_peaks_mm += more.observed_peaks_mm;
        self.modelled_peaks_mm += more.modelled_peaks_mm;
        self.observed_surveys_mm += more.observed_surveys_mm;
        self.modelled_surveys_mm += more.modelled_surveys_mm;
        self.melt_outs += more.melt_outs;
        self.melt_out_errors_days += more.melt_out_errors_days;
    }
}

impl Sums {
    /// Nash-Sutcliffe efficiency over all readings; none where all observed values are the same.
    pub fn nash_sutcliffe(&self) -> Option<f64> {
        let errors = self.modelled_squares - 2.0 * self.products + self.observed_squares;
        let spread = self.observed_squares - self.observed * self.observed / self.readings;
        (self.readings >= 2.0 && spread > 0.0).then(|| 1.0 - errors / spread)
    }

    /// Kling-Gupta efficiency (Gupta et al. 2009) over the readings with snow; none where all observed values are the same.
    /// Where all modelled values are the same the correlation is taken as 0.
    pub fn kling_gupta(&self) -> Option<f64> {
        let n = self.with_snow;
        let of = |squares: f64, sum: f64| squares - sum * sum / n;
        let observed = of(self.observed_squares, self.observed);
        let modelled = of(self.modelled_squares, self.modelled).max(0.0);
        if n < 2.0 || observed <= 0.0 {
            return None;
        }
        let both = self.products - self.observed * self.modelled / n;
        let correlation = if modelled > 0.0 { both / (observed * modelled).sqrt() } else { 0.0 };
        let (alpha, beta) = ((modelled / observed).sqrt(), self.modelled / self.observed);
        let squares = (correlation - 1.0) * (correlation - 1.0)
            + (alpha - 1.0) * (alpha - 1.0)
            + (beta - 1.0) * (beta - 1.0);
        Some(1.0 - squares.sqrt())
    }

    /// Relative error of the mean peak: (modelled - observed)/observed.
    pub fn peak_error(&self) -> Option<f64> {
        relative(self.modelled_peaks_mm, self.observed_peaks_mm)
    }

    /// The same of survey SWE.
    pub fn survey_error(&self) -> Option<f64> {
        relative(self.modelled_surveys_mm, self.observed_surveys_mm)
    }

    /// Mean size of the error of melt-out, days.
    pub fn melt_out_error_days(&self) -> Option<f64> {
        (self.melt_outs > 0.0).then(|| self.melt_out_errors_days / self.melt_outs)
    }
}

fn relative(modelled: f64, observed: f64) -> Option<f64> {
    (observed > 0.0).then(|| modelled / observed - 1.0)
}

/// Sums of a year at a site, of every trial: `column` is that of the first, the others stand beside it.
pub(super) fn sums_of_year(
    block: &YearBlock,
    column: usize,
    trials: usize,
    observed: &ObservedYear,
) -> Vec<Sums> {
    let row = |day: usize| &block.row(&block.swe_mm, day)[column..column + trials];
    let mut sums = vec![Sums::default(); trials];
    for (day, observed_mm) in &observed.readings {
        let is_snow = if *observed_mm > 0.0 { 1.0 } else { 0.0 };
        for (sums, modelled_mm) in sums.iter_mut().zip(row(*day)) {
            sums.readings += 1.0;
            sums.with_snow += if *modelled_mm > 0.0 { 1.0 } else { is_snow };
            sums.observed += observed_mm;
            sums.observed_squares += observed_mm * observed_mm;
            sums.modelled += modelled_mm;
            sums.modelled_squares += modelled_mm * modelled_mm;
            sums.products += modelled_mm * observed_mm;
        }
    }
    if let Some((day, observed_mm)) = observed.survey {
        for (sums, modelled_mm) in sums.iter_mut().zip(row(day)) {
            sums.observed_surveys_mm = observed_mm;
            sums.modelled_surveys_mm = *modelled_mm;
        }
    }
    if let Some(observed_peak_mm) = observed.peak_mm {
        let mut peaks_mm = vec![0.0; trials];
        let mut melt_outs = vec![0.0; trials];
        for day in 0..block.days {
            for ((peak_mm, melt_out), modelled_mm) in peaks_mm.iter_mut().zip(&mut melt_outs).zip(row(day)) {
                if *modelled_mm > *peak_mm + SAME_SWE_MM {
                    (*peak_mm, *melt_out) = (*modelled_mm, block.days as f64);
                }
                if *modelled_mm < BARE_MM {
                    *melt_out = melt_out.min(day as f64);
                }
            }
        }
        for (sums, (peak_mm, melt_out)) in sums.iter_mut().zip(peaks_mm.iter().zip(&melt_outs)) {
            sums.observed_peaks_mm = observed_peak_mm;
            sums.modelled_peaks_mm = *peak_mm;
            if let Some(observed_day) = observed.melt_out
                && *peak_mm >= LEAST_PEAK_MM
            {
                sums.melt_outs = 1.0;
                sums.melt_out_errors_days = (melt_out - observed_day as f64).abs();
            }
        }
    }
    sums
}

#[cfg(test)]
mod tests;
