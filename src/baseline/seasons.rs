//! Yearly values of the cool and the warm season.

use crate::calendar::{MonthDay, day_of_water_year};
use crate::weather::Series;

/// Water years and their values, years rising; a year left out is simply absent.
pub type Yearly = [(i32, f64)];

/// Yearly values of one season.
#[derive(Debug, Clone, Default, PartialEq)]
pub struct SeasonYears {
    /// Mean of the daily mean temperatures, degC.
    pub mean_c: Vec<(i32, f64)>,
    /// Sum of precipitation, mm.
    pub precipitation_mm: Vec<(i32, f64)>,
}

/// Both seasons of every usable water year.
#[derive(Debug, Clone, Default, PartialEq)]
pub struct Seasons {
    /// From the water year's start up to the survey date, that day exclusive.
    pub cool: SeasonYears,
    /// From the survey date to the water year's end.
    pub warm: SeasonYears,
}

impl Seasons {
    /// The seasons of a series' years. A season without days, where the survey date starts the water year, has no
    /// values.
    pub fn of(series: &Series, survey: MonthDay) -> Self {
        let mut seasons = Self::default();
        for year in &series.years {
            let weather = series.view(year);
            let cool_days = day_of_water_year(year.first, survey) - 1;
            let (cool_c, warm_c) = weather.mean_c.split_at(cool_days);
            let (cool_mm, warm_mm) = weather.precipitation_mm.split_at(cool_days);
            seasons.cool.push(year.water_year, cool_c, cool_mm);
            seasons.warm.push(year.water_year, warm_c, warm_mm);
        }
        seasons
    }
}

impl SeasonYears {
    fn push(&mut self, water_year: i32, mean_c: &[f64], precipitation_mm: &[f64]) {
        if mean_c.is_empty() {
            return;
        }
        self.mean_c.push((water_year, mean_c.iter().sum::<f64>() / mean_c.len() as f64));
        self.precipitation_mm.push((water_year, precipitation_mm.iter().sum()));
    }
}
