//! What must not change a result: the CPU's vectors, a level of nothing, the order of the bands.

use super::cases;
use super::scenario::{Scenario, scenarios};
use super::with_options::scenarios_with_options;
use proptest::prelude::*;
use thawline::perturb::MonthlyChange;
use thawline::snow::{ColdContent, Engine, Patchiness, Path, Radiation, SnowOptions, Sublimation, YearBlock};

/// The bits of everything in a year that is in use.
fn bits(block: &YearBlock) -> Vec<u64> {
    let (end, row) = (block.days * block.width, block.width);
    let mut values = Vec::new();
    values.extend_from_slice(&block.swe_mm[..end + row]);
    values.extend_from_slice(&block.net_melt_mm[..end]);
    values.extend_from_slice(&block.outflow_mm[..end]);
    values.extend_from_slice(&block.bare_ground_rain_mm[..end]);
    values.extend_from_slice(&block.rain_mm[..end]);
    values.extend_from_slice(&block.snow_mm[..end]);
    values.extend_from_slice(block.sublimation_mm.get(..end).unwrap_or_default());
    values.extend_from_slice(&block.covered[..block.days * (row - block.means_at)]);
    if let Some(detail) = &block.detail {
        let end = block.days * detail.width;
        for table in [&detail.mean_c, &detail.melt_mm, &detail.refreeze_mm, &detail.ice_mm, &detail.liquid_mm]
        {
            values.extend_from_slice(&table[..end]);
        }
        values.extend_from_slice(detail.cold_mm.get(..end).unwrap_or_default());
    }
    values.into_iter().map(f64::to_bits).collect()
}

/// Whether a run without detail is, to the bit, what the run with it is beside the detail.
fn is_the_same_without_detail(scenario: &Scenario) -> bool {
    let series = scenario.climate.series();
    let lanes = scenario.lanes(&scenario.changes());
    let with = Scenario::run(&lanes, &series, Path::Widest);
    let mut engine = Engine::new(&lanes, false).with_cover();
    series.years.iter().zip(with).all(|(year, mut expected)| {
        if !year.follows {
            engine.restart();
        }
        let block = engine.year(series.view(year)).expect("the ledger is closed");
        expected.detail = None;
        bits(block) == bits(&expected)
    })
}

