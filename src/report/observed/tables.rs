//! Tables of observed and modelled snow: a row a year, and a row a day.

use super::super::tables::{ReportFile, finish, optional, write};
use crate::calendar::date_of;
use crate::fit::{ComparedYear, Comparison};
use crate::season::Outcome;
use crate::units::UnitSystem;
use csv::Writer;

/// `tables/observed-by-year.csv` and `tables/observed-daily.csv`; none without a site.
pub fn observed_tables(comparisons: &[Comparison], units: UnitSystem) -> Vec<ReportFile> {
    if comparisons.is_empty() {
        return Vec::new();
    }
    vec![
        ("tables/observed-by-year.csv".to_owned(), by_year(comparisons, units)),
        ("tables/observed-daily.csv".to_owned(), daily(comparisons, units)),
    ]
}

/// One row a site and water year with a reading.
fn by_year(comparisons: &[Comparison], units: UnitSystem) -> Vec<u8> {
    let mut writer = Writer::from_writer(Vec::new());
    let unit = units.depth().suffix;
    let mut header =
        ["site", "water_year", "readings", "nash_sutcliffe", "whole_enough_for_peak_and_melt_out"]
            .map(str::to_owned)
            .to_vec();
    header.extend(["observed", "modelled"].map(|which| format!("{which}_peak_{unit}")));
    header.extend(["observed_peak_date", "modelled_peak_date"].map(str::to_owned));
    for survey in comparisons.iter().take(1).flat_map(|comparison| &comparison.surveys) {
        let day = survey.survey.to_string().replace('-', "_");
        header.extend([
            format!("survey_{day}_date"),
            format!("observed_swe_{day}_{unit}"),
            format!("modelled_swe_{day}_{unit}"),
        ]);
    }
    header.extend(["observed_melt_out_date", "modelled_melt_out_date"].map(str::to_owned));
    write(&mut writer, &header);
    for comparison in comparisons {
        for year in &comparison.by_year {
            write(&mut writer, &year_row(comparison, year, units));
        }
    }
    finish(writer)
}

fn year_row(comparison: &Comparison, year: &ComparedYear, units: UnitSystem) -> Vec<String> {
    let date = |day: Outcome| match day {
        Outcome::Value(day) => date_of(year.first, day as usize).to_string(),
        Outcome::None => "none".to_owned(),
        Outcome::NotGone => "not gone".to_owned(),
        Outcome::NotReached => "not reached".to_owned(),
    };
    let depth = |mm: Option<f64>| optional(mm.map(|mm| units.depth().of(mm)));
    let whole = if year.is_whole { "yes" } else { "no" };
    let mut row = vec![
        comparison.site.clone(),
        year.water_year.to_string(),
        year.readings.to_string(),
        optional(year.nash_sutcliffe),
        whole.to_owned(),
        depth(year.observed_peak_mm),
        depth(year.modelled_peak_mm),
        date(year.observed_peak_day),
        date(year.modelled_peak_day),
    ];
    for survey in &year.surveys {
        row.extend([
            survey.map_or(String::new(), |survey| survey.date.to_string()),
            depth(survey.map(|survey| survey.observed_mm)),
            depth(survey.map(|survey| survey.modelled_mm)),
        ]);
    }
    row.extend([date(year.observed_melt_out_day), date(year.modelled_melt_out_day)]);
    row
}

/// One row a site and day of the water years with a reading: SWE as the day begins.
fn daily(comparisons: &[Comparison], units: UnitSystem) -> Vec<u8> {
    let mut writer = Writer::from_writer(Vec::new());
    let depth = units.depth();
    let amounts = ["observed", "modelled"].map(|which| format!("{which}_{}", depth.suffix));
    write(&mut writer, &[&["site", "date"].map(str::to_owned), amounts.as_slice()].concat());
    for comparison in comparisons {
        for year in &comparison.by_year {
            for (date, day) in year.first.iter_days().zip(&year.days) {
                let observed = optional(day.observed_mm.map(|mm| depth.of(mm)));
                let modelled = depth.of(day.modelled_mm).to_string();
                write(&mut writer, &[comparison.site.clone(), date.to_string(), observed, modelled]);
            }
        }
    }
    finish(writer)
}
