//! How good a trial is: one number from its sums over the years of a split.
//!
//! The default is the Nash-Sutcliffe efficiency: it is smooth, and over eight mountain stations fits by it kept more skill, and
//! lost less of the peak, in winters that they had not seen. The other is a Kling-Gupta efficiency over the days on which snow
//! was observed or modelled, less the relative errors of mean peak and mean survey SWE and the error of melt-out.

use super::sums::Sums;

/// Days of melt-out error that weigh as much as an efficiency of 1.
const MELT_OUT_DAYS: f64 = 60.0;

/// What is made as large as it can be.
#[derive(Debug, Clone, Copy, PartialEq, Eq, serde::Serialize)]
#[serde(rename_all = "kebab-case")]
pub enum Objective {
    /// Kling-Gupta efficiency less the relative errors of peak and survey SWE, and of melt-out.
    Season,
    /// Nash-Sutcliffe efficiency over all readings.
    NashSutcliffe,
}

impl Objective {
    /// Its value; higher is better and 1 is the best there can be. None where nothing was observed.
    pub(super) fn value(self, sums: &Sums) -> Option<f64> {
        match self {
            Self::Season => {
                let of_days = sums.kling_gupta()?;
                let of_melt_out = sums.melt_out_error_days().map_or(0.0, |days| days / MELT_OUT_DAYS);
                let peak = sums.peak_error().map_or(0.0, f64::abs);
                let survey = sums.survey_error().map_or(0.0, f64::abs);
                Some(of_days - peak - survey - of_melt_out)
            }
            Self::NashSutcliffe => sums.nash_sutcliffe(),
        }
    }
}