proptest! {
    #![proptest_config(cases(48))]

    /// The same bits whatever vectors the CPU has: a study can be repeated on another machine.
    #[test]
    fn vectors_do_not_show(scenario in prop_oneof![scenarios(), scenarios_with_options()]) {
        let series = scenario.climate.series();
        let lanes = scenario.lanes(&scenario.changes());
        let widest = Scenario::run(&lanes, &series, Path::Widest);
        for path in [Path::Avx2, Path::Baseline] {
            let other = Scenario::run(&lanes, &series, path);
            for (year, (a, b)) in widest.iter().zip(&other).enumerate() {
                prop_assert!(bits(a) == bits(b), "{path:?} differs in year {year}");
            }
        }
    }

    /// A level of 0 is the record itself, bit for bit, whatever the monthly shapes and the precipitation change.
    #[test]
    fn level_zero_is_the_record(scenario in scenarios()) {
        let series = scenario.climate.series();
        let zero = Scenario::run(&scenario.lanes(&[scenario.warming.at(0.0)]), &series, Path::Widest);
        let record = Scenario::run(&scenario.lanes(&[MonthlyChange::NONE]), &series, Path::Widest);
        for (a, b) in zero.iter().zip(&record) {
            prop_assert!(bits(a) == bits(b));
        }
    }

    /// Snow without variation is the plain band, whatever the number of classes; a loss of nothing and a factor of
    /// radiation of 0 are none.
    #[test]
    fn options_of_nothing_are_none(scenario in scenarios(), classes in 2..8_usize) {
        let series = scenario.climate.series();
        let changes = scenario.changes();
        let plain = Scenario::run(&scenario.lanes(&changes), &series, Path::Widest);
        let mut nothing = scenario.clone();
        nothing.snow.options.patchiness = Some(Patchiness { coefficient_of_variation: 0.0, classes });
        nothing.snow.options.sublimation = Some(Sublimation { mm_per_day: [0.0; 12], snowfall_fraction: 0.0 });
        nothing.snow.options.radiation = Some(Radiation { factor_mm_per_c_day: 0.0 });
        let with = Scenario::run(&nothing.lanes(&changes), &series, Path::Widest);
        for (a, b) in plain.iter().zip(with) {
            prop_assert!(b.sublimation_mm.iter().all(|mm| *mm == 0.0));
            let mut b = YearBlock { sublimation_mm: Vec::new(), ..b };
            if let Some(detail) = &mut b.detail {
                detail.cold_mm.clear();
            }
            prop_assert!(bits(a) == bits(&b));
        }
    }

    /// Asking for detail changes nothing of what is there without it.
    #[test]
    fn detail_does_not_show(scenario in prop_oneof![scenarios(), scenarios_with_options()]) {
        prop_assert!(is_the_same_without_detail(&scenario));
    }

    /// The same with each option alone: the plain form of a year is run only where there is none of them.
    #[test]
    fn detail_does_not_show_beside_one_option(scenario in scenarios()) {
        let none = SnowOptions::default();
        let radiation = Some(Radiation { factor_mm_per_c_day: 3.0 });
        let patchiness = Some(Patchiness { coefficient_of_variation: 0.6, classes: 3 });
        let cold_content = Some(ColdContent { daily_share: 0.4 });
        let sublimation = Some(Sublimation { mm_per_day: [0.4; 12], snowfall_fraction: 0.1 });
        for options in [
            SnowOptions { radiation, ..none },
            SnowOptions { patchiness, ..none },
            SnowOptions { cold_content, ..none },
            SnowOptions { sublimation, ..none },
            SnowOptions { wet_bulb: true, ..none },
        ] {
            let mut scenario = scenario.clone();
            scenario.snow.options = options;
            prop_assert!(is_the_same_without_detail(&scenario), "{options:?}");
        }
    }

    /// A narrow block holds the basin means of the year that was copied into it, to the bit: every table of every day, SWE as the
    /// year ends, and the cover.
    #[test]
    fn copied_means_are_the_means(scenario in prop_oneof![scenarios(), scenarios_with_options()]) {
        let lanes = scenario.lanes(&scenario.changes());
        let mut narrow = YearBlock::of_means(&lanes);
        for block in Scenario::run(&lanes, &scenario.climate.series(), Path::Widest) {
            block.copy_means(&mut narrow);
            prop_assert_eq!((narrow.first, narrow.days, narrow.mixes_at), (block.first, block.days, 0));
            let lost_days = if block.sublimation_mm.is_empty() { 0 } else { block.days };
            for (of, copied, days) in [
                (&block.swe_mm, &narrow.swe_mm, block.days + 1),
                (&block.net_melt_mm, &narrow.net_melt_mm, block.days),
                (&block.outflow_mm, &narrow.outflow_mm, block.days),
                (&block.bare_ground_rain_mm, &narrow.bare_ground_rain_mm, block.days),
                (&block.rain_mm, &narrow.rain_mm, block.days),
                (&block.snow_mm, &narrow.snow_mm, block.days),
                (&block.sublimation_mm, &narrow.sublimation_mm, lost_days),
            ] {
                for (day, mix) in (0..days).flat_map(|day| (0..lanes.mixes()).map(move |mix| (day, mix))) {
                    let wide = block.row(of, day)[block.mixes_at + mix];
                    prop_assert_eq!(wide.to_bits(), narrow.row(copied, day)[mix].to_bits());
                }
            }
            for (day, mix) in (0..block.days).flat_map(|day| (0..lanes.mixes()).map(move |mix| (day, mix))) {
                let wide = block.covered_share(day, block.mixes_at + mix);
                prop_assert_eq!(wide, narrow.covered_share(day, mix));
            }
        }
    }

    /// A lane's neighbours and its place in the row do not matter: each level run alone gives the same bits.
    #[test]
    fn neighbours_do_not_show(scenario in scenarios()) {
        let series = scenario.climate.series();
        let changes = scenario.changes();
        let all = scenario.lanes(&changes);
        let together = Scenario::run(&all, &series, Path::Widest);
        let bands = scenario.basin.bands.len();
        for (mix, change) in changes.iter().enumerate() {
            let alone = Scenario::run(&scenario.lanes(std::slice::from_ref(change)), &series, Path::Widest);
            for (a, b) in together.iter().zip(&alone) {
                for day in 0..=a.days {
                    let (a_row, b_row) = (a.row(&a.swe_mm, day), b.row(&b.swe_mm, day));
                    for (band, alone) in b_row[..bands].iter().enumerate() {
                        prop_assert_eq!(a_row[all.column(mix, band)].to_bits(), alone.to_bits());
                    }
                    prop_assert_eq!(a_row[a.mixes_at + mix], b_row[b.mixes_at]);
                }
            }
        }
    }

    /// Bands in any order give the same basin: only the order of the sum changes, hence 1e-9 mm and not bits.
    #[test]
    fn order_of_bands_does_not_show(scenario in scenarios(), turn in 0..5_usize) {
        let series = scenario.climate.series();
        let mut turned = scenario.clone();
        turned.basin.bands.reverse();
        let bands = turned.basin.bands.len();
        turned.basin.bands.rotate_left(turn % bands);
        let one = Scenario::run(&scenario.lanes(&scenario.changes()), &series, Path::Widest);
        let other = Scenario::run(&turned.lanes(&turned.changes()), &series, Path::Widest);
        for (a, b) in one.iter().zip(&other) {
            for (a_table, b_table) in [
                (&a.swe_mm, &b.swe_mm),
                (&a.net_melt_mm, &b.net_melt_mm),
                (&a.outflow_mm, &b.outflow_mm),
                (&a.bare_ground_rain_mm, &b.bare_ground_rain_mm),
            ] {
                for day in 0..a.days {
                    for mix in 0..scenario.levels_c.len() {
                        let at = day * a.width + a.mixes_at + mix;
                        let (x, y) = (a_table[at], b_table[at]);
                        prop_assert!((x - y).abs() <= 1e-9, "{x} and {y} on day {}", day + 1);
                    }
                }
            }
        }
    }
}
