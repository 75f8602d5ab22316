//! Dry and warm years of the record itself: few, but observed.

use super::cells::Cells;
use super::counts::share;
use super::quantile::{quantile, sorted};
use crate::baseline::wilson;
use serde::Serialize;

/// The record's years in use, dry or cool where at or below the medians of these years.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct RecordCoincidence {
    /// Median cool-season precipitation over the basin, mm.
    pub median_precipitation_mm: f64,
    /// Median cool-season mean temperature at the station, degC.
    pub median_temperature_c: f64,
    /// Years by cell.
    pub years: Cells,
    /// Dry and warm years of all.
    pub dry_warm: Counted,
    /// `P(dry and warm)/(P(dry)*P(warm))`; none where no year is dry or none is warm.
    pub dependence: Option<f64>,
    /// Fisher's exact test of their independence, two-sided; years are taken for independent of each other.
    pub fisher_p: Option<f64>,
    /// A year is low in snow below this headline SWE at the reference, mm: the quantile of the record's years that is stated.
    pub low_snow_below_mm: f64,
    /// Its quantile among the record's years. Where none of these lies below the limit, low snow is counted of no year.
    pub low_snow_below_quantile: f64,
    /// Low-snow years among those dry and warm.
    pub low_snow_given_dry_warm: Counted,
    /// Low-snow years among those dry and cool.
    pub low_snow_given_dry_cool: Counted,
    /// The former's share over the latter's; none where a cell is empty or no dry and cool year is low.
    pub low_snow_ratio: Option<f64>,
    /// The last years against all before; none where one of the two would be empty.
    pub periods: Option<PeriodsCompared>,
}

/// Years counted of so many, their share and its Wilson 95 % interval.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Counted {
    /// How many.
    pub count: u64,
    /// Of how many.
    pub of: u64,
    /// The share; none of none.
    pub share: Option<f64>,
    /// Its interval.
    pub wilson: Option<[f64; 2]>,
}

/// Two periods.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct PeriodsCompared {
    /// The earlier one.
    pub earlier: PeriodCoincidence,
    /// The later one.
    pub later: PeriodCoincidence,
    /// The later one's share of dry and warm years over the earlier one's; none where that has no such year.
    pub ratio: Option<f64>,
    /// Whether the two intervals have nothing in common: else the record cannot tell the periods apart.
    pub are_apart: bool,
}

/// One period.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct PeriodCoincidence {
    /// Its first water year in use.
    pub first_year: i32,
    /// Its last one.
    pub last_year: i32,
    /// Years by cell, about the medians of the whole record.
    pub years: Cells,
    /// Dry and warm years of all.
    pub dry_warm: Counted,
}

/// A year of the record: its name, headline SWE, cool-season precipitation and mean temperature.
pub type RecordValues = (i32, [f64; 3]);

impl RecordCoincidence {
    /// Of years in ascending order: the name, headline SWE, mm, cool-season precipitation over the basin, mm, and mean temperature at the
    /// station, degC. Nothing of no years.
    pub fn of(years: &[RecordValues], low_snow_below_quantile: f64, last_years: usize) -> Option<Self> {
        let all = |at: usize| sorted(years.iter().map(|(_, values)| values[at]));
        let [median_precipitation_mm, median_temperature_c] = [1, 2].map(|at| quantile(&all(at), 0.5));
        let low_snow_below_mm = quantile(&all(0), low_snow_below_quantile);
        if !low_snow_below_mm.is_finite() {
            return None;
        }
        let place = |values: &[f64; 3]| {
            Cells::place(values[1] <= median_precipitation_mm, values[2] <= median_temperature_c)
        };
        let cells = |years: &[RecordValues]| {
            let mut counts = [0; 4];
            years.iter().for_each(|(_, values)| counts[place(values)] += 1);
            Cells::of(counts)
        };
        // Below the lowest year, or bare ground, nothing lies, so that no year is asked.
        let has_snow =
            low_snow_below_mm > 0.0 && all(0).first().is_some_and(|lowest| *lowest < low_snow_below_mm);
        let low = |cell: usize, of: u64| {
            let of = if has_snow { of } else { 0 };
            let is_low = |values: &[f64; 3]| place(values) == cell && values[0] < low_snow_below_mm;
            Counted::new(years.iter().filter(|(_, values)| is_low(values)).count() as u64, of)
        };
        let period = |years: &[RecordValues]| {
            let of = cells(years);
            Some(PeriodCoincidence {
                first_year: years.first()?.0,
                last_year: years.last()?.0,
                dry_warm: Counted::new(of.dry_warm, of.years()),
                years: of,
            })
        };
        let own = cells(years);
        let [warm, cool] = [low(0, own.dry_warm), low(1, own.dry_cool)];
        let (before, last) = years.split_at(years.len().saturating_sub(last_years));
        let periods = period(before).zip(period(last)).map(|(earlier, later)| PeriodsCompared {
            earlier,
            later,
            ratio: later.dry_warm.over(earlier.dry_warm),
            are_apart: later.dry_warm.is_apart_from(earlier.dry_warm),
        });
        Some(Self {
            median_precipitation_mm,
            median_temperature_c,
            years: own,
            dry_warm: Counted::new(own.dry_warm, own.years()),
            dependence: own.dependence(),
            fisher_p: own.fisher_p(),
            low_snow_below_mm,
            low_snow_below_quantile,
            low_snow_given_dry_warm: warm,
            low_snow_given_dry_cool: cool,
            low_snow_ratio: warm.over(cool),
            periods,
        })
    }
}

