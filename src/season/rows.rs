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

/// Turns a table into the highest of its running sums so far, in place, and leaves the last running sum in `total`.
///
/// Net melt falls on a day that freezes more than it melts; its running maximum reaches a share on the same day as the
/// running sum first does, and can be searched.
#[multiversion(targets("x86_64+avx512f+avx512vl+avx512dq+avx2+avx", "x86_64+avx2+avx"))]
pub(super) fn accumulate(table: &mut [f64], total: &mut [f64], reached: &mut [f64]) {
    let width = total.len();
    total.fill(0.0);
    reached.fill(0.0);
    for row in table.chunks_exact_mut(width) {
        let (total, reached) = (&mut total[..width], &mut reached[..width]);
        for column in 0..width {
            total[column] += row[column];
            reached[column] = if total[column] > reached[column] { total[column] } else { reached[column] };
            row[column] = reached[column];
        }
    }
}
