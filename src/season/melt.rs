//! When the snow melts: dates and shares of net melt, half-gone day, melt-out.

use super::{Asked, Kind, Measure, NONE, NOT_GONE, Peaks, SeasonSettings, name_of, rows};
use super::{BARE_MM, BASIN_MELT_OUT_SHARE, LEAST_MELT_MM, LEAST_PEAK_MM, SAME_SWE_MM};
use crate::calendar::day_of_water_year;
use crate::snow::YearBlock;

const MELT_SHARES: [f64; 3] = [0.1, 0.5, 0.9];
/// Dates of the family, which stand before its shares.
const DATES: usize = MELT_SHARES.len() + 3;

/// Name of the day on which the snow is gone.
pub const MELT_OUT_DAY: &str = "melt_out_day";

pub(super) fn list(settings: &SeasonSettings) -> Vec<Measure> {
    let date = |name: &str, title: &str| Measure::new(Kind::DayOfWaterYear, name, title);
    let dates: [Measure; DATES] = [
        date("melt_d10_day", "day with 10 % of the net melt done"),
        date("melt_d50_day", "day with half of the net melt done"),
        date("melt_d90_day", "day with 90 % of the net melt done"),
        date("half_gone_day", "half-gone day"),
        date(MELT_OUT_DAY, "melt-out"),
        date("last_snow_day", "last day with snow").of_basin(),
    ];
    let shares = settings.melt_shares_before.iter().map(|day| {
        let title = format!("net melt done before {}", day.words());
        Measure::new(Kind::Share, format!("melt_share_before_{}", name_of(*day)), title)
    });
    dates.into_iter().chain(shares).collect()
}

/// Takes the family's measures; accumulates the block's net melt in place, which gives the sums before stated days in
/// passing.
///
/// A share is the plain sum of net melt before its day over the year's: where rain freezes into the pack before anything
/// melts it can lie a little below 0, and where snow of the next winter takes up rain, a little above 1.
pub(super) fn take(block: &mut YearBlock, peaks: &Peaks, asked: &Asked, into: &mut [f64]) {
    let (width, days) = (block.width, block.days);
    let (dates, shares) = into.split_at_mut(DATES * width);
    let day_of = |(at, day): (usize, &_)| (day_of_water_year(block.first, *day) - 1, at);
    let mut befores: Vec<(usize, usize)> =
        asked.settings.melt_shares_before.iter().enumerate().map(day_of).collect();
    befores.sort_unstable();
    let mut total = vec![0.0; width];
    let mut reached = vec![0.0; width];
    let mut done = 0;
    for (day, at) in befores {
        rows::accumulate(&mut block.net_melt_mm[done * width..day * width], &mut total, &mut reached);
        shares[at * width..(at + 1) * width].copy_from_slice(&total);
        done = day;
    }
    rows::accumulate(&mut block.net_melt_mm[done * width..days * width], &mut total, &mut reached);

    let has_timing = |column: usize| peaks.swe_mm[column] >= LEAST_PEAK_MM;
    let has_melt = |column: usize| has_timing(column) && total[column] >= LEAST_MELT_MM;
    for row in shares.chunks_exact_mut(width) {
        for (column, share) in row.iter_mut().enumerate() {
            *share = if has_melt(column) { *share / total[column] } else { NONE };
        }
    }
    for column in 0..width {
        let mut set = |measure: usize, value: f64| dates[measure * width + column] = value;
        for (measure, share) in MELT_SHARES.into_iter().enumerate() {
            let day =
                if has_melt(column) { first_day_with(block, column, share * total[column]) } else { NONE };
            set(measure, day);
        }
        let [half_gone, melt_out, last_snow] =
            if has_timing(column) { departure(block, peaks, column) } else { [NONE; 3] };
        set(3, half_gone);
        set(4, melt_out);
        set(5, last_snow);
    }
}

/// Whether a column's snow stays through the year's end: it never melts out after its peak.
pub fn keeps_snow(block: &YearBlock, column: usize) -> bool {
    let swe = |day: usize| block.swe_mm[day * block.width + column];
    // Most columns have none on the last day; then the peak need not be looked for.
    if swe(block.days - 1) < BARE_MM {
        return false;
    }
    let mut peak_day = 0;
    for day in 1..block.days {
        if swe(day) > swe(peak_day) + SAME_SWE_MM {
            peak_day = day;
        }
    }
    (peak_day..block.days).all(|day| swe(day) >= BARE_MM)
}

/// First day (from 1) on which the accumulated net melt of a column reaches `amount_mm`.
fn first_day_with(block: &YearBlock, column: usize, amount_mm: f64) -> f64 {
    let (mut low, mut high) = (0, block.days);
    while low < high {
        let middle = low.midpoint(high);
        if block.net_melt_mm[middle * block.width + column] >= amount_mm {
            high = middle;
        } else {
            low = middle + 1;
        }
    }
    (low + 1) as f64
}

/// Half-gone day, melt-out and the last day with snow, which is asked of the basin alone.
fn departure(block: &YearBlock, peaks: &Peaks, column: usize) -> [f64; 3] {
    let swe = |day: usize| block.swe_mm[(day - 1) * block.width + column];
    let (peak, peak_day) = (peaks.swe_mm[column], peaks.day[column] as usize);
    let half_gone = (peak_day + 1..=block.days).find(|day| swe(*day) <= peak / 2.0);
    let is_basin = column >= block.mixes_at;
    let is_out = |swe: f64| {
        if is_basin { swe <= BASIN_MELT_OUT_SHARE * peak } else { swe < BARE_MM }
    };
    let melt_out = half_gone.and_then(|from| (from..=block.days).find(|day| is_out(swe(*day))));
    let [half_gone, melt_out] = [half_gone, melt_out].map(|day| day.map_or(NOT_GONE, |day| day as f64));
    if !is_basin {
        return [half_gone, melt_out, NONE];
    }
    let was_bare = (peak_day..=block.days).any(|day| swe(day) < BARE_MM);
    let last_snow = (1..=block.days).rev().find(|day| was_bare && swe(*day) >= BARE_MM);
    [half_gone, melt_out, last_snow.map_or(NOT_GONE, |day| day as f64)]
}
