//! The record as if all its years lay in one: a trend of temperature taken out, season by season.

use super::LEAST_YEARS;
use super::seasons::Seasons;
use super::theil_sen::{TheilSen, theil_sen};
use crate::calendar::{MonthDay, day_of_water_year};
use crate::weather::Series;
use serde::Serialize;

/// What was taken out of a record.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Detrended {
    /// The year whose climate all years now have.
    pub to_year: i32,
    /// Trend of the cool season's mean temperature, degC per year; none where the season has no days.
    pub cool: Option<TheilSen>,
    /// Trend of the warm season's.
    pub warm: Option<TheilSen>,
}

/// Takes the Theil-Sen trend of each season's mean temperature out of a record, to the year `to_year`.
///
/// Every day of a season of water year y gets `slope*(to_year - y)` added to its daily mean. The daily range stays, so
/// that minimum and maximum move alike; precipitation stays as well. The slope is taken as it is, significant or not.
/// Seasons are those of [`Seasons`].
///
/// Nothing is changed, and nothing returned, where fewer than [`LEAST_YEARS`] years are usable.
pub fn detrend(series: &mut Series, survey: MonthDay, to_year: i32) -> Option<Detrended> {
    if series.years.len() < LEAST_YEARS {
        return None;
    }
    let seasons = Seasons::of(series, survey);
    let detrended =
        Detrended { to_year, cool: theil_sen(&seasons.cool.mean_c), warm: theil_sen(&seasons.warm.mean_c) };
    for year in &series.years {
        let years = f64::from(to_year) - f64::from(year.water_year);
        let cool_days = day_of_water_year(year.first, survey) - 1;
        let days = &mut series.mean_c[year.start..year.start + year.days];
        let (cool, warm) = days.split_at_mut(cool_days);
        for (season, trend) in [(cool, detrended.cool), (warm, detrended.warm)] {
            let Some(trend) = trend else { continue };
            for mean_c in season {
                *mean_c += trend.slope_per_year * years;
            }
        }
    }
    Some(detrended)
}
