//! What the season measures of one year must make together, whatever the year.

use super::cases;
use super::scenario::{Scenario, scenarios};
use proptest::prelude::*;
use thawline::calendar::MonthDay;
use thawline::season::{Measures, NONE, SeasonSettings};
use thawline::snow::{Path, YearBlock};

const DAYS: [&str; 3] = ["12-15", "03-01", "06-10"];

fn measures(scenario: &Scenario) -> Measures {
    let days = DAYS.map(|day| MonthDay::parse(day).expect("a day")).to_vec();
    let settings = SeasonSettings {
        water_year_starts: scenario.climate.start(),
        survey_dates: days.clone(),
        volume_windows: Vec::new(),
        outflow_before: days.clone(),
        melt_shares_before: days,
        arrival_volume_hm3: None,
    };
    Measures::new(settings, 1.0)
}

/// Values of a column by the names of the measures.
struct Column<'a> {
    measures: &'a Measures,
    values: &'a [f64],
    width: usize,
    column: usize,
}

impl Column<'_> {
    fn value(&self, name: &str) -> f64 {
        let at = self.measures.list().iter().position(|measure| measure.name == name);
        self.values[at.unwrap_or_else(|| panic!("no measure '{name}'")) * self.width + self.column]
    }
}

/// The days of `DAYS` as they follow each other in a scenario's water year.
fn in_order(scenario: &Scenario) -> Vec<String> {
    let mut days = DAYS;
    let first = scenario.climate.start().first_day(2003);
    let day_of =
        |day: &&str| thawline::calendar::day_of_water_year(first, MonthDay::parse(day).expect("a day"));
    days.sort_by_key(day_of);
    days.map(|day| day.replace('-', "_")).to_vec()
}

/// Runs a scenario and looks at every band and basin mean of every year.
fn each(
    scenario: &Scenario,
    look: impl Fn(&Column<'_>, &YearBlock) -> Result<(), TestCaseError>,
) -> Result<(), TestCaseError> {
    let measures = measures(scenario);
    let lanes = scenario.lanes(&scenario.changes());
    for mut block in Scenario::run(&lanes, &scenario.climate.series(), Path::Widest) {
        let untouched = block.clone();
        let (width, mixes_at) = (block.width, block.mixes_at);
        let mut values = vec![f64::NAN; measures.list().len() * width];
        measures.take(&mut block, &mut values);
        for column in (0..lanes.count()).chain(mixes_at..mixes_at + lanes.mixes()) {
            look(&Column { measures: &measures, values: &values, width, column }, &untouched)?;
        }
    }
    Ok(())
}

proptest! {
    #![proptest_config(cases(32))]

    /// What came before a day and from it on is the year's; the year's water input is the year's rain and snow less what
    /// stays; the three largest days hold the largest and are no more than three of it. 1e-9 of the year's sum, or of 1 mm,
    /// is rounding in sums over a year.
    #[test]
    fn sums_of_a_year_agree(scenario in scenarios()) {
        each(&scenario, |column, block| {
            for water in ["outflow", "water_input"] {
                let year = column.value(&format!("{water}_year_mm"));
                let rounding = 1e-9 * year.max(1.0);
                for day in DAYS.map(|day| day.replace('-', "_")) {
                    let [before, from] =
                        ["before", "from"].map(|part| column.value(&format!("{water}_{part}_{day}_mm")));
                    prop_assert!((before + from - year).abs() <= rounding, "{before} and {from} of {year}");
                }
                let [one, three] = ["1_day", "3_days"].map(|days| column.value(&format!("{water}_largest_{days}_mm")));
                prop_assert!(one <= three && three <= 3.0 * one + rounding, "{one} in a day, {three} in three");
            }
            let sum = |table: &[f64]| -> f64 {
                (0..block.days).map(|day| table[day * block.width + column.column]).sum()
            };
            let bare = sum(&block.bare_ground_rain_mm);
            let fallen = sum(&block.rain_mm) + sum(&block.snow_mm);
            let stays =
                block.swe_mm[block.days * block.width + column.column] - block.swe_mm[column.column];
            let [outflow, input] = ["outflow_year_mm", "water_input_year_mm"].map(|name| column.value(name));
            let rounding = 1e-9 * fallen.max(stays.abs()).max(1.0);
            prop_assert!((outflow + bare - input).abs() <= rounding);
            prop_assert!((fallen - input - stays).abs() <= rounding, "{fallen} fell, {input} left, {stays} stays");
            Ok(())
        })?;
    }

    /// Shares of a whole lie between 0 and 1, but for the last bits; SWE over precipitation and shares of melt, which may
    /// stand above it, have tests of their own.
    #[test]
    fn shares_are_parts(scenario in scenarios()) {
        each(&scenario, |column, _| {
            let over_peak = DAYS.map(|day| format!("swe_{}_over_peak", day.replace('-', "_")));
            for name in over_peak.iter().map(String::as_str).chain(["snowfall_fraction"]) {
                let share = column.value(name);
                prop_assert!(share == NONE || (0.0..=1.0 + 1e-12).contains(&share), "{name}: {share}");
            }
            Ok(())
        })?;
    }

    /// Where nothing refreezes, no net melt is negative: the share done before a day only grows with the day, from 0 to 1.
    #[test]
    fn melt_done_only_grows(mut scenario in scenarios()) {
        scenario.snow.refreeze_fraction = 0.0;
        let days = in_order(&scenario);
        each(&scenario, |column, _| {
            let mut last = 0.0;
            for day in &days {
                let share = column.value(&format!("melt_share_before_{day}"));
                if share != NONE {
                    prop_assert!((last..=1.0 + 1e-12).contains(&share), "{share} before {day} after {last}");
                    last = share;
                }
            }
            Ok(())
        })?;
    }
}
