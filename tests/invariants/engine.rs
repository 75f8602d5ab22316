//! The engine against the naive loop: every state and flux of every day, and the basin means.

use super::cases;
use super::scenario::{Scenario, naive_days, scenarios};
use super::with_options::scenarios_with_options;
use crate::naive;
use proptest::prelude::*;
use thawline::snow::{LaneConst, LaneDay, Lanes, Pack, Path, YearBlock, step};
use thawline::weather::Series;

/// Two ways of adding the same numbers may part by rounding: 1e-9 mm is what the method promises, about a million
/// times the rounding of a deep snowpack.
const SAME_MM: f64 = 1e-9;

fn assert_same(engine: f64, naive: f64, what: &str, day: usize) -> Result<(), TestCaseError> {
    prop_assert!((engine - naive).abs() <= SAME_MM, "{what} on day {day}: engine {engine}, naive {naive}");
    Ok(())
}

proptest! {
    #![proptest_config(cases(128))]

    /// The engine gives the states, fluxes and basin means of the method as it is written, on every day of several
    /// years with snow carried over, for both degree rules and both phase rules, at levels of any sign.
    #[test]
    fn engine_is_the_method(scenario in scenarios()) {
        check(&scenario)?;
    }

    /// The same with any of the options on: slopes, trees, patches, a cold store, losses to the air, the wet bulb, each year
    /// from bare ground.
    #[test]
    fn engine_is_the_method_with_options(scenario in scenarios_with_options()) {
        check(&scenario)?;
    }
}

fn check(scenario: &Scenario) -> Result<(), TestCaseError> {
    let series = scenario.climate.series();
    let lanes = scenario.lanes(&scenario.changes());
    let blocks = Scenario::run(&lanes, &series, Path::Widest);
    let (days, starts_bare) = naive_days(&series, &scenario.snow);
    let areas: Vec<f64> = scenario.basin.bands.iter().map(|band| band.area_km2).collect();
    for (mix, level_c) in scenario.levels_c.iter().enumerate() {
        let mut bands = Vec::new();
        for band in 0..areas.len() {
            let naive = naive::run(&scenario.naive_band(band, *level_c), &days, &starts_bare);
            check_band(&blocks, &series, &lanes, (mix, band), &naive)?;
            bands.push(naive);
        }
        check_basin(&blocks, &series, mix, &bands, &areas)?;
    }
    Ok(())
}

fn check_band(
    blocks: &[YearBlock],
    series: &Series,
    lanes: &Lanes,
    (mix, band): (usize, usize),
    naive: &[naive::DayResult],
) -> Result<(), TestCaseError> {
    let column = lanes.column(mix, band);
    for (block, year) in blocks.iter().zip(&series.years) {
        prop_assert_eq!(block.days, year.days);
        prop_assert_eq!(block.first, year.first);
        let detail = block.detail.as_ref().expect("detail was asked for");
        for day in 0..year.days {
            let expected = &naive[year.start + day];
            let at = day * block.width + column;
            let of_lanes = |table: &[f64]| {
                let row = table.get(day * detail.width..(day + 1) * detail.width);
                row.map_or(0.0, |row| lanes.of_place(mix, band, row))
            };
            let net_melt = expected.melt_mm - expected.refreeze_mm;
            for (what, engine, naive) in [
                ("mean temperature", of_lanes(&detail.mean_c), expected.mean_c),
                ("rain", block.rain_mm[at], expected.rain_mm),
                ("snow", block.snow_mm[at], expected.snow_mm),
                ("melt", of_lanes(&detail.melt_mm), expected.melt_mm),
                ("refreezing", of_lanes(&detail.refreeze_mm), expected.refreeze_mm),
                ("ice", of_lanes(&detail.ice_mm), expected.ice_mm),
                ("liquid", of_lanes(&detail.liquid_mm), expected.liquid_mm),
                ("SWE", block.swe_mm[at], expected.swe_mm),
                ("net melt", block.net_melt_mm[at], net_melt),
                ("outflow", block.outflow_mm[at], expected.outflow_mm),
                ("bare-ground rain", block.bare_ground_rain_mm[at], expected.bare_ground_rain_mm),
                ("sublimation", of_table(&block.sublimation_mm, at), expected.sublimation_mm),
                ("cold content", of_lanes(&detail.cold_mm), expected.cold_mm),
                (
                    "covered share",
                    block.covered_share(day, column).expect("asked for"),
                    expected.covered_share,
                ),
            ] {
                assert_same(engine, naive, what, day + 1)?;
            }
        }
        let last = &naive[year.start + year.days - 1];
        let end = block.swe_mm[year.days * block.width + column];
        assert_same(end, last.ice_mm + last.liquid_mm, "SWE as the year ends", year.days)?;
    }
    Ok(())
}

