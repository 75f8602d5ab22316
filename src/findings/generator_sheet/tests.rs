//! Whole sheets: every statistic of small series by hand, and generators that are wrong on purpose.

use super::*;
use crate::calendar::WaterYearStart;
use crate::weather::{Series, YearSpan};
use chrono::Datelike;

const WET_DAY_MM: f64 = 0.3;

fn day(month: u32, day: u32) -> MonthDay {
    MonthDay::new(month, day).unwrap()
}

fn questions(survey: MonthDay) -> SheetQuestions {
    SheetQuestions::new(WET_DAY_MM, WaterYearStart(day(10, 1)), survey)
}

/// Water years from 1 October 2000 on; of each day, by its year and its place among the days that are no 29 February, the
/// minimum, the maximum and the precipitation. 29 February has 900 mm at 90 degC, which must be seen nowhere.
fn series(years: i32, weather: impl Fn(i32, usize) -> [f64; 3]) -> Series {
    let starts = WaterYearStart(day(10, 1));
    let mut series = Series::default();
    for year in 0..years {
        let water_year = 2001 + year;
        let (first, days) = (starts.first_day(water_year), starts.days_in(water_year));
        let start = series.mean_c.len();
        series.years.push(YearSpan { water_year, first, start, days, follows: year > 0 });
        let mut date = 0;
        for at in first.iter_days().take(days) {
            let is_leap_day = (at.month(), at.day()) == (2, 29);
            let [tmin_c, tmax_c, mm] = if is_leap_day { [90.0, 90.0, 900.0] } else { weather(year, date) };
            date += usize::from(!is_leap_day);
            series.mean_c.push((tmin_c + tmax_c) / 2.0);
            series.half_range_c.push((tmax_c - tmin_c) / 2.0);
            series.precipitation_mm.push(mm);
            series.month.push(at.month0() as u8);
            series.day_of_year.push(at.ordinal() as u16);
        }
    }
    series
}

fn value(sample: &SheetSample, statistic: Statistic, period: Period) -> Option<f64> {
    let taken = sample.taken.iter().find(|taken| taken.statistic == statistic).unwrap();
    taken.values.iter().find(|(of, _)| *of == period).unwrap().1
}

/// 1e-12 is the rounding of sums of some hundred numbers of that size.
fn near(found: Option<f64>, expected: f64) {
    let found = found.unwrap();
    assert!((found - expected).abs() <= 1e-12 * expected.abs().max(1.0), "{found} for {expected}");
}

/// Four years, the fourth a leap year: on 1 October 10, 30, 20 and 60 mm, on 1 May 4 mm, on all other days the 0.3 mm that
/// are not wet.
fn by_hand() -> SheetSample {
    // 1 May is day 212 counted from 0: 31 + 30 + 31 + 31 + 28 + 31 + 30.
    let rain = |year: i32, date: usize| match date {
        0 => [10.0, 30.0, 20.0, 60.0][year as usize],
        212 => 4.0,
        _ => 0.3,
    };
    let series = series(4, |year, date| {
        let mean_c = if rain(year, date) > WET_DAY_MM { 8.0 } else { 2.0 } + f64::from(year);
        [mean_c - 3.0, mean_c + 5.0, rain(year, date)]
    });
    questions(day(4, 1)).sample(&series, &[100.0, 300.0, 200.0, 600.0])
}

