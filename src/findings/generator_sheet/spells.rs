//! Days in succession that are wet, or are not.

use super::calendar::Days;
use super::moments::mean;
use crate::calendar::COMMON_DATES;

/// Mean lengths of wet and of dry spells over a whole series, days; none where there is no such spell.
///
/// A spell goes on from one year into the next where that follows on it; at a gap of the record and at the ends of the
/// series it is cut, and counts with the days that are there. The mean length is days over spells.
pub(super) fn mean_lengths(days: &Days, wet_day_mm: f64) -> [Option<f64>; 2] {
    // Of wet and of dry days: days and spells.
    let mut counted = [(0.0, 0.0); 2];
    let mut before = None;
    for (year, follows) in days.precipitation_mm.chunks_exact(COMMON_DATES).zip(&days.follows) {
        before = before.filter(|_| *follows);
        for amount_mm in year {
            let which = usize::from(*amount_mm <= wet_day_mm);
            let (days, spells) = &mut counted[which];
            *days += 1.0;
            if before != Some(which) {
                *spells += 1.0;
            }
            before = Some(which);
        }
    }
    counted.map(|(days, spells)| (spells > 0.0).then(|| days / spells))
}

/// Mean over years of the longest dry spell, days of the year alone; none without a year.
pub(super) fn mean_longest_dry(days: &Days, wet_day_mm: f64) -> Option<f64> {
    let longest = |year: &[f64]| {
        let dry = year.split(|amount_mm| *amount_mm > wet_day_mm);
        dry.map(<[f64]>::len).max().unwrap_or(0) as f64
    };
    mean(&days.precipitation_mm.chunks_exact(COMMON_DATES).map(longest).collect::<Vec<_>>())
}

/// Most years in succession whose total stays below the median of all years; a year that does not follow on the one before
/// it begins anew. None without a year.
///
/// Totals that differ from the median by less than 1e-9 mm, as rounding makes them, are not below it.
pub(super) fn longest_dry_years(totals_mm: &[f64], follows: &[bool], median_mm: f64) -> Option<f64> {
    let mut runs = Vec::with_capacity(totals_mm.len());
    let mut run = 0.0;
    for (total_mm, follows) in totals_mm.iter().zip(follows) {
        let before = if *follows { run } else { 0.0 };
        run = if *total_mm < median_mm - 1e-9 { before + 1.0 } else { 0.0 };
        runs.push(run);
    }
    runs.into_iter().reduce(f64::max)
}

#[cfg(test)]
mod tests {
    use super::*;

    /// Two years of 365 days; the days named are wet.
    fn days(wet: &[usize], follows: bool) -> Days {
        let mut precipitation_mm = vec![0.3; 2 * COMMON_DATES];
        wet.iter().for_each(|day| precipitation_mm[*day] = 0.31);
        let cold = vec![0.0; precipitation_mm.len()];
        let follows = vec![false, follows];
        Days { follows, precipitation_mm, tmin_c: cold.clone(), tmax_c: cold.clone(), mean_c: cold }
    }

    /// By hand. Wet are days 100, 101 and 364 of the first year and the first of the second (365), and 400: four wet days and
    /// one. Where the second year follows, 364 and 365 are one spell: 5 days in 3 spells, 725 dry days in 4. Where it does
    /// not: 4 wet spells, and still 4 dry ones.
    #[test]
    fn spells_cross_into_years_that_follow() {
        let wet = [100, 101, 364, 365, 400];
        assert_eq!(mean_lengths(&days(&wet, true), 0.3), [Some(5.0 / 3.0), Some(725.0 / 4.0)]);
        assert_eq!(mean_lengths(&days(&wet, false), 0.3), [Some(5.0 / 4.0), Some(725.0 / 4.0)]);
        assert_eq!(mean_lengths(&days(&[], true), 0.3), [None, Some(730.0)]);
        assert_eq!(mean_lengths(&days(&[], false), 0.3), [None, Some(365.0)]);
    }

    /// By hand: between days 101 and 364 lie 262 dry days, after day 400 to the end of the second year 329.
    #[test]
    fn the_longest_dry_spell_stays_within_its_year() {
        let days = days(&[100, 101, 364, 365, 400], true);
        assert_eq!(mean_longest_dry(&days, 0.3), Some((262.0 + 329.0) / 2.0));
    }

    /// By hand: below 5 are the 2nd to 4th and the 6th and 7th; where the 4th does not follow on the 3rd, two are the most.
    #[test]
    fn dry_years_in_succession() {
        let totals = [9.0, 1.0, 4.0, 2.0, 5.0, 3.0, 4.0, 5.0 - 1e-12];
        let run = |gap: usize| {
            let follows: Vec<bool> = (0..8).map(|year| year != 0 && year != gap).collect();
            longest_dry_years(&totals, &follows, 5.0)
        };
        assert_eq!([run(0), run(3)], [Some(3.0), Some(2.0)]);
        assert_eq!(longest_dry_years(&[7.0], &[false], 7.0), Some(0.0));
        assert_eq!(longest_dry_years(&[], &[], 7.0), None);
    }
}
