//! Draws that must not change: another version of a random-number crate that draws other numbers would change every
//! study made with the same seed.
//!
//! The expected values were drawn by this program when the test was written. They say nothing about being right, only
//! about being the same; `invariants/realizations.rs` says what is right about them.

use chrono::Datelike;
use std::fmt::Write;
use thawline::perturb::{Generator, MeanChange, YearBlocks};
use thawline::weather::{Series, YearSpan};

/// Ten water years of one day each, with a gap after the sixth, and 1 mm of rain on every day.
fn record() -> Series {
    let mut record = Series::default();
    for year in 0..10 {
        let first = chrono::NaiveDate::from_ymd_opt(2000 + year, 10, 1).unwrap();
        let water_year = first.year() + 1;
        let start = record.mean_c.len();
        record.years.push(YearSpan { water_year, first, start, days: 1, follows: year != 0 && year != 6 });
        record.mean_c.push(0.0);
        record.half_range_c.push(0.0);
        record.precipitation_mm.push(1.0);
        record.month.push(9);
        record.day_of_year.push(274);
    }
    record
}

#[test]
fn first_draws_of_the_year_block_generator() {
    let record = record();
    let mut drawn = String::new();
    for (seed, realization) in [(1, 0), (1, 1), (20_260_401, 299)] {
        let blocks = YearBlocks { record: &record, seed, mean_run_years: 2.0 };
        let changed = MeanChange { generator: &blocks, seed, standard_deviation_pct: 10.0 };
        let mut into = Series::default();
        changed.fill(realization, 12, &mut into);
        let years: Vec<i32> = into.years.iter().map(|year| year.water_year).collect();
        writeln!(drawn, "{seed} {realization} {} {years:?}", into.precipitation_mm[0]).unwrap();
    }
    insta::assert_snapshot!(drawn, @"
    1 0 0.9765152941444079 [2003, 2003, 2010, 2005, 2001, 2008, 2010, 2001, 2005, 2003, 2004, 2005]
    1 1 1.0527204297045047 [2003, 2004, 2005, 2006, 2010, 2002, 2003, 2006, 2009, 2010, 2002, 2002]
    20260401 299 1.1516222867446875 [2002, 2003, 2008, 2009, 2006, 2007, 2008, 2006, 2003, 2004, 2010, 2003]
    ");
}
