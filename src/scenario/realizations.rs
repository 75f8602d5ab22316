//! `[realizations]`: how much weather is made, and how.

use super::section::Section;
use crate::fault::Fault;
use crate::perturb::GeneratorChoice;

/// Realizations as typed.
#[derive(Debug, Clone)]
pub struct RealizationsTyped {
    /// How many.
    pub count: u32,
    /// Water years of each.
    pub years: usize,
    /// What makes them.
    pub generator: GeneratorChoice,
    /// A day is wet whose precipitation lies above this, mm.
    pub wet_day_mm: f64,
    /// Assumed standard deviation of the change of mean precipitation, percent, where one is assumed.
    pub mean_change_sd_pct: Option<f64>,
}

/// A larger assumed spread of mean precipitation drowns what the record has, percent.
const LARGE_CHANGE_SD_PCT: f64 = 25.0;

pub(super) fn read(mut section: Section<'_>) -> Option<RealizationsTyped> {
    let draws_days = if section.has("generator") {
        section.choice("generator", &[("year-blocks", false), ("markov-gamma", true)]).unwrap_or(false)
    } else {
        section.text_or("generator", "year-blocks");
        false
    };
    let generator = if draws_days { drawn_by_day(&mut section) } else { of_whole_years(&mut section) };
    let wet_day_mm = section.number_or(
        "wet_day_mm",
        0.3,
        0.0..=10.0,
        "mm; a day with more is a wet one: somewhat more than dew and the gauge's noise",
    );
    let typed = RealizationsTyped {
        count: section.whole_or("count", 300, 1..=100_000) as u32,
        years: section.whole_or("years", 30, 1..=1000) as usize,
        generator,
        wet_day_mm,
        mean_change_sd_pct: section.number_in(
            "mean_change_sd_pct",
            0.0..=100.0,
            "percent; an assumption about the future, leave it out for none",
        ),
    };
    if typed.mean_change_sd_pct.is_some_and(|sd_pct| sd_pct > LARGE_CHANGE_SD_PCT) {
        section.unlikely("mean_change_sd_pct", "above 25 percent: the spread is then mostly this assumption");
    }
    section.finish();
    Some(typed)
}

fn of_whole_years(section: &mut Section<'_>) -> GeneratorChoice {
    let mean_run_years = section.number_or(
        "mean_run_years",
        2.0,
        1.0..=1000.0,
        "1 draws every year by itself; 2 to 5 keeps wet and dry runs",
    );
    GeneratorChoice::YearBlocks { mean_run_years }
}

/// A generator that draws days has no runs of years: the key is no fault of spelling, but it would do nothing.
fn drawn_by_day(section: &mut Section<'_>) -> GeneratorChoice {
    section.knows("mean_run_years");
    if section.has("mean_run_years") {
        section.fault(Fault::key(
            section.path_of("mean_run_years"),
            "mean_run_years beside generator = \"markov-gamma\", which draws days and takes no runs of years",
            "no mean_run_years",
            "take it out, or take generator = \"year-blocks\"",
        ));
    }
    GeneratorChoice::MarkovGamma
}
