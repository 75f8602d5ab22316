//! Draws that must not change: another version of a random-number crate that draws other numbers would change every
//! study made with the same seed.
//!
//! The expected values were drawn by this program when the test was written. They say nothing about being right, only
//! about being the same; `invariants/realizations.rs`, and the tests beside the
//! markov-gamma generator, say what is right about them.

use chrono::Datelike;
use std::fmt::Write;
use thawline::calendar::{MonthDay, WaterYearStart};
use thawline::perturb::{Generator, GeneratorChoice, MarkovGamma, MeanChange, Recipe, YearBlocks};
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

/// Six water years of made-up weather, by counting alone: some wet days in each month, warm summers, small departures.
fn daily_record() -> Series {
    let mut record = Series::default();
    for year in 0..6 {
        let first = chrono::NaiveDate::from_ymd_opt(2000 + year, 10, 1).unwrap();
        let days = if year == 3 { 366 } else { 365 };
        let start = record.mean_c.len();
        record.years.push(YearSpan { water_year: 2001 + year, first, start, days, follows: year != 0 });
        for date in first.iter_days().take(days) {
            let day = (date.ordinal() + 31 * year as u32) * 7919 % 1000;
            let from_midsummer = (f64::from(date.ordinal()) - 200.0).abs().min(165.0);
            record.mean_c.push(18.0 - 0.15 * from_midsummer + f64::from(day % 17) - 8.0);
            record.half_range_c.push(3.0 + 0.5 * f64::from(day % 7));
            record.precipitation_mm.push(if day.is_multiple_of(3) {
                0.3 + f64::from(day * day % 997) / 40.0
            } else {
                0.0
            });
            record.month.push(date.month0() as u8);
            record.day_of_year.push(date.ordinal() as u16);
        }
    }
    record
}

#[test]
fn first_days_of_the_markov_gamma_generator() {
    let record = daily_record();
    let mut drawn = String::new();
    for seed in [1, 20_260_401] {
        let recipe = Recipe {
            choice: GeneratorChoice::MarkovGamma,
            seed,
            wet_day_mm: 0.25,
            water_year_starts: WaterYearStart(MonthDay::new(10, 1).unwrap()),
            cool_season_ends: MonthDay::new(4, 1).unwrap(),
        };
        let generator = MarkovGamma::fit(&record, &recipe);
        for realization in [0, 299] {
            let mut into = Series::default();
            generator.fill(realization, 2, &mut into);
            writeln!(drawn, "{seed} {realization}").unwrap();
            for day in 0..6 {
                let (mean_c, half_range_c) = (into.mean_c[day], into.half_range_c[day]);
                writeln!(drawn, "  {mean_c} {half_range_c} {}", into.precipitation_mm[day]).unwrap();
            }
        }
    }
    insta::assert_snapshot!(drawn, @"
    1 0
      4.200799192018149 5.410042718116479 16.373218568720926
      0.8411459625658173 5.068022033916562 1.825805811511742
      10.88497253435232 6.274961027702556 0
      -0.21521820734871167 5.170459669155643 0
      5.052668721184588 4.501979189570384 0
      5.457917521080028 4.131872025847024 0
    1 299
      12.255616151296438 5.282685915959764 6.556727680507481
      12.073449009657294 2.821377698279541 14.746597097454751
      0.7312178595881904 5.892413595937676 4.969148024731118
      1.2047798829680736 2.8233748110116696 9.863568485192838
      11.571881058826014 3.470630769591763 5.160690089124524
      5.612664025983172 5.0125840352276745 9.189348998311306
    20260401 0
      2.2691958594426933 6.342796468688249 0
      9.536995038871062 5.008899399625998 0
      11.516120722114948 4.18431205164468 0
      -1.077208961685686 4.315327225820575 0
      11.377388015218557 3.3553586168435467 0
      1.37151389920168 5.04605562545917 0
    20260401 299
      11.900380989350243 5.909987084962387 0
      12.452836158271754 4.578986650032473 0
      10.918736079882216 3.901530453350638 0
      11.913684729996316 3.0408520178850083 0
      -1.5408327304131957 5.008137255089617 0
      4.833182945118478 4.465018641816464 0
    ");
}
