//! Every winter as a fit makes it that has not seen it: the fits on every other year change places.

use super::comparison::{About, Comparison};
use super::run::FitResult;
use super::splits::{Split, winters_of};
use crate::calendar::MonthDay;

/// A comparison a site in which each winter is modelled by the fit on the half of every other year that it is not in, so that
/// scores over all of them are of years not seen.
pub fn not_seen(result: &FitResult) -> Vec<Comparison> {
    let mut sites: Vec<Comparison> = Vec::new();
    for fitted in &result.fitted {
        let Some(others) = (match fitted.split {
            Split::Odd | Split::Even => fitted.split.others(),
            _ => None,
        }) else {
            continue;
        };
        let is_other = winters_of(others, &result.winters);
        let is_in = |water_year: i32| {
            let mut winters = result.winters.iter().zip(&is_other);
            winters.any(|(winter, is_other)| *is_other && winter.water_year == water_year)
        };
        let parts = fitted.compared.iter().map(|comparison| comparison.of_years(is_in));
        if sites.is_empty() {
            sites = parts.collect();
        } else {
            sites = sites.into_iter().zip(parts).map(|(one, other)| together(one, other)).collect();
        }
    }
    sites
}

/// A site's years from two comparisons, in their order.
fn together(one: Comparison, other: Comparison) -> Comparison {
    let survey_dates: Vec<MonthDay> = one.surveys.iter().map(|survey| survey.survey).collect();
    let about = About { site: one.site, elevation_m: one.elevation_m, kind: one.kind, file: one.file };
    let mut by_year = [one.by_year, other.by_year].concat();
    by_year.sort_by_key(|year| year.water_year);
    Comparison::of(about, by_year, &survey_dates)
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::fit::invented::{STATION_M, basin, pillow, season, stated, usual, weather};
    use crate::fit::{ComparedYear, Held, Objective, Plan, Site, Unfollowed, fit};

    /// Identity: years of every other winter from the first are those of the fit on the others, day by day, and the reverse;
    /// all winters are there once, in their order, and the scores are of them all.
    #[test]
    fn each_winter_is_from_the_fit_that_has_not_seen_it() {
        let weather = weather(7);
        let seen = pillow(&weather, &stated(), |_, mm| 1.1 * mm);
        let sites = [Site { name: "pillow", elevation_m: STATION_M, observations: &seen }];
        let (basin, season) = (basin(), season());
        let held =
            Held { sites: &sites, weather: &weather, basin: &basin, station_m: STATION_M, season: &season };
        let plan = Plan {
            held,
            stated: stated(),
            searched: usual(&["snow.melt_base_c", "weather.gauge_multiplier.snow"]),
            objective: Objective::NashSutcliffe,
            starts: 1,
            evaluations: 4,
            sets: 2,
            seed: 3,
        };
        let result = fit(&plan, &mut Unfollowed).expect("seven winters");
        let found = not_seen(&result);
        let years: Vec<i32> = found[0].by_year.iter().map(|year| year.water_year).collect();
        assert_eq!(years, (2001..=2007).collect::<Vec<_>>());
        let on =
            |split: Split| result.fitted.iter().find(|fitted| fitted.split == split).expect("all are fitted");
        assert_ne!(on(Split::Odd).parameters, on(Split::Even).parameters);
        for (at, year) in found[0].by_year.iter().enumerate() {
            let by = if at.is_multiple_of(2) { Split::Even } else { Split::Odd };
            let expected: &ComparedYear = &on(by).compared[0].by_year[at];
            assert_eq!(year, expected);
        }
        let readings = found[0].by_year.iter().map(|year| year.readings).sum::<usize>();
        assert_eq!(found[0].readings_compared, readings);
    }
}
