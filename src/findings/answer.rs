//! Puts every question to a study's runs, measure by measure, for the basin and for each band.

use super::break_even::BreakEven;
use super::by_year::ByYear;
use super::generator_sheet::GeneratorSheet;
use super::measure::{Asked, Found, MeasureFindings};
use super::operations::Operations;
use super::parameter_spread::ParameterSpread;
use super::places::Places;
use super::record::RecordFindings;
use super::record_odds::RecordOdds;
use super::record_range::{RecordRange, Refit};
use super::resample::Resamples;
use super::rule_panel::RulePanel;
use super::surface::ResponseSurface;
use super::through_year::SweThroughYear;
use super::tipping::{Criterion, TippingLevel};
use super::warm_year_bias::WarmYearBias;
use super::yardstick::{Assumed, Levels, yardsticks};
use crate::basin::Band;
use crate::ensemble::{BasinSeasons, Halt, Seasons, Watch};
use crate::fit::Comparison;
use crate::season::{Measure, NONE, NOT_GONE, Place};
use ndarray::{ArrayView2, Axis};
use rayon::prelude::*;
use serde::Serialize;

/// What the findings need to know beside the runs.
#[derive(Debug, Clone)]
pub struct Questions<'a> {
    /// Warming levels, ascending, degC.
    pub levels_c: &'a [f64],
    /// Which of them is the reference.
    pub reference: usize,
    /// The bands, from the lowest.
    pub bands: &'a [Band],
    /// Assumed standard deviation of the change of mean precipitation, percent; 0 for none.
    pub mean_change_sd_pct: f64,
    /// What the user wants to hold.
    pub criteria: &'a [Criterion],
    /// Seed of the study, for the Monte Carlo error.
    pub seed: u64,
}

/// The runs of a study. All but the first may be missing; then what they answer is.
#[derive(Debug, Clone, Copy)]
pub struct Runs<'a> {
    /// Every realization under every level.
    pub study: &'a Seasons,
    /// The reference alone, temperatures held.
    pub temperature_held: Option<&'a Seasons>,
    /// Runs that assume another change of mean precipitation.
    pub other_changes: &'a [OtherChange],
    /// What resampled records answer.
    pub refits: &'a [Refit],
}

/// The same realizations under another assumed change of mean precipitation.
#[derive(Debug, Clone, PartialEq)]
pub struct OtherChange {
    /// How many times the study's assumption; 0 for none.
    pub times_assumed: f64,
    /// The reference alone.
    pub reference: BasinSeasons,
}

/// Everything that is found.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Findings {
    /// Warming levels, ascending, degC.
    pub levels_c: Vec<f64>,
    /// Which of them is the reference.
    pub reference: usize,
    /// Realizations.
    pub realizations: usize,
    /// Water years of a realization.
    pub years: usize,
    /// SWE of the basin through the water year.
    pub swe_through_year: SweThroughYear,
    /// How much more precipitation would make up for the warming. Found by runs of its own: whoever runs them adds it.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub break_even: Option<BreakEven>,
    /// What any warming does together with any change of precipitation. Found by runs of its own, too.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub surface: Option<ResponseSurface>,
    /// From which warming on something fails that the user wants to hold, one entry a criterion.
    #[serde(skip_serializing_if = "Vec::is_empty")]
    pub tipping_levels: Vec<TippingLevel>,
    /// How far the answer hangs on the parameters. Found by runs of its own, too.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub parameter_spread: Option<ParameterSpread>,
    /// Low-snow odds and low years in a row over resampled records; whoever has run them adds them.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub record_odds: Option<RecordOdds>,
    /// The headline under other published rules. Found by runs of its own, too.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub rule_panel: Option<RulePanel>,
    /// The model's error in warm winters beside the warming's effect; where a file of fitted parameters tells of it.
    #[serde(skip_serializing_if = "Vec::is_empty")]
    pub warm_year_biases: Vec<WarmYearBias>,
    /// What single years say: variance by averaging period, low-snow odds, worst years, runs, tails, detection. Whoever has the
    /// record's own years asks it.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub by_year: Option<ByYear>,
    /// Of the basin mean, one entry a measure, the headline's first.
    pub basin: Vec<MeasureFindings>,
    /// Of each band, from the lowest.
    pub bands: Vec<BandFindings>,
    /// What becomes of the water. Whoever knows how it is routed adds it.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub operations: Option<Operations>,
    /// Where and in which years the snow is lost. Found beside the runs: whoever has the weather adds it.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub places: Option<Places>,
    /// The model against observed snow, one entry a site. No ensemble is asked for it: whoever has it adds it.
    #[serde(skip_serializing_if = "Vec::is_empty")]
    pub comparisons: Vec<Comparison>,
    /// Whether the weather that was made looks like the record. Found by runs of its own.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub generator: Option<GeneratorSheet>,
    /// The record's own years. No ensemble is asked for them either.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub record: Option<RecordFindings>,
}

/// Findings of one band.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct BandFindings {
    /// The band.
    #[serde(flatten)]
    pub band: Band,
    /// One entry a measure.
    pub measures: Vec<MeasureFindings>,
}

