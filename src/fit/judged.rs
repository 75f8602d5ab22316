//! A set of parameters judged on some of the years, site by site, by what a site's years together are told by.

use super::comparison::{Bias, Comparison, DateError};
use super::day_of_year_mean::skill;
use super::parameter::Parameters;
use super::scores::KlingGupta;
use super::site::{Model, Site, compare};
use super::slope::Slope;
use super::splits::Winter;
use super::year::ComparedYear;
use crate::basin::Basin;
use crate::season::SeasonSettings;
use crate::snow::{OpenLedger, StationPhase, correct_catch};
use crate::weather::Series;
use serde::Serialize;

/// What is fitted, and what it is held against.
#[derive(Debug, Clone, Copy)]
pub struct Held<'a> {
    /// Sites with observed snow.
    pub sites: &'a [Site<'a>],
    /// The years in use, precipitation as the gauge caught it.
    pub weather: &'a Series,
    /// The basin.
    pub basin: &'a Basin,
    /// Elevation of the weather station, m.
    pub station_m: f64,
    /// Dates.
    pub season: &'a SeasonSettings,
}

impl Held<'_> {
    /// The sites' years under some parameters.
    ///
    /// # Errors
    /// A ledger that does not close.
    pub(super) fn compared(&self, parameters: &Parameters) -> Result<Vec<Comparison>, OpenLedger> {
        let mut weather = self.weather.clone();
        correct_catch(&mut weather, parameters.gauge, StationPhase::of(&parameters.snow, self.station_m));
        let basin = Basin {
            temperature: parameters.temperature.clone(),
            precipitation: parameters.precipitation,
            ..self.basin.clone()
        };
        let model = Model {
            basin: &basin,
            station_m: self.station_m,
            snow: &parameters.snow,
            weather: &weather,
            season: self.season,
        };
        compare(self.sites, &model)
    }
}

/// A site's scores over some of its years. Errors are modelled less observed.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Judged {
    /// The site.
    pub site: String,
    /// Years with a reading.
    pub years: usize,
    /// Nash-Sutcliffe efficiency over all readings.
    pub nash_sutcliffe: Option<f64>,
    /// Kling-Gupta efficiency over the readings on which snow was observed or modelled.
    pub kling_gupta: Option<KlingGupta>,
    /// Skill above the mean of the other years on the same day.
    pub skill_above_mean: Option<f64>,
    /// Peak SWE.
    pub peak: Option<Bias>,
    /// Standard error of its bias, percent of the mean observed: how far the mean of so few winters may be off by chance.
    pub peak_standard_error_pct: Option<f64>,
    /// SWE on the first survey date.
    pub survey: Option<Bias>,
    /// Standard error of its bias, likewise.
    pub survey_standard_error_pct: Option<f64>,
    /// Melt-out.
    pub melt_out: Option<DateError>,
    /// Error of SWE on the first survey date, mm, by mean temperature of the winter, degC: 0 where the model answers to a
    /// warmer winter as snow does.
    pub survey_error_by_winter_mm_per_c: Option<Slope>,
}

impl Judged {
    /// Slope of the error of survey SWE on the winter's temperature, and its standard error, percent of mean observed survey
    /// SWE per degC; none without a slope, and where that mean is below 10 mm.
    pub fn survey_error_by_winter_pct_per_c(&self) -> Option<[f64; 2]> {
        let (slope, survey) = self.survey_error_by_winter_mm_per_c.zip(self.survey)?;
        survey.bias_pct.map(|_| [slope.slope, slope.standard_error].map(|mm| 100.0 * mm / survey.observed_mm))
    }

    /// A site's years that are judged.
    pub(super) fn of(comparison: &Comparison, winters: &[Winter], is_judged: &[bool]) -> Self {
        let judged: Vec<&Winter> =
            winters.iter().zip(is_judged).filter(|(_, is_in)| **is_in).map(|(winter, _)| winter).collect();
        let winter_of = |water_year: i32| judged.iter().find(|winter| winter.water_year == water_year);
        let part = comparison.of_years(|water_year| winter_of(water_year).is_some());
        let pairs: Vec<(f64, f64)> = part
            .by_year
            .iter()
            .filter_map(|year| {
                let survey = year.surveys[0]?;
                Some((winter_of(year.water_year)?.mean_c, survey.modelled_mm - survey.observed_mm))
            })
            .collect();
        Self {
            site: part.site.clone(),
            years: part.by_year.len(),
            nash_sutcliffe: part.nash_sutcliffe,
            kling_gupta: part.kling_gupta,
            skill_above_mean: skill(&comparison.by_year, |water_year| winter_of(water_year).is_some()),
            peak: part.peak,
            peak_standard_error_pct: standard_error_pct(part.peak, part.by_year.iter().filter_map(peak)),
            survey_standard_error_pct: standard_error_pct(
                part.surveys[0].bias,
                part.by_year
                    .iter()
                    .filter_map(|year| year.surveys[0])
                    .map(|it| (it.observed_mm, it.modelled_mm)),
            ),
            survey: part.surveys[0].bias,
            melt_out: part.melt_out,
            survey_error_by_winter_mm_per_c: Slope::of(&pairs),
        }
    }
}

fn peak(year: &ComparedYear) -> Option<(f64, f64)> {
    year.observed_peak_mm.zip(year.modelled_peak_mm)
}

/// `100 * sd(modelled - observed) / sqrt(n) / mean(observed)` over the years of a bias in percent, years taken as independent;
/// none of fewer than three.
fn standard_error_pct(bias: Option<Bias>, years: impl Iterator<Item = (f64, f64)>) -> Option<f64> {
    let bias = bias.filter(|bias| bias.bias_pct.is_some() && bias.years >= 3)?;
    let mean_mm = bias.modelled_mm - bias.observed_mm;
    let squares =
        years.map(|(observed_mm, modelled_mm)| modelled_mm - observed_mm - mean_mm).map(|off| off * off);
    let n = bias.years as f64;
    Some(100.0 * (squares.sum::<f64>() / (n - 1.0) / n).sqrt() / bias.observed_mm)
}

#[cfg(test)]
mod tests {
    use super::*;

    /// By hand: observed 100, 200, 300, modelled 110, 190, 330: errors 10, -10, 30, mean 10, deviations 0, -20, 20, variance 400,
    /// standard error 20/sqrt(3) = 11.547 mm of a mean of 200 mm: 5.7735 %. Rounding only.
    #[test]
    fn standard_error_of_a_bias_by_hand() {
        let bias = |years| Bias { years, observed_mm: 200.0, modelled_mm: 210.0, bias_pct: Some(5.0) };
        let years = [(100.0, 110.0), (200.0, 190.0), (300.0, 330.0)];
        let error = standard_error_pct(Some(bias(3)), years.into_iter()).expect("three years");
        assert!((error - 5.773_502_691_896_258).abs() < 1e-12, "{error}");
        assert_eq!(standard_error_pct(Some(bias(2)), years.into_iter().take(2)), None);
    }
}
