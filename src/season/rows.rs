//! Passes over the rows of a year block, every column by itself.
//!
//! Each is compiled for several widths of vectors. Columns never meet, so neither the width nor how many columns are taken at a
//! time can change a bit.

use multiversion::multiversion;

/// Columns that are taken at a time: what a pass carries from day to day of so many stays in registers.
const AT_A_TIME: usize = 8;

/// Takes columns `$at..` of a row `$width` wide, first as many at a time as go into registers, then one by one; `$pass` is a
/// function that is generic over their number.
macro_rules! by_columns {
    ($width:expr, $at:ident => $pass:ident($($argument:expr),* $(,)?)) => {
        let in_blocks = $width - $width % AT_A_TIME;
        for $at in (0..in_blocks).step_by(AT_A_TIME) {
            $pass::<AT_A_TIME>($($argument),*);
        }
        for $at in in_blocks..$width {
            $pass::<1>($($argument),*);
        }
    };
}

/// `N` columns of every row of a table, from column `at`.
#[inline(always)]
fn columns<const N: usize>(table: &[f64], width: usize, at: usize) -> impl Iterator<Item = [f64; N]> {
    table.chunks_exact(width).map(move |row| take(row, at))
}

/// `N` numbers of a row.
#[inline(always)]
fn take<const N: usize>(row: &[f64], at: usize) -> [f64; N] {
    let mut taken = [0.0; N];
    taken.copy_from_slice(&row[at..at + N]);
    taken
}

/// Highest value of each column and the first day (from 1) that has it. `highest` and `day` come in as 0 and 1.
///
/// A pack whose held water refreezes keeps its SWE, but for the rounding of ice and liquid: a later day is the peak's only
/// where it stands higher than the first by more than [`super::SAME_SWE_MM`].
#[multiversion(targets("x86_64+avx512f+avx512vl+avx512dq+avx2+avx", "x86_64+avx2+avx"))]
pub(super) fn highest(table: &[f64], highest: &mut [f64], day: &mut [f64]) {
    by_columns!(highest.len(), at => highest_of(table, at, highest, day));
}

#[inline(always)]
fn highest_of<const N: usize>(table: &[f64], at: usize, into: &mut [f64], into_day: &mut [f64]) {
    let (mut highest, mut day): ([f64; N], [f64; N]) = (take(into, at), take(into_day, at));
    let mut on_day = [0.0; N];
    for (number, swe) in columns::<N>(table, into.len(), at).enumerate() {
        let this_day = (number + 1) as f64;
        for column in 0..N {
            let swe = swe[column];
            let is_new = swe > on_day[column] + super::SAME_SWE_MM;
            on_day[column] = if is_new { swe } else { on_day[column] };
            day[column] = if is_new { this_day } else { day[column] };
            highest[column] = if swe > highest[column] { swe } else { highest[column] };
        }
    }
    into[at..at + N].copy_from_slice(&highest);
    into_day[at..at + N].copy_from_slice(&day);
}

/// Adds every row to `sum`.
#[multiversion(targets("x86_64+avx512f+avx512vl+avx512dq+avx2+avx", "x86_64+avx2+avx"))]
pub(super) fn add(table: &[f64], sum: &mut [f64]) {
    by_columns!(sum.len(), at => add_of(table, at, sum));
}

#[inline(always)]
fn add_of<const N: usize>(table: &[f64], at: usize, into: &mut [f64]) {
    let mut sum: [f64; N] = take(into, at);
    for row in columns::<N>(table, into.len(), at) {
        for column in 0..N {
            sum[column] += row[column];
        }
    }
    into[at..at + N].copy_from_slice(&sum);
}

/// Adds every row to `sum`, and every row times its day (from 1) to `moment`.
#[multiversion(targets("x86_64+avx512f+avx512vl+avx512dq+avx2+avx", "x86_64+avx2+avx"))]
pub(super) fn add_with_moment(table: &[f64], sum: &mut [f64], moment: &mut [f64]) {
    by_columns!(sum.len(), at => add_with_moment_of(table, at, sum, moment));
}

#[inline(always)]
fn add_with_moment_of<const N: usize>(
    table: &[f64],
    at: usize,
    into_sum: &mut [f64],
    into_moment: &mut [f64],
) {
    let (mut sum, mut moment): ([f64; N], [f64; N]) = (take(into_sum, at), take(into_moment, at));
    for (number, row) in columns::<N>(table, into_sum.len(), at).enumerate() {
        let day = (number + 1) as f64;
        for column in 0..N {
            sum[column] += row[column];
            moment[column] += day * row[column];
        }
    }
    into_sum[at..at + N].copy_from_slice(&sum);
    into_moment[at..at + N].copy_from_slice(&moment);
}

