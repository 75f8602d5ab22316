//! Realizations of `year-blocks`: what they are made of, and what alone they depend on.

use super::cases;
use chrono::Datelike;
use proptest::prelude::*;
use thawline::calendar::{MonthDay, WaterYearStart};
use thawline::perturb::{Generator, MeanChange, YearBlocks};
use thawline::weather::{Series, YearSpan};

/// A record whose every day says which day it is: the mean temperature is the day's number in the record and the
/// precipitation one more than that. A year after a gap does not follow.
fn labelled_record(follows: &[bool]) -> Series {
    let start = WaterYearStart(MonthDay::new(10, 1).expect("a day of every year"));
    let mut series = Series::default();
    let mut water_year = 1990;
    for (number, follows) in follows.iter().enumerate() {
        let follows = *follows && number > 0;
        water_year += if follows { 1 } else { 3 };
        let (first, days) = (start.first_day(water_year), start.days_in(water_year));
        let at = series.mean_c.len();
        series.years.push(YearSpan { water_year, first, start: at, days, follows });
        for (day, date) in first.iter_days().take(days).enumerate() {
            series.mean_c.push((at + day) as f64);
            series.half_range_c.push((at + day) as f64 / 2.0);
            series.precipitation_mm.push((at + day + 1) as f64);
            series.month.push(date.month0() as u8);
            series.day_of_year.push(date.ordinal() as u16);
        }
    }
    series
}

const YEARS: usize = 40;

fn blocks(record: &Series, seed: u64, mean_run_years: f64) -> YearBlocks<'_> {
    YearBlocks { record, seed, mean_run_years }
}

fn changed<'g>(generator: &'g YearBlocks<'_>, standard_deviation_pct: f64) -> MeanChange<'g> {
    MeanChange { generator, seed: generator.seed, standard_deviation_pct }
}

fn filled(generator: &dyn Generator, realization: u32) -> Series {
    let mut series = Series::default();
    generator.fill(realization, YEARS, &mut series);
    series
}

fn order(series: &Series) -> Vec<i32> {
    series.years.iter().map(|year| year.water_year).collect()
}

