//! Wet days that change with warming: the mean holds, levels share what is lost, and what does not change does not.

use super::cases;
use super::scenario::{Climate, scenarios};
use proptest::array::uniform12;
use proptest::prelude::*;
use thawline::perturb::{Generator, Intensity, MeanChange, WetDayChange, YearBlocks};
use thawline::weather::Series;

const WET_DAY_MM: f64 = 0.5;
const SEED: u64 = 8;

fn blocks(record: &Series) -> YearBlocks<'_> {
    YearBlocks { record, seed: SEED, mean_run_years: 2.0 }
}

fn at<'g>(generator: &'g dyn Generator, amount_factor: f64, mean_factor: [f64; 12]) -> Intensity<'g> {
    let change = WetDayChange { amount_factor, mean_factor };
    Intensity { generator, change, wet_day_mm: WET_DAY_MM, seed: SEED }
}

fn filled(generator: &dyn Generator, realization: u32, years: usize) -> Series {
    let mut series = Series::default();
    generator.fill(realization, years, &mut series);
    series
}

fn month_sum_mm(series: &Series, month: u8) -> f64 {
    let days = series.precipitation_mm.iter().zip(&series.month).filter(|(_, of)| **of == month);
    days.map(|(amount_mm, _)| amount_mm).sum()
}

fn bits(values: &[f64]) -> Vec<u64> {
    values.iter().map(|value| value.to_bits()).collect()
}

/// Which days are wet.
fn wet_days(series: &Series) -> Vec<usize> {
    let days = series.precipitation_mm.iter().enumerate();
    days.filter(|(_, amount_mm)| **amount_mm > 0.0).map(|(day, _)| day).collect()
}

/// Thirty years of which three days in ten are wet, in the mean with 6.5 mm, and all others dry.
fn thirty_years() -> Series {
    let climate = Climate {
        seed: 4,
        follows: vec![true; 30],
        first_water_year: 1990,
        is_southern: false,
        mean_c: 3.0,
        swing_c: 10.0,
        noise_c: 3.0,
        half_range_c: 5.0,
        wet_chance: 0.33,
        wet_day_mm: 6.0,
    };
    let mut series = climate.series();
    series.precipitation_mm.iter_mut().filter(|mm| **mm <= WET_DAY_MM).for_each(|mm| *mm = 0.0);
    series
}

proptest! {
    #![proptest_config(cases(48))]

    /// Whatever the record, the intensity and the stated mean change, every month's sum over all years is the unchanged one
    /// times the month's factor; 1e-9 of it is rounding. Temperatures, years and calendar stay, nothing is negative, and
    /// years of one name have the same weather.
    #[test]
    fn the_stated_mean_change_holds(
        scenario in scenarios(),
        amount_factor in 0.3..3.0,
        mean_factor in uniform12(prop_oneof![Just(1.0), 0.0..2.5]),
        realization in any::<u32>(),
    ) {
        let mut record = scenario.climate.series();
        // Days below the limit that are not quite dry.
        record.precipitation_mm.iter_mut().step_by(3).filter(|mm| **mm == 0.0).for_each(|mm| *mm = 0.2);
        let blocks = blocks(&record);
        let plain = filled(&blocks, realization, 6);
        let changed = filled(&at(&blocks, amount_factor, mean_factor), realization, 6);
        for (month, factor) in mean_factor.into_iter().enumerate() {
            let [before, after] = [&plain, &changed].map(|series| month_sum_mm(series, month as u8));
            prop_assert!((after - factor * before).abs() <= 1e-9 * before, "month {month}: {after}, {factor} of {before}");
        }
        prop_assert!(changed.precipitation_mm.iter().all(|mm| *mm >= 0.0));
        // A day that becomes wet takes the air of the wet day whose amount it takes.
        let rest = |series: &Series| Series {
            precipitation_mm: Vec::new(),
            relative_humidity_pct: Vec::new(),
            ..series.clone()
        };
        prop_assert_eq!(rest(&plain), rest(&changed));
        for (number, year) in changed.years.iter().enumerate() {
            let same = changed.years[..number].iter().find(|before| before.water_year == year.water_year);
            if let Some(same) = same {
                let [one, other] = [year, same].map(|year| bits(changed.view(year).precipitation_mm));
                prop_assert_eq!(one, other);
            }
        }
    }

    /// No more on a wet day and no change of the mean change nothing, to the bit, and the record's years are still the
    /// record's.
    #[test]
    fn no_change_changes_nothing(scenario in scenarios(), realization in any::<u32>()) {
        let record = scenario.climate.series();
        let blocks = blocks(&record);
        let unchanged = at(&blocks, 1.0, [1.0; 12]);
        let [before, after] = [&blocks as &dyn Generator, &unchanged].map(|made| filled(made, realization, 5));
        prop_assert_eq!(bits(&before.precipitation_mm), bits(&after.precipitation_mm));
        prop_assert_eq!(before, after);
        let drawn = |made: &dyn Generator| made.drawn(realization, 5).map(|(_, years)| years);
        prop_assert_eq!(drawn(&blocks), drawn(&unchanged));
        prop_assert!(unchanged.keeps_names() && !at(&blocks, 1.1, [1.0; 12]).keeps_names());
        prop_assert!(at(&blocks, 1.1, [1.0; 12]).drawn(realization, 5).is_none());
    }

    /// A level that loses more wet days loses all those that a level loses that loses fewer, and likewise of days that
    /// become wet; an assumed change of the mean is a factor on what a level leaves.
    #[test]
    fn levels_lose_the_same_days_and_more(scenario in scenarios(), factors in [0.4..2.5, 0.4..2.5], realization in any::<u32>()) {
        let mut record = scenario.climate.series();
        record.precipitation_mm.iter_mut().filter(|mm| **mm <= WET_DAY_MM).for_each(|mm| *mm = 0.0);
        let blocks = blocks(&record);
        let [low, high] = [f64::min, f64::max].map(|end| end(factors[0], factors[1]));
        let levels = [low, high].map(|factor| at(&blocks, factor, [1.0; 12]));
        let [many, few] = levels.map(|level| wet_days(&filled(&level, realization, 6)));
        prop_assert!(few.iter().all(|day| many.binary_search(day).is_ok()), "{} of {} days", few.len(), many.len());
        let assumed = MeanChange { generator: &levels[1], seed: SEED, standard_deviation_pct: 20.0 };
        let [level, assumed] = [&levels[1] as &dyn Generator, &assumed].map(|made| filled(made, realization, 6));
        let factor = assumed.precipitation_mm.iter().sum::<f64>() / level.precipitation_mm.iter().sum::<f64>();
        for (assumed, level) in assumed.precipitation_mm.iter().zip(&level.precipitation_mm) {
            prop_assert!(level == &0.0 || (assumed - factor * level).abs() <= 1e-9 * level);
        }
    }
}

