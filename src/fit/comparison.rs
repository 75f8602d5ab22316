//! A site's years together: scores over all readings, and mean errors of peak, surveys and melt-out.

use super::scores::{KlingGupta, Pair, kling_gupta, nash_sutcliffe};
use super::year::{ComparedYear, DayPair};
use crate::calendar::MonthDay;
use crate::observed::{Counts, Kind};
use crate::season::LEAST_PEAK_MM;
use serde::Serialize;

/// Observed snow of a site against the model at its elevation. Errors are modelled less observed: above 0 the model has
/// more snow, or keeps it longer.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Comparison {
    /// The site's name.
    pub site: String,
    /// Its elevation, m.
    pub elevation_m: f64,
    /// How it is observed.
    pub kind: Kind,
    /// What its file holds.
    pub file: Counts,
    /// Readings in the water years in use: those that are compared.
    pub readings_compared: usize,
    /// Nash-Sutcliffe efficiency over all of them, days without snow included.
    pub nash_sutcliffe: Option<f64>,
    /// Of the readings compared, those on which observed or modelled SWE is above 0.
    pub readings_with_snow: usize,
    /// Kling-Gupta efficiency over these.
    pub kling_gupta: Option<KlingGupta>,
    /// Peak SWE; of a pillow's whole years.
    pub peak: Option<Bias>,
    /// One entry a survey date.
    pub surveys: Vec<SurveyBias>,
    /// Melt-out; of a pillow's whole years in which both have a date.
    pub melt_out: Option<DateError>,
    /// The water years with a reading.
    pub by_year: Vec<ComparedYear>,
}

/// Means over the same years, and how far they are apart.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Bias {
    /// Years.
    pub years: usize,
    /// Mean observed, mm.
    pub observed_mm: f64,
    /// Mean modelled, mm.
    pub modelled_mm: f64,
    /// 100 * (modelled - observed) / observed, percent; none where the observed mean is below 10 mm. Some authors give
    /// the bias with the other sign.
    pub bias_pct: Option<f64>,
}

/// The bias on a survey date.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct SurveyBias {
    /// The survey date.
    pub survey: MonthDay,
    /// The bias; none without a survey.
    #[serde(flatten)]
    pub bias: Option<Bias>,
}

/// Errors of a date.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct DateError {
    /// Years.
    pub years: usize,
    /// Mean error, days; above 0 the model is late.
    pub mean_days: f64,
    /// Mean size of the error, days.
    pub mean_size_days: f64,
}

/// What a comparison is about.
pub(super) struct About {
    pub site: String,
    pub elevation_m: f64,
    pub kind: Kind,
    pub file: Counts,
}

impl Comparison {
    /// Puts a site's years together.
    pub(super) fn of(about: About, by_year: Vec<ComparedYear>, survey_dates: &[MonthDay]) -> Self {
        let pairs: Vec<Pair> =
            by_year.iter().flat_map(|year| year.days.iter().filter_map(DayPair::pair)).collect();
        let with_snow: Vec<Pair> =
            pairs.iter().filter(|pair| pair.observed > 0.0 || pair.modelled > 0.0).copied().collect();
        let peaks = by_year.iter().filter_map(|year| year.observed_peak_mm.zip(year.modelled_peak_mm));
        let surveys = survey_dates.iter().enumerate().map(|(at, survey)| {
            let pairs = by_year.iter().filter_map(|year| year.surveys[at]);
            SurveyBias {
                survey: *survey,
                bias: Bias::of(pairs.map(|pair| (pair.observed_mm, pair.modelled_mm))),
            }
        });
        let melt_outs = by_year.iter().filter_map(|year| {
            Some(year.modelled_melt_out_day.value()? - year.observed_melt_out_day.value()?)
        });
        Self {
            site: about.site,
            elevation_m: about.elevation_m,
            kind: about.kind,
            file: about.file,
            readings_compared: pairs.len(),
            nash_sutcliffe: nash_sutcliffe(&pairs),
            readings_with_snow: with_snow.len(),
            kling_gupta: kling_gupta(&with_snow),
            peak: Bias::of(peaks),
            surveys: surveys.collect(),
            melt_out: DateError::of(&melt_outs.collect::<Vec<f64>>()),
            by_year,
        }
    }

    /// The same of some of the years.
    pub fn of_years(&self, is_in: impl Fn(i32) -> bool) -> Self {
        let about = About {
            site: self.site.clone(),
            elevation_m: self.elevation_m,
            kind: self.kind,
            file: self.file,
        };
        let by_year = self.by_year.iter().filter(|year| is_in(year.water_year)).cloned().collect();
        let survey_dates: Vec<MonthDay> = self.surveys.iter().map(|survey| survey.survey).collect();
        Self::of(about, by_year, &survey_dates)
    }
}

impl Bias {
    /// Of observed and modelled amounts; none without any.
    fn of(amounts: impl Iterator<Item = (f64, f64)>) -> Option<Self> {
        let (mut years, mut observed, mut modelled) = (0, 0.0, 0.0);
        for (o, m) in amounts {
            (years, observed, modelled) = (years + 1, observed + o, modelled + m);
        }
        let [observed_mm, modelled_mm] = [observed, modelled].map(|sum| sum / years as f64);
        let bias_pct =
            (observed_mm >= LEAST_PEAK_MM).then(|| 100.0 * (modelled_mm - observed_mm) / observed_mm);
        (years > 0).then_some(Self { years, observed_mm, modelled_mm, bias_pct })
    }
}

impl DateError {
    fn of(errors: &[f64]) -> Option<Self> {
        let years = errors.len();
        let mean = |sum: f64| sum / years as f64;
        (years > 0).then(|| Self {
            years,
            mean_days: mean(errors.iter().sum()),
            mean_size_days: mean(errors.iter().map(|error| error.abs()).sum()),
        })
    }
}