impl Counted {
    pub(super) fn new(count: u64, of: u64) -> Self {
        Self { count, of, share: share(count, of), wilson: wilson(count as usize, of as usize) }
    }

    /// Its share over another's; none where one has none, or the other's is 0.
    fn over(self, other: Self) -> Option<f64> {
        Some(self.share? / other.share.filter(|share| *share > 0.0)?)
    }

    fn is_apart_from(self, other: Self) -> bool {
        // The same test as of dry and warm, of years in one period and in the other.
        let table = Cells {
            dry_warm: self.count,
            dry_cool: self.of - self.count,
            wet_warm: other.count,
            wet_cool: other.of - other.count,
        };
        table.fisher_p().is_some_and(|p| p < 0.05)
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    /// 54 % against 25 % is a ratio of 2.16; over nothing there is none.
    #[test]
    fn a_ratio_of_shares() {
        let ratio = Counted::new(54, 100).over(Counted::new(25, 100)).expect("two shares");
        assert!((ratio - 2.16).abs() < 1e-12, "{ratio}");
        assert_eq!(Counted::new(5, 10).over(Counted::new(0, 10)), None);
        assert_eq!(Counted::new(5, 10).over(Counted::new(0, 0)), None);
        assert_eq!((Counted::new(0, 0).share, Counted::new(0, 0).wilson), (None, None));
    }

    /// Fisher's exact test: p = 0.031 of 2 of 20 against 9 of 20 (computed), far less of 54 against 25 of 100, and hardly below 1 of
    /// 6 of 20 against 5 of 19.
    #[test]
    fn few_years_cannot_tell_periods_apart() {
        assert!(Counted::new(54, 100).is_apart_from(Counted::new(25, 100)));
        assert!(Counted::new(25, 100).is_apart_from(Counted::new(54, 100)));
        assert!(Counted::new(2, 20).is_apart_from(Counted::new(9, 20)), "though their intervals overlap");
        assert!(!Counted::new(6, 20).is_apart_from(Counted::new(5, 19)));
        assert!(!Counted::new(1, 1).is_apart_from(Counted::new(0, 0)));
    }

    /// By hand: precipitation 1 to 8 has a median of 4.5, so that years 1 to 4 are dry; of these 1 and 2 are cool, 3 and 4 warm; of
    /// the others 5 and 6 cool, 7 and 8 warm: all four cells hold two. SWE is lowest in years 3 and 4; type 8's 20 % lies at rank
    /// 8*0.2 + 1.2/3 = 2, the second lowest, below which is one. Of the last two years one is dry and warm with 2 years on either side
    /// of nothing: years 7 and 8 are wet, so 0 of 2, and of the six before 2.
    #[test]
    fn a_record_counted_by_hand() {
        let mean_c = [-1.0, -1.0, 1.0, 1.0, -1.0, -1.0, 1.0, 1.0];
        let swe_mm = [50.0, 60.0, 10.0, 20.0, 70.0, 80.0, 90.0, 100.0];
        let years: Vec<RecordValues> = (0..8)
            .map(|year| (2001 + year as i32, [swe_mm[year], (year + 1) as f64, mean_c[year]]))
            .collect();
        let found = RecordCoincidence::of(&years, 0.2, 2).expect("years");
        assert_eq!(found.years, Cells { dry_warm: 2, dry_cool: 2, wet_warm: 2, wet_cool: 2 });
        assert_eq!((found.dependence, found.low_snow_below_mm), (Some(1.0), 20.0));
        assert_eq!((found.low_snow_given_dry_warm.count, found.low_snow_given_dry_cool.count), (1, 0));
        assert_eq!(found.low_snow_ratio, None, "no dry and cool year is low");
        let periods = found.periods.expect("two periods");
        assert_eq!((periods.earlier.first_year, periods.earlier.last_year), (2001, 2006));
        assert_eq!((periods.later.first_year, periods.later.last_year), (2007, 2008));
        assert_eq!((periods.earlier.dry_warm.count, periods.later.dry_warm.count), (2, 0));
        assert_eq!((periods.ratio, periods.are_apart), (Some(0.0), false));
        assert_eq!(RecordCoincidence::of(&years, 0.2, 8).expect("years").periods, None, "nothing before");
        assert_eq!(RecordCoincidence::of(&[], 0.2, 2), None);
        // The median lies between 60 and 70 mm: years 1 to 4 are low, all that are dry.
        let half = RecordCoincidence::of(&years, 0.5, 2).expect("years");
        assert_eq!((half.low_snow_below_quantile, half.low_snow_below_mm), (0.5, 65.0));
        assert_eq!((half.low_snow_given_dry_warm.count, half.low_snow_given_dry_cool.count), (2, 2));
        assert_eq!(half.low_snow_ratio, Some(1.0));
    }
}