/// What the option is there for: at a mean that stands, wet days are 1/1.4 as many and the largest day brings about 1.4 times as
/// much, and driest and wettest years move apart. Of n days with the chance p of an amount x, a year's sum has the variance
/// n (p E(x^2) - p^2 E(x)^2); p/1.4 and 1.4 x make 1.48 times as much of it, by hand with p = 0.304, E(x) = 6.5 and E(x^2) =
/// 78.25, and the ends of thirty years lie in proportion to its root, 1.22. Standard errors over 30 realizations: below 0.005
/// for the share of wet days, some 0.05 for a largest day, which is one of the 1 in 1.4 that stay, and 0.05 for the ends.
#[test]
fn extremes_move_while_the_mean_stands() {
    let record = thirty_years();
    let blocks = blocks(&record);
    let warmed = at(&blocks, 1.4, [1.0; 12]);
    let of = |generator: &dyn Generator| {
        let mut sums = [0.0; 5];
        for realization in 0..30 {
            let series = filled(generator, realization, 30);
            let wet: Vec<f64> = series.precipitation_mm.iter().copied().filter(|mm| *mm > 0.0).collect();
            let years =
                series.years.iter().map(|year| series.view(year).precipitation_mm.iter().sum::<f64>());
            let years: Vec<f64> = years.collect();
            let largest = wet.iter().copied().fold(0.0, f64::max);
            let ends = [
                years.iter().copied().fold(f64::INFINITY, f64::min),
                years.iter().copied().fold(0.0, f64::max),
            ];
            let found = [wet.len() as f64, wet.iter().sum::<f64>(), largest, ends[0], ends[1]];
            sums.iter_mut().zip(found).for_each(|(sum, found)| *sum += found / 30.0);
        }
        sums
    };
    let [before, after] = [&blocks as &dyn Generator, &warmed].map(of);
    let times = |at: usize| after[at] / before[at];
    assert!((times(0) - 1.0 / 1.4).abs() < 0.02, "{} as many wet days", times(0));
    assert!((times(1) - 1.0).abs() < 1e-9, "{} as much in all", times(1));
    assert!((times(2) - 1.35).abs() < 0.15, "{} as much on the largest", times(2));
    let mean_mm = before[1] / 30.0;
    let apart = |sums: [f64; 5]| [mean_mm - sums[3], sums[4] - mean_mm];
    for (after, before) in apart(after).into_iter().zip(apart(before)) {
        assert!((after / before - libm::sqrt(1.48)).abs() < 0.15, "{after} from {before} mm off the mean");
    }
}

/// The same where more wet days are asked for: 1.25 as many at the same intensity, taken from the month's own, and as many as
/// there are days where more would be needed.
#[test]
fn dry_days_become_wet() {
    let record = thirty_years();
    let blocks = blocks(&record);
    let share = |mean_factor: f64| {
        let series = filled(&at(&blocks, 1.0, [mean_factor; 12]), 3, 30);
        wet_days(&series).len() as f64 / series.mean_c.len() as f64
    };
    let before = wet_days(&filled(&blocks, 3, 30)).len() as f64 / 10_957.5;
    // One standard error of a share of 11 000 days is 0.004.
    assert!((share(1.25) - 1.25 * before).abs() < 0.015, "{} from {before}", share(1.25));
    assert_eq!(share(5.0), 1.0);
}

/// A day that becomes wet has the humidity of a wet day, one that stays dry its own: here all wet days have 90 % and all dry ones
/// 30 %.
#[test]
fn days_that_become_wet_are_as_humid_as_wet_ones() {
    let mut record = thirty_years();
    record.relative_humidity_pct =
        record.precipitation_mm.iter().map(|mm| if *mm > 0.0 { 90.0 } else { 30.0 }).collect();
    let blocks = blocks(&record);
    let changed = filled(&at(&blocks, 1.0, [2.0; 12]), 3, 10);
    let wet = wet_days(&changed);
    assert!(wet.len() > 3 * wet_days(&filled(&blocks, 3, 10)).len() / 2, "days became wet");
    for (day, pct) in changed.relative_humidity_pct.iter().enumerate() {
        let expected = if wet.binary_search(&day).is_ok() { 90.0 } else { 30.0 };
        assert_eq!(*pct, expected, "day {day}");
    }
}
