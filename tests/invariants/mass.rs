//! Water is neither made nor lost, and warmth does not make snow.

use super::cases;
use super::scenario::{Scenario, scenarios};
use super::with_options::scenarios_with_options;
use proptest::prelude::*;
use thawline::perturb::PrecipitationChange;
use thawline::snow::{COLD_PER_MM_C, ColdContent, Path, YearBlock};

proptest! {
    #![proptest_config(cases(64))]

    /// Rain and snow equal outflow, bare-ground rain, sublimation and change of SWE, for every lane and year, reckoned from the
    /// daily table alone; 1e-9 of the larger side, as the method states it.
    #[test]
    fn ledger_closes(scenario in prop_oneof![scenarios(), scenarios_with_options()]) {
        let lanes = scenario.lanes(&scenario.changes());
        for block in Scenario::run(&lanes, &scenario.climate.series(), Path::Widest) {
            for lane in 0..lanes.count() {
                let input_mm = column_sum(&block, &block.rain_mm, lane) + column_sum(&block, &block.snow_mm, lane);
                let end = block.swe_mm[block.days * block.width + lane];
                let change_mm = end - block.swe_mm[lane];
                let outflow_mm = column_sum(&block, &block.outflow_mm, lane);
                let bare_mm = column_sum(&block, &block.bare_ground_rain_mm, lane);
                let sublimation_mm =
                    if lanes.has_sublimation() { column_sum(&block, &block.sublimation_mm, lane) } else { 0.0 };
                let accounted_mm = outflow_mm + bare_mm + sublimation_mm + change_mm;
                let larger_mm = input_mm.abs().max(accounted_mm.abs()).max(1.0);
                prop_assert!((input_mm - accounted_mm).abs() <= 1e-9 * larger_mm, "{input_mm} in, {accounted_mm} out");
            }
        }
    }

    /// No state and no flux but net melt is ever negative, to the last bit; the basin means neither.
    #[test]
    fn nothing_is_negative(scenario in prop_oneof![scenarios(), scenarios_with_options()]) {
        let lanes = scenario.lanes(&scenario.changes());
        for block in Scenario::run(&lanes, &scenario.climate.series(), Path::Widest) {
            let detail = block.detail.as_ref().expect("detail was asked for");
            let columns = [
                ("SWE", &block.swe_mm[..(block.days + 1) * block.width]),
                ("outflow", &block.outflow_mm[..block.days * block.width]),
                ("bare-ground rain", &block.bare_ground_rain_mm[..block.days * block.width]),
                ("rain", &block.rain_mm[..block.days * block.width]),
                ("snow", &block.snow_mm[..block.days * block.width]),
                ("melt", &detail.melt_mm[..block.days * detail.width]),
                ("refreezing", &detail.refreeze_mm[..block.days * detail.width]),
                ("ice", &detail.ice_mm[..block.days * detail.width]),
                ("liquid", &detail.liquid_mm[..block.days * detail.width]),
                ("cold content", &detail.cold_mm[..]),
                ("sublimation", &block.sublimation_mm[..]),
                ("covered share", &block.covered[..]),
            ];
            for (what, values) in columns {
                for value in values {
                    prop_assert!(*value >= 0.0, "{what} {value}");
                }
            }
        }
    }

    /// A pack is never colder than the coldest day since it began to lie: neither snowfall, nor the air, nor what sublimes or
    /// melts cools it further. 1e-9 mm, as for every state.
    #[test]
    fn no_pack_is_colder_than_its_air(scenario in scenarios_with_options(), daily_share in 0.0..1.0) {
        let mut scenario = scenario;
        scenario.snow.options.cold_content = Some(ColdContent { daily_share });
        let lanes = scenario.lanes(&scenario.changes());
        let mut coldest_c = vec![0.0_f64; lanes.count()];
        for block in Scenario::run(&lanes, &scenario.climate.series(), Path::Widest) {
            let detail = block.detail.as_ref().expect("detail was asked for");
            for day in 0..block.days {
                for (lane, coldest_c) in coldest_c.iter_mut().enumerate() {
                    let at = day * detail.width + lane;
                    *coldest_c = coldest_c.min(detail.mean_c[at]);
                    let (ice_mm, cold_mm) = (detail.ice_mm[at], detail.cold_mm[at]);
                    prop_assert!(
                        cold_mm <= COLD_PER_MM_C * ice_mm * -*coldest_c + 1e-9,
                        "{cold_mm} mm of cold in {ice_mm} mm of ice, the air never below {coldest_c} degC"
                    );
                    if ice_mm == 0.0 {
                        *coldest_c = 0.0;
                    }
                }
            }
        }
    }

    /// With precipitation unchanged, a warmer level has no more snowfall in any band on any day, and the same total.
    #[test]
    fn warmer_is_never_more_snowfall(mut scenario in scenarios(), more_c in 0.01..5.0) {
        scenario.warming.precipitation = PrecipitationChange::PctPerC([0.0; 12]);
        let cool_c = scenario.levels_c[0];
        let changes = [scenario.warming.at(cool_c), scenario.warming.at(cool_c + more_c)];
        let lanes = scenario.lanes(&changes);
        let bands = scenario.basin.bands.len();
        for block in Scenario::run(&lanes, &scenario.climate.series(), Path::Widest) {
            for (day, band) in (0..block.days).flat_map(|day| (0..bands).map(move |band| (day, band))) {
                let [at_cool, at_warm] = [0, 1].map(|group| day * block.width + lanes.column(group, band));
                let (cool, warm) = (block.snow_mm[at_cool], block.snow_mm[at_warm]);
                prop_assert!(warm <= cool, "warming by {more_c} degC turned {cool} mm of snow into {warm} mm");
                let (cool_all, warm_all) = (cool + block.rain_mm[at_cool], warm + block.rain_mm[at_warm]);
                prop_assert!((cool_all - warm_all).abs() <= 1e-12 * cool_all.max(1.0));
            }
        }
    }
}

fn column_sum(block: &YearBlock, table: &[f64], lane: usize) -> f64 {
    (0..block.days).map(|day| table[day * block.width + lane]).sum()
}
