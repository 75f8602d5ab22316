//! What the figure says.

use super::super::Setting;
use super::super::against::against;
use super::super::labels::{counted, days_in_words, grouped, score, size_and_unit};
use crate::fit::{ComparedYear, Comparison};
use crate::observed::Kind;
use crate::units::UnitSystem;

/// Every text of the figure but the panels' labels.
pub(super) struct Words {
    pub title: String,
    pub sample: String,
    pub key: String,
    pub caption: String,
    pub alt: String,
    pub description: String,
}

impl Words {
    /// `drawn` of the comparison's years, the last, have a panel.
    pub fn of(comparison: &Comparison, drawn: usize, setting: &Setting<'_>) -> Self {
        let units = setting.units;
        let parameters = if setting.is_fitted { "has fitted parameters" } else { "is not fitted to them" };
        let title = finding(comparison, units);
        let unit = units.elevation();
        let elevation = format!("{} {}", grouped(unit.of(comparison.elevation_m).max(0.0), 0), unit.word);
        let years = comparison.by_year.len();
        let of_years = if drawn < years {
            format!(" Drawn are the last {drawn} of {years} water years; the scores are of all.")
        } else {
            String::new()
        };
        let sample = format!(
            "{} of the {} in {}; the model at the site's {elevation} {parameters}",
            counted(comparison.readings_compared, "reading"),
            comparison.kind.words(),
            counted(years, "water year"),
        );
        let (observed, scored) = match comparison.kind {
            Kind::Pillow => (
                "Dark line: observed, broken where there is no reading",
                " NSE: Nash-Sutcliffe efficiency over the year's readings; 1 is perfect, 0 no better than their mean.",
            ),
            Kind::Course => ("Dark dot: a survey, on its own day", ""),
        };
        let key = format!(
            "{observed}; blue line: modelled, without warming. A panel a water year, all on one scale.{scored}{of_years}"
        );
        let caption = format!(
            "Snow water equivalent as the day begins at {}, {elevation}: {sample}. {key} The model is run at the site's elevation by the \
             basin's gradients, on the record as observed. Differences hold errors of the model, of the gradients, of the \
             station's gauge and of the measurement itself; no interval is drawn.",
            comparison.site,
        );
        let last = &comparison.by_year[years - drawn..];
        Self {
            alt: format!("{title}. Small panels of {}, observed and modelled.", counted(drawn, "water year")),
            description: last.iter().map(|year| described(year, units)).collect::<Vec<_>>().join("; ") + ".",
            title,
            sample,
            key,
            caption,
        }
    }
}

/// `At Heron Meadow, modelled peak SWE is 10 % below the observed and melt-out comes 11 days earlier in the mean; NSE 0.88`.
fn finding(comparison: &Comparison, units: UnitSystem) -> String {
    let nse = comparison.nash_sutcliffe.map_or(String::new(), |nse| format!("; NSE {}", score(nse)));
    let survey = comparison.surveys.first().and_then(|survey| Some((survey.survey, survey.bias?)));
    let what = match (&comparison.peak, survey) {
        (Some(peak), _) => format!("modelled peak SWE is {}", against(peak, units)),
        (None, Some((day, bias))) => format!("modelled {} SWE is {}", day.words(), against(&bias, units)),
        (None, None) => {
            let readings = counted(comparison.readings_compared, "reading");
            return format!("{}: {readings} of SWE beside the model{nse}", comparison.site);
        }
    };
    let melt_out = comparison.melt_out.map_or(String::new(), |error| {
        format!(" and melt-out comes {} in the mean", days_in_words(error.mean_days))
    });
    format!("At {}, {what}{melt_out}{nse}", comparison.site)
}

/// `2001: observed peak 612 mm, modelled 560 mm, NSE 0.93`.
fn described(year: &ComparedYear, units: UnitSystem) -> String {
    let nse = year.nash_sutcliffe.map_or(String::new(), |nse| format!(", NSE {}", score(nse)));
    let peaks = year.observed_peak_mm.zip(year.modelled_peak_mm);
    match (peaks, year.surveys.first().copied().flatten()) {
        (Some((observed, modelled)), _) => {
            format!(
                "{}: observed peak {}, modelled {}{nse}",
                year.water_year,
                size_and_unit(units, observed),
                size_and_unit(units, modelled)
            )
        }
        (None, Some(survey)) => format!(
            "{}: on {} observed {}, modelled {}{nse}",
            year.water_year,
            survey.date,
            size_and_unit(units, survey.observed_mm),
            size_and_unit(units, survey.modelled_mm)
        ),
        (None, None) => format!("{}: {}{nse}", year.water_year, counted(year.readings, "reading")),
    }
}
