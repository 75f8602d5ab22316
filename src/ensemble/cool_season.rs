//! How warm the cool season of every made year is: the weather of the realizations once more, without any snow.

use super::plan::Plan;
use crate::calendar::{MonthDay, day_of_water_year};
use crate::perturb::MonthlyChange;
use crate::weather::Series;
use ndarray::Array3;
use rayon::prelude::*;

/// Mean temperature at the station from the water year's start up to the survey date, that day exclusive, degC,
/// `[level][realization][year]`; `changes` are what the plan's levels do, in their order. Nothing where the survey date is the
/// water year's first day.
///
/// A level adds the mean of its monthly changes over the season's days to what its group's generator made, minima and maxima
/// alike; a change with elevation is no part of it, as the station stands for the basin.
pub fn cool_season_mean_c(
    plan: &Plan<'_>,
    changes: &[MonthlyChange],
    survey: MonthDay,
) -> Option<Array3<f64>> {
    let each: Vec<Option<Vec<f64>>> = (0..plan.realizations)
        .into_par_iter()
        .map_init(Series::default, |weather, number| of_realization(plan, changes, survey, number, weather))
        .collect();
    let shape = (plan.levels(), plan.realizations as usize, plan.years);
    let mut mean_c = Array3::zeros(shape);
    for (realization, of_levels) in each.into_iter().enumerate() {
        let of_levels = of_levels?;
        let mut places = mean_c.index_axis_mut(ndarray::Axis(1), realization);
        places.iter_mut().zip(of_levels).for_each(|(place, value)| *place = value);
    }
    Some(mean_c)
}

/// `[level][year]` of one realization.
fn of_realization(
    plan: &Plan<'_>,
    changes: &[MonthlyChange],
    survey: MonthDay,
    number: u32,
    weather: &mut Series,
) -> Option<Vec<f64>> {
    let mut mean_c = Vec::with_capacity(plan.levels() * plan.years);
    for (group, of_group) in plan.groups.iter().enumerate() {
        let generator = of_group.generator;
        let drawn = generator.drawn(number, plan.years);
        let (weather, spans) = match &drawn {
            Some((record, spans)) => (*record, spans.as_slice()),
            None => {
                generator.fill(number, plan.years, weather);
                (&*weather, weather.years.as_slice())
            }
        };
        let before = plan.levels_before(group);
        for change in &changes[before..before + of_group.levels()] {
            for span in spans {
                let year = weather.view(span);
                let days = day_of_water_year(span.first, survey) - 1;
                if days == 0 {
                    return None;
                }
                let warmed = year.mean_c[..days].iter().zip(&year.month[..days]).map(|(mean_c, month)| {
                    let month = usize::from(*month);
                    mean_c + (change.tmin_c[month] + change.tmax_c[month]) / 2.0
                });
                mean_c.push(warmed.sum::<f64>() / days as f64);
            }
        }
    }
    Some(mean_c)
}