proptest! {
    #![proptest_config(cases(64))]

    /// Without a change of mean precipitation a realization is years of the record as they are, the same that it is filled
    /// with; with one it is not.
    #[test]
    fn years_as_they_are(seed in any::<u64>(), number in any::<u32>()) {
        let record = labelled_record(&[true; 12]);
        let generator = blocks(&record, seed, 3.0);
        let (drawn_from, years) = generator.drawn(number, YEARS).expect("the record's own years");
        let mut drawn = Series::default();
        for year in &years {
            drawn.push_year(drawn_from, year, !drawn.years.is_empty());
        }
        prop_assert_eq!(drawn, filled(&generator, number));
        prop_assert!(changed(&generator, 0.0).drawn(number, YEARS).is_some());
        prop_assert!(changed(&generator, 10.0).drawn(number, YEARS).is_none());
    }

    /// A realization is a function of seed and number: what was in the buffer and what was drawn before is forgotten.
    #[test]
    fn seed_and_number_alone(seed in any::<u64>(), number in any::<u32>(), others in any::<[u32; 3]>()) {
        let record = labelled_record(&[true; 12]);
        let generator = blocks(&record, seed, 3.0);
        let first = filled(&generator, number);
        let mut buffer = Series::default();
        for other in others {
            generator.fill(other, YEARS, &mut buffer);
        }
        generator.fill(number, YEARS, &mut buffer);
        prop_assert_eq!(&buffer, &first);
        prop_assert_ne!(order(&filled(&generator, number.wrapping_add(1))), order(&first));
        prop_assert_ne!(order(&filled(&blocks(&record, seed ^ 1, 3.0), number)), order(&first));
    }

    /// Every year of a realization is one whole year of the record, day by day, temperature with its own precipitation
    /// and calendar; the first starts bare and all others carry over.
    #[test]
    fn whole_years_of_the_record(seed in any::<u64>(), follows in prop::collection::vec(prop::bool::weighted(0.7), 1..15)) {
        let record = labelled_record(&follows);
        let made = filled(&blocks(&record, seed, 2.5), 0);
        prop_assert_eq!(made.years.len(), 40);
        for (number, year) in made.years.iter().enumerate() {
            let from = record.years.iter().find(|from| from.water_year == year.water_year);
            let from = from.expect("a year of the record");
            prop_assert_eq!(year.follows, number > 0);
            let (made, from) = (made.view(year), record.view(from));
            prop_assert_eq!(made.first, from.first);
            prop_assert_eq!(made.mean_c, from.mean_c);
            prop_assert_eq!(made.half_range_c, from.half_range_c);
            prop_assert_eq!(made.precipitation_mm, from.precipitation_mm);
            prop_assert_eq!(made.month, from.month);
            prop_assert_eq!(made.day_of_year, from.day_of_year);
        }
    }

    /// The assumed mean change multiplies all precipitation of a realization by one factor and touches neither the
    /// order of years nor a temperature.
    #[test]
    fn mean_change_keeps_the_order(seed in any::<u64>(), number in any::<u32>(), sd_pct in 1.0..30.0) {
        let record = labelled_record(&[true; 9]);
        let generator = blocks(&record, seed, 3.0);
        let plain = filled(&generator, number);
        let changed = filled(&changed(&generator, sd_pct), number);
        prop_assert_eq!(order(&plain), order(&changed));
        prop_assert_eq!(&plain.mean_c, &changed.mean_c);
        let factor = changed.precipitation_mm[0] / plain.precipitation_mm[0];
        prop_assert!(factor >= 0.0 && factor != 1.0, "factor {factor}");
        for (changed, plain) in changed.precipitation_mm.iter().zip(&plain.precipitation_mm) {
            prop_assert!((changed - factor * plain).abs() <= 1e-12 * plain * factor.max(1.0));
        }
    }
}

/// With endless runs the record is walked year by year; only a gap starts a new run, anywhere, and the first year
/// follows the last.
#[test]
fn runs_end_at_gaps() {
    let record = labelled_record(&[false, true, true, false, true, true, true]);
    let names = order(&record);
    let mut after_gap = std::collections::BTreeSet::new();
    for number in 0..50 {
        let made = order(&filled(&blocks(&record, 7, 1e12), number));
        for pair in made.windows(2) {
            let at = names.iter().position(|name| *name == pair[0]).expect("a year of the record");
            match at {
                2 => _ = after_gap.insert(pair[1]),
                6 => assert_eq!(pair[1], names[0], "the first year follows the last"),
                _ => assert_eq!(pair[1], names[at + 1], "a run goes on"),
            }
        }
    }
    assert_eq!(after_gap.len(), names.len(), "after a gap a run starts at any year: {after_gap:?}");
}

/// Runs have the stated mean length. In a record of 200 years without a gap a new run goes on by chance once in 200
/// times; of 39000 steps with L = 4 a quarter of the rest are expected to break the run, within 5 standard errors
/// (0.011 = 5*sqrt(0.25*0.75/39000)).
#[test]
fn runs_have_their_mean_length() {
    let mut follows = vec![true; 200];
    follows[0] = false;
    let record = labelled_record(&follows);
    let names = order(&record);
    let (mut breaks, mut steps) = (0, 0);
    for number in 0..1000 {
        let made = order(&filled(&blocks(&record, 11, 4.0), number));
        for pair in made.windows(2) {
            let is_run = pair[1] == pair[0] + 1 || (pair[0] == names[199] && pair[1] == names[0]);
            steps += 1;
            breaks += usize::from(!is_run);
        }
    }
    let share = breaks as f64 / steps as f64;
    let expected = 0.25 * (1.0 - 1.0 / 200.0);
    assert!((share - expected).abs() < 0.011, "{share} of the steps start a run, {expected} expected");
}