/// Largest value of `outflow` and of `outflow + rain`, of a day and of three days in succession, into the four rows of
/// `into` in this order: a day's outflow, a day's with rain, three days', three days' with rain.
///
/// The three days are added anew on each day, so that no rounding of days long past stays in the sum.
#[multiversion(targets("x86_64+avx512f+avx512vl+avx512dq+avx2+avx", "x86_64+avx2+avx"))]
pub(super) fn largest(outflow: &[f64], rain: &[f64], width: usize, into: &mut [f64]) {
    by_columns!(width, at => largest_of(outflow, rain, width, at, into));
}

#[inline(always)]
fn largest_of<const N: usize>(outflow: &[f64], rain: &[f64], width: usize, at: usize, into: &mut [f64]) {
    let larger = |a: f64, b: f64| if b > a { b } else { a };
    let mut largest = [[0.0; N]; 4];
    let [mut q_2, mut q_1, mut r_2, mut r_1] = [[0.0; N]; 4];
    let days = columns::<N>(outflow, width, at).zip(columns::<N>(rain, width, at));
    for (q, r) in days {
        // Before the third day one or two of the three are 0, and their sum is no larger than the third day's.
        for column in 0..N {
            let of_outflow = q_2[column] + q_1[column] + q[column];
            let of_rain = r_2[column] + r_1[column] + r[column];
            largest[0][column] = larger(largest[0][column], q[column]);
            largest[1][column] = larger(largest[1][column], q[column] + r[column]);
            largest[2][column] = larger(largest[2][column], of_outflow);
            largest[3][column] = larger(largest[3][column], of_outflow + of_rain);
        }
        (q_2, q_1, r_2, r_1) = (q_1, q, r_1, r);
    }
    for (row, largest) in into.chunks_exact_mut(width).zip(&largest) {
        row[at..at + N].copy_from_slice(largest);
    }
}

/// Counts the days on which both tables of a column hold at least `least`; `count` comes in as 0.
#[multiversion(targets("x86_64+avx512f+avx512vl+avx512dq+avx2+avx", "x86_64+avx2+avx"))]
pub(super) fn count_both(one: &[f64], other: &[f64], least: f64, count: &mut [f64]) {
    by_columns!(count.len(), at => count_both_of(one, other, least, at, count));
}

#[inline(always)]
fn count_both_of<const N: usize>(one: &[f64], other: &[f64], least: f64, at: usize, into: &mut [f64]) {
    let mut count: [f64; N] = take(into, at);
    let width = into.len();
    for (one, other) in columns::<N>(one, width, at).zip(columns::<N>(other, width, at)) {
        for column in 0..N {
            let is_both = one[column] >= least && other[column] >= least;
            count[column] += if is_both { 1.0 } else { 0.0 };
        }
    }
    into[at..at + N].copy_from_slice(&count);
}

/// Turns a table into the highest of its running sums so far, in place: `total` is the running sum and `reached` its
/// highest, from the days before the table's to its last.
///
/// Net melt falls on a day that freezes more than it melts; its running maximum reaches a share on the same day as the
/// running sum first does, and can be searched.
#[multiversion(targets("x86_64+avx512f+avx512vl+avx512dq+avx2+avx", "x86_64+avx2+avx"))]
pub(super) fn accumulate(table: &mut [f64], total: &mut [f64], reached: &mut [f64]) {
    by_columns!(total.len(), at => accumulate_of(table, at, total, reached));
}

#[inline(always)]
fn accumulate_of<const N: usize>(
    table: &mut [f64],
    at: usize,
    into_total: &mut [f64],
    into_reached: &mut [f64],
) {
    let (mut total, mut reached): ([f64; N], [f64; N]) = (take(into_total, at), take(into_reached, at));
    for row in table.chunks_exact_mut(into_total.len()) {
        let melt: [f64; N] = take(row, at);
        for column in 0..N {
            total[column] += melt[column];
            reached[column] = if total[column] > reached[column] { total[column] } else { reached[column] };
        }
        row[at..at + N].copy_from_slice(&reached);
    }
    into_total[at..at + N].copy_from_slice(&total);
    into_reached[at..at + N].copy_from_slice(&reached);
}
