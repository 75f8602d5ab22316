//! What every realization is, and records that are hard to fit.

use super::super::MarkovGamma;
use super::made::Made;
use super::{day, drawn, recipe};
use crate::calendar::WaterYearStart;
use crate::perturb::{Generator, Recipe};
use crate::weather::Series;
use chrono::Datelike;

fn made() -> Made {
    Made {
        years: 12,
        starts: recipe().water_year_starts,
        seed: 3,
        yearly: [0.2, 0.7],
        dry_months: [false; 12],
    }
}

/// Three realizations of 20 years of a record: 365 days a year, on the calendar of a common year, each year following on the
/// one before it, and every number finite.
fn three_sound(record: &Series, recipe: &Recipe) -> Vec<Series> {
    let generator = MarkovGamma::fit(record, recipe);
    let realizations: Vec<Series> = (0..3).map(|number| drawn(&generator, number, 20)).collect();
    for series in &realizations {
        assert_eq!((series.years.len(), series.mean_c.len()), (20, 20 * 365));
        for (number, year) in series.years.iter().enumerate() {
            assert_eq!((year.days, year.start, year.follows), (365, 365 * number, number > 0));
            let view = series.view(year);
            for (date, (month, day)) in year.first.iter_days().zip(view.month.iter().zip(view.day_of_year)) {
                assert_eq!((date.month0() as u8, date.ordinal() as u16), (*month, *day));
            }
        }
        let columns = [&series.mean_c, &series.half_range_c, &series.precipitation_mm];
        assert!(columns.iter().all(|column| column.len() == 20 * 365));
        assert!(columns.iter().flat_map(|column| column.iter()).all(|value| value.is_finite()));
        assert!(series.precipitation_mm.iter().all(|mm| *mm == 0.0 || *mm > recipe.wet_day_mm));
    }
    realizations
}

/// The maximum lies above the minimum on every day, since the daily range is drawn by its logarithm.
#[test]
fn every_day_has_a_range() {
    let realizations = three_sound(&made().record(), &recipe());
    assert!(realizations.iter().flat_map(|series| &series.half_range_c).all(|half_range| *half_range > 0.0));
}

/// A realization is the same however many years are asked for: 30 begin as 10 do.
#[test]
fn more_years_begin_as_fewer_do() {
    let generator = MarkovGamma::fit(&made().record(), &recipe());
    let [ten, thirty] = [10, 30].map(|years| drawn(&generator, 5, years));
    assert_eq!(ten.years, thirty.years[..10]);
    let days = ten.mean_c.len();
    assert_eq!(ten.mean_c, thirty.mean_c[..days]);
    assert_eq!(ten.half_range_c, thirty.half_range_c[..days]);
    assert_eq!(ten.precipitation_mm, thirty.precipitation_mm[..days]);
}

/// The seed and the realization's number alone decide: what was in the buffer and what was drawn before do not matter, and
/// other numbers and seeds are other weather.
#[test]
fn seed_and_number_alone() {
    let record = made().record();
    let of_seed = |seed: u64| MarkovGamma::fit(&record, &Recipe { seed, ..recipe() });
    let generator = of_seed(1);
    let first = drawn(&generator, 4, 6);
    let mut buffer = Series::default();
    for number in [9, 0, 4] {
        generator.fill(number, if number == 4 { 6 } else { 3 }, &mut buffer);
    }
    assert_eq!(buffer, first);
    assert_eq!(drawn(&of_seed(1), 4, 6), first);
    assert_ne!(drawn(&generator, 5, 6).precipitation_mm, first.precipitation_mm);
    assert_ne!(drawn(&of_seed(2), 4, 6).precipitation_mm, first.precipitation_mm);
}

/// A record with the mean temperature alone has no ranges, and its realizations have none.
#[test]
fn the_mean_temperature_alone() {
    let mut record = made().record();
    record.half_range_c.fill(0.0);
    let realizations = three_sound(&record, &recipe());
    assert!(realizations.iter().flat_map(|series| &series.half_range_c).all(|half_range| *half_range == 0.0));
}