/// A number of a table that has no rows where its option is off.
fn of_table(table: &[f64], at: usize) -> f64 {
    table.get(at).copied().unwrap_or(0.0)
}

fn check_basin(
    blocks: &[YearBlock],
    series: &Series,
    mix: usize,
    bands: &[Vec<naive::DayResult>],
    areas: &[f64],
) -> Result<(), TestCaseError> {
    for (block, year) in blocks.iter().zip(&series.years) {
        for day in 0..year.days {
            let mean = |flux: fn(&naive::DayResult) -> f64| {
                let values: Vec<f64> = bands.iter().map(|band| flux(&band[year.start + day])).collect();
                naive::basin_mean(&values, areas)
            };
            let at = day * block.width + block.mixes_at + mix;
            for (what, engine, naive) in [
                ("basin SWE", block.swe_mm[at], mean(|r| r.swe_mm)),
                ("basin net melt", block.net_melt_mm[at], mean(|r| r.melt_mm - r.refreeze_mm)),
                ("basin outflow", block.outflow_mm[at], mean(|r| r.outflow_mm)),
                ("basin bare-ground rain", block.bare_ground_rain_mm[at], mean(|r| r.bare_ground_rain_mm)),
                ("basin rain", block.rain_mm[at], mean(|r| r.rain_mm)),
                ("basin snow", block.snow_mm[at], mean(|r| r.snow_mm)),
                ("basin sublimation", of_table(&block.sublimation_mm, at), mean(|r| r.sublimation_mm)),
                (
                    "basin cover",
                    block.covered_share(day, block.mixes_at + mix).expect("asked for"),
                    mean(|r| r.covered_share),
                ),
            ] {
                assert_same(engine, naive, what, day + 1)?;
            }
        }
        let at_end: Vec<f64> = bands
            .iter()
            .map(|band| &band[year.start + year.days - 1])
            .map(|last| last.ice_mm + last.liquid_mm)
            .collect();
        let end = block.swe_mm[year.days * block.width + block.mixes_at + mix];
        assert_same(end, naive::basin_mean(&at_end, areas), "basin SWE as the year ends", year.days)?;
    }
    Ok(())
}

/// By hand: 10 mm of ice hold 10 mm of liquid. A day at 2 degC brings 5 mm of rain and no degrees above the melt base: the rain
/// melts 0.0125*5*2 = 0.125 mm, and of 15.125 mm of liquid 9.875 mm of ice hold 9.875. The pack is no bare ground, though ice and
/// liquid are alike to the bit.
#[test]
fn as_much_liquid_as_ice_is_a_pack() {
    let pack = Pack { ice_mm: 10.0, liquid_mm: 10.0, cold_mm: 0.0 };
    let day = LaneDay {
        snow_mm: 0.0,
        rain_mm: 5.0,
        mean_c: 2.0,
        melt_degrees_c: 0.0,
        freeze_degrees_c: 0.0,
        melt_factor: 3.0,
        degree_day_factor: 3.0,
        sublimation_mm: 0.0,
    };
    let lane =
        LaneConst { holding_fraction: 1.0, refreeze_fraction: 0.0, cold_per_mm_c: 0.0, cold_share: 0.0 };
    let (after, fluxes) = step::<false>(pack, day, lane);
    for (found, expected) in [
        (fluxes.bare_ground_rain_mm, 0.0),
        (fluxes.melt_mm, 0.125),
        (fluxes.outflow_mm, 5.25),
        (after.ice_mm, 9.875),
        (after.liquid_mm, 9.875),
    ] {
        assert!((found - expected).abs() < 1e-12, "{found} for {expected}; only rounding may part them");
    }
}
