//! Season measures against their definitions, written out a second time.

use super::cases;
use super::scenario::{Scenario, scenarios};
use crate::naive_season::{self as naive, Place, When};
use proptest::prelude::*;
use thawline::calendar::{MonthDay, day_of_water_year};
use thawline::season::{Measures, NONE, NOT_GONE, NOT_REACHED, SeasonSettings};
use thawline::snow::{Lanes, Path, YearBlock};

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

/// Every measure of a column by its name, from the definitions; the basin has 1 km2.
fn expected(
    block: &YearBlock,
    column: usize,
    settings: &SeasonSettings,
    covered: &[f64],
) -> Vec<(String, f64)> {
    let [swe, net_melt, outflow, bare, rain, snow] = [
        &block.swe_mm,
        &block.net_melt_mm,
        &block.outflow_mm,
        &block.bare_ground_rain_mm,
        &block.rain_mm,
        &block.snow_mm,
    ]
    .map(|table| column_of(block, table, column));
    let water_input: Vec<f64> = outflow.iter().zip(&bare).map(|(outflow, bare)| outflow + bare).collect();
    let waters = [("outflow", &outflow), ("water_input", &water_input)];
    let place = if column >= block.mixes_at { Place::Basin } else { Place::Band };
    let name = |day: &MonthDay| day.to_string().replace('-', "_");
    let day_of = |day: &MonthDay| day_of_water_year(block.first, *day);
    let or_none = |value: Option<f64>| value.unwrap_or(NONE);
    let mut all = Vec::new();
    for survey in &settings.survey_dates {
        let (survey, day) = (name(survey), day_of(survey));
        all.push((format!("covered_{survey}_share"), covered[day - 1]));
        all.push((format!("swe_{survey}_mm"), swe[day - 1]));
        all.push((format!("swe_{survey}_over_peak"), or_none(naive::over_peak(&swe, day))));
        let over_precipitation = naive::over_precipitation(&swe, &rain, &snow, day);
        all.push((format!("swe_{survey}_over_precipitation"), or_none(over_precipitation)));
        if day > 1 {
            let fallen = naive::fallen_before(&rain, &snow, day);
            all.push((format!("precipitation_before_{survey}_mm"), fallen));
        }
    }
    for day in &settings.melt_shares_before {
        let share = naive::melt_share_before(&swe, &net_melt, day_of(day));
        all.push((format!("melt_share_before_{}", name(day)), or_none(share)));
    }
    for (water, flux) in waters {
        for [from, to] in &settings.volume_windows {
            let sum = naive::in_window(flux, day_of(from), day_of(to));
            all.push((format!("{water}_{}_to_{}_mm", name(from), name(to)), sum));
        }
        for day in &settings.outflow_before {
            let [before, from] =
                [naive::in_window(flux, 1, day_of(day) - 1), naive::in_window(flux, day_of(day), block.days)];
            all.push((format!("{water}_before_{}_mm", name(day)), before));
            all.push((format!("{water}_from_{}_mm", name(day)), from));
        }
        all.push((format!("{water}_year_mm"), naive::in_window(flux, 1, block.days)));
        all.push((format!("{water}_largest_1_day_mm"), naive::largest(flux, 1)));
        all.push((format!("{water}_largest_3_days_mm"), naive::largest(flux, 3)));
        if let Some(volume_hm3) = settings.arrival_volume_hm3 {
            let arrival = match (place, naive::arrival(flux, 1000.0 * volume_hm3)) {
                (Place::Band, _) => NONE,
                (Place::Basin, None) => NOT_REACHED,
                (Place::Basin, Some(day)) => day as f64,
            };
            all.push((format!("{water}_arrival_day"), arrival));
        }
    }
    all.push(("peak_swe_mm".to_owned(), naive::peak(&swe).0));
    all.push(("swe_area_mm_days".to_owned(), naive::swe_area(&swe)));
    all.push(("snowfall_fraction".to_owned(), or_none(naive::snowfall_fraction(&rain, &snow))));
    all.push(("rain_on_snow_days".to_owned(), naive::rain_on_snow_days(&swe, &rain) as f64));
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
    all.push(("snow_covered_days".to_owned(), naive::in_window(covered, 1, block.days)));
    all.push(("outflow_centroid_day".to_owned(), or_none(naive::centroid(&swe, &outflow))));
    all
}

