//! The scenario: what was typed becomes the plain types that the rooms below own and check.
//!
//! `document` parses the text and remembers where every key stands; `section`, `numbers` and `texts` read typed values and collect every
//! fault and every default in force; one file a table of the scenario; `draw` shows faults in their place. Only `cli`
//! imports this room.

mod as_typed;
mod basin;
mod days;
mod degrees;
mod document;
mod draw;
mod elevation;
mod findings;
mod fit;
mod fitted;
mod format;
mod hypsometry;
mod inflow;
mod levels;
mod nearest;
mod notes;
mod numbers;
mod observed;
mod parameter_sets;
mod precipitation_change;
mod realizations;
mod report;
mod reservoir;
mod season;
mod section;
mod snow;
mod snow_options;
mod temperature_gradient;
mod texts;
mod volumes;
mod warming;
mod weather;

pub use basin::BasinTyped;
pub use document::Document;
pub use draw::{Drawing, Located, draw, located, unlikely_lines};
pub use findings::{
    FindingsTyped, PROJECTIONS_KEY, REPLAYED_YEARS_KEY, RULE_PANEL_REALIZATIONS_KEY, ReplayedYearsTyped,
    RulePanelTyped, SurfaceTyped, read_projections,
};
pub use fit::FitTyped;
pub use fitted::{FITTED_KEY, Fitted, read_fitted};
pub use hypsometry::HypsometryTyped;
pub use inflow::{InflowTyped, OBSERVED_INFLOW_KEY, ObservedInflowTyped};
pub use observed::ObservedTyped;
pub use parameter_sets::{PARAMETER_SETS_KEY, ParameterSets, ParameterSetsTyped, read_parameter_sets};
pub use realizations::RealizationsTyped;
pub use report::ReportTyped;
pub use reservoir::ReservoirTyped;
pub use warming::WarmingTyped;
pub use weather::{RecordSource, WeatherTyped};

use crate::defaults::DefaultInForce;
use crate::fault::{Fault, Unlikely};
use crate::fit::Parameters;
use crate::season::SeasonSettings;
use crate::snow::SnowParams;
use notes::Notes;
use section::Section;

/// A title is one line.
const LONGEST_TITLE: usize = 1000;

/// Everything a scenario says, checked.
#[derive(Debug, Clone)]
pub struct Scenario {
    /// The study's title.
    pub title: String,
    /// Seed of every random number.
    pub seed: u64,
    /// The basin, but for its bands.
    pub basin: BasinTyped,
    /// The station's file and how to read it.
    pub weather: WeatherTyped,
    /// Dates and windows.
    pub season: SeasonSettings,
    /// Snow parameters.
    pub snow: SnowParams,
    /// Warming levels.
    pub warming: WarmingTyped,
    /// Realizations.
    pub realizations: RealizationsTyped,
    /// How results are told.
    pub report: ReportTyped,
    /// Sites with observed snow.
    pub observed: Vec<ObservedTyped>,
    /// How the model is fitted to it.
    pub fit: FitTyped,
    /// What is asked beside the headline.
    pub findings: FindingsTyped,
    /// How water input becomes inflow, where that is asked.
    pub inflow: Option<InflowTyped>,
    /// What it flows into, where that is asked.
    pub reservoir: Option<ReservoirTyped>,
}

/// What could be read of a scenario, part by part: a part with a fault is missing, the others can still be used to look
/// for more faults in the files they name.
#[derive(Debug)]
pub struct Draft {
    /// The title.
    pub title: Option<String>,
    /// The seed.
    pub seed: u64,
    /// Data files that the scenario names, each with its key, also where the table around it has a fault.
    pub named_files: Vec<(String, String)>,
    /// The file of the bands, also where another key of `[basin]` has a fault.
    pub hypsometry: Option<HypsometryTyped>,
    /// `[basin]`.
    pub basin: Option<BasinTyped>,
    /// The station's file, also where another key of `[weather]` has a fault.
    pub record_source: Option<RecordSource>,
    /// `[weather]`.
    pub weather: Option<WeatherTyped>,
    /// `[season]`.
    pub season: Option<SeasonSettings>,
    /// `[snow]`.
    pub snow: Option<SnowParams>,
    /// The file of fitted parameters, as typed.
    pub fitted_file: Option<String>,
    /// Sets of parameters that a study runs beside its own.
    pub parameter_sets: Option<ParameterSetsTyped>,
    /// `[warming]`.
    pub warming: Option<WarmingTyped>,
    /// `[realizations]`.
    pub realizations: Option<RealizationsTyped>,
    /// `[report]`.
    pub report: Option<ReportTyped>,
    /// `[[observed_swe]]`, a site each.
    pub observed: Vec<Option<ObservedTyped>>,
    /// `[fit]`.
    pub fit: Option<FitTyped>,
    /// The file of projections, also where another key of `[findings]` has a fault.
    pub projections_file: Option<String>,
    /// `[findings]`, a table a question.
    pub findings: Option<FindingsTyped>,
    /// Observed inflow, also where another key of `[inflow]` has a fault.
    pub observed_inflow: Option<ObservedInflowTyped>,
    /// `[inflow]`, where it is typed.
    pub inflow: Option<Option<InflowTyped>>,
    /// `[reservoir]`, where it is typed.
    pub reservoir: Option<Option<ReservoirTyped>>,
    /// Every fault of the text.
    pub faults: Vec<Fault>,
    /// What is allowed but unlikely.
    pub unlikely: Vec<Unlikely>,
    /// Every default that is in force.
    pub defaults: Vec<DefaultInForce>,
}

