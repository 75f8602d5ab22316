//! `[realizations]`: how much weather is made, and how.

use super::section::Section;

/// Realizations as typed.
#[derive(Debug, Clone)]
pub struct RealizationsTyped {
    /// How many.
    pub count: u32,
    /// Water years of each.
    pub years: usize,
    /// Mean length of a run of consecutive record years.
    pub mean_run_years: f64,
    /// Assumed standard deviation of the change of mean precipitation, percent, where one is assumed.
    pub mean_change_sd_pct: Option<f64>,
}

/// A larger assumed spread of mean precipitation drowns what the record has, percent.
const LARGE_CHANGE_SD_PCT: f64 = 25.0;

pub(super) fn read(mut section: Section<'_>) -> Option<RealizationsTyped> {
    if section.has("generator") {
        section.choice("generator", &[("year-blocks", ())]);
    } else {
        section.text_or("generator", "year-blocks");
    }
    let mean_run_years = section.number_or(
        "mean_run_years",
        2.0,
        1.0..=1000.0,
        "1 draws every year by itself; 2 to 5 keeps wet and dry runs",
    );
    let typed = RealizationsTyped {
        count: section.whole_or("count", 300, 1..=100_000) as u32,
        years: section.whole_or("years", 30, 1..=1000) as usize,
        mean_run_years,
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
