//! Realizations that are made once and run many times.

use super::{Fitted, Generator};
use crate::weather::{Series, YearSpan};
use rayon::prelude::*;

/// Years that are kept at most: 100 MB.
const MOST_YEARS: usize = 10_000;

/// Another generator's first realizations, kept; all others are made as they are asked for, and so are all where they are
/// too many to keep.
pub struct Kept<'g> {
    generator: &'g dyn Generator,
    years: usize,
    realizations: Vec<Series>,
}

impl<'g> Kept<'g> {
    /// Makes so many realizations of so many years. A generator whose years are the record's own has nothing to keep.
    pub fn of(generator: &'g dyn Generator, realizations: u32, years: usize) -> Self {
        let is_drawn = generator.drawn(0, years).is_some();
        let count = if is_drawn || realizations as usize * years > MOST_YEARS { 0 } else { realizations };
        let make = |number: u32| {
            let mut series = Series::default();
            generator.fill(number, years, &mut series);
            series
        };
        Self { generator, years, realizations: (0..count).into_par_iter().map(make).collect() }
    }
}

impl Generator for Kept<'_> {
    fn fill(&self, realization: u32, years: usize, into: &mut Series) {
        match self.realizations.get(realization as usize) {
            Some(kept) if years == self.years => {
                into.clear();
                for year in &kept.years {
                    into.push_year(kept, year, year.follows);
                }
            }
            _ => self.generator.fill(realization, years, into),
        }
    }

    fn drawn(&self, realization: u32, years: usize) -> Option<(&Series, Vec<YearSpan>)> {
        self.generator.drawn(realization, years)
    }

    fn fitted(&self) -> Option<Fitted> {
        self.generator.fitted()
    }

    fn keeps_names(&self) -> bool {
        self.generator.keeps_names()
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use chrono::NaiveDate;

    /// One day a year, whose rain tells realization and years.
    struct Telling;

    impl Generator for Telling {
        fn fill(&self, realization: u32, years: usize, into: &mut Series) {
            into.clear();
            for year in 0..years {
                let first = NaiveDate::from_ymd_opt(2001, 10, 1).unwrap();
                into.years.push(YearSpan {
                    water_year: 1 + year as i32,
                    first,
                    start: year,
                    days: 1,
                    follows: year > 0,
                });
                into.mean_c.push(year as f64);
                into.half_range_c.push(1.0);
                into.precipitation_mm.push(f64::from(realization) * 100.0 + years as f64);
                into.month.push(9);
                into.day_of_year.push(274);
            }
        }
    }

    #[test]
    fn what_is_kept_is_what_is_made() {
        let kept = Kept::of(&Telling, 3, 4);
        assert_eq!(kept.realizations.len(), 3);
        let [mut found, mut expected] = [Series::default(), Series::default()];
        for (realization, years) in [(0, 4), (2, 4), (2, 3), (7, 4)] {
            kept.fill(realization, years, &mut found);
            Telling.fill(realization, years, &mut expected);
            assert_eq!(found, expected, "{realization} of {years} years");
        }
        assert!(Kept::of(&Telling, 3, MOST_YEARS).realizations.is_empty(), "too many to keep");
    }
}
