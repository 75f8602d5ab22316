//! What trials are held against: the observed snow of every site, year by year, in the shape in which it is asked for.

use super::site::{Site, observed_days};
use super::year::{MISSING_DAYS_ALLOWED, WHOLE_FROM_DAY, survey_day};
use crate::calendar::MonthDay;
use crate::observed::Kind;
use crate::season::{BARE_MM, LEAST_PEAK_MM, SAME_SWE_MM};
use crate::weather::Series;

/// A water year of a site.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct ObservedYear {
    /// Readings: day of the year, from 0, and SWE as it begins, mm.
    pub readings: Vec<(usize, f64)>,
    /// Peak, mm; of a pillow's whole years.
    pub peak_mm: Option<f64>,
    /// First day after the peak, from 0, with less than 1 mm, where it is known to the day.
    pub melt_out: Option<usize>,
    /// The survey: its day, from 0, and SWE, mm.
    pub survey: Option<(usize, f64)>,
}

/// Every year of the weather at a site.
pub(super) fn observed_years(site: &Site<'_>, weather: &Series, survey: MonthDay) -> Vec<ObservedYear> {
    let of_year = |span: &crate::weather::YearSpan| {
        let days = observed_days(Some(site.observations), span.first, span.days);
        ObservedYear::of(
            &days,
            site.observations.kind,
            survey_day(&days, span.first, survey, site.observations.kind),
        )
    };
    weather.years.iter().map(of_year).collect()
}

impl ObservedYear {
    fn of(days: &[Option<f64>], kind: Kind, survey: Option<usize>) -> Self {
        let readings: Vec<(usize, f64)> =
            days.iter().enumerate().filter_map(|(day, swe_mm)| Some((day, (*swe_mm)?))).collect();
        let mut peak: Option<(usize, f64)> = None;
        for (day, swe_mm) in &readings {
            if peak.is_none_or(|(_, highest)| *swe_mm > highest + SAME_SWE_MM) {
                peak = Some((*day, *swe_mm));
            }
        }
        let gone = peak.and_then(|(peak_day, _)| {
            readings.iter().find(|(day, swe_mm)| *day > peak_day && *swe_mm < BARE_MM).map(|(day, _)| *day)
        });
        let asked = &days[..gone.unwrap_or(days.len())];
        let missing = asked.iter().skip(WHOLE_FROM_DAY - 1).filter(|swe_mm| swe_mm.is_none()).count();
        let is_whole = kind == Kind::Pillow && missing <= MISSING_DAYS_ALLOWED;
        let peak = peak.filter(|_| is_whole);
        let has_dates = peak.is_some_and(|(_, peak_mm)| peak_mm >= LEAST_PEAK_MM);
        Self {
            peak_mm: peak.map(|(_, peak_mm)| peak_mm),
            melt_out: gone.filter(|day| has_dates && days[day - 1].is_some()),
            survey: survey.and_then(|day| Some((day, days[day]?))),
            readings,
        }
    }
}