/// The share of a column's area that begins each day with at least 1 mm: of a band all or nothing, of a basin the share of
/// its bands' area.
fn covered(block: &YearBlock, lanes: &Lanes, column: usize, scenario: &Scenario) -> Vec<f64> {
    let of_band = |column: usize| {
        column_of(block, &block.swe_mm, column).iter().map(|swe| f64::from(u8::from(*swe >= 1.0))).collect()
    };
    let Some(mix) = column.checked_sub(block.mixes_at) else { return of_band(column) };
    let bands: Vec<Vec<f64>> = (0..lanes.places()).map(|band| of_band(lanes.column(mix, band))).collect();
    let areas: Vec<f64> = scenario.basin.bands.iter().map(|band| band.area_km2).collect();
    let on_day = |day: usize| bands.iter().map(|band| band[day]).collect::<Vec<f64>>();
    (0..block.days).map(|day| crate::naive::basin_mean(&on_day(day), &areas)).collect()
}

/// Settings with random days beside the usual ones, and a volume to wait for.
fn settings(scenario: &Scenario, [survey, before]: [u32; 2], arrival_mm: f64) -> SeasonSettings {
    let is_southern = scenario.climate.is_southern;
    let usual = month_day(if is_southern { 10 } else { 4 }, 1);
    let window = if is_southern { [usual, month_day(1, 31)] } else { [usual, month_day(7, 31)] };
    SeasonSettings {
        water_year_starts: scenario.climate.start(),
        survey_dates: vec![usual, month_day(survey, 15)],
        volume_windows: vec![window, [scenario.climate.start().0; 2]],
        outflow_before: vec![usual, month_day(before, 16)],
        melt_shares_before: vec![month_day(before, 16), usual],
        arrival_volume_hm3: Some(arrival_mm / 1000.0),
    }
}

/// Whole numbers, which must be the same to the last bit.
fn is_whole(name: &str) -> bool {
    name == "rain_on_snow_days" || name.ends_with("_day") && name != "outflow_centroid_day"
}

proptest! {
    #![proptest_config(cases(48))]

    /// Every measure of every band and basin mean in every year is what its definition gives: whole days to the day,
    /// shares and centroids to 1e-9, amounts to 1e-9 mm, the SWE area, a sum of hundreds of depths, to 1e-9 of itself.
    #[test]
    fn measures_are_their_definitions(
        scenario in scenarios(),
        months in [1..=12_u32, 1..=12_u32],
        arrival_mm in 1.0..1500.0,
    ) {
        let settings = settings(&scenario, months, arrival_mm);
        let measures = Measures::new(settings.clone(), 1.0);
        let lanes = scenario.lanes(&scenario.changes());
        for mut block in Scenario::run(&lanes, &scenario.climate.series(), Path::Widest) {
            let untouched = block.clone();
            let mut values = vec![f64::NAN; measures.list().len() * block.width];
            measures.take(&mut block, &mut values);
            for column in (0..lanes.count()).chain(block.mixes_at..block.mixes_at + lanes.mixes()) {
                let covered = covered(&untouched, &lanes, column, &scenario);
                let expected = expected(&untouched, column, &settings, &covered);
                prop_assert_eq!(expected.len(), measures.list().len(), "every measure is checked");
                for (name, expected) in expected {
                    let at = measures.list().iter().position(|measure| measure.name == name);
                    let at = at.unwrap_or_else(|| panic!("no measure '{name}'"));
                    let found = values[at * block.width + column];
                    let allowed = match name.as_str() {
                        name if is_whole(name) => 0.0,
                        "swe_area_mm_days" => 1e-9 * expected.max(1.0),
                        _ => 1e-9,
                    };
                    prop_assert!(
                        found == expected || (found - expected).abs() <= allowed,
                        "{name} of column {column}: {found} for {expected}"
                    );
                }
            }
        }
    }
}
