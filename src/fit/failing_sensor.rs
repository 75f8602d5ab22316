//! Winters in which a temperature sensor was failing, by the record's own other years. Limits are common practice.

use super::left_out::LEAST_YEARS;
use crate::weather::{Series, YearView};
use chrono::{Datelike, Month};

/// A month's mean daily range lies so near that month's median year, degC,
pub(super) const RANGE_C: f64 = 5.0;
/// or so near in scaled median deviations of its years: a sensor that fails shows it there first.
pub(super) const RANGE_DEVIATIONS: f64 = 4.0;
/// A minimum or maximum lies so near the median of its month, degC,
pub(super) const FAR_C: f64 = 25.0;
/// or so near in scaled median deviations of the month's days: continental winters reach far.
pub(super) const FAR_DEVIATIONS: f64 = 4.0;
/// So many farther ones may be gross errors of single days.
pub(super) const MOST_FAR: usize = 2;
/// Of a water year the first nine months are asked; snow is gone in the others, or nearly so.
pub(super) const MONTHS_ASKED: usize = 9;
/// Median deviation of normal numbers to their standard deviation.
const NORMAL_SCALE: f64 = 1.4826;

/// Water years in which a month's daily range is not that of the place, and the first such month in words. Records of mean
/// temperature alone have no range.
pub(super) fn odd_ranges(weather: &Series) -> Vec<(i32, String)> {
    let by_year: Vec<[Option<f64>; 12]> =
        weather.years.iter().map(|span| mean_ranges(weather.view(span))).collect();
    let usual: Vec<Option<[f64; 2]>> = (0..12)
        .map(|month| {
            let ranges: Vec<f64> = by_year.iter().filter_map(|year| year[month]).collect();
            (ranges.len() >= LEAST_YEARS).then(|| usual(&ranges))
        })
        .collect();
    let odd = weather.years.iter().zip(&by_year).filter_map(|(span, ranges)| {
        let months = (0..MONTHS_ASKED).map(|ahead| (span.first.month0() as usize + ahead) % 12);
        let found = months.filter_map(|month| Some((month, ranges[month]?, usual[month]?))).find(
            |(_, range, [middle, deviation])| {
                let off = (range - middle).abs();
                off > RANGE_C && off > RANGE_DEVIATIONS * deviation
            },
        );
        found.map(|(month, range, [middle, _])| {
            let name = Month::try_from(month as u8 + 1).map_or("", |month| month.name());
            (span.water_year, format!("{range:.1} degC in {name}, {middle:.1} in the median year"))
        })
    });
    odd.collect()
}

/// Mean daily range by month, January first, degC.
fn mean_ranges(year: YearView<'_>) -> [Option<f64>; 12] {
    let mut sums = [(0.0, 0.0); 12];
    for (month, half_range_c) in year.month.iter().zip(year.half_range_c) {
        let (sum_c, days) = &mut sums[usize::from(*month)];
        *sum_c += 2.0 * half_range_c;
        *days += 1.0;
    }
    sums.map(|(sum_c, days)| (days > 0.0).then(|| sum_c / days))
}

/// Water years with minima and maxima that the place does not have, and how many in words.
pub(super) fn far_values(weather: &Series) -> Vec<(i32, String)> {
    let extremes = |day: usize| {
        let (mean_c, half_range_c) = (weather.mean_c[day], weather.half_range_c[day]);
        [mean_c - half_range_c, mean_c + half_range_c]
    };
    let mut by_month = vec![[Vec::new(), Vec::new()]; 12];
    for (day, month) in weather.month.iter().enumerate() {
        for (values, value) in by_month[usize::from(*month)].iter_mut().zip(extremes(day)) {
            values.push(value);
        }
    }
    // Of means alone both are one value.
    let (values_a_day, name) = match weather.half_range_c.iter().all(|half_range_c| *half_range_c == 0.0) {
        true => (1, "daily means"),
        false => (2, "minima and maxima"),
    };
    let usual: Vec<[Option<[f64; 2]>; 2]> = by_month
        .into_iter()
        .map(|extremes| extremes.map(|values| (!values.is_empty()).then(|| usual(&values))))
        .collect();
    let far = weather.years.iter().filter(|_| weather.years.len() >= LEAST_YEARS).filter_map(|span| {
        let is_asked = |day: &usize| {
            let ahead = usize::from(weather.month[*day]) + 12 - span.first.month0() as usize;
            ahead % 12 < MONTHS_ASKED
        };
        let is_far = |day: usize| {
            let month = &usual[usize::from(weather.month[day])];
            extremes(day)
                .into_iter()
                .zip(month)
                .take(values_a_day)
                .filter(|(value, usual)| {
                    usual.is_some_and(|[middle, deviation]| {
                        (value - middle).abs() > FAR_C.max(FAR_DEVIATIONS * deviation)
                    })
                })
                .count()
        };
        let count: usize = (span.start..span.start + span.days).filter(is_asked).map(is_far).sum();
        (count > MOST_FAR).then(|| (span.water_year, format!("{count} {name}")))
    });
    far.collect()
}

/// Median and scaled median deviation.
fn usual(values: &[f64]) -> [f64; 2] {
    let middle = median(values.to_vec());
    [middle, NORMAL_SCALE * median(values.iter().map(|value| (value - middle).abs()).collect())]
}

/// Of an even number of values the mean of the two in the middle.
pub(super) fn median(mut values: Vec<f64>) -> f64 {
    values.sort_by(f64::total_cmp);
    let middle = values.len() / 2;
    if values.len().is_multiple_of(2) { (values[middle - 1] + values[middle]) / 2.0 } else { values[middle] }
}
