//! Passes over the rows of a year block, every column by itself.
//!
//! Each is compiled for several widths of vectors. Columns never meet, so the width cannot change a bit.

use multiversion::multiversion;

/// Highest value of each column and the first day (from 1) that has it. `highest` and `day` come in as 0 and 1.
///
/// A pack whose held water refreezes keeps its SWE, but for the rounding of ice and liquid: a later day is the peak's only
/// where it stands higher than the first by more than [`super::SAME_SWE_MM`].
#[multiversion(targets("x86_64+avx512f+avx512vl+avx512dq+avx2+avx", "x86_64+avx2+avx"))]
pub(super) fn highest(table: &[f64], highest: &mut [f64], day: &mut [f64]) {
    let width = highest.len();
    let mut on_day = vec![0.0; width];
    for (number, row) in table.chunks_exact(width).enumerate() {
        let this_day = (number + 1) as f64;
        let (row, highest, day, on_day) =
            (&row[..width], &mut highest[..width], &mut day[..width], &mut on_day[..width]);
        for column in 0..width {
            let swe = row[column];
            let is_new = swe > on_day[column] + super::SAME_SWE_MM;
            on_day[column] = if is_new { swe } else { on_day[column] };
            day[column] = if is_new { this_day } else { day[column] };
            highest[column] = if swe > highest[column] { swe } else { highest[column] };
        }
    }
}

/// Adds every row to `sum`.
#[multiversion(targets("x86_64+avx512f+avx512vl+avx512dq+avx2+avx", "x86_64+avx2+avx"))]
pub(super) fn add(table: &[f64], sum: &mut [f64]) {
    let width = sum.len();
    for row in table.chunks_exact(width) {
        for (sum, value) in sum.iter_mut().zip(row) {
            *sum += value;
        }
    }
}

/// Adds every row to `sum`, and every row times its day (from 1) to `moment`.
#[multiversion(targets("x86_64+avx512f+avx512vl+avx512dq+avx2+avx", "x86_64+avx2+avx"))]
pub(super) fn add_with_moment(table: &[f64], sum: &mut [f64], moment: &mut [f64]) {
    let width = sum.len();
    for (number, row) in table.chunks_exact(width).enumerate() {
        let day = (number + 1) as f64;
        let (sum, moment) = (&mut sum[..width], &mut moment[..width]);
        for column in 0..width {
            sum[column] += row[column];
            moment[column] += day * row[column];
        }
    }
}

/// Largest value of `outflow` and of `outflow + rain`, of a day and of three days in succession. The results come in as 0.
///
/// The three days are added anew on each day, so that no rounding of days long past stays in the sum.
#[multiversion(targets("x86_64+avx512f+avx512vl+avx512dq+avx2+avx", "x86_64+avx2+avx"))]
pub(super) fn largest(
    outflow: &[f64],
    rain: &[f64],
    one_day: &mut [f64],
    one_day_with_rain: &mut [f64],
    three_days: &mut [f64],
    three_days_with_rain: &mut [f64],
) {
    let width = one_day.len();
    let larger = |a: f64, b: f64| if b > a { b } else { a };
    for day in 0..outflow.len() / width {
        let (q, r) = (row(outflow, day, width), row(rain, day, width));
        let (one_day, one_day_with_rain) = (&mut one_day[..width], &mut one_day_with_rain[..width]);
        for column in 0..width {
            one_day[column] = larger(one_day[column], q[column]);
            one_day_with_rain[column] = larger(one_day_with_rain[column], q[column] + r[column]);
        }
        if day < 2 {
            continue;
        }
        let [q_1, q_2] = [day - 1, day - 2].map(|day| row(outflow, day, width));
        let [r_1, r_2] = [day - 1, day - 2].map(|day| row(rain, day, width));
        let (three_days, three_days_with_rain) =
            (&mut three_days[..width], &mut three_days_with_rain[..width]);
        for column in 0..width {
            let of_outflow = q_2[column] + q_1[column] + q[column];
            let of_rain = r_2[column] + r_1[column] + r[column];
            three_days[column] = larger(three_days[column], of_outflow);
            three_days_with_rain[column] = larger(three_days_with_rain[column], of_outflow + of_rain);
        }
    }
}

/// A day's row of a table, days counted from 0.
#[inline(always)]
fn row(table: &[f64], day: usize, width: usize) -> &[f64] {
    &table[day * width..(day + 1) * width]
}

/// Counts the days on which both tables of a column hold at least `least`; `count` comes in as 0.
#[multiversion(targets("x86_64+avx512f+avx512vl+avx512dq+avx2+avx", "x86_64+avx2+avx"))]
pub(super) fn count_both(one: &[f64], other: &[f64], least: f64, count: &mut [f64]) {
    let width = count.len();
    for (one, other) in one.chunks_exact(width).zip(other.chunks_exact(width)) {
        let count = &mut count[..width];
        for column in 0..width {
            let is_both = one[column] >= least && other[column] >= least;
            count[column] += if is_both { 1.0 } else { 0.0 };
        }
    }
}

/// Turns a table into the highest of its running sums so far, in place: `total` is the running sum and `reached` its
/// highest, from the days before the table's to its last.
///
/// Net melt falls on a day that freezes more than it melts; its running maximum reaches a share on the same day as the
/// running sum first does, and can be searched.
#[multiversion(targets("x86_64+avx512f+avx512vl+avx512dq+avx2+avx", "x86_64+avx2+avx"))]
pub(super) fn accumulate(table: &mut [f64], total: &mut [f64], reached: &mut [f64]) {
    let width = total.len();
    for row in table.chunks_exact_mut(width) {
        let (total, reached) = (&mut total[..width], &mut reached[..width]);
        for column in 0..width {
            total[column] += row[column];
            reached[column] = if total[column] > reached[column] { total[column] } else { reached[column] };
            row[column] = reached[column];
        }
    }
}