impl Draft {
    /// The whole scenario, where every part could be read.
    pub fn complete(&self) -> Option<Scenario> {
        Some(Scenario {
            title: self.title.clone()?,
            seed: self.seed,
            basin: self.basin.clone()?,
            weather: self.weather.clone()?,
            season: self.season.clone()?,
            snow: self.snow?,
            warming: self.warming.clone()?,
            realizations: self.realizations.clone()?,
            report: self.report?,
            observed: self.observed.iter().cloned().collect::<Option<_>>()?,
            fit: self.fit.clone()?,
            findings: self.findings.clone()?,
            inflow: typed_or_left_out(&self.inflow)?,
            reservoir: typed_or_left_out(&self.reservoir)?,
        })
    }
}

/// A table that was typed and read, or was left out; none where it has a fault.
fn typed_or_left_out<T: Clone>(table: &Option<Option<T>>) -> Option<Option<T>> {
    match table {
        None => Some(None),
        Some(typed) => typed.clone().map(Some),
    }
}

/// Reads a scenario and collects all its faults.
pub fn read(document: &Document<'_>) -> Draft {
    let notes = Notes::default();
    let mut top = Section::top(document, &notes);
    let title = top.required_text("title", "a name for the study", "add title = \"...\" at the top");
    if let Some(title) = &title
        && (title.chars().any(char::is_control) || title.chars().count() > LONGEST_TITLE)
    {
        top.fault(Fault::key(
            "title",
            "a title with line breaks or control signs, or a very long one",
            format!("one line of at most {LONGEST_TITLE} characters"),
            "shorten it",
        ));
    }
    let seed = top.whole_or("seed", 1, 0..=i64::MAX as u64);
    let (hypsometry, basin) = basin::read(top.required_section("basin"));
    let is_southern = basin.as_ref().is_some_and(|basin| basin.latitude_deg < 0.0);
    let (record_source, weather) = weather::read(top.required_section("weather"));
    let has_daily_range = record_source.as_ref().is_none_or(RecordSource::has_daily_range);
    let season = season::read(top.section("season"), is_southern);
    let mut snow = top.section("snow");
    let fitted_file = fitted::read(&mut snow);
    let parameter_sets = parameter_sets::read(&mut snow);
    let snow = snow::read(snow, has_daily_range, is_southern);
    let warming = warming::read(top.section("warming"));
    let realizations = realizations::read(top.section("realizations"));
    let report = report::read(top.section("report"));
    let observed = observed::read(top.sections("observed_swe"));
    // Without its table nothing of a fit is told: only `fit` itself asks for one.
    let fit = if top.has("fit") {
        let parameters = parameters(basin.as_ref(), weather.as_ref(), snow);
        fit::read(top.section("fit"), parameters.as_ref())
    } else {
        top.knows("fit");
        Some(FitTyped::default())
    };
    let (projections_file, findings) = findings::read(top.section("findings"));
    let (observed_inflow, inflow) = top
        .has("inflow")
        .then(|| inflow::read(top.section("inflow")))
        .map_or((None, None), |(observed, typed)| (observed, Some(typed)));
    let reservoir = top.has("reservoir").then(|| reservoir::read(top.section("reservoir")));
    top.knows("inflow");
    top.knows("reservoir");
    if reservoir.is_some() && inflow.is_none() {
        top.fault(Fault::key(
            "reservoir",
            "a reservoir without [inflow]",
            "an [inflow] that says how water input becomes inflow",
            "add a line [inflow], runoff_fraction and recession_days below it",
        ));
    }
    top.finish();
    let parts = (
        hypsometry,
        basin,
        record_source,
        weather,
        season,
        snow,
        warming,
        realizations,
        report,
        observed,
        fit,
    );
    let mut draft = notes.into_draft(title, seed, parts);
    draft.fitted_file = fitted_file;
    draft.parameter_sets = parameter_sets;
    draft.findings = findings;
    draft.projections_file = projections_file;
    draft.observed_inflow = observed_inflow;
    draft.inflow = inflow;
    draft.reservoir = reservoir;
    document.keep_what_is_certain(&mut draft.faults);
    draft
}

/// Everything that a fit may change, where all of it could be read.
fn parameters(
    basin: Option<&BasinTyped>,
    weather: Option<&WeatherTyped>,
    snow: Option<SnowParams>,
) -> Option<Parameters> {
    let BasinTyped { temperature, precipitation, .. } = basin?;
    let gauge = weather?.gauge_multiplier;
    Some(Parameters { snow: snow?, gauge, temperature: temperature.clone(), precipitation: *precipitation })
}

impl Scenario {
    /// Everything that a fit may change.
    pub fn parameters(&self) -> Parameters {
        let BasinTyped { temperature, precipitation, .. } = &self.basin;
        Parameters {
            snow: self.snow,
            gauge: self.weather.gauge_multiplier,
            temperature: temperature.clone(),
            precipitation: *precipitation,
        }
    }
}
