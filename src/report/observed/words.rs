//! A comparison in words, as a terminal shows it.

use super::super::numbers::{DASH, counted, fixed, signed};
use super::super::reader::Reader;
use crate::fit::{Bias, ComparedYear, Comparison, DateError};
use crate::season::Outcome;
use std::fmt::Write;

/// The scores of a site, a line each, and a line a water year; `fitted_file` has the parameters, where they are fitted.
pub fn comparison_words(comparison: &Comparison, fitted_file: Option<&str>, reader: Reader) -> String {
    let parameters = match fitted_file {
        Some(file) => format!("parameters are those of {file}"),
        None => "the model is not fitted to them".to_owned(),
    };
    let mut text = format!(
        "{}: {}, {}, {} in {}; {parameters}\n",
        comparison.site,
        comparison.kind.words(),
        reader.elevation(comparison.elevation_m),
        counted(comparison.readings_compared, "reading"),
        counted(comparison.by_year.len(), "water year"),
    );
    if comparison.readings_compared == 0 {
        return text;
    }
    let mut line = |name: &str, what: String| {
        let _ = writeln!(text, "  {name:<14}{what}");
    };
    line("NSE", format!("{} over all readings", two_decimals(comparison.nash_sutcliffe)));
    if let Some(kge) = comparison.kling_gupta {
        line(
            "KGE (2009)",
            format!(
                "{} over the {} with snow: correlation {}, variability {} times and mean {} times the observed",
                fixed(kge.efficiency, 2),
                counted(comparison.readings_with_snow, "reading"),
                fixed(kge.correlation, 2),
                fixed(kge.variability_ratio, 2),
                fixed(kge.mean_ratio, 2)
            ),
        );
    }
    if let Some(peak) = &comparison.peak {
        line("peak SWE", bias(peak, reader));
    }
    for survey in &comparison.surveys {
        if let Some(found) = &survey.bias {
            line(&format!("{} SWE", survey.survey.words()), bias(found, reader));
        }
    }
    if let Some(error) = &comparison.melt_out {
        line("melt-out", melt_out(error));
    }
    text + &by_year(comparison, reader)
}

/// `observed 506 mm, modelled 455 mm, −10 % (24 years)`.
fn bias(bias: &Bias, reader: Reader) -> String {
    let percent = bias.bias_pct.map_or(String::new(), |percent| format!(", {} %", signed(percent, 0)));
    format!(
        "observed {}, modelled {}{percent} ({})",
        reader.amount(bias.observed_mm),
        reader.amount(bias.modelled_mm),
        counted(bias.years, "year")
    )
}

/// `−11.3 days in the mean, mean size 12.0 days (24 years)`.
fn melt_out(error: &DateError) -> String {
    format!(
        "{} days in the mean, mean size {} days ({})",
        signed(error.mean_days, 1),
        fixed(error.mean_size_days, 1),
        counted(error.years, "year")
    )
}

/// A head and a line a water year: observed and modelled peak and survey-date SWE, and the error of melt-out.
fn by_year(comparison: &Comparison, reader: Reader) -> String {
    let unit = reader.units.depth().suffix;
    let mut text = String::from("  by year, observed : modelled\n");
    let _ = write!(text, "  {:<12}{:>6}", "water year", "NSE");
    if comparison.peak.is_some() {
        let _ = write!(text, "{:>16}", format!("peak, {unit}"));
    }
    for survey in &comparison.surveys {
        let _ = write!(text, "{:>16}", format!("{}, {unit}", survey.survey.words()));
    }
    if comparison.peak.is_some() {
        let _ = write!(text, "{:>16}", "melt-out, days");
    }
    text += "\n";
    for year in &comparison.by_year {
        let _ = write!(text, "  {:<12}{:>6}", year.water_year, two_decimals(year.nash_sutcliffe));
        if comparison.peak.is_some() {
            let _ = write!(text, "{:>16}", both(year.observed_peak_mm.zip(year.modelled_peak_mm), reader));
        }
        for survey in &year.surveys {
            let _ = write!(text, "{:>16}", both(survey.map(|s| (s.observed_mm, s.modelled_mm)), reader));
        }
        if comparison.peak.is_some() {
            let _ = write!(text, "{:>16}", late(year));
        }
        text += "\n";
    }
    text
}

/// `612 : 560`: observed and modelled.
fn both(amounts: Option<(f64, f64)>, reader: Reader) -> String {
    amounts.map_or(DASH.to_owned(), |(o, m)| format!("{} : {}", reader.amount_bare(o), reader.amount_bare(m)))
}

fn late(year: &ComparedYear) -> String {
    let [observed, modelled] = [year.observed_melt_out_day, year.modelled_melt_out_day].map(Outcome::value);
    observed.zip(modelled).map_or(DASH.to_owned(), |(o, m)| signed(m - o, 0))
}

fn two_decimals(score: Option<f64>) -> String {
    score.map_or("none".to_owned(), |score| fixed(score, 2))
}
