//! Percent of median: the record's years against their normal, at every level, and what a moved normal hides.

use super::super::normal::baseline_years_in_words;
use super::super::numbers::{DASH, counted, fixed};
use super::super::reader::Reader;
use super::super::study::Study;
use crate::findings::{CLASS_LIMITS_PCT, Findings, MedianSwe, PercentOfMedian};
use maud::{Markup, html};

/// The section; nothing where the record was not asked.
pub(super) fn section(study: &Study<'_>) -> Markup {
    let (findings, reader) = (study.findings, study.reader);
    html! { @if let Some(record) = &findings.record {
        p {
            "Median: of the baseline years, " (baseline_years_in_words(&record.baseline_years)) ", at the reference, band by band. \
             A basin's percentage is its snow water over the sum of the bands' medians, not a mean of their percentages; \
             each band has its own median year, so the basin's need not stand at 100 %."
        }
        @for on in &record.percent_of_median { (on_date(study, on)) }
        @if let Some(sentence) = record.percent_of_median.first().and_then(|on| hidden(findings, on, reader)) { p { (sentence) } }
        p { "Every year at every level stands in " code { "tables/percent-of-median.csv" } ", the medians of the bands in "
            code { "tables/medians.csv" } "." }
    } }
}

fn on_date(study: &Study<'_>, on: &PercentOfMedian) -> Markup {
    let reader = study.reader;
    html! {
        div.scroll { table {
            caption {
                (on.survey.words()) " SWE of the record's baseline years, each run at every level. Fixed normal: "
                (reader.amount(on.basin.median_mm)) ", the reference's; moved normal: the median of the same years at the level \
                 itself. The last columns count baseline years by their percentage of the fixed normal."
            }
            thead { tr {
                th scope="col" { "Warming" }
                th scope="col" { "Median year," br; "% of fixed normal" }
                th scope="col" { "Moved normal" }
                th scope="col" { "Median year," br; "% of moved normal" }
                @for class in classes() { th scope="col" { (class) } }
            } }
            tbody { @for (at, level) in on.levels.iter().enumerate() { tr {
                th scope="row" { (if at == study.findings.reference { "reference".to_owned() } else { reader.level(level.level_c) }) }
                td { (percent(level.median_percent)) }
                td { (reader.amount(level.moved_median_mm)) }
                td { (percent(level.median_percent_of_moved)) }
                @for count in level.baseline_years_by_class { td { (count) } }
            } } }
        } }
        @if let Some(sentence) = flagged(on) { p { (sentence) } }
    }
}

/// `below 60 %`, `60 to 80 %`, `140 % and more`.
fn classes() -> Vec<String> {
    let limits = CLASS_LIMITS_PCT.map(|limit| fixed(limit, 0));
    let between = limits.windows(2).map(|pair| format!("{} to {} %", pair[0], pair[1]));
    let (below, above) =
        (format!("below {} %", limits[0]), format!("{} % and more", limits[limits.len() - 1]));
    std::iter::once(below).chain(between).chain([above]).collect()
}

fn percent(percent: Option<f64>) -> String {
    percent.map_or(DASH.to_owned(), |percent| fixed(percent, 0))
}

/// Where percentages are unstable, and where there are none.
fn flagged(on: &PercentOfMedian) -> Option<String> {
    let survey = on.survey.words();
    if on.basin.median_mm == 0.0 {
        return Some(format!("The {survey} median of the basin is 0, so there are no percentages of it."));
    }
    let is_flagged = |median: &&MedianSwe| median.is_unstable;
    let bands = on.bands.iter().filter(is_flagged).count();
    let why = format!(
        "the {survey} median is under 10 % of its highest in the year, so percentages of it are unstable"
    );
    match (on.basin.is_unstable, bands) {
        (true, _) => Some(format!("Over the basin {why}: a little snow makes a large percentage.")),
        (false, 0) => None,
        (false, bands) => {
            Some(format!("In {} of {} {why}; the basin's is not.", bands, counted(on.bands.len(), "band")))
        }
    }
}

/// What a moved normal hides, at the warmest level that has one.
fn hidden(findings: &Findings, on: &PercentOfMedian, reader: Reader) -> Option<String> {
    let warmer = on.levels.get(findings.reference + 1..)?.iter().rev();
    let (level_c, fixed_pct, moved_pct) = warmer
        .filter_map(|level| Some((level.level_c, level.median_percent?, level.median_percent_of_moved?)))
        .next()?;
    // A moved normal that tells the same hides nothing.
    if (fixed_pct - moved_pct).abs() < 2.0 {
        return None;
    }
    let none = on.levels.iter().filter(|level| level.moved_median_mm == 0.0).count();
    let none = match none {
        0 => String::new(),
        _ => " Where the moved normal is 0 there is no percentage of it.".to_owned(),
    };
    Some(format!(
        "A normal that is computed anew in a warmer climate hides the change: at {} the median year has {} % of the fixed \
         normal, but {} % of the moved one.{none}",
        reader.level(level_c),
        fixed(fixed_pct, 0),
        fixed(moved_pct, 0)
    ))
}