/// By hand: October has 30 days of 0.3 mm beside the wet one: totals are 9 + 10, 30, 20, 60 mm; about their mean of 39,
/// departures are -20, 0, -10, 30 with squares of 1400. April has 30 days of 0.3 mm each year.
#[test]
fn totals_of_months_and_of_seasons() {
    let sample = by_hand();
    let [october, april] = [9, 3].map(Period::Month);
    near(value(&sample, Statistic::MonthMean, october), 39.0);
    near(value(&sample, Statistic::MonthDeviation, october), (1400.0_f64 / 3.0).sqrt());
    near(value(&sample, Statistic::MonthMean, april), 9.0);
    near(value(&sample, Statistic::MonthDeviation, april), 0.0);
    // The cool season has 182 dates, one of them wet, the year 365, two of them wet.
    near(value(&sample, Statistic::TotalMean, Period::CoolSeason), 30.0 + 181.0 * 0.3);
    near(value(&sample, Statistic::TotalMean, Period::WaterYear), 34.0 + 363.0 * 0.3);
    near(value(&sample, Statistic::TotalDeviation, Period::WaterYear), (1400.0_f64 / 3.0).sqrt());
    near(value(&sample, Statistic::TotalLowest, Period::CoolSeason), 10.0 + 181.0 * 0.3);
    near(value(&sample, Statistic::TotalHighest, Period::WaterYear), 64.0 + 363.0 * 0.3);
    // Products of neighbours: -20 * 0 + 0 * -10 + -10 * 30.
    near(value(&sample, Statistic::TotalLag1, Period::CoolSeason), -300.0 / 1400.0);
    // The median of 10, 20, 30, 60 is 25: the first year is below, the second is not, the third is.
    near(value(&sample, Statistic::DryRun, Period::WaterYear), 1.0);
}

/// By hand: one wet day of 31 in October, none in April. Eight wet days in eight spells, cut by nothing; dry spells of 211
/// days after 1 October and of 152 after 1 May, each four times.
#[test]
fn wet_days_and_spells() {
    let sample = by_hand();
    near(value(&sample, Statistic::WetShare, Period::Month(9)), 1.0 / 31.0);
    near(value(&sample, Statistic::WetShare, Period::Month(3)), 0.0);
    near(value(&sample, Statistic::WetSpell, Period::WaterYear), 1.0);
    near(value(&sample, Statistic::DrySpell, Period::WaterYear), (211.0 + 152.0) / 2.0);
    near(value(&sample, Statistic::LongestDrySpell, Period::WaterYear), 211.0);
    near(value(&sample, Statistic::WetMean, Period::CoolSeason), 30.0);
    near(value(&sample, Statistic::WetMean, Period::WarmSeason), 4.0);
    // Type 8: of four numbers the 95 % quantile stands at 3.8 + 1.95/3 = 4.45, beyond the last.
    near(value(&sample, Statistic::WetHigh, Period::CoolSeason), 60.0);
    near(value(&sample, Statistic::LargestDay, Period::WaterYear), 30.0);
    assert_eq!(sample.largest_day_mm, Some(60.0), "29 February is left out");
}

/// By hand: the days of a month other than October and May have minima of -1, 0, 1, 2 in the four years, as many of each: mean
/// 0.5, squares of 5/4 a day, over 4n - 1. Maxima stand 8 degC higher, wet days 6 degC.
#[test]
fn temperatures_and_what_rain_has_to_do_with_them() {
    let sample = by_hand();
    let january = Period::Month(0);
    let deviation = (1.25_f64 * 124.0 / 123.0).sqrt();
    near(value(&sample, Statistic::MinimumMean, january), 0.5);
    near(value(&sample, Statistic::MinimumDeviation, january), deviation);
    near(value(&sample, Statistic::MaximumMean, january), 8.5);
    near(value(&sample, Statistic::MaximumDeviation, january), deviation);
    for season in [Period::CoolSeason, Period::WarmSeason] {
        near(value(&sample, Statistic::WetLessDry, season), 6.0);
    }
    // Mean temperature rises by 1 degC a year, precipitation departs by -20, 0, -10, 30: -1.5, -0.5, 0.5, 1.5 with squares of
    // 5 make products of 30 - 0 - 5 + 45.
    near(value(&sample, Statistic::Correlation, Period::CoolSeason), 70.0 / (1400.0_f64 * 5.0).sqrt());
    assert_eq!(value(&sample, Statistic::Correlation, january), None, "January's total is always the same");
}