/// Water years of the southern hemisphere, one that starts mid-month, and surveys that leave no cool season or no warm one.
#[test]
fn other_water_years_and_surveys() {
    for (starts, cool_season_ends) in [
        ((4, 1), (9, 1)),
        ((9, 17), (4, 1)),
        ((10, 1), (10, 1)),
        ((10, 1), (9, 30)),
        ((1, 1), (3, 15)),
        ((3, 1), (2, 28)),
    ] {
        let water_year_starts = WaterYearStart(day(starts.0, starts.1));
        let record = Made { starts: water_year_starts, ..made() }.record();
        let ends = day(cool_season_ends.0, cool_season_ends.1);
        let realizations =
            three_sound(&record, &Recipe { water_year_starts, cool_season_ends: ends, ..recipe() });
        let first = realizations[0].years[0].first;
        assert_eq!((first.month(), first.day()), starts);
    }
}

/// Months that are always dry between wet ones stay nearly dry: at most 6 % of their days are wet and at most 1.5 mm fall in
/// one. Chances pass from month to month without steps and are cut off at 0, which leaves some.
#[test]
fn months_without_precipitation() {
    let mut dry_months = [false; 12];
    dry_months[6] = true;
    dry_months[7] = true;
    let realizations = three_sound(&Made { dry_months, ..made() }.record(), &recipe());
    let of_august = realizations.iter().flat_map(|series| series.month.iter().zip(&series.precipitation_mm));
    let days: Vec<f64> = of_august.filter(|(month, _)| **month == 7).map(|(_, mm)| *mm).collect();
    let wet = days.iter().filter(|mm| **mm > 0.0).count();
    assert!(wet * 100 <= 6 * days.len(), "{wet} of {} days of August are wet", days.len());
    let a_month_mm = days.iter().sum::<f64>() / days.len() as f64 * 31.0;
    assert!(a_month_mm < 1.5, "{a_month_mm} mm fall in August");
}

/// As few years as it takes are enough, and one fewer is refused; so it is with wet days.
#[test]
fn the_least_record() {
    let four = Made { years: 4, ..made() }.record();
    assert!(recipe().check(&four).is_ok_and(|unlikely| unlikely.is_some()));
    three_sound(&four, &recipe());
    assert!(recipe().check(&Made { years: 3, ..made() }.record()).is_err());
    let with_wet_days = |count: usize| {
        let mut record = four.clone();
        let wet = record.precipitation_mm.iter_mut().filter(|mm| **mm > 0.25);
        wet.skip(count).for_each(|mm| *mm = 0.0);
        record
    };
    assert!(recipe().check(&with_wet_days(29)).is_err());
    let thirty = with_wet_days(30);
    assert!(recipe().check(&thirty).is_ok());
    three_sound(&thirty, &recipe());
}

/// A record with years left out, as one with gaps has it.
#[test]
fn a_record_with_gaps() {
    let mut record = made().record();
    for (number, year) in record.years.iter_mut().enumerate() {
        year.follows = number % 3 == 1;
    }
    three_sound(&record, &recipe());
}

/// Absurd amounts and temperatures, days that are all alike, every day wet: all stays finite.
#[test]
fn extreme_records() {
    let changed = |change: &dyn Fn(&mut Series)| {
        let mut record = made().record();
        change(&mut record);
        three_sound(&record, &recipe())
    };
    changed(&|record| record.precipitation_mm[400] = 1e6);
    changed(&|record| record.precipitation_mm.iter_mut().for_each(|mm| *mm *= 1e5));
    changed(&|record| record.precipitation_mm.fill(3.0));
    changed(&|record| record.precipitation_mm.iter_mut().for_each(|mm| *mm += 0.5));
    changed(&|record| record.mean_c.fill(-3.0));
    changed(&|record| record.half_range_c.fill(4.0));
    changed(&|record| record.mean_c[100] = 1e6);
    let steps = changed(&|record| {
        record.precipitation_mm.iter_mut().for_each(|mm| *mm = 2.54 * libm::round(*mm / 2.54));
    });
    assert!(steps.iter().flat_map(|series| &series.precipitation_mm).all(|mm| *mm == 0.0 || *mm > 1.27));
}
