//! Whether a place has a seasonal snow cover.

use super::BARE_MM;
use crate::snow::YearBlock;

/// Snow is seasonal where it stays for this many days on end (Hatchett 2021, Hydrology 8:32).
pub const SEASONAL_COVER_DAYS: usize = 60;

/// Longest run of days of a year that begin with a SWE of at least 1 mm in a column. A cover that lasts from the year
/// before counts from the year's first day.
pub fn longest_cover_days(block: &YearBlock, column: usize) -> usize {
    let (mut longest, mut run) = (0, 0);
    for day in 0..block.days {
        run = if block.swe_mm[day * block.width + column] >= BARE_MM { run + 1 } else { 0 };
        longest = longest.max(run);
    }
    longest
}

/// Whether a longest cover of so many days makes a seasonal snow cover of a year.
pub fn is_seasonal(longest_cover_days: usize) -> bool {
    longest_cover_days >= SEASONAL_COVER_DAYS
}
