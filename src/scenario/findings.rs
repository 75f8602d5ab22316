//! `[findings]`: what a study is asked beside its headline, one table a question.

mod cases;
mod criteria;
mod low_snow;
mod periods_compared;
mod projections;
mod replayed_years;
mod rule_panel;
mod snow_line;
mod surface;
mod warming_rate;

pub use projections::{PROJECTIONS_KEY, read_projections};
pub use replayed_years::{ReplayedYearsTyped, YEARS_KEY as REPLAYED_YEARS_KEY};
pub use rule_panel::{REALIZATIONS_KEY as RULE_PANEL_REALIZATIONS_KEY, RulePanelTyped};
pub use surface::SurfaceTyped;

use super::section::Section;
use crate::findings::{Criterion, NamedChange, WarmingRate};

/// What is asked, as typed.
#[derive(Debug, Clone)]
pub struct FindingsTyped {
    /// The response surface.
    pub surface: SurfaceTyped,
    /// Changes of climate that have a name.
    pub cases: Vec<NamedChange>,
    /// The file of projections, relative to the scenario.
    pub projections_file: Option<String>,
    /// What is to hold, of a basin of so many km2.
    pub criteria: Vec<criteria::CriterionTyped>,
    /// The headline again under other published rules; none unless asked for.
    pub rule_panel: Option<RulePanelTyped>,
    /// Years of the record at every level.
    pub replayed_years: ReplayedYearsTyped,
    /// Which years of the record are held against the rest.
    pub periods_compared: periods_compared::PeriodsComparedTyped,
    /// Where snow begins.
    pub snow_line: snow_line::SnowLineTyped,
    /// What a low-snow year is.
    pub low_snow: low_snow::LowSnowTyped,
    /// The user's rate of warming, if one is stated.
    pub warming_rate: Option<WarmingRate>,
}

impl FindingsTyped {
    /// What is to hold in a basin of so many km2.
    pub fn criteria(&self, area_km2: f64) -> Vec<Criterion> {
        self.criteria.iter().map(|typed| typed.of(area_km2, self.low_snow.below_quantile)).collect()
    }
}

/// The file of projections, also where another key has a fault, and everything.
pub(super) fn read(mut section: Section<'_>) -> (Option<String>, Option<FindingsTyped>) {
    let surface = surface::read(section.section("surface"));
    let cases = cases::read(section.sections("cases"));
    let projections_file = projections::read(&mut section);
    let low_snow = low_snow::read(section.section("low_snow"));
    let criteria = criteria::read(section.sections("criteria"), low_snow.below_quantile);
    let rule_panel = rule_panel::read(&mut section);
    let replayed_years = replayed_years::read(&mut section);
    let periods_compared = periods_compared::read(section.section("periods_compared"));
    let snow_line = snow_line::read(section.section("snow_line"));
    let states_rate = section.has("warming_rate");
    let warming_rate = warming_rate::read(section.section("warming_rate"));
    section.finish();
    let typed = || {
        let projections_file = projections_file.clone();
        // A rate that was typed with a fault is none to run with.
        if states_rate && warming_rate.is_none() {
            return None;
        }
        Some(FindingsTyped {
            surface: surface?,
            cases: cases?,
            projections_file,
            criteria: criteria?,
            rule_panel,
            replayed_years: replayed_years.clone(),
            periods_compared,
            snow_line,
            low_snow,
            warming_rate,
        })
    };
    let typed = typed();
    (projections_file, typed)
}
