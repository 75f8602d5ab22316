//! Lanes that correct the gauge by themselves against a record that is corrected once.

use super::cases;
use super::scenario::{Scenario, scenarios};
use super::with_options::scenarios_with_options;
use proptest::prelude::*;
use thawline::perturb::MonthlyChange;
use thawline::snow::{GaugeMultiplier, Path, StationPhase, correct_catch};

/// Both do the same arithmetic but for the order of two products, a relative error of 1e-15 of some thousand mm.
const SAME_MM: f64 = 1e-9;

proptest! {
    #![proptest_config(cases(48))]

    /// Identity: a group of lanes on the gauge's own record is what it is on the record that is corrected for all, whatever
    /// the multipliers of the other group, with the options and without.
    #[test]
    fn each_group_corrects_its_own_gauge(
        scenario in prop_oneof![scenarios(), scenarios_with_options()],
        rain in 0.7..1.5,
        snow in 0.5..2.5,
    ) {
        let series = scenario.climate.series();
        let gauge = GaugeMultiplier { rain, snow };
        let mut corrected = series.clone();
        correct_catch(&mut corrected, gauge, StationPhase::of(&scenario.snow, scenario.station_m));
        let other = GaugeMultiplier { rain: 1.0, snow: 1.0 };
        let two = scenario.lanes(&[MonthlyChange::NONE, MonthlyChange::NONE]);
        let on_the_gauge = two.on_the_gauge(&[other, gauge], scenario.station_m);
        let found = Scenario::run(&on_the_gauge, &series, Path::Widest);
        let lanes = scenario.lanes(&[MonthlyChange::NONE]);
        let expected = Scenario::run(&lanes, &corrected, Path::Widest);
        for (found, expected) in found.iter().zip(&expected) {
            for place in 0..scenario.basin.bands.len() {
                let (own, plain) = (on_the_gauge.column(1, place), lanes.column(0, place));
                for day in 0..=expected.days {
                    let a = found.row(&found.swe_mm, day)[own];
                    let b = expected.row(&expected.swe_mm, day)[plain];
                    prop_assert!((a - b).abs() <= SAME_MM, "SWE of place {place} on day {day}: {a} and {b}");
                }
                for day in 0..expected.days {
                    let a = found.row(&found.outflow_mm, day)[own];
                    let b = expected.row(&expected.outflow_mm, day)[plain];
                    prop_assert!((a - b).abs() <= SAME_MM, "outflow of place {place} on day {day}: {a} and {b}");
                }
            }
        }
    }
}
