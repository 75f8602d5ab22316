//! Season measures against their definitions, written out a second time.

use super::cases;
use super::scenario::{Scenario, scenarios};
use crate::naive_season::{self as naive, Place, When};
use proptest::prelude::*;
use thawline::calendar::{MonthDay, day_of_water_year};
use thawline::season::{Kind, Measures, NONE, NOT_GONE, SeasonSettings};
use thawline::snow::{Path, YearBlock};

fn month_day(month: u32, day: u32) -> MonthDay {
    MonthDay::new(month, day).expect("a day of every year")
}

fn number(when: When) -> f64 {
    match when {
        When::Day(day) => day as f64,
        When::None => NONE,
        When::NotGone => NOT_GONE,
    }
}

/// One column of a table of the block, day by day.
fn column_of(block: &YearBlock, table: &[f64], column: usize) -> Vec<f64> {
    (0..block.days).map(|day| table[day * block.width + column]).collect()
}

/// Every measure of a column by its name, from the definitions.
fn expected(block: &YearBlock, column: usize, settings: &SeasonSettings) -> Vec<(String, f64)> {
    let swe = column_of(block, &block.swe_mm, column);
    let net_melt = column_of(block, &block.net_melt_mm, column);
    let outflow = column_of(block, &block.outflow_mm, column);
    let bare = column_of(block, &block.bare_ground_rain_mm, column);
    let place = if column >= block.mixes_at { Place::Basin } else { Place::Band };
    let name = |day: &MonthDay| day.to_string().replace('-', "_");
    let mut all = Vec::new();
    for survey in &settings.survey_dates {
        let day = day_of_water_year(block.first, *survey);
        all.push((format!("swe_{}_mm", name(survey)), swe[day - 1]));
    }
    for [from, to] in &settings.volume_windows {
        let days = [from, to].map(|day| day_of_water_year(block.first, *day));
        let (outflow, bare) =
            (naive::in_window(&outflow, days[0], days[1]), naive::in_window(&bare, days[0], days[1]));
        let window = format!("{}_to_{}", name(from), name(to));
        all.push((format!("outflow_{window}_mm"), outflow));
        all.push((format!("water_input_{window}_mm"), outflow + bare));
    }
    all.push(("peak_swe_mm".to_owned(), naive::peak(&swe).0));
    for (measure, when) in [
        ("peak_day", naive::peak_day(&swe)),
        ("melt_d10_day", naive::melt_share_day(&swe, &net_melt, 0.1)),
        ("melt_d50_day", naive::melt_share_day(&swe, &net_melt, 0.5)),
        ("melt_d90_day", naive::melt_share_day(&swe, &net_melt, 0.9)),
        ("half_gone_day", naive::half_gone(&swe)),
        ("melt_out_day", naive::melt_out(&swe, place)),
        ("last_snow_day", if place == Place::Basin { naive::last_snow(&swe) } else { When::None }),
    ] {
        all.push((measure.to_owned(), number(when)));
    }
    let centroid = naive::centroid(&swe, &outflow).unwrap_or(NONE);
    all.push(("outflow_centroid_day".to_owned(), centroid));
    all
}

proptest! {
    #![proptest_config(cases(48))]

    /// Every measure of every band and basin mean in every year is what its definition gives: whole days to the day,
    /// amounts and centroids to 1e-9.
    #[test]
    fn measures_are_their_definitions(scenario in scenarios(), survey_month in 1..=12_u32) {
        let is_southern = scenario.climate.is_southern;
        let window = if is_southern { [month_day(10, 1), month_day(1, 31)] } else { [month_day(4, 1), month_day(7, 31)] };
        let settings = SeasonSettings {
            water_year_starts: scenario.climate.start(),
            survey_dates: vec![month_day(if is_southern { 10 } else { 4 }, 1), month_day(survey_month, 15)],
            volume_windows: vec![window, [scenario.climate.start().0; 2]],
        };
        let measures = Measures::new(settings.clone());
        let lanes = scenario.lanes(&scenario.changes());
        for mut block in Scenario::run(&lanes, &scenario.climate.series(), Path::Widest) {
            let untouched = block.clone();
            let mut values = vec![f64::NAN; measures.list().len() * block.width];
            measures.take(&mut block, &mut values);
            for column in (0..lanes.count()).chain(block.mixes_at..block.mixes_at + lanes.mixes()) {
                let expected = expected(&untouched, column, &settings);
                prop_assert_eq!(expected.len(), measures.list().len(), "every measure is checked");
                for (name, expected) in expected {
                    let at = measures.list().iter().position(|measure| measure.name == name);
                    let at = at.unwrap_or_else(|| panic!("no measure '{name}'"));
                    let found = values[at * block.width + column];
                    let is_whole_day = measures.list()[at].kind == Kind::DayOfWaterYear && name != "outflow_centroid_day";
                    let allowed = if is_whole_day { 0.0 } else { 1e-9 };
                    prop_assert!(
                        found == expected || (found - expected).abs() <= allowed,
                        "{name} of column {column}: {found} for {expected}"
                    );
                }
            }
        }
    }
}
