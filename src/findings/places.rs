//! Where and in which years snow is lost: what is asked of bands and of single years together.

use super::answer::Findings;
use super::at_risk::AtRisk;
use super::band_change::BandChangeLevel;
use super::coincidence::Coincidence;
use super::crossover::Crossover;
use super::elevations::Row;
use super::ranged::RANGE_METHOD;
use super::record_coincidence::RecordCoincidence;
use super::reference_years::YearValues;
use super::resample::Resamples;
use super::snow_drought::SnowDroughts;
use super::snow_line::{Grounds, SnowLine};
use crate::basin::Band;
use crate::ensemble::Seasons;
use crate::season::Measure;
use ndarray::{Array3, Axis};
use serde::Serialize;

/// What is found of places and of kinds of years.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Places {
    /// How ranges over resampled realizations are made, and what has none.
    pub method: String,
    /// Dry and warm years of the realizations; none where there is no cool season.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub coincidence: Option<Coincidence>,
    /// The same of the record's own years at the reference; whoever has run them adds it.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub record_coincidence: Option<RecordCoincidence>,
    /// Kinds of snow drought.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub snow_droughts: Option<SnowDroughts>,
    /// What decides the snow at which elevation, one entry a level.
    #[serde(skip_serializing_if = "Vec::is_empty")]
    pub crossover: Vec<Crossover>,
    /// What every band loses or gains, one entry a level beside the reference.
    pub band_change: Vec<BandChangeLevel>,
    /// The snow line and the elevation of freezing.
    pub snow_line: SnowLine,
    /// Snow in bands that stop freezing.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub at_risk: Option<AtRisk>,
}

/// What has no range, and why.
const WITHOUT_RANGE: &str = "Winter means are those of the record's years: the elevation of freezing, which bands are at risk and their \
                             area rest on no realization and have no range";

/// What is asked.
#[derive(Clone, Copy)]
pub struct PlacesQuestions<'a> {
    /// Every realization under every level.
    pub study: &'a Seasons,
    /// The bands, from the lowest.
    pub bands: &'a [Band],
    /// Seed of the study.
    pub seed: u64,
    /// Name of the measure of precipitation before the headline's date.
    pub precipitation: &'a str,
    /// Cool-season mean temperature at the station, `[level][realization][year]`, degC; none where there is no cool season.
    pub cool_mean_c: Option<&'a Array3<f64>>,
    /// Mean of the winter months over the record's years, `[level][band]`, degC.
    pub winter_mean_c: &'a [Vec<f64>],
    /// A year is low in snow below this quantile of the headline SWE of the reference's single years.
    pub low_snow_below_quantile: f64,
    /// The snow line lies where the headline SWE reaches this much, mm.
    pub snow_line_swe_mm: f64,
}

impl Places {
    /// Puts every question; `findings` are what was found of the bands. Nothing where nothing was measured.
    pub fn of(questions: &PlacesQuestions<'_>, findings: &Findings) -> Option<Self> {
        let PlacesQuestions { study, bands, winter_mean_c, .. } = *questions;
        let (levels_c, reference) = (findings.levels_c.as_slice(), findings.reference);
        let resamples = Resamples::new(questions.seed, findings.realizations);
        let rows = Row::all(bands);
        let years = |at: usize| study.basin.years.index_axis(Axis(1), at);
        let is_precipitation = |measure: &Measure| measure.name == questions.precipitation;
        let precipitation = study.basin.measures.iter().position(is_precipitation);
        study.basin.measures.first()?;
        let values = precipitation.zip(questions.cool_mean_c).map(|(precipitation, mean_c)| YearValues {
            swe_mm: years(0),
            precipitation_mm: years(precipitation),
            mean_c: mean_c.view(),
        });
        let swe_mm = study.band_periods.index_axis(Axis(2), 0);
        let grounds = Grounds { rows: &rows, swe_mm, winter_mean_c };
        let crossover = values.as_ref().map(|values| {
            Crossover::all(&rows, &study.band_headline.view(), values, levels_c, reference, &resamples)
        });
        Some(Self {
            method: format!(
                "snow_line_resampled, snow_line_rise_resampled_m_per_c, volume_resampled_hm3, volume_share_resampled and the crossover's \
                 range: {RANGE_METHOD}; of an elevation none also where that end lies outside the bands. {WITHOUT_RANGE}."
            ),
            coincidence: values.as_ref().and_then(|of| {
                Coincidence::of(of, questions.low_snow_below_quantile, levels_c, reference, &resamples)
            }),
            record_coincidence: None,
            snow_droughts: values
                .as_ref()
                .and_then(|of| SnowDroughts::of(of, levels_c, reference, &resamples)),
            crossover: crossover.unwrap_or_default(),
            band_change: BandChangeLevel::all(&findings.bands, &swe_mm, levels_c, reference),
            snow_line: SnowLine::of(&grounds, questions.snow_line_swe_mm, levels_c, reference, &resamples),
            at_risk: AtRisk::of(
                bands,
                &swe_mm.index_axis(Axis(0), reference),
                winter_mean_c,
                levels_c,
                reference,
                &resamples,
            ),
        })
    }
}

#[cfg(test)]
pub(super) mod tests {
    use crate::basin::{Band, Ground};

    /// Bands of 10 km2 at elevations, 100 m on either side.
    pub fn bands_at(elevations_m: &[f64]) -> Vec<Band> {
        let at = |elevation_m: &f64| Band {
            lower_m: elevation_m - 100.0,
            upper_m: elevation_m + 100.0,
            area_km2: 10.0,
            elevation_m: *elevation_m,
            ground: Ground::default(),
        };
        elevations_m.iter().map(at).collect()
    }
}
