//! Cumulative precipitation of the record's years at the station, corrected for catch.

#[cfg(test)]
mod tests;

use super::quantile::{quantile, sorted};
use crate::calendar::{COMMON_DATES, MonthDay, WaterYearStart, day_of_water_year, days_of_common_dates};
use crate::weather::{Series, YearSpan};
use serde::Serialize;

/// Sums are kept every so many days.
const DAYS_APART: usize = 5;

/// How precipitation adds up through the record's years, from the water year's first day.
///
/// It is followed up to the first survey date, the cool season: that is the water from which the snow of the survey can
/// have come, while summer rain would rank the years by storms that no snowpack holds. Where the survey date is the water
/// year's first day there is no such season, and the whole year is followed.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct RecordPrecipitation {
    /// The day before which the sums end; none where they run through the whole year.
    pub until: Option<MonthDay>,
    /// Days of a water year without 29 February, counted from 1, as which begin the sums stand: the first, every fifth after
    /// it and the last. 366 is the next year's first day.
    pub days: Vec<usize>,
    /// One entry a year in use.
    pub years: Vec<YearPrecipitation>,
    /// Median over these years as each of the days begins, mm.
    pub median_mm: Vec<f64>,
}

/// Precipitation of one year.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct YearPrecipitation {
    /// The water year.
    pub water_year: i32,
    /// Sum of the days before each of the days, mm.
    pub cumulative_mm: Vec<f64>,
}

impl YearPrecipitation {
    /// The last sum, mm.
    pub fn total_mm(&self) -> f64 {
        self.cumulative_mm.last().copied().unwrap_or(0.0)
    }
}

impl RecordPrecipitation {
    /// Of years whose precipitation is corrected for catch.
    pub fn of(weather: &Series, starts: WaterYearStart, survey: MonthDay) -> Self {
        // No water year that ends in 2002 holds a leap day.
        let survey_day = day_of_water_year(starts.first_day(2002), survey);
        let until = (survey_day > 1).then_some(survey);
        let last = if survey_day > 1 { survey_day } else { COMMON_DATES + 1 };
        let mut days: Vec<usize> = (1..last).step_by(DAYS_APART).collect();
        days.push(last);
        let years: Vec<YearPrecipitation> = weather
            .years
            .iter()
            .map(|year| YearPrecipitation {
                water_year: year.water_year,
                cumulative_mm: cumulative(weather, year, &days),
            })
            .collect();
        let median = |at: usize| quantile(&sorted(years.iter().map(|year| year.cumulative_mm[at])), 0.5);
        Self { until, median_mm: (0..days.len()).map(median).collect(), years, days }
    }

    /// The driest and the wettest year by the last sum, the earlier of equals; none where all have the same.
    pub fn extremes(&self) -> Option<[&YearPrecipitation; 2]> {
        let mut years = self.years.iter();
        let first = years.next()?;
        let [driest, wettest] = years.fold([first; 2], |[driest, wettest], year| {
            [
                if year.total_mm() < driest.total_mm() { year } else { driest },
                if year.total_mm() > wettest.total_mm() { year } else { wettest },
            ]
        });
        (driest.total_mm() < wettest.total_mm()).then_some([driest, wettest])
    }
}

/// Sums of the days before each of the common year's days.
fn cumulative(weather: &Series, year: &YearSpan, days: &[usize]) -> Vec<f64> {
    let of_year = weather.view(year).precipitation_mm;
    let dates: Vec<usize> = days_of_common_dates(year.first).collect();
    let (mut sum, mut next) = (0.0, 0);
    let mut sums = Vec::with_capacity(days.len());
    for day in days {
        let before = dates.get(day - 1).map_or(of_year.len(), |day| day - 1);
        for amount_mm in &of_year[next..before] {
            sum += amount_mm;
        }
        next = before;
        sums.push(sum);
    }
    sums
}