/// By hand: 100, 200, 300, 600 have the mean 300, departures -200, -100, 0, 300 and squares 140000. Type 8: quantiles at
/// 0.4 + 1.1/3 (below the first), 2.5 and 3.6 + 1.9/3 (beyond the last).
#[test]
fn snow_on_the_survey_date() {
    let sample = by_hand();
    let of = |statistic| value(&sample, statistic, Period::WaterYear);
    near(of(Statistic::SweMean), 300.0);
    near(of(Statistic::SweDeviation), (140_000.0_f64 / 3.0).sqrt());
    near(of(Statistic::SweLow), 100.0);
    near(of(Statistic::SweMedian), 250.0);
    near(of(Statistic::SweHigh), 600.0);
}

/// One dry year: there is no wet day, no deviation and no correlation, and these are none, not 0.
#[test]
fn undefined_is_not_zero() {
    let dry = series(1, |_, _| [-1.0, 1.0, 0.0]);
    let sample = questions(day(4, 1)).sample(&dry, &[0.0]);
    for (statistic, period) in [
        (Statistic::SweDeviation, Period::WaterYear),
        (Statistic::MonthDeviation, Period::Month(0)),
        (Statistic::WetSpell, Period::WaterYear),
        (Statistic::WetMean, Period::CoolSeason),
        (Statistic::WetHigh, Period::WarmSeason),
        (Statistic::WetLessDry, Period::CoolSeason),
        (Statistic::TotalLag1, Period::WaterYear),
        (Statistic::Correlation, Period::Month(6)),
    ] {
        assert_eq!(value(&sample, statistic, period), None, "{statistic:?}");
    }
    assert_eq!(value(&sample, Statistic::WetShare, Period::Month(0)), Some(0.0));
    let sheet = GeneratorSheet::of(&questions(day(4, 1)), &sample, &vec![sample.clone(); 20]);
    let none = sheet.statistics.iter().flat_map(|of| &of.lines).filter(|line| line.verdict.is_none());
    assert!(none.clone().all(|line| line.record.is_none() && line.range.is_none() && line.realizations == 0));
    assert_eq!(sheet.lines_judged + none.count(), LINES);
    assert_eq!(sheet.lines_outside, 0);
}

/// By hand: 5 of snow; 24; 12 + 3 + 4 + 1; 10 + 1; 48; 2 + 14.
const LINES: usize = 5 + 24 + 20 + 11 + 48 + 16;

/// Where the survey date is the water year's first day there is no cool season: its lines are those of the whole year.
#[test]
fn without_a_cool_season_there_are_whole_years() {
    let series =
        series(3, |year, date| [0.0, f64::from(year), if date == 5 { f64::from(year) } else { 0.0 }]);
    let lines = |survey| {
        let sample = questions(survey).sample(&series, &[1.0, 2.0, 3.0]);
        sample.taken.iter().map(|taken| taken.values.len()).sum::<usize>()
    };
    // Wet days' mean and quantile, totals' mean, deviation, ends and correlation, wet less dry and the correlation have one
    // less.
    assert_eq!([day(4, 1), day(10, 1)].map(lines), [LINES, LINES - 9]);
    let sample = questions(day(10, 1)).sample(&series, &[1.0, 2.0, 3.0]);
    near(value(&sample, Statistic::WetMean, Period::WaterYear), 1.5);
}

