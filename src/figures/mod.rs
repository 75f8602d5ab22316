//! Figures: findings drawn as SVG. One file a figure, one list of figures.
//!
//! A figure is a pure function from [`Findings`] to bytes, and a number that is drawn is a number there. It states its
//! finding in its title, names what it shows where it stands, and says that spread is chance.

mod against;
mod apart;
mod axes;
mod backend;
mod change_against_spread;
mod daily;
mod dry_and_warm;
mod fits;
mod generator_sheet;
mod headline;
mod inflow_by_month;
mod labels;
mod level_lines;
mod low_snow_odds;
mod marks;
mod melt_timing;
mod observed_swe;
mod one_slide;
mod page;
mod parameter_profiles;
mod reading;
mod record_precipitation;
mod record_years;
mod refill_rule_changes;
mod response_surface;
mod rule_change_words;
mod rule_panel;
mod scales;
mod seasonal_outlook;
mod sheet;
mod shortage_against_spill;
mod shown;
mod storage_through_year;
mod survey_error;
mod swe_by_band;
mod swe_by_level;
mod swe_change_by_band;
mod swe_pair;
mod swe_through_year;
mod text_width;
pub mod theme;
mod thin;
mod value_ticks;
mod variance_by_period;
mod window_volume;
mod winters_not_seen;

#[cfg(test)]
mod check;
#[cfg(test)]
mod colour_sight;

pub use fits::{DrawnFit, FIT_FIGURES, FIT_SITE_FIGURES, FitFigure, FitPart, FitSiteFigure, of_fit};
pub use labels::{cause, sentence};
pub use one_slide::PLANNING_AID;
pub use rule_change_words::{
    ALL_BROUGHT_BACK, LEAST_BROUGHT_BACK, RELIABILITY, brought_back, change_in_words, cost_in_days_above,
};
pub use rule_panel::rule_in_words;
pub use text_width::text_width;

use crate::calendar::WaterYearStart;
use crate::findings::Findings;
use crate::fit::{Comparison, PlaceDays};
use crate::units::UnitSystem;

/// A figure.
#[derive(Debug, Clone, Copy)]
pub struct Figure {
    /// Its name in files and addresses.
    pub slug: &'static str,
    /// The table that holds its numbers.
    pub table: &'static str,
    /// The question that it answers.
    pub question: &'static str,
    /// Which part of the page it belongs to.
    pub part: Part,
    /// Draws it; nothing where the findings have not what it shows.
    pub draw: fn(&Findings, &Setting<'_>) -> Option<Svg>,
}

/// The parts of a page that have figures.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Part {
    /// Does warming outweigh precipitation?
    Answer,
    /// When does the snow lie, and go?
    Timing,
    /// Where is it lost?
    Elevation,
    /// Which years are dry and warm?
    DryAndWarm,
    /// How much water is it?
    Volumes,
    /// What do warming and precipitation make together?
    Together,
    /// What do single years say of it?
    Years,
    /// When does the water come to the reservoir?
    Inflow,
    /// What does the reservoir hold?
    Reservoir,
    /// What would other rules change of it?
    RuleChanges,
    /// What does the snow foretell?
    Outlook,
    /// Is it the model's choice?
    Rules,
    /// What is it drawn from?
    Record,
    /// Does the weather that was made look like it?
    Weather,
    /// What is it on one slide? A file beside the page, which says where it stands.
    Slide,
}

/// Every figure, in the order in which a reader meets them.
pub const FIGURES: [Figure; 21] = [
    swe_by_level::FIGURE,
    melt_timing::FIGURE,
    swe_through_year::FIGURE,
    swe_by_band::FIGURE,
    swe_change_by_band::FIGURE,
    dry_and_warm::FIGURE,
    window_volume::FIGURE,
    response_surface::FIGURE,
    low_snow_odds::FIGURE,
    variance_by_period::FIGURE,
    change_against_spread::FIGURE,
    inflow_by_month::FIGURE,
    storage_through_year::FIGURE,
    refill_rule_changes::FIGURE,
    shortage_against_spill::FIGURE,
    seasonal_outlook::FIGURE,
    rule_panel::FIGURE,
    record_years::FIGURE,
    record_precipitation::FIGURE,
    generator_sheet::FIGURE,
    one_slide::FIGURE,
];

/// A figure of which there is one a site with observed snow.
#[derive(Debug, Clone, Copy)]
pub struct SiteFigure {
    /// Its name in files and addresses; the site's number follows.
    pub slug: &'static str,
    /// The table that holds its numbers.
    pub table: &'static str,
    /// The question that it answers.
    pub question: &'static str,
    /// Draws it under a name; nothing where the comparison has not what it shows.
    pub draw: fn(&Comparison, &str, &Setting<'_>) -> Option<Svg>,
}

/// Every figure of a site.
pub const SITE_FIGURES: [SiteFigure; 1] = [observed_swe::FIGURE];

/// Draws every figure of every site, each with its name: `observed-swe-1` is the first site's.
pub fn of_sites(comparisons: &[Comparison], setting: &Setting<'_>) -> Vec<(String, Svg)> {
    let mut drawn = Vec::new();
    for (site, comparison) in (1..).zip(comparisons) {
        for figure in &SITE_FIGURES {
            let slug = format!("{}-{site}", figure.slug);
            drawn.extend((figure.draw)(comparison, &slug, setting).map(|svg| (slug, svg)));
        }
    }
    drawn
}

/// A figure of a place's days.
#[derive(Debug, Clone, Copy)]
pub struct DaysFigure {
    /// Its name in files and addresses.
    pub slug: &'static str,
    /// The question that it answers.
    pub question: &'static str,
    /// Draws it, with the words that tell a band from the others of its range; nothing without a year.
    pub draw: fn(&PlaceDays, Option<&str>, &Setting<'_>) -> Option<Svg>,
}

/// Every figure of a place's days.
pub const DAYS_FIGURES: [DaysFigure; 1] = [daily::FIGURE];

/// More water years than this are not told apart in one of them.
pub const MOST_YEARS_OF_DAYS: usize = 5;

/// Draws every figure of a place's days, each with its name; `apart` tells a band from the others of its range.
pub fn of_days(days: &PlaceDays, apart: Option<&str>, setting: &Setting<'_>) -> Vec<(&'static str, Svg)> {
    let draw = |figure: &DaysFigure| Some((figure.slug, (figure.draw)(days, apart, setting)?));
    DAYS_FIGURES.iter().filter_map(draw).collect()
}

/// What a figure needs to know beside the findings.
#[derive(Debug, Clone, Copy)]
pub struct Setting<'a> {
    /// Title of the study.
    pub study_title: &'a str,
    /// Units that its reader asked for.
    pub units: UnitSystem,
    /// First day of its water years.
    pub water_year_starts: WaterYearStart,
    /// Whether parameters of its model were fitted to observed snow.
    pub is_fitted: bool,
}

/// A drawn figure.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Svg {
    /// The whole SVG document. Its ids begin with the figure's slug.
    pub text: String,
    /// The finding, in words and with its numbers.
    pub title: String,
    /// What is shown: sample sizes, interval levels, what the band is and is not.
    pub caption: String,
    /// The finding and the kind of drawing, for those who do not see it.
    pub alt: String,
}

/// `300 realizations of 30 years`.
fn ensemble(findings: &Findings) -> String {
    let realizations = labels::counted(findings.realizations, "realization");
    format!("{realizations} of {}", labels::counted(findings.years, "year"))
}
