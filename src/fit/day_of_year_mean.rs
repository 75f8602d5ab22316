//! How much better than no model at all: against the mean of the other years on the same day.

use super::year::ComparedYear;

/// A day needs readings of so many other years to have a mean.
const LEAST_OTHER_YEARS: usize = 5;

/// Skill above the day-of-year mean, over the readings of the years that are judged:
/// `1 - sum((modelled - observed)^2) / sum((mean - observed)^2)`, the mean that of the observed values of all *other* years on
/// the same day of the water year.
///
/// 1 is perfect, 0 no better than the mean; none where no day has readings of five other years. The mean knows years that a
/// fit may not have seen.
pub(super) fn skill(years: &[ComparedYear], is_judged: impl Fn(i32) -> bool) -> Option<f64> {
    let days_of = |year: &ComparedYear| JudgedYear {
        is_judged: is_judged(year.water_year),
        days: year.days.iter().map(|pair| (pair.observed_mm, pair.modelled_mm)).collect(),
    };
    skill_of(&years.iter().map(days_of).collect::<Vec<_>>())
}

/// A year of one quantity, in any unit.
pub(super) struct JudgedYear {
    /// Whether its errors count; its observed values are in the means of other years in any case.
    pub is_judged: bool,
    /// Observed, where it was, and modelled, day by day.
    pub days: Vec<(Option<f64>, f64)>,
}

/// The same of any quantity.
pub(super) fn skill_of(years: &[JudgedYear]) -> Option<f64> {
    let longest = years.iter().map(|year| year.days.len()).max()?;
    let (mut sums, mut counts) = (vec![0.0; longest], vec![0_usize; longest]);
    for year in years {
        for (day, (observed, _)) in year.days.iter().enumerate() {
            if let Some(observed) = observed {
                sums[day] += observed;
                counts[day] += 1;
            }
        }
    }
    let (mut of_model, mut of_mean) = (0.0, 0.0);
    for year in years.iter().filter(|year| year.is_judged) {
        for (day, (observed, modelled)) in year.days.iter().enumerate() {
            let Some(observed) = observed.filter(|_| counts[day] > LEAST_OTHER_YEARS) else {
                continue;
            };
            let mean = (sums[day] - observed) / (counts[day] - 1) as f64;
            of_model += (modelled - observed) * (modelled - observed);
            of_mean += (mean - observed) * (mean - observed);
        }
    }
    (of_mean > 0.0).then(|| 1.0 - of_model / of_mean)
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::fit::DayPair;
    use crate::observed::Kind;
    use chrono::NaiveDate;

    fn year(water_year: i32, observed_mm: f64, modelled_mm: f64) -> ComparedYear {
        let first = NaiveDate::from_ymd_opt(water_year - 1, 10, 1).expect("a date");
        let days = vec![DayPair { observed_mm: Some(observed_mm), modelled_mm }; 365];
        ComparedYear::of(water_year, first, days, Kind::Pillow, &[])
    }

    /// By hand: years of 100, 100, 100, 100, 100 and 160 mm. The last misses the mean of the others by 60 and is modelled 30
    /// off: 1 - 900/3600 = 0.75. Over all years the others miss theirs, 112, by 12: 1 - 900/(3600 + 5*144) = 0.791667.
    #[test]
    fn the_year_itself_is_not_in_its_mean() {
        let mut years: Vec<ComparedYear> = (2001..2006).map(|name| year(name, 100.0, 100.0)).collect();
        years.push(year(2006, 160.0, 130.0));
        let last = skill(&years, |name| name == 2006).expect("a skill");
        let all = skill(&years, |_| true).expect("a skill");
        assert!((last - 0.75).abs() < 1e-12, "{last}");
        assert!((all - (1.0 - 900.0 / 4320.0)).abs() < 1e-12, "{all}");
        assert_eq!(skill(&years[1..], |_| true), None, "four other years are too few");
    }
}