/// A record of 30 years that differ, and 40 realizations each of as many years of the same kind, drawn by a plain
/// multiplicative congruence.
fn made(change: fn([f64; 3]) -> [f64; 3]) -> GeneratorSheet {
    let weather = |salt: u64| {
        series(30, move |year, date| {
            let mut hash =
                (salt * 1_000_003 + year as u64 * 367 + date as u64).wrapping_mul(0x9e37_79b9_7f4a_7c15);
            hash = (hash ^ (hash >> 31)).wrapping_mul(0xbf58_476d_1ce4_e5b9);
            let uniform = ((hash ^ (hash >> 29)) >> 11) as f64 / (1u64 << 53) as f64;
            let mean_c = 10.0 * uniform - 5.0;
            [mean_c - 4.0, mean_c + 4.0, if uniform > 0.7 { 20.0 * (uniform - 0.7) } else { 0.0 }]
        })
    };
    let questions = questions(day(4, 1));
    let sample = |weather: &Series| {
        // Snow of a kind: the cool season's precipitation on days below 4 degC.
        let swe = |year: &YearSpan| {
            let view = weather.view(year);
            let days = view.mean_c.iter().zip(view.precipitation_mm).take(182);
            days.filter(|(mean_c, _)| **mean_c < 4.0).map(|(_, mm)| mm).sum()
        };
        questions.sample(weather, &weather.years.iter().map(swe).collect::<Vec<f64>>())
    };
    let realizations: Vec<SheetSample> = (1..=40)
        .map(|salt| {
            let mut made = weather(salt);
            for ((mean_c, half_c), mm) in
                made.mean_c.iter_mut().zip(&mut made.half_range_c).zip(&mut made.precipitation_mm)
            {
                let [tmin_c, tmax_c, changed_mm] = change([*mean_c - *half_c, *mean_c + *half_c, *mm]);
                (*mean_c, *half_c, *mm) = ((tmin_c + tmax_c) / 2.0, (tmax_c - tmin_c) / 2.0, changed_mm);
            }
            sample(&made)
        })
        .collect();
    GeneratorSheet::of(&questions, &sample(&weather(0)), &realizations)
}

fn verdicts(sheet: &GeneratorSheet, statistic: Statistic) -> Vec<Option<Verdict>> {
    let of = sheet.statistics.iter().find(|of| of.statistic == statistic).unwrap();
    of.lines.iter().map(|line| line.verdict).collect()
}

/// Weather of the record's own kind fails about as many lines as chance brings: of 120, 12 are expected, and many hang
/// together.
#[test]
fn the_right_generator_passes() {
    let sheet = made(|as_it_is| as_it_is);
    assert_eq!((sheet.realizations, sheet.years), (40, 30));
    assert!((sheet.outside_by_chance / sheet.lines_judged as f64 - 0.1).abs() < 0.02, "{sheet:?}");
    assert!(sheet.lines_outside < sheet.lines_judged / 4, "{} outside", sheet.lines_outside);
}

/// Twice the precipitation: every month's mean and the snow of the record lie below what was made; the share of wet days, which
/// the wet-day limit hardly touches, and temperatures do not tell it.
#[test]
fn doubled_precipitation_fails_its_lines() {
    let sheet = made(|[tmin_c, tmax_c, mm]| [tmin_c, tmax_c, 2.0 * mm]);
    let below = Some(Verdict::Below);
    for statistic in [
        Statistic::MonthMean,
        Statistic::TotalMean,
        Statistic::WetMean,
        Statistic::SweMean,
        Statistic::LargestDay,
    ] {
        assert!(verdicts(&sheet, statistic).iter().all(|verdict| *verdict == below), "{statistic:?}");
    }
    assert!(verdicts(&sheet, Statistic::MinimumMean).iter().filter(|verdict| **verdict == below).count() < 4);
}

/// 3 degC too warm: every month's minima and maxima of the record lie below what was made, their spread does not.
#[test]
fn three_degrees_fail_their_lines() {
    let sheet = made(|[tmin_c, tmax_c, mm]| [tmin_c + 3.0, tmax_c + 3.0, mm]);
    let below = Some(Verdict::Below);
    for statistic in [Statistic::MinimumMean, Statistic::MaximumMean] {
        assert!(verdicts(&sheet, statistic).iter().all(|verdict| *verdict == below), "{statistic:?}");
    }
    assert_eq!(verdicts(&sheet, Statistic::SweMean), [Some(Verdict::Above)], "less of it falls as snow");
    for statistic in [Statistic::MinimumDeviation, Statistic::MonthMean] {
        let outside = verdicts(&sheet, statistic).into_iter().flatten().filter(|of| *of != Verdict::Within);
        assert!(outside.count() < 4, "{statistic:?}");
    }
}
