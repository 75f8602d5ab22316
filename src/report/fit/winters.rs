//! The table of winters: observed, and modelled by fits that have seen them and that have not.

use super::super::tables::{finish, optional, write, yes_or_no};
use super::FitReport;
use crate::fit::{ComparedYear, Comparison, Split, winters_of};
use csv::Writer;

/// One row a site and winter with observed snow.
pub(super) fn winters(report: &FitReport<'_>, not_seen: &[Comparison]) -> Vec<u8> {
    let result = report.result;
    let (depth, temperature) = (report.reader.units.depth(), report.reader.units.temperature());
    let mut writer = Writer::from_writer(Vec::new());
    let mut head = vec![
        "site".to_owned(),
        "water_year".to_owned(),
        format!("winter_mean_{}", temperature.suffix),
        "among_the_coldest_half".to_owned(),
    ];
    for what in ["peak", "survey_swe"] {
        let columns =
            ["observed", "fitted_on_all_years", "fitted_on_the_other_half", "fitted_on_the_coldest_half"];
        head.extend(columns.map(|by| format!("{what}_{by}_{}", depth.suffix)));
    }
    write(&mut writer, &head);
    let is_cold = winters_of(Split::Coldest, &result.winters);
    let Some(cold) = result.fitted.iter().find(|fitted| fitted.split == Split::Coldest) else {
        return finish(writer);
    };
    let sites = result.fitted[0].compared.iter().zip(not_seen).zip(&cold.compared);
    for ((site, not_seen), cold) in sites {
        for (winter, is_cold) in result.winters.iter().zip(&is_cold) {
            let years = [site, not_seen, cold].map(|comparison| year(comparison, winter.water_year));
            let [Some(all), Some(not_seen), Some(cold)] = years else { continue };
            let years = [all, not_seen, cold];
            let amount = |mm: Option<f64>| optional(mm.map(|mm| depth.of(mm)));
            let mut row = vec![
                site.site.clone(),
                winter.water_year.to_string(),
                optional(Some(temperature.of(winter.mean_c))),
                yes_or_no(*is_cold),
            ];
            row.push(amount(all.observed_peak_mm));
            row.extend(years.map(|year| amount(year.modelled_peak_mm)));
            let survey = |year: &ComparedYear| year.surveys.first().copied().flatten();
            row.push(amount(survey(all).map(|survey| survey.observed_mm)));
            row.extend(years.map(|year| amount(survey(year).map(|survey| survey.modelled_mm))));
            write(&mut writer, &row);
        }
    }
    finish(writer)
}

fn year(comparison: &Comparison, water_year: i32) -> Option<&ComparedYear> {
    comparison.by_year.iter().find(|year| year.water_year == water_year)
}
