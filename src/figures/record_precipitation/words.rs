//! What the figure says.

use super::super::Setting;
use super::super::labels::{grouped, size, size_and_unit};
use super::super::theme::{LABEL, Lettering, NAME};
use crate::findings::RecordPrecipitation;
use crate::units::UnitSystem;

/// Every text of the figure but its ticks.
pub(super) struct Words {
    pub title: String,
    pub sample: String,
    pub axis: String,
    pub calendar: String,
    pub key: String,
    pub caption: String,
    pub alt: String,
    pub description: String,
    pub driest: [(String, Lettering); 2],
    pub wettest: [(String, Lettering); 2],
    pub median: [(String, Lettering); 2],
}

impl Words {
    pub fn of(precipitation: &RecordPrecipitation, setting: &Setting<'_>) -> Self {
        let units = setting.units;
        let start = setting.water_year_starts.0.words();
        let season = match precipitation.until {
            Some(survey) => format!("{start} to {}", survey.words()),
            None => format!("{start} through the whole water year"),
        };
        let years = counted(precipitation.years.len());
        let median_mm = precipitation.median_mm.last().copied().unwrap_or(0.0);
        let title = title(precipitation, &season, units);
        let calendar = "Date; ticks on the 1st, 11th and 21st";
        let why = match precipitation.until {
            Some(survey) => format!(
                "It is followed up to {}, the survey that the study's headline is about: later rain would rank the years by \
                 what their snow cannot hold.",
                survey.words()
            ),
            None => {
                "The survey date is the water year's first day, so the whole year is followed.".to_owned()
            }
        };
        let described = precipitation
            .years
            .iter()
            .map(|year| format!("{} {}", year.water_year, size(units, year.total_mm())));
        let [driest, wettest] = match precipitation.extremes() {
            Some(years) => {
                years.map(|year| (year.water_year.to_string(), size_and_unit(units, year.total_mm())))
            }
            None => [(String::new(), String::new()), (String::new(), String::new())],
        };
        let named =
            |(year, total): (String, String), what: &str| [(format!("{what} {year}"), NAME), (total, LABEL)];
        Self {
            alt: format!("{title}. Curves of {years} on one calendar."),
            sample: format!("{years} in use; precipitation at the station, corrected for catch, {season}"),
            axis: format!("Precipitation since {start} ({})", units.depth().word),
            calendar: calendar.to_owned(),
            key: "Each thin line: a water year of the record; strong lines: the driest and the wettest by the sum at the right \
                  end; dashed: on each day the median of all. A line is drawn through every fifth day. A water year is named \
                  for the calendar year in which it ends."
                .to_owned(),
            caption: format!(
                "Cumulative precipitation at the station from {start}, after the catch correction, in {years} of the record. \
                 {why} The dashed line is the median over these years of the sum as each day begins; it is no year's own \
                 course. Weather as it was: no warming and no realization. Dates are those of a year without 29 February, \
                 whose precipitation counts as of 1 March."
            ),
            description: format!(
                "Sums of {season} in {}: {}; median {}.",
                units.depth().word,
                described.collect::<Vec<_>>().join(", "),
                size(units, median_mm)
            ),
            driest: named(driest, "driest:"),
            wettest: named(wettest, "wettest:"),
            median: [("median".to_owned(), NAME), (size_and_unit(units, median_mm), LABEL)],
            title,
        }
    }
}

/// `From 1 October to 1 April, precipitation lay between 310 mm (1977, the driest year) and 900 mm (1983, the wettest): 2.9
/// times as much`.
fn title(precipitation: &RecordPrecipitation, season: &str, units: UnitSystem) -> String {
    let median = precipitation.median_mm.last().map_or_else(String::new, |mm| size_and_unit(units, *mm));
    match precipitation.extremes() {
        Some([driest, wettest]) => {
            let times = wettest.total_mm() / driest.total_mm();
            let times =
                if times < 100.0 { format!(": {} times as much", grouped(times, 1)) } else { String::new() };
            format!(
                "From {season}, precipitation lay between {} ({}, the driest year) and {} ({}, the wettest){times}",
                size_and_unit(units, driest.total_mm()),
                driest.water_year,
                size_and_unit(units, wettest.total_mm()),
                wettest.water_year
            )
        }
        None if precipitation.years.len() == 1 => {
            format!(
                "From {season}, {median} of precipitation came in the record's one year, {}",
                precipitation.years[0].water_year
            )
        }
        None => format!("From {season}, every year of the record had {median} of precipitation"),
    }
}

fn counted(years: usize) -> String {
    if years == 1 { "1 water year".to_owned() } else { format!("{years} water years") }
}