/// Answers every question about every measure; `watch` is asked before each whether to stop.
///
/// # Errors
/// `watch` wanting to stop.
pub fn answer(runs: &Runs<'_>, questions: &Questions<'_>, watch: &dyn Watch) -> Result<Findings, Halt> {
    let study = runs.study;
    let measures = &study.basin.measures;
    let (_, _, realizations, years) = study.basin.years.dim();
    let resamples = Resamples::new(questions.seed, realizations);
    let levels = Levels { levels_c: questions.levels_c, reference: questions.reference };
    // Every band has every measure: their errors are known from fewer resamples than the basin's.
    let few = resamples.few();
    let asked = |of: &Asked<'_>, resamples: &Resamples| {
        if watch.wants_stop() { Err(Halt::Stopped) } else { Ok(of.find(levels, resamples)) }
    };
    let of_basin = |at: usize| {
        let found = asked(&runs.of_basin(at, questions), &resamples)?;
        Ok(runs.beside(at, found, questions, &resamples))
    };
    let basin = (0..measures.len()).into_par_iter().map(of_basin).collect::<Result<Vec<_>, Halt>>()?;
    let of_bands: Vec<Asked<'_>> = (0..questions.bands.len())
        .flat_map(|band| {
            let everywhere = |(_, measure): &(usize, &Measure)| measure.place == Place::BandsAndBasin;
            measures.iter().enumerate().filter(everywhere).map(move |(at, _)| runs.of_band(band, at))
        })
        .collect();
    let mut of_each_band =
        of_bands.par_iter().map(|of| asked(of, &few)).collect::<Result<Vec<_>, Halt>>()?.into_iter();
    let measures_of_a_band = of_bands.len() / questions.bands.len();
    let bands = questions.bands.iter().map(|band| BandFindings {
        band: *band,
        measures: of_each_band.by_ref().take(measures_of_a_band).map(|found| found.findings).collect(),
    });
    let headline_years = study.basin.years.index_axis(Axis(1), 0);
    let tipping_levels = questions.criteria.iter().map(|criterion| {
        TippingLevel::of(criterion, &headline_years, (questions.levels_c, questions.reference), &resamples)
    });
    Ok(Findings {
        levels_c: questions.levels_c.to_vec(),
        reference: questions.reference,
        realizations,
        years,
        swe_through_year: SweThroughYear::of(&study.swe_days, questions.levels_c),
        break_even: None,
        surface: None,
        tipping_levels: tipping_levels.collect(),
        parameter_spread: None,
        record_odds: None,
        rule_panel: None,
        warm_year_biases: Vec::new(),
        by_year: None,
        basin,
        bands: bands.collect(),
        operations: None,
        places: None,
        comparisons: Vec::new(),
        generator: None,
        record: None,
    })
}

impl Questions<'_> {
    fn area_km2(&self) -> f64 {
        self.bands.iter().map(|band| band.area_km2).sum()
    }
}

impl Runs<'_> {
    fn of_basin(&self, at: usize, questions: &Questions<'_>) -> Asked<'_> {
        let basin = &self.study.basin;
        let years = basin.years.index_axis(Axis(1), at);
        let count = |level: usize, what: f64| {
            years.index_axis(Axis(0), level).iter().filter(|value| **value == what).count()
        };
        let levels = 0..years.len_of(Axis(0));
        Asked {
            measure: &basin.measures[at],
            periods: basin.periods.index_axis(Axis(1), at),
            undefined: levels.map(|level| [count(level, NONE), count(level, NOT_GONE)]).collect(),
            held: self
                .temperature_held
                .map(|held| held.basin.periods.index_axis(Axis(0), 0).index_axis_move(Axis(0), at)),
            years: Some((years, questions.area_km2())),
        }
    }

    fn of_band(&self, band: usize, at: usize) -> Asked<'_> {
        let undefined = self.study.band_undefined.index_axis(Axis(1), band);
        Asked {
            measure: &self.study.basin.measures[at],
            periods: self.study.band_periods.index_axis(Axis(1), band).index_axis_move(Axis(1), at),
            undefined: undefined
                .index_axis(Axis(1), at)
                .iter()
                .map(|count| count.map(|n| n as usize))
                .collect(),
            held: self.temperature_held.map(|held| {
                let reference = held.band_periods.index_axis(Axis(0), 0);
                reference.index_axis_move(Axis(0), band).index_axis_move(Axis(0), at)
            }),
            years: None,
        }
    }

    /// Adds what stands beside a basin measure's findings: its yardsticks, and what other records would have answered.
    fn beside(
        &self,
        at: usize,
        found: Found,
        questions: &Questions<'_>,
        resamples: &Resamples,
    ) -> MeasureFindings {
        let levels = Levels { levels_c: questions.levels_c, reference: questions.reference };
        let Found { findings, shifts } = found;
        let of = |years: ArrayView2<'_, f64>, times_assumed: f64| {
            let mean_change_sd_pct = questions.mean_change_sd_pct * times_assumed;
            let assumed = Assumed { years, mean_change_sd_pct, times_assumed };
            yardsticks(findings.measure.kind, assumed, &shifts, levels, resamples)
        };
        let years = self.study.basin.years.index_axis(Axis(1), at);
        let mut all = of(years.index_axis_move(Axis(0), questions.reference), 1.0);
        for other in self.other_changes {
            let years = other.reference.years.index_axis(Axis(0), 0);
            all.extend(of(years.index_axis_move(Axis(0), at), other.times_assumed));
        }
        let record_range = RecordRange::of(self.refits, at, questions.levels_c, questions.area_km2());
        MeasureFindings { yardsticks: all, record_range, ..findings }
    }
}
